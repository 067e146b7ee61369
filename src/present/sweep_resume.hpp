#pragma once
/// The file that keeps an unfinished sweep.

#include <string>
#include <vector>

#include "present/sweep_output.hpp"

namespace stillcoat::present {

/// Stands for the content of all files that a sweep rests on.
/// @throws core::InputError when one cannot be read
std::string fingerprint(const std::vector<std::string>& files);

/// What is done of a sweep, to go on with. @param fingerprint of its inputs
std::string unfinished_sweep(const assess::SweepPlan& plan, const std::string& fingerprint,
                             const SweepRows& rows);

/// The rows of such a text. @param file for messages
/// @throws core::InputError when it is none, or belongs to another sweep or other inputs
SweepRows read_unfinished_sweep(const std::string& text, const std::string& file,
                                const assess::SweepPlan& plan, const std::string& fingerprint);

}  // namespace stillcoat::present
