#include <gtest/gtest.h>

#include <cmath>
#include <iostream>

#include "optics/stacks.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/optics/readout.hpp"
#include "support/published_rows.hpp"
#include "support/worst_error.hpp"

namespace stillcoat::optics {
namespace {

using test::PublishedRow;

OpticalStack described_stack(const PublishedRow& row) {
    return quarter_wave_stack(row.input("outermost index"), row.input("next index"),
                              static_cast<int>(row.input("layers")), row.input("substrate index"),
                              row.input("wavelength in nm") * 1e-9);
}

/// −∫ h dn/dT dz / λ: apparent motion away from the light per kelvin and per wavelength.
double effective_dn_dt(const PublishedRow& row, const OpticalStack& stack,
                       const Illumination& light) {
    const std::vector<Photoelasticity> no_photoelasticity(stack.layers.size(), {0.0, 0.0});
    double motion = 0.0;
    bool outermost = true;
    for (const ReadoutLayer& layer :
         readout_weights(standing_wave(stack, light), no_photoelasticity)) {
        const double slope = row.input(outermost ? "outermost dn/dT per K" : "next dn/dT per K");
        motion += slope * readout_integrals(layer).index;
        outermost = !outermost;
    }
    return -motion / light.wavelength;
}

/// The quantity of a row in the unit of the row.
double computed(const PublishedRow& row) {
    const OpticalStack stack = described_stack(row);
    const Illumination light = normal_light(row.input("wavelength in nm") * 1e-9);
    const std::string kind = row.quantity + " [" + row.unit + "]";
    if (kind == "transmittance [ppm]") return response(stack, light).transmittance * 1e6;
    if (kind == "energy penetration depth [um]") {
        return energy_penetration_depth(standing_wave(stack, light)) * 1e6;
    }
    const double delay = phase_response(without_dispersion(stack), light).group_delay;
    if (kind == "group delay [fs]") return delay * 1e15;
    if (kind == "phase penetration depth [um]") return core::speed_of_light * delay / 2.0 * 1e6;
    if (kind == "effective dn/dT [1/K]") return effective_dn_dt(row, stack, light);
    throw std::runtime_error("a published row asks for an unknown quantity: " + kind);
}

TEST(PublishedOptics, EveryRowIsReproducedToItsLastPrintedDigit) {
    const auto rows = test::published_rows(std::string(STILLCOAT_PUBLISHED) + "/optics.csv");
    EXPECT_GE(rows.size(), 15u);
    for (const PublishedRow& row : rows) {
        const double error = test::relative_error(computed(row), row.value);
        EXPECT_LE(error, row.relative_tolerance) << row.row << ": " << computed(row);
    }
}

}  // namespace
}  // namespace stillcoat::optics
