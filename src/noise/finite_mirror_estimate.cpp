#include "stillcoat/noise/finite_mirror_estimate.hpp"

#include <algorithm>
#include <boost/math/special_functions/bessel.hpp>
#include <cmath>

#include "stillcoat/core/constants.hpp"
#include "stillcoat/core/errors.hpp"

namespace stillcoat::noise {
namespace {

/// Sums over the zeros ζ_m of J1 that energy, dilatation gradient and face strain are made of.
struct Sums {
    double energy = 0.0;    // Σ U_m p_m² J0²/ζ_m
    double edge = 0.0;      // Σ p_m J0/ζ_m²
    double gradient = 0.0;  // Σ k_m p_m² J0² (1−Q)(A²+QB²)
    double strain = 0.0;    // Σ J0² p_m² e_m²
    double pressure = 0.0;  // Σ J0² p_m²
};

Sums sum_modes(const Elastic& s, double a, double height, double w) {
    // Notation: ζ_m zero of J1, k = ζ/a, Q = exp(−2kH), x = kH, D = (1−Q)² − 4x²Q.
    const double nu = s.poisson_ratio;
    const int modes = std::clamp(static_cast<int>(6.0 * a / w) + 10, 20, 20000);
    Sums sums;
    for (int m = 1; m <= modes; ++m) {
        const double zeta = boost::math::cyl_bessel_j_zero(1.0, m);
        const double j0 = boost::math::cyl_bessel_j(0, zeta);
        const double k = zeta / a;
        const double x = k * height;
        const double q = std::exp(-2.0 * x);
        const double d = (1.0 - q) * (1.0 - q) - 4.0 * x * x * q;
        const double p = std::exp(-k * k * w * w / 8.0) / (core::pi * a * a * j0 * j0);
        const double weight = p * p * j0 * j0;
        sums.energy += (1.0 - q * q + 4.0 * x * q) / d * weight / zeta;
        sums.edge += p * j0 / (zeta * zeta);
        const double first = (1.0 - q + 2.0 * x * q) / d;
        const double second = (1.0 - q + 2.0 * x) / d;
        sums.gradient += k * weight * (1.0 - q) * (first * first + q * second * second);
        const double e = (1.0 + nu) / s.youngs_modulus *
                         ((1.0 - 2.0 * nu) * (1.0 - q) * (1.0 - q) + 4.0 * q * x * x) / d;
        sums.strain += weight * e * e;
        sums.pressure += weight;
    }
    return sums;
}

}  // namespace

FiniteMirrorEstimate finite_mirror_estimate(const Elastic& substrate, const Elastic& film,
                                            double radius, double thickness, double beam_radius) {
    validate(substrate);
    validate(film);
    const double smallest = std::min({radius, thickness, beam_radius});
    if (!(smallest > 0.0)) {
        throw core::DomainError("a length of the finite mirror", smallest, "m", "greater than 0",
                                "Liu & Thorne 2000");
    }
    const double a = radius, height = thickness, w = beam_radius;
    const double young = substrate.youngs_modulus, nu = substrate.poisson_ratio;
    const Sums sums = sum_modes(substrate, a, height, w);
    const double area = core::pi * a * a;
    const double p0 = 1.0 / area;
    const double s = area * sums.edge;
    const double pi = core::pi;
    const double u0 = (1.0 - nu * nu) * pi * a * a * a / young * sums.energy;
    const double h2 = height * height;
    const double correction =
        a * a / (6.0 * pi * h2 * height * young) *
        (pi * pi * h2 * h2 * p0 * p0 + 12.0 * pi * h2 * nu * p0 * s + 72.0 * (1.0 - nu) * s * s);
    const double half_space = (1.0 - nu * nu) / (2.0 * std::sqrt(pi) * young * w);

    const double bend = p0 / height - 24.0 * s / (pi * h2 * height);
    const double gradient =
        std::sqrt(pi) * w * w * w *
        (area * sums.gradient + area * height / (4.0 * (1.0 + nu) * (1.0 + nu)) * bend * bend);

    const double yf = film.youngs_modulus, nf = film.poisson_ratio;
    const double across = (1.0 + nf) * (1.0 - 2.0 * nf) / (yf * (1.0 - nf));
    const double e0 = (nu * p0 + 6.0 * (1.0 - nu) * s / (pi * h2)) / young;
    const double coating = area * (yf / (1.0 - nf * nf) * sums.strain + across * sums.pressure +
                                   2.0 * yf * e0 * e0 / (1.0 - nf) + p0 * p0 * across);
    const double eta = face_dilatation(substrate);
    const double coating_half_space = (yf / (1.0 - nf * nf) * eta * eta + across) / (pi * w * w);
    return {(u0 + correction) / half_space, gradient, coating / coating_half_space};
}

}  // namespace stillcoat::noise
