#include "stillcoat/numerics/cubic_spline.hpp"

#include <algorithm>
#include <stdexcept>

namespace stillcoat::numerics {

CubicSpline::CubicSpline(std::vector<double> x, std::vector<double> y)
    : x_(std::move(x)), y_(std::move(y)), curvature_(x_.size(), 0.0) {
    const std::size_t n = x_.size();
    if (n < 2 || y_.size() != n ||
        std::adjacent_find(x_.begin(), x_.end(), std::greater_equal<>()) != x_.end()) {
        throw std::logic_error("a spline needs at least two strictly increasing points");
    }
    // Tridiagonal system for the curvatures, zero at both ends; forward elimination, back
    // substitution.
    std::vector<double> ratio(n, 0.0);
    for (std::size_t i = 1; i + 1 < n; ++i) {
        const double left = x_[i] - x_[i - 1];
        const double right = x_[i + 1] - x_[i];
        const double jump = (y_[i + 1] - y_[i]) / right - (y_[i] - y_[i - 1]) / left;
        const double pivot = 2.0 * (left + right) - left * ratio[i - 1];
        ratio[i] = right / pivot;
        curvature_[i] = (6.0 * jump - left * curvature_[i - 1]) / pivot;
    }
    for (std::size_t i = n - 1; i-- > 1;) curvature_[i] -= ratio[i] * curvature_[i + 1];
}

Jet<double> CubicSpline::operator()(const Jet<double>& x) const {
    const auto after = std::upper_bound(x_.begin() + 1, x_.end() - 1, x.value);
    const std::size_t i = static_cast<std::size_t>(after - x_.begin()) - 1;
    const double h = x_[i + 1] - x_[i];
    const double slope =
        (y_[i + 1] - y_[i]) / h - h / 6.0 * (2.0 * curvature_[i] + curvature_[i + 1]);
    const double rate = (curvature_[i + 1] - curvature_[i]) / h;
    const double t = x.value - x_[i];
    return chain(x, y_[i] + t * (slope + t * (curvature_[i] / 2.0 + t * rate / 6.0)),
                 slope + t * (curvature_[i] + t * rate / 2.0), curvature_[i] + t * rate);
}

}  // namespace stillcoat::numerics
