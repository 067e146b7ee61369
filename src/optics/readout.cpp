#include "stillcoat/optics/readout.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <stdexcept>

#include "optics/field_sweep.hpp"
#include "stillcoat/core/errors.hpp"
#include "stillcoat/numerics/complex_exponential.hpp"

namespace stillcoat::optics {

namespace {

constexpr char source[] = "T. Hong et al., Phys. Rev. D 87, 082001 (2013)";

/// What a disturbance does to the coefficients of dE/dz = i k0 a H, dH/dz = i k0 b E.
struct Disturbance {
    Complex magnetic;  // δb
    Complex electric;  // δa
};

/// By unit strain across the layer (its photoelastic part), unit dilatation in the plane, and unit
/// change of the index.
struct Disturbances {
    Disturbance strain, in_plane, index;
};

Disturbances disturbances(Complex n, const Photoelasticity& p, double beta2,
                          Polarisation polarisation) {
    const Complex fourth = n * n * n * n;
    Disturbances result{
        {-fourth * p.p12, 0.0}, {-0.5 * fourth * (p.p11 + p.p12), 0.0}, {2.0 * n, 0.0}};
    if (polarisation == Polarisation::p) {
        result.strain.electric = -beta2 * p.p11;
        result.in_plane.electric = -beta2 * p.p12;
        result.index.electric = 2.0 * beta2 / (n * n * n);
    }
    return result;
}

/// E = F + G, H = Y (F − G) with F = forward e^{iqz}, G = backward e^{iq(d−z)}; `share` of it.
struct WavePair {
    Complex wavenumber;         // q
    Complex admittance_square;  // Y²
    Complex forward, backward;
    Complex share;
};

/// Adds −Re{(δb E² − δa H²)/r}/(4 n0 cosθ0 η0), E² = F² + G² + 2FG and H² = Y²(F² + G² − 2FG).
/// @param scale −1/(4 n0 cosθ0 η0 r)
void add_squares(const WavePair& pair, const Disturbances& by, Complex scale, ReadoutLayer& layer) {
    const Complex iq = Complex(0.0, 1.0) * pair.wavenumber, factor = scale * pair.share;
    const Complex crossing = std::exp(iq * layer.thickness);
    const Complex product = 2.0 * factor * pair.forward * pair.backward * crossing;
    const auto flat = [&](const Disturbance& d) {
        return std::real(product * (d.magnetic + d.electric * pair.admittance_square));
    };
    layer.strain_constant += flat(by.strain);
    layer.in_plane_constant += flat(by.in_plane);
    layer.index_constant += flat(by.index);
    const auto amplitude = [&](const Disturbance& d) {
        return factor * (d.magnetic - d.electric * pair.admittance_square);
    };
    const Complex strain = amplitude(by.strain), in_plane = amplitude(by.in_plane),
                  index = amplitude(by.index);
    const Complex down = pair.forward * pair.forward, up = pair.backward * pair.backward;
    if (pair.wavenumber.imag() == 0.0) {
        // The two exponentials are then each other's conjugates: one term does for both.
        const Complex once = up * crossing * crossing;
        const auto joined = [&](Complex a) { return a * down + std::conj(a * once); };
        layer.terms.push_back({2.0 * iq, false, joined(strain), joined(in_plane), joined(index)});
        return;
    }
    layer.terms.push_back({2.0 * iq, false, strain * down, in_plane * down, index * down});
    layer.terms.push_back({2.0 * iq, true, strain * up, in_plane * up, index * up});
}

/// A layer so close to its critical angle that F and G are large and cancel.
bool is_critical(const LayerField& field, double k0) {
    const double q = std::abs(field.wavenumber);
    return q < 0.1 * k0 && q * field.thickness < 0.1;
}

/// The same field as a sum over layers of other wavenumbers: for given fields at the top, E² and H²
/// are entire functions of q², so a polynomial through a few q_i² of either sign gives them at q ≈
/// 0, where F and G do not exist. With eight nodes on |q_i d| ≤ 1/2 the next term is 4e-16; they
/// also stay near k0, since H/E would turn to nothing in a thin layer of larger q_i.
std::array<WavePair, 8> critical_pairs(const LayerField& field, Complex n, double k0,
                                       Polarisation polarisation) {
    constexpr int count = 8;
    const double d = field.thickness;
    const double reach = 0.25 * std::min(k0 * k0, 1.0 / (d * d));
    std::array<double, count> node{};
    for (int i = 0; i < count; ++i) node[i] = reach * std::cos((i + 0.5) * core::pi / count);
    const Complex square = field.wavenumber * field.wavenumber;
    std::array<WavePair, count> pairs{};
    for (int i = 0; i < count; ++i) {
        Complex share = 1.0;
        for (int j = 0; j < count; ++j) {
            if (j != i) share *= (square - node[j]) / (node[i] - node[j]);
        }
        const Complex q = decaying_root(node[i]);
        const Complex admittance = polarisation == Polarisation::s ? q / k0 : n * n * k0 / q;
        const Complex down = 0.5 * (field.electric_top + field.magnetic_top / admittance);
        const Complex up = 0.5 * (field.electric_top - field.magnetic_top / admittance);
        pairs[i] = {q, admittance * admittance, down, up * std::exp(Complex(0.0, -1.0) * q * d),
                    share};
    }
    return pairs;
}

ReadoutLayer layer_weights(const StandingWave& wave, std::size_t j, const Photoelasticity& p,
                           Complex scale) {
    const LayerField& field = wave.layers[j];
    const Complex n = wave.stack.layers[j].index;
    const Medium<Complex> matter = layer_medium(wave.stack, wave.light, j);
    const Complex a = matter.electric_coupling, b = matter.magnetic_coupling;
    const Polarisation polarisation = wave.light.polarisation;
    const Disturbances by = disturbances(n, p, beta_square(wave.stack, wave.light), polarisation);
    const double k0 = 2.0 * core::pi / wave.light.wavelength;
    ReadoutLayer layer{field.thickness, 1.0, 0.0, 0.0, {}};
    if (!is_critical(field, k0)) {
        // bE² − aH² is the same at every depth of a layer: 4 b FG.
        const Complex crossing = std::exp(Complex(0.0, 1.0) * field.wavenumber * field.thickness);
        layer.strain_constant +=
            std::real(scale * 4.0 * b * field.forward * field.backward * crossing);
        add_squares({field.wavenumber, b / a, field.forward, field.backward, 1.0}, by, scale,
                    layer);
        return layer;
    }
    const Complex electric = field.electric_top * field.electric_top;
    const Complex magnetic = field.magnetic_top * field.magnetic_top;
    layer.strain_constant += std::real(scale * (b * electric - a * magnetic));
    for (const WavePair& pair : critical_pairs(field, n, k0, polarisation)) {
        add_squares(pair, by, scale, layer);
    }
    return layer;
}

/// One exponential at a depth.
Complex exponential(const ReadoutTerm& term, double thickness, double depth) {
    return std::exp(term.rate * (term.upwards ? thickness - depth : depth));
}

/// ∫ of an exponential, or of a product of two, over a layer; `downwards` and `upwards` are the
/// sums of their rates, neither with a positive real part.
Complex wave_integral(Complex downwards, Complex upwards, double d) {
    const bool down_is_larger = downwards.real() >= upwards.real();
    const Complex larger = down_is_larger ? downwards : upwards;
    const Complex other = down_is_larger ? upwards : downwards;
    return d * std::exp(larger * d) * numerics::relative_complex_expm1((other - larger) * d);
}

Complex downwards(const ReadoutTerm& term) { return term.upwards ? 0.0 : term.rate; }
Complex upwards(const ReadoutTerm& term) { return term.upwards ? term.rate : 0.0; }

}  // namespace

std::vector<ReadoutLayer> readout_weights(const StandingWave& wave,
                                          const std::vector<Photoelasticity>& photoelasticity) {
    if (photoelasticity.size() != wave.layers.size()) {
        throw std::logic_error("photoelastic constants are needed for each layer");
    }
    if (!(std::abs(wave.reflection) >= smallest_reflection)) {
        throw core::DomainError("modulus of the reflection amplitude", std::abs(wave.reflection),
                                "", "at least 1e-13: without reflected light there is no phase",
                                source);
    }
    // Notation: −1/(4 n0 cosθ0 η0 r).
    const double n0 = wave.stack.incident_index;
    const double eta0 = incident_admittance(n0, wave.light);
    const Complex scale = -0.25 / (n0 * std::cos(wave.light.angle) * eta0 * wave.reflection);
    std::vector<ReadoutLayer> weights;
    weights.reserve(wave.layers.size());
    for (std::size_t j = 0; j < wave.layers.size(); ++j) {
        const Photoelasticity& p = photoelasticity[j];
        for (const double constant : {p.p11, p.p12}) {
            if (!std::isfinite(constant)) {
                throw core::DomainError("photoelastic constant", constant, "", "finite", source);
            }
        }
        weights.push_back(layer_weights(wave, j, p, scale));
    }
    return weights;
}

std::vector<ReadoutLayer> surface_readout(const OpticalStack& stack) {
    std::vector<ReadoutLayer> weights;
    weights.reserve(stack.layers.size());
    for (const OpticalLayer& layer : stack.layers) {
        weights.push_back({layer.thickness, 1.0, 0.0, 0.0, {}});
    }
    return weights;
}

double strain_weight(const ReadoutLayer& layer, double depth) {
    double weight = layer.strain_constant;
    for (const ReadoutTerm& term : layer.terms) {
        weight += std::real(term.strain * exponential(term, layer.thickness, depth));
    }
    return weight;
}

double in_plane_weight(const ReadoutLayer& layer, double depth) {
    double weight = layer.in_plane_constant;
    for (const ReadoutTerm& term : layer.terms) {
        weight += std::real(term.in_plane * exponential(term, layer.thickness, depth));
    }
    return weight;
}

double index_weight(const ReadoutLayer& layer, double depth) {
    double weight = layer.index_constant;
    for (const ReadoutTerm& term : layer.terms) {
        weight += std::real(term.index * exponential(term, layer.thickness, depth));
    }
    return weight;
}

ReadoutIntegrals readout_integrals(const ReadoutLayer& layer) {
    // Notation: c strain_constant, f = Re Σ s e^{…}; f² = ½ Re ΣΣ (s_t s_u e_t e_u + s_t s_u* e_t
    // e_u*).
    const double d = layer.thickness, c = layer.strain_constant;
    double linear = 0.0, quadratic = 0.0, in_plane = 0.0, index = 0.0;
    for (const ReadoutTerm& t : layer.terms) {
        const Complex integral = wave_integral(downwards(t), upwards(t), d);
        linear += std::real(t.strain * integral);
        in_plane += std::real(t.in_plane * integral);
        index += std::real(t.index * integral);
        for (const ReadoutTerm& u : layer.terms) {
            const Complex same =
                wave_integral(downwards(t) + downwards(u), upwards(t) + upwards(u), d);
            const Complex mirrored = wave_integral(downwards(t) + std::conj(downwards(u)),
                                                   upwards(t) + std::conj(upwards(u)), d);
            quadratic +=
                0.5 * std::real(t.strain * (u.strain * same + std::conj(u.strain) * mirrored));
        }
    }
    return {c * d + linear, c * c * d + 2.0 * c * linear + quadratic,
            layer.index_constant * d + index, layer.in_plane_constant * d + in_plane};
}

}  // namespace stillcoat::optics
