#pragma once
/// Isotropic elastic constants and what follows from them (L. D. Landau & E. M. Lifshitz, Theory of
/// Elasticity, §5).

namespace stillcoat::noise {

struct Elastic {
    double youngs_modulus;  ///< E [Pa], > 0
    double poisson_ratio;   ///< ν, −1 < ν < 0.5
};

/// @throws core::DomainError when E or ν is out of range.
void validate(const Elastic& elastic);

double lame_lambda(const Elastic& elastic);     ///< λ [Pa]
double shear_modulus(const Elastic& elastic);   ///< μ [Pa]
double bulk_modulus(const Elastic& elastic);    ///< K [Pa]
double p_wave_modulus(const Elastic& elastic);  ///< M = λ + 2μ [Pa]

/// In-plane dilatation of the face of a half-space per unit pressure, (1+ν)(1−2ν)/E [1/Pa].
double face_dilatation(const Elastic& substrate);

}  // namespace stillcoat::noise
