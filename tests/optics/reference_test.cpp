/// Every case of tests/data/optics_reference.json: multi-precision numbers from a chain of Fresnel
/// interfaces, which shares no formula with the program.

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <fstream>
#include <iostream>
#include <limits>
#include <nlohmann/json.hpp>
#include <stdexcept>
#include <string>

#include "stillcoat/core/constants.hpp"
#include "stillcoat/optics/readout.hpp"
#include "support/worst_error.hpp"

namespace stillcoat::optics {
namespace {

using nlohmann::json;
using test::relative_error;
using test::WorstError;

constexpr double epsilon = std::numeric_limits<double>::epsilon();

struct Case {
    std::string name;
    OpticalStack stack;
    Illumination light;
    json results;
    json weights;
};

const std::vector<Case>& cases() {
    static const std::vector<Case> all = [] {
        std::ifstream file(std::string(STILLCOAT_TEST_DATA) + "/optics_reference.json");
        std::vector<Case> read;
        const json document = json::parse(file);
        for (const json& entry : document.at("cases")) {
            OpticalStack stack{entry.at("incident_index"), {}, {}};
            stack.substrate_index = {entry.at("substrate_index")[0],
                                     entry.at("substrate_index")[1]};
            for (const json& layer : entry.at("layers")) {
                stack.layers.push_back({Complex(layer[0], layer[1]), layer[2]});
            }
            const Polarisation polarisation =
                entry.at("polarisation") == "s" ? Polarisation::s : Polarisation::p;
            read.push_back({entry.at("name"),
                            stack,
                            {entry.at("wavelength_m"), entry.at("angle_rad"), polarisation},
                            entry.at("results"),
                            entry.value("weights", json::array())});
        }
        // Every test below would pass on an empty list.
        if (read.size() < 160) throw std::runtime_error("the optics reference file is incomplete");
        return read;
    }();
    return all;
}

bool is_cavity(const Case& c) { return c.name.starts_with("cavity"); }

/// One unit in the last place of the wavelength moves r of a cavity by ε|∂r/∂lnλ|: no program that
/// reads doubles can do better.
double conditioning(const Case& c) {
    const double sensitivity = c.results.at("sensitivity_to_log_wavelength");
    return is_cavity(c) ? epsilon * sensitivity : 0.0;
}

double reflection_tolerance(const Case& c) { return 4e-14 + conditioning(c); }

/// `limit` is three times what is measured, cavities apart.
double power_tolerance(const Case& c, double limit) {
    return is_cavity(c) ? 3e-13 + conditioning(c) : limit;
}

TEST(OpticsReference, ReflectionAmplitudeIsRightTo4e14) {
    WorstError worst;
    for (const Case& c : cases()) {
        const Complex expected(c.results.at("reflection")[0], c.results.at("reflection")[1]);
        const double error = std::abs(response(c.stack, c.light).reflection - expected);
        EXPECT_LE(error, reflection_tolerance(c)) << c.name;
        if (is_cavity(c)) {
            std::cout << "  " << c.name << ": |r| error " << error << ", allowed "
                      << reflection_tolerance(c) << "\n";
        } else {
            worst.see(error, c.name);
        }
    }
    worst.print("r, cavities apart, absolute");
}

TEST(OpticsReference, TransmittanceIsRightTo2e13AndItsLogarithmWhereItUnderflows) {
    WorstError worst, worst_logarithm;
    int underflows = 0;
    for (const Case& c : cases()) {
        const Response found = response(c.stack, c.light);
        const double expected_logarithm = c.results.at("log_transmittance");
        const double expected = c.results.at("transmittance");
        if (expected > 1e-290) {
            const double error = relative_error(found.transmittance, expected);
            EXPECT_LE(error, power_tolerance(c, 2e-13)) << c.name;
            if (!is_cavity(c)) worst.see(error, c.name);
        } else {
            ++underflows;
            EXPECT_LE(found.transmittance, 1e-290) << c.name;
        }
        // An absolute error of ln T is a relative one of T.
        const double error = std::abs(found.log_transmittance - expected_logarithm);
        EXPECT_LE(error, power_tolerance(c, 7e-13)) << c.name;
        if (!is_cavity(c)) worst_logarithm.see(error, c.name);
    }
    EXPECT_GE(underflows, 10);
    worst.print("T, cavities apart, relative");
    worst_logarithm.print("ln T, cavities apart, absolute");
}

TEST(OpticsReference, AbsorptanceOfEveryLayerIsRightTo7e14) {
    WorstError worst, worst_loss;
    for (const Case& c : cases()) {
        const Response found = response(c.stack, c.light);
        const json& expected = c.results.at("absorptance");
        ASSERT_EQ(found.layer_absorptance.size(), expected.size());
        for (std::size_t j = 0; j < expected.size(); ++j) {
            const double value = expected[j];
            if (value < 1e-290) {
                EXPECT_LE(found.layer_absorptance[j], 1e-290) << c.name << ", layer " << j;
                if (c.stack.layers[j].index.imag() == 0.0) {
                    EXPECT_EQ(found.layer_absorptance[j], 0.0) << c.name << ", layer " << j;
                }
                continue;
            }
            const double error = relative_error(found.layer_absorptance[j], value);
            EXPECT_LE(error, power_tolerance(c, 7e-14)) << c.name << ", layer " << j;
            if (!is_cavity(c)) worst.see(error, c.name + ", layer " + std::to_string(j));
        }
        const double loss_expected = c.results.at("one_minus_reflectance");
        if (loss_expected < 1e-290) continue;
        const double loss_error = relative_error(found.loss, loss_expected);
        EXPECT_LE(loss_error, power_tolerance(c, 2e-13)) << c.name;
        if (!is_cavity(c)) worst_loss.see(loss_error, c.name);
    }
    worst.print("A of a layer, relative");
    worst_loss.print("1 − R, relative");
}

TEST(OpticsReference, StoredEnergyOfEveryLayerIsRightTo5e13) {
    WorstError worst;
    for (const Case& c : cases()) {
        const std::vector<double> found = stored_energy(standing_wave(c.stack, c.light));
        const json& expected = c.results.at("stored_energy_J_per_W");
        for (std::size_t j = 0; j < expected.size(); ++j) {
            const double value = expected[j];
            if (std::abs(value) < 1e-290) continue;
            const double error = relative_error(found[j], value);
            EXPECT_LE(error, power_tolerance(c, 5e-13)) << c.name << ", layer " << j;
            if (!is_cavity(c)) worst.see(error, c.name + ", layer " + std::to_string(j));
        }
    }
    worst.print("stored energy of a layer, relative");
}

TEST(OpticsReference, DelayAndDispersionAreRight) {
    WorstError worst_delay, worst_dispersion, worst_transmitted;
    for (const Case& c : cases()) {
        const PhaseResponse found = phase_response(without_dispersion(c.stack), c.light);
        const double delay = c.results.at("group_delay_s");
        const double dispersion = c.results.at("group_delay_dispersion_s2");
        const double transmitted = c.results.at("transmitted_group_delay_s");
        const Complex r(c.results.at("reflection")[0], c.results.at("reflection")[1]);
        const double sensitivity = c.results.at("sensitivity_to_log_wavelength");
        const double omega = 2.0 * core::pi * core::speed_of_light / c.light.wavelength;
        // Delays against the time scale of the problem, |r'/r|, or one radian of light where
        // nothing below a thick metal or gap reaches the face: a delay of 0 has no relative error.
        const double scale = std::max(sensitivity / std::abs(r), 1.0) / omega;
        const double conditioned = conditioning(c) / std::abs(r);
        const double delay_error = std::abs(found.group_delay - delay);
        EXPECT_LE(delay_error, (2e-13 + conditioned) * scale) << c.name;
        const double dispersion_scale = std::max(std::abs(dispersion), scale * scale);
        const double dispersion_error = std::abs(found.group_delay_dispersion - dispersion);
        EXPECT_LE(dispersion_error, (2e-12 + conditioned) * dispersion_scale) << c.name;
        const double transmitted_error = std::abs(found.transmission_group_delay - transmitted);
        EXPECT_LE(transmitted_error, (7e-14 + conditioned) * std::max(scale, std::abs(transmitted)))
            << c.name;
        EXPECT_NEAR(std::abs(std::remainder(found.reflection_phase - std::arg(r), 2.0 * core::pi)),
                    0.0, reflection_tolerance(c) / std::abs(r));
        if (is_cavity(c)) continue;
        worst_delay.see(delay_error / scale, c.name);
        worst_dispersion.see(dispersion_error / dispersion_scale, c.name);
        worst_transmitted.see(transmitted_error / std::max(scale, std::abs(transmitted)), c.name);
    }
    worst_delay.print("group delay, relative to the larger of |r'/r| and 1/ω");
    worst_dispersion.print("group-delay dispersion, relative");
    worst_transmitted.print("transmitted group delay, relative");
}

TEST(OpticsReference, ReadoutWeightsAreRight) {
    WorstError worst;
    int count = 0;
    for (const Case& c : cases()) {
        if (c.weights.empty()) continue;
        const StandingWave wave = standing_wave(c.stack, c.light);
        for (const json& place : c.weights) {
            const std::vector<Photoelasticity> p(c.stack.layers.size(), {0.0, place.at("p12")});
            const ReadoutLayer layer = readout_weights(wave, p)[place.at("layer")];
            const double depth = place.at("depth_in_layer_m");
            const double strain_error =
                std::abs(strain_weight(layer, depth) - place.at("strain_weight").get<double>());
            const double index_error =
                std::abs(index_weight(layer, depth) - place.at("index_weight").get<double>());
            EXPECT_LE(strain_error, 2e-13) << c.name << place;
            EXPECT_LE(index_error, 2e-13) << c.name << place;
            worst.see(std::max(strain_error, index_error), c.name);
            ++count;
        }
    }
    EXPECT_GE(count, 45);
    worst.print("weights g and h, absolute");
}

}  // namespace
}  // namespace stillcoat::optics
