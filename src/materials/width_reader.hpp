#pragma once
/// Reads the standard uncertainty of a datum.

#include <optional>
#include <vector>

#include "stillcoat/core/reader.hpp"
#include "stillcoat/materials/property.hpp"

namespace stillcoat::materials {

/// The width keys of a material file, scaled to SI; absent when the table has none.
std::optional<Width> read_width(core::TableReader& reader, double unit_scale);

/// The keys uncertainty_below and uncertainty_between.
std::vector<WidthSpan> read_width_spans(core::TableReader& reader, double unit_scale);

/// The key uncertainty of a design file: "4 GPa", "5 %", or a pure number for a pure number.
/// @param value the datum [SI], of which "5 %" is taken
Width read_design_width(core::TableReader& reader, const core::QuantityKind& kind, double value);

}  // namespace stillcoat::materials
