/// Reflection and transmission against closed forms of the textbooks, written here with angles and
/// Fresnel coefficients (M. Born & E. Wolf, Principles of Optics, §1.5, §1.6, §7.6).

#include <gtest/gtest.h>

#include <cmath>
#include <limits>

#include "optics/stacks.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/optics/response.hpp"
#include "support/worst_error.hpp"

namespace stillcoat::optics {
namespace {

using test::relative_error;

constexpr Complex i(0.0, 1.0);

/// Cosine of the angle in a medium by Snell's law, on the branch that decays downwards.
Complex cosine_in(Complex n, double n0, double angle) {
    const Complex sine = n0 * std::sin(angle) / n;
    Complex cosine = std::sqrt(1.0 - sine * sine);
    if ((n * cosine).imag() < 0.0) cosine = -cosine;
    return cosine;
}

/// Ratio of tangential electric fields, from medium a to medium b.
Complex fresnel(Complex na, Complex ca, Complex nb, Complex cb, Polarisation polarisation) {
    return polarisation == Polarisation::s ? (na * ca - nb * cb) / (na * ca + nb * cb)
                                           : (na * cb - nb * ca) / (na * cb + nb * ca);
}

TEST(Interface, ReflectsAsFresnelSays) {
    for (const Complex n1 : {Complex(1.45), Complex(3.5), Complex(0.2, 6.7), Complex(2.0, 1e-4)}) {
        for (const double angle : {0.0, 0.3, 0.9, 1.3, 1.55}) {
            for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
                const double n0 = 1.3;
                const Complex c1 = cosine_in(n1, n0, angle);
                const double c0 = std::cos(angle);
                const Complex r = fresnel(n0, c0, n1, c1, polarisation);
                const Response found = response({n0, {}, n1}, {800e-9, angle, polarisation});
                EXPECT_LE(std::abs(found.reflection - r), 1e-15);
                EXPECT_NEAR(found.transmittance, 1.0 - std::norm(r), 1e-15);
                EXPECT_EQ(found.loss, found.transmittance);
            }
        }
    }
}

TEST(Interface, TransmitsAsFresnelSaysWithoutTakingADifference) {
    const double n0 = 1.0, n1 = 1.5, angle = 1.5707;  // grazing: T of about 1e-4
    const double c0 = std::cos(angle), c1 = cosine_in(n1, n0, angle).real();
    const double s = 4.0 * n0 * c0 * n1 * c1 / std::pow(n0 * c0 + n1 * c1, 2);
    const double p = 4.0 * n0 * c0 * n1 * c1 / std::pow(n0 * c1 + n1 * c0, 2);
    EXPECT_LE(
        relative_error(response({n0, {}, n1}, {1e-6, angle, Polarisation::s}).transmittance, s),
        1e-15);
    EXPECT_LE(
        relative_error(response({n0, {}, n1}, {1e-6, angle, Polarisation::p}).transmittance, p),
        1e-15);
}

TEST(Interface, PolarisationsAgreeAtNormalIncidence) {
    RandomStacks random(71);
    for (int trial = 0; trial < 20; ++trial) {
        const OpticalStack stack = random.stack(0.1, false);
        const Response s = response(stack, {1e-6, 0.0, Polarisation::s});
        const Response p = response(stack, {1e-6, 0.0, Polarisation::p});
        EXPECT_LE(std::abs(s.reflection - p.reflection), 3e-15);
        EXPECT_LE(relative_error(p.transmittance, s.transmittance), 4e-15);
        EXPECT_NEAR(p.absorptance, s.absorptance, 1e-15);
    }
}

TEST(Interface, ReflectsNothingOfPLightAtBrewstersAngle) {
    const double n0 = 1.0, n1 = 1.45;
    const double angle = std::atan(n1 / n0);
    const Response p = response({n0, {}, n1}, {wavelength_1064, angle, Polarisation::p});
    EXPECT_LE(std::abs(p.reflection), 1e-15);
    EXPECT_NEAR(p.transmittance, 1.0, 1e-15);
    const Response s = response({n0, {}, n1}, {wavelength_1064, angle, Polarisation::s});
    const double expected = std::pow((n1 * n1 - n0 * n0) / (n1 * n1 + n0 * n0), 2);
    EXPECT_LE(relative_error(s.reflectance, expected), 1e-15);
}

TEST(Interface, ReflectsTotallyBeyondTheCriticalAngle) {
    const double n0 = 1.45, n1 = 1.0;
    for (const double angle : {0.8, 1.0, 1.4}) {
        const double kappa = std::sqrt(std::pow(n0 * std::sin(angle), 2) - n1 * n1);
        const double s_phase = -2.0 * std::atan(kappa / (n0 * std::cos(angle)));
        const double p_phase = 2.0 * std::atan(n1 * n1 * std::cos(angle) / (n0 * kappa));
        for (const auto& [polarisation, phase] :
             {std::pair(Polarisation::s, s_phase), std::pair(Polarisation::p, p_phase)}) {
            const Response found = response({n0, {}, n1}, {wavelength_1064, angle, polarisation});
            EXPECT_LE(std::abs(found.reflection - std::exp(i * phase)), 1e-15);
            EXPECT_EQ(found.transmittance, 0.0);
            EXPECT_EQ(found.log_transmittance, -std::numeric_limits<double>::infinity());
            EXPECT_EQ(found.loss, 0.0);
        }
    }
}

TEST(Interface, ReflectsTotallyBelowAnyLosslessStack) {
    RandomStacks random(72);
    for (int trial = 0; trial < 40; ++trial) {
        OpticalStack stack = random.stack(0.0, true);
        stack.incident_index = 1.5;
        stack.substrate_index = 1.0;
        Illumination light = random.light();
        light.angle = random.between(0.75, 1.5);
        const Response found = response(stack, light);
        EXPECT_NEAR(found.reflectance, 1.0, 2e-15);
        EXPECT_EQ(found.transmittance, 0.0);
    }
}

TEST(Slab, FollowsAirysSummation) {
    for (const Complex n1 : {Complex(2.2), Complex(2.2, 1e-3), Complex(0.3, 3.0), Complex(1.05)}) {
        for (const double angle : {0.0, 0.6, 1.2}) {
            for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
                for (const double d : {0.0, 1e-10, 37e-9, 220e-9, 5e-6}) {
                    const double n0 = 1.0;
                    const Complex n2 = 1.6;
                    const Complex c1 = cosine_in(n1, n0, angle), c2 = cosine_in(n2, n0, angle);
                    const Complex r01 = fresnel(n0, std::cos(angle), n1, c1, polarisation);
                    const Complex r12 = fresnel(n1, c1, n2, c2, polarisation);
                    const Complex trip =
                        std::exp(2.0 * i * 2.0 * core::pi / wavelength_1064 * n1 * c1 * d);
                    const Complex r = (r01 + r12 * trip) / (1.0 + r01 * r12 * trip);
                    const Response found =
                        response({n0, {{n1, d}}, n2}, {wavelength_1064, angle, polarisation});
                    EXPECT_LE(std::abs(found.reflection - r), 2e-14);
                }
            }
        }
    }
}

