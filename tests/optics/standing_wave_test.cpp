#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <stdexcept>

#include "optics/stacks.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/core/errors.hpp"
#include "stillcoat/optics/standing_wave.hpp"
#include "support/worst_error.hpp"

namespace stillcoat::optics {
namespace {

using test::relative_error;

double total(const std::vector<double>& parts) {
    double sum = 0.0;
    for (const double part : parts) sum += part;
    return sum;
}

TEST(StandingWave, HasANodeAtTheSurfaceWhenTheHighIndexIsOutermost) {
    // E = 1 + r = 2 n0/(n0 + Y), Y = (n_H/n_L)^layers n_s.
    const StandingWave wave =
        standing_wave(quarter_wave_stack(n_high, n_low, 40, n_low), normal_light());
    const double admittance = std::pow(n_high / n_low, 40) * n_low;
    EXPECT_LE(relative_error(face_intensity(wave), std::pow(2.0 / (1.0 + admittance), 2)), 1e-14);
    const StandingWave deep = standing_wave(many_quarter_waves(true), normal_light());
    for (int pair = 0; pair < 10; ++pair) {
        const double peak = 4.0 / (n_high * n_high) * std::pow(index_ratio, 2 * pair);
        const OpticalLayer& layer = deep.stack.layers[2 * pair];
        EXPECT_LE(relative_error(relative_intensity(deep, 2 * pair, layer.thickness), peak), 2e-14);
        const Peak found = peak_intensity(deep, 2 * pair);
        EXPECT_LE(relative_error(found.intensity, peak), 2e-14);
        EXPECT_NEAR(found.depth / layer.thickness, 1.0, 1e-7);
        EXPECT_LE(
            relative_error(relative_intensity(deep, 2 * pair, layer.thickness / 3.0), peak / 4.0),
            6e-15)
            << "sin² arc";
    }
}

TEST(StandingWave, HasAnAntinodeAtTheSurfaceWhenTheLowIndexIsOutermost) {
    const StandingWave wave = standing_wave(many_quarter_waves(false), normal_light());
    EXPECT_NEAR(face_intensity(wave), 4.0, 4e-15);
    for (int pair = 0; pair < 10; ++pair) {
        const double peak = 4.0 * std::pow(index_ratio, 2 * pair);
        EXPECT_LE(relative_error(relative_intensity(wave, 2 * pair, 0.0), peak), 2e-14);
        EXPECT_LE(relative_error(peak_intensity(wave, 2 * pair).intensity, peak), 2e-14);
        EXPECT_NEAR(peak_intensity(wave, 2 * pair).depth, 0.0, 1e-15);
    }
}

TEST(StandingWave, LosesPowerToFirstOrderAsTheClosedFormSays) {
    const double k_high = 3e-9, k_low = 7e-10;
    for (const bool high_first : {true, false}) {
        OpticalStack stack = many_quarter_waves(high_first);
        for (OpticalLayer& layer : stack.layers) {
            layer.index += Complex(0.0, layer.index.real() == n_high ? k_high : k_low);
        }
        const double difference = n_high * n_high - n_low * n_low;
        const double expected =
            high_first
                ? 2.0 * core::pi * (k_high + k_low) / difference
                : 2.0 * core::pi * (n_high * n_high * k_low + n_low * n_low * k_high) / difference;
        // The next order is smaller by another factor A.
        EXPECT_LE(relative_error(response(stack, normal_light()).absorptance, expected), 1e-7);
    }
}

TEST(StandingWave, StoresWhatDelaysTheReflectedPulse) {
    for (const double n0 : {1.0, 1.2}) {
        for (const bool high_first : {true, false}) {
            const OpticalStack stack = many_quarter_waves(high_first, n0);
            const double depth =
                high_first ? wavelength_1064 / (4.0 * (n_high - n_low))
                           : wavelength_1064 * n_high * n_low / (4.0 * n0 * n0 * (n_high - n_low));
            const double delay =
                phase_response(without_dispersion(stack), normal_light()).group_delay;
            EXPECT_LE(relative_error(core::speed_of_light * delay / (2.0 * n0), depth), 2e-15);
            EXPECT_LE(relative_error(energy_penetration_depth(standing_wave(stack, normal_light())),
                                     depth),
                      5e-15);
        }
    }
}

TEST(StandingWave, HoldsTheIncidentFieldInAMatchedLayer) {
    // No reflection: |E|² = 1 throughout, and W/P is the transit time n d/c.
    const double n = 1.3, d = 700e-9;
    const StandingWave wave = standing_wave({n, {{n, d}}, n}, normal_light());
    for (const double part : {0.0, 0.3, 1.0})
        EXPECT_NEAR(relative_intensity(wave, 0, part * d), 1.0, 1e-15);
    EXPECT_NEAR(peak_intensity(wave, 0).intensity, 1.0, 1e-15);
    EXPECT_LE(relative_error(total(stored_energy(wave)), n * d / core::speed_of_light), 1e-15);
    EXPECT_NEAR(std::abs(wave.electric_substrate), 1.0, 1e-15);
    for (const double angle : {0.3, 1.2}) {
        for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
            const StandingWave oblique =
                standing_wave({n, {{n, d}}, n}, {wavelength_1064, angle, polarisation});
            EXPECT_NEAR(relative_intensity(oblique, 0, d / 2.0), 1.0, 2e-15);
            EXPECT_NEAR(face_intensity(oblique), 1.0, 1e-15);
            EXPECT_LE(relative_error(total(stored_energy(oblique)),
                                     n * d / (core::speed_of_light * std::cos(angle))),
                      1e-15);
        }
    }
}

TEST(StandingWave, IsContinuousAcrossEveryInterface) {
    const std::uint32_t seed = 31;
    RandomStacks random(seed);
    for (int trial = 0; trial < 300; ++trial) {
        OpticalStack stack = random.stack(0.5, false);
        stack.layers.push_back({random.index(0.5), 300e-9});
        const Illumination light = random.light();
        const StandingWave wave = standing_wave(stack, light);
        const Response found = response(stack, light);
        EXPECT_LE(std::abs(wave.reflection - found.reflection), 1e-15);
        EXPECT_LE(std::abs(wave.electric_face - (1.0 + wave.reflection)), 1e-15);
        for (std::size_t j = 0; j < wave.layers.size(); ++j) {
            const LayerField& field = wave.layers[j];
            const Complex below = j + 1 < wave.layers.size() ? wave.layers[j + 1].electric_top
                                                             : wave.electric_substrate;
            EXPECT_LE(std::abs(field.electric_bottom - below), 1e-15 * std::abs(below));
            // Forward and backward part meet the tangential field at both faces.
            const Complex phase = std::exp(Complex(0.0, 1.0) * field.wavenumber * field.thickness);
            const double scale = std::abs(field.forward) + std::abs(field.backward);
            EXPECT_LE(std::abs(field.forward + field.backward * phase - field.electric_top),
                      5e-15 * scale)
                << "seed " << seed << ", trial " << trial;
            EXPECT_LE(std::abs(field.forward * phase + field.backward - field.electric_bottom),
                      2e-14 * scale);
        }
        if (light.polarisation == Polarisation::s) {
            EXPECT_NEAR(relative_intensity(wave, 0, 0.0), face_intensity(wave), 3e-15);
        }
    }
}

TEST(StandingWave, HasTheDisplacementOfPLightContinuousAtTheFace) {
    // ε E_z is continuous: |E_z|² jumps by |n0/n|⁴.
    const double n0 = 1.2, angle = 0.8;
    const Complex n(2.0, 0.1);
    const Illumination light{wavelength_1064, angle, Polarisation::p};
    const StandingWave wave = standing_wave({n0, {{n, 400e-9}}, 1.5}, light);
    const double tangential = std::pow(std::cos(angle), 2) * std::norm(wave.electric_face);
    const double outside = face_intensity(wave) - tangential;
    const double inside = relative_intensity(wave, 0, 0.0) - tangential;
    EXPECT_GT(inside, 0.0);
    EXPECT_LE(relative_error(inside, outside * std::pow(n0 / std::abs(n), 4)), 2e-15);
}

TEST(StandingWave, PeakIsTheLargestOfADenseSearch) {
    const std::uint32_t seed = 32;
    RandomStacks random(seed);
    for (int trial = 0; trial < 100; ++trial) {
        OpticalStack stack = random.stack(1.0, false);
        stack.layers.push_back({random.index(1.0), random.between(0.0, 8e-6)});
        const Illumination light = random.light();
        const StandingWave wave = standing_wave(stack, light);
        const std::size_t j = wave.layers.size() - 1;
        const double d = wave.layers[j].thickness;
        double largest = 0.0;
        for (int step = 0; step <= 4000; ++step) {
            largest =
                std::max(largest, relative_intensity(wave, j, std::min(d, d * step / 4000.0)));
        }
        const Peak peak = peak_intensity(wave, j);
        EXPECT_GE(peak.intensity, largest * (1.0 - 1e-12))
            << "seed " << seed << ", trial " << trial;
        EXPECT_LE(peak.intensity, largest * (1.0 + 1e-3));
        EXPECT_DOUBLE_EQ(peak.intensity, relative_intensity(wave, j, peak.depth));
    }
}

TEST(StandingWave, PeakIsFoundAtTheFarEndWhenTheLightComesFromThere) {
    // No incident wave does this to a thick absorbing layer; a field put together by hand does.
    const Complex n(1.5, 0.02);
    StandingWave wave = standing_wave({1.0, {{n, 5e-6}}, 1.5}, normal_light());
    wave.layers[0].forward = 0.05;
    wave.layers[0].backward = 1.0;
    const double d = wave.layers[0].thickness;
    double largest = 0.0;
    for (int step = 0; step <= 20000; ++step) {
        largest = std::max(largest, relative_intensity(wave, 0, std::min(d, d * step / 20000.0)));
    }
    const Peak peak = peak_intensity(wave, 0);
    EXPECT_GE(peak.intensity, largest * (1.0 - 1e-12));
    EXPECT_GT(peak.depth, 4e-6);
}

TEST(StandingWave, FallsBehindTheFaceOfTotalReflectionAsItsPenetrationDepth) {
    // |E|² ∝ exp(−2z/δ), δ = λ/(2π sqrt(n0² sin²θ − n1²)).
    const double n0 = 1.5, angle = 1.0;
    const double depth =
        wavelength_1064 / (2.0 * core::pi * std::sqrt(std::pow(n0 * std::sin(angle), 2) - 1.0));
    for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
        const StandingWave wave =
            standing_wave({n0, {{1.0, 3e-6}}, 1.0}, {wavelength_1064, angle, polarisation});
        const double start = relative_intensity(wave, 0, 0.0);
        for (const double z : {0.1e-6, 1e-6, 3e-6}) {
            EXPECT_LE(
                relative_error(relative_intensity(wave, 0, z) / start, std::exp(-2.0 * z / depth)),
                6e-15);
        }
        EXPECT_EQ(peak_intensity(wave, 0).depth, 0.0);
    }
}

