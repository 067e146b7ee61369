#include "stillcoat/noise/footprint.hpp"

#include <algorithm>
#include <boost/math/special_functions/bessel.hpp>
#include <boost/math/special_functions/ellint_2.hpp>
#include <cmath>

#include "noise/footprint_averages.hpp"
#include "noise/limits.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/core/errors.hpp"

namespace stillcoat::noise {
namespace {

constexpr char levin[] = "Levin, Phys. Rev. D 57, 659 (1998)";

/// e^{−x} I0(x), x ≥ 0.
double scaled_bessel_i0(double x) {
    if (x < 40.0) return std::exp(-x) * boost::math::cyl_bessel_i(0, x);
    // Asymptotic series Σ ((2k−1)!!)²/(k! (8x)^k); at x = 40 the sixteenth term is 1e-17.
    double sum = 1.0, term = 1.0;
    for (int k = 1; k < 17; ++k) {
        term *= (2.0 * k - 1.0) * (2.0 * k - 1.0) / (8.0 * k * x);
        sum += term;
    }
    return sum / std::sqrt(2.0 * core::pi * x);
}

}  // namespace

Footprint oblique_footprint(double beam_radius, double angle) {
    require_positive(beam_radius, "beam radius", "m", levin);
    if (!(angle >= 0.0 && angle < 0.5 * core::pi)) {
        throw core::DomainError("angle of incidence", angle, "rad", "0 or greater, less than pi/2",
                                levin);
    }
    return {beam_radius / std::cos(angle), beam_radius};
}

double squared_pressure(const Footprint& spot) {
    return 1.0 / (core::pi * spot.radius_x * spot.radius_y);
}

double mean_inverse_radius(const Footprint& spot) {
    double a = spot.radius_x, g = spot.radius_y;
    // Each step squares the relative gap, once it is small; before, it halves its logarithm.
    for (int i = 0; i < 20 && a != g; ++i) {
        const double mean = 0.5 * (a + g);
        g = std::sqrt(a) * std::sqrt(g);
        a = mean;
    }
    return 1.0 / a;
}

double mean_inverse_cube(const Footprint& spot) {
    const auto [smaller, larger] = std::minmax(spot.radius_x, spot.radius_y);
    const double ratio = smaller / larger;
    const double modulus = std::sqrt((1.0 - ratio) * (1.0 + ratio));
    return 2.0 / core::pi * boost::math::ellint_2(modulus) / larger / (smaller * smaller);
}

double mean_squared_spectrum(const Footprint& spot, double wavenumber) {
    const auto [smaller, larger] = std::minmax(spot.radius_x, spot.radius_y);
    const double scaled = wavenumber * smaller;
    const double gaussian = std::exp(-0.25 * scaled * scaled);
    if (smaller == larger) return gaussian;
    return gaussian * scaled_bessel_i0(0.125 * wavenumber * wavenumber * (larger - smaller) *
                                       (larger + smaller));
}

}  // namespace stillcoat::noise
