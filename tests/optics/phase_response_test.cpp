#include <gtest/gtest.h>

#include <cmath>
#include <complex>

#include "optics/stacks.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/optics/standing_wave.hpp"
#include "support/worst_error.hpp"

namespace stillcoat::optics {
namespace {

using numerics::Jet;
using test::relative_error;
using test::WorstError;
using ComplexJet = Jet<Complex>;

double angular_frequency(const Illumination& light) {
    return 2.0 * core::pi * core::speed_of_light / light.wavelength;
}

TEST(PhaseResponse, PhaseIsTheArgumentOfR) {
    const std::uint32_t seed = 61;
    RandomStacks random(seed);
    for (int trial = 0; trial < 200; ++trial) {
        const OpticalStack stack = random.stack(0.1, false);
        const Illumination light = random.light();
        const Complex r = response(stack, light).reflection;
        const PhaseResponse phase = phase_response(without_dispersion(stack), light);
        EXPECT_NEAR(std::remainder(phase.reflection_phase - std::arg(r), 2.0 * core::pi), 0.0,
                    3e-15 / std::abs(r))
            << "seed " << seed << ", trial " << trial;
        EXPECT_GT(phase.reflection_phase, -core::pi);
        EXPECT_LE(phase.reflection_phase, core::pi);
    }
    const PhaseResponse glass = phase_response(without_dispersion({1.0, {}, 1.5}), normal_light());
    EXPECT_EQ(glass.reflection_phase, core::pi);
    EXPECT_EQ(glass.group_delay, 0.0);
    EXPECT_EQ(glass.group_delay_dispersion, 0.0);
}

TEST(PhaseResponse, PhaseIsNeverMinusPi) {
    // r of these stacks is a negative real number with either sign of zero beside it.
    for (const double high : {2.0, 3.0}) {
        for (const double low : {1.0, 1.45, 2.0}) {
            for (const int layers : {1, 2, 3}) {
                const auto stack = quarter_wave_stack(high, low, layers, low);
                const auto phase = phase_response(without_dispersion(stack), normal_light());
                EXPECT_GT(phase.reflection_phase, -core::pi)
                    << high << ", " << low << ", " << layers;
            }
        }
    }
}

TEST(PhaseResponse, DelayGrowsByTheTransitOfAMatchedFilm) {
    // A film of the incident medium before a metal adds 2 n0 d cosθ/c, and n0 d cosθ/c in
    // transmission.
    const double n0 = 1.3, d = 5e-6;
    for (const double angle : {0.0, 0.5, 1.2}) {
        for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
            const Illumination light{wavelength_1064, angle, polarisation};
            const auto bare =
                phase_response(without_dispersion({n0, {}, Complex(0.2, 6.7)}), light);
            const auto film =
                phase_response(without_dispersion({n0, {{n0, d}}, Complex(0.2, 6.7)}), light);
            const double transit = n0 * d * std::cos(angle) / core::speed_of_light;
            EXPECT_NEAR(film.group_delay, bare.group_delay + 2.0 * transit, 3e-15 * transit);
            EXPECT_NEAR(film.transmission_group_delay, bare.transmission_group_delay + transit,
                        2e-15 * transit);
            EXPECT_NEAR(film.group_delay_dispersion, 0.0, 9e-15 * transit * transit);
        }
    }
}

TEST(PhaseResponse, DelayIsThatOfTheGiresTournoisFilm) {
    // A film before a perfect mirror: τ = T0 (1 − ρ²)/(1 + ρ² + 2ρ cos φ) … differentiated once
    // more for the dispersion. F. Gires & P. Tournois, C. R. Acad. Sci. 258, 6112 (1964). An index
    // of 1e6 is the mirror; r = (ρ − e^{iφ})/(1 − ρ e^{iφ}), φ = 2 n ω d/c.
    const double n = 1.8, d = 3e-6, rho = (1.0 - n) / (1.0 + n);
    for (const double wavelength : {1000e-9, 1031e-9, 1064e-9}) {
        const Illumination light = normal_light(wavelength);
        const double trip = 2.0 * n * d / core::speed_of_light;
        const double phi = trip * angular_frequency(light);
        const double denominator = 1.0 + rho * rho - 2.0 * rho * std::cos(phi);
        const double delay = trip * (1.0 - rho * rho) / denominator;
        const double dispersion = -trip * delay * 2.0 * rho * std::sin(phi) / denominator;
        const auto found = phase_response(without_dispersion({1.0, {{n, d}}, 1e6}), light);
        EXPECT_LE(relative_error(found.group_delay, delay), 1e-5);  // 1e6 is not infinity
        EXPECT_NEAR(found.group_delay_dispersion, dispersion, 1e-5 * delay * delay);
    }
}

TEST(PhaseResponse, AMirrorDelays) {
    for (const int layers : {4, 10, 41}) {
        const auto stack = quarter_wave_stack(2.07, 1.45, layers, 1.45);
        EXPECT_GT(phase_response(without_dispersion(stack), normal_light()).group_delay, 0.0);
    }
}

TEST(PhaseResponse, NothingDependsOnFrequencyWhenAllIndicesAreInverseToIt) {
    // n ∝ 1/ω everywhere: no phase thickness and no ratio of indices changes.
    const std::uint32_t seed = 62;
    RandomStacks random(seed);
    for (int trial = 0; trial < 100; ++trial) {
        const OpticalStack stack = random.stack(0.1, false);
        const Illumination light = random.light();
        const double omega = angular_frequency(light);
        const auto inverse = [omega](auto n) {
            return Jet<decltype(n)>{n, -n / omega, 2.0 * n / (omega * omega)};
        };
        DispersiveStack dispersive = without_dispersion(stack);
        dispersive.incident_index = inverse(stack.incident_index);
        dispersive.substrate_index = inverse(stack.substrate_index);
        for (ComplexJet& index : dispersive.layer_index) index = inverse(index.value);
        const PhaseResponse found = phase_response(dispersive, light);
        const PhaseResponse constant = phase_response(without_dispersion(stack), light);
        const double scale = std::abs(constant.group_delay) + 1.0 / omega;
        const double r = std::abs(response(stack, light).reflection);
        EXPECT_NEAR(found.group_delay, 0.0, 2e-15 * scale / r)
            << "seed " << seed << ", trial " << trial;
        EXPECT_NEAR(found.transmission_group_delay, 0.0, 1e-14 * scale);
        EXPECT_NEAR(found.group_delay_dispersion, 0.0, 2e-15 * scale * scale / (r * r));
    }
}

TEST(PhaseResponse, ADispersiveMetalFollowsItsClosedForm) {
    // ln r = ln(n0 − n) − ln(n0 + n).
    const double omega = angular_frequency(normal_light());
    const double n0 = 1.1;
    const Complex n(0.4, 5.0), n1 = Complex(-0.7, 2.0) / omega,
                               n2 = Complex(3.0, -4.0) / (omega * omega);
    DispersiveStack stack = without_dispersion({n0, {}, n});
    stack.substrate_index = {n, n1, n2};
    const PhaseResponse found = phase_response(stack, normal_light());
    const Complex a = 1.0 / (n0 - n), b = 1.0 / (n0 + n);
    const double delay = std::imag(-(a + b) * n1);
    const double dispersion = std::imag(-(a * a - b * b) * n1 * n1 - (a + b) * n2);
    EXPECT_LE(relative_error(found.group_delay, delay), 1e-15);
    EXPECT_LE(relative_error(found.group_delay_dispersion, dispersion), 1e-15);
}

/// Indices as quadratic functions of ω.
struct QuadraticIndices {
    DispersiveStack stack;
    double omega;
    OpticalStack at(double frequency) const {
        const double x = frequency - omega;
        const auto value = [x](const auto& n) {
            return n.value + x * (n.first + 0.5 * x * n.second);
        };
        OpticalStack plain{value(stack.incident_index), {}, value(stack.substrate_index)};
        for (std::size_t j = 0; j < stack.thickness.size(); ++j) {
            plain.layers.push_back({value(stack.layer_index[j]), stack.thickness[j]});
        }
        return plain;
    }
};

QuadraticIndices random_dispersion(RandomStacks& random, double omega) {
    OpticalStack plain = random.stack(0.0, true);
    for (OpticalLayer& layer : plain.layers) layer.index += Complex(0.0, random.between(0.01, 0.1));
    plain.substrate_index += Complex(0.0, random.between(0.05, 0.5));
    QuadraticIndices indices{without_dispersion(plain), omega};
    const auto slopes = [&](ComplexJet& n) {
        n.first = Complex(random.between(-0.3, 0.5), random.between(-0.02, 0.02)) / omega;
        n.second =
            Complex(random.between(-0.5, 0.5), random.between(-0.05, 0.05)) / (omega * omega);
    };
    for (ComplexJet& n : indices.stack.layer_index) slopes(n);
    slopes(indices.stack.substrate_index);
    indices.stack.incident_index.first = random.between(0.0, 0.2) / omega;
    indices.stack.incident_index.second = random.between(-0.2, 0.2) / (omega * omega);
    return indices;
}

/// ω d arg r/dω, ω² d² arg r/dω² and ω d arg t/dω.
struct Slopes {
    double reflected, dispersion, transmitted;
};

Slopes by_differences(const QuadraticIndices& indices, const Illumination& light) {
    // Sixth order; arguments are taken relative to the centre, so that they never wrap.
    const double step = 2e-4;
    const double first[] = {0.75, -0.15, 1.0 / 60.0}, second[] = {1.5, -0.15, 1.0 / 90.0};
    const StandingWave centre = standing_wave(indices.at(indices.omega), light);
    const auto moved = [&](int m) {
        const double frequency = indices.omega * (1.0 + m * step);
        return standing_wave(
            indices.at(frequency),
            {2.0 * core::pi * core::speed_of_light / frequency, light.angle, light.polarisation});
    };
    Slopes sum{0.0, 0.0, 0.0};
    for (int m = 1; m <= 3; ++m) {
        for (const int sign : {1, -1}) {
            const StandingWave wave = moved(sign * m);
            const double reflected = std::arg(wave.reflection / centre.reflection);
            const double transmitted =
                std::arg(wave.electric_substrate / centre.electric_substrate);
            sum.reflected += sign * first[m - 1] * reflected / step;
            sum.transmitted += sign * first[m - 1] * transmitted / step;
            sum.dispersion += second[m - 1] * reflected / (step * step);
        }
    }
    return sum;
}

Slopes by_series(const QuadraticIndices& indices, const Illumination& light) {
    const PhaseResponse found = phase_response(indices.stack, light);
    const double omega = indices.omega;
    return {found.group_delay * omega, found.group_delay_dispersion * omega * omega,
            found.transmission_group_delay * omega};
}

TEST(PhaseResponse, IsTheDerivativeOfResponseWithDispersionAndAbsorption) {
    RandomStacks random(63);
    WorstError worst_delay, worst_dispersion;
    for (int trial = 0; trial < 60; ++trial) {
        const Illumination light = random.light();
        const QuadraticIndices indices = random_dispersion(random, angular_frequency(light));
        if (std::abs(response(indices.at(indices.omega), light).reflection) < 0.05) continue;
        const Slopes expected = by_differences(indices, light), found = by_series(indices, light);
        const double scale = 1.0 + std::abs(expected.reflected);
        const double delay_error = std::max(std::abs(found.reflected - expected.reflected),
                                            std::abs(found.transmitted - expected.transmitted));
        const double dispersion_error = std::abs(found.dispersion - expected.dispersion);
        EXPECT_LE(delay_error, 3e-10 * scale) << "trial " << trial;
        EXPECT_LE(dispersion_error, 1e-6 * scale * scale) << "trial " << trial;
        worst_delay.see(delay_error / scale, std::to_string(trial));
        worst_dispersion.see(dispersion_error / (scale * scale), std::to_string(trial));
    }
    worst_delay.print("dispersive delay against differences, relative");
    worst_dispersion.print("dispersive second derivative against differences, relative");
}

TEST(PhaseResponse, IsExactInADispersiveLayerAtOrNearItsCriticalAngle) {
    // δ² vanishes there, but its derivative does not: only the power series of sinc helps.
    const double n0 = 2.0, angle = core::pi / 6.0;
    for (const double offset : {0.0, 1e-12, -1e-12, 1e-9, 1e-5}) {
        for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
            const Illumination light{wavelength_1064, angle, polarisation};
            const double omega = angular_frequency(light);
            const double critical = n0 * std::sin(angle);
            QuadraticIndices indices{
                without_dispersion({n0, {{1.7, 2e-7}, {critical * (1.0 + offset), 6e-7}}, 1.7}),
                omega};
            indices.stack.layer_index[1].first = 0.3 / omega;
            indices.stack.layer_index[1].second = 0.2 / (omega * omega);
            const Slopes expected = by_differences(indices, light),
                         found = by_series(indices, light);
            EXPECT_NEAR(found.reflected, expected.reflected, 2e-11) << offset;
            EXPECT_NEAR(found.transmitted, expected.transmitted, 2e-11) << offset;
            EXPECT_NEAR(found.dispersion, expected.dispersion, 1e-6) << offset;
        }
    }
}

