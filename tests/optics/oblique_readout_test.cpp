/// Readout weights off normal incidence: every place of tests/data/readout_reference.json
/// (120-digit differences on uniaxial slices), limits, laws, and layers at their critical angle.

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <fstream>
#include <nlohmann/json.hpp>
#include <string>

#include "optics/stacks.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/optics/readout.hpp"
#include "support/worst_error.hpp"

namespace stillcoat::optics {
namespace {

using nlohmann::json;
using test::relative_error;
using test::WorstError;

OpticalStack stack_of(const json& entry) {
    OpticalStack stack{entry.at("incident_index"), {}, {}};
    stack.substrate_index = {entry.at("substrate_index")[0], entry.at("substrate_index")[1]};
    for (const json& layer : entry.at("layers")) {
        stack.layers.push_back({Complex(layer[0], layer[1]), layer[2]});
    }
    return stack;
}

TEST(ObliqueReadout, WeightsAreThoseOfExactDifferencesOnUniaxialSlices) {
    std::ifstream file(std::string(STILLCOAT_TEST_DATA) + "/readout_reference.json");
    const json document = json::parse(file);
    WorstError worst_strain, worst_in_plane, worst_index, worst_relative;
    int count = 0;
    for (const json& entry : document.at("cases")) {
        const OpticalStack stack = stack_of(entry);
        const Polarisation polarisation =
            entry.at("polarisation") == "s" ? Polarisation::s : Polarisation::p;
        const StandingWave wave =
            standing_wave(stack, {entry.at("wavelength_m"), entry.at("angle_rad"), polarisation});
        for (const json& place : entry.at("weights")) {
            const std::vector<Photoelasticity> p(stack.layers.size(),
                                                 {place.at("p11"), place.at("p12")});
            const ReadoutLayer layer = readout_weights(wave, p)[place.at("layer")];
            const double depth = place.at("depth_in_layer_m");
            // Relative to the weight, and where it is small beside the 1 of the moving face, to 1.
            const auto see = [&](WorstError& worst, double value, const char* key) {
                const double exact = place.at(key);
                const std::string where =
                    entry.at("name").get<std::string>() + ", layer " + place.at("layer").dump();
                worst.see(std::abs(value - exact) / std::max(1.0, std::abs(exact)), where);
                if (exact != 0.0) worst_relative.see(std::abs(value / exact - 1.0), where);
            };
            see(worst_strain, strain_weight(layer, depth), "strain_weight");
            see(worst_in_plane, in_plane_weight(layer, depth), "in_plane_weight");
            see(worst_index, index_weight(layer, depth), "index_weight");
            ++count;
        }
    }
    EXPECT_GE(count, 280);
    worst_strain.print("g at oblique incidence");
    worst_in_plane.print("g∥ at oblique incidence");
    worst_index.print("h at oblique incidence");
    worst_relative.print("any of them relative to itself, however small");
    EXPECT_LE(worst_relative.error(), 1.5e-11);
    EXPECT_LE(worst_strain.error(), 3e-14);
    EXPECT_LE(worst_in_plane.error(), 3e-14);
    EXPECT_LE(worst_index.error(), 2e-13);
}

TEST(ObliqueReadout, TendsToNormalIncidenceWithTheSquareOfTheAngle) {
    OpticalStack stack = quarter_wave_stack(n_high, n_low, 8, n_low);
    stack.layers[2].index += Complex(0.0, 0.05);
    const std::vector<Photoelasticity> p(8, {0.12, 0.27});
    const auto weights = [&](double angle, Polarisation polarisation) {
        std::vector<double> list;
        for (const ReadoutLayer& layer :
             readout_weights(standing_wave(stack, {wavelength_1064, angle, polarisation}), p)) {
            const double z = 0.3 * layer.thickness;
            list.insert(list.end(), {strain_weight(layer, z), in_plane_weight(layer, z),
                                     index_weight(layer, z)});
        }
        return list;
    };
    const std::vector<double> normal = weights(0.0, Polarisation::s);
    for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
        const std::vector<double> straight = weights(0.0, polarisation),
                                  tiny = weights(1e-8, polarisation),
                                  small = weights(1e-3, polarisation),
                                  double_angle = weights(2e-3, polarisation);
        for (std::size_t i = 0; i < normal.size(); ++i) {
            EXPECT_NEAR(straight[i], normal[i], 1e-15);
            EXPECT_NEAR(tiny[i], normal[i], 1e-15);
            EXPECT_LE(std::abs(small[i] - normal[i]), 1e-5);
            EXPECT_NEAR(double_angle[i] - normal[i], 4.0 * (small[i] - normal[i]), 3e-11);
        }
    }
}

TEST(ObliqueReadout, StrainVanishesInAFilmOfTheIncidentMedium) {
    for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
        OpticalStack stack = quarter_wave_stack(n_high, n_low, 9, n_low, wavelength_1064, 1.33);
        stack.layers.insert(stack.layers.begin(), {1.33, 321e-9});
        const auto weights =
            readout_weights(standing_wave(stack, {wavelength_1064, 0.9, polarisation}),
                            std::vector<Photoelasticity>(stack.layers.size()));
        EXPECT_NEAR(weights[0].strain_constant, 0.0, 1e-14);
    }
}

