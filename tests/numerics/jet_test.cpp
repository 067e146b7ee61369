#include "stillcoat/numerics/jet.hpp"

#include <gtest/gtest.h>

namespace stillcoat::numerics {
namespace {

using Complex = std::complex<double>;
using RealJet = Jet<double>;
using ComplexJet = Jet<Complex>;

void expect_jet(const ComplexJet& found, Complex value, Complex first, Complex second) {
    EXPECT_LE(std::abs(found.value - value), 1e-14 * (1.0 + std::abs(value)));
    EXPECT_LE(std::abs(found.first - first), 1e-14 * (1.0 + std::abs(first)));
    EXPECT_LE(std::abs(found.second - second), 1e-14 * (1.0 + std::abs(second)));
}

/// The variable itself, at a complex place.
ComplexJet variable(Complex x) { return {x, 1.0, 0.0}; }

constexpr Complex x(0.7, -0.4);

TEST(Jet, DifferentiatesPolynomials) {
    const ComplexJet v = variable(x);
    expect_jet(v * v * v, x * x * x, 3.0 * x * x, 6.0 * x);
    expect_jet(v * v - v, x * x - x, 2.0 * x - 1.0, 2.0);
    expect_jet(-v + ComplexJet(Complex(2.0)), 2.0 - x, -1.0, 0.0);
}

TEST(Jet, DifferentiatesQuotients) {
    const ComplexJet v = variable(x), one(Complex(1.0));
    expect_jet(one / v, 1.0 / x, -1.0 / (x * x), 2.0 / (x * x * x));
    expect_jet(v / (one + v), x / (1.0 + x), 1.0 / ((1.0 + x) * (1.0 + x)),
               -2.0 / ((1.0 + x) * (1.0 + x) * (1.0 + x)));
}

TEST(Jet, DifferentiatesRootExponentialAndLogarithm) {
    const ComplexJet v = variable(x);
    const Complex root = std::sqrt(x);
    expect_jet(sqrt(v), root, 0.5 / root, -0.25 / (root * x));
    expect_jet(exp(v * v), std::exp(x * x), 2.0 * x * std::exp(x * x),
               (2.0 + 4.0 * x * x) * std::exp(x * x));
    expect_jet(log(v), std::log(x), 1.0 / x, -1.0 / (x * x));
}

TEST(Jet, InvertsItsOwnOperations) {
    const ComplexJet u{Complex(0.3, 0.8), Complex(-1.2, 0.5), Complex(0.4, 2.0)};
    const ComplexJet v{Complex(1.1, -0.2), Complex(0.6, 0.1), Complex(-0.7, 0.3)};
    const ComplexJet quotient = u * v / v;
    expect_jet(quotient, u.value, u.first, u.second);
    const ComplexJet logarithm = exp(log(u));
    expect_jet(logarithm, u.value, u.first, u.second);
    const ComplexJet square = sqrt(u) * sqrt(u);
    expect_jet(square, u.value, u.first, u.second);
}

TEST(Jet, OfRealNumbersBecomesComplex) {
    const RealJet v{2.0, 1.0, 0.0};
    const RealJet cube = v * v * v;
    EXPECT_EQ(cube.first, 12.0);
    EXPECT_EQ(cube.second, 12.0);
    expect_jet(to_complex(cube), 8.0, 12.0, 12.0);
}

}  // namespace
}  // namespace stillcoat::numerics
