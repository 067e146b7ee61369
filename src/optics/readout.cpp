#include "stillcoat/optics/readout.hpp"

#include <array>
#include <cmath>
#include <stdexcept>

#include "optics/recursion.hpp"
#include "stillcoat/core/errors.hpp"

namespace stillcoat::optics {

namespace {

/// (e^x − 1)/x without cancellation.
Complex relative_expm1(Complex x) {
    if (x == Complex(0.0)) return 1.0;
    const double half_sine = std::sin(0.5 * x.imag());
    const double growth = std::expm1(x.real());
    const Complex expm1(growth * std::cos(x.imag()) - 2.0 * half_sine * half_sine,
                        (growth + 1.0) * std::sin(x.imag()));
    return expm1 / x;
}

/// ∫ exp(downwards·z + upwards·(d − z)) dz over 0 … d; neither exponent has a positive real part.
Complex wave_integral(Complex downwards, Complex upwards, double d) {
    const Complex larger = downwards.real() >= upwards.real() ? downwards : upwards;
    const Complex other = downwards.real() >= upwards.real() ? upwards : downwards;
    return d * std::exp(larger * d) * relative_expm1((other - larger) * d);
}

/// E² = Σ_k square[k] exp((2−k) iqz + k iq(d−z)).
std::array<Complex, 3> square_terms(const ReadoutLayer& layer) {
    return {layer.forward * layer.forward, 2.0 * layer.forward * layer.backward,
            layer.backward * layer.backward};
}

Complex field_square(const ReadoutLayer& layer, double depth) {
    const Complex iq = Complex(0.0, 1.0) * layer.wavenumber;
    const Complex field = layer.forward * std::exp(iq * depth) +
                          layer.backward * std::exp(iq * (layer.thickness - depth));
    return field * field;
}

}  // namespace

std::vector<ReadoutLayer> readout_weights(const StandingWave& wave,
                                          const std::vector<double>& photoelastic_p12) {
    // Notation: g = 1 − ¼ Re{[n²E² − H²]/(r n0²)} + ¼ Re{n⁴ p12 E²/(r n0²)}, h = −½ Re{n E²/(r
    // n0²)}.
    if (photoelastic_p12.size() != wave.layers.size()) {
        throw std::logic_error("one photoelastic constant is needed for each layer");
    }
    const std::string source = "T. Hong et al., Phys. Rev. D 87, 082001 (2013)";
    if (wave.light.angle != 0.0) {
        throw core::DomainError("angle of incidence of the readout weights", wave.light.angle,
                                "rad", "0", source);
    }
    if (!(std::abs(wave.reflection) >= smallest_reflection)) {
        throw core::DomainError("modulus of the reflection amplitude", std::abs(wave.reflection),
                                "", "at least 1e-13: without reflected light there is no phase",
                                source);
    }
    const double n0 = wave.stack.incident_index;
    const Complex reference = wave.reflection * n0 * n0;
    std::vector<ReadoutLayer> weights;
    weights.reserve(wave.layers.size());
    for (std::size_t j = 0; j < wave.layers.size(); ++j) {
        const LayerField& field = wave.layers[j];
        const Complex n = wave.stack.layers[j].index;
        const double p12 = photoelastic_p12[j];
        if (!std::isfinite(p12)) {
            throw core::DomainError("photoelastic constant p12", p12, "", "finite", source);
        }
        // n²E² − H² is the same at every depth of a layer: 4 n² A B e^{iqd}.
        const Complex invariant = 4.0 * n * n * field.forward * field.backward *
                                  std::exp(Complex(0.0, 1.0) * field.wavenumber * field.thickness);
        weights.push_back({field.thickness, field.wavenumber, field.forward, field.backward,
                           1.0 - 0.25 * std::real(invariant / reference),
                           0.25 * n * n * n * n * p12 / reference, -0.5 * n / reference});
    }
    return weights;
}

std::vector<ReadoutLayer> surface_readout(const OpticalStack& stack) {
    std::vector<ReadoutLayer> weights;
    weights.reserve(stack.layers.size());
    for (const OpticalLayer& layer : stack.layers) {
        weights.push_back({layer.thickness, 0.0, 0.0, 0.0, 1.0, 0.0, 0.0});
    }
    return weights;
}

double strain_weight(const ReadoutLayer& layer, double depth) {
    return layer.strain_constant + std::real(layer.strain_square * field_square(layer, depth));
}

double index_weight(const ReadoutLayer& layer, double depth) {
    return std::real(layer.index_square * field_square(layer, depth));
}

ReadoutIntegrals readout_integrals(const ReadoutLayer& layer) {
    // Notation: c strain_constant, S strain_square; (Re SE²)² = ½ Re(S²E⁴) + ½ |S|²|E|⁴.
    const double d = layer.thickness;
    const Complex iq = Complex(0.0, 1.0) * layer.wavenumber;
    const std::array<Complex, 3> square = square_terms(layer);
    Complex second = 0.0;   // ∫E² dz
    Complex fourth = 0.0;   // ∫E⁴ dz
    Complex modulus = 0.0;  // ∫|E|⁴ dz
    for (int k = 0; k < 3; ++k) {
        second += square[k] * wave_integral((2.0 - k) * iq, double(k) * iq, d);
        for (int l = 0; l < 3; ++l) {
            fourth +=
                square[k] * square[l] * wave_integral((4.0 - k - l) * iq, double(k + l) * iq, d);
            modulus += square[k] * std::conj(square[l]) *
                       wave_integral((2.0 - k) * iq + (2.0 - l) * std::conj(iq),
                                     double(k) * iq + double(l) * std::conj(iq), d);
        }
    }
    const double c = layer.strain_constant;
    const Complex s = layer.strain_square;
    const double linear = std::real(s * second);
    const double quadratic = 0.5 * std::real(s * s * fourth) + 0.5 * std::norm(s) * modulus.real();
    return {c * d + linear, c * c * d + 2.0 * c * linear + quadratic,
            std::real(layer.index_square * second)};
}

}  // namespace stillcoat::optics
