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

}  // namespace stillcoat::noise
