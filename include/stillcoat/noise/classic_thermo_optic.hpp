#pragma once
/// The classic closed form of coating thermo-optic noise, kept as a named model for comparison:
/// M. Evans et al., Phys. Rev. D 78, 102003 (2008):  S = S_ΔT Γ (ᾱ_c d − β̄λ − ᾱ_s d C_c/C_s)².
///
/// Leaves out: the depth of the thermo-refractive source, the coherence with the substrate's own
/// thermo-elastic noise. Valid when: diffusion length short against the beam, d small against it.

#include <vector>

#include "stillcoat/noise/thermal.hpp"

namespace stillcoat::noise {

/// How the optical thickness of a layer is taken to grow with temperature.
enum class LayerStrain {
    own_thickness,  ///< α(1+ν)/(1−ν), the strain of the layer itself: what changes its optical
                    ///< thickness
    with_substrate,  ///< the effective expansion including the bending of the substrate, as in the
                     ///< article
};

struct ClassicThermoOptic {
    double temperature_psd;  ///< S_ΔT [K²/Hz], beam-averaged face temperature of the substrate
    double thermo_elastic_length;     ///< ᾱ_c d − ᾱ_s d C_c/C_s [m/K]
    double thermo_refractive_length;  ///< β̄λ [m/K]
    double thickness_factor;  ///< Γ, dimensionless; infinite where the lengths cancel exactly
    double psd;               ///< S [m²/Hz]
};

ClassicThermoOptic classic_thermo_optic(const ThermalMaterial& substrate,
                                        const std::vector<ThermalLayer>& layers,
                                        const Footprint& spot, double temperature, double frequency,
                                        LayerStrain strain);

/// Beam-averaged temperature noise of a half-space's face [K²/Hz]: all frequencies,
/// S = (2k_BT²/(πκ)) Re∫k e^{−k²w²/4}/√(k²+iωC/κ) dk; one-dimensional limit (diffusion length short
/// against the beam), V. B. Braginsky, M. L. Gorodetsky, S. P. Vyatchanin, Phys. Lett. A 271, 303
/// (2000). An ellipse by ⟨|p(k)|²⟩ in place of e^{−k²w²/4}, and by 1/(wx wy) in the limit.
double face_temperature_psd(double conductivity, double heat_capacity, const Footprint& spot,
                            double temperature, double frequency);
double face_temperature_psd_one_dimensional(double conductivity, double heat_capacity,
                                            const Footprint& spot, double temperature,
                                            double frequency);

/// Γ of the article's thick-coating correction, →1 for ξ → 0.
/// @param xi d√(2ωC_c/κ_c), @param ratio √(κ_cC_c/(κ_sC_s)), @param elastic_share p_E, refractive
/// share 1−p_E
double thick_coating_factor(double xi, double ratio, double elastic_share);

/// Effective dn/dT of a quarter-wave stack, dn/dT part only, vacuum outside [1/K], δx = λ β̄ δT:
/// V. B. Braginsky et al. (2000) for the low index outermost; M. L. Gorodetsky, Phys. Lett. A 372,
/// 6813 (2008) for both orders.
double quarter_wave_index_slope(double high_index, double low_index, double high_slope,
                                double low_slope, bool high_index_outermost);

}  // namespace stillcoat::noise
