#pragma once
/// A sweep as CSV and JSON.

#include <optional>
#include <string>
#include <vector>

#include "stillcoat/assess/sweep.hpp"

namespace stillcoat::present {

using SweepRows = std::vector<std::optional<assess::SweepRow>>;

/// A unit as the ending of a key: "W/m2" becomes "W_per_m2".
std::string unit_ending(const std::string& unit);

/// The rows that are there, one line each: the axes, then the outcomes; a value that is not defined
/// is an empty cell.
std::string sweep_csv(const assess::SweepPlan& plan, const SweepRows& rows);

std::string sweep_json(const stack::Design& design, const assess::SweepPlan& plan,
                       const SweepRows& rows, const assess::SweepRemarks& remarks);

}  // namespace stillcoat::present
