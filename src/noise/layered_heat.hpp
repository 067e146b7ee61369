#pragma once
/// Heat conduction through all layers and the substrate, driven by the sources of the readout.
///
/// No flux leaves the face, the temperature decays in the substrate. The operator is symmetric, so
/// what the three sources (expansion of the coating, refraction of the coating, expansion of the
/// substrate) do to each other is one symmetric matrix, computed in one pass up and one pass down.

#include <vector>

#include "noise/heat_layer.hpp"

namespace stillcoat::noise {

/// Re ∫ q_a ϑ_b dz [m⁴/(W K)] for the sources e (expansion of the coating), r (refraction of the
/// coating) and s (expansion of the substrate), and for the bare substrate without any coating.
struct SourceProducts {
    double ee = 0.0, er = 0.0, rr = 0.0;
    double es = 0.0, rs = 0.0, ss = 0.0;
    double bare = 0.0;
};

struct LayeredHeat {
    std::vector<HeatLayer> layers;
    ThermalMaterial substrate;
};

LayeredHeat layered_heat(const ThermalMaterial& substrate, const std::vector<ThermalLayer>& layers);

/// @param wavenumber k [1/m] > 0, @param angular_frequency ω [rad/s] > 0
SourceProducts source_products(const LayeredHeat& stack, double wavenumber,
                               double angular_frequency);

/// Re ∫ q ϑ dz of the bare substrate.
double bare_substrate_product(const ThermalMaterial& substrate, double wavenumber,
                              double angular_frequency);

/// The smallest √(ωC/κ) of all media [1/m].
double diffusion_wavenumber(const LayeredHeat& stack, double angular_frequency);

}  // namespace stillcoat::noise
