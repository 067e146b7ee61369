#include "stillcoat/noise/quantum_limit.hpp"

#include "noise/limits.hpp"
#include "stillcoat/core/constants.hpp"

namespace stillcoat::noise {
namespace {

constexpr char kimble[] = "Kimble et al., Phys. Rev. D 65, 022002 (2001)";
constexpr double reduced_planck_constant = core::planck_constant / (2.0 * core::pi);

}  // namespace

double free_mass_quantum_limit_psd(double mass, double frequency) {
    require_positive(mass, "mass", "kg", kimble);
    require_positive(frequency, "frequency", "Hz", kimble);
    const double omega = 2.0 * core::pi * frequency;
    return 2.0 * reduced_planck_constant / (mass * omega * omega);
}

}  // namespace stillcoat::noise