TEST(PhaseResponse, ThinAndThickSeriesOfTheLayerAgree) {
    // A layer with |δ| > 1 cut into pieces with |δ| < 1 takes the other branch of cos and sinc.
    for (const Complex n : {Complex(1.9), Complex(1.9, 0.2), Complex(0.3, 3.0)}) {
        OpticalStack whole{1.0, {{n, 400e-9}}, 1.5}, cut{1.0, {}, 1.5};
        for (int piece = 0; piece < 32; ++piece) cut.layers.push_back({n, 400e-9 / 32.0});
        for (const double angle : {0.0, 0.9}) {
            const Illumination light{wavelength_1064, angle, Polarisation::p};
            const auto dispersive = [&](const OpticalStack& stack) {
                DispersiveStack moving = without_dispersion(stack);
                const double omega = angular_frequency(light);
                for (ComplexJet& index : moving.layer_index) {
                    index.first = Complex(0.2, 0.01) / omega;
                    index.second = Complex(-0.3, 0.02) / (omega * omega);
                }
                return phase_response(moving, light);
            };
            const PhaseResponse one = dispersive(whole), many = dispersive(cut);
            // One radian of light is the scale: metals have hardly any delay of their own.
            const double radian = 1.0 / angular_frequency(light);
            EXPECT_NEAR(many.group_delay, one.group_delay, 2e-14 * radian);
            EXPECT_NEAR(many.group_delay_dispersion, one.group_delay_dispersion,
                        2e-13 * radian * radian);
            EXPECT_NEAR(many.transmission_group_delay, one.transmission_group_delay,
                        7e-15 * radian);
        }
    }
}

