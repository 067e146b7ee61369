#include "noise/wavenumber_rule.hpp"

#include <algorithm>
#include <boost/math/quadrature/gauss.hpp>
#include <cmath>

#include "noise/footprint_averages.hpp"

namespace stillcoat::noise {
namespace {

using Gauss = boost::math::quadrature::gauss<double, 30>;

constexpr double largest_scaled_wavenumber = 13.0;  // kw at which the Gaussian is cut off

/// Panels of 30 nodes that a range of u needs; its logarithm grows with the decades that k crosses.
int panels_for(double range) {
    if (range < 1.0) return 1;
    if (range < 3.0) return 2;
    return range < 8.0 ? 4 : 6;
}

/// Adds `panels` equal panels over from … to in u.
void add_panels(const Footprint& spot, double k_t, double from, double to, int panels,
                WavenumberRule& rule) {
    const double half = 0.5 * (to - from) / panels;
    const auto add = [&](double u, double weight) {
        const double k = k_t * std::sinh(u);
        rule.wavenumber.push_back(k);
        rule.weight.push_back(weight * half * k_t * std::cosh(u) * k *
                              mean_squared_spectrum(spot, k));
    };
    for (int panel = 0; panel < panels; ++panel) {
        const double middle = from + (2 * panel + 1) * half;
        for (std::size_t i = 0; i < Gauss::abscissa().size(); ++i) {
            const double offset = half * Gauss::abscissa()[i];
            add(middle - offset, Gauss::weights()[i]);
            add(middle + offset, Gauss::weights()[i]);
        }
    }
}

}  // namespace

WavenumberRule wavenumber_rule(const Footprint& spot, double diffusion_wavenumber,
                               int subdivision) {
    const auto [smaller, larger] = std::minmax(spot.radius_x, spot.radius_y);
    const double k_t = diffusion_wavenumber;
    const double last = largest_scaled_wavenumber / smaller;
    double reached = largest_scaled_wavenumber / larger;
    double u = std::asinh(reached / k_t);
    WavenumberRule rule;
    add_panels(spot, k_t, 0.0, u, subdivision * panels_for(u), rule);
    while (reached < last) {
        reached = std::min(2.0 * reached, last);
        const double next = std::asinh(reached / k_t);
        add_panels(spot, k_t, u, next, subdivision, rule);
        u = next;
    }
    return rule;
}

}  // namespace stillcoat::noise