TEST(Slab, TransmitsAsAirysFunction) {
    const double n1 = 2.2, r = (n1 - 1.0) / (n1 + 1.0);
    const double coefficient = 4.0 * r * r / std::pow(1.0 - r * r, 2);
    for (const double d : {10e-9, 100e-9, 333e-9, 1.2e-6}) {
        const double delta = 2.0 * core::pi * n1 * d / wavelength_1064;
        const double expected = 1.0 / (1.0 + coefficient * std::pow(std::sin(delta), 2));
        const Response found = response({1.0, {{n1, d}}, 1.0}, normal_light());
        EXPECT_LE(relative_error(found.transmittance, expected), 1e-15);
    }
}

TEST(Slab, OfAHalfWaveIsAbsent) {
    for (int order = 1; order <= 4; ++order) {
        const double d = order * wavelength_1064 / (2.0 * 2.07);
        const Response with = response({1.0, {{2.07, d}}, 1.45}, normal_light());
        const Response without = response({1.0, {}, 1.45}, normal_light());
        EXPECT_LE(std::abs(with.reflection - without.reflection), 2e-15);
        EXPECT_LE(relative_error(with.transmittance, without.transmittance), 1e-15);
    }
}

TEST(Slab, OfAQuarterWaveOfTheGeometricMeanReflectsNothing) {
    const double n = std::sqrt(1.45);
    const Response found =
        response({1.0, {{n, wavelength_1064 / (4.0 * n)}}, 1.45}, normal_light());
    EXPECT_LE(std::abs(found.reflection), 1e-15);
    EXPECT_NEAR(found.transmittance, 1.0, 1e-15);
}

