#include <gtest/gtest.h>

#include <functional>
#include <limits>
#include <stdexcept>
#include <string>

#include "optics/stacks.hpp"
#include "stillcoat/core/errors.hpp"
#include "stillcoat/optics/standing_wave.hpp"

namespace stillcoat::optics {
namespace {

constexpr double nan = std::numeric_limits<double>::quiet_NaN();
constexpr double infinity = std::numeric_limits<double>::infinity();

struct Arrangement {
    OpticalStack stack = quarter_wave_stack(2.07, 1.45, 4, 1.45);
    Illumination light = normal_light();
};

/// Every entrance refuses the changed setup, and the message names the quantity.
void expect_refused(const std::string& words, const std::function<void(Arrangement&)>& change) {
    Arrangement setup;
    change(setup);
    const std::function<void()> entrances[] = {
        [&] { response(setup.stack, setup.light); },
        [&] { standing_wave(setup.stack, setup.light); },
        [&] { phase_response(without_dispersion(setup.stack), setup.light); }};
    for (const auto& entrance : entrances) {
        try {
            entrance();
            ADD_FAILURE() << "accepted: " << words;
        } catch (const core::DomainError& error) {
            EXPECT_NE(std::string(error.what()).find(words), std::string::npos) << error.what();
        }
    }
}

TEST(Validity, RefusesAnIncidentIndexThatIsNotPositiveAndFinite) {
    for (const double n : {0.0, -1.0, nan, infinity}) {
        expect_refused("incident medium", [n](Arrangement& s) { s.stack.incident_index = n; });
    }
}

TEST(Validity, RefusesAWavelengthThatIsNotPositiveAndFinite) {
    for (const double value : {0.0, -1e-6, nan, infinity}) {
        expect_refused("wavelength", [value](Arrangement& s) { s.light.wavelength = value; });
    }
}

TEST(Validity, RefusesAnAngleAtOrBeyondGrazing) {
    for (const double angle : {-0.1, 1.5707963267948966, 2.0, nan}) {
        expect_refused("angle of incidence", [angle](Arrangement& s) { s.light.angle = angle; });
    }
}

TEST(Validity, RefusesANegativeOrUnboundedThicknessAndNamesTheLayer) {
    for (const double d : {-1e-9, nan, infinity, 1e4}) {
        expect_refused("thickness of layer 3 of 4",
                       [d](Arrangement& s) { s.stack.layers[2].thickness = d; });
    }
}

TEST(Validity, RefusesGainAndUnusableIndices) {
    expect_refused("extinction coefficient of layer 2 of 4", [](Arrangement& s) {
        s.stack.layers[1].index = {1.45, -1e-9};
    });
    expect_refused("extinction coefficient of the substrate", [](Arrangement& s) {
        s.stack.substrate_index = {1.45, -1e-9};
    });
    for (const double n : {-1.45, nan, infinity}) {
        expect_refused("refractive index of layer 1 of 4",
                       [n](Arrangement& s) { s.stack.layers[0].index = n; });
        expect_refused("refractive index of the substrate",
                       [n](Arrangement& s) { s.stack.substrate_index = n; });
    }
    for (const double k : {nan, infinity}) {
        expect_refused("extinction coefficient of layer 4 of 4", [k](Arrangement& s) {
            s.stack.layers[3].index = {1.45, k};
        });
    }
    expect_refused("complex index of layer 1 of 4",
                   [](Arrangement& s) { s.stack.layers[0].index = 0.0; });
}

TEST(Validity, RefusesDerivativesThatAreNotFinite) {
    const auto refused = [](const std::function<void(DispersiveStack&)>& change) {
        DispersiveStack stack = without_dispersion(Arrangement{}.stack);
        change(stack);
        EXPECT_THROW(phase_response(stack, normal_light()), core::DomainError);
    };
    refused([](DispersiveStack& s) { s.layer_index[1].first = nan; });
    refused([](DispersiveStack& s) { s.layer_index[1].second = Complex(0.0, infinity); });
    refused([](DispersiveStack& s) { s.substrate_index.first = infinity; });
    refused([](DispersiveStack& s) { s.incident_index.second = nan; });
    DispersiveStack uneven = without_dispersion(Arrangement{}.stack);
    uneven.thickness.pop_back();
    EXPECT_THROW(phase_response(uneven, normal_light()), std::logic_error);
}

TEST(Validity, AcceptsANegativeZeroOfExtinctionAsZero) {
    OpticalStack stack = quarter_wave_stack(2.07, 1.45, 4, 1.45);
    const Illumination light{wavelength_1064, 1.2, Polarisation::p};
    stack.incident_index = 2.5;  // evanescent below: the sign of zero would choose the growing wave
    const Response expected = response(stack, light);
    for (OpticalLayer& layer : stack.layers) layer.index = {layer.index.real(), -0.0};
    stack.substrate_index = {1.45, -0.0};
    const Response found = response(stack, light);
    EXPECT_EQ(found.reflection, expected.reflection);
    EXPECT_EQ(found.transmittance, 0.0);
    EXPECT_NEAR(found.reflectance, 1.0, 1e-14);
}

}  // namespace
}  // namespace stillcoat::optics
