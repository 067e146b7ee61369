#pragma once
/// The layers of a coating as a CSV table: what goes to the coater and comes back into a design.
///
/// Columns: number (from the light side), material, thickness_nm (physical, at the reference
/// temperature), quarter_waves, refractive_index, extinction_coefficient (these three at the design
/// wavelength and the reference temperature), total_thickness_nm (running). Only material and
/// thickness_nm are read back; the others follow from them.

#include <string>
#include <vector>

#include "stillcoat/stack/design.hpp"
#include "stillcoat/stack/mirror.hpp"

namespace stillcoat::stack {

/// The coating as it is when it is made: at its reference temperature, seen at normal incidence
/// with its design wavelength. Notes go to `ledger`.
/// @throws core::InputError as at_operating_point does
Mirror as_coated(const Design& design, const materials::Library& library, Ledger& ledger);

/// The table of such a mirror. Reading it back gives the same thicknesses to the last bit.
std::string layer_table(const Mirror& coated);

/// The layers in a table file; its problems are added, also those of an unknown material.
std::vector<LayerInput> read_layer_table(const std::string& path, const materials::Library& library,
                                         core::Problems& problems);

}  // namespace stillcoat::stack
