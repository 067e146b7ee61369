#pragma once
/// What a stack of plane layers does to a plane wave: reflection, transmission, absorption of every
/// layer, and the delay of the reflected pulse.
///
/// Tangential fields E and H (H in units of E times the vacuum admittance) obey, with β = n0 sinθ0,
///     dE/dz = i k0 a H,   dH/dz = i k0 b E;   s: a = 1, b = n²−β²;   p: a = 1−β²/n², b = n².
/// They are carried upwards from the substrate as a scaled vector: the growth exp(Im δ) of each
/// absorbing or evanescent layer is kept as a number, so that metal of any thickness stays finite.
/// Conventions: time factor exp(−iωt); absorbing index n + ik, k ≥ 0; z into the mirror; layers
/// listed from the light side; r is the ratio of tangential E at the face, so r_p = r_s at normal
/// incidence.
///
/// Leaves out: roughness and scatter, finite beam divergence, the rear face of the substrate.
/// Valid when: plane wave, isotropic layers, real incident index.
/// Source: F. Abelès, Ann. Phys. (Paris) 12, 596 (1950); M. Born & E. Wolf, Principles of Optics,
/// §1.6.

#include <complex>
#include <vector>

#include "stillcoat/numerics/jet.hpp"

namespace stillcoat::optics {

using Complex = std::complex<double>;

enum class Polarisation { s, p };

struct OpticalLayer {
    Complex index;     ///< n + ik at the wavelength, k ≥ 0
    double thickness;  ///< [m], ≥ 0
};

struct OpticalStack {
    double incident_index;  ///< real, > 0
    std::vector<OpticalLayer> layers;
    Complex substrate_index;
};

struct Illumination {
    double wavelength;  ///< vacuum wavelength [m], > 0
    double angle;       ///< in the incident medium [rad], 0 ≤ angle < π/2
    Polarisation polarisation;
};

/// Reflection amplitudes below this are rounding noise: their phase means nothing.
inline constexpr double smallest_reflection = 1e-13;

struct Response {
    Complex reflection;  ///< amplitude ratio of tangential E
    double reflectance;  ///< |r|²
    double
        transmittance;  ///< power that enters the substrate per incident power; may underflow to 0
    double log_transmittance;  ///< natural logarithm of T; −infinity when nothing can enter
    double absorptance;        ///< Σ over the layers
    double loss;               ///< 1 − R without cancellation: T + Σ A_j
    std::vector<double> layer_absorptance;
};

/// Reflection, transmission and absorption.
/// @throws core::DomainError for an incident index, wavelength, angle or thickness out of range, a
///         negative extinction coefficient, or a number that is not finite. Accepted: |index| from
///         1e-6 to 1e6, layers up to 1e9 wavelengths (beyond, a double no longer holds the phase).
Response response(const OpticalStack& stack, const Illumination& light);

/// The same layer for derivatives with respect to the angular frequency ω.
struct DispersiveStack {
    numerics::Jet<double> incident_index;
    std::vector<numerics::Jet<Complex>> layer_index;  ///< value, d/dω [s], d²/dω² [s²]
    std::vector<double> thickness;                    ///< [m], as many as layers
    numerics::Jet<Complex> substrate_index;
};

struct PhaseResponse {
    double reflection_phase;        ///< arg r [rad], in (−π, π]
    double group_delay;             ///< +d arg r/dω [s], positive for a mirror, at fixed angle
    double group_delay_dispersion;  ///< d² arg r/dω² [s²], at fixed angle
    double
        transmission_group_delay;  ///< +d arg t/dω [s], t referred to face and substrate boundary
};

/// Phase, delay and dispersion of the reflected light by exact differentiation.
/// Undefined where |r| < 1e-13 (rounding noise) and where a dispersive substrate passes its
/// critical angle (infinite delay); then all members are quiet NaN and the caller says so.
/// @throws core::DomainError as response() does; std::logic_error when the counts differ.
PhaseResponse phase_response(const DispersiveStack& stack, const Illumination& light);

/// A stack without dispersion.
DispersiveStack without_dispersion(const OpticalStack& stack);

}  // namespace stillcoat::optics