TEST(PhaseResponse, IsFiniteWithALayerOrTheSubstrateAtTheCriticalAngle) {
    const double n0 = 2.0, angle = core::pi / 6.0, critical = n0 * std::sin(angle);
    for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
        const Illumination light{wavelength_1064, angle, polarisation};
        const auto at = phase_response(without_dispersion({n0, {{critical, 2e-6}}, 1.7}), light);
        const auto near =
            phase_response(without_dispersion({n0, {{critical * (1.0 + 1e-9), 2e-6}}, 1.7}), light);
        EXPECT_LE(relative_error(at.group_delay, near.group_delay), 1e-6);
        const auto substrate =
            phase_response(without_dispersion({n0, {{1.5, 3e-7}}, critical}), light);
        EXPECT_TRUE(std::isfinite(substrate.group_delay));
        EXPECT_TRUE(std::isfinite(substrate.transmission_group_delay));
    }
}

TEST(PhaseResponse, IsUndefinedWithoutReflectedLight) {
    const double n = std::sqrt(1.45);  // an antireflection film: r is a few rounding errors
    const OpticalStack film{1.0, {{n, wavelength_1064 / (4.0 * n)}}, 1.45};
    EXPECT_TRUE(std::isnan(phase_response(without_dispersion(film), normal_light()).group_delay));
    const auto found =
        phase_response(without_dispersion({1.45, {{1.45, 1e-7}}, 1.45}), normal_light());
    EXPECT_TRUE(std::isnan(found.reflection_phase));
    EXPECT_TRUE(std::isnan(found.group_delay));
    EXPECT_TRUE(std::isnan(found.group_delay_dispersion));
    EXPECT_TRUE(std::isnan(found.transmission_group_delay));
}

}  // namespace
}  // namespace stillcoat::optics
