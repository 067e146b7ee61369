/// Brownian noise of the coating against closed forms of other authors and against direct
/// integration.

#include "stillcoat/noise/coating_brownian.hpp"

#include <gtest/gtest.h>

#include <boost/math/quadrature/gauss.hpp>

#include "noise/mirrors.hpp"

namespace stillcoat::noise {
namespace {

double coating_psd(const Elastic& substrate, const std::vector<ElasticLayer>& layers,
                   const std::vector<Loss>& losses, double w, double temperature, double f) {
    const std::vector<StrainEnergy> energies = thin_film_energies(substrate, layers, w);
    double sum = 0.0;
    for (std::size_t j = 0; j < layers.size(); ++j) {
        sum += brownian_psd(energies[j], losses[j], temperature, f);
    }
    return sum;
}

/// The three independent white fields of T. Hong et al. (2013), with g(z) integrated numerically.
double independent_fields_psd(const Elastic& substrate, const ElasticLayer& layer, const Loss& loss,
                              double w, double temperature, double f) {
    const double nu = layer.elastic.poisson_ratio, young = layer.elastic.youngs_modulus;
    const double nu_s = substrate.poisson_ratio;
    const double x = (1.0 - nu_s - 2.0 * nu_s * nu_s) * young / substrate.youngs_modulus;
    const double c_b = std::sqrt(0.5 * (1.0 + nu));
    const double d_b = x / std::sqrt(2.0 * (1.0 + nu));
    const double c_sa = std::sqrt(1.0 - 2.0 * nu);
    const double d_sa = -0.5 * x / c_sa;
    const double d_sb = std::sqrt(3.0) * (1.0 - nu) * x / (2.0 * c_sa * (1.0 + nu));
    const double white = 4.0 * k_b * temperature * (1.0 - nu - 2.0 * nu * nu) /
                         (3.0 * pi * f * young * (1.0 - nu) * (1.0 - nu));
    const auto density = [&](double z) {
        const double g = optics::strain_weight(layer.readout, z);
        const double bulk = g * c_b + d_b, shear = g * c_sa + d_sa;
        return loss.bulk * bulk * bulk + loss.shear * (shear * shear + d_sb * d_sb);
    };
    constexpr int panels = 12;
    const double part = layer.readout.thickness / panels;
    double integral = 0.0;
    for (int i = 0; i < panels; ++i) {
        integral += boost::math::quadrature::gauss<double, 30>::integrate(density, i * part,
                                                                          (i + 1) * part);
    }
    return white * integral / (pi * w * w);
}

TEST(CoatingBrownian, EqualsHarryWithEqualLossesAndNoPenetration) {
    constexpr std::uint32_t seed = 20240301;
    SCOPED_TRACE(seed);
    RandomMirrors random(seed);
    WorstError worst;
    for (int i = 0; i < 200; ++i) {
        const Elastic substrate = random.elastic(), film = random.elastic();
        const double d = random.spread(1e-9, 1e-4), w = random.spread(1e-5, 0.2);
        const double loss = random.spread(1e-7, 1e-2), t = random.between(4.0, 400.0);
        const double f = random.spread(1e-3, 1e6);
        const double harry = parallel_perpendicular_psd(substrate, film, d, loss, loss, w, t, f);
        const double here =
            coating_psd(substrate, {{film, surface_weight(d)}}, {{loss, loss}}, w, t, f);
        worst.see(relative_error(here, harry), "sample " + std::to_string(i));
    }
    worst.print("coating Brownian against Harry");
    EXPECT_LT(worst.error(), 2e-15);
}

TEST(CoatingBrownian, EqualsNakagawaForFilmOfTheSubstratesConstants) {
    constexpr std::uint32_t seed = 20240302;
    SCOPED_TRACE(seed);
    RandomMirrors random(seed);
    for (int i = 0; i < 100; ++i) {
        const Elastic material = random.elastic();
        const double nakagawa = equal_elastic_psd(material, 6e-6, 3e-4, 0.06, 300.0, 100.0);
        EXPECT_NEAR(coating_psd(material, {{material, surface_weight(6e-6)}}, {{3e-4, 3e-4}}, 0.06,
                                300.0, 100.0) /
                        nakagawa,
                    1.0, 3e-15);
        EXPECT_NEAR(
            parallel_perpendicular_psd(material, material, 6e-6, 3e-4, 3e-4, 0.06, 300.0, 100.0) /
                nakagawa,
            1.0, 2e-15);
    }
}

TEST(CoatingBrownian, EqualsTheIndependentFieldsOfHongWithDepthResolvedWeight) {
    constexpr std::uint32_t seed = 20240303;
    SCOPED_TRACE(seed);
    RandomMirrors random(seed);
    WorstError worst;
    for (int i = 0; i < 60; ++i) {
        const Mirror mirror = random.mirror(4, 0.1, i % 2 == 1);
        const std::vector<ElasticLayer> layers = mirror.elastic_layers();
        const Elastic& substrate = mirror.substrate.elastic;
        const std::vector<StrainEnergy> energies = thin_film_energies(substrate, layers, 0.03);
        for (std::size_t j = 0; j < layers.size(); ++j) {
            const Loss loss{random.spread(1e-6, 1e-3), random.spread(1e-6, 1e-3)};
            const double fields =
                independent_fields_psd(substrate, layers[j], loss, 0.03, 290.0, 77.0);
            worst.see(relative_error(brownian_psd(energies[j], loss, 290.0, 77.0), fields),
                      "sample " + std::to_string(i) + " layer " + std::to_string(j));
        }
    }
    worst.print("coating Brownian against the independent fields");
    EXPECT_LT(worst.error(), 6e-14);
}

TEST(CoatingBrownian, EqualsTheSumOverMaterialsForEqualLosses) {
    // W. Yam, S. Gras, M. Evans, Phys. Rev. D 91, 042002 (2015), with g = 1.
    const std::vector<Elastic> films{{72e9, 0.17}, {140e9, 0.23}, {100e9, 0.32}};
    const Elastic substrate{130e9, 0.28};
    const double p_s = 1.0 - 0.28 - 2.0 * 0.28 * 0.28;
    double sum = 0.0;
    std::vector<ElasticLayer> layers;
    std::vector<Loss> losses;
    for (std::size_t j = 0; j < films.size(); ++j) {
        const double nu = films[j].poisson_ratio, d = 1e-7 * (1.0 + double(j));
        const double loss = 1e-4 * (2.0 + double(j)), ratio = films[j].youngs_modulus / 130e9;
        sum += (1.0 - nu - 2.0 * nu * nu) / ((1.0 - nu) * p_s) *
               (1.0 / ratio + p_s * p_s / ((1.0 + nu) * (1.0 + nu) * (1.0 - 2.0 * nu)) * ratio) *
               d * loss;
        layers.push_back({films[j], surface_weight(d)});
        losses.push_back({loss, loss});
    }
    const double omega = 2.0 * pi * 50.0;
    const double expected = 4.0 * k_b * 120.0 / (pi * 2.5e-7 * omega) * p_s / 130e9 * sum;
    EXPECT_NEAR(coating_psd(substrate, layers, losses, 5e-4, 120.0, 50.0) / expected, 1.0, 1e-15);
}

TEST(CoatingBrownian, FollowsTemperatureLossFrequencyAndBeamArea) {
    const Mirror mirror = quarter_wave_mirror(true, 5);
    const std::vector<ElasticLayer> layers = mirror.elastic_layers();
    const std::vector<Loss> losses(layers.size(), {1e-4, 3e-4}),
        triple(layers.size(), {3e-4, 9e-4});
    const double base = coating_psd(silica_elastic, layers, losses, 0.06, 300.0, 100.0);
    EXPECT_NEAR(coating_psd(silica_elastic, layers, losses, 0.06, 150.0, 100.0) / base, 0.5, 1e-15);
    EXPECT_NEAR(coating_psd(silica_elastic, layers, triple, 0.06, 300.0, 100.0) / base, 3.0, 2e-15);
    EXPECT_NEAR(coating_psd(silica_elastic, layers, losses, 0.06, 300.0, 700.0) / base, 1.0 / 7.0,
                1e-15);
    EXPECT_NEAR(coating_psd(silica_elastic, layers, losses, 0.3, 300.0, 100.0) / base, 0.04, 1e-15);
}

TEST(CoatingBrownian, DoesNotDependOnTheSplitOfEnergyWhenBothLossesAreEqual) {
    // Total energy from the stress and the in-plane strain: ½σ_zz²/M + ½E'η²/(1−ν²) per area.
    const Mirror mirror = quarter_wave_mirror(false, 5);
    const std::vector<ElasticLayer> layers = mirror.elastic_layers();
    const std::vector<StrainEnergy> energies = thin_film_energies(silica_elastic, layers, 0.06);
    const double eta = face_dilatation(silica_elastic);
    for (std::size_t j = 0; j < layers.size(); ++j) {
        const Elastic& film = layers[j].elastic;
        const optics::ReadoutIntegrals g = optics::readout_integrals(layers[j].readout);
        const double nu = film.poisson_ratio;
        const double total =
            0.5 * g.strain_squared / p_wave_modulus(film) +
            0.5 * film.youngs_modulus * eta * eta / (1.0 - nu * nu) * layers[j].readout.thickness;
        EXPECT_NEAR((energies[j].bulk + energies[j].shear) * pi * 0.06 * 0.06 / total, 1.0, 2e-15);
    }
}

TEST(CoatingBrownian, SplittingALayerChangesNothing) {
    constexpr std::uint32_t seed = 20240304;
    SCOPED_TRACE(seed);
    RandomMirrors random(seed);
    for (int i = 0; i < 40; ++i) {
        const Mirror mirror = random.mirror(3, 0.1);
        const std::vector<ElasticLayer> whole = mirror.elastic_layers();
        const double depth = random.between(0.0, 1.0) * whole[1].readout.thickness;
        Mirror parts{mirror.substrate, cut_layer(mirror.layers[1], depth)};
        const Elastic& substrate = mirror.substrate.elastic;
        const StrainEnergy one = thin_film_energies(substrate, whole, 0.01)[1];
        const std::vector<StrainEnergy> two =
            thin_film_energies(substrate, parts.elastic_layers(), 0.01);
        EXPECT_NEAR((two[0].bulk + two[1].bulk) / one.bulk, 1.0, 2e-13);
        EXPECT_NEAR((two[0].shear + two[1].shear) / one.shear, 1.0, 5e-14);
    }
}

TEST(CoatingBrownian, KeepsItsFormWhenTheUnitsChange) {
    // Lengths by 2, masses by 3, times by 5, temperatures by 7; k_B itself stays as it is.
    Mirror mirror = quarter_wave_mirror(true, 4);
    const std::vector<Loss> losses(mirror.layers.size(), {2e-4, 5e-4});
    const double base =
        coating_psd(silica_elastic, mirror.elastic_layers(), losses, 0.02, 280.0, 30.0);
    constexpr double pressure = 3.0 / (2.0 * 25.0);
    for (ThermalLayer& layer : mirror.layers) {
        layer.material.elastic.youngs_modulus *= pressure;
        layer.readout.thickness *= 2.0;
        for (optics::ReadoutTerm& term : layer.readout.terms) term.rate /= 2.0;
    }
    const Elastic substrate{72e9 * pressure, 0.17};
    const double scaled = coating_psd(substrate, mirror.elastic_layers(), losses, 0.02 * 2.0,
                                      280.0 * 7.0, 30.0 / 5.0);
    constexpr double spectrum = 4.0 * 5.0, boltzmann = 3.0 * 4.0 / 25.0 / 7.0;
    EXPECT_NEAR(scaled / base / (spectrum / boltzmann), 1.0, 1e-15);
}

TEST(CoatingBrownian, MeetsTheGradedLossLimitsOfVanishingPoissonRatios) {
    // ν = ν_s = 0: d [E'φ∥/E² + φ⊥/E'] 2k_BT/(π²w²f), N. Nakagawa et al. (2002), Harry et al.
    // (2002).
    const double expected = 2.0 * k_b * 300.0 * 6e-6 / (pi * pi * 0.0036 * 100.0) *
                            (110e9 * 2e-4 / (72e9 * 72e9) + 4e-4 / 110e9);
    EXPECT_NEAR(parallel_perpendicular_psd({72e9, 0.0}, {110e9, 0.0}, 6e-6, 2e-4, 4e-4, 0.06, 300.0,
                                           100.0) /
                    expected,
                1.0, 1e-15);
}

TEST(Elastic, ConstantsAgreeWithEachOther) {
    constexpr std::uint32_t seed = 20240305;
    SCOPED_TRACE(seed);
    RandomMirrors random(seed);
    for (int i = 0; i < 50; ++i) {
        const Elastic elastic = random.elastic();
        const double mu = shear_modulus(elastic), lambda = lame_lambda(elastic);
        const double scale = elastic.youngs_modulus;
        EXPECT_NEAR(p_wave_modulus(elastic), lambda + 2.0 * mu, 2e-15 * p_wave_modulus(elastic));
        EXPECT_NEAR(bulk_modulus(elastic), lambda + 2.0 / 3.0 * mu,
                    1e-15 * p_wave_modulus(elastic));
        EXPECT_NEAR(mu * (3.0 * lambda + 2.0 * mu) / (lambda + mu), scale, 1e-15 * scale);
        // A pressure p shrinks the face of a half-space by p/(2(λ+μ)).
        EXPECT_NEAR(face_dilatation(elastic) * 2.0 * (lambda + mu), 1.0, 1e-15);
    }
}

}  // namespace
}  // namespace stillcoat::noise
