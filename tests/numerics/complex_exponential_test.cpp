#include "stillcoat/numerics/complex_exponential.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <complex>
#include <iostream>
#include <limits>
#include <numbers>
#include <random>

#include "support/worst_error.hpp"

namespace stillcoat::numerics {
namespace {

using Complex = std::complex<double>;
using Long = std::complex<long double>;

/// e^x − 1 by its power series, or by the exponential where nothing cancels.
Long series(Long x) {
    if (std::abs(x) > 2.0L) return std::exp(x) - 1.0L;
    Long sum = 0.0L, term = 1.0L;
    for (int n = 1; n < 60; ++n) {
        term *= x / static_cast<long double>(n);
        sum += term;
    }
    return sum;
}

double relative_gap(Complex found, Long expected) {
    return static_cast<double>(std::abs(Long(found) - expected) / std::abs(expected));
}

TEST(ComplexExpm1, EqualsItsPowerSeriesFromTheSmallestNumbersUp) {
    constexpr std::uint32_t seed = 61;
    std::cout << "  seed " << seed << "\n";
    std::mt19937 engine(seed);
    std::uniform_real_distribution<double> turn(-std::numbers::pi, std::numbers::pi), size(-200, 0);
    test::WorstError worst, worst_relative;
    for (int trial = 0; trial < 20000; ++trial) {
        const double modulus =
            5.0 * std::pow(10.0, trial % 2 == 0 ? size(engine) : size(engine) / 100);
        const Complex x = std::polar(modulus, turn(engine));
        const std::string where = std::to_string(x.real()) + " + i " + std::to_string(x.imag());
        const Long expected = series(Long(x));
        worst.see(relative_gap(complex_expm1(x), expected), where);
        worst_relative.see(relative_gap(relative_complex_expm1(x), expected / Long(x)), where);
    }
    worst.print("e^x - 1, of its modulus");
    worst_relative.print("(e^x - 1)/x, of its modulus");
    EXPECT_LE(worst.error(), 1e-15);
    EXPECT_LE(worst_relative.error(), 1.5e-15);
}

TEST(ComplexExpm1, OfARealNumberIsThatOfTheStandardLibrary) {
    for (const double x : {-750.0, -1.0, -1e-12, 0.0, 1e-300, 0.3, 700.0}) {
        EXPECT_EQ(complex_expm1(x), Complex(std::expm1(x)));
    }
    EXPECT_EQ(relative_complex_expm1(0.0), Complex(1.0));
}

TEST(ComplexExpm1, OfAPureTurnStaysOnTheUnitCircleAroundMinusOne) {
    for (double b = 1e-9; b < 1e3; b *= 1.7) {
        EXPECT_NEAR(std::abs(complex_expm1({0.0, b}) + 1.0), 1.0, 4e-16) << b;
        EXPECT_NEAR(std::abs(complex_expm1({0.0, b})), 2.0 * std::abs(std::sin(b / 2.0)), 4e-16)
            << b;
    }
}

}  // namespace
}  // namespace stillcoat::numerics
