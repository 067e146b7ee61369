#pragma once
/// What the closed forms need of an elliptical spot: averages over the directions of the
/// wavenumber, w_φ² = wx² cos²φ + wy² sin²φ. For a circle each is the same power of its radius.

#include "stillcoat/noise/footprint.hpp"

namespace stillcoat::noise {

/// 1/(π wx wy) = ∫p² dA for unit force [1/m²].
double squared_pressure(const Footprint& spot);

/// ⟨1/w_φ⟩ = (2/π) K(m)/w_max = 1/AGM(wx, wy) [1/m], m = 1 − w_min²/w_max². The
/// arithmetic-geometric mean is C. F. Gauss's form of the complete elliptic integral (Abramowitz &
/// Stegun 17.6).
double mean_inverse_radius(const Footprint& spot);

/// ⟨1/w_φ³⟩ = (2/π) E(m)/(w_max w_min²) [1/m³].
double mean_inverse_cube(const Footprint& spot);

/// ⟨|p(k)|²⟩ at wavenumber k [1/m]: exp(−k²(wx²+wy²)/8) I0(k²(wx²−wy²)/8), without overflow.
double mean_squared_spectrum(const Footprint& spot, double wavenumber);

}  // namespace stillcoat::noise
