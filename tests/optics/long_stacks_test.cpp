/// Stacks in which a matrix product overflows or a difference has no digits left.

#include <gtest/gtest.h>

#include <cmath>
#include <limits>

#include "optics/stacks.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/optics/readout.hpp"
#include "support/worst_error.hpp"

namespace stillcoat::optics {
namespace {

using test::relative_error;
using test::WorstError;

void expect_finite(const Response& found) {
    EXPECT_TRUE(std::isfinite(found.reflection.real()) && std::isfinite(found.reflection.imag()));
    EXPECT_TRUE(std::isfinite(found.transmittance));
    EXPECT_TRUE(std::isfinite(found.log_transmittance));
    EXPECT_TRUE(std::isfinite(found.loss));
}

TEST(LongStack, OfThousandsOfQuarterWavesFollowsTheClosedForm) {
    // ln T = ln 4 − ln Y − 2 ln(1 + 1/Y), ln Y = layers ln(n_H/n_L) + ln n_s.
    WorstError worst;
    for (const int layers : {1000, 2000, 4000, 20000}) {
        for (const double low : {1.45, 2.05}) {
            const double high = 2.07, substrate = 1.5;
            const Response found =
                response(quarter_wave_stack(high, low, layers, substrate), normal_light());
            expect_finite(found);
            const double log_admittance = layers * std::log(high / low) + std::log(substrate);
            const double expected =
                std::log(4.0) - log_admittance - 2.0 * std::log1p(std::exp(-log_admittance));
            EXPECT_LE(relative_error(found.log_transmittance, expected), 1e-13)
                << layers << ", " << low;
            worst.see(relative_error(found.log_transmittance, expected), std::to_string(layers));
            EXPECT_NEAR(found.reflectance, 1.0 - std::exp(expected), 1e-15);
        }
    }
    worst.print("ln T of up to 20,000 quarter waves, relative");
}

TEST(LongStack, TransmittanceKeepsItsDigitsWhereItIsStillANumber) {
    const double high = 1.50, low = 1.45;
    const int layers = 4000;  // T = 1e-59
    const double admittance = std::pow(high / low, layers) * 1.5;
    const Response found = response(quarter_wave_stack(high, low, layers, 1.5), normal_light());
    EXPECT_LE(relative_error(found.transmittance, 4.0 * admittance / std::pow(1.0 + admittance, 2)),
              7e-15);
}

TEST(LongStack, OfRandomLayersConservesEnergy) {
    const std::uint32_t seed = 81;
    RandomStacks random(seed);
    for (const double extinction : {0.0, 1e-6, 1e-2}) {
        for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
            OpticalStack stack{1.0, {}, 1.5};
            for (int j = 0; j < 20000; ++j) {
                stack.layers.push_back({random.index(extinction), random.between(0.0, 500e-9)});
            }
            const Illumination light{wavelength_1064, 0.6, polarisation};
            const Response found = response(stack, light);
            expect_finite(found);
            EXPECT_NEAR(found.reflectance + found.transmittance + found.absorptance, 1.0, 5e-15)
                << "seed " << seed << ", k " << extinction;
            EXPECT_LT(found.log_transmittance, -100.0);
            for (const double energy : stored_energy(standing_wave(stack, light))) {
                ASSERT_TRUE(std::isfinite(energy));
            }
        }
    }
}

TEST(LongStack, DelaysAsItsStoredEnergySays) {
    const std::uint32_t seed = 82;
    RandomStacks random(seed);
    WorstError worst;
    for (const double low : {1.45, 2.0699}) {
        // In the stop band, and a nearly transparent stack whose delay grows with its length.
        for (const double factor : {1.0, 1.03, 1.2}) {
            const OpticalStack stack = quarter_wave_stack(2.07, low, 20000, low);
            const Illumination light = normal_light(factor * wavelength_1064);
            const PhaseResponse phase = phase_response(without_dispersion(stack), light);
            ASSERT_TRUE(std::isfinite(phase.group_delay_dispersion));
            const Response found = response(stack, light);
            double energy = 0.0;
            for (const double part : stored_energy(standing_wave(stack, light))) energy += part;
            const double delays = found.reflectance * phase.group_delay +
                                  found.transmittance * phase.transmission_group_delay;
            EXPECT_LE(relative_error(delays, energy), 3e-12) << low << ", " << factor;
            worst.see(relative_error(delays, energy),
                      std::to_string(low) + ", " + std::to_string(factor));
        }
    }
    worst.print("delay law for 20,000 layers, relative");
}

TEST(LongStack, HasTheDispersionOfItsTopInTheStopBand) {
    // Light does not reach below some fifty pairs: a hundred times more must not cost digits.
    for (const double factor : {0.93, 1.01, 1.05}) {
        const Illumination light = normal_light(factor * wavelength_1064);
        const auto phase = [&](int layers) {
            return phase_response(without_dispersion(quarter_wave_stack(2.07, 1.45, layers, 1.45)),
                                  light);
        };
        const PhaseResponse top = phase(200), whole = phase(20000);
        EXPECT_LE(relative_error(whole.group_delay, top.group_delay), 1e-15);
        EXPECT_LE(relative_error(whole.group_delay_dispersion, top.group_delay_dispersion), 7e-15);
    }
}

TEST(LongStack, LetsLightTunnelThroughAThousandGaps) {
    // Guides between evanescent gaps: exp(Im δ) of all gaps is beyond any double, yet in a band of
    // guide thicknesses the light hops through.
    int transparent = 0;
    for (int step = 0; step < 40; ++step) {
        OpticalStack stack{1.5, {}, 1.5};
        for (int j = 0; j < 1000; ++j) {
            stack.layers.push_back({2.0, 20e-9 + step * 10e-9});
            stack.layers.push_back({1.0, 200e-9});
        }
        const double angle = core::pi / 3.0;
        const Illumination light{wavelength_1064, angle, Polarisation::s};
        const Response found = response(stack, light);
        EXPECT_NEAR(found.reflectance + found.transmittance, 1.0, 2e-12) << step;
        if (found.transmittance < 0.01) continue;
        ++transparent;
        const StandingWave wave = standing_wave(stack, light);
        EXPECT_NEAR(std::norm(wave.electric_substrate), found.transmittance, 3e-13);
        EXPECT_GT(peak_intensity(wave, 1998).intensity, 0.01);
    }
    EXPECT_GE(transparent, 3);
}

TEST(ThickMetal, TransmitsAsItsClosedFormInLogarithms) {
    // |t| = |t01 t12| exp(−Im δ)/|1 + r01 r12 e^{2iδ}|; T = n2/n0 |t|².
    WorstError worst;
    for (const Complex n : {Complex(0.2, 6.7), Complex(1.5, 12.0)}) {
        for (const double d : {20e-9, 300e-9, 3e-6, 10e-6, 1e-3}) {
            const Complex delta = 2.0 * core::pi / 800e-9 * n * d;
            const Complex r01 = (1.0 - n) / (1.0 + n), r12 = (n - 1.5) / (n + 1.5);
            const Complex trip = std::exp(2.0 * Complex(0.0, 1.0) * delta);
            const double expected = std::log(1.5 * std::norm((1.0 + r01) * (1.0 + r12))) -
                                    2.0 * delta.imag() -
                                    std::log(std::norm(1.0 + r01 * r12 * trip));
            const Response found = response({1.0, {{n, d}}, 1.5}, normal_light(800e-9));
            expect_finite(found);
            EXPECT_LE(std::abs(found.log_transmittance - expected),
                      1e-15 * std::abs(expected) + 5e-14);
            if (expected > -650.0) {
                EXPECT_LE(relative_error(found.transmittance, std::exp(expected)), 7e-14);
            } else {
                EXPECT_GE(found.transmittance, 0.0);
                EXPECT_LE(found.transmittance, 1e-280);
            }
            worst.see(relative_error(found.log_transmittance, expected), std::to_string(d));
        }
    }
    worst.print("ln T of metal from 20 nm to 1 mm, relative");
}

TEST(ThickMetal, AnywhereInTheStackLeavesEveryResultFinite) {
    for (const int at : {0, 7, 20}) {
        for (const double angle : {0.0, 1.2}) {
            for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
                OpticalStack stack = quarter_wave_stack(2.07, 1.45, 20, 1.45);
                stack.layers.insert(stack.layers.begin() + at, {Complex(1.5, 12.0), 10e-6});
                const Illumination light{wavelength_1064, angle, polarisation};
                const Response found = response(stack, light);
                expect_finite(found);
                EXPECT_NEAR(found.reflectance + found.absorptance, 1.0, 2e-15);
                EXPECT_GT(found.layer_absorptance[at], 0.0);
                EXPECT_LT(found.log_transmittance, -1400.0);
                const StandingWave wave = standing_wave(stack, light);
                for (std::size_t j = 0; j < wave.layers.size(); ++j) {
                    EXPECT_TRUE(std::isfinite(peak_intensity(wave, j).intensity));
                }
                const PhaseResponse phase = phase_response(without_dispersion(stack), light);
                EXPECT_TRUE(std::isfinite(phase.group_delay_dispersion));
                EXPECT_TRUE(std::isfinite(phase.transmission_group_delay));
            }
        }
    }
}

TEST(ThickMetal, BelowTheSurfaceAbsorbsWhatTheInterfaceLetsIn) {
    const Complex n(0.2, 6.7);
    const Response found = response({1.0, {{n, 1.0}}, 1.5}, normal_light());
    const double entering = 4.0 * n.real() / std::norm(1.0 + n);
    EXPECT_EQ(found.transmittance, 0.0);
    EXPECT_TRUE(std::isfinite(found.log_transmittance));
    EXPECT_LE(relative_error(found.absorptance, entering), 1e-15);
}

}  // namespace
}  // namespace stillcoat::optics
