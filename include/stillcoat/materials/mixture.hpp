#pragma once
/// Properties of a mixture of two isotropic substances from theirs and the volume fraction of the
/// second.
///
/// Valid for a mixture that is isotropic as a whole, of grains without voids or compounds between
/// them, large enough to have the properties of the substance and, for the optics, small against
/// the wavelength. What follows from a rule alone is exact only where its comment says so. All
/// sources from memory.
/// @throws core::DomainError from every function: a fraction outside 0 … 1, or an argument outside
/// the range that is stated

#include <complex>

#include "stillcoat/numerics/jet.hpp"

namespace stillcoat::materials {

using ComplexJet = numerics::Jet<std::complex<double>>;

/// Relative permittivity ε [1] of a mixture in effective-medium approximation: of the roots of
///   (1 − f)(ε₁ − ε)/(ε₁ + 2ε) + f (ε₂ − ε)/(ε₂ + 2ε) = 0
/// the one that goes over into ε₁ and ε₂, with its derivatives. Both substances count alike, as
/// spheres.
///
/// With ε₁ε₂ = |ε₁ε₂|e^{2iψ} the product of the roots is −ε₁ε₂/2, so that exactly one of them lies
/// in the half plane Re(εe^{−iψ}) > 0, which holds both constituents: that one.
/// D. A. G. Bruggeman, Ann. Phys. 416, 636 (1935).
/// @param first, second ε₁, ε₂: not 0, Im ε ≥ 0, arguments less than π apart
/// @param fraction f, 0 … 1; at 0 and 1 the constituents come back to the last bit
ComplexJet bruggeman(const ComplexJet& first, const ComplexJet& second, double fraction);

/// The same equation for a conductivity, in the unit of its arguments. @param first, second > 0
double bruggeman(double first, double second, double fraction);

/// Exact [kg/m³]: by volume. @param first, second > 0
double mixed_density(double first, double second, double fraction);

struct HeatStore {
    double density;        ///< [kg/m³], > 0
    double specific_heat;  ///< [J/(kg K)], > 0
};
/// Exact [J/(kg K)]: by mass.
double mixed_specific_heat(const HeatStore& first, const HeatStore& second, double fraction);

struct Elasticity {
    double youngs_modulus;  ///< [Pa], > 0
    double poisson_ratio;   ///< between −1 and 1/2
};
/// From the arithmetic mean of the bounds of Voigt and Reuss on the bulk modulus, and of those on
/// the shear modulus. R. Hill, Proc. Phys. Soc. A 65, 349 (1952).
Elasticity voigt_reuss_hill(const Elasticity& first, const Elasticity& second, double fraction);

struct Expanding {
    double expansion;  ///< linear [1/K]
    Elasticity elasticity;
};
/// Linear expansion [1/K] of grains that all change their volume alike, so that only pressures act:
/// the mean of the expansions with the weights (volume fraction) × (bulk modulus).
/// P. S. Turner, J. Res. Natl. Bur. Stand. 37, 239 (1946).
double turner_expansion(const Expanding& first, const Expanding& second, double fraction);

}  // namespace stillcoat::materials
