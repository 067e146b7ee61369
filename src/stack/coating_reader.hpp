#pragma once
/// Reads [coating] of a design file.

#include "stillcoat/core/reader.hpp"
#include "stillcoat/stack/design.hpp"

namespace stillcoat::stack {

/// @param wavelength that of the light, default of the design wavelength [m]; NaN when unreadable
Coating read_coating(core::TableReader& reader, double wavelength,
                     const materials::Library& library);

/// Adds a problem, with the nearest spelling, when `name` is neither a material nor one of
/// `others`.
void check_material(core::TableReader& reader, const std::string& key, const std::string& name,
                    const materials::Library& library, const std::vector<std::string>& others);

}  // namespace stillcoat::stack
