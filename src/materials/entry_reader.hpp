#pragma once
/// Reads the table of one property, from a material file or from a design file.

#include <map>

#include "stillcoat/materials/library.hpp"

namespace stillcoat::materials {

struct EntryContext {
    const Library* library;  ///< for the references
    PropertyId property;
    bool from_design;  ///< a design file needs only a value and a source, with units in texts
};

/// The sources of a datum: of a material file keys that must be known, of a design file a text.
std::vector<std::string> read_sources(core::TableReader& reader, const EntryContext& context);

/// Refuses properties that cannot stand together in one table.
void check_exclusive_forms(core::TableReader& reader);

/// The entry in `reader`'s table; the reader is finished by the caller, who may ask for more keys.
Entry read_entry(core::TableReader& reader, const EntryContext& context);

/// The whole table of a property with its alternatives.
Property read_property(const core::Node& table, const std::string& name,
                       const EntryContext& context, core::Problems& problems);

}  // namespace stillcoat::materials
