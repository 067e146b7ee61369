#pragma once
/// Where a noise formula of this program leaves its range, by how much, and what to do.

#include "assess/noise_model.hpp"

namespace stillcoat::assess {

/// Where a plane wave and a whole mirror face no longer describe the light; holds at any angle.
void warn_of_beam(const stack::Design& design, std::vector<std::string>& warnings);

void warn_of_validity(const stack::Design& design, const stack::Mirror& mirror,
                      const NoiseModel& model, std::vector<std::string>& warnings);

}  // namespace stillcoat::assess
