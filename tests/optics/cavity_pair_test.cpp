#include "stillcoat/optics/cavity_pair.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <limits>

#include "optics/stacks.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/core/errors.hpp"
#include "support/worst_error.hpp"

namespace stillcoat::optics {
namespace {

using test::relative_error;

/// R = 0.81 on both sides: F = π·0.9/0.19 and π/(2 asin(0.19/1.8)), with 30 digits elsewhere.
TEST(Finesse, OfTwoMirrorsOf81PerCent) {
    const RoundTrip trip = round_trip(0.19, 0.19);
    EXPECT_NEAR(trip.amplitude, 0.81, 1e-15);
    EXPECT_NEAR(trip.amplitude_loss, 0.19, 1e-15);
    EXPECT_NEAR(trip.loss, 1.0 - 0.81 * 0.81, 1e-15);
    EXPECT_NEAR(finesse(trip), 14.8812283591, 1e-10);
    EXPECT_NEAR(finesse_from_half_width(trip), core::pi / (2.0 * std::asin(0.19 / 1.8)), 1e-12);
}

/// For losses a, b ≪ 1: F = 2π/(a + b)·[1 + …], far beyond the digits of a reflectance. The
/// expected values are series in the losses: with b = 3a, 1 − ρ = 2a + a²/2 + a³ + …
TEST(Finesse, KeepsItsDigitsWhereReflectancesNoLongerDo) {
    for (const double a : {1e-6, 1e-12, 1e-20}) {
        const double b = 3.0 * a;
        const RoundTrip trip = round_trip(a, b);
        EXPECT_LE(relative_error(trip.loss, 4.0 * a * (1.0 - 0.75 * a)), 1e-15);
        const double amplitude_loss = 2.0 * a + 0.5 * a * a + a * a * a;
        EXPECT_LE(relative_error(trip.amplitude_loss, amplitude_loss), 1e-15);
        EXPECT_LE(
            relative_error(finesse(trip), core::pi * (1.0 - 0.5 * amplitude_loss) / amplitude_loss),
            1e-12);
        EXPECT_LE(relative_error(finesse_from_half_width(trip), finesse(trip)), 1e-12);
    }
}

TEST(Finesse, FormsDifferByTheSeriesOfTheArcSine) {
    for (const double loss : {0.01, 0.1, 0.3}) {
        const RoundTrip trip = round_trip(loss, loss);
        const double x = trip.amplitude_loss / (2.0 * std::sqrt(trip.amplitude));
        const double series = 1.0 / (1.0 + x * x / 6.0 + 3.0 * x * x * x * x / 40.0);
        EXPECT_NEAR(finesse_from_half_width(trip) / finesse(trip), series, std::pow(x, 6));
    }
}

/// Two stacks around a gap, the gap scanned: width of the transmission line found by bisection.
TEST(Finesse, IsTheWidthOfTheLineThatTheLayeredStackTransmits) {
    for (const int layers : {1, 3, 7, 11}) {
        for (const double extinction : {0.0, 1e-3}) {
            OpticalStack mirror = quarter_wave_stack(2.07, 1.45, layers, 1.45);
            for (OpticalLayer& layer : mirror.layers) layer.index.imag(extinction);
            const Response face = response(mirror, normal_light());
            const double round_phase = 2.0 * std::arg(face.reflection);
            OpticalStack pair{1.45, {mirror.layers.rbegin(), mirror.layers.rend()}, 1.45};
            const std::size_t gap = pair.layers.size();
            pair.layers.push_back({1.0, 0.0});
            pair.layers.insert(pair.layers.end(), mirror.layers.begin(), mirror.layers.end());
            const auto transmitted = [&](double phase) {  // 0 on resonance
                pair.layers[gap].thickness =
                    (phase + 6.0 * core::pi - round_phase) * wavelength_1064 / (4.0 * core::pi);
                return response(pair, normal_light()).transmittance;
            };
            const RoundTrip trip = round_trip(face.loss, face.loss);
            const double half = 0.5 * transmitted(0.0);
            if (trip.amplitude < 0.2) {
                EXPECT_GT(transmitted(core::pi), half);
                EXPECT_THROW(finesse_from_half_width(trip), core::DomainError);
                continue;
            }
            double inner = 0.0, outer = core::pi;
            while (outer - inner > 1e-13) {
                const double middle = 0.5 * (inner + outer);
                (transmitted(middle) > half ? inner : outer) = middle;
            }
            EXPECT_LE(relative_error(finesse_from_half_width(trip), core::pi / inner), 1e-10)
                << layers << " layers, k " << extinction;
        }
    }
}

TEST(Finesse, OfAHalfWidthExistsDownToThreeMinusTwoRootsOfTwo) {
    const double smallest = 3.0 - 2.0 * std::sqrt(2.0);
    // At the limit the line is as wide as the free spectral range.
    EXPECT_NEAR(finesse_from_half_width(
                    round_trip(1.0 - smallest * (1.0 + 1e-12), 1.0 - smallest * (1.0 + 1e-12))),
                1.0, 1e-5);
    const RoundTrip weak = round_trip(1.0 - 0.999 * smallest, 1.0 - 0.999 * smallest);
    EXPECT_THROW(finesse_from_half_width(weak), core::DomainError);
    EXPECT_GT(finesse(weak), 0.0);
    EXPECT_THROW(finesse_from_half_width(round_trip(1.0, 0.1)), core::DomainError);
    EXPECT_EQ(finesse(round_trip(1.0, 0.1)), 0.0);
}

TEST(RoundTrip, CountsWhatIsLostBetweenTheMirrors) {
    const RoundTrip trip = round_trip(0.1, 0.2, 0.3);
    EXPECT_NEAR(trip.loss, 1.0 - 0.9 * 0.8 * 0.7, 1e-15);
    EXPECT_NEAR(trip.amplitude, std::sqrt(0.9 * 0.8 * 0.7), 1e-15);
    EXPECT_NEAR(trip.amplitude_loss, 1.0 - trip.amplitude, 1e-15);
}

TEST(RoundTrip, RefusesLossesOutOfRangeAndAFinesseWithoutLoss) {
    for (const double bad : {-1e-9, 1.0 + 1e-9, std::numeric_limits<double>::quiet_NaN()}) {
        EXPECT_THROW(round_trip(bad, 0.1), core::DomainError);
        EXPECT_THROW(round_trip(0.1, bad), core::DomainError);
        EXPECT_THROW(round_trip(0.1, 0.1, bad), core::DomainError);
    }
    EXPECT_THROW(finesse(round_trip(0.0, 0.0)), core::DomainError);
    EXPECT_THROW(finesse_from_half_width(round_trip(0.0, 0.0)), core::DomainError);
}

}  // namespace
}  // namespace stillcoat::optics
