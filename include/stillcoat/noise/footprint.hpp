#pragma once
/// The spot of a Gaussian beam on the face of a mirror, in general an ellipse.
///
/// Half-space, layers and heat equation are isotropic in the plane of the face, so a spot enters
/// only by the square of its transform averaged over directions: with the pressure (intensity) p =
/// 2/(π wx wy) exp(−2x²/wx² − 2y²/wy²) the transform is exp(−(kx²wx² + ky²wy²)/8), and
///     ⟨|p(k)|²⟩ = exp(−k²(wx² + wy²)/8) I0(k²(wx² − wy²)/8).
///
/// Off normal a circular beam w lights the ellipse w × w/cosθ; the displacement that it reads is
/// along the normal of the face, its phase 2 n0 k0 cosθ times that (the optics' readout weights).
/// Leaves out: the fringes across the face where the light comes back on the same path, as on a
/// folding mirror of a standing-wave cavity (D. Heinert et al., Phys. Rev. D 90, 042001 (2014));
/// one pass alone makes none, since incoming and outgoing light have the same wavenumber along the
/// face. Also the sideways shift of the light within the coating, small against the spot. Source:
/// Y. Levin, Phys. Rev. D 57, 659 (1998), for any intensity; average by I0(x) = ⟨e^{x cos 2φ}⟩.

namespace stillcoat::noise {

struct Footprint {
    double radius_x;  ///< 1/e² intensity radius [m], > 0
    double radius_y;  ///< the same along the other axis

    Footprint(double x, double y) : radius_x(x), radius_y(y) {}
    // NOLINTNEXTLINE(google-explicit-constructor): a circular spot is given by its radius
    Footprint(double radius) : Footprint(radius, radius) {}
};

/// The spot of a circular beam on a mirror at an angle: w/cosθ × w.
/// @param beam_radius 1/e² intensity radius w [m], > 0, @param angle of incidence in the medium in
/// front of the mirror [rad], 0 ≤ θ < π/2
/// @throws core::DomainError otherwise
Footprint oblique_footprint(double beam_radius, double angle);

}  // namespace stillcoat::noise
