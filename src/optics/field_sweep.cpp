#include "optics/field_sweep.hpp"

#include <cmath>
#include <limits>
#include <numbers>

#include "optics/validity.hpp"

namespace stillcoat::optics {

namespace {

/// The vector at the interfaces, 0 = face … N = top of the substrate, times 2^exponent.
struct ScaledFields {
    Tangential<Complex> fields;
    int exponent;
};

/// From the substrate upwards; `growth[j]` is what layer j was scaled by, as a logarithm.
std::vector<ScaledFields> upward_sweep(const OpticalStack& stack, const Illumination& light,
                                       std::vector<double>& growth) {
    const double k0 = 2.0 * core::pi / light.wavelength;
    const std::size_t count = stack.layers.size();
    const Complex beta2 = beta_square(stack, light);
    const Medium<Complex> substrate = medium(stack.substrate_index, beta2, light.polarisation);
    std::vector<ScaledFields> interfaces(count + 1);
    interfaces[count] = {
        outgoing_wave(substrate, decaying_root(substrate.normal_square), light.polarisation), 0};
    growth.assign(count, 0.0);
    for (std::size_t j = count; j-- > 0;) {
        const Medium<Complex> layer = medium(stack.layers[j].index, beta2, light.polarisation);
        const Complex path = k0 * stack.layers[j].thickness;
        const Rotation<Complex> turn = rotation(path * path * layer.normal_square);
        Tangential<Complex> v = fields_above(layer, path, turn, interfaces[j + 1].fields);
        const int excess = excess_exponent(v);
        if (excess != 0) {
            const double scale = std::ldexp(1.0, -excess);
            v = {v.electric * scale, v.magnetic * scale};
        }
        growth[j] = turn.growth.real();
        interfaces[j] = {v, interfaces[j + 1].exponent + excess};
    }
    return interfaces;
}

/// exp(−growth)·2^exponent, also where one factor alone would leave the range of a double.
double joined_scale(double growth, int exponent) {
    if (growth < 600.0) return std::ldexp(std::exp(-growth), exponent);
    return std::exp(exponent * std::numbers::ln2 - growth);
}

/// Forward and backward part at the face where each starts; where q = 0 there is no such split.
void split_waves(LayerField& field, const Medium<Complex>& layer, Complex normal,
                 Polarisation polarisation) {
    if (normal == Complex(0.0)) {
        field.forward = 0.5 * field.electric_top;
        field.backward = 0.5 * field.electric_bottom;
        return;
    }
    const Complex impedance =
        polarisation == Polarisation::s ? 1.0 / normal : normal / layer.index_square;
    field.forward = 0.5 * (field.electric_top + impedance * field.magnetic_top);
    field.backward = 0.5 * (field.electric_bottom - impedance * field.magnetic_bottom);
}

/// Re(E H*) of the outgoing wave in the substrate, without the cancellation of metals.
double substrate_flux(const Medium<Complex>& substrate, double beta2, Polarisation polarisation) {
    const Complex normal = decaying_root(substrate.normal_square);
    return polarisation == Polarisation::s ? normal.real()
                                           : normal.real() * (std::norm(normal) + beta2);
}

void fill_transmittance(FieldSweep& sweep, double relative_flux, double growth, int exponent) {
    // T = flux · exp(−2 growth) · 2^(2 exponent)
    if (relative_flux <= 0.0) {
        sweep.transmittance = 0.0;
        sweep.log_transmittance = -std::numeric_limits<double>::infinity();
        return;
    }
    sweep.log_transmittance =
        std::log(relative_flux) - 2.0 * growth + 2.0 * exponent * std::numbers::ln2;
    sweep.transmittance = growth < 300.0
                              ? std::ldexp(relative_flux * std::exp(-2.0 * growth), 2 * exponent)
                              : std::exp(sweep.log_transmittance);
}

}  // namespace

double beta_square(const OpticalStack& stack, const Illumination& light) {
    const double beta = stack.incident_index * std::sin(light.angle);
    return beta * beta;
}

Medium<Complex> layer_medium(const OpticalStack& stack, const Illumination& light,
                             std::size_t layer) {
    return medium(stack.layers[layer].index, Complex(beta_square(stack, light)),
                  light.polarisation);
}

FieldSweep field_sweep(const OpticalStack& stack, const Illumination& light) {
    // Notation: η0 incident admittance; incident amplitude (E + H/η0)/2, reflected (E − H/η0)/2.
    require_valid(stack, light);
    std::vector<double> growth;
    const std::vector<ScaledFields> interfaces = upward_sweep(stack, light, growth);
    const double k0 = 2.0 * core::pi / light.wavelength;
    const double eta0 = incident_admittance(stack.incident_index, light);
    const Tangential<Complex>& face = interfaces[0].fields;
    const Complex incident = 0.5 * (face.electric + face.magnetic / eta0);

    FieldSweep sweep{{stack,
                      light,
                      (face.electric - face.magnetic / eta0) / (2.0 * incident),
                      face.electric / incident,
                      {},
                      {}},
                     0.0,
                     0.0};
    StandingWave& wave = sweep.wave;
    wave.layers.reserve(stack.layers.size());
    double growth_above = 0.0;
    Complex unit = 1.0 / incident;
    for (std::size_t j = 0; j < stack.layers.size(); ++j) {
        const Medium<Complex> layer = layer_medium(stack, light, j);
        const Complex normal = decaying_root(layer.normal_square);
        const ScaledFields& below = interfaces[j + 1];
        LayerField field{};
        field.electric_top = interfaces[j].fields.electric * unit;
        field.magnetic_top = interfaces[j].fields.magnetic * unit;
        growth_above += growth[j];
        unit = joined_scale(growth_above, below.exponent - interfaces[0].exponent) / incident;
        field.electric_bottom = below.fields.electric * unit;
        field.magnetic_bottom = below.fields.magnetic * unit;
        field.wavenumber = k0 * normal;
        field.thickness = stack.layers[j].thickness;
        split_waves(field, layer, normal, light.polarisation);
        wave.layers.push_back(field);
    }
    wave.electric_substrate = interfaces.back().fields.electric * unit;
    const double beta2 = beta_square(stack, light);
    const double flux =
        substrate_flux(medium(stack.substrate_index, Complex(beta2), light.polarisation), beta2,
                       light.polarisation);
    fill_transmittance(sweep, flux / (eta0 * std::norm(incident)), growth_above,
                       interfaces.back().exponent - interfaces[0].exponent);
    return sweep;
}

}  // namespace stillcoat::optics
