#include "stillcoat/numerics/cubic_spline.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <stdexcept>

namespace {

using stillcoat::numerics::CubicSpline;
using stillcoat::numerics::Jet;

Jet<double> variable(double x) { return {x, 1.0, 0.0}; }

TEST(CubicSpline, PassesThroughItsPoints) {
    const std::vector<double> x{0.0, 0.3, 1.0, 1.1, 4.0}, y{1.0, -2.0, 0.5, 0.6, 7.0};
    const CubicSpline spline(x, y);
    for (std::size_t i = 0; i < x.size(); ++i)
        EXPECT_NEAR(spline(variable(x[i])).value, y[i], 1e-14);
}

TEST(CubicSpline, IsExactForAStraightLine) {
    const CubicSpline spline({0.0, 1.0, 5.0}, {1.0, 3.0, 11.0});
    const Jet<double> at = spline(variable(2.7));
    EXPECT_NEAR(at.value, 6.4, 1e-14);
    EXPECT_NEAR(at.first, 2.0, 1e-14);
    EXPECT_NEAR(at.second, 0.0, 1e-14);
}

TEST(CubicSpline, HasContinuousSlopeAndCurvature) {
    const std::vector<double> x{0.0, 0.3, 1.0, 1.1, 4.0};
    const CubicSpline spline(x, {1.0, -2.0, 0.5, 0.6, 7.0});
    for (std::size_t i = 1; i + 1 < x.size(); ++i) {
        const Jet<double> left = spline(variable(x[i] - 1e-9)),
                          right = spline(variable(x[i] + 1e-9));
        EXPECT_NEAR(left.first, right.first, 1e-6);
        EXPECT_NEAR(left.second, right.second, 1e-5);
    }
    EXPECT_NEAR(spline(variable(0.0)).second, 0.0, 1e-14);
    EXPECT_NEAR(spline(variable(4.0)).second, 0.0, 1e-12);
}

TEST(CubicSpline, ConvergesToASmoothFunction) {
    const auto error = [](int n) {
        std::vector<double> x, y;
        for (int i = 0; i <= n; ++i) {
            x.push_back(3.0 * i / n);
            y.push_back(std::sin(x.back()));
        }
        return std::abs(CubicSpline(x, y)(variable(1.234)).value - std::sin(1.234));
    };
    // Fourth order away from the ends: halving the spacing divides the error by sixteen.
    EXPECT_LT(error(80), error(20) / 100.0);
    EXPECT_LT(error(80), 1e-7);
}

TEST(CubicSpline, RefusesPointsOutOfOrder) {
    EXPECT_THROW(CubicSpline({1.0, 1.0}, {0.0, 0.0}), std::logic_error);
    EXPECT_THROW(CubicSpline({1.0}, {0.0}), std::logic_error);
}

}  // namespace
