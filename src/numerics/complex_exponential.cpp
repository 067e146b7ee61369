#include "stillcoat/numerics/complex_exponential.hpp"

#include <cmath>

namespace stillcoat::numerics {

std::complex<double> complex_expm1(std::complex<double> x) {
    const double half_sine = std::sin(0.5 * x.imag());
    const double half_cosine = std::cos(0.5 * x.imag());
    const double growth = std::expm1(x.real());
    return {growth - 2.0 * (1.0 + growth) * half_sine * half_sine,
            2.0 * (1.0 + growth) * half_sine * half_cosine};
}

std::complex<double> relative_complex_expm1(std::complex<double> x) {
    return x == 0.0 ? 1.0 : complex_expm1(x) / x;
}

}  // namespace stillcoat::numerics