TEST(QuarterWaveStack, ReflectsAndTransmitsAsTheClosedFormSays) {
    const double high = 2.07, low = 1.45, substrate = 1.52, n0 = 1.1;
    for (const int layers : {1, 2, 3, 10, 21, 40, 61}) {
        for (const bool high_first : {true, false}) {
            const double first = high_first ? high : low, next = high_first ? low : high;
            double admittance = substrate;
            for (int j = layers; j-- > 0;) {
                const double n = j % 2 == 0 ? first : next;
                admittance = n * n / admittance;
            }
            const Response found =
                response(quarter_wave_stack(first, next, layers, substrate, wavelength_1064, n0),
                         normal_light());
            const double r = (n0 - admittance) / (n0 + admittance);
            const double t = 4.0 * n0 * admittance / std::pow(n0 + admittance, 2);
            EXPECT_LE(std::abs(found.reflection - r), 5e-15) << layers;
            EXPECT_LE(relative_error(found.transmittance, t), 1e-13) << layers;
            EXPECT_NEAR(found.log_transmittance, std::log(t), 1e-13) << layers;
        }
    }
}

TEST(FrustratedTotalReflection, TunnelsAsTheClosedFormSays) {
    // One gap between equal media: T = 1/(1 + ((η1² + η2²)/(2 η1 η2))² sinh² δ).
    const double n = 1.5, gap_index = 1.0, angle = 0.9;
    const double kappa = std::sqrt(std::pow(n * std::sin(angle), 2) - gap_index * gap_index);
    for (const double gap : {1e-9, 50e-9, 300e-9, 1e-6, 5e-6, 40e-6}) {
        const double delta = 2.0 * core::pi * kappa * gap / wavelength_1064;
        for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
            const bool s = polarisation == Polarisation::s;
            const double eta1 = s ? n * std::cos(angle) : n / std::cos(angle);
            const double eta2 = s ? kappa : gap_index * gap_index / kappa;
            const double mismatch = (eta1 * eta1 + eta2 * eta2) / (2.0 * eta1 * eta2);
            const Response found =
                response({n, {{gap_index, gap}}, n}, {wavelength_1064, angle, polarisation});
            const double expected = 1.0 / (1.0 + std::pow(mismatch * std::sinh(delta), 2));
            EXPECT_LE(relative_error(found.transmittance, expected), 5e-15) << gap;
            EXPECT_NEAR(found.reflectance + found.transmittance, 1.0, 2e-15);
        }
    }
}

TEST(CriticalAngle, LayerTransmitsAsItsLimit) {
    // q = 0 in the layer: E rises as a straight line, T = 4 η0 ηs/[(η0 + ηs)² + (k0 d a η0 ηs or k0
    // d b)²].
    const double n0 = 2.0, angle = core::pi / 6.0;
    const double n1 = n0 * std::sin(angle);
    const double d = 300e-9, path = 2.0 * core::pi / wavelength_1064 * d, ns = 1.7;
    const double cs = cosine_in(ns, n0, angle).real();
    const double eta0 = n0 * std::cos(angle), etas = ns * cs;
    const double s =
        4.0 * eta0 * etas / (std::pow(eta0 + etas, 2) + std::pow(path * eta0 * etas, 2));
    const Response found = response({n0, {{n1, d}}, ns}, {wavelength_1064, angle, Polarisation::s});
    EXPECT_LE(relative_error(found.transmittance, s), 1e-15);
    const double p0 = n0 / std::cos(angle), ps = ns / cs;
    const double p = 4.0 * p0 * ps / (std::pow(p0 + ps, 2) + std::pow(path * n1 * n1, 2));
    const Response found_p =
        response({n0, {{n1, d}}, ns}, {wavelength_1064, angle, Polarisation::p});
    EXPECT_LE(relative_error(found_p.transmittance, p), 1e-15);
}

}  // namespace
}  // namespace stillcoat::optics
