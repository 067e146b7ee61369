#include "stillcoat/optics/stop_band.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <iostream>

#include "optics/stacks.hpp"
#include "stillcoat/core/errors.hpp"
#include "support/worst_error.hpp"

namespace stillcoat::optics {
namespace {

using test::relative_error;
using test::WorstError;

std::function<OpticalStack(double)> without_change(const OpticalStack& stack) {
    return [stack](double) { return stack; };
}

/// The edge by brute force: 4e-5 steps in frequency without any cleverness, then a straight line.
double scanned_edge(const OpticalStack& stack, const Illumination& light, int direction,
                    double level) {
    double last = response(stack, light).reflectance;
    for (int j = 1; j < 30000; ++j) {
        const double shift = direction * 4e-5 * j;
        Illumination moved = light;
        moved.wavelength = light.wavelength / (1.0 + shift);
        const double now = response(stack, moved).reflectance;
        if (now < level) {
            const double part = (last - level) / (last - now);
            return light.wavelength / (1.0 + shift - direction * 4e-5 * (1.0 - part));
        }
        last = now;
    }
    return 0.0;
}

TEST(StopBand, ConvergesOnTheClosedFormWithTheSquareOfTheNumberOfPairs) {
    for (const auto& [high, low] : {std::pair(2.07, 1.45), std::pair(3.5, 1.45)}) {
        const double expected = quarter_wave_half_width(high, low);
        double last_error = 0.0;
        for (const int pairs : {10, 20, 40, 80, 160, 200}) {
            const StopBand band = stop_band(
                without_change(quarter_wave_stack(high, low, 2 * pairs, 1.45)), normal_light());
            ASSERT_EQ(band.short_edge.state, EdgeState::found);
            ASSERT_EQ(band.long_edge.state, EdgeState::found);
            EXPECT_TRUE(band.operating_wavelength_inside);
            EXPECT_LE(band.evaluations, 397);
            EXPECT_NEAR(band.centre_wavelength, wavelength_1064, 1e-9 * wavelength_1064);
            const double error = band.relative_half_width - expected;
            std::cout << "  n " << high << "/" << low << ", " << pairs << " pairs: half width "
                      << band.relative_half_width << ", limit " << expected << ", "
                      << band.evaluations << " evaluations\n";
            EXPECT_GT(error, 0.0);
            // First dip of the finite stack: 1/(2 Δ N²) outside, Δ = half width.
            EXPECT_LT(error, 1.3 / (2.0 * expected * pairs * pairs));
            // Twice the pairs, a quarter of the error, with a correction of order 1/N.
            if (pairs >= 40 && pairs <= 160) {  // each twice the one before
                EXPECT_NEAR(last_error / error, 4.0, 32.0 / pairs);
            }
            last_error = error;
        }
    }
}

TEST(StopBand, EdgesAreThoseOfABruteForceScan) {
    const std::uint32_t seed = 901;
    RandomStacks random(seed);
    WorstError worst;
    int most = 0;
    for (int trial = 0; trial < 14; ++trial) {
        OpticalStack stack = quarter_wave_stack(random.between(1.9, 2.6), random.between(1.38, 1.5),
                                                random.count_between(8, 50), 1.45);
        for (OpticalLayer& layer : stack.layers) {
            layer.thickness *= random.between(0.97, 1.03);
            if (trial % 3 == 1) layer.index.imag(random.between(0.0, 3e-3));
        }
        const Polarisation polarisation = trial % 2 == 0 ? Polarisation::s : Polarisation::p;
        const Illumination light{wavelength_1064, trial % 4 == 0 ? 0.4 : 0.0, polarisation};
        const StopBand band = stop_band(without_change(stack), light);
        const std::string where =
            "seed " + std::to_string(seed) + ", trial " + std::to_string(trial);
        const double level = 0.5 * band.top_reflectance;
        const double high = scanned_edge(stack, light, 1, level);
        const double low = scanned_edge(stack, light, -1, level);
        ASSERT_EQ(band.short_edge.state, EdgeState::found) << where;
        ASSERT_EQ(band.long_edge.state, EdgeState::found) << where;
        for (const double error : {relative_error(band.short_edge.wavelength, high),
                                   relative_error(band.long_edge.wavelength, low)}) {
            EXPECT_LE(error, 2e-6) << where;
            worst.see(error, where);
        }
        most = std::max(most, band.evaluations);
    }
    worst.print("edge against a scan, relative");
    std::cout << "  most evaluations: " << most << "\n";
    EXPECT_LE(most, 397);
}

TEST(StopBand, EdgesLieAtHalfOfTheTop) {
    const OpticalStack stack = quarter_wave_stack(2.07, 1.45, 30, 1.45);
    const StopBand band = stop_band(without_change(stack), normal_light(1040e-9));
    for (const StopBandEdge& edge : {band.short_edge, band.long_edge}) {
        EXPECT_NEAR(response(stack, normal_light(edge.wavelength)).reflectance,
                    0.5 * band.top_reflectance, 1e-6);
    }
    EXPECT_LT(band.short_edge.wavelength, 1040e-9);
    EXPECT_GT(band.long_edge.wavelength, 1064e-9);
}

TEST(StopBand, DoesNotDependOnWhereInTheBandTheLightIs) {
    const OpticalStack stack = quarter_wave_stack(2.07, 1.45, 40, 1.45);
    const StopBand centre = stop_band(without_change(stack), normal_light());
    for (const double wavelength : {970e-9, 1000e-9, 1100e-9, 1180e-9}) {
        const StopBand found = stop_band(without_change(stack), normal_light(wavelength));
        EXPECT_TRUE(found.operating_wavelength_inside);
        EXPECT_LE(relative_error(found.short_edge.wavelength, centre.short_edge.wavelength), 1e-8);
        EXPECT_LE(relative_error(found.long_edge.wavelength, centre.long_edge.wavelength), 1e-8);
    }
}

TEST(StopBand, SaysWhenTheLightIsOnTheFarSideOfTheFlank) {
    const OpticalStack stack = quarter_wave_stack(2.07, 1.45, 10, 1.45);
    const StopBand band = stop_band(without_change(stack), normal_light());
    const double outside = band.long_edge.wavelength * 1.01;
    const StopBand seen = stop_band(without_change(stack), normal_light(outside));
    EXPECT_FALSE(seen.operating_wavelength_inside);
    EXPECT_LT(seen.operating_reflectance, 0.5 * seen.top_reflectance);
    EXPECT_LE(relative_error(seen.long_edge.wavelength, band.long_edge.wavelength), 1e-3);
}

TEST(StopBand, FlagsMaterialDataThatEndFirst) {
    const OpticalStack stack = quarter_wave_stack(2.07, 1.45, 30, 1.45);
    const WavelengthRange data{1000e-9, 1100e-9};
    double shortest = 1.0, longest = 0.0;
    const StopBand band = stop_band(
        [&](double wavelength) {
            shortest = std::min(shortest, wavelength);
            longest = std::max(longest, wavelength);
            return stack;
        },
        normal_light(), data);
    EXPECT_EQ(band.short_edge.state, EdgeState::beyond_data);
    EXPECT_EQ(band.long_edge.state, EdgeState::beyond_data);
    EXPECT_GE(shortest, data.shortest);
    EXPECT_LE(longest, data.longest);
    EXPECT_LE(relative_error(shortest, data.shortest), 1e-15);
    EXPECT_LE(relative_error(longest, data.longest), 1e-15);
    EXPECT_EQ(band.short_edge.wavelength, data.shortest);
    EXPECT_EQ(band.long_edge.wavelength, data.longest);
    // Operating at the very end of the data, and one side only.
    const StopBand last = stop_band(without_change(stack), normal_light(), {1064e-9, 3e-6});
    EXPECT_EQ(last.short_edge.state, EdgeState::beyond_data);
    EXPECT_EQ(last.short_edge.wavelength, 1064e-9);
    EXPECT_EQ(last.long_edge.state, EdgeState::found);
}

TEST(StopBand, OfAMetalHasNoEdge) {
    const StopBand band = stop_band(without_change({1.0, {}, Complex(0.2, 6.7)}), normal_light());
    EXPECT_EQ(band.short_edge.state, EdgeState::beyond_search);
    EXPECT_EQ(band.long_edge.state, EdgeState::beyond_search);
    EXPECT_LE(band.evaluations, 397);
}

/// Dispersion: stretching the frequency axis by the index moves the edge to where a stack frozen
/// at that very wavelength has R of half of the top.
TEST(StopBand, FollowsIndicesThatDisperse) {
    const auto stack_at = [](double wavelength) {
        const double um = wavelength * 1e6;
        OpticalStack stack{1.0, {}, 1.45};
        for (int j = 0; j < 40; ++j) {
            const double n = j % 2 == 0 ? 2.0 + 0.05 / (um * um) : 1.44 + 0.01 / (um * um);
            const double at_design =
                j % 2 == 0 ? 2.0 + 0.05 / (1.064 * 1.064) : 1.44 + 0.01 / (1.064 * 1.064);
            stack.layers.push_back({n, wavelength_1064 / (4.0 * at_design)});
        }
        return stack;
    };
    const StopBand band = stop_band(stack_at, normal_light());
    for (const StopBandEdge& edge : {band.short_edge, band.long_edge}) {
        ASSERT_EQ(edge.state, EdgeState::found);
        EXPECT_NEAR(response(stack_at(edge.wavelength), normal_light(edge.wavelength)).reflectance,
                    0.5 * band.top_reflectance, 1e-6);
    }
    const StopBand frozen = stop_band(without_change(stack_at(wavelength_1064)), normal_light());
    EXPECT_LT(band.relative_half_width, frozen.relative_half_width);
}

TEST(StopBand, IsTheSameEachTime) {
    const OpticalStack stack = quarter_wave_stack(2.3, 1.45, 26, 1.45);
    const StopBand a = stop_band(without_change(stack), normal_light());
    const StopBand b = stop_band(without_change(stack), normal_light());
    EXPECT_EQ(a.short_edge.wavelength, b.short_edge.wavelength);
    EXPECT_EQ(a.long_edge.wavelength, b.long_edge.wavelength);
    EXPECT_EQ(a.evaluations, b.evaluations);
}

TEST(StopBand, RefusesAnOperatingWavelengthWithoutData) {
    const OpticalStack stack = quarter_wave_stack(2.3, 1.45, 26, 1.45);
    for (const double bad : {0.0, -1e-6, 2e-6, std::nan("")}) {
        EXPECT_THROW(stop_band(without_change(stack), normal_light(bad), {0.5e-6, 1.5e-6}),
                     core::DomainError);
    }
    EXPECT_THROW(quarter_wave_half_width(0.0, 1.5), core::DomainError);
    EXPECT_THROW(quarter_wave_half_width(1.5, std::nan("")), core::DomainError);
}

/// Closed form from the other end: at the edge the trace of a pair's transfer matrix is −2.
TEST(QuarterWaveHalfWidth, IsWhereThePeriodStopsBeingAPhase) {
    for (const auto& [a, b] : {std::pair(2.07, 1.45), std::pair(1.45, 3.5), std::pair(1.5, 1.49)}) {
        const double phase = 0.5 * std::acos(-1.0) * (1.0 + quarter_wave_half_width(a, b));
        const double c = std::cos(phase), s = std::sin(phase);
        EXPECT_NEAR(c * c - 0.5 * (a / b + b / a) * s * s, -1.0, 1e-14);
    }
    EXPECT_EQ(quarter_wave_half_width(1.5, 1.5), 0.0);
}

}  // namespace
}  // namespace stillcoat::optics
