/// The layered heat equation at one wavenumber, and the integral over wavenumbers.

#include "noise/layered_heat.hpp"

#include <gtest/gtest.h>

#include "noise/collocation.hpp"
#include "noise/mirrors.hpp"
#include "noise/wavenumber_rule.hpp"

namespace stillcoat::noise {
namespace {

SourceProducts products(const Mirror& mirror, double k, double omega) {
    return source_products(layered_heat(mirror.substrate, mirror.layers), k, omega);
}

SourceProducts integrated(const Mirror& mirror, double w, double frequency, int subdivision) {
    const LayeredHeat stack = layered_heat(mirror.substrate, mirror.layers);
    const double omega = 2.0 * core::pi * frequency;
    const WavenumberRule rule = wavenumber_rule(w, diffusion_wavenumber(stack, omega), subdivision);
    SourceProducts sum;
    for (std::size_t i = 0; i < rule.weight.size(); ++i) {
        const SourceProducts p = source_products(stack, rule.wavenumber[i], omega);
        const double q = rule.weight[i];
        sum = {sum.ee + q * p.ee, sum.er + q * p.er, sum.rr + q * p.rr,    sum.es + q * p.es,
               sum.rs + q * p.rs, sum.ss + q * p.ss, sum.bare + q * p.bare};
    }
    return sum;
}

/// Largest difference; mixed terms are measured against the geometric mean of the two squares.
double difference(const SourceProducts& a, const SourceProducts& b) {
    const double scales[] = {
        b.ee,  std::sqrt(b.ee * b.rr), b.rr, std::sqrt(b.ee * b.ss), std::sqrt(b.rr * b.ss), b.ss,
        b.bare};
    const double gaps[] = {a.ee - b.ee, a.er - b.er, a.rr - b.rr,    a.es - b.es,
                           a.rs - b.rs, a.ss - b.ss, a.bare - b.bare};
    double worst = 0.0;
    for (int i = 0; i < 7; ++i) {
        if (gaps[i] != 0.0) worst = std::max(worst, std::abs(gaps[i]) / scales[i]);
    }
    return worst;
}

TEST(LayeredHeat, EqualsCollocationForRandomMirrors) {
    constexpr std::uint32_t seed = 20240311;
    SCOPED_TRACE(seed);
    RandomMirrors random(seed);
    WorstError worst;
    for (int i = 0; i < 24; ++i) {
        const Mirror mirror = random.mirror(1 + i % 3, i % 2 ? 0.3 : 0.0, i % 3 == 0);
        const double omega = random.spread(1e-3, 1e8), k = random.spread(1e-1, 4e5);
        double phase = 0.0;
        for (const ThermalLayer& layer : mirror.layers) {
            for (const optics::ReadoutTerm& term : layer.readout.terms) {
                phase = std::max(phase, 0.5 * std::abs(term.rate) * layer.readout.thickness);
            }
        }
        const auto exact = collocation::products(mirror, k, omega, phase < 5.0 ? 40 : 70);
        const SourceProducts here = products(mirror, k, omega);
        SourceProducts expected;
        expected.ee = double(real(exact[0][0]));
        expected.er = double(real(exact[0][1]));
        expected.rr = double(real(exact[1][1]));
        expected.es = double(real(exact[2][0]));
        expected.rs = double(real(exact[2][1]));
        expected.ss = double(real(exact[2][2]));
        expected.bare = here.bare;
        worst.see(difference(here, expected), "sample " + std::to_string(i));
        // The operator is symmetric: what e does to r is what r does to e.
        const double scale = std::sqrt(expected.ee * expected.rr);
        EXPECT_NEAR(double(real(exact[1][0])) / scale, here.er / scale, 1e-13);
        const double with_substrate = std::sqrt(expected.ee * expected.ss);
        EXPECT_NEAR(double(real(exact[0][2])) / with_substrate, here.es / with_substrate, 9e-14);
    }
    worst.print("layered heat against collocation");
    EXPECT_LT(worst.error(), 4e-13);
}

TEST(LayeredHeat, EqualsCollocationThroughALayerAtItsCriticalAngle) {
    WorstError worst;
    for (const optics::Polarisation polarisation :
         {optics::Polarisation::s, optics::Polarisation::p}) {
        for (const double relative : {-1e-3, 0.0, 1e-9}) {
            const double angle = 0.25 * pi, beta = 1.45 * std::sin(angle);
            const optics::OpticalStack stack{
                1.45, {{2.07, 9e-8}, {beta * (1.0 + relative), 2e-7}, {2.07, 1.3e-7}}, 1.75};
            Mirror mirror{silica,
                          {{tantala, 1.4e-5, {}}, {silica, -8e-5, {}}, {tantala, 1.4e-5, {}}}};
            const std::vector<optics::ReadoutLayer> weights = optics::readout_weights(
                optics::standing_wave(stack, {1064e-9, angle, polarisation}),
                std::vector<optics::Photoelasticity>(3, {0.12, 0.27}));
            for (std::size_t j = 0; j < 3; ++j) mirror.layers[j].readout = weights[j];
            for (const double omega : {1.0, 1e7}) {
                const auto exact = collocation::products(mirror, 2e3, omega, 40);
                const SourceProducts here = products(mirror, 2e3, omega);
                SourceProducts expected = here;
                expected.ee = double(real(exact[0][0]));
                expected.er = double(real(exact[0][1]));
                expected.rr = double(real(exact[1][1]));
                expected.rs = double(real(exact[2][1]));
                worst.see(difference(here, expected), std::to_string(relative));
            }
        }
    }
    worst.print("layered heat with a critical layer against collocation");
    EXPECT_LT(worst.error(), 1e-12);
}

TEST(LayeredHeat, EqualsTheSlabOfTheSubstratesMatterAtEveryThickness) {
    // Even source to depth h in a half-space: ∫ϑ dz = [h − (1 − e^{−2γh})/(2γ)]/(κγ²), in long
    // double.
    using Number = std::complex<long double>;
    WorstError worst;
    for (double h = 1e-9; h < 2e-2; h *= 10.0) {
        for (double omega = 1e-3; omega < 1e10; omega *= 10.0) {
            for (const double k : {1.0, 1e3, 1e5}) {
                const Mirror mirror{silica, {{silica, 0.0, surface_weight(h)}}};
                const long double square = (long double)k * k;
                const Number gamma_squared(square, (long double)omega * 1.64e6L / 1.38L);
                const Number x = std::sqrt(gamma_squared) * (long double)h;
                Number shape = 1.0L - (1.0L - std::exp(-2.0L * x)) / (2.0L * x);
                if (std::abs(x) < 0.3L) {  // Σ −(−2x)^n/(n+1)!
                    Number term = 1.0L;
                    shape = 0.0L;
                    for (int n = 1; n < 30; ++n) {
                        term *= -2.0L * x / (long double)(n + 1);
                        shape -= term;
                    }
                }
                const double q = 2.0 * 1.17 * 5.1e-7;
                const double exact =
                    double(std::real((long double)(q * q * h / 1.38) * shape / gamma_squared));
                worst.see(relative_error(products(mirror, k, omega).ee, exact),
                          "h = " + std::to_string(h * 1e9) + " nm, omega = " +
                              std::to_string(omega) + ", k = " + std::to_string(k));
            }
        }
    }
    worst.print("one slab, 1 nm to 10 mm, 1 mHz to 1 GHz");
    EXPECT_LT(worst.error(), 5e-15);
}

TEST(LayeredHeat, StaysFiniteInAThickAbsorbingLayerAtAGigahertz) {
    Mirror mirror = quarter_wave_mirror(true, 2, 0.5);
    mirror.layers[1].readout.thickness = 5e-3;
    for (optics::ReadoutTerm& term : mirror.layers[1].readout.terms) {
        if (term.upwards) term.strain = term.index = 0.0;
    }
    const SourceProducts p = products(mirror, 1e3, 2.0 * core::pi * 1e9);
    for (const double value : {p.ee, p.er, p.rr, p.es, p.rs, p.ss, p.bare}) {
        EXPECT_TRUE(std::isfinite(value));
    }
    EXPECT_GT(p.ee, 0.0);
    EXPECT_GT(p.rr, 0.0);
}

TEST(LayeredHeat, AbsorptionThatVanishesMeetsTheTransparentForm) {
    // Four exponentials (absorbing) against two (transparent).
    const SourceProducts transparent = products(quarter_wave_mirror(false, 6), 2e3, 1e4);
    const SourceProducts absorbing = products(quarter_wave_mirror(false, 6, 1e-14), 2e3, 1e4);
    EXPECT_LT(difference(absorbing, transparent), 1e-14);
}

TEST(LayeredHeat, LayerWithoutThicknessChangesNothing) {
    const Mirror mirror = quarter_wave_mirror(true, 3);
    Mirror more = mirror;
    ThermalLayer empty = mirror.layers[2];
    empty.readout.thickness = 0.0;
    more.layers.insert(more.layers.begin() + 2, empty);
    EXPECT_LT(difference(products(more, 1e3, 1e4), products(mirror, 1e3, 1e4)), 1e-15);
    const SourceProducts bare = products({silica, {}}, 1e3, 1e4);
    EXPECT_NEAR(bare.ss / bare.bare, 1.0, 1e-15);
    EXPECT_EQ(bare.ee, 0.0);
}

TEST(WavenumberRule, HasConvergedFromTenthOfAMillihertzToAMegahertz) {
    constexpr std::uint32_t seed = 20240312;
    SCOPED_TRACE(seed);
    RandomMirrors random(seed);
    std::vector<Mirror> mirrors{quarter_wave_mirror(true, 4), quarter_wave_mirror(false, 4, 1e-6)};
    for (int i = 0; i < 10; ++i) mirrors.push_back(random.mirror(4, 0.1));
    Mirror thick = random.mirror(2, 0.0);
    for (ThermalLayer& layer : thick.layers) layer.readout.thickness = 2e-4;
    mirrors.push_back(thick);
    WorstError worst;
    for (std::size_t m = 0; m < mirrors.size(); ++m) {
        for (const double w : {3e-5, 2e-4, 1e-3, 1e-2, 0.1}) {
            for (double f = 1e-4; f < 2e6; f *= 10.0) {
                worst.see(
                    difference(integrated(mirrors[m], w, f, 1), integrated(mirrors[m], w, f, 2)),
                    "mirror " + std::to_string(m) + ", w = " + std::to_string(w) +
                        " m, f = " + std::to_string(f) + " Hz");
            }
        }
    }
    worst.print("wavenumber rule against twice the nodes");
    EXPECT_LT(worst.error(), 4e-14);
}

TEST(WavenumberRule, IntegratesTheGaussianItself) {
    for (const double w : {1e-6, 1e-3, 1.0}) {
        for (double k_t = 1e-3; k_t < 1e9; k_t *= 10.0) {
            const WavenumberRule rule = wavenumber_rule(w, k_t);
            double sum = 0.0;
            for (const double weight : rule.weight) sum += weight;
            EXPECT_NEAR(sum * w * w / 2.0, 1.0, 4e-12) << "w " << w << " k_T " << k_t;
        }
    }
}

}  // namespace
}  // namespace stillcoat::noise
