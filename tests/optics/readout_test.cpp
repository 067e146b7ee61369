#include <gtest/gtest.h>

#include <cmath>
#include <stdexcept>

#include "optics/stacks.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/core/errors.hpp"
#include "stillcoat/optics/readout.hpp"
#include "support/worst_error.hpp"

namespace stillcoat::optics {
namespace {

using test::relative_error;
using test::WorstError;

using Photoelasticities = std::vector<Photoelasticity>;

Photoelasticities no_photoelasticity(const OpticalStack& stack) {
    return Photoelasticities(stack.layers.size());
}

std::vector<ReadoutLayer> weights_of(const OpticalStack& stack,
                                     const Photoelasticities& photoelasticity,
                                     const Illumination& light = normal_light()) {
    return readout_weights(standing_wave(stack, light), photoelasticity);
}

Photoelasticities random_photoelasticities(const OpticalStack& stack, RandomStacks& random) {
    Photoelasticities list;
    for (std::size_t j = 0; j < stack.layers.size(); ++j) {
        list.push_back({random.between(-0.3, 0.5), random.between(-0.3, 0.5)});
    }
    return list;
}

TEST(StrainWeight, IsThatOfEveryPairInTheClosedForm) {
    const auto high_first = many_quarter_waves(true);
    const auto low_first = many_quarter_waves(false);
    const auto g_high = weights_of(high_first, no_photoelasticity(high_first));
    const auto g_low = weights_of(low_first, no_photoelasticity(low_first));
    for (int pair = 0; pair < 20; ++pair) {
        const double shrinking = std::pow(index_ratio, 2 * pair);
        EXPECT_NEAR(g_high[2 * pair].strain_constant, 1.0 - shrinking, 2e-15);
        EXPECT_NEAR(g_high[2 * pair + 1].strain_constant,
                    1.0 - shrinking * index_ratio * index_ratio, 1e-15);
        EXPECT_NEAR(g_low[2 * pair].strain_constant, 1.0 - n_low * n_low * shrinking, 2e-15);
        EXPECT_NEAR(g_low[2 * pair + 1].strain_constant, 1.0 - n_low * n_low * shrinking, 3e-15);
    }
    EXPECT_NEAR(g_high[0].strain_constant, 0.0, 1e-15) << "the outermost high layer does not count";
}

TEST(StrainWeight, VanishesInAFilmOfTheIncidentMedium) {
    // Moving the face of such a film moves nothing that reflects.
    OpticalStack stack = quarter_wave_stack(n_high, n_low, 9, n_low, wavelength_1064, 1.33);
    stack.layers.insert(stack.layers.begin(), {1.33, 321e-9});
    const auto weights = weights_of(stack, no_photoelasticity(stack));
    EXPECT_NEAR(weights[0].strain_constant, 0.0, 1e-15);
}

TEST(IndexWeight, GivesTheEffectiveTemperatureCoefficientOfBothOrders) {
    // −∫ h dn/dT dz/λ = (β_H + β_L)/(4 D) or (n_H² β_L + n_L² β_H)/(4 D), D = n_H² − n_L².
    const double beta_high = 1.4e-5, beta_low = 8e-6,
                 difference = 4.0 * (n_high * n_high - n_low * n_low);
    for (const bool high_first : {true, false}) {
        const auto stack = many_quarter_waves(high_first);
        double motion = 0.0;
        const auto weights = weights_of(stack, no_photoelasticity(stack));
        for (std::size_t j = 0; j < weights.size(); ++j) {
            const bool is_high = stack.layers[j].index.real() == n_high;
            motion += (is_high ? beta_high : beta_low) * readout_integrals(weights[j]).index;
        }
        const double expected =
            high_first ? (beta_high + beta_low) / difference
                       : (n_high * n_high * beta_low + n_low * n_low * beta_high) / difference;
        EXPECT_LE(relative_error(-motion / wavelength_1064, expected), 5e-15);
    }
}

/// Apparent position towards the light, up to a constant: −arg(r/reference)/(2 n0 k0).
double apparent_position(const OpticalStack& stack, Complex reference) {
    const double k0 = 2.0 * core::pi / wavelength_1064;
    const Complex r = response(stack, normal_light()).reflection;
    return -std::arg(r / reference) / (2.0 * stack.incident_index * k0);
}

/// Sixth-order central difference of the apparent position when `change(stack, x)` is done to it.
template <typename Change>
double slope(const OpticalStack& stack, double step, const Change& change) {
    const Complex reference = response(stack, normal_light()).reflection;
    const double weights[] = {0.75, -0.15, 1.0 / 60.0};
    double sum = 0.0;
    for (int m = 1; m <= 3; ++m) {
        for (const int sign : {1, -1}) {
            OpticalStack changed = stack;
            const double moved = change(changed, sign * m * step);
            sum += sign * weights[m - 1] / step * (moved + apparent_position(changed, reference));
        }
    }
    return sum;
}

TEST(ReadoutWeights, AreTheSlopesOfThePhaseForWholeLayers) {
    const std::uint32_t seed = 51;
    RandomStacks random(seed);
    WorstError worst;
    for (int trial = 0; trial < 60; ++trial) {
        OpticalStack stack = random.stack(trial % 2 == 0 ? 0.0 : 0.2, trial % 3 != 0);
        stack.layers.push_back({random.index(0.2), 200e-9});
        if (response(stack, normal_light()).reflectance < 0.02) continue;
        const std::size_t j = random.count_between(0, static_cast<int>(stack.layers.size()) - 1);
        const Photoelasticities p = random_photoelasticities(stack, random);
        const ReadoutIntegrals found = readout_integrals(weights_of(stack, p)[j]);
        const Complex n = stack.layers[j].index;
        const double d = stack.layers[j].thickness;
        const double by_index = slope(stack, 2e-4, [&](OpticalStack& changed, double x) {
            changed.layers[j].index = n + x;
            return 0.0;
        });
        const double by_strain = slope(stack, 2e-4, [&](OpticalStack& changed, double x) {
            changed.layers[j] = {n - 0.5 * n * n * n * p[j].p12 * x, d * (1.0 + x)};
            return d * x;
        });
        const double by_dilatation = slope(stack, 2e-4, [&](OpticalStack& changed, double x) {
            changed.layers[j].index = n - 0.25 * n * n * n * (p[j].p11 + p[j].p12) * x;
            return 0.0;
        });
        const double tolerance = 1e-9 * wavelength_1064;
        EXPECT_NEAR(found.index, by_index, tolerance) << "seed " << seed << ", trial " << trial;
        EXPECT_NEAR(found.strain, by_strain, tolerance) << "seed " << seed << ", trial " << trial;
        EXPECT_NEAR(found.in_plane, by_dilatation, tolerance)
            << "seed " << seed << ", trial " << trial;
        worst.see(std::abs(found.index - by_index) / wavelength_1064,
                  "index, trial " + std::to_string(trial));
        worst.see(std::abs(found.strain - by_strain) / wavelength_1064,
                  "strain, trial " + std::to_string(trial));
        worst.see(std::abs(found.in_plane - by_dilatation) / wavelength_1064,
                  "dilatation, trial " + std::to_string(trial));
    }
    worst.print("integrated weights against differences, in wavelengths");
}

TEST(ReadoutWeights, AddUpToTheGroupDelayUnderACommonStrain) {
    // Stretching every layer is shortening the wavelength: Σ∫g dz = Σd − c τ/(2 n0).
    const std::uint32_t seed = 52;
    RandomStacks random(seed);
    for (int trial = 0; trial < 200; ++trial) {
        const OpticalStack stack = random.stack(0.1, false);
        const double tau = phase_response(without_dispersion(stack), normal_light()).group_delay;
        double strain = 0.0, thickness = 0.0;
        for (const ReadoutLayer& layer : weights_of(stack, no_photoelasticity(stack))) {
            strain += readout_integrals(layer).strain;
            thickness += layer.thickness;
        }
        const double expected =
            thickness - core::speed_of_light * tau / (2.0 * stack.incident_index);
        EXPECT_NEAR(strain, expected,
                    3e-14 * (std::abs(thickness) + std::abs(thickness - expected)))
            << "seed " << seed << ", trial " << trial;
    }
}

TEST(ReadoutIntegrals, AreTheQuadratureOfTheWeights) {
    const std::uint32_t seed = 53;
    RandomStacks random(seed);
    WorstError worst, worst_square;
    for (int trial = 0; trial < 400; ++trial) {
        OpticalStack stack = random.stack(3.0, false);
        stack.layers.push_back({random.index(3.0), random.between(0.0, 3e-6)});
        const Illumination light = trial % 2 == 0 ? normal_light() : random.light();
        const Photoelasticities p = random_photoelasticities(stack, random);
        const ReadoutLayer layer = weights_of(stack, p, light).back();
        const ReadoutIntegrals found = readout_integrals(layer);
        const double d = layer.thickness;
        const auto integral = [&](auto f) { return quadrature(f, d); };
        const double squared =
            integral([&](double z) { return std::pow(strain_weight(layer, z), 2); });
        const auto see = [&](double value, auto weight, const char* name) {
            // A weight that cancels within the layer is measured against its size.
            const double size = integral([&](double z) { return std::abs(weight(layer, z)); });
            if (size == 0.0) {
                EXPECT_EQ(value, 0.0);
                return;
            }
            const double exact = integral([&](double z) { return weight(layer, z); });
            worst.see(std::abs(value - exact) / size, name + std::to_string(trial));
        };
        see(found.strain, strain_weight, "strain ");
        see(found.index, index_weight, "index ");
        see(found.in_plane, in_plane_weight, "in-plane ");
        if (squared > 0.0) {
            worst_square.see(relative_error(found.strain_squared, squared), std::to_string(trial));
        }
    }
    worst.print("∫g dz, ∫h dz, ∫g∥ dz against quadrature, relative");
    worst_square.print("∫g² dz against quadrature, relative");
    EXPECT_LE(worst.error(), 4e-15);
    EXPECT_LE(worst_square.error(), 8e-15);
}

TEST(ReadoutWeights, OfAPieceOfALayerAreThoseOfTheLayer) {
    // Cutting a photoelastic layer in three changes neither g nor h at any depth.
    OpticalStack stack = quarter_wave_stack(n_high, n_low, 8, n_low);
    stack.layers[3] = {Complex(1.9, 1e-3), 500e-9};
    const Photoelasticity p{0.1, 0.2};
    const ReadoutLayer whole = weights_of(stack, Photoelasticities(stack.layers.size(), p))[3];
    OpticalStack cut = stack;
    cut.layers[3].thickness = 130e-9;
    cut.layers.insert(cut.layers.begin() + 4,
                      {{stack.layers[3].index, 150e-9}, {stack.layers[3].index, 220e-9}});
    const ReadoutLayer piece = weights_of(cut, Photoelasticities(cut.layers.size(), p))[4];
    for (const double z : {0.0, 40e-9, 150e-9}) {
        EXPECT_NEAR(strain_weight(piece, z), strain_weight(whole, 130e-9 + z), 2e-15);
        EXPECT_NEAR(index_weight(piece, z), index_weight(whole, 130e-9 + z), 2e-15);
    }
}

TEST(ReadoutWeights, VanishBehindThickMetal) {
    OpticalStack stack = quarter_wave_stack(n_high, n_low, 6, n_low);
    stack.layers.insert(stack.layers.begin(), {Complex(0.2, 6.7), 10e-6});
    const auto weights = weights_of(stack, Photoelasticities(7, {0.2, 0.3}));
    for (std::size_t j = 1; j < weights.size(); ++j) {
        EXPECT_EQ(strain_weight(weights[j], 0.0), 1.0);
        EXPECT_NEAR(index_weight(weights[j], 0.0), 0.0, 1e-300);
        EXPECT_EQ(readout_integrals(weights[j]).strain_squared, weights[j].thickness);
    }
}

TEST(SurfaceReadout, IsOneForStrainAndNothingForIndex) {
    const auto stack = quarter_wave_stack(n_high, n_low, 4, n_low);
    const auto weights = surface_readout(stack);
    ASSERT_EQ(weights.size(), 4u);
    for (const ReadoutLayer& layer : weights) {
        EXPECT_EQ(strain_weight(layer, layer.thickness / 2.0), 1.0);
        EXPECT_EQ(index_weight(layer, layer.thickness / 2.0), 0.0);
        const ReadoutIntegrals integrals = readout_integrals(layer);
        EXPECT_EQ(integrals.strain, layer.thickness);
        EXPECT_EQ(integrals.strain_squared, layer.thickness);
        EXPECT_EQ(integrals.index, 0.0);
    }
}

TEST(ReadoutWeights, RefuseWhatTheyDoNotDescribe) {
    const auto stack = quarter_wave_stack(n_high, n_low, 4, n_low);
    const OpticalStack nothing{1.45, {{1.45, 1e-7}}, 1.45};
    EXPECT_THROW(weights_of(nothing, {{0.0, 0.0}}), core::DomainError);
    EXPECT_THROW(weights_of(stack, {{0.0, 0.0}}), std::logic_error);
    Photoelasticities p(4);
    p[3].p12 = std::nan("");
    EXPECT_THROW(weights_of(stack, p), core::DomainError);
    p[3] = {std::nan(""), 0.0};
    EXPECT_THROW(weights_of(stack, p), core::DomainError);
}

}  // namespace
}  // namespace stillcoat::optics
