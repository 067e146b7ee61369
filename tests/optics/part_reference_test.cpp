/// Every part of tests/data/part_reference.json: multi-precision amplitudes from a chain of Fresnel
/// interfaces, intensities from a linear system; no formula is shared with the program.

#include <gtest/gtest.h>

#include <cmath>
#include <fstream>
#include <limits>
#include <nlohmann/json.hpp>
#include <stdexcept>
#include <string>

#include "stillcoat/core/constants.hpp"
#include "stillcoat/optics/part.hpp"
#include "support/worst_error.hpp"

namespace stillcoat::optics {
namespace {

using nlohmann::json;
using test::relative_error;
using test::WorstError;

constexpr double epsilon = std::numeric_limits<double>::epsilon();

struct Case {
    std::string name;
    Part part;
    Illumination light;
    json results;
};

std::vector<OpticalLayer> layers(const json& list) {
    std::vector<OpticalLayer> read;
    for (const json& layer : list) read.push_back({Complex(layer[0], layer[1]), layer[2]});
    return read;
}

const std::vector<Case>& cases() {
    static const std::vector<Case> all = [] {
        std::ifstream file(std::string(STILLCOAT_TEST_DATA) + "/part_reference.json");
        std::vector<Case> read;
        const json document = json::parse(file);
        for (const json& c : document.at("cases")) {
            const json& n = c.at("substrate_index");
            const Part part{c.at("incident_index"),      layers(c.at("front_layers")),
                            Complex(n[0], n[1]),         c.at("substrate_thickness_m"),
                            layers(c.at("rear_layers")), c.at("rear_index")};
            const Polarisation polarisation =
                c.at("polarisation") == "s" ? Polarisation::s : Polarisation::p;
            read.push_back({c.at("name"),
                            part,
                            {c.at("wavelength_m"), c.at("angle_rad"), polarisation},
                            c.at("results")});
        }
        // Every test below would pass on an empty list.
        if (read.size() < 18) throw std::runtime_error("the part reference file is incomplete");
        return read;
    }();
    return all;
}

/// Relative where the value is within reach of a double, else that it has underflowed.
void compare(double found, double expected, double tolerance, const std::string& where,
             WorstError& worst) {
    if (expected < 1e-290) {
        EXPECT_LE(found, 1e-290) << where;
        EXPECT_GE(found, 0.0) << where;
        return;
    }
    const double error = relative_error(found, expected);
    EXPECT_LE(error, tolerance) << where;
    worst.see(error / tolerance, where);
}

void compare_all(const PartResponse& found, const json& expected, double tolerance,
                 const std::string& name, WorstError& worst) {
    EXPECT_NEAR(found.reflectance, expected.at("reflectance").get<double>(), tolerance) << name;
    compare(found.transmittance, expected.at("transmittance"), tolerance, name + ", T", worst);
    compare(found.loss, expected.at("loss"), tolerance, name + ", 1 - R", worst);
    compare(found.substrate_absorptance, expected.at("substrate_absorptance"), tolerance,
            name + ", plate", worst);
    const json& logarithm = expected.at("log_transmittance");
    if (logarithm.is_null()) {
        EXPECT_EQ(found.log_transmittance, -std::numeric_limits<double>::infinity()) << name;
    } else {
        const double value = logarithm;
        // ln T of −1e5 carries rounding of its own size.
        EXPECT_NEAR(found.log_transmittance, value, tolerance + 4.0 * epsilon * std::abs(value))
            << name;
    }
    const json& front = expected.at("front_absorptance");
    const json& rear = expected.at("rear_absorptance");
    ASSERT_EQ(found.front_layer_absorptance.size(), front.size());
    ASSERT_EQ(found.rear_layer_absorptance.size(), rear.size());
    for (std::size_t j = 0; j < front.size(); ++j) {
        compare(found.front_layer_absorptance[j], front[j], tolerance,
                name + ", front layer " + std::to_string(j), worst);
    }
    for (std::size_t j = 0; j < rear.size(); ++j) {
        compare(found.rear_layer_absorptance[j], rear[j], tolerance,
                name + ", rear layer " + std::to_string(j), worst);
    }
}

TEST(PartReference, SumOfIntensitiesIsRightTo1e13) {
    WorstError worst;
    for (const Case& c : cases()) {
        compare_all(part_response(c.part, c.light), c.results.at("intensities"), 1e-13, c.name,
                    worst);
    }
    worst.print("intensities, in units of 1e-13 relative");
}

TEST(PartReference, SumOfAmplitudesIsRightToTwoUnitsInTheLastPlaceOfThePhase) {
    WorstError worst;
    for (const Case& c : cases()) {
        const double path = 2.0 * core::pi / c.light.wavelength * c.part.substrate_thickness *
                            std::abs(c.part.substrate_index);
        const double conditioning =
            std::max(c.results.at("relative_sensitivity").get<double>(), path);
        compare_all(part_response(c.part, c.light, Summation::amplitudes),
                    c.results.at("amplitudes"), 1e-12 + 2.0 * epsilon * conditioning, c.name,
                    worst);
    }
    worst.print("amplitudes, in units of what rounding of the phase allows");
}

}  // namespace
}  // namespace stillcoat::optics
