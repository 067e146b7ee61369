#pragma once
/// One layer as a conductor of heat with the readout's sources in it.
///
/// In units of iωT the temperature ϑ obeys −κϑ'' + κγ²ϑ = q, γ² = k² + iωC/κ. A layer answers with
/// the solution that is zero at its top and carries no flux at its bottom; tanh γh and 1/cosh γh
/// then say the rest, and neither overflows in a thick layer nor loses digits in a thin one.
/// Source: H. S. Carslaw & J. C. Jaeger, Conduction of Heat in Solids, §3.7; the particular
/// integral of a source s e^{pz} is s e^{pz}/(κ(γ² − p²)).

#include <complex>
#include <vector>

#include "stillcoat/noise/thermal.hpp"

namespace stillcoat::noise {

using Complex = std::complex<double>;

/// One exponential of a layer's source, f(z) = top·e^{rate·z}; both ends are known so that neither
/// overflows, their difference so that it is exact for an optically thin layer.
struct SourceTerm {
    Complex rate;          // p [1/m]
    Complex top;           // f(0)
    Complex bottom;        // f(h)
    Complex rise;          // f(h) − f(0)
    Complex rate_squared;  // p²
    Complex top_slope;     // p f(0)
    Complex bottom_slope;  // p f(h)
    Complex rise_slope;    // p (f(h) − f(0))
    Complex integral;      // ∫f dz
    Complex with_all;      // ∫f·(all exponentials of the layer) dz
};

/// What depends neither on wavenumber nor on frequency.
struct HeatLayer {
    double thickness;      // h [m]
    double conductivity;   // κ [W/(m K)]
    double heat_capacity;  // C [J/(m³ K)]
    double expansion;      // q of the coating's expansion, the same at every depth [1/K]
    double
        refraction_constant;  // the part of q of its refraction that does not vary with depth [1/K]
    std::vector<SourceTerm> refraction;  // the part that does
};

HeatLayer heat_layer(const Elastic& substrate, const ThermalLayer& layer);

/// γ = √(k² + iωC/κ) [1/m] and its square, real parts not negative.
struct ThermalWavenumber {
    Complex gamma, squared;
};
ThermalWavenumber thermal_wavenumber(double wavenumber, double angular_frequency,
                                     double heat_capacity, double conductivity);

/// A layer at one wavenumber and frequency. Index e: expansion, r: refraction.
struct LayerMoments {
    Complex impedance;       // Z = κγ, flux per temperature of a thermal wave
    Complex tanh, sech;      // of γh
    Complex flux_e, flux_r;  // ∫q cosh γ(h−z)/cosh γh dz: flux out of the top, held at ϑ = 0
    Complex drop_e, drop_r;  // ∫q sinh γz/(Z cosh γh) dz: ϑ at the bottom, insulated
    Complex ee, er, rr;      // ∫q_a ϑ_b dz of this solution
};
LayerMoments layer_moments(const HeatLayer& layer, double wavenumber, double angular_frequency);

}  // namespace stillcoat::noise
