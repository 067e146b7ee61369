#pragma once
/// A measured curve of wavelength in a file of its own.
///
/// First line the names of the columns with their units: `wavelength_nm,refractive_index`, or
/// `wavelength_nm,refractive_index,extinction_coefficient`, in any order. Then one line per
/// wavelength (vacuum, increasing), decimal points, commas between. Empty lines and lines that
/// begin with # are passed over.

#include <optional>

#include "materials/entry_reader.hpp"

namespace stillcoat::materials {

/// The column of a property from the file that `key` names, a path relative to the folder of the
/// file where the key stands. Absent with problems, each with file, line and column.
/// @param property refractive_index or extinction_coefficient
std::optional<WavelengthTable> read_curve_csv(core::TableReader& reader, const std::string& key,
                                              PropertyId property);

/// A problem when a material takes its index from a file whose extinction nobody reads: the light's
/// loss would silently be another one.
void check_unread_extinction(core::TableReader& material);

}  // namespace stillcoat::materials
