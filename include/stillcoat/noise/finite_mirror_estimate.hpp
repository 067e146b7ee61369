#pragma once
/// How far a finite mirror is from a half-space: the published closed sums, good enough to say how
/// wrong a half-space answer is, not to replace it.
///
/// Sources: F. Bondu, P. Hello, J.-Y. Vinet, Phys. Lett. A 246, 227 (1998), with the correction of
/// Y. T. Liu & K. S. Thorne, Phys. Rev. D 62, 122002 (2000); coating strain in the manner of K.
/// Somiya & K. Yamamoto, Phys. Rev. D 79, 102004 (2009). Leaves out: light that misses the face,
/// elliptical spots, the true stress at the rim (energy low by up to 4 %, coating shear off by
/// 10–70 %). Valid when: beam radius below half the mirror radius.

#include "stillcoat/noise/elastic.hpp"

namespace stillcoat::noise {

/// Power of the finite mirror over power of the half-space.
struct FiniteMirrorEstimate {
    double substrate_brownian;
    double substrate_thermo_elastic;  ///< adiabatic
    double coating_brownian;          ///< equal loss in bulk and shear
};

/// @param radius, thickness of the mirror [m], @param beam_radius 1/e² intensity [m]
/// @throws core::DomainError when a length is not positive
FiniteMirrorEstimate finite_mirror_estimate(const Elastic& substrate, const Elastic& film,
                                            double radius, double thickness, double beam_radius);

}  // namespace stillcoat::noise
