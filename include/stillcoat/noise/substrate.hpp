#pragma once
/// Noise of the substrate: Brownian motion of a half-space, and the thermo-refractive phase of
/// light that crosses it.

#include "stillcoat/noise/coating_brownian.hpp"
#include "stillcoat/noise/thermal.hpp"

namespace stillcoat::noise {

/// Strain energy of a half-space under a Gaussian pressure per squared force [J/N²]: total
/// (1−ν²)/(2√π E w), bulk share (1+ν)(1−2ν)/(3(1−ν)). With equal losses brownian_psd of it is S =
/// 2k_BTφ(1−ν²)/(π^{3/2} f w E): F. Bondu, P. Hello, J.-Y. Vinet, Phys. Lett. A 246, 227 (1998).
/// An elliptical spot counts by the mean of 1/w over directions, (2/π) K(m)/w_max, m = 1 −
/// w_min²/w_max².
/// Leaves out: the finite mirror, surface loss.
StrainEnergy half_space_energy(const Elastic& substrate, const Footprint& spot);

struct TransmittedPath {
    double index;        ///< n
    double index_slope;  ///< β [1/K]
    double length;       ///< l [m], crossed once
    double wavelength;   ///< vacuum [m]
};

/// Optical path fluctuation of light crossing the substrate once, all frequencies [m²/Hz]:
/// S = (β²l k_BT²/(πκ)) Re[e^{iΩ}E1(iΩ)], Ω = ωCw²/(4κ); V. B. Braginsky & S. P. Vyatchanin, Phys.
/// Lett. A 324, 345 (2004), for a circular spot; an ellipse by the mean of its squared transform.
/// Leaves out: rim, expansion of the path.
/// @param spot cross-section of the beam on its way through the substrate, across the path
double thermo_refractive_psd(const ThermalMaterial& substrate, const TransmittedPath& path,
                             const Footprint& spot, double temperature, double frequency);

/// What the standing wave in the substrate adds to it [m²/Hz]: B. Benthem & Y. Levin, Phys. Rev. D
/// 80, 062004 (2009), for a circular beam, 1/w²; here 1/(wx wy), since ∫k⟨|p|²⟩dk = 2/(wx wy).
double standing_wave_thermo_refractive_psd(const ThermalMaterial& substrate,
                                           const TransmittedPath& path, const Footprint& spot,
                                           double temperature, double frequency);

}  // namespace stillcoat::noise
