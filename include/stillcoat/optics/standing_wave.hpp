#pragma once
/// The field inside the stack: standing wave, stored energy, peaks.
///
/// In a layer of thickness h the tangential field is E(z) = A e^{iqz} + B e^{iq(h−z)}, z from its
/// top, q = k0 n cosθ: both parts decay from where they start, so thick metal stays finite. Source:
/// M. Born & E. Wolf, Principles of Optics, §1.6; stored energy in its non-dispersive form, J. D.
/// Jackson, Classical Electrodynamics, §6.8 (where dispersion matters the true energy is larger).

#include <complex>
#include <vector>

#include "stillcoat/optics/response.hpp"

namespace stillcoat::optics {

/// Tangential fields at the two faces of a layer, per unit incident tangential amplitude.
struct LayerField {
    Complex electric_top, magnetic_top;
    Complex electric_bottom, magnetic_bottom;
    Complex wavenumber;  ///< q [1/m], Im ≥ 0
    Complex forward;     ///< A, at the top of the layer; loses digits where |q| thickness ≪ 1 and
    Complex backward;    ///< B, at the bottom; means nothing where q = 0: use the faces there
    double thickness;    ///< [m]
};

struct StandingWave {
    OpticalStack stack;
    Illumination light;
    Complex reflection;
    Complex electric_face;  ///< E at the face, 1 + r
    std::vector<LayerField> layers;
    Complex electric_substrate;  ///< E just inside the substrate
};

StandingWave standing_wave(const OpticalStack& stack, const Illumination& light);

/// |E|² of the whole electric field (with the normal component of p light) relative to the incident
/// wave, at `depth` [m] below the top of layer `layer`, 0 ≤ depth ≤ thickness.
double relative_intensity(const StandingWave& wave, std::size_t layer, double depth);

/// The same at the face, on the light's side.
double face_intensity(const StandingWave& wave);

/// Largest relative intensity inside a layer (located by bracketing and minimisation).
struct Peak {
    double intensity;  ///< relative to the incident wave
    double depth;      ///< below the top of the layer [m]
};
Peak peak_intensity(const StandingWave& wave, std::size_t layer);

/// Time-averaged electromagnetic energy stored per watt of incident power [J/W], one per layer.
std::vector<double> stored_energy(const StandingWave& wave);

/// Depth to which the light's energy reaches, c (W/P)/(2 n0) [m]: half the path that light travels
/// during the time W/P.
double energy_penetration_depth(const StandingWave& wave);

}  // namespace stillcoat::optics
