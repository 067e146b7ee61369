#pragma once
/// A sweep as CSV and JSON, and the file that keeps an unfinished one.

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

/// @param design_file as given on the command line
std::string sweep_json(const stack::Design& design, const assess::SweepPlan& plan,
                       const SweepRows& rows);

/// What is done of a sweep, to go on with.
std::string unfinished_sweep(const assess::SweepPlan& plan, const SweepRows& rows);

/// The rows of such a text. @param file for messages
/// @throws core::InputError when it is none, or belongs to another sweep
SweepRows read_unfinished_sweep(const std::string& text, const std::string& file,
                                const assess::SweepPlan& plan);

}  // namespace stillcoat::present
