#pragma once
/// Values of the results that a sweep shows.

#include "stillcoat/assess/sweep.hpp"

namespace stillcoat::assess {

/// One for each of `wanted`, which come from outcomes(); absent where not defined or not known.
std::vector<std::optional<double>> outcome_values(const stack::Design& design,
                                                  const Appraisal& appraisal,
                                                  const std::vector<Outcome>& wanted);

}  // namespace stillcoat::assess
