#pragma once
/// The whole part: a plane-parallel plate with a coated front face and a bare or coated rear face.
///
/// Sum of intensities (incoherent, the default). The light entering the plate is
///     u = T1 / D,   D = 1 − R1' R2 τ² = L1' + R1' [L2 + R2 (1 − τ²)],   L = 1 − R = T + A,
/// with 1 the front face from outside, 1' the same from inside, 2 the rear face from inside, and
///     R = R1 + T1' u τ² R2,   T = u τ T2,   A_front = A1 + A1' u τ² R2,   A_rear = u τ A2,
///     A_plate = u (1 − τ)(1 + τ R2).
/// Every term is positive: no difference of nearly equal numbers is taken, also where R1' R2 ≈ 1.
/// Internal transmittance of one pass: τ = exp(−2 k0 d Im q), q = √(n_s² − n0² sin²θ0) with the
/// complex index n_s = n + ik. For weak absorption that is exp(−4π k d/(λ cosθ_s)), cosθ_s by
/// Snell's law with the real n, up to a relative (k/n cosθ_s)² in the exponent.
///
/// The faces are computed with the real part n of the plate's index on both of their sides. So
/// R + T + A = 1 at each face, T1 = T1' and the part's T is the same from both sides, exactly. The
/// price is an error of the order k/(n cos²θ_s) in R, T, A of a coated face. A sum of intensities
/// is therefore refused where Im q > 0.01 Re q. Where ln τ < −40 nothing returns from the rear face
/// and fringes have vanished in rounding: the exact coherent result with the complex index is given
/// instead, which also holds for metals and for light that cannot enter the plate. Between the two
/// there is a step of that order, k/n.
///
/// Coherent: the plate is one more layer of the stack, exact for a plane wave (Airy's formula).
///
/// Leaves out: wedge and finite beam (passes that miss the detector or each other), spectral width
/// between the two limits, roughness, birefringence.
/// Valid when: sum of intensities: the light's coherence length is much shorter than 2 n d cosθ_s,
/// or the fringe is averaged over wavelength or thickness, and all passes are collected.
/// Source: M. Born & E. Wolf, Principles of Optics, §7.6 (sum over the beams of a plate; from
/// memory); for intensities the same geometric series, derived independently here.

#include <vector>

#include "stillcoat/optics/response.hpp"

namespace stillcoat::optics {

/// Front layers are listed from the light to the plate, rear layers from the plate to the rear
/// medium. An empty list is a bare face.
struct Part {
    double incident_index;  ///< real, > 0
    std::vector<OpticalLayer> front_layers;
    Complex substrate_index;     ///< n + ik of the plate, k ≥ 0
    double substrate_thickness;  ///< [m], > 0, at most 1e9 wavelengths in the plate
    std::vector<OpticalLayer> rear_layers;
    double rear_index;  ///< real, > 0
};

enum class Summation {
    intensities,  ///< incoherent: fringes of the plate averaged out
    amplitudes    ///< coherent: fringes of a perfect plane-parallel plate
};

struct PartResponse {
    double reflectance;
    double transmittance;      ///< power that reaches the rear medium; may underflow to 0
    double log_transmittance;  ///< natural logarithm of T; −infinity when nothing can get through
    double absorptance;        ///< front_absorptance + substrate_absorptance + rear_absorptance
    double loss;               ///< 1 − R without cancellation: T + A
    double front_absorptance;  ///< all layers of the front coating
    double substrate_absorptance;
    double rear_absorptance;                      ///< all layers of the rear coating
    std::vector<double> front_layer_absorptance;  ///< in the order of Part::front_layers
    std::vector<double> rear_layer_absorptance;   ///< in the order of Part::rear_layers
    double log_internal_transmittance;            ///< ln τ of one pass through the plate, ≤ 0
};

/// R, T and A of the part per incident power, for light from the front.
/// @param light angle [rad] in the incident medium
/// @param summation whether intensities or amplitudes of the passes are added
/// @throws core::DomainError as response() does; for a thickness of the plate that is not positive;
///         for a sum of intensities in a plate that lets light through although Im q > 0.01 Re q
///         (strong absorption, or beyond the critical angle of the plate): add amplitudes there.
PartResponse part_response(const Part& part, const Illumination& light,
                           Summation summation = Summation::intensities);

/// Each face between half-spaces, the plate's index taken as real.
struct FaceResponses {
    Response front;              ///< light from outside
    Response front_from_inside;  ///< light from the plate; its layers are counted from the plate
    Response rear_from_inside;   ///< light from the plate; layers in the order of the part
};

/// The faces at the transverse wavenumber of `light`. Beyond the critical angle of the rear medium
/// the rear face reflects totally: transmittance 0, loss = absorptance of its layers.
/// @throws core::DomainError as response() does, and where Im q > 0.01 Re q in the plate, since
///         reflectance from within a strongly absorbing medium is no ratio of separable powers.
FaceResponses face_responses(const Part& part, const Illumination& light);

/// The part turned around: the rear medium becomes the incident one.
Part turned_around(const Part& part);

/// The light that falls on turned_around(part) at the transverse wavenumber of `light`, that is
/// along the ray which `light` becomes in the rear medium.
/// @throws core::DomainError for an angle, wavelength or index out of range and when no ray leaves
///         into the rear medium (n0 sinθ0 ≥ n_rear).
Illumination light_from_rear(const Part& part, const Illumination& light);

/// Front layers, plate and rear layers as one stack on the rear medium: what a coherent
/// calculation uses, for phase_response() and the like.
OpticalStack coherent_stack(const Part& part);

}  // namespace stillcoat::optics
