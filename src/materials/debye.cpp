#include "stillcoat/materials/debye.hpp"

#include <algorithm>
#include <boost/math/quadrature/gauss.hpp>
#include <cmath>

#include "stillcoat/core/constants.hpp"
#include "stillcoat/core/errors.hpp"

namespace stillcoat::materials {
namespace {

void check(double temperature, const char* what) {
    if (std::isfinite(temperature) && temperature > 0.0) return;
    throw core::DomainError(what, temperature, "K", "positive and finite",
                            "P. Debye, Ann. Phys. (Leipzig) 344, 789 (1912)");
}

}  // namespace

double debye_shape(double temperature, double debye_temperature) {
    check(temperature, "temperature");
    check(debye_temperature, "Debye temperature");
    // C_V/(3Nk) = 3 (T/θ)³ ∫₀^{θ/T} x⁴ eˣ/(eˣ−1)² dx
    const double top = debye_temperature / temperature;
    // The next term of the series is θ⁴/560T⁴.
    if (top < 1e-3) return 1.0 - top * top / 20.0;
    // Beyond x = 60 the integrand adds less than 1e-19 to 4π⁴/15.
    if (top > 60.0) {
        const double cold = 1.0 / top;
        return 4.0 * core::pi * core::pi * core::pi * core::pi / 5.0 * cold * cold * cold;
    }
    using Gauss = boost::math::quadrature::gauss<double, 20>;
    const auto integrand = [](double x) {
        if (x < 1e-8) return x * x;
        const double e = std::expm1(x);
        return x * x * x * x * (e + 1.0) / (e * e);
    };
    constexpr int panels = 8;
    double sum = 0.0;
    for (int i = 0; i < panels; ++i) {
        sum += Gauss::integrate(integrand, top * i / panels, top * (i + 1) / panels);
    }
    return std::clamp(3.0 * sum / (top * top * top), 0.0, 1.0);
}

}  // namespace stillcoat::materials
