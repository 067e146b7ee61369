#pragma once
/// The materials known to a run: those of the installed folder, of the user's folder, and what a
/// design file replaces.

#include <map>
#include <optional>
#include <string>
#include <vector>

#include "stillcoat/core/document.hpp"
#include "stillcoat/materials/property.hpp"

namespace stillcoat::materials {

struct Material {
    std::string name, title, form, composition, remark, file;
    std::map<PropertyId, Property> properties;
    std::map<PropertyId, std::string> unknown;  ///< left out, with the reason
    std::optional<Mixed> mixture;  ///< of what, for the properties that the file does not state
};

struct Reference {
    std::string citation, doi, seen;
};

struct Library {
    std::map<std::string, Material> materials;
    std::map<std::string, Reference> references;
    /// What the library has of properties that a design file multiplies, by a name that no file can
    /// have, "tantala-ibs (library)"; no material that a design could name.
    std::map<std::string, Material> kept;

    /// As find(). @throws std::logic_error when there is none of that name
    const Material& at(const std::string& name) const;
    std::vector<std::string> names() const;
    /// The material of a name; for a name in `kept` the one whose properties those were. Null when
    /// there is none.
    const Material* find(const std::string& name) const;
    /// A property of a material; under a name in `kept` as the library has it. Null when there is
    /// none.
    const Property* property(const std::string& name, PropertyId id) const;
};

/// Factors that a design file may put on a library value.
inline constexpr double smallest_factor = 1e-3;
inline constexpr double largest_factor = 1e3;

/// Reads the materials and references of a folder into `library`, replacing materials of the same
/// name. All problems of all files are added to `problems`.
void add_folder(Library& library, const std::string& folder, core::Problems& problems);

/// Reads the references.toml of a folder, when it has one, beside those of the rules of mixtures.
void add_references(Library& library, const std::string& folder, core::Problems& problems);

/// Reads one material file; its references must be known to the library already. With a [mixture]
/// the properties that the file leaves out follow from its two constituents (see mixture.hpp), so
/// far as there is a rule; the others are unknown.
/// Absent when anything was wrong.
std::optional<Material> read_material(const core::Document& document, const Library& library,
                                      core::Problems& problems);

/// Checks that the materials that rules point to exist and do not run in a circle.
void check_links(const Library& library, core::Problems& problems);

/// Applies a table [material."name"] of a design file: each key a property with a replacing value
/// `{ value = "118 GPa", uncertainty = "5 GPa", source = "..." }`, `{ alternative = "name" }`, or
/// `{ times = 1.01, source = "..." }`: the library's own value under all conditions times a factor
/// (smallest_factor … largest_factor), its dispersion, rules and cold table too; relative widths
/// keep, absolute ones go with it. The factor itself is taken as exact.
void override_properties(Library& library, const std::string& name, const core::Node& table,
                         core::Problems& problems);

/// Puts one number in the place of what the library knows of a property, without limits in
/// temperature, wavelength or frequency. @param value [SI], @param source stands in the result
void replace_value(Library& library, const std::string& name, PropertyId property, double value,
                   const std::string& source);

}  // namespace stillcoat::materials