TEST(ObliqueReadout, AddsUpToTheGroupDelayUnderACommonStrain) {
    // Stretching every layer is shortening the wavelength at a fixed angle: Σ∫g dz = Σd − c τ/(2 n0
    // cosθ0).
    const std::uint32_t seed = 54;
    RandomStacks random(seed);
    WorstError worst;
    for (int trial = 0; trial < 300; ++trial) {
        const OpticalStack stack = random.stack(0.1, false);
        const Illumination light = random.light();
        if (response(stack, light).reflectance < 1e-3) continue;
        const double tau = phase_response(without_dispersion(stack), light).group_delay;
        double strain = 0.0, thickness = 0.0;
        for (const ReadoutLayer& layer : readout_weights(
                 standing_wave(stack, light), std::vector<Photoelasticity>(stack.layers.size()))) {
            strain += readout_integrals(layer).strain;
            thickness += layer.thickness;
        }
        const double delay =
            core::speed_of_light * tau / (2.0 * stack.incident_index * std::cos(light.angle));
        worst.see(std::abs(strain - (thickness - delay)) / (thickness + std::abs(delay) + 1e-300),
                  "trial " + std::to_string(trial));
    }
    worst.print("Σ∫g dz against the group delay");
    EXPECT_LE(worst.error(), 7e-14);
}

/// Frustrated total reflection: layer 1 has the index `n`, β = 1.45 sin 45°.
struct CriticalStack {
    OpticalStack stack{1.45, {{n_high, 90e-9}, {1.0, 200e-9}, {n_high, 130e-9}}, n_low};
    Illumination light{wavelength_1064, core::pi / 4.0, Polarisation::s};
    double beta = 1.45 * std::sin(core::pi / 4.0);

    std::vector<ReadoutLayer> weights() const {
        return readout_weights(standing_wave(stack, light),
                               std::vector<Photoelasticity>(stack.layers.size(), {0.12, 0.27}));
    }
};

TEST(ObliqueReadout, OfPiecesOfALayerNearItsCriticalAngleAreThoseOfTheLayer) {
    // The pieces are thin enough for the polynomial in (qd)², the whole is not.
    WorstError worst;
    for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
        for (const double relative : {-3e-3, -1e-3, 1e-3, 3e-3}) {
            for (const double extinction : {0.0, 1e-4}) {
                CriticalStack whole;
                whole.light.polarisation = polarisation;
                whole.stack.layers[1] = {{whole.beta * (1.0 + relative), extinction}, 600e-9};
                const StandingWave wave = standing_wave(whole.stack, whole.light);
                const double phase = std::abs(wave.layers[1].wavenumber) * 600e-9;
                ASSERT_GT(phase, 0.1);
                CriticalStack cut = whole;
                cut.stack.layers[1].thickness = 60e-9;
                cut.stack.layers.insert(cut.stack.layers.begin() + 2, 9, cut.stack.layers[1]);
                ASSERT_LT(phase / 10.0, 0.1);
                const ReadoutLayer one = whole.weights()[1];
                const std::vector<ReadoutLayer> pieces = cut.weights();
                EXPECT_GT(pieces[1].terms.size(), 2u);
                for (int i = 0; i < 10; ++i) {
                    const ReadoutLayer& piece = pieces[1 + i];
                    for (const double z : {0.0, 17e-9, 60e-9}) {
                        const double depth = std::min(i * 60e-9 + z, 600e-9);
                        const std::string where =
                            std::to_string(relative) + ", piece " + std::to_string(i);
                        worst.see(std::abs(strain_weight(piece, z) - strain_weight(one, depth)),
                                  "g " + where);
                        worst.see(std::abs(in_plane_weight(piece, z) - in_plane_weight(one, depth)),
                                  "g∥ " + where);
                        worst.see(std::abs(index_weight(piece, z) - index_weight(one, depth)),
                                  "h " + where);
                    }
                }
            }
        }
    }
    worst.print("weights of ten pieces against the whole layer");
    EXPECT_LE(worst.error(), 6e-14);
}

TEST(ObliqueReadout, IntegralsHoldThroughTheCriticalAngle) {
    WorstError worst;
    for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
        for (const double relative : {-1e-2, -1e-4, -1e-9, 0.0, 1e-12, 1e-6, 1e-3}) {
            CriticalStack critical;
            critical.light.polarisation = polarisation;
            critical.stack.layers[1].index = critical.beta * (1.0 + relative);
            const ReadoutLayer layer = critical.weights()[1];
            const double d = layer.thickness;
            const ReadoutIntegrals found = readout_integrals(layer);
            const auto see = [&](double value, auto weight) {
                const double exact = quadrature(weight, d);
                worst.see(relative_error(value, exact), std::to_string(relative));
            };
            see(found.strain, [&](double z) { return strain_weight(layer, z); });
            see(found.in_plane, [&](double z) { return in_plane_weight(layer, z); });
            see(found.index, [&](double z) { return index_weight(layer, z); });
            see(found.strain_squared,
                [&](double z) { return std::pow(strain_weight(layer, z), 2); });
        }
    }
    worst.print("integrals of a critical layer against quadrature");
    EXPECT_LE(worst.error(), 3e-14);
}

TEST(ObliqueReadout, OfACriticalLayerWithoutThicknessIsThatOfAVeryThinOne) {
    // By the difference of the fields at its faces, k0 d = 6e-16.
    for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
        CriticalStack none;
        none.light.polarisation = polarisation;
        none.stack.layers[1] = {none.beta, 0.0};
        CriticalStack thin = none;
        thin.stack.layers[1].thickness = 1e-22;
        const ReadoutLayer at = none.weights()[1], near = thin.weights()[1];
        EXPECT_NEAR(strain_weight(at, 0.0), strain_weight(near, 0.0), 4e-15);
        EXPECT_NEAR(in_plane_weight(at, 0.0), in_plane_weight(near, 0.0), 4e-15);
        EXPECT_NEAR(index_weight(at, 0.0), index_weight(near, 0.0), 2e-14);
        EXPECT_EQ(readout_integrals(at).strain_squared, 0.0);
    }
}

}  // namespace
}  // namespace stillcoat::optics
