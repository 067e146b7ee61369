#include <gtest/gtest.h>

#include <boost/math/quadrature/gauss.hpp>
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

constexpr double high = 2.07, low = 1.45, q = low / high;
/// Gauss–Legendre quadrature in panels far shorter than any wave in the layer.
template <typename Function>
double quadrature(const Function& f, double length) {
    constexpr int panels = 40;
    double sum = 0.0;
    for (int m = 0; m < panels; ++m) {
        sum += boost::math::quadrature::gauss<double, 20>::integrate(f, length * m / panels,
                                                                     length * (m + 1) / panels);
    }
    return sum;
}

constexpr int many = 120;

std::vector<double> no_photoelasticity(const OpticalStack& stack) {
    return std::vector<double>(stack.layers.size(), 0.0);
}

std::vector<ReadoutLayer> weights_of(const OpticalStack& stack, const std::vector<double>& p12) {
    return readout_weights(standing_wave(stack, normal_light()), p12);
}

TEST(StrainWeight, IsThatOfEveryPairInTheClosedForm) {
    const auto high_first = quarter_wave_stack(high, low, many, low);
    const auto low_first = quarter_wave_stack(low, high, many, low);
    const auto g_high = weights_of(high_first, no_photoelasticity(high_first));
    const auto g_low = weights_of(low_first, no_photoelasticity(low_first));
    for (int pair = 0; pair < 20; ++pair) {
        const double shrinking = std::pow(q, 2 * pair);
        EXPECT_NEAR(g_high[2 * pair].strain_constant, 1.0 - shrinking, 1e-13);
        EXPECT_NEAR(g_high[2 * pair + 1].strain_constant, 1.0 - shrinking * q * q, 1e-13);
        EXPECT_NEAR(g_low[2 * pair].strain_constant, 1.0 - low * low * shrinking, 1e-13);
        EXPECT_NEAR(g_low[2 * pair + 1].strain_constant, 1.0 - low * low * shrinking, 1e-13);
    }
    EXPECT_NEAR(g_high[0].strain_constant, 0.0, 1e-13) << "the outermost high layer does not count";
}

TEST(StrainWeight, VanishesInAFilmOfTheIncidentMedium) {
    // Moving the face of such a film moves nothing that reflects.
    OpticalStack stack = quarter_wave_stack(high, low, 9, low, wavelength_1064, 1.33);
    stack.layers.insert(stack.layers.begin(), {1.33, 321e-9});
    const auto weights = weights_of(stack, no_photoelasticity(stack));
    EXPECT_NEAR(weights[0].strain_constant, 0.0, 1e-14);
}

TEST(IndexWeight, GivesTheEffectiveTemperatureCoefficientOfBothOrders) {
    // −∫ h dn/dT dz/λ = (β_H + β_L)/(4 D) or (n_H² β_L + n_L² β_H)/(4 D), D = n_H² − n_L².
    const double beta_high = 1.4e-5, beta_low = 8e-6, difference = 4.0 * (high * high - low * low);
    for (const bool high_first : {true, false}) {
        const auto stack =
            quarter_wave_stack(high_first ? high : low, high_first ? low : high, many, low);
        double motion = 0.0;
        const auto weights = weights_of(stack, no_photoelasticity(stack));
        for (std::size_t j = 0; j < weights.size(); ++j) {
            const bool is_high = stack.layers[j].index.real() == high;
            motion += (is_high ? beta_high : beta_low) * readout_integrals(weights[j]).index;
        }
        const double expected = high_first
                                    ? (beta_high + beta_low) / difference
                                    : (high * high * beta_low + low * low * beta_high) / difference;
        EXPECT_LE(relative_error(-motion / wavelength_1064, expected), 1e-13);
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
        std::vector<double> p12(stack.layers.size());
        for (double& p : p12) p = random.between(-0.2, 0.3);
        const ReadoutIntegrals found = readout_integrals(weights_of(stack, p12)[j]);
        const Complex n = stack.layers[j].index;
        const double d = stack.layers[j].thickness;
        const double by_index = slope(stack, 2e-4, [&](OpticalStack& changed, double x) {
            changed.layers[j].index = n + x;
            return 0.0;
        });
        const double by_strain = slope(stack, 2e-4, [&](OpticalStack& changed, double x) {
            Complex strained = n - 0.5 * n * n * n * p12[j] * x;
            changed.layers[j] = {strained, d * (1.0 + x)};
            return d * x;
        });
        const double tolerance = 1e-9 * wavelength_1064;
        EXPECT_NEAR(found.index, by_index, tolerance) << "seed " << seed << ", trial " << trial;
        // A strain of negative p12 would give a lossless layer's n + ik with k < 0 only for complex
        // n.
        EXPECT_NEAR(found.strain, by_strain, tolerance) << "seed " << seed << ", trial " << trial;
        worst.see(std::abs(found.index - by_index) / wavelength_1064,
                  "index, trial " + std::to_string(trial));
        worst.see(std::abs(found.strain - by_strain) / wavelength_1064,
                  "strain, trial " + std::to_string(trial));
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
                    1e-13 * (std::abs(thickness) + std::abs(thickness - expected)))
            << "seed " << seed << ", trial " << trial;
    }
}

