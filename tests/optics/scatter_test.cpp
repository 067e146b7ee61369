#include "stillcoat/optics/scatter.hpp"

#include <gtest/gtest.h>

#include <boost/math/quadrature/gauss.hpp>
#include <cmath>
#include <limits>

#include "optics/stacks.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/core/errors.hpp"
#include "support/worst_error.hpp"

namespace stillcoat::optics {
namespace {

using test::relative_error;

/// 0.1 nm at 1064 nm: (4π·0.1/1064)² = 1.394879e-6, less half of its square.
TEST(Scatter, OfATenthOfANanometreIsAboutOnePartPerMillion) {
    EXPECT_NEAR(total_integrated_scatter(1.0, 1e-10, 1.0, normal_light()), 1.39487782204e-6, 1e-17);
}

/// The mirror direction keeps |⟨exp(2ikh cosθ)⟩|² of a Gaussian relief: averaged here by
/// quadrature.
TEST(Scatter, IsWhatAGaussianReliefTakesFromTheMirrorDirection) {
    for (const double roughness : {1e-9, 5e-9, 12e-9}) {
        for (const double angle : {0.0, 0.8}) {
            const double n0 = 1.3;
            const double phase = 4.0 * core::pi * n0 * std::cos(angle) / wavelength_1064;
            const auto density = [&](double x) {
                return std::cos(phase * roughness * x) * std::exp(-0.5 * x * x) /
                       std::sqrt(2.0 * core::pi);
            };
            double mean = 0.0;
            for (int j = -10; j < 10; ++j) {
                mean += boost::math::quadrature::gauss<double, 15>::integrate(density, j, j + 1.0);
            }
            const double found = total_integrated_scatter(
                0.8, roughness, n0, {wavelength_1064, angle, Polarisation::p});
            EXPECT_NEAR(found, 0.8 * (1.0 - mean * mean), 1e-14);
        }
    }
}

TEST(Scatter, OfASmoothSurfaceIsTheSquareOfThePhaseAndKeepsItsDigits) {
    const double x = 4.0 * core::pi * 1e-15 / wavelength_1064;
    EXPECT_LE(relative_error(total_integrated_scatter(1.0, 1e-15, 1.0, normal_light()), x * x),
              1e-14);
    EXPECT_EQ(total_integrated_scatter(0.5, 0.0, 1.0, normal_light()), 0.0);
}

TEST(Scatter, ClosesTheLossOfAMirror) {
    const OpticalStack stack = quarter_wave_stack(2.07, 1.45, 12, 1.45);
    const Response smooth = response(stack, normal_light());
    const double scatter = total_integrated_scatter(smooth.reflectance, 2e-9, 1.0, normal_light());
    const MirrorLoss loss = mirror_loss(smooth.transmittance, smooth.absorptance, scatter);
    const double x = 4.0 * core::pi * 2e-9 / wavelength_1064;
    EXPECT_NEAR(1.0 - loss.total, smooth.reflectance * std::exp(-x * x), 1e-14);
    EXPECT_EQ(loss.total, loss.transmitted + loss.absorbed + loss.scattered);
}

TEST(Scatter, ReachesReliefUpToTheGratingEquation) {
    EXPECT_DOUBLE_EQ(largest_scattering_frequency(1.0, normal_light(1e-6)), 1e6);
    EXPECT_DOUBLE_EQ(largest_scattering_frequency(1.5, {1e-6, core::pi / 6.0, Polarisation::s}),
                     2.25e6);
}

TEST(Scatter, RefusesASurfaceTooRoughAndValuesOutOfRange) {
    const Illumination light = normal_light();
    const double limit = 0.3 * wavelength_1064 / (4.0 * core::pi);
    EXPECT_NO_THROW(total_integrated_scatter(1.0, limit * (1.0 - 1e-12), 1.0, light));
    EXPECT_THROW(total_integrated_scatter(1.0, limit * 1.001, 1.0, light), core::DomainError);
    EXPECT_NO_THROW(
        total_integrated_scatter(1.0, limit * 1.9, 1.0, {1064e-9, 1.05, Polarisation::s}));
    const double nan = std::numeric_limits<double>::quiet_NaN();
    for (const double bad : {-1e-12, nan}) {
        EXPECT_THROW(total_integrated_scatter(1.0, bad, 1.0, light), core::DomainError);
        EXPECT_THROW(total_integrated_scatter(bad, 1e-10, 1.0, light), core::DomainError);
        EXPECT_THROW(total_integrated_scatter(1.0, 1e-10, bad, light), core::DomainError);
        EXPECT_THROW(mirror_loss(bad, 0.0, 0.0), core::DomainError);
        EXPECT_THROW(mirror_loss(0.0, bad, 0.0), core::DomainError);
        EXPECT_THROW(mirror_loss(0.0, 0.0, bad), core::DomainError);
        EXPECT_THROW(largest_scattering_frequency(bad, light), core::DomainError);
        EXPECT_THROW(largest_scattering_frequency(1.0, normal_light(bad)), core::DomainError);
    }
    EXPECT_THROW(total_integrated_scatter(1.001, 1e-10, 1.0, light), core::DomainError);
    EXPECT_THROW(mirror_loss(0.6, 0.3, 0.2), core::DomainError);
}

}  // namespace
}  // namespace stillcoat::optics
