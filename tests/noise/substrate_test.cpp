/// Noise of the substrate: strain energies, thermo-refractive noise of light that crosses it.

#include "stillcoat/noise/substrate.hpp"

#include <gtest/gtest.h>

#include <boost/math/constants/constants.hpp>
#include <boost/math/quadrature/gauss_kronrod.hpp>

#include "noise/mirrors.hpp"

namespace stillcoat::noise {
namespace {

const TransmittedPath path{1.45, 8.6e-6, 0.2, 1064e-9};

/// Energies from the strain of a half-space under the pressure p J0(kr) (K. L. Johnson, Contact
/// Mechanics): u_z = s(2−2ν+x)e^{−x}J0, u_r = −s(1−2ν−x)e^{−x}J1, x = kz, s = p(1+ν)/(Ek),
/// integrated over depth.
StrainEnergy energy_by_integration(const Elastic& elastic, double w) {
    const double nu = elastic.poisson_ratio;
    const auto density = [&](double x, bool want_bulk) {  // per (ks)²
        const double plane = -(1.0 - 2.0 * nu - x) * std::exp(-x);
        const double along = (2.0 * nu - 1.0 - x) * std::exp(-x);
        const double slide = -x * std::exp(-x);
        const double third = (plane + along) / 3.0;
        if (want_bulk) return 4.5 * bulk_modulus(elastic) * third * third;
        return shear_modulus(elastic) *
               (std::pow(along - third, 2) + 2.0 * std::pow(0.5 * plane - third, 2) +
                0.5 * plane * plane + 2.0 * slide * slide);
    };
    using Rule = boost::math::quadrature::gauss_kronrod<double, 61>;
    const auto integral = [&](bool want_bulk) {
        return Rule::integrate([&](double x) { return density(x, want_bulk); }, 0.0, 50.0, 10,
                               1e-14);
    };
    // Depth gives 1/k, the beam ∫(k dk/2π) e^{−k²w²/4}/k = 1/(2√π w).
    const double scale =
        std::pow((1.0 + nu) / elastic.youngs_modulus, 2) / (2.0 * std::sqrt(pi) * w);
    return {scale * integral(true), scale * integral(false)};
}

TEST(SubstrateBrownian, EnergiesAreThoseOfTheStrainField) {
    constexpr std::uint32_t seed = 20240331;
    SCOPED_TRACE(seed);
    RandomMirrors random(seed);
    WorstError worst;
    for (int i = 0; i < 30; ++i) {
        const Elastic elastic = random.elastic();
        const double w = random.spread(1e-5, 0.2);
        const StrainEnergy direct = energy_by_integration(elastic, w);
        const StrainEnergy closed = half_space_energy(elastic, w);
        worst.see(relative_error(closed.bulk, direct.bulk), "bulk " + std::to_string(i));
        worst.see(relative_error(closed.shear, direct.shear), "shear " + std::to_string(i));
    }
    worst.print("half-space energies against the strain field");
    EXPECT_LT(worst.error(), 5e-15);
}

TEST(SubstrateBrownian, EqualLossesGiveTheFormOfBonduHelloVinet) {
    const auto psd = [](double w, double loss, double temperature, double f) {
        return brownian_psd(half_space_energy(silica_elastic, w), {loss, loss}, temperature, f);
    };
    const double base = psd(0.06, 1e-8, 300.0, 100.0);
    const double closed =
        2.0 * k_b * 300.0 * 1e-8 * (1.0 - 0.17 * 0.17) / (std::pow(pi, 1.5) * 100.0 * 0.06 * 72e9);
    EXPECT_NEAR(base / closed, 1.0, 1e-15);
    EXPECT_NEAR(psd(0.12, 1e-8, 300.0, 100.0) / base, 0.5, 1e-15);
    EXPECT_NEAR(psd(0.06, 3e-8, 300.0, 100.0) / base, 3.0, 1e-15);
    EXPECT_NEAR(psd(0.06, 1e-8, 100.0, 100.0) / base, 1.0 / 3.0, 1e-15);
    EXPECT_NEAR(psd(0.06, 1e-8, 300.0, 500.0) / base, 0.2, 1e-15);
}

/// Re[e^{iΩ}E1(iΩ)] = −cos Ω Ci Ω − sin Ω (Si Ω − π/2): series for small Ω, asymptotic for large,
/// ∫te^{−Ωt}/(1+t²)dt between.
double exponential_integral(double omega_double) {
    using Real = long double;
    const Real omega = omega_double;
    if (omega <= 6) {
        Real ci = boost::math::constants::euler<Real>() + std::log(omega), si = 0, term = 1;
        for (int n = 1; n < 120; ++n) {
            term *= omega / n;
            const Real sign = (n / 2) % 2 ? -1 : 1;
            (n % 2 ? si : ci) += sign * term / n;
        }
        const Real half_pi = boost::math::constants::half_pi<Real>();
        return double(-std::cos(omega) * ci - std::sin(omega) * (si - half_pi));
    }
    if (omega >= 60) {
        Real sum = 0, term = 1 / (omega * omega);
        for (int n = 1; n < 20; ++n) {
            sum += term;
            term *= -Real(2 * n) * (2 * n + 1) / (omega * omega);
        }
        return double(sum);
    }
    const auto integrand = [&](Real x) { return x * std::exp(-x) / (omega * omega + x * x); };
    return double(boost::math::quadrature::gauss_kronrod<Real, 61>::integrate(
        integrand, Real(0), Real(60), 12, 1e-17L));
}

TEST(ThermoRefractive, EqualsTheExponentialIntegralAtAllFrequencies) {
    WorstError worst;
    for (const double w : {3e-5, 0.1}) {
        for (double omega = 1e-8; omega < 2e8; omega *= std::sqrt(10.0)) {
            const double f = omega * 4.0 * 1.38 / (1.64e6 * w * w) / (2.0 * pi);
            const double expected =
                std::pow(8.6e-6, 2) * 0.2 * k_b * 9e4 / (pi * 1.38) * exponential_integral(omega);
            worst.see(relative_error(thermo_refractive_psd(silica, path, w, 300.0, f), expected),
                      "Omega = " + std::to_string(omega));
        }
    }
    worst.print("thermo-refractive noise of the substrate");
    EXPECT_LT(worst.error(), 4e-15);
}

TEST(ThermoRefractive, MeetsTheHighFrequencyFormOfBraginskyVyatchanin) {
    // 16k_BT²β²κl/(πC²ω²w⁴), next order −6/Ω².
    const double w = 0.06, f = 1e4, omega = 2.0 * pi * f;
    const double adiabatic = 16.0 * k_b * 9e4 * std::pow(8.6e-6, 2) * 1.38 * 0.2 /
                             (pi * std::pow(1.64e6 * omega * w * w, 2));
    EXPECT_NEAR(thermo_refractive_psd(silica, path, w, 300.0, f) / adiabatic, 1.0, 6e-15);
}

TEST(ThermoRefractive, FollowsTemperatureSlopeAndPath) {
    const double base = thermo_refractive_psd(silica, path, 0.06, 300.0, 1.0);
    TransmittedPath other = path;
    other.length *= 3.0;
    other.index_slope *= -2.0;
    EXPECT_NEAR(thermo_refractive_psd(silica, other, 0.06, 150.0, 1.0) / base, 3.0, 2e-15);
    const double standing = standing_wave_thermo_refractive_psd(silica, path, 0.06, 300.0, 1.0);
    EXPECT_NEAR(standing_wave_thermo_refractive_psd(silica, other, 0.06, 150.0, 1.0) / standing,
                3.0, 1e-15);
}

TEST(StandingWaveThermoRefractive, HasThePlateauAndCornerOfBenthemLevin) {
    // Plateau 2β²lk_BT²/(πw²κ(2k)²) up to ω = κ(2k)²/C, where it has fallen to one half.
    const double k_l = 4.0 * pi * 1.45 / 1064e-9;
    const double plateau =
        2.0 * std::pow(8.6e-6, 2) * 0.2 * k_b * 9e4 / (pi * 0.0036 * 1.38 * k_l * k_l);
    const double corner = 1.38 * k_l * k_l / 1.64e6 / (2.0 * pi);
    const auto psd = [&](double f) {
        return standing_wave_thermo_refractive_psd(silica, path, 0.06, 300.0, f);
    };
    EXPECT_NEAR(psd(1.0) / plateau, 1.0, 2e-15);
    EXPECT_NEAR(psd(corner) / plateau, 0.5, 1e-15);
    EXPECT_NEAR(psd(1e3 * corner) / plateau, 1e-6, 3e-12);
}

TEST(StandingWaveThermoRefractive, IsThePeriodicPartOfTheSameHeatEquation) {
    // The intensity 1 + cos k_Lz heats in two patterns: one with k alone, one with k and k_L, of
    // half its power; S = (2k_BT²/π)β²l ∫k dk e^{−k²w²/4} Re{1/(κγ²) + ½/(κ(γ² + k_L²))}.
    const double w = 2e-6, f = 3e5, k_t_square = 2.0 * pi * f * 1.64e6 / 1.38;
    const double k_l = 4.0 * pi * 1.45 / 1064e-9;
    const auto integrand = [&](double k) {
        const std::complex<double> square(k * k + k_l * k_l, k_t_square);
        return k * std::exp(-0.25 * k * k * w * w) * 0.5 * std::real(1.0 / square);
    };
    const double integral = boost::math::quadrature::gauss_kronrod<double, 61>::integrate(
        integrand, 0.0, 13.0 / w, 12, 1e-13);
    const double expected = 2.0 * k_b * 9e4 / pi * std::pow(8.6e-6, 2) * 0.2 / 1.38 * integral;
    // The closed form neglects k against k_L: (k/k_L)² ~ 4/(w k_L)².
    EXPECT_NEAR(standing_wave_thermo_refractive_psd(silica, path, w, 300.0, f) / expected, 1.0,
                2.0 * 4.0 / (w * w * k_l * k_l));
}

}  // namespace
}  // namespace stillcoat::noise
