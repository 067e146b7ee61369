#pragma once
/// Noise from thermal fluctuations of coating and substrate: one heat equation for both.
///
/// For each transverse wavenumber k the temperature Θ driven by the readout's own source q(z)
/// solves
///     iωC Θ − (κΘ')' + κk²Θ = iωT q(z),   no flux at the face, decay in the substrate,
///     S = (4 k_B T/ω) ∫ (k dk/2π) ⟨|p(k)|²⟩ Im ∫ q Θ dz
/// (Y. Levin, Phys. Lett. A 372, 1941 (2008), applied to M. Evans et al., Phys. Rev. D 78, 102003
/// (2008)); ⟨|p|²⟩ = e^{−k²w²/4} for a circular spot, for an ellipse see footprint.hpp. Sources,
/// displacement towards the light per kelvin and metre of depth:
///     layer:      α E/(1−2ν)·[η + (g − λη)/M] + h β      (expansion; expansion and index,
///     coherent) substrate:  2(1+ν_s) α_s e^{−kz'}
/// η is the face dilatation of the substrate. The bare substrate gives M. Cerdonio et al., Phys.
/// Rev. D 63, 082003 (2001) at every frequency.
///
/// Off normal g and h are those of the light's angle; heat of a thin coating strains it only
/// across, where g holds the photoelastic effect of both polarisations.
///
/// Leaves out: finite mirror, thermal boundary resistance, the finite ratio of coating thickness to
/// beam radius. Valid when: d/w below 0.002 for 1 %: a coating of the substrate's own matter should
/// change nothing and comes out 0.44 % too noisy at d/w = 0.001, 4.3 % at 0.01. Accuracy: 1.2e-12
/// against an independent solution with more digits (0.1 Hz … 100 kHz); the integral has converged
/// to 3e-14 from 1e-4 Hz to 1 MHz and w = 30 µm to 0.1 m.

#include <vector>

#include "stillcoat/noise/elastic.hpp"
#include "stillcoat/noise/footprint.hpp"
#include "stillcoat/optics/readout.hpp"

namespace stillcoat::noise {

struct ThermalMaterial {
    Elastic elastic;
    double expansion;      ///< α [1/K]
    double conductivity;   ///< κ [W/(m K)], > 0
    double heat_capacity;  ///< C per volume [J/(m³ K)], > 0
};

struct ThermalLayer {
    ThermalMaterial material;
    double index_slope;  ///< β = dn/dT that multiplies h [1/K]; see free_index_slope
    optics::ReadoutLayer readout;
};

/// @throws core::DomainError when a number is out of range or not finite.
void validate(const ThermalMaterial& material);
void validate(const ThermalLayer& layer);

/// dn/dT without the photoelastic part that zero stress brings: β + (n³/2)(p11 + 2 p12) α. A
/// photoelastic g(z) must go with this value, so that the effect is not counted twice.
double free_index_slope(double index, double index_slope, double p11, double p12, double expansion);

/// One-sided displacement spectra at one frequency [m²/Hz].
struct ThermalNoise {
    double coating_thermo_elastic;         ///< g = 1, h = 0, the substrate's source set to zero
    double coating_thermo_refractive;      ///< hβ + (g−1)α(1+ν)/(1−ν) alone
    double coating_coherent;               ///< both together, the substrate's source set to zero
    double thermo_elastic_with_substrate;  ///< coating thermo-elastic together with the substrate's
    double everything_coherent;            ///< all sources together
    double substrate_thermo_elastic;       ///< the bare substrate without any coating
};

/// @param spot of the beam on the face, @param temperature [K], @param frequency [Hz]; all > 0
/// @throws core::DomainError for a quantity out of range.
ThermalNoise thermal_noise(const ThermalMaterial& substrate,
                           const std::vector<ThermalLayer>& layers, const Footprint& spot,
                           double temperature, double frequency);

/// The bare substrate alone, all frequencies [m²/Hz].
double substrate_thermo_elastic_psd(const ThermalMaterial& substrate, const Footprint& spot,
                                    double temperature, double frequency);

/// The bare substrate when the diffusion length is short against the beam: V. B. Braginsky, M. L.
/// Gorodetsky, S. P. Vyatchanin, Phys. Lett. A 264, 1 (1999) [m²/Hz]; an ellipse by ⟨1/w³⟩ = (2/π)
/// E(m)/(w_max w_min²), m = 1 − w_min²/w_max².
double adiabatic_thermo_elastic_psd(const ThermalMaterial& substrate, const Footprint& spot,
                                    double temperature, double frequency);

}  // namespace stillcoat::noise
