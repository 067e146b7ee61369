#include "stillcoat/noise/quantum_limit.hpp"

#include <cmath>

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

double interferometer_quantum_limit_psd(double mass, double length, double frequency) {
    require_positive(length, "arm length", "m", kimble);
    return 4.0 * free_mass_quantum_limit_psd(mass, frequency) / (length * length);
}

double quantum_limited_power(double mass, double length, double half_bandwidth, double wavelength) {
    require_positive(mass, "mass", "kg", kimble);
    require_positive(length, "arm length", "m", kimble);
    require_positive(half_bandwidth, "half-bandwidth", "Hz", kimble);
    require_positive(wavelength, "wavelength", "m", kimble);
    const double gamma = 2.0 * core::pi * half_bandwidth;
    const double omega0 = 2.0 * core::pi * core::speed_of_light / wavelength;
    return mass * length * length * std::pow(gamma, 4) / (4.0 * omega0);
}

}  // namespace stillcoat::noise
