#include <boost/math/quadrature/gauss.hpp>
#include <cmath>

#include "optics/field_sweep.hpp"

namespace stillcoat::optics {

namespace {

/// Below this |δ| the split into a forward and a backward wave loses digits (all of them at q = 0);
/// the fields are then built from the face of the layer instead.
constexpr double smallest_split_phase = 0.5;

bool is_split(const LayerField& field) {
    return std::abs(field.wavenumber) * field.thickness >= smallest_split_phase;
}

}  // namespace

Tangential<Complex> fields_at(const StandingWave& wave, std::size_t layer, double depth) {
    const LayerField& field = wave.layers[layer];
    const Medium<Complex> matter = layer_medium(wave.stack, wave.light, layer);
    const double k0 = 2.0 * core::pi / wave.light.wavelength;
    const Complex i(0.0, 1.0);
    if (is_split(field)) {
        const Complex forward = field.forward * std::exp(i * field.wavenumber * depth);
        const Complex backward =
            field.backward * std::exp(i * field.wavenumber * (field.thickness - depth));
        const Complex admittance = field.wavenumber / (k0 * matter.electric_coupling);
        return {forward + backward, admittance * (forward - backward)};
    }
    // Downwards the same step with the opposite sign of the path.
    const Complex path = -k0 * depth;
    const Rotation<Complex> turn = rotation(path * path * matter.normal_square);
    const Tangential<Complex> v = fields_above(
        matter, path, turn, Tangential<Complex>{field.electric_top, field.magnetic_top});
    const double scale = std::exp(turn.growth.real());
    return {scale * v.electric, scale * v.magnetic};
}

SquaredFields squared_fields(const StandingWave& wave, std::size_t layer) {
    const LayerField& field = wave.layers[layer];
    const double d = field.thickness;
    if (!is_split(field)) {
        // |δ| < 1/2: the integrand is a polynomial of degree 19 to 1e-16.
        const auto integral = [&](auto part) {
            return boost::math::quadrature::gauss<double, 10>::integrate(
                [&](double z) { return std::norm(part(fields_at(wave, layer, z))); }, 0.0, d);
        };
        return {integral([](const Tangential<Complex>& v) { return v.electric; }),
                integral([](const Tangential<Complex>& v) { return v.magnetic; })};
    }
    // Notation: E = A e^{iqz} + B e^{iq(d−z)}, H = (q/k0 a)(A e^{iqz} − B e^{iq(d−z)}), q = q' +
    // iq''.
    const double real = field.wavenumber.real();
    const double decay = field.wavenumber.imag();
    const double k0 = 2.0 * core::pi / wave.light.wavelength;
    const double reach = decay == 0.0 ? d : -std::expm1(-2.0 * decay * d) / (2.0 * decay);
    const double beat = real == 0.0 ? d : std::sin(real * d) / real;
    const double single = (std::norm(field.forward) + std::norm(field.backward)) * reach;
    const double cross =
        2.0 * std::real(field.forward * std::conj(field.backward)) * std::exp(-decay * d) * beat;
    const Complex coupling = layer_medium(wave.stack, wave.light, layer).electric_coupling;
    return {single + cross, std::norm(field.wavenumber / (k0 * coupling)) * (single - cross)};
}

}  // namespace stillcoat::optics
