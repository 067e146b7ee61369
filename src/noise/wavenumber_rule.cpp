#include "noise/wavenumber_rule.hpp"

#include <boost/math/quadrature/gauss.hpp>
#include <cmath>

namespace stillcoat::noise {
namespace {

constexpr double largest_scaled_wavenumber = 13.0;  // kw at which the Gaussian is cut off

/// Panels of 30 nodes that a range of u needs; its logarithm grows with the decades that k crosses.
int panels_for(double range) {
    if (range < 1.0) return 1;
    if (range < 3.0) return 2;
    return range < 8.0 ? 4 : 6;
}

}  // namespace

WavenumberRule wavenumber_rule(double beam_radius, double diffusion_wavenumber, int subdivision) {
    using Gauss = boost::math::quadrature::gauss<double, 30>;
    const double w = beam_radius, k_t = diffusion_wavenumber;
    const double range = std::asinh(largest_scaled_wavenumber / (w * k_t));
    const int panels = subdivision * panels_for(range);
    const double half = 0.5 * range / panels;
    WavenumberRule rule;
    const auto add = [&](double u, double weight) {
        const double k = k_t * std::sinh(u);
        rule.wavenumber.push_back(k);
        rule.weight.push_back(weight * half * k_t * std::cosh(u) * k *
                              std::exp(-0.25 * k * k * w * w));
    };
    for (int panel = 0; panel < panels; ++panel) {
        const double middle = (2 * panel + 1) * half;
        for (std::size_t i = 0; i < Gauss::abscissa().size(); ++i) {
            const double offset = half * Gauss::abscissa()[i];
            add(middle - offset, Gauss::weights()[i]);
            add(middle + offset, Gauss::weights()[i]);
        }
    }
    return rule;
}

}  // namespace stillcoat::noise
