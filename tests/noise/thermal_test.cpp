/// Thermal noise of coating and substrate: limits, symmetries and the bare substrate.

#include "stillcoat/noise/thermal.hpp"

#include <gtest/gtest.h>

#include <boost/math/quadrature/gauss_kronrod.hpp>

#include "noise/mirrors.hpp"
#include "stillcoat/noise/classic_thermo_optic.hpp"

namespace stillcoat::noise {
namespace {

double frequency_of(double scaled_omega, double w) {
    // Ω = ωCw²/(2κ)
    return scaled_omega * 2.0 * silica.conductivity / (silica.heat_capacity * w * w) / (2.0 * pi);
}

/// J(Ω) of M. Cerdonio et al. (2001), out of the spectrum.
double cerdonio_j(double scaled_omega, double w) {
    const double r0 = w / std::sqrt(2.0), f = frequency_of(scaled_omega, w);
    const double expansion = silica.expansion * 1.17;
    const double scale =
        8.0 / std::sqrt(2.0 * pi) * expansion * expansion * k_b * 9e4 * r0 / silica.conductivity;
    return substrate_thermo_elastic_psd(silica, w, 300.0, f) / scale;
}

/// The same from the double integral, its inner integral by residues, the outer in ln u by adaptive
/// quadrature: J = √(2/π³)(π/Ω²)∫u³e^{−u²/2}[1/u − Re(u²+iΩ)^{−1/2}]du.
double cerdonio_j_by_integration(double scaled_omega) {
    using Number = std::complex<long double>;
    const auto integrand = [&](long double t) {
        const long double u = std::exp(t), square = u * u;
        const Number root = std::sqrt(Number(square, scaled_omega));
        // 1/u − 1/root without cancellation: (root² − u²)/(u·root·(root + u)).
        const Number gap = Number(0, scaled_omega) / (u * root * (root + u));
        return square * square * std::exp(-square / 2) * std::real(gap);
    };
    const auto integrate = [&](long double a, long double b) {
        return boost::math::quadrature::gauss_kronrod<long double, 61>::integrate(integrand, a, b,
                                                                                  12, 1e-16L);
    };
    const long double pi_l = std::acos(-1.0L);
    const long double sum =
        integrate(-30.0L, -5.0L) + integrate(-5.0L, 0.0L) + integrate(0.0L, 3.0L);
    return double(std::sqrt(2 / (pi_l * pi_l * pi_l)) * pi_l / (scaled_omega * scaled_omega) * sum);
}

/// The double integral itself at one u, for the residues: ∫dv /((u²+v²)[(u²+v²)²+Ω²]).
TEST(SubstrateThermoElastic, InnerIntegralOfCerdonioIsTheOneUsedHere) {
    for (const double omega : {0.03, 1.0, 40.0}) {
        for (const double u : {0.2, 1.0, 3.0}) {
            const auto integrand = [&](double v) {
                const double s = u * u + v * v;
                return 1.0 / (s * (s * s + omega * omega));
            };
            const double direct =
                2.0 * boost::math::quadrature::gauss_kronrod<double, 31>::integrate(
                          integrand, 0.0, std::numeric_limits<double>::infinity(), 15, 1e-13);
            const std::complex<double> root = std::sqrt(std::complex<double>(u * u, omega));
            const double closed = pi / (omega * omega) * (1.0 / u - std::real(1.0 / root));
            EXPECT_NEAR(direct / closed, 1.0, 5e-11) << "u " << u << " Omega " << omega;
        }
    }
}

TEST(SubstrateThermoElastic, EqualsCerdonioAtAllFrequencies) {
    WorstError worst;
    for (double omega = 1e-6; omega < 1e10; omega *= 10.0) {
        for (const double w : {3e-5, 0.1}) {
            worst.see(relative_error(cerdonio_j(omega, w), cerdonio_j_by_integration(omega)),
                      "Omega = " + std::to_string(omega));
        }
    }
    worst.print("substrate thermo-elastic noise against Cerdonio");
    EXPECT_LT(worst.error(), 6e-15);
}

TEST(SubstrateThermoElastic, MeetsBothLimits) {
    // J → 1/Ω² and J → 2/(3√π Ω^{1/2}).
    const double w = 1e-3;
    EXPECT_NEAR(substrate_thermo_elastic_psd(silica, w, 300.0, frequency_of(1e12, w)) /
                    adiabatic_thermo_elastic_psd(silica, w, 300.0, frequency_of(1e12, w)),
                1.0, 2e-6);
    EXPECT_NEAR(cerdonio_j(1e-10, w) * 3.0 * std::sqrt(pi * 1e-10) / 2.0, 1.0, 1e-4);
    EXPECT_NEAR(cerdonio_j(1e-14, w) * 3.0 * std::sqrt(pi * 1e-14) / 2.0, 1.0, 1e-6);
}

TEST(SubstrateThermoElastic, AdiabaticFormFollowsItsPowers) {
    const double base = adiabatic_thermo_elastic_psd(silica, 0.06, 300.0, 100.0);
    EXPECT_NEAR(adiabatic_thermo_elastic_psd(silica, 0.12, 300.0, 100.0) * 8.0 / base, 1.0, 1e-15);
    EXPECT_NEAR(adiabatic_thermo_elastic_psd(silica, 0.06, 600.0, 100.0) / 4.0 / base, 1.0, 1e-15);
    EXPECT_NEAR(adiabatic_thermo_elastic_psd(silica, 0.06, 300.0, 300.0) * 9.0 / base, 1.0, 1e-15);
    // The same written with w: 4(1+ν)²α²κk_BT²/(π^{5/2}C²w³f²).
    const double direct = 4.0 * std::pow(1.17 * 5.1e-7 * 300.0 / 1.64e6, 2) * 1.38 * k_b /
                          (std::pow(pi, 2.5) * std::pow(0.06, 3) * 1e4);
    EXPECT_NEAR(base / direct, 1.0, 2e-15);
}

TEST(ThermalNoise, BareSubstrateIsTheSameAsTermAndAlone) {
    const Mirror mirror = quarter_wave_mirror(true, 4);
    for (const double f : {1e-3, 1.0, 1e4}) {
        const double alone = substrate_thermo_elastic_psd(silica, 1e-3, 300.0, f);
        EXPECT_NEAR(mirror.noise(1e-3, 300.0, f).substrate_thermo_elastic / alone, 1.0, 1e-15);
        const ThermalNoise bare = thermal_noise(silica, {}, 1e-3, 300.0, f);
        EXPECT_NEAR(bare.everything_coherent / alone, 1.0, 1e-15);
        EXPECT_EQ(bare.coating_coherent, 0.0);
    }
}

TEST(ThermalNoise, GrowsWithTheSquareOfTemperatureForFixedProperties) {
    const Mirror mirror = quarter_wave_mirror(false, 6);
    const std::vector<double> cold = listed(mirror.noise(0.01, 100.0, 33.0));
    const std::vector<double> warm = listed(mirror.noise(0.01, 300.0, 33.0));
    for (std::size_t i = 0; i < cold.size(); ++i) EXPECT_NEAR(warm[i] / cold[i], 9.0, 6e-15);
}

TEST(ThermalNoise, CoatingTermsFallWithTheBeamAreaWhenHeatStaysUnderTheBeam) {
    const Mirror mirror = quarter_wave_mirror(false, 6);
    const ThermalNoise narrow = mirror.noise(0.05, 300.0, 1e5),
                       wide = mirror.noise(0.2, 300.0, 1e5);
    EXPECT_NEAR(narrow.coating_thermo_elastic / wide.coating_thermo_elastic, 16.0, 1e-6);
    EXPECT_NEAR(narrow.coating_thermo_refractive / wide.coating_thermo_refractive, 16.0, 1e-6);
}

TEST(ThermalNoise, SplittingALayerChangesNothing) {
    constexpr std::uint32_t seed = 20240321;
    SCOPED_TRACE(seed);
    RandomMirrors random(seed);
    WorstError worst;
    for (int i = 0; i < 30; ++i) {
        Mirror mirror = random.mirror(3, i % 2 ? 0.2 : 0.0);
        const double w = random.spread(3e-5, 0.1), f = random.spread(1e-3, 1e6);
        const std::vector<double> whole = listed(mirror.noise(w, 300.0, f));
        Mirror cut = mirror;
        const double depth = random.between(0.0, 1.0) * mirror.layers[1].readout.thickness;
        const std::vector<ThermalLayer> parts = cut_layer(mirror.layers[1], depth);
        cut.layers[1] = parts[1];
        cut.layers.insert(cut.layers.begin() + 1, parts[0]);
        const std::vector<double> after = listed(cut.noise(w, 300.0, f));
        for (std::size_t j = 0; j < whole.size(); ++j) {
            worst.see(relative_error(after[j], whole[j]), "sample " + std::to_string(i));
        }
    }
    worst.print("a layer in two parts");
    EXPECT_LT(worst.error(), 3e-14);
}

TEST(ThermalNoise, KeepsItsFormWhenTheUnitsChange) {
    // Lengths by 2, masses by 3, times by 5, temperatures by 7; k_B itself stays as it is.
    constexpr std::uint32_t seed = 20240322;
    SCOPED_TRACE(seed);
    RandomMirrors random(seed);
    const Mirror mirror = random.mirror(4, 0.1);
    constexpr double m = 2.0, kg = 3.0, s = 5.0, kelvin = 7.0;
    const auto scale_material = [&](ThermalMaterial& material) {
        material.elastic.youngs_modulus *= kg / (m * s * s);
        material.expansion /= kelvin;
        material.conductivity *= m * kg / (s * s * s * kelvin);
        material.heat_capacity *= kg / (m * s * s * kelvin);
    };
    Mirror scaled = mirror;
    scale_material(scaled.substrate);
    for (ThermalLayer& layer : scaled.layers) {
        scale_material(layer.material);
        layer.index_slope /= kelvin;
        layer.readout.thickness *= m;
        for (optics::ReadoutTerm& term : layer.readout.terms) term.rate /= m;
    }
    const std::vector<double> before = listed(mirror.noise(1e-3, 290.0, 400.0));
    const std::vector<double> after = listed(scaled.noise(1e-3 * m, 290.0 * kelvin, 400.0 / s));
    constexpr double spectrum = m * m * s, boltzmann = kg * m * m / (s * s * kelvin);
    for (std::size_t i = 0; i < before.size(); ++i) {
        EXPECT_NEAR(after[i] / before[i] / (spectrum / boltzmann), 1.0, 2e-14);
    }
}

/// The mirror with the refraction of its coating reversed.
Mirror reversed(Mirror mirror) {
    for (ThermalLayer& layer : mirror.layers) {
        layer.readout.strain_constant = 2.0 - layer.readout.strain_constant;
        layer.readout.index_constant *= -1.0;
        for (optics::ReadoutTerm& term : layer.readout.terms) {
            term.strain *= -1.0;
            term.index *= -1.0;
        }
    }
    return mirror;
}

TEST(ThermalNoise, CoherentSumsAreQuadraticForms) {
    constexpr std::uint32_t seed = 20240323;
    SCOPED_TRACE(seed);
    RandomMirrors random(seed);
    for (int i = 0; i < 20; ++i) {
        const Mirror mirror = random.mirror(3, 0.1);
        const double w = random.spread(1e-4, 0.1), f = random.spread(1e-2, 1e5);
        const ThermalNoise plus = mirror.noise(w, 300.0, f),
                           minus = reversed(mirror).noise(w, 300.0, f);
        // |e+r|² + |e−r|² = 2|e|² + 2|r|², also with the substrate's source added to e.
        EXPECT_NEAR((plus.coating_coherent + minus.coating_coherent) /
                        (2.0 * (plus.coating_thermo_elastic + plus.coating_thermo_refractive)),
                    1.0, 1e-15);
        EXPECT_NEAR(
            (plus.everything_coherent + minus.everything_coherent) /
                (2.0 * (plus.thermo_elastic_with_substrate + plus.coating_thermo_refractive)),
            1.0, 1e-15);
        EXPECT_NEAR(minus.coating_thermo_refractive / plus.coating_thermo_refractive, 1.0, 1e-15);
    }
}

TEST(ThermalNoise, ThinCoatingOfTheSubstratesMatterLooksLikeTheBareSubstrate) {
    // The thin-film source leaves out terms of order d/w, and those only.
    for (const double ratio : {1e-6, 1e-5}) {
        const double w = 1e-3;
        const Mirror mirror{silica, {{silica, 0.0, surface_weight(ratio * w)}}};
        for (const double f : {1e-3, 1.0, 1e3}) {
            const ThermalNoise noise = mirror.noise(w, 300.0, f);
            EXPECT_NEAR(noise.everything_coherent / noise.substrate_thermo_elastic, 1.0,
                        10.0 * ratio);
            EXPECT_NE(noise.everything_coherent, noise.substrate_thermo_elastic);
        }
    }
}

TEST(ThermalNoise, ThinCoatingFollowsTheTemperatureOfTheFace) {
    // d ≪ diffusion length: S = S_ΔT·(length per kelvin)², at any ratio of diffusion length and
    // beam.
    for (const bool high : {true, false}) {
        const Mirror mirror = quarter_wave_mirror(high, 10);
        for (const auto& [w, f] : {std::pair{0.06, 1e-3}, std::pair{0.06, 1e-7}}) {
            const ThermalNoise noise = mirror.noise(w, 300.0, f);
            const ClassicThermoOptic classic = classic_thermo_optic(
                mirror.substrate, mirror.layers, w, 300.0, f, LayerStrain::own_thickness);
            double expansion = 0.0;  // ᾱ_c d without the substrate's share
            for (const ThermalLayer& layer : mirror.layers) {
                const Elastic& film = layer.material.elastic;
                expansion += layer.material.expansion / (1.0 - film.poisson_ratio) *
                             (1.0 + film.poisson_ratio +
                              1.17 * 0.66 * film.youngs_modulus / silica_elastic.youngs_modulus) *
                             layer.readout.thickness;
            }
            const double refraction = classic.thermo_refractive_length,
                         face = classic.temperature_psd;
            const auto expect = [&](double psd, double length) {
                EXPECT_NEAR(psd / (face * length * length), 1.0, 0.03) << "w " << w << " f " << f;
            };
            expect(noise.coating_thermo_elastic, expansion);
            expect(noise.coating_thermo_refractive, refraction);
            expect(noise.coating_coherent, expansion - refraction);
        }
    }
}

TEST(ThermalNoise, SubstratesShareIsThatOfTheClassicForm) {
    // Film ≪ diffusion length ≪ beam: what the coating adds is S_ΔT (ᾱ_c d − ᾱ_s d C_c/C_s)².
    Mirror mirror{silica,
                  {{tantala, 0.0, surface_weight(100e-9)}, {silica, 0.0, surface_weight(100e-9)}}};
    mirror.layers[1].material.heat_capacity *= 3.0;
    const double w = 300.0, f = 1.0;
    const ThermalNoise noise = mirror.noise(w, 300.0, f);
    const ClassicThermoOptic classic = classic_thermo_optic(mirror.substrate, mirror.layers, w,
                                                            300.0, f, LayerStrain::own_thickness);
    const double added = noise.thermo_elastic_with_substrate - noise.substrate_thermo_elastic;
    const double expected = classic.temperature_psd * std::pow(classic.thermo_elastic_length, 2);
    EXPECT_NEAR(added / expected, 1.0, 5e-3);
    EXPECT_GT(std::abs(noise.coating_thermo_elastic / expected - 1.0), 0.1);
}

TEST(ThermalNoise, FreeSlopeTakesThePhotoelasticPartOutOnce) {
    // Free expansion strains all three axes: dn/dT = β_free − (n³/2)(p11 + 2p12)α.
    const double n = 1.45, free = free_index_slope(n, 8e-6, 0.121, 0.270, 5.1e-7);
    EXPECT_NEAR(free - 0.5 * n * n * n * (0.121 + 2.0 * 0.270) * 5.1e-7, 8e-6, 1e-20);
    EXPECT_EQ(free_index_slope(n, 8e-6, 0.0, 0.0, 5.1e-7), 8e-6);
}

TEST(ThermalNoise, QuarterWaveStackGivesTheSameAsAnotherSolution) {
    // Silica/tantala quarter waves, solved independently.
    EXPECT_NEAR(std::sqrt(quarter_wave_mirror(true).noise(0.06, 300.0, 100.0).everything_coherent),
                1.90333e-21, 5e-27);
    EXPECT_NEAR(std::sqrt(quarter_wave_mirror(false).noise(0.06, 300.0, 100.0).everything_coherent),
                1.31821e-21, 5e-27);
}

}  // namespace
}  // namespace stillcoat::noise
