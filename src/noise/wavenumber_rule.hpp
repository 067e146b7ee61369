#pragma once
/// Quadrature over the transverse wavenumber of a Gaussian beam on a medium that conducts heat:
///     ∫ k ⟨|p(k)|²⟩ f(k) dk ≈ Σ weight_i f(wavenumber_i),
/// ⟨|p|²⟩ = e^{−k²w²/4} for a circular spot; for an ellipse see stillcoat/noise/footprint.hpp.
///
/// k = k_T sinh u spreads the nodes evenly over the decades between the diffusion length 1/k_T and
/// the beam radius w, and the branch point of √(k² + i k_T²) stays away from the path.
/// Gauss–Legendre in u, in as many equal panels as the range asks for, to 13 over the larger
/// radius, where the wide direction ends; from there to 13 over the smaller one, where the narrow
/// direction falls below 1e-18, one panel for each octave.
///
/// Accuracy: 3e-14 against twice the nodes, 1e-4 Hz … 1 MHz and w = 30 µm … 0.1 m; ellipses to
/// 1:30.

#include <vector>

#include "stillcoat/noise/footprint.hpp"

namespace stillcoat::noise {

struct WavenumberRule {
    std::vector<double> wavenumber;  ///< [1/m], > 0
    std::vector<double> weight;      ///< [1/m²]
};

/// @param diffusion_wavenumber k_T = √(ωC/κ) [1/m], the smallest of all media, @param subdivision
/// multiplies the number of panels; for tests of convergence
WavenumberRule wavenumber_rule(const Footprint& spot, double diffusion_wavenumber,
                               int subdivision = 1);

}  // namespace stillcoat::noise
