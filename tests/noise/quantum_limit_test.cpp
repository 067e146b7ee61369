#include "stillcoat/noise/quantum_limit.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "stillcoat/core/constants.hpp"
#include "stillcoat/core/errors.hpp"

namespace stillcoat::noise {
namespace {

TEST(QuantumLimit, IsTheLeastSumOfShotNoiseAndRadiationPressure) {
    // Ideal phase readout with power P: S_shot = ħc²/(8ω0P), S_force = 8ħω0P/c²; least over P.
    const double hbar = core::planck_constant / (2.0 * core::pi), c = core::speed_of_light;
    const double omega0 = 2.0 * core::pi * c / 1064e-9, mass = 16.0, f = 35.0;
    const double omega = 2.0 * core::pi * f;
    double least = 1e300;
    for (double power = 1.0; power < 1e12; power *= 1.0001) {
        const double shot = hbar * c * c / (8.0 * omega0 * power);
        const double force = 8.0 * hbar * omega0 * power / (c * c);
        least = std::min(least, shot + force / std::pow(mass * omega * omega, 2));
    }
    EXPECT_NEAR(least / free_mass_quantum_limit_psd(mass, f), 1.0, 5e-10);
}

TEST(QuantumLimit, FallsWithMassAndWithTheSquareOfFrequency) {
    EXPECT_NEAR(free_mass_quantum_limit_psd(2.0, 3.0) / free_mass_quantum_limit_psd(1.0, 1.0),
                1.0 / 18.0, 1e-15);
}

TEST(QuantumLimit, RefusesWhatIsNotPositive) {
    EXPECT_THROW(free_mass_quantum_limit_psd(0.0, 1.0), core::DomainError);
    EXPECT_THROW(free_mass_quantum_limit_psd(1.0, -1.0), core::DomainError);
}

}  // namespace
}  // namespace stillcoat::noise
