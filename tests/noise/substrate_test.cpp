/// Noise of the substrate.

#include "stillcoat/noise/substrate.hpp"

#include <gtest/gtest.h>

#include <boost/math/quadrature/gauss_kronrod.hpp>
#include <limits>

#include "noise/mirrors.hpp"
#include "support/worst_error.hpp"

namespace stillcoat::noise {
namespace {

using support::relative_error;
using support::WorstError;

constexpr double k_b = core::boltzmann_constant;
constexpr double pi = core::pi;
const TransmittedPath path{1.45, 8.6e-6, 0.2, 1064e-9};

/// Energies of u_r = U J1, u_z = W J0 with U = (1 − 2ν − kz)e^{−kz}·s, W = (2(1−ν) + kz)e^{−kz}·s,
/// s = p(1+ν)/(E k) (K. L. Johnson, Contact Mechanics, ch. 3), integrated over depth and wavenumber.
StrainEnergy energy_by_integration(const Elastic& e, double w) {
    const double nu = e.poisson_ratio, mu = shear_modulus(e);
    double bulk = 0.0, shear = 0.0;
    const auto density = [&](double x, bool want_bulk) {  // x = kz, per p²(1+ν)²/(E²) and k
        const double in_plane = (1.0 - 2.0 * nu - x) * std::exp(-x);   // kU/s/k
        const double across = -(2.0 * (1.0 - nu) + x - 1.0) * std::exp(-x);  // W'
        const double theta = -in_plane + across;
        const double slide = 0.5 * ((-2.0 + 2.0 * nu + x) - (2.0 * (1.0 - nu) + x)) * std::exp(-x);
        (void)slide;
        const double e_rz = -x * std::exp(-x);
        const double third = theta / 3.0, half = -0.5 * in_plane;
        return want_bulk ? 0.5 * bulk_modulus(e) * theta * theta
                         : mu * ((across - third) * (across - third) +
                                 2.0 * (half - third) * (half - third) + 0.5 * in_plane * in_plane +
                                 2.0 * e_rz * e_rz);
    };
    using Rule = boost::math::quadrature::gauss_kronrod<double, 61>;
    bulk = Rule::integrate([&](double x) { return density(x, true); }, 0.0, 60.0, 10, 1e-14);
    shear = Rule::integrate([&](double x) { return density(x, false); }, 0.0, 60.0, 10, 1e-14);
    // ∫ k dk/2π e^{−k²w²/4}/k
    const double beams = 1.0 / (2.0 * std::sqrt(pi) * w);
    const double scale = (1.0 + nu) * (1.0 + nu) / (e.youngs_modulus * e.youngs_modulus) * beams;
    return {bulk * scale, shear * scale};
}

}  // namespace
}  // namespace stillcoat::noise
