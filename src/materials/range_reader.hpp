#pragma once
/// Reads where a datum holds and sees to it that no table is asked beyond its ends.

#include <optional>
#include <string>

#include "materials/entry_reader.hpp"

namespace stillcoat::materials {

/// Two numbers [lower, upper], not negative, times `scale`; absent when not given or with a
/// problem.
std::optional<Interval> read_interval(core::TableReader& reader, const std::string& key,
                                      double scale);

/// The keys range and continued_to_K of an entry whose curve is read. A range must lie within its
/// table; a table without a range holds between its ends.
void read_ranges(core::TableReader& reader, Entry& entry, const EntryContext& context);

/// The key range of a cold table whose values are read, and its joins against `entry`.
void read_cold_ranges(core::TableReader& reader, ColdTable& cold, const Entry& entry);

}  // namespace stillcoat::materials
