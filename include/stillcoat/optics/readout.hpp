#pragma once
/// What a local strain or index change inside the coating does to the apparent mirror position.
///
/// ξ is the apparent displacement towards the light, along the normal of the face: ξ = Δz −
/// Δarg(r)/(2 n0 k0 cosθ0), since the light's phase counts a displacement 2 n0 k0 cosθ0 times. A
/// change of the coefficients of dE/dz = i k0 a H, dH/dz = i k0 b E moves ξ, per metre of depth, by
///     I(δb, δa) = −Re{(δb E² − δa H²)/r}/(4 n0 cosθ0 η0),
/// E² and H² complex squares of the tangential fields per unit incident tangential amplitude, η0
/// the incident admittance. With the substrate held fixed and β = n0 sinθ0,
///     g  = ∂ξ/∂ε_zz           = 1 + I(b, a) + I(δb, δa),  δb = −n⁴ p12,   δa = 0 (s), −β² p11 (p)
///     g∥ = ∂ξ/∂(ε_xx + ε_yy)  = I(δb, δa),  δb = −n⁴ (p11 + p12)/2,       δa = 0 (s), −β² p12 (p)
///     h  = ∂ξ/∂n              = I(δb, δa),  δb = 2n,                      δa = 0 (s), 2β²/n³ (p)
/// Inside a layer E² and H² are a constant plus exponentials of twice the wavenumber, and so are
/// the weights.
///
/// Leaves out: the difference ε_xx − ε_yy, which averages out under a circular spot (and does not
/// count where the substrate imposes the strain in the plane). Shear strains do not change r to
/// first order. Valid when: isotropic layers, a beam that is wide against the coating.
/// Source: the first-order change of r follows from (E'H − EH')' of the perturbed and the
/// unperturbed field, M. Born & E. Wolf, Principles of Optics, §1.6; strain-optic tensor: J. F.
/// Nye, Physical Properties of Crystals, ch. XIII. At normal incidence T. Hong et al., Phys. Rev. D
/// 87, 082001 (2013), sect. III. Accuracy: 6e-14 absolute against differences with 120 digits.

#include <vector>

#include "stillcoat/optics/standing_wave.hpp"

namespace stillcoat::optics {

/// Strain-optic constants of an isotropic solid, Δ(1/n²)_ij = p_ijkl ε_kl; 0 when unknown.
struct Photoelasticity {
    double p11;
    double p12;
};

/// One exponential of the weights of a layer: exp(rate·depth), or exp(rate·(thickness − depth))
/// when it runs `upwards`; neither grows away from where it starts.
struct ReadoutTerm {
    Complex rate;  ///< [1/m], real part ≤ 0
    bool upwards;
    Complex strain;  ///< its amplitude in g
    Complex in_plane;
    Complex index;
};

/// Weights of one layer: g(z) = strain_constant + Re Σ strain·exponential(z); the others alike.
struct ReadoutLayer {
    double thickness;  ///< [m]
    double strain_constant;
    double in_plane_constant;
    double index_constant;
    std::vector<ReadoutTerm> terms;
};

/// The weights of all layers at the angle and polarisation of the light, evanescent and critical
/// layers included.
/// @param photoelasticity of each layer
/// @throws core::DomainError where |r| < 1e-13 (no phase) or for a constant that is not finite;
///         std::logic_error unless there is one for each layer.
std::vector<ReadoutLayer> readout_weights(const StandingWave& wave,
                                          const std::vector<Photoelasticity>& photoelasticity);

/// The weights of light that does not enter the coating, at any angle: g = 1, g∥ = h = 0.
std::vector<ReadoutLayer> surface_readout(const OpticalStack& stack);

/// g(z), g∥(z) and h(z) at `depth` below the top of a layer [m], 0 ≤ depth ≤ thickness;
/// dimensionless.
double strain_weight(const ReadoutLayer& layer, double depth);
double in_plane_weight(const ReadoutLayer& layer, double depth);
double index_weight(const ReadoutLayer& layer, double depth);

/// ∫g dz, ∫g² dz, ∫h dz and ∫g∥ dz over a layer [m], in closed form.
struct ReadoutIntegrals {
    double strain;
    double strain_squared;
    double index;
    double in_plane;
};
ReadoutIntegrals readout_integrals(const ReadoutLayer& layer);

}  // namespace stillcoat::optics
