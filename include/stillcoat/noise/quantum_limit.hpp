#pragma once
/// The standard quantum limit: where shot noise and radiation pressure of a position measurement
/// together are least. A reference curve beside the thermal noise, not a noise of the mirror.
///
/// Leaves out: squeezing, optical springs, losses; the mirror is free (well above its suspension's
/// resonance). Source: H. J. Kimble et al., Phys. Rev. D 65, 022002 (2001); V. B. Braginsky & F.
/// Ya. Khalili, Quantum Measurement (Cambridge, 1992), ch. 1.

namespace stillcoat::noise {

/// One free mass: S = 2ħ/(mω²) [m²/Hz], one-sided. @param mass [kg], @param frequency [Hz]; both >
/// 0
/// @throws core::DomainError otherwise
double free_mass_quantum_limit_psd(double mass, double frequency);

/// Interferometer with arm cavities of length `length` [m] between four equal mirrors of `mass`
/// [kg]: strain, S = 8ħ/(mω²L²) [1/Hz].
double interferometer_quantum_limit_psd(double mass, double length, double frequency);

/// Power at the beam splitter that reaches the limit at the cavity's half-bandwidth: I =
/// mL²γ⁴/(4ω0) [W].
/// @param half_bandwidth γ/2π [Hz], @param wavelength vacuum [m]
double quantum_limited_power(double mass, double length, double half_bandwidth, double wavelength);

}  // namespace stillcoat::noise
