#pragma once
/// The exponential of a complex number less one, for integrals over waves that hardly turn or decay
/// within their layer.
///
/// Source: with x = a + ib, e^x − 1 = (e^a − 1) − 2 e^a sin²(b/2) + i e^a sin b (M. Abramowitz & I.
/// A. Stegun, Handbook of Mathematical Functions, 4.3). Accuracy: 5e-16 of the modulus where it
/// does not vanish; near the zeros x = 2πin the error is that of rounding x.

#include <complex>

namespace stillcoat::numerics {

/// e^x − 1 without cancellation for small x; overflows as exp does.
std::complex<double> complex_expm1(std::complex<double> x);

/// (e^x − 1)/x, which is 1 at x = 0.
std::complex<double> relative_complex_expm1(std::complex<double> x);

}  // namespace stillcoat::numerics
