#pragma once
/// What a local strain or index change inside the coating does to the apparent mirror position.
///
/// ξ is the apparent displacement towards the light, ξ = Δz − Δarg(r)/(2 n0 k0). Per metre of
/// depth, the substrate held fixed, normal incidence:
///     g(z) = ∂ξ/∂ε_zz = 1 − ¼ Re{[n²E² − H²]/(r n0²)} + ½ Re{n E²/(r n0²)}·(n³ p12/2)
///     h(z) = ∂ξ/∂n    = −½ Re{n E²/(r n0²)}
/// E² and H² are complex squares of the field per unit incident amplitude.
/// Source: T. Hong et al., Phys. Rev. D 87, 082001 (2013), sect. III, in its first-order form; for
/// the perturbation of r: M. Born & E. Wolf, §1.6, differentiated. Leaves out: oblique incidence;
/// strain in the plane of the layer (first order in thickness over beam).

#include <vector>

#include "stillcoat/optics/standing_wave.hpp"

namespace stillcoat::optics {

/// Weights of one layer: g(z) = strain_constant + Re{strain_square · E²(z)}, h(z) = Re{index_square
/// · E²(z)}, E(z) = forward e^{iqz} + backward e^{iq(thickness−z)}.
struct ReadoutLayer {
    double thickness;    ///< [m]
    Complex wavenumber;  ///< q = k0 n [1/m]
    Complex forward;
    Complex backward;
    double strain_constant;
    Complex strain_square;  ///< zero without photoelasticity
    Complex index_square;
};

/// The weights of all layers. `photoelastic_p12[j]` is p12 of layer j (0 when unknown).
/// @throws core::DomainError off normal incidence, where |r| < 1e-13, or for a p12 that is not
/// finite;
///         std::logic_error unless there is one p12 for each layer.
std::vector<ReadoutLayer> readout_weights(const StandingWave& wave,
                                          const std::vector<double>& photoelastic_p12);

/// The weights of light that does not enter the coating: g = 1, h = 0; field and wavenumber are
/// zero.
std::vector<ReadoutLayer> surface_readout(const OpticalStack& stack);

/// g(z) and h(z) at `depth` below the top of a layer [m].
double strain_weight(const ReadoutLayer& layer, double depth);
double index_weight(const ReadoutLayer& layer, double depth);

/// ∫g dz, ∫g² dz and ∫h dz over a layer [m].
struct ReadoutIntegrals {
    double strain;
    double strain_squared;
    double index;
};
ReadoutIntegrals readout_integrals(const ReadoutLayer& layer);

}  // namespace stillcoat::optics
