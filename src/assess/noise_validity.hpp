#pragma once
/// Where a noise formula of this program leaves its range, by how much, and what to do.

#include "assess/noise_model.hpp"

namespace stillcoat::assess {

void warn_of_validity(const stack::Design& design, const stack::Mirror& mirror,
                      const NoiseModel& model, std::vector<std::string>& warnings);

}  // namespace stillcoat::assess
