#include "stillcoat/materials/mixture.hpp"

#include <cmath>

#include "stillcoat/core/errors.hpp"

namespace stillcoat::materials {
namespace {

const char* const where = "mixture of two materials";

void check_fraction(double fraction) {
    if (fraction >= 0.0 && fraction <= 1.0) return;
    throw core::DomainError("volume fraction", fraction, "1", "0 … 1", where);
}

void check_positive(const char* quantity, double value, const char* unit) {
    if (!(value > 0.0)) throw core::DomainError(quantity, value, unit, "> 0", where);
}

/// Bulk and shear modulus [Pa] of an isotropic solid.
struct Moduli {
    double bulk, shear;
};

Moduli moduli(const Elasticity& solid) {
    const double young = solid.youngs_modulus;
    const double poisson = solid.poisson_ratio;
    check_positive("Young's modulus", young, "Pa");
    if (!(poisson > -1.0 && poisson < 0.5))
        throw core::DomainError("Poisson ratio", poisson, "1", "-1 … 0.5", where);
    return {young / (3.0 * (1.0 - 2.0 * poisson)), young / (2.0 * (1.0 + poisson))};
}

/// Argument of a permittivity.
double angle(std::complex<double> permittivity) {
    check_positive("modulus of a permittivity", std::abs(permittivity), "1");
    if (permittivity.imag() < 0.0) {
        throw core::DomainError("imaginary part of a permittivity", permittivity.imag(), "1",
                                "0 or greater", where);
    }
    return std::arg(permittivity);
}

double hill_mean(double first, double second, double fraction) {
    const double voigt = (1.0 - fraction) * first + fraction * second;
    const double reuss = 1.0 / ((1.0 - fraction) / first + fraction / second);
    return 0.5 * (voigt + reuss);
}

}  // namespace

ComplexJet bruggeman(const ComplexJet& first, const ComplexJet& second, double fraction) {
    check_fraction(fraction);
    const double pi = std::acos(-1.0);
    const double turn_first = angle(first.value);
    const double turn_second = angle(second.value);
    if (!(std::abs(turn_first - turn_second) < pi))
        throw core::DomainError("angle between permittivities", pi, "rad", "< π", where);
    if (fraction == 0.0) return first;
    if (fraction == 1.0) return second;
    // Notation: 2ε² − bε − ε₁ε₂ = 0, s² = b² + 8ε₁ε₂, ε = (b ± s)/4 = −2ε₁ε₂/(b ∓ s).
    const ComplexJet b =
        first * ComplexJet(2.0 - 3.0 * fraction) + second * ComplexJet(3.0 * fraction - 1.0);
    const ComplexJet product = first * second;
    ComplexJet s = sqrt(b * b + ComplexJet(8.0) * product);
    const std::complex<double> back = std::polar(1.0, -0.5 * (turn_first + turn_second));
    if ((s.value * back).real() < 0.0) s = -s;
    // The roots differ by s/2 and lie on the two sides of Re(εe^{−iψ}) = 0; of the two forms of
    // the wanted one the form without a difference of nearly equal numbers is taken.
    if (std::norm(b.value + s.value) >= std::norm(b.value - s.value))
        return (b + s) / ComplexJet(4.0);
    return ComplexJet(-2.0) * product / (b - s);
}

double bruggeman(double first, double second, double fraction) {
    check_fraction(fraction);
    for (const double conductivity : {first, second})
        check_positive("conductivity", conductivity, "W/(m K)");
    return bruggeman(ComplexJet(first), ComplexJet(second), fraction).value.real();
}

double mixed_density(double first, double second, double fraction) {
    check_fraction(fraction);
    for (const double density : {first, second}) check_positive("density", density, "kg/m3");
    return (1.0 - fraction) * first + fraction * second;
}

double mixed_specific_heat(const HeatStore& first, const HeatStore& second, double fraction) {
    for (const double heat : {first.specific_heat, second.specific_heat})
        check_positive("specific heat", heat, "J/(kg K)");
    const double mass =
        fraction * second.density / mixed_density(first.density, second.density, fraction);
    return (1.0 - mass) * first.specific_heat + mass * second.specific_heat;
}

Elasticity voigt_reuss_hill(const Elasticity& first, const Elasticity& second, double fraction) {
    check_fraction(fraction);
    const Moduli a = moduli(first);
    const Moduli b = moduli(second);
    if (fraction == 0.0) return first;
    if (fraction == 1.0) return second;
    const double bulk = hill_mean(a.bulk, b.bulk, fraction);
    const double shear = hill_mean(a.shear, b.shear, fraction);
    return {9.0 * bulk * shear / (3.0 * bulk + shear),
            (3.0 * bulk - 2.0 * shear) / (2.0 * (3.0 * bulk + shear))};
}

double turner_expansion(const Expanding& first, const Expanding& second, double fraction) {
    check_fraction(fraction);
    const double weight = fraction * moduli(second.elasticity).bulk;
    const double other = (1.0 - fraction) * moduli(first.elasticity).bulk;
    return (other * first.expansion + weight * second.expansion) / (other + weight);
}

}  // namespace stillcoat::materials
