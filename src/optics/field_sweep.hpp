#pragma once
/// One sweep from the substrate to the light: reflection, transmission and the tangential fields at
/// every interface per unit incident tangential amplitude.
///
/// The vector (E, H) is carried without the growth exp(Im δ) of each layer; those exponents and the
/// powers of two taken out on the way are counted apart, so nothing overflows, and every amplitude
/// is put together going down, where the exponents only add up. ln T is exact where T underflows.

#include "optics/recursion.hpp"
#include "stillcoat/optics/standing_wave.hpp"

namespace stillcoat::optics {

struct FieldSweep {
    StandingWave wave;
    double transmittance;
    double log_transmittance;
};

/// @throws core::DomainError for input out of range.
FieldSweep field_sweep(const OpticalStack& stack, const Illumination& light);

/// The medium of layer `layer` at the transverse wavenumber of the light.
Medium<Complex> layer_medium(const OpticalStack& stack, const Illumination& light,
                             std::size_t layer);

/// β² = (n0 sinθ0)².
double beta_square(const OpticalStack& stack, const Illumination& light);

/// Tangential fields at `depth` below the top of layer `layer`.
Tangential<Complex> fields_at(const StandingWave& wave, std::size_t layer, double depth);

/// ∫|E|² dz and ∫|H|² dz of the tangential fields over a layer [m].
struct SquaredFields {
    double electric;
    double magnetic;
};
SquaredFields squared_fields(const StandingWave& wave, std::size_t layer);

}  // namespace stillcoat::optics
