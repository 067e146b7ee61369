/// The classic closed form of thermo-optic noise and what it is made of.

#include "stillcoat/noise/classic_thermo_optic.hpp"

#include <gtest/gtest.h>

#include <boost/math/special_functions/erf.hpp>
#include <complex>

#include "noise/mirrors.hpp"

namespace stillcoat::noise {
namespace {

using Number = std::complex<long double>;

/// Γ from the one-dimensional heat equation of film on substrate: elastic weight even through the
/// film, refractive weight at its face. Units: film of thickness 1, κ = 1, effusivity ratio R.
long double two_layer_factor(long double xi, long double ratio, long double p_e) {
    const long double p_r = 1 - p_e;
    const Number gamma = Number(1, 1) * xi / 2.0L;
    const Number substrate = gamma / ratio;  // its admittance
    // ϑ = p_e/γ² + A e^{−γz} + B e^{−γ(1−z)}; flux p_r enters at the face, flux = substrate·ϑ at z
    // = 1.
    const Number decay = std::exp(-gamma), even = p_e / (gamma * gamma);
    const Number reflection = (gamma - substrate) / (gamma + substrate);
    const Number drawn = substrate * even / (gamma + substrate);
    const Number down = (p_r / gamma - decay * drawn) / (1.0L - reflection * decay * decay);
    const Number up = reflection * down * decay - drawn;
    const Number mean = even + (down + up) * (1.0L - decay) / gamma;
    const Number face = even + down + up * decay;
    return std::real(p_e * mean + p_r * face) / std::real(1.0L / substrate);
}

TEST(ThickCoatingFactor, SolvesTheOneDimensionalTwoLayerProblem) {
    WorstError worst;
    for (const double xi : {0.05, 0.3, 0.999, 1.0, 1.5, 3.0, 8.0, 20.0, 29.0, 31.0, 60.0}) {
        for (const double ratio : {0.05, 0.7, 1.0, 2.3, 30.0}) {
            for (const double share : {-3.0, -0.5, 0.0, 0.5, 1.0, 2.0}) {
                worst.see(relative_error(thick_coating_factor(xi, ratio, share),
                                         double(two_layer_factor(xi, ratio, share))),
                          "xi " + std::to_string(xi) + " R " + std::to_string(ratio) + " p_E " +
                              std::to_string(share));
            }
        }
    }
    worst.print("thick-coating factor against the two-layer problem");
    EXPECT_LT(worst.error(), 5e-14);
}

TEST(ThickCoatingFactor, TendsToOneForThinFilmsAndStaysFiniteForThickOnes) {
    for (const double share : {-2.0, 0.3, 1.0, 4.0}) {
        for (const double ratio : {0.1, 1.0, 10.0}) {
            EXPECT_EQ(thick_coating_factor(0.0, ratio, share), 1.0);
            for (double xi = 1e-300; xi < 1e-3; xi *= 1e10) {
                EXPECT_NEAR(thick_coating_factor(xi, ratio, share), 1.0, 100.0 * xi + 1e-14);
            }
        }
    }
    // ξ → ∞: expansion is diluted over the film, refraction at the face feels the film alone,
    // p_R²/R.
    EXPECT_NEAR(thick_coating_factor(1e6, 2.5, 0.0), 1.0 / 2.5, 1e-15);
    EXPECT_LT(thick_coating_factor(1e6, 2.5, 1.0), 1e-5);
    EXPECT_TRUE(std::isfinite(thick_coating_factor(1e30, 2.5, 0.4)));
}

TEST(FaceTemperature, EqualsTheErrorFunctionOfComplexArgument) {
    // S = 2k_BT²/(√π κ w) Re[e^{z²}erfc z], z = √(iΩ), Ω = ωCw²/(4κ). The function by its series
    // Σ(−z)^n/Γ(n/2+1), in long double where its terms stay small.
    WorstError worst;
    for (const double omega : {1e-8, 1e-4, 0.01, 0.1, 0.3, 1.0, 2.0, 5.0}) {
        const Number z = std::sqrt(Number(0, omega));
        Number sum = 0, power = 1;
        for (int n = 0; n < 200; ++n) {
            sum += power / std::tgamma(n / 2.0L + 1.0L);
            power *= -z;
        }
        const double w = 250e-6, f = omega * 4.0 * 1.38 / (1.64e6 * w * w) / (2.0 * pi);
        const double expected =
            2.0 * k_b * 9e4 / (std::sqrt(pi) * 1.38 * w) * double(std::real(sum));
        worst.see(relative_error(face_temperature_psd(1.38, 1.64e6, w, 300.0, f), expected),
                  "Omega " + std::to_string(omega));
    }
    worst.print("face temperature against the error function");
    EXPECT_LT(worst.error(), 4e-15);
}

TEST(FaceTemperature, MeetsTheOneDimensionalLawWhenHeatStaysUnderTheBeam) {
    // Next order of the asymptotic series of e^{z²}erfc z: Re(1 − 1/(2z²) + 3/(4z⁴)) → 1 + 1/(2Ω)
    // in size.
    for (const double omega : {1e4, 1e6, 1e8}) {
        const double w = 0.01, f = omega * 4.0 * 1.38 / (1.64e6 * w * w) / (2.0 * pi);
        const double ratio = face_temperature_psd(1.38, 1.64e6, w, 300.0, f) /
                             face_temperature_psd_one_dimensional(1.38, 1.64e6, w, 300.0, f);
        EXPECT_NEAR((ratio - 1.0) * 2.0 * omega, 1.0, 2.0 / omega + 1e-13 * omega + 1e-3);
    }
}

TEST(FaceTemperature, OvershootsTheOneDimensionalLawBeforeItFalls) {
    const double w = 250e-6;
    const auto ratio = [&](double omega) {
        const double f = omega * 4.0 * 1.38 / (1.64e6 * w * w) / (2.0 * pi);
        return face_temperature_psd(1.38, 1.64e6, w, 300.0, f) /
               face_temperature_psd_one_dimensional(1.38, 1.64e6, w, 300.0, f);
    };
    EXPECT_GT(ratio(2.0), 1.07);
    EXPECT_LT(ratio(0.3), 0.9);
}

TEST(ClassicThermoOptic, AgreesWithTheHeatEquationWhereBothHold) {
    // Silica/tantala on silica, 60 mm: the depth of the refractive source is all that differs.
    for (const bool high : {true, false}) {
        const Mirror mirror = quarter_wave_mirror(high);
        const ThermalNoise full = mirror.noise(0.06, 300.0, 1000.0);
        const ClassicThermoOptic classic = classic_thermo_optic(
            mirror.substrate, mirror.layers, 0.06, 300.0, 1000.0, LayerStrain::own_thickness);
        EXPECT_NEAR(std::sqrt(full.everything_coherent / classic.psd), 1.0, 0.025);
    }
}

TEST(ClassicThermoOptic, ReducesToThermoElasticNoiseOfTheFilm) {
    // M. M. Fejer et al., Phys. Rev. D 70, 082003 (2004): one-dimensional heat, no refraction, thin
    // film.
    const ThermalMaterial& film = tantala;
    const double d = 1e-9, w = 0.5, f = 10.0, omega = 2.0 * pi * f;
    const double average = film.expansion / (1.0 - 0.23) * (1.23 / 1.17 + 0.66 * 140.0 / 72.0);
    const double delta =
        silica.heat_capacity / (2.0 * silica.expansion * film.heat_capacity) * average - 1.0;
    const double expected =
        8.0 * std::sqrt(2.0) * k_b * 9e4 / (pi * std::sqrt(omega)) * d * d / (w * w) * 1.17 * 1.17 *
        std::pow(film.heat_capacity / silica.heat_capacity, 2) * silica.expansion *
        silica.expansion / std::sqrt(silica.conductivity * silica.heat_capacity) * delta * delta;
    const ClassicThermoOptic classic = classic_thermo_optic(
        silica, {{film, 0.0, surface_weight(d)}}, w, 300.0, f, LayerStrain::own_thickness);
    EXPECT_NEAR(classic.psd / expected, 1.0, 1e-4);
    EXPECT_EQ(classic.thermo_refractive_length, 0.0);
}

TEST(ClassicThermoOptic, WithoutACoatingThereIsNothing) {
    const ClassicThermoOptic nothing =
        classic_thermo_optic(silica, {}, 0.06, 300.0, 100.0, LayerStrain::own_thickness);
    EXPECT_EQ(nothing.psd, 0.0);
    EXPECT_EQ(nothing.thickness_factor, 1.0);
}

TEST(EffectiveIndexSlope, OfAQuarterWaveStackFollowsFromTheReadout) {
    // dn/dT part only: no expansion. Many pairs, so that the closed form of the infinite stack
    // holds.
    for (const bool high : {true, false}) {
        Mirror mirror = quarter_wave_mirror(high, 60);
        for (ThermalLayer& layer : mirror.layers) layer.material.expansion = 0.0;
        for (const LayerStrain strain : {LayerStrain::own_thickness, LayerStrain::with_substrate}) {
            const double length =
                classic_thermo_optic(mirror.substrate, mirror.layers, 0.06, 300.0, 100.0, strain)
                    .thermo_refractive_length;
            const double slope = quarter_wave_index_slope(2.07, 1.45, 1.4e-5, 8e-6, high);
            EXPECT_NEAR(length / (slope * 1064e-9), 1.0, 6e-15);
        }
    }
}

}  // namespace
}  // namespace stillcoat::noise
