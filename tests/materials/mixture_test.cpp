/// Rules of mixtures against their equation, bounds, exact relations and difference quotients; the
/// mixture as a material file.

#include "stillcoat/materials/mixture.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <iostream>
#include <random>

#include "stillcoat/core/constants.hpp"
#include "stillcoat/core/errors.hpp"
#include "support/project_library.hpp"
#include "support/written_material.hpp"

namespace {

using namespace stillcoat;
using materials::ComplexJet;
using materials::evaluate;
using materials::index_at;
using materials::Library;
using materials::PropertyId;
using Complex = std::complex<double>;

constexpr unsigned seed = 20261201;

struct Draw {
    std::mt19937_64 engine{seed};
    double operator()(double from, double to) {
        return std::uniform_real_distribution<double>(from, to)(engine);
    }
    Complex index() { return {(*this)(0.05, 5.0), std::pow(10.0, (*this)(-8.0, 1.0))}; }
};

TEST(Bruggeman, AgreesWithTheFixedPointOfItsEquation) {
    // 1/(3ε) = Σ f/(ε_i + 2ε) iterated: a map of the half plane into itself, so it has one fixed
    // point there and goes to it from everywhere.
    Draw draw;
    std::cout << "seed " << seed << "\n";
    int converged = 0;
    for (int i = 0; i < 2000; ++i) {
        const Complex first = std::pow(draw.index(), 2);
        const Complex second = std::pow(draw.index(), 2);
        const double f = draw(0.0, 1.0);
        const Complex got = materials::bruggeman({first}, {second}, f).value;
        EXPECT_GE(got.imag(), 0.0);
        const Complex residual = (1.0 - f) * (first - got) / (first + 2.0 * got) +
                                 f * (second - got) / (second + 2.0 * got);
        EXPECT_LT(std::abs(residual), 1e-11) << first << second << f;
        Complex iterated = std::sqrt(first) * std::sqrt(second);
        Complex change = 1.0;
        for (int n = 0; n < 20000 && std::abs(change) > 1e-14 * std::abs(iterated); ++n) {
            const Complex next =
                1.0 /
                (3.0 * ((1.0 - f) / (first + 2.0 * iterated) + f / (second + 2.0 * iterated)));
            change = 0.5 * (next - iterated);
            iterated += change;
        }
        if (std::abs(change) > 1e-14 * std::abs(iterated)) continue;
        ++converged;
        EXPECT_LT(std::abs(got / iterated - 1.0), 1e-10) << first << second << f;
    }
    EXPECT_GT(converged, 1900);
}

TEST(Bruggeman, LiesBetweenTheBoundsOfWienerAndOfHashinAndShtrikman) {
    Draw draw;
    for (int i = 0; i < 2000; ++i) {
        const double low = draw(0.1, 5.0);
        const double high = low * draw(1.001, 50.0);
        const double f = draw(0.001, 0.999);
        const double got = materials::bruggeman(low, high, f);
        const double parallel = (1.0 - f) * low + f * high;
        const double series = 1.0 / ((1.0 - f) / low + f / high);
        const double lower = low + f / (1.0 / (high - low) + (1.0 - f) / (3.0 * low));
        const double upper = high + (1.0 - f) / (1.0 / (low - high) + f / (3.0 * high));
        EXPECT_LE(series, lower);
        EXPECT_LE(lower, got * (1.0 + 1e-14)) << low << " " << high << " " << f;
        EXPECT_LE(got, upper * (1.0 + 1e-14)) << low << " " << high << " " << f;
        EXPECT_LE(upper, parallel * (1.0 + 1e-14));
        // The same whichever is called the first.
        EXPECT_NEAR(materials::bruggeman(high, low, 1.0 - f) / got, 1.0, 1e-13);
    }
}

TEST(Bruggeman, GoesFromOneConstituentToTheOtherWithoutAJump) {
    const Complex metal = std::pow(Complex(0.26, 6.97), 2);
    const Complex glass = std::pow(Complex(1.45, 0.0), 2);
    EXPECT_EQ(materials::bruggeman({glass}, {metal}, 0.0).value, glass);
    EXPECT_EQ(materials::bruggeman({glass}, {metal}, 1.0).value, metal);
    Complex before = glass;
    constexpr int steps = 20000;
    for (int i = 1; i <= steps; ++i) {
        const Complex here = materials::bruggeman({glass}, {metal}, i / double(steps)).value;
        EXPECT_LT(std::abs(here - before), 0.1) << i;
        EXPECT_GE(here.imag(), 0.0) << i;
        before = here;
    }
    // A few grains: the polarisability of a sphere.
    const double few = 1e-6;
    const Complex slope = (materials::bruggeman({glass}, {metal}, few).value - glass) / few;
    EXPECT_LT(std::abs(slope / (3.0 * glass * (metal - glass) / (metal + 2.0 * glass)) - 1.0),
              1e-4);
}

TEST(Bruggeman, HasTheDerivativesOfItsDifferenceQuotients) {
    Draw draw;
    for (int i = 0; i < 100; ++i) {
        const ComplexJet first(std::pow(draw.index(), 2), {draw(-1, 1), draw(0, 1)}, draw(-1, 1));
        const ComplexJet second(std::pow(draw.index(), 2), {draw(-1, 1), draw(0, 1)}, draw(-1, 1));
        const double f = draw(0.05, 0.95);
        const auto at = [&](double x) {
            const auto line = [x](const ComplexJet& jet) {
                const Complex value = jet.value + x * jet.first + 0.5 * x * x * jet.second;
                return ComplexJet(Complex(value.real(), std::abs(value.imag())));
            };
            return materials::bruggeman(line(first), line(second), f).value;
        };
        const double h = 1e-4 * std::min(first.value.imag(), second.value.imag());
        if (h < 1e-6) continue;
        const ComplexJet got = materials::bruggeman(first, second, f);
        const Complex quotient = (at(h) - at(-h)) / (2.0 * h);
        EXPECT_LT(std::abs(got.first - quotient), 1e-6 * (1.0 + std::abs(quotient)));
    }
}

TEST(Bruggeman, RefusesWhatHasNoAnswer) {
    EXPECT_THROW(materials::bruggeman(1.0, 2.0, 1.1), core::DomainError);
    EXPECT_THROW(materials::bruggeman(0.0, 2.0, 0.5), core::DomainError);
    EXPECT_THROW(materials::bruggeman({Complex(1, -1)}, {Complex(2, 0)}, 0.5), core::DomainError);
    EXPECT_THROW(materials::bruggeman({Complex(-9, 0)}, {Complex(2, 0)}, 0.5), core::DomainError);
    EXPECT_THROW(materials::bruggeman(1.0, 2.0, std::nan("")), core::DomainError);
    EXPECT_THROW(materials::voigt_reuss_hill({1e9, 0.5}, {1e9, 0.2}, 0.5), core::DomainError);
    EXPECT_THROW(materials::mixed_density(0.0, 1.0, 0.5), core::DomainError);
}

/// E and ν of a solid with these moduli.
materials::Elasticity solid(double bulk, double shear) {
    return {9.0 * bulk * shear / (3.0 * bulk + shear),
            (3.0 * bulk - 2.0 * shear) / (2.0 * (3.0 * bulk + shear))};
}

TEST(VoigtReussHill, IsTheExampleDoneByHand) {
    // K: 40 and 200 GPa, a quarter of the second: 80 (Voigt), 50 (Reuss), 65. G: 30 and 120 GPa:
    // 52.5, 480/13, mean 2325/52. E = 9KG/(3K + G) = 26156.25/(12465/52) GPa,
    // ν = (195 − 2325/26)/(2 · 12465/52).
    const auto mixed = materials::voigt_reuss_hill(solid(40e9, 30e9), solid(200e9, 120e9), 0.25);
    EXPECT_NEAR(mixed.youngs_modulus / 109.1155234657e9, 1.0, 1e-12);
    EXPECT_NEAR(mixed.poisson_ratio / 0.2202166065, 1.0, 1e-9);
}

TEST(VoigtReussHill, LiesBetweenItsBoundsAndEndsAtItsConstituents) {
    Draw draw;
    for (int i = 0; i < 1000; ++i) {
        const materials::Elasticity a{draw(1e9, 500e9), draw(-0.5, 0.45)};
        const materials::Elasticity b{draw(1e9, 500e9), draw(-0.5, 0.45)};
        const double f = draw(0.0, 1.0);
        const auto shear = [](const materials::Elasticity& x) {
            return x.youngs_modulus / (2.0 * (1.0 + x.poisson_ratio));
        };
        const auto mixed = materials::voigt_reuss_hill(a, b, f);
        EXPECT_LE(shear(mixed), ((1.0 - f) * shear(a) + f * shear(b)) * (1.0 + 1e-12));
        EXPECT_GE(shear(mixed), 1.0 / ((1.0 - f) / shear(a) + f / shear(b)) * (1.0 - 1e-12));
        EXPECT_EQ(materials::voigt_reuss_hill(a, b, 0.0).poisson_ratio, a.poisson_ratio);
        EXPECT_EQ(materials::voigt_reuss_hill(a, b, 1.0).youngs_modulus, b.youngs_modulus);
        const auto same = materials::voigt_reuss_hill(a, a, f);
        EXPECT_NEAR(same.youngs_modulus / a.youngs_modulus, 1.0, 1e-12);
        EXPECT_NEAR(same.poisson_ratio, a.poisson_ratio, 1e-12);
    }
}

TEST(TurnerExpansion, ObeysTheExactRelationOfExpansionAndBulkModulus) {
    // V. M. Levin (1967): α is linear in 1/K between the constituents, whatever the grains look
    // like. Turner's α belongs to the K of equal volume strain, that of Voigt.
    Draw draw;
    for (int i = 0; i < 1000; ++i) {
        const double k1 = draw(10e9, 300e9);
        const double k2 = draw(10e9, 300e9);
        if (std::abs(k1 / k2 - 1.0) < 0.01) continue;
        const double a1 = draw(-1e-6, 1e-5);
        const double a2 = draw(-1e-6, 1e-5);
        const double f = draw(0.0, 1.0);
        const double k = (1.0 - f) * k1 + f * k2;
        const double exact = a1 + (a2 - a1) * (1.0 / k - 1.0 / k1) / (1.0 / k2 - 1.0 / k1);
        const double got = materials::turner_expansion({a1, solid(k1, draw(5e9, 200e9))},
                                                       {a2, solid(k2, draw(5e9, 200e9))}, f);
        EXPECT_NEAR(got, exact, 1e-10 * 1e-5) << k1 << " " << k2;
    }
}

TEST(MixedSpecificHeat, KeepsTheHeatOfBothPerVolume) {
    const double density = materials::mixed_density(2200.0, 3900.0, 0.25);
    EXPECT_DOUBLE_EQ(density, 2625.0);
    EXPECT_NEAR(density * materials::mixed_specific_heat({2200.0, 740.0}, {3900.0, 690.0}, 0.25),
                0.75 * 2200.0 * 740.0 + 0.25 * 3900.0 * 690.0, 1e-6);
}

std::string mixture(const std::string& first, const std::string& second,
                    const std::string& fraction) {
    return "[mixture]\nof = [\"" + first + "\", \"" + second +
           "\"]\nvolume_fraction = " + fraction + "\nsource = [\"here\"]\n";
}

const std::vector<PropertyId> derived{
    PropertyId::refractive_index, PropertyId::extinction_coefficient,
    PropertyId::youngs_modulus,   PropertyId::poisson_ratio,
    PropertyId::density,          PropertyId::thermal_conductivity,
    PropertyId::specific_heat,    PropertyId::thermal_expansion};

TEST(Mixture, IsAConstituentAtItsEndsAndBetweenThemElsewhere) {
    Library library = test::project_library();
    test::add(library, "none", mixture("silica-ibs", "titania-ibs", "0"));
    test::add(library, "all", mixture("silica-ibs", "titania-ibs", "1"));
    test::add(library, "some", mixture("silica-ibs", "titania-ibs", "0.25"));
    core::Problems problems;
    materials::check_links(library, problems);
    EXPECT_TRUE(problems.empty());
    for (const double t : {20.0, 124.0, 295.0}) {
        for (const PropertyId id : derived) {
            const materials::Conditions at{t, 1064e-9, 100.0};
            const auto value = [&](const char* name) { return evaluate(library, name, id, at); };
            const auto first = value("silica-ibs");
            const auto second = value("titania-ibs");
            ASSERT_EQ(value("some").known(), first.known() && second.known());
            if (!value("some").known()) continue;
            const double a = *first.number;
            const double b = *second.number;
            EXPECT_NEAR(*value("none").number, a, 1e-14 * std::abs(a));
            EXPECT_NEAR(*value("all").number, b, 1e-14 * std::abs(b));
            EXPECT_GT(*value("some").number, std::min(a, b)) << materials::info(id).key;
            EXPECT_LT(*value("some").number, std::max(a, b)) << materials::info(id).key;
            // Its own entry first, then the data of both.
            const auto bases = value("some").bases;
            EXPECT_EQ(bases.at(0).material, "some");
            EXPECT_EQ(materials::nature_of(bases.at(0)), "derived");
            for (const auto* part : {&first, &second}) {
                for (const auto& basis : part->bases) {
                    EXPECT_TRUE(std::any_of(bases.begin(), bases.end(), [&](const auto& other) {
                        return other.entry == basis.entry && other.part == basis.part;
                    }));
                }
            }
        }
    }
    const auto loss = evaluate(library, "some", PropertyId::loss_angle, {295.0, 1e-6, 1.0});
    EXPECT_EQ(loss.missing,
              "loss angle of some unknown: a mixture's loss angle follows from no rule: give it");
    const auto index = index_at(library, "some", 1064e-9, 295.0);
    EXPECT_EQ(materials::place_of(index.bases.at(0)),
              "effective medium of Bruggeman on the complex n²");
    EXPECT_EQ(materials::sources_of(index.bases.at(0)),
              (std::vector<std::string>{"here", "Bruggeman1935"}));
    EXPECT_EQ(library.references.count("Bruggeman1935"), 1u);
}

TEST(Mixture, HasTheDispersionOfItsDifferenceQuotient) {
    Library library = test::project_library();
    test::add(library, "inner", mixture("silica-ibs", "gold-film", "0.2"));
    test::add(library, "outer", mixture("inner", "titania-ibs", "0.3"));
    for (const char* name : {"inner", "outer"}) {
        const auto complex_index = [&](double omega) {
            const double wavelength = 2.0 * core::pi * core::speed_of_light / omega;
            const auto k = materials::with_dispersion(
                evaluate(library, name, PropertyId::extinction_coefficient,
                         {295.0, wavelength, 1.0}),
                false, wavelength);
            const auto n = index_at(library, name, wavelength, 295.0);
            EXPECT_TRUE(n.index) << n.missing;
            return std::pair{*n.index, k};
        };
        const double omega = 2.0 * core::pi * core::speed_of_light / 1064e-9;
        const double h = 1e-4 * omega;
        const auto [n, k] = complex_index(omega);
        const auto [n_up, k_up] = complex_index(omega + h);
        const auto [n_down, k_down] = complex_index(omega - h);
        EXPECT_GT(k.value, 1e-3);
        EXPECT_NEAR(n.first / ((n_up.value - n_down.value) / (2.0 * h)), 1.0, 1e-5) << name;
        EXPECT_NEAR(k.first / ((k_up.value - k_down.value) / (2.0 * h)), 1.0, 1e-5) << name;
        EXPECT_NEAR(n.second / ((n_up.first - n_down.first) / (2.0 * h)), 1.0, 1e-3) << name;
        EXPECT_NEAR(k.second / ((k_up.first - k_down.first) / (2.0 * h)), 1.0, 1e-3) << name;
    }
}

TEST(Mixture, TakesTheWidthsOfItsDataAndOfItsFraction) {
    Library library;
    const auto density = [](const std::string& value, const std::string& width) {
        return "[density]\nvalue = " + value + "\nunit = \"kg/m3\"\nat_temperature_K = 295\n" +
               width +
               "\nsource = [\"here\"]\nplace = \"p\"\nmeasured_at = \"m\"\nnature = "
               "\"measured\"\nstatus = \"seen\"\n" +
               test::warm;
    };
    test::add(library, "light", density("2000", "uncertainty = 40"));
    test::add(library, "heavy", density("4000", "relative_uncertainty = 0.03"));
    test::add(library, "vague", density("4000", "uncertainty = \"not stated\""));
    test::add(library, "mix", mixture("light", "heavy", "0.25") + "uncertainty = 0.02\n");
    test::add(library, "half", mixture("light", "vague", "0.5"));
    const auto of = [&](const char* name) {
        return evaluate(library, name, PropertyId::density, {295.0, 1e-6, 1.0});
    };
    // 0.75 · 40, 0.25 · 120, 2000 · 0.02 in quadrature.
    EXPECT_EQ(of("mix").width.form, materials::Width::Form::absolute);
    EXPECT_NEAR(of("mix").width.value, std::sqrt(30.0 * 30.0 + 30.0 * 30.0 + 40.0 * 40.0), 1e-4);
    EXPECT_EQ(of("half").width.form, materials::Width::Form::not_stated);
    // What it states itself counts before any rule.
    test::add(library, "own",
              mixture("light", "heavy", "0.25") + density("2222", "uncertainty = 1"));
    EXPECT_EQ(of("own").number, 2222.0);
    EXPECT_EQ(of("own").bases.size(), 1u);
}

TEST(Mixture, OfItselfOrOfNothingIsRefused) {
    test::mentions(test::problems_of(mixture("film", "x", "0.5")), "names the mixture itself");
    test::mentions(test::problems_of(mixture("x", "x", "0.5")), "must name two materials");
    test::mentions(test::problems_of(mixture("x", "y", "1.5")), "volume_fraction in [mixture]");
    test::mentions(test::problems_of("[mixture]\nof = [\"x\", \"y\"]\nvolume_fraction = 0.5\n"),
                   "source is missing in [mixture]");
    const auto faults = [](const std::string& of_film) {
        return test::messages([&](core::Problems& problems) {
            Library library = test::project_library();
            test::add(library, "other", mixture("film", "silica-ibs", "0.5"));
            test::add(library, "film", mixture(of_film, "silica-ibs", "0.5"));
            materials::check_links(library, problems);
        });
    };
    test::mentions(faults("other"), "[mixture] refers to other materials in a circle");
    EXPECT_EQ(faults("other").size(), 2u);  // of film and of other, once each
    test::mentions(faults("titania-ib"),
                   "[mixture] refers to the unknown material \"titania-ib\" | did you mean "
                   "\"titania-ibs\"?");
    EXPECT_EQ(faults("titania-ib").size(), 1u);
}

}  // namespace
