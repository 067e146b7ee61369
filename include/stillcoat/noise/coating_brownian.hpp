#pragma once
/// Brownian noise of a coating that is thin against the beam, layer by layer.
///
/// A Gaussian pressure p of total force F0 squeezes each layer (σ_zz = −p g(z)) while the substrate
/// imposes its in-plane strain; the energy lost per cycle in bulk and in shear is the noise
/// (Y. Levin, Phys. Rev. D 57, 659 (1998)):
///     S = (8 k_B T/ω) Σ_j (φ_bulk U_bulk + φ_shear U_shear)/F0².
/// With φ_bulk = φ_shear and g = 1 this is the per-layer form of G. M. Harry et al., Class. Quantum
/// Grav. 19, 897 (2002) with φ∥ = φ⊥; with equal elastic constants it is N. Nakagawa et al., Phys.
/// Rev. D 65, 102001 (2002); with g(z) it is T. Hong et al., Phys. Rev. D 87, 082001 (2013).
///
/// Any spot counts by ∫p² dA alone, an ellipse as 1/(π wx wy): a normal load moves the face of a
/// half-space along the gradient of a potential, ε_ij(k) = −η p(k) k_i k_j/k², so that dilatation
/// and ε_ij ε_ij are η p and η² p² for every direction of k, and the energy of an isotropic layer
/// knows no other. Off normal the readout is that of the light's angle, the spot w × w/cosθ.
///
/// Leaves out: the finite ratio of coating thickness to beam radius (too high by 11 % in bulk and
/// 22 % in shear for a stiff film at d/w = 0.02), in-plane readout, the finite mirror. Valid when:
/// d/w below about 0.001 for 1 % (stiff film on silica).

#include <vector>

#include "stillcoat/noise/elastic.hpp"
#include "stillcoat/noise/footprint.hpp"
#include "stillcoat/optics/readout.hpp"

namespace stillcoat::noise {

struct ElasticLayer {
    Elastic elastic;
    optics::ReadoutLayer readout;
};

/// Strain energy per squared force at full load [J/N²].
struct StrainEnergy {
    double bulk;
    double shear;
};

/// Energies of each layer for a Gaussian beam.
/// @param spot of the beam on the face; a radius alone for a circle
/// @throws core::DomainError for constants out of range.
std::vector<StrainEnergy> thin_film_energies(const Elastic& substrate,
                                             const std::vector<ElasticLayer>& layers,
                                             const Footprint& spot);

struct Loss {
    double bulk;   ///< φ of the bulk modulus
    double shear;  ///< φ of the shear modulus
};

/// One-sided displacement spectrum of one volume [m²/Hz].
/// @param frequency [Hz] > 0, @param temperature [K] > 0
double brownian_psd(const StrainEnergy& energy, const Loss& loss, double temperature,
                    double frequency);

/// The form with loss angles for stress in the plane and across it, one homogeneous film without
/// light penetration: G. M. Harry et al. (2002), coating part only [m²/Hz]. Not a sum of positive
/// energies for a film much stiffer than the substrate; kept for comparison with published numbers.
double parallel_perpendicular_psd(const Elastic& substrate, const Elastic& film, double thickness,
                                  double loss_parallel, double loss_perpendicular,
                                  const Footprint& spot, double temperature, double frequency);

/// N. Nakagawa et al. (2002): film elastically equal to the substrate, coating part only [m²/Hz].
double equal_elastic_psd(const Elastic& material, double thickness, double loss,
                         const Footprint& spot, double temperature, double frequency);

}  // namespace stillcoat::noise
