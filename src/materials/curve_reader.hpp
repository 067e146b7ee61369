#pragma once
/// Reads the datum of a property: a value, a table, a formula or a reference to another material.

#include "materials/entry_reader.hpp"

namespace stillcoat::materials {

/// Fills curve, offset, medium, rescaling and reference temperature of `entry`.
/// Returns the factor from the file's unit to SI, for the widths.
double read_curve(core::TableReader& reader, const EntryContext& context, Entry& entry);

/// The keys temperature_K and values.
TemperatureTable read_temperature_table(core::TableReader& reader, PropertyId property,
                                        double scale);

}  // namespace stillcoat::materials
