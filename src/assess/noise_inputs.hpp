#pragma once
/// The library's values as the noise formulas want them, or the reason why a value is missing.

#include <map>
#include <optional>
#include <string>
#include <vector>

#include "stillcoat/assess/appraisal.hpp"
#include "stillcoat/noise/coating_brownian.hpp"
#include "stillcoat/noise/thermal.hpp"

namespace stillcoat::assess {

/// A value or the reason for its absence.
template <typename T>
struct Wanted {
    std::optional<T> value;
    std::string missing;
};

class NoiseInputs {
  public:
    NoiseInputs(const stack::Design& design, const materials::Library& library,
                stack::Ledger& ledger);

    Wanted<noise::Elastic> elastic(const std::string& material);
    Wanted<noise::ThermalMaterial> thermal(const std::string& material);
    Wanted<noise::Loss> loss(const std::string& material, double frequency);
    Wanted<double> property(const std::string& material, materials::PropertyId id);
    /// p11 or p12; 0 with a note when unknown.
    double photoelastic(const std::string& material, materials::PropertyId id);
    /// dn/dT that goes with a photoelastic strain weight.
    Wanted<double> free_index_slope(const std::string& material, double index);

  private:
    Wanted<double> property_at(const std::string& material, materials::PropertyId id,
                               double frequency);

    const stack::Design& design_;
    const materials::Library& library_;
    stack::Ledger& ledger_;
};

}  // namespace stillcoat::assess
