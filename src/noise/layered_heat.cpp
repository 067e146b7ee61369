#include "noise/layered_heat.hpp"

#include <algorithm>
#include <cmath>

namespace stillcoat::noise {
namespace {

/// A layer and what lies below it: flux through its bottom = admittance·ϑ + source.
struct Level {
    LayerMoments layer;
    Complex admittance;          // Y
    Complex source_e, source_r;  // S
    Complex ratio;               // 1/(1 + (Y/Z) tanh)
    Complex inverse_impedance;   // 1/Z
};

/// Temperature and flux at one plane, for both coating sources.
struct Plane {
    Complex e, r;
};

double substrate_source(const ThermalMaterial& substrate) {
    return 2.0 * (1.0 + substrate.elastic.poisson_ratio) * substrate.expansion;
}

/// From the substrate to the face; `levels` in the order of the layers.
/// @return the temperature of the face, where no flux leaves
Plane ascend(const LayeredHeat& stack, double k, double omega, Complex substrate_impedance,
             std::vector<Level>& levels) {
    Complex admittance = substrate_impedance, source_e = 0.0, source_r = 0.0;
    for (std::size_t j = stack.layers.size(); j-- > 0;) {
        Level& level = levels[j];
        level.layer = layer_moments(stack.layers[j], k, omega);
        const LayerMoments& m = level.layer;
        level.admittance = admittance;
        level.source_e = source_e;
        level.source_r = source_r;
        level.inverse_impedance = 1.0 / m.impedance;
        level.ratio = 1.0 / (1.0 + admittance * level.inverse_impedance * m.tanh);
        const Complex passed = m.sech * level.ratio;
        source_e = passed * (source_e + admittance * m.drop_e) - m.flux_e;
        source_r = passed * (source_r + admittance * m.drop_r) - m.flux_r;
        admittance = (admittance + m.impedance * m.tanh) * level.ratio;
    }
    return {-source_e / admittance, -source_r / admittance};
}

/// Adds what a layer contributes and carries the temperatures to its bottom.
void descend(const Level& level, Plane& temperature, SourceProducts& products) {
    const LayerMoments& m = level.layer;
    const Complex leak = level.inverse_impedance * m.tanh;
    const auto bottom = [&](Complex top, Complex source, Complex drop) {
        return (top * m.sech - source * leak + drop) * level.ratio;
    };
    const Plane below{bottom(temperature.e, level.source_e, m.drop_e),
                      bottom(temperature.r, level.source_r, m.drop_r)};
    const Plane flux{level.admittance * below.e + level.source_e,
                     level.admittance * below.r + level.source_r};
    products.ee += std::real(temperature.e * m.flux_e - flux.e * m.drop_e + m.ee);
    products.er += std::real(temperature.r * m.flux_e - flux.r * m.drop_e + m.er);
    products.rr += std::real(temperature.r * m.flux_r - flux.r * m.drop_r + m.rr);
    temperature = below;
}

}  // namespace

LayeredHeat layered_heat(const ThermalMaterial& substrate,
                         const std::vector<ThermalLayer>& layers) {
    LayeredHeat stack{{}, substrate};
    stack.layers.reserve(layers.size());
    for (const ThermalLayer& layer : layers) {
        stack.layers.push_back(heat_layer(substrate.elastic, layer));
    }
    return stack;
}

SourceProducts source_products(const LayeredHeat& stack, double wavenumber,
                               double angular_frequency) {
    // Notation: z' depth below the coating, q0 e^{−kz'} the substrate's source; Y_up admittance of
    // the coating seen from below. Without conduction the source would give the real ϑ = q0
    // e^{−kz'}/(iωC); only the deviation from it, −(κk + Y_up)/(κγ + Y_up) e^{−γz'} of it, is
    // noise.
    const ThermalMaterial& base = stack.substrate;
    const Complex gamma =
        thermal_wavenumber(wavenumber, angular_frequency, base.heat_capacity, base.conductivity)
            .gamma;
    const Complex impedance = base.conductivity * gamma;
    const double q0 = substrate_source(base);
    std::vector<Level> levels(stack.layers.size());
    Plane temperature = ascend(stack, wavenumber, angular_frequency, impedance, levels);
    SourceProducts products;
    Complex upwards = 0.0;
    for (const Level& level : levels) {
        descend(level, temperature, products);
        const LayerMoments& m = level.layer;
        upwards =
            (upwards + m.impedance * m.tanh) / (1.0 + upwards * level.inverse_impedance * m.tanh);
    }
    const Complex reach = q0 / (wavenumber + gamma);
    products.es = std::real(temperature.e * reach);
    products.rs = std::real(temperature.r * reach);
    const Complex deviation =
        reach * (base.conductivity * wavenumber + upwards) / (impedance + upwards);
    products.ss = -q0 * deviation.imag() / (angular_frequency * base.heat_capacity);
    products.bare = bare_substrate_product(base, wavenumber, angular_frequency);
    return products;
}

double bare_substrate_product(const ThermalMaterial& substrate, double wavenumber,
                              double angular_frequency) {
    const auto [gamma, squared] = thermal_wavenumber(
        wavenumber, angular_frequency, substrate.heat_capacity, substrate.conductivity);
    const double q0 = substrate_source(substrate);
    // −Im 1/(γ(γ + k)) with the square that carries no rounding of γ.
    const Complex product = squared + wavenumber * gamma;
    return q0 * q0 * wavenumber * product.imag() / std::norm(product) /
           (angular_frequency * substrate.heat_capacity);
}

double diffusion_wavenumber(const LayeredHeat& stack, double angular_frequency) {
    double slowest = stack.substrate.heat_capacity / stack.substrate.conductivity;
    for (const HeatLayer& layer : stack.layers) {
        slowest = std::min(slowest, layer.heat_capacity / layer.conductivity);
    }
    return std::sqrt(angular_frequency * slowest);
}

}  // namespace stillcoat::noise