TEST(ReadoutIntegrals, AreTheQuadratureOfTheWeights) {
    const std::uint32_t seed = 53;
    RandomStacks random(seed);
    WorstError worst;
    for (int trial = 0; trial < 200; ++trial) {
        OpticalStack stack = random.stack(3.0, false);
        stack.layers.push_back({random.index(3.0), random.between(0.0, 3e-6)});
        std::vector<double> p12(stack.layers.size());
        for (double& p : p12) p = random.between(-0.3, 0.5);
        const ReadoutLayer layer = weights_of(stack, p12).back();
        const ReadoutIntegrals found = readout_integrals(layer);
        const auto integral = [&](auto f) { return quadrature(f, layer.thickness); };
        const double strain = integral([&](double z) { return strain_weight(layer, z); });
        const double squared =
            integral([&](double z) { return std::pow(strain_weight(layer, z), 2); });
        const double index = integral([&](double z) { return index_weight(layer, z); });
        const double size = integral([&](double z) { return std::abs(index_weight(layer, z)); });
        EXPECT_NEAR(found.strain, strain, 1e-12 * (layer.thickness + squared))
            << "seed " << seed << ", " << trial;
        EXPECT_NEAR(found.strain_squared, squared, 1e-12 * (layer.thickness + squared))
            << "seed " << seed << ", trial " << trial;
        EXPECT_NEAR(found.index, index, 1e-12 * (size + 1e-300))
            << "seed " << seed << ", trial " << trial;
        if (squared > 0.0)
            worst.see(relative_error(found.strain_squared, squared), std::to_string(trial));
    }
    worst.print("∫g² dz against quadrature, relative");
}

TEST(ReadoutWeights, OfAPieceOfALayerAreThoseOfTheLayer) {
    // Cutting a photoelastic layer in three changes neither g nor h at any depth.
    OpticalStack stack = quarter_wave_stack(high, low, 8, low);
    stack.layers[3] = {Complex(1.9, 1e-3), 500e-9};
    std::vector<double> p12(stack.layers.size(), 0.2);
    const ReadoutLayer whole = weights_of(stack, p12)[3];
    OpticalStack cut = stack;
    cut.layers[3].thickness = 130e-9;
    cut.layers.insert(cut.layers.begin() + 4,
                      {{stack.layers[3].index, 150e-9}, {stack.layers[3].index, 220e-9}});
    const ReadoutLayer piece = weights_of(cut, std::vector<double>(cut.layers.size(), 0.2))[4];
    for (const double z : {0.0, 40e-9, 150e-9}) {
        EXPECT_NEAR(strain_weight(piece, z), strain_weight(whole, 130e-9 + z), 1e-13);
        EXPECT_NEAR(index_weight(piece, z), index_weight(whole, 130e-9 + z), 1e-13);
    }
}

TEST(ReadoutWeights, VanishBehindThickMetal) {
    OpticalStack stack = quarter_wave_stack(high, low, 6, low);
    stack.layers.insert(stack.layers.begin(), {Complex(0.2, 6.7), 10e-6});
    const auto weights = weights_of(stack, std::vector<double>(7, 0.3));
    for (std::size_t j = 1; j < weights.size(); ++j) {
        EXPECT_EQ(strain_weight(weights[j], 0.0), 1.0);
        EXPECT_NEAR(index_weight(weights[j], 0.0), 0.0, 1e-300);
        EXPECT_EQ(readout_integrals(weights[j]).strain_squared, weights[j].thickness);
    }
}

TEST(SurfaceReadout, IsOneForStrainAndNothingForIndex) {
    const auto stack = quarter_wave_stack(high, low, 4, low);
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
    const auto stack = quarter_wave_stack(high, low, 4, low);
    const StandingWave oblique = standing_wave(stack, {wavelength_1064, 0.1, Polarisation::s});
    EXPECT_THROW(readout_weights(oblique, no_photoelasticity(stack)), core::DomainError);
    const OpticalStack nothing{1.45, {{1.45, 1e-7}}, 1.45};
    EXPECT_THROW(weights_of(nothing, {0.0}), core::DomainError);
    EXPECT_THROW(weights_of(stack, {0.0}), std::logic_error);
    EXPECT_THROW(weights_of(stack, {0.0, 0.0, 0.0, std::nan("")}), core::DomainError);
}

}  // namespace
}  // namespace stillcoat::optics
