#pragma once
/// The step across one layer, written once for numbers and for series in the angular frequency.
///
/// Across a layer of thickness d, from its bottom to its top, with q² = ab and δ = k0 d q:
///     E_top = cos δ E − i k0 d a sinc δ H,   H_top = cos δ H − i k0 d b sinc δ E.
/// cos and sinc are entire functions of δ², so a layer at its critical angle (q = 0) needs no case
/// of its own. Both are returned times exp(−Im δ); the exponent is handed out beside them. Source:
/// F. Abelès, Ann. Phys. (Paris) 12, 596 (1950); M. Born & E. Wolf, Principles of Optics, §1.6.

#include <cmath>

#include "stillcoat/core/constants.hpp"
#include "stillcoat/optics/response.hpp"

namespace stillcoat::optics {

using ComplexJet = numerics::Jet<Complex>;

/// What a medium does to tangential fields at a given transverse wavenumber k0 β.
template <typename Scalar>
struct Medium {
    Scalar index_square;
    Scalar electric_coupling;  ///< a in dE/dz = i k0 a H
    Scalar magnetic_coupling;  ///< b in dH/dz = i k0 b E
    Scalar normal_square;      ///< q² = ab = n² − β²
};

template <typename Scalar>
Medium<Scalar> medium(const Scalar& index, const Scalar& beta_square, Polarisation polarisation) {
    const Scalar index_square = index * index;
    const Scalar normal_square = index_square - beta_square;
    if (polarisation == Polarisation::s) {
        return {index_square, Scalar(Complex(1.0)), normal_square, normal_square};
    }
    return {index_square, normal_square / index_square, index_square, normal_square};
}

/// Tangential fields at one depth.
template <typename Scalar>
struct Tangential {
    Scalar electric;
    Scalar magnetic;
};

/// The wave that leaves downwards into a half-space with normal wavenumber k0 `normal`: its
/// admittance is q (s) or n²/q (p), written without division since q may be zero.
template <typename Scalar>
Tangential<Scalar> outgoing_wave(const Medium<Scalar>& half_space, const Scalar& normal,
                                 Polarisation polarisation) {
    if (polarisation == Polarisation::s) return {Scalar(Complex(1.0)), normal};
    return {normal, half_space.index_square};
}

/// cos √w and sinc √w times exp(−growth). For numbers growth is the real Im √w (decaying branch).
/// For series it is −i√w, with its derivatives, once the layer attenuates: a factor of ω in common,
/// so that the huge derivatives of exp(Im δ) never enter; before that it is the constant Im √w.
template <typename Scalar>
struct Rotation {
    Scalar cosine;
    Scalar sinc;
    Scalar growth;
};

/// √w with Im ≥ 0, and Re ≥ 0 where Im = 0, for w in the closed upper half-plane.
Complex decaying_root(Complex w);
ComplexJet decaying_root(const ComplexJet& w);

Rotation<Complex> rotation(Complex w);
Rotation<ComplexJet> rotation(const ComplexJet& w);

/// Fields at the top of a layer from those at its bottom, times exp(−growth). `path` is k0 d.
template <typename Scalar>
Tangential<Scalar> fields_above(const Medium<Scalar>& layer, const Scalar& path,
                                const Rotation<Scalar>& turn, const Tangential<Scalar>& below) {
    const Scalar slope = Scalar(Complex(0.0, -1.0)) * path * turn.sinc;
    return {turn.cosine * below.electric + slope * layer.electric_coupling * below.magnetic,
            turn.cosine * below.magnetic + slope * layer.magnetic_coupling * below.electric};
}

/// Power of two that brings a field vector back near 1; 0 while it is within reach.
int excess_exponent(const Tangential<Complex>& fields);

/// The incident admittance: n0 cosθ0 (s) or n0/cosθ0 (p).
double incident_admittance(double incident_index, const Illumination& light);

}  // namespace stillcoat::optics
