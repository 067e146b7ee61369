#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <iostream>

#include "optics/stacks.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/optics/standing_wave.hpp"
#include "support/worst_error.hpp"

namespace stillcoat::optics {
namespace {

using test::relative_error;
using test::WorstError;

TEST(EnergyBalance, ReflectanceTransmittanceAndAbsorptanceAddUpToOne) {
    const std::uint32_t seed = 20240601;
    RandomStacks random(seed);
    WorstError worst;
    for (int trial = 0; trial < 2000; ++trial) {
        const OpticalStack stack = random.stack(trial % 2 == 0 ? 1e-2 : 5.0, trial % 3 != 0);
        const Response found = response(stack, random.light());
        const double error =
            std::abs(found.reflectance + found.transmittance + found.absorptance - 1.0);
        EXPECT_LE(error, 8e-15) << "seed " << seed << ", trial " << trial;
        worst.see(error, "seed " + std::to_string(seed) + ", trial " + std::to_string(trial));
        EXPECT_EQ(found.loss, found.transmittance + found.absorptance);
        for (const double absorbed : found.layer_absorptance) EXPECT_GE(absorbed, 0.0);
    }
    worst.print("R + T + A = 1, absolute");
}

/// The same stack seen from the other side, at the same transverse wavenumber.
OpticalStack reversed(const OpticalStack& stack) {
    OpticalStack other{stack.substrate_index.real(), stack.layers, stack.incident_index};
    std::reverse(other.layers.begin(), other.layers.end());
    return other;
}

TEST(Reciprocity, TransmittanceIsTheSameFromBothSides) {
    const std::uint32_t seed = 4711;
    RandomStacks random(seed);
    WorstError worst;
    int compared = 0;
    for (int trial = 0; trial < 1000; ++trial) {
        const OpticalStack stack = random.stack(trial % 2 == 0 ? 0.0 : 0.5, true);
        const Illumination light = random.light();
        const OpticalStack other = reversed(stack);
        const double sine = stack.incident_index * std::sin(light.angle) / other.incident_index;
        if (sine > 0.99) continue;  // nothing is transmitted, or the angle is not known well enough
        const Response forward = response(stack, light);
        const Response backward =
            response(other, {light.wavelength, std::asin(sine), light.polarisation});
        const double error = std::abs(forward.log_transmittance - backward.log_transmittance);
        EXPECT_LE(error, 8e-14) << "seed " << seed << ", trial " << trial;
        worst.see(error, "seed " + std::to_string(seed) + ", trial " + std::to_string(trial));
        ++compared;
    }
    EXPECT_GE(compared, 500);
    worst.print("reciprocity of T, relative");
}

TEST(Splitting, ALayerInPiecesChangesNothing) {
    const std::uint32_t seed = 815;
    RandomStacks random(seed);
    WorstError worst;
    for (int trial = 0; trial < 300; ++trial) {
        OpticalStack whole = random.stack(1.0, true);
        whole.layers.push_back({random.index(1.0), 300e-9});
        const std::size_t at = random.count_between(0, static_cast<int>(whole.layers.size()) - 1);
        const OpticalLayer layer = whole.layers[at];
        const double cut = random.between(0.0, 1.0);
        OpticalStack split = whole;
        split.layers[at].thickness = cut * layer.thickness;
        split.layers.insert(split.layers.begin() + at + 1,
                            {layer.index, (1.0 - cut) * layer.thickness});
        const Illumination light = random.light();
        const Response one = response(whole, light), two = response(split, light);
        EXPECT_LE(std::abs(one.reflection - two.reflection), 6e-15)
            << "seed " << seed << ", trial " << trial;
        if (one.transmittance > 0.0) {
            EXPECT_NEAR(one.log_transmittance, two.log_transmittance, 7e-15);
        }
        const double pieces = two.layer_absorptance[at] + two.layer_absorptance[at + 1];
        EXPECT_NEAR(pieces, one.layer_absorptance[at], 9e-15 * one.layer_absorptance[at])
            << "trial " << trial;
        const auto energy = stored_energy(standing_wave(whole, light));
        const auto split_energy = stored_energy(standing_wave(split, light));
        EXPECT_NEAR(split_energy[at] + split_energy[at + 1], energy[at],
                    1e-14 * (std::abs(split_energy[at]) + std::abs(split_energy[at + 1])));
        worst.see(std::abs(one.reflection - two.reflection), "trial " + std::to_string(trial));
    }
    worst.print("splitting, r, absolute");
}

TEST(Scaling, WavelengthAndThicknessesByOneFactorChangeNothing) {
    const std::uint32_t seed = 99;
    RandomStacks random(seed);
    for (int trial = 0; trial < 300; ++trial) {
        const OpticalStack stack = random.stack(0.1, false);
        const Illumination light = random.light();
        const Response expected = response(stack, light);
        for (const double factor : {2.0, 0.125, 3.7}) {
            OpticalStack scaled = stack;
            for (OpticalLayer& layer : scaled.layers) layer.thickness *= factor;
            const Response found =
                response(scaled, {factor * light.wavelength, light.angle, light.polarisation});
            EXPECT_LE(std::abs(found.reflection - expected.reflection), 1e-13) << "seed " << seed;
            EXPECT_NEAR(found.log_transmittance, expected.log_transmittance, 7e-14);
            EXPECT_NEAR(found.absorptance, expected.absorptance, 3e-14);
        }
    }
}

TEST(Scaling, AllIndicesByOneFactorAndThicknessesByItsInverseChangeNothing) {
    const std::uint32_t seed = 100;
    RandomStacks random(seed);
    for (int trial = 0; trial < 300; ++trial) {
        const OpticalStack stack = random.stack(0.1, false);
        const Illumination light = random.light();
        OpticalStack scaled = stack;
        scaled.incident_index *= 1.7;
        scaled.substrate_index *= 1.7;
        for (OpticalLayer& layer : scaled.layers)
            layer = {1.7 * layer.index, layer.thickness / 1.7};
        const Response expected = response(stack, light), found = response(scaled, light);
        EXPECT_LE(std::abs(found.reflection - expected.reflection), 4e-14) << "seed " << seed;
        EXPECT_NEAR(found.log_transmittance, expected.log_transmittance, 2e-13);
        EXPECT_NEAR(found.absorptance, expected.absorptance, 9e-15);
    }
}

double total(const std::vector<double>& parts) {
    double sum = 0.0;
    for (const double part : parts) sum += part;
    return sum;
}

TEST(DelayLaw, DelaysWeightedWithPowerEqualTheStoredEnergyPerPower) {
    // R τ_r + T τ_t = W/P without loss and dispersion, at normal incidence.
    const std::uint32_t seed = 7;
    RandomStacks random(seed);
    WorstError worst;
    for (int trial = 0; trial < 500; ++trial) {
        const OpticalStack stack = random.stack(0.0, true);
        if (stack.layers.empty()) continue;
        const Illumination light{random.between(400e-9, 2e-6), 0.0, Polarisation::s};
        const PhaseResponse phase = phase_response(without_dispersion(stack), light);
        const Response found = response(stack, light);
        const double delays = found.reflectance * phase.group_delay +
                              found.transmittance * phase.transmission_group_delay;
        const double error =
            relative_error(delays, total(stored_energy(standing_wave(stack, light))));
        EXPECT_LE(error, 5e-15) << "seed " << seed << ", trial " << trial;
        worst.see(error, "trial " + std::to_string(trial));
    }
    worst.print("R τ_r + T τ_t = W/P at normal incidence, relative");
}

struct Delays {
    double reflected, transmitted;
};

/// Delays at fixed transverse wavenumber k0 β, without differences: an incident index ∝ 1/ω makes
/// β ∝ 1/ω at fixed angle. Only the incident admittance then varies otherwise than it should, and
/// ∂ln r/∂η0 = (1 − r²)/(2 η0 r), ∂ln t/∂η0 = (1 − r)/(2 η0) put that right.
Delays at_fixed_transverse_wavenumber(const OpticalStack& stack, const Illumination& light) {
    const double omega = 2.0 * core::pi * core::speed_of_light / light.wavelength;
    const double n0 = stack.incident_index, sine = std::sin(light.angle),
                 cosine = std::cos(light.angle);
    DispersiveStack moving = without_dispersion(stack);
    moving.incident_index = {n0, -n0 / omega, 2.0 * n0 / (omega * omega)};
    const PhaseResponse phase = phase_response(moving, light);
    const bool s = light.polarisation == Polarisation::s;
    const double eta0 = s ? n0 * cosine : n0 / cosine;
    const double true_slope =
        (s ? n0 * sine * sine / cosine : -n0 * sine * sine / std::pow(cosine, 3)) / omega;
    const double correction = true_slope + eta0 / omega;
    const Complex r = response(stack, light).reflection;
    return {phase.group_delay + correction * std::imag((1.0 - r * r) / (2.0 * eta0 * r)),
            phase.transmission_group_delay + correction * std::imag((1.0 - r) / (2.0 * eta0))};
}

TEST(DelayLaw, HoldsObliquelyAtFixedTransverseWavenumber) {
    // R τ_r + T τ_t = W/P ∓ tan²θ0 Im(r)/ω, − for s light, + for p light.
    const std::uint32_t seed = 8;
    RandomStacks random(seed);
    WorstError worst;
    for (int trial = 0; trial < 300; ++trial) {
        OpticalStack stack = random.stack(0.0, true);
        stack.layers.push_back({1.9, 200e-9});
        Illumination light = random.light();
        light.angle = random.between(0.1, 0.75);  // everywhere below the critical angle
        stack.incident_index = random.between(1.0, 1.5);
        stack.substrate_index = random.between(1.5, 3.0);
        const double omega = 2.0 * core::pi * core::speed_of_light / light.wavelength;
        const Response found = response(stack, light);
        const Delays delay = at_fixed_transverse_wavenumber(stack, light);
        const double sign = light.polarisation == Polarisation::s ? -1.0 : 1.0;
        const double expected =
            total(stored_energy(standing_wave(stack, light))) +
            sign * std::pow(std::tan(light.angle), 2) * found.reflection.imag() / omega;
        const double delays =
            found.reflectance * delay.reflected + found.transmittance * delay.transmitted;
        EXPECT_LE(relative_error(delays, expected), 5e-15)
            << "seed " << seed << ", trial " << trial;
        worst.see(relative_error(delays, expected), "trial " + std::to_string(trial));
    }
    worst.print("the same obliquely, relative");
}

}  // namespace
}  // namespace stillcoat::optics
