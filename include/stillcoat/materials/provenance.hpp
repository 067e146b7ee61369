#pragma once
/// Which pieces of data had a say in a value, each with its source.

#include <optional>
#include <string>
#include <vector>

#include "stillcoat/materials/property.hpp"

namespace stillcoat::materials {

/// The part of an entry that was used.
enum class Part {
    datum,       ///< the datum itself
    cold_table,  ///< its table of the loss in the cold
    rule,        ///< its rule beyond the range of the data
};

/// A piece of data that had a say in a value.
struct Basis {
    std::string material;
    PropertyId property;
    const Entry* entry;  ///< never null; belongs to the library that was asked
    Part part;
};

/// Source keys of the part: of references.toml, or as written in a design file.
const std::vector<std::string>& sources_of(const Basis& basis);
/// "seen", "from memory", "derived", "stated in the design file"; a rule has "not stated".
std::string status_of(const Basis& basis);
/// "measured", "fit", "estimate", "derived", "by analogy", "stated in the design file"; a rule has
/// "by analogy".
std::string nature_of(const Basis& basis);
/// Where in the source; may be empty in a design file.
std::string place_of(const Basis& basis);
/// Frequencies of the measurement [Hz], both ends equal for a single one; absent when not stated
/// and for a rule.
std::optional<Interval> frequencies_of(const Basis& basis);

/// Adds what is not yet there: each piece of data counts once.
void add_basis(std::vector<Basis>& list, Basis basis);
void add_bases(std::vector<Basis>& list, const std::vector<Basis>& more);

}  // namespace stillcoat::materials
