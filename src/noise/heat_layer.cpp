#include "noise/heat_layer.hpp"

#include <cmath>

#include "stillcoat/numerics/complex_exponential.hpp"

namespace stillcoat::noise {
namespace {

using numerics::complex_expm1;
using numerics::relative_complex_expm1;

Complex reciprocal(Complex z) { return std::conj(z) / std::norm(z); }

/// ∫ of the product of two exponentials over the layer, from the end where it is larger.
Complex product_integral(const SourceTerm& a, const SourceTerm& b, double h) {
    const Complex x = (a.rate + b.rate) * h;
    return x.real() <= 0.0 ? a.top * b.top * h * relative_complex_expm1(x)
                           : a.bottom * b.bottom * h * relative_complex_expm1(-x);
}

/// @param x rate·h; of `top` and `bottom` the larger is exact
SourceTerm source_term(Complex rate, Complex top, Complex bottom, Complex x) {
    SourceTerm term{};
    term.rate = rate;
    term.top = top;
    term.bottom = bottom;
    term.rise = x.real() <= 0.0 ? top * complex_expm1(x) : -bottom * complex_expm1(-x);
    term.rate_squared = rate * rate;
    term.top_slope = rate * top;
    term.bottom_slope = rate * bottom;
    term.rise_slope = rate * term.rise;
    term.integral = term.rise / rate;
    return term;
}

/// Adds what varies with depth in own·g + slope·h to the refraction of a layer: the real part of
/// each exponential as half of it and half of its conjugate.
void add_exponentials(const ThermalLayer& matter, double own, HeatLayer& layer) {
    const double h = matter.readout.thickness;
    std::vector<SourceTerm>& terms = layer.refraction;
    for (const optics::ReadoutTerm& wave : matter.readout.terms) {
        const Complex amplitude = 0.5 * (matter.index_slope * wave.index + own * wave.strain);
        if (amplitude == 0.0) continue;
        if (wave.rate == 0.0) {
            layer.refraction_constant += 2.0 * amplitude.real();
            continue;
        }
        const Complex x = wave.rate * h, far_end = amplitude * std::exp(x);
        terms.push_back(wave.upwards ? source_term(-wave.rate, far_end, amplitude, -x)
                                     : source_term(wave.rate, amplitude, far_end, x));
    }
    for (std::size_t j = 0, count = terms.size(); j < count; ++j) {
        terms.push_back(source_term(std::conj(terms[j].rate), std::conj(terms[j].top),
                                    std::conj(terms[j].bottom), std::conj(terms[j].rate) * h));
    }
    for (SourceTerm& term : terms) {
        for (const SourceTerm& other : terms) {
            term.with_all += product_integral(term, other, h);
        }
    }
}

/// (1 − tanh x/x)/γ² for a layer of thickness h, x = γh: the response to a source that does not
/// vary.
Complex flat_response(Complex x, Complex tanh, Complex sech, double h, Complex gamma_squared) {
    if (std::norm(x) >= 1.0) return (1.0 - tanh / x) * reciprocal(gamma_squared);
    // x cosh x − sinh x = Σ 2n x^{2n+1}/(2n+1)!
    constexpr double coefficients[] = {1.0 / 3.0,
                                       1.0 / 30.0,
                                       1.0 / 840.0,
                                       1.0 / 45360.0,
                                       1.0 / 3991680.0,
                                       1.0 / 518918400.0,
                                       14.0 / 1307674368000.0,
                                       16.0 / 355687428096000.0,
                                       18.0 / 121645100408832000.0};
    const Complex x_squared = x * x;
    Complex sum = 0.0;
    for (int n = 8; n >= 0; --n) sum = sum * x_squared + coefficients[n];
    return h * h * sech * sum;
}

/// Sums over the exponentials of a layer's refraction, each weighted with 1/(γ² − p²).
struct TermSums {
    Complex top, rise, top_slope, bottom_slope, rise_slope, integral, with_all;
};

TermSums sum_terms(const std::vector<SourceTerm>& terms, Complex gamma_squared) {
    TermSums sums{};
    for (const SourceTerm& term : terms) {
        const Complex weight = reciprocal(gamma_squared - term.rate_squared);
        sums.top += weight * term.top;
        sums.rise += weight * term.rise;
        sums.top_slope += weight * term.top_slope;
        sums.bottom_slope += weight * term.bottom_slope;
        sums.rise_slope += weight * term.rise_slope;
        sums.integral += weight * term.integral;
        sums.with_all += weight * term.with_all;
    }
    return sums;
}

}  // namespace

HeatLayer heat_layer(const Elastic& substrate, const ThermalLayer& layer) {
    // Notation: α E/(1−2ν)·[η + (g − λη)/M] = α[(1+ν)g + Eη]/(1−ν).
    const ThermalMaterial& material = layer.material;
    const double nu = material.elastic.poisson_ratio;
    const double own = material.expansion * (1.0 + nu) / (1.0 - nu);
    const double bending = material.expansion * material.elastic.youngs_modulus *
                           face_dilatation(substrate) / (1.0 - nu);
    HeatLayer result{layer.readout.thickness,
                     material.conductivity,
                     material.heat_capacity,
                     own + bending,
                     (layer.readout.strain_constant - 1.0) * own +
                         layer.index_slope * layer.readout.index_constant,
                     {}};
    if (layer.readout.thickness > 0.0) add_exponentials(layer, own, result);
    return result;
}

ThermalWavenumber thermal_wavenumber(double wavenumber, double angular_frequency,
                                     double heat_capacity, double conductivity) {
    const double real = wavenumber * wavenumber;
    const double imaginary = angular_frequency * heat_capacity / conductivity;
    const double root = std::sqrt(0.5 * (real + std::hypot(real, imaginary)));
    return {{root, 0.5 * imaginary / root}, {real, imaginary}};
}

LayerMoments layer_moments(const HeatLayer& layer, double wavenumber, double angular_frequency) {
    // Notation: u = ∫q sinh γz/cosh γh dz; unit: of a source that is 1 at every depth; f: of the
    // sum of the exponentials. For one exponential with ends f0, fh:
    //   flux = [γ tanh f0 − p(fh sech − f0)]/(γ²−p²), u = [γ(fh − f0 sech) − p fh tanh]/(γ²−p²).
    const auto [gamma, gamma_squared] =
        thermal_wavenumber(wavenumber, angular_frequency, layer.heat_capacity, layer.conductivity);
    const double h = layer.thickness;
    const Complex x = gamma * h;
    const Complex decay = complex_expm1(-x);  // e^{−x} − 1
    const Complex inverse = reciprocal(1.0 + (1.0 + decay) * (1.0 + decay));
    const Complex tanh = -decay * (2.0 + decay) * inverse;
    const Complex sech = 2.0 * (1.0 + decay) * inverse;
    const Complex one_minus_sech = decay * decay * inverse;
    const Complex inverse_gamma = reciprocal(gamma);

    const Complex unit_flux = tanh * inverse_gamma;
    const Complex unit_u = one_minus_sech * inverse_gamma;
    const Complex unit_unit = h * flat_response(x, tanh, sech, h, gamma_squared);
    Complex f_flux = 0.0, f_u = 0.0, unit_f = 0.0, f_f = 0.0;
    if (!layer.refraction.empty()) {
        const TermSums s = sum_terms(layer.refraction, gamma_squared);
        f_flux = gamma * tanh * s.top - sech * s.rise_slope + one_minus_sech * s.top_slope;
        f_u = gamma * (s.rise + one_minus_sech * s.top) - tanh * s.bottom_slope;
        const Complex slope = s.bottom_slope * inverse_gamma;
        unit_f = s.integral - s.top * unit_flux - slope * unit_u;
        f_f = s.with_all - s.top * f_flux - slope * f_u;
    }
    const double e = layer.expansion, c = layer.refraction_constant;
    const double inverse_kappa = 1.0 / layer.conductivity;
    const Complex drop = inverse_kappa * inverse_gamma;
    LayerMoments moments{};
    moments.impedance = layer.conductivity * gamma;
    moments.tanh = tanh;
    moments.sech = sech;
    moments.flux_e = e * unit_flux;
    moments.flux_r = c * unit_flux + f_flux;
    moments.drop_e = e * unit_u * drop;
    moments.drop_r = (c * unit_u + f_u) * drop;
    moments.ee = inverse_kappa * e * e * unit_unit;
    moments.er = inverse_kappa * e * (c * unit_unit + unit_f);
    moments.rr = inverse_kappa * (c * c * unit_unit + 2.0 * c * unit_f + f_f);
    return moments;
}

}  // namespace stillcoat::noise
