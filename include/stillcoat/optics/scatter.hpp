#pragma once
/// Light scattered out of the mirror direction by the roughness of one surface, and the loss line.
///
///     S = R [1 − exp(−x²)],   x = 4π σ n0 cosθ/λ;   for small x: S = R x².
/// What stays in the mirror direction is R exp(−x²), so that with the R, T, A of the smooth part
///     1 − R exp(−x²) = T + A + S   exactly.
/// Leaves out: the angular distribution; roughness of the other interfaces and the correlation
/// between them (a coating that repeats its substrate's relief may scatter more or less than its
/// face alone); particles and points; scatter into the substrate and the change it makes in T, A.
/// Valid when: heights are Gaussian, one surface that counts, correlation length not much below the
/// wavelength, x ≤ 0.3 (there S = R x² and the exponential form differ by 4.5 %). σ is the rms
/// roughness of one band of spatial frequencies, and that band is part of the value: at its upper
/// end largest_scattering_frequency(), at its lower end what still counts as beam and not as
/// scatter, about 1/(π beam radius) or 1/λ times the sine of the smallest angle that misses the
/// detector. An rms from a narrower band gives a lower bound of S.
/// Source: H. E. Bennett & J. O. Porteus, J. Opt. Soc. Am. 51, 123 (1961) (from memory), with the
/// cosine of oblique incidence and n0 for light from a medium.

#include "stillcoat/optics/response.hpp"

namespace stillcoat::optics {

/// Total integrated scatter S: power scattered into the incident half-space per incident power.
/// @param reflectance R of the smooth surface, 0 to 1
/// @param roughness σ, rms height [m] in the band that scatters, ≥ 0
/// @param incident_index n0, > 0
/// @param light wavelength in vacuum [m]; angle [rad], 0 to below π/2; the polarisation is not used
/// @throws core::DomainError for values out of these ranges and for 4π σ n0 cosθ/λ > 0.3.
double total_integrated_scatter(double reflectance, double roughness, double incident_index,
                                const Illumination& light);

/// The highest spatial frequency of a relief that scatters light into the incident half-space,
/// n0 (1 + sinθ)/λ [1/m], by the grating equation. Finer relief only makes evanescent waves.
/// @throws core::DomainError for an index, wavelength or angle out of range.
double largest_scattering_frequency(double incident_index, const Illumination& light);

/// Where the light that is missing in the mirror direction went, per incident power.
struct MirrorLoss {
    double transmitted;  ///< T
    double absorbed;     ///< A
    double scattered;    ///< S
    double total;        ///< T + A + S = 1 − reflectance in the mirror direction
};

/// @param transmittance T and @param absorptance A of the smooth mirror
/// @param scatter S, from total_integrated_scatter() with R = 1 − T − A
/// @throws core::DomainError for a value outside 0 to 1 or when the sum exceeds 1 by more than
///         rounding (1e-9).
MirrorLoss mirror_loss(double transmittance, double absorptance, double scatter);

}  // namespace stillcoat::optics
