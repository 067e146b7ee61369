/// Elliptical spots: averages over directions, and every spectrum against an integral over both
/// components of the wavenumber that never averages a direction in closed form.

#include "stillcoat/noise/footprint.hpp"

#include <gtest/gtest.h>

#include <boost/math/quadrature/gauss.hpp>
#include <boost/math/special_functions/ellint_1.hpp>
#include <functional>

#include "noise/footprint_averages.hpp"
#include "noise/layered_heat.hpp"
#include "noise/mirrors.hpp"
#include "noise/wavenumber_rule.hpp"
#include "stillcoat/core/errors.hpp"
#include "stillcoat/noise/classic_thermo_optic.hpp"
#include "stillcoat/noise/substrate.hpp"

namespace stillcoat::noise {
namespace {

const TransmittedPath path{1.45, 8.6e-6, 0.2, 1064e-9};

/// Mean over directions by the trapezoidal rule, which converges exponentially.
double mean_over_directions(const std::function<double(double)>& f, int count) {
    long double sum = 0.0L;
    for (int i = 0; i < count; ++i) sum += f(2.0 * pi * i / count);
    return static_cast<double>(sum / count);
}

/// ∫d²k |p(k)|² f(kx, ky)/2π in the coordinates that make the spot round: kx wx = κ cosψ, ky wy = κ
/// sinψ, |p|² = e^{−κ²/4}; κ = e^t.
double plane_integral(const Footprint& spot, int directions,
                      const std::function<double(double, double)>& f) {
    constexpr int panels = 24;
    constexpr double from = -30.0;
    const double to = std::log(13.0), width = (to - from) / panels;
    const auto along = [&](double psi) {
        const double x = std::cos(psi) / spot.radius_x, y = std::sin(psi) / spot.radius_y;
        const auto integrand = [&](double t) {
            const double scaled = std::exp(t);
            return scaled * scaled * std::exp(-0.25 * scaled * scaled) * f(scaled * x, scaled * y);
        };
        double sum = 0.0;
        for (int i = 0; i < panels; ++i) {
            sum += boost::math::quadrature::gauss<double, 30>::integrate(
                integrand, from + i * width, from + (i + 1) * width);
        }
        return sum;
    };
    return mean_over_directions(along, directions) / (spot.radius_x * spot.radius_y);
}

TEST(Footprint, AveragesOverDirectionsAreTheirQuadratures) {
    WorstError radius, cube, spectrum;
    for (const double ratio : {1.0, 1.001, 1.5, 2.0, 6.0, 30.0}) {
        const Footprint spot(0.01, 0.01 * ratio);
        const std::string where = "1:" + std::to_string(ratio);
        const auto square = [&](double phi) {
            return std::pow(spot.radius_x * std::cos(phi), 2) +
                   std::pow(spot.radius_y * std::sin(phi), 2);
        };
        const auto power = [&](double exponent) {
            return mean_over_directions([&](double phi) { return std::pow(square(phi), exponent); },
                                        4096);
        };
        radius.see(relative_error(mean_inverse_radius(spot), power(-0.5)), where);
        cube.see(relative_error(mean_inverse_cube(spot), power(-1.5)), where);
        for (double scaled = 0.01; scaled < 13.0; scaled *= 1.5) {
            const double k = scaled / 0.01;
            const double direct = mean_over_directions(
                [&](double phi) { return std::exp(-0.25 * k * k * square(phi)); }, 4096);
            spectrum.see(relative_error(mean_squared_spectrum(spot, k), direct),
                         where + ", kw = " + std::to_string(scaled));
        }
    }
    radius.print("mean of 1/w");
    cube.print("mean of 1/w³");
    spectrum.print("mean of |p(k)|²");
    EXPECT_LE(radius.error(), 2e-15);
    EXPECT_LE(cube.error(), 3e-15);
    EXPECT_LE(spectrum.error(), 3e-14);
}

TEST(Footprint, MeanOfTheInverseRadiusIsTheEllipticIntegral) {
    for (const double ratio : {1.0, 1.5, 4.0, 100.0}) {
        const double modulus = std::sqrt((1.0 - 1.0 / ratio) * (1.0 + 1.0 / ratio));
        const double expected = 2.0 / pi * boost::math::ellint_1(modulus) / (3.0 * ratio);
        EXPECT_NEAR(mean_inverse_radius({3.0, 3.0 * ratio}) / expected, 1.0, 1e-14);
    }
    // A long ellipse: K → ln(4 w_max/w_min); next order (w_min/w_max)².
    EXPECT_NEAR(mean_inverse_radius({1e-6, 1.0}) / (2.0 / pi * std::log(4e6)), 1.0, 8e-13);
    EXPECT_NEAR(mean_inverse_cube({1e-6, 1.0}) / (2.0 / pi * 1e12), 1.0, 3e-11);
}

/// Every spectrum as a function of the spot, at a given frequency.
using Spectrum = std::function<double(const Footprint&, double)>;

std::vector<Spectrum> all_spectra() {
    static const Mirror mirror = quarter_wave_mirror(true, 2);
    return {
        [](const Footprint& s, double f) { return mirror.noise(s, 300.0, f).everything_coherent; },
        [](const Footprint& s, double f) { return mirror.noise(s, 300.0, f).coating_coherent; },
        [](const Footprint& s, double f) {
            return substrate_thermo_elastic_psd(silica, s, 300.0, f);
        },
        [](const Footprint& s, double f) {
            return adiabatic_thermo_elastic_psd(silica, s, 300.0, f);
        },
        [](const Footprint& s, double f) {
            return thermo_refractive_psd(silica, path, s, 300.0, f);
        },
        [](const Footprint& s, double f) {
            return standing_wave_thermo_refractive_psd(silica, path, s, 300.0, f);
        },
        [](const Footprint& s, double f) {
            return face_temperature_psd(1.38, 1.64e6, s, 300.0, f);
        },
        [](const Footprint& s, double f) {
            return face_temperature_psd_one_dimensional(1.38, 1.64e6, s, 300.0, f);
        },
        [](const Footprint& s, double f) {
            return classic_thermo_optic(mirror.substrate, mirror.layers, s, 300.0, f,
                                        LayerStrain::own_thickness)
                .psd;
        },
        [](const Footprint& s, double f) {
            return parallel_perpendicular_psd(silica_elastic, tantala_elastic, 1e-6, 1e-4, 2e-4, s,
                                              300.0, f);
        },
        [](const Footprint& s, double f) {
            return equal_elastic_psd(silica_elastic, 1e-6, 1e-4, s, 300.0, f);
        },
        [](const Footprint& s, double f) {
            return brownian_psd(half_space_energy(silica_elastic, s), {1e-6, 1e-6}, 300.0, f);
        },
        [](const Footprint& s, double f) {
            const StrainEnergy energy =
                thin_film_energies(silica_elastic, mirror.elastic_layers(), s)[1];
            return brownian_psd(energy, {1e-4, 3e-4}, 300.0, f);
        }};
}

TEST(Footprint, OfACircleIsItsRadiusAndItsAxesAreExchangeable) {
    for (const Spectrum& spectrum : all_spectra()) {
        for (const double f : {1e-2, 1e3}) {
            const double circle = spectrum(2e-3, f);
            EXPECT_EQ(spectrum({2e-3, 2e-3}, f), circle);
            // To first order in the ellipticity only the geometric mean counts.
            EXPECT_NEAR(spectrum({2e-3 * (1.0 + 1e-6), 2e-3 / (1.0 + 1e-6)}, f) / circle, 1.0,
                        6e-12);
            EXPECT_NEAR(spectrum({3e-3, 7e-3}, f) / spectrum({7e-3, 3e-3}, f), 1.0, 1e-15);
        }
    }
}

TEST(Footprint, HeatIsThePlaneIntegralOverTheEllipse) {
    const Mirror mirror = quarter_wave_mirror(false, 2, 1e-4);
    const LayeredHeat stack = layered_heat(mirror.substrate, mirror.layers);
    WorstError worst;
    for (const Footprint& spot : {Footprint(1e-3, 2e-3), Footprint(4e-4, 1e-4)}) {
        for (const double f : {1e-4, 1.0, 1e5}) {
            const double omega = 2.0 * pi * f;
            const auto products = [&](double kx, double ky) {
                const SourceProducts p = source_products(stack, std::hypot(kx, ky), omega);
                return p.ee + 2.0 * (p.er + p.es + p.rs) + p.rr + p.ss;
            };
            const double expected = 2.0 * k_b * 9e4 / pi *
                                    plane_integral(spot, spot.radius_y < 2e-4 ? 160 : 64, products);
            worst.see(relative_error(mirror.noise(spot, 300.0, f).everything_coherent, expected),
                      std::to_string(spot.radius_y) + " m, " + std::to_string(f) + " Hz");
        }
    }
    worst.print("coherent thermal noise of an elliptical spot");
    EXPECT_LE(worst.error(), 5e-15);
}

TEST(Footprint, SubstrateAndFaceAreThePlaneIntegralsOverTheEllipse) {
    WorstError worst;
    const double scaled_path = k_b * std::pow(8.6e-6 * 300.0, 2) * 0.2 / pi;
    for (const Footprint& spot : {Footprint(1e-3, 2e-3), Footprint(6e-2, 1e-2)}) {
        const int directions = spot.radius_x > 1e-2 ? 192 : 64;
        for (const double f : {1e-6, 1e-2, 1e2, 1e6}) {
            const double omega = 2.0 * pi * f, kappa = 1.38, capacity = 1.64e6;
            const double k_t2 = omega * capacity / kappa;
            const std::string where = std::to_string(spot.radius_x) + " m, " + std::to_string(f);
            const double path_expected = 2.0 * scaled_path / kappa *
                                         plane_integral(spot, directions, [&](double x, double y) {
                                             const double square = x * x + y * y;
                                             return square / (square * square + k_t2 * k_t2);
                                         });
            worst.see(
                relative_error(thermo_refractive_psd(silica, path, spot, 300.0, f), path_expected),
                "path, " + where);
            const double face_expected =
                2.0 * k_b * 9e4 / (pi * kappa) *
                plane_integral(spot, directions, [&](double x, double y) {
                    return std::real(1.0 / std::sqrt(std::complex<double>(x * x + y * y, k_t2)));
                });
            worst.see(relative_error(face_temperature_psd(kappa, capacity, spot, 300.0, f),
                                     face_expected),
                      "face, " + where);
        }
        // Adiabatic: Re ∫qϑ dz ∝ k; by its ratio to the circle of radius wx.
        const double ratio =
            plane_integral(spot, directions, [](double x, double y) { return std::hypot(x, y); }) /
            plane_integral(spot.radius_x, 1, [](double x, double y) { return std::hypot(x, y); });
        worst.see(
            relative_error(adiabatic_thermo_elastic_psd(silica, spot, 300.0, 1.0) /
                               adiabatic_thermo_elastic_psd(silica, spot.radius_x, 300.0, 1.0),
                           ratio),
            "adiabatic " + std::to_string(spot.radius_x));
        // ∫|p|²d²k/2π: the standing wave's, and the one-dimensional face's.
        const double flat = plane_integral(spot, 8, [](double, double) { return 1.0; });
        worst.see(
            relative_error(standing_wave_thermo_refractive_psd(silica, path, spot, 300.0, 1.0) /
                               standing_wave_thermo_refractive_psd(silica, path, 1.0, 300.0, 1.0),
                           0.5 * flat),
            "standing wave");
        worst.see(
            relative_error(face_temperature_psd_one_dimensional(1.0, 1.0, spot, 300.0, 1.0) /
                               face_temperature_psd_one_dimensional(1.0, 1.0, 1.0, 300.0, 1.0),
                           0.5 * flat),
            "face, one-dimensional");
    }
    worst.print("substrate and face under an elliptical spot");
    EXPECT_LE(worst.error(), 2e-14);
}

TEST(Footprint, SubstrateBrownianIsThePressureOnItsOwnDisplacement) {
    // In real space: a point load moves the face by (1−ν²)/(πE r) (Boussinesq), so U = (1−ν²)/(2πE)
    // ∫P(ρ)/ρ d²ρ with the pressure's autocorrelation P = exp(−x²/wx² − y²/wy²)/(π wx wy).
    WorstError worst;
    for (const Footprint& spot : {Footprint(0.01), Footprint(0.01, 0.02), Footprint(0.05, 0.01)}) {
        const auto along = [&](double phi) {
            const double x = std::cos(phi) / spot.radius_x, y = std::sin(phi) / spot.radius_y;
            const double inverse = std::sqrt(x * x + y * y);
            return boost::math::quadrature::gauss<double, 60>::integrate(
                [&](double r) { return std::exp(-r * r * inverse * inverse); }, 0.0, 6.2 / inverse);
        };
        const double integral =
            2.0 * mean_over_directions(along, 256) / (spot.radius_x * spot.radius_y);
        const double expected = (1.0 - 0.17 * 0.17) / (2.0 * pi * 72e9) * integral;
        const StrainEnergy energy = half_space_energy(silica_elastic, spot);
        worst.see(relative_error(energy.bulk + energy.shear, expected),
                  std::to_string(spot.radius_x) + " x " + std::to_string(spot.radius_y));
    }
    worst.print("substrate Brownian in real space");
    EXPECT_LE(worst.error(), 1e-14);
}

TEST(Footprint, CoatingBrownianIsTheStrainTensorOfEveryDirection) {
    // ε_ij = −η p k_i k_j/k² in the plane, ε_zz from σ_zz = −p; energies of the tensor, integrated
    // over both components of k.
    WorstError worst;
    const Footprint spot(2e-3, 1e-3);
    const double eta = face_dilatation(silica_elastic), lambda = lame_lambda(tantala_elastic);
    const double mu = shear_modulus(tantala_elastic), d = 3e-7;
    const auto energy = [&](double kx, double ky, bool want_bulk) {
        const double square = kx * kx + ky * ky;
        const double xx = -eta * kx * kx / square, yy = -eta * ky * ky / square;
        const double xy = -eta * kx * ky / square;
        const double zz = (-1.0 - lambda * (xx + yy)) / (lambda + 2.0 * mu);
        const double third = (xx + yy + zz) / 3.0;
        if (want_bulk) return 4.5 * bulk_modulus(tantala_elastic) * third * third;
        return mu * (std::pow(xx - third, 2) + std::pow(yy - third, 2) + std::pow(zz - third, 2) +
                     2.0 * xy * xy);
    };
    const StrainEnergy found =
        thin_film_energies(silica_elastic, {{tantala_elastic, surface_weight(d)}}, spot)[0];
    for (const bool bulk : {true, false}) {
        // ∫d²k/(2π)² = (1/2π) of the plane integral.
        const double expected = d / (2.0 * pi) * plane_integral(spot, 16, [&](double x, double y) {
                                    return energy(x, y, bulk);
                                });
        worst.see(relative_error(bulk ? found.bulk : found.shear, expected),
                  bulk ? "bulk" : "shear");
    }
    worst.print("coating Brownian of an elliptical spot");
    EXPECT_LE(worst.error(), 1e-15);
}

TEST(Footprint, WavenumberRuleHasConvergedForEllipses) {
    const Mirror mirror = quarter_wave_mirror(true, 2, 1e-6);
    const LayeredHeat stack = layered_heat(mirror.substrate, mirror.layers);
    WorstError worst;
    for (const double ratio : {1.01, 2.0, 6.0, 30.0}) {
        for (const double w : {3e-5, 1e-3, 0.1}) {
            for (double f = 1e-4; f < 2e6; f *= 10.0) {
                const double omega = 2.0 * pi * f, k_t = diffusion_wavenumber(stack, omega);
                const auto sum = [&](int subdivision) {
                    const WavenumberRule rule = wavenumber_rule({w, w * ratio}, k_t, subdivision);
                    SourceProducts total;
                    double flat = 0.0;
                    for (std::size_t i = 0; i < rule.weight.size(); ++i) {
                        const SourceProducts p = source_products(stack, rule.wavenumber[i], omega);
                        total.ee += rule.weight[i] * p.ee;
                        total.rr += rule.weight[i] * p.rr;
                        total.ss += rule.weight[i] * p.ss;
                        flat += rule.weight[i];
                    }
                    total.bare = flat;
                    return total;
                };
                const SourceProducts once = sum(1), twice = sum(2);
                const std::string where = "1:" + std::to_string(ratio) + ", " + std::to_string(w) +
                                          " m, " + std::to_string(f) + " Hz";
                worst.see(relative_error(once.ee, twice.ee), "expansion " + where);
                worst.see(relative_error(once.rr, twice.rr), "refraction " + where);
                worst.see(relative_error(once.ss, twice.ss), "substrate " + where);
                worst.see(relative_error(once.bare * w * w * ratio, 2.0), "itself " + where);
            }
        }
    }
    worst.print("wavenumber rule of ellipses against twice the nodes");
    EXPECT_LE(worst.error(), 1e-14);
}

TEST(ObliqueFootprint, IsStretchedInThePlaneOfIncidence) {
    const Footprint spot = oblique_footprint(0.01, pi / 3.0);
    EXPECT_NEAR(spot.radius_x, 0.02, 1e-17);
    EXPECT_EQ(spot.radius_y, 0.01);
    EXPECT_EQ(oblique_footprint(0.01, 0.0).radius_x, 0.01);
    for (const double bad : {-0.1, 0.5 * pi, std::nan("")}) {
        EXPECT_THROW(oblique_footprint(0.01, bad), core::DomainError);
    }
    EXPECT_THROW(oblique_footprint(0.0, 0.1), core::DomainError);
}

}  // namespace
}  // namespace stillcoat::noise