TEST(StoredEnergy, IsTheQuadratureOfTheEnergyDensity) {
    // s light: H_x from the slope of E, H_z = β E.
    const std::uint32_t seed = 33;
    RandomStacks random(seed);
    for (int trial = 0; trial < 30; ++trial) {
        OpticalStack stack = random.stack(0.3, true);
        stack.layers.push_back({random.index(0.3), random.between(1e-9, 2e-6)});
        const Illumination light{wavelength_1064, random.between(0.0, 1.4), Polarisation::s};
        const StandingWave wave = standing_wave(stack, light);
        const LayerField& field = wave.layers.back();
        const Complex n = stack.layers.back().index;
        const double k0 = 2.0 * core::pi / light.wavelength;
        const double beta = stack.incident_index * std::sin(light.angle);
        const auto density = [&](double z) {
            const Complex i(0.0, 1.0);
            const Complex down = field.forward * std::exp(i * field.wavenumber * z);
            const Complex up =
                field.backward * std::exp(i * field.wavenumber * (field.thickness - z));
            const Complex h = field.wavenumber / k0 * (down - up);
            return std::real(n * n) * std::norm(down + up) + std::norm(h) +
                   beta * beta * std::norm(down + up);
        };
        const double integral = quadrature(density, field.thickness);
        const double expected =
            integral / (2.0 * stack.incident_index * std::cos(light.angle) * core::speed_of_light);
        EXPECT_LE(relative_error(stored_energy(wave).back(), expected), 3e-15) << "seed " << seed;
    }
}

TEST(StandingWave, RefusesADepthOutsideTheLayer) {
    const StandingWave wave = standing_wave({1.0, {{2.0, 1e-7}}, 1.5}, normal_light());
    EXPECT_THROW(relative_intensity(wave, 0, -1e-9), core::DomainError);
    EXPECT_THROW(relative_intensity(wave, 0, 1.1e-7), core::DomainError);
    EXPECT_THROW(relative_intensity(wave, 0, std::nan("")), core::DomainError);
    EXPECT_THROW(relative_intensity(wave, 1, 0.0), std::logic_error);
    EXPECT_THROW(peak_intensity(wave, 1), std::logic_error);
}

}  // namespace
}  // namespace stillcoat::optics
