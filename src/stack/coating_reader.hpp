#pragma once
/// Reads [coating] of a design file.

#include "stillcoat/core/reader.hpp"
#include "stillcoat/stack/design.hpp"

namespace stillcoat::stack {

/// Limits that several tables share.
namespace admissible {
core::Limits wavelength();
core::Limits temperature();
core::Limits layer_thickness();
}  // namespace admissible

/// @param wavelength that of the light, default of the design wavelength [m]; NaN when unreadable
Coating read_coating(core::TableReader& reader, double wavelength,
                     const materials::Library& library);

/// The layers of an array of blocks, repeats written out; a missing or empty one is a problem.
/// @param reader of [coating] or another table that holds blocks
void read_blocks(core::TableReader& reader, const std::string& key,
                 const materials::Library& library, std::vector<LayerInput>& layers);

/// The path of a file that a design names: it stands beside it.
std::string beside(const std::string& design, const std::string& file);

/// What to do about a name that is none of `names`.
std::string known_materials_hint(const std::string& name, const std::vector<std::string>& names);

/// Adds a problem, with the nearest spelling, when `name` is neither a material nor one of
/// `others`.
void check_material(core::TableReader& reader, const std::string& key, const std::string& name,
                    const materials::Library& library, const std::vector<std::string>& others);

}  // namespace stillcoat::stack
