#include "stillcoat/noise/thermal.hpp"

#include <algorithm>
#include <cmath>

#include "noise/footprint_averages.hpp"
#include "noise/layered_heat.hpp"
#include "noise/limits.hpp"
#include "noise/wavenumber_rule.hpp"
#include "stillcoat/core/constants.hpp"

namespace stillcoat::noise {
namespace {

constexpr char evans[] = "Evans et al., Phys. Rev. D 78, 102003 (2008)";
constexpr char cerdonio[] = "Cerdonio et al., Phys. Rev. D 63, 082003 (2001)";
constexpr char braginsky[] = "Braginsky et al., Phys. Lett. A 264, 1 (1999)";
constexpr char spectrum[] = "thermal spectrum";

void validate_readout(const optics::ReadoutLayer& readout) {
    constexpr char quantity[] = "weight of a layer's readout";
    require_not_negative(readout.thickness, "thickness of a layer", "m", evans);
    for (const optics::ReadoutTerm& term : readout.terms) {
        require_not_negative(-term.rate.real(), "decay of the light in a layer", "1/m", evans);
        for (const Complex value : {term.rate, term.strain, term.in_plane, term.index}) {
            require_finite(value.real(), quantity, "1", evans);
            require_finite(value.imag(), quantity, "1", evans);
        }
    }
    for (const double constant :
         {readout.strain_constant, readout.in_plane_constant, readout.index_constant}) {
        require_finite(constant, quantity, "1", evans);
    }
}

/// S = (2k_BT²/π) ∫ k dk ⟨|p(k)|²⟩ Re ∫ q ϑ dz.
double prefactor(double temperature) {
    return 2.0 * core::boltzmann_constant * temperature * temperature / core::pi;
}

}  // namespace

void validate(const ThermalMaterial& material) {
    validate(material.elastic);
    require_finite(material.expansion, "thermal expansion", "1/K", evans);
    require_positive(material.conductivity, "thermal conductivity", "W/(m K)", evans);
    require_positive(material.heat_capacity, "heat capacity per volume", "J/(m^3 K)", evans);
}

void validate(const ThermalLayer& layer) {
    validate(layer.material);
    require_finite(layer.index_slope, "dn/dT", "1/K", evans);
    validate_readout(layer.readout);
}

double free_index_slope(double index, double index_slope, double p11, double p12,
                        double expansion) {
    return index_slope + 0.5 * index * index * index * (p11 + 2.0 * p12) * expansion;
}

ThermalNoise thermal_noise(const ThermalMaterial& substrate,
                           const std::vector<ThermalLayer>& layers, const Footprint& spot,
                           double temperature, double frequency) {
    require_conditions(spot, temperature, frequency, evans);
    validate(substrate);
    for (const ThermalLayer& layer : layers) validate(layer);
    const double omega = 2.0 * core::pi * frequency;
    const LayeredHeat stack = layered_heat(substrate, layers);
    const WavenumberRule rule = wavenumber_rule(spot, diffusion_wavenumber(stack, omega));
    SourceProducts sum;
    for (std::size_t i = 0; i < rule.wavenumber.size(); ++i) {
        const SourceProducts p = source_products(stack, rule.wavenumber[i], omega);
        const double weight = rule.weight[i];
        sum.ee += weight * p.ee;
        sum.er += weight * p.er;
        sum.rr += weight * p.rr;
        sum.es += weight * p.es;
        sum.rs += weight * p.rs;
        sum.ss += weight * p.ss;
        sum.bare += weight * p.bare;
    }
    const double factor = prefactor(temperature);
    // Each is a square; rounding can take one that cancels completely below zero.
    const auto psd = [&](double square) {
        return std::max(0.0, finite_psd(factor * square, spectrum, evans));
    };
    const double coating = sum.ee + 2.0 * sum.er + sum.rr;
    const double elastic = sum.ee + 2.0 * sum.es + sum.ss;
    return {psd(sum.ee),
            psd(sum.rr),
            psd(coating),
            psd(elastic),
            psd(coating + 2.0 * (sum.es + sum.rs) + sum.ss),
            psd(sum.bare)};
}

double substrate_thermo_elastic_psd(const ThermalMaterial& substrate, const Footprint& spot,
                                    double temperature, double frequency) {
    require_conditions(spot, temperature, frequency, cerdonio);
    validate(substrate);
    const double omega = 2.0 * core::pi * frequency;
    const WavenumberRule rule = wavenumber_rule(spot, diffusion_wavenumber({{}, substrate}, omega));
    double sum = 0.0;
    for (std::size_t i = 0; i < rule.wavenumber.size(); ++i) {
        sum += rule.weight[i] * bare_substrate_product(substrate, rule.wavenumber[i], omega);
    }
    return finite_psd(prefactor(temperature) * sum, spectrum, cerdonio);
}

double adiabatic_thermo_elastic_psd(const ThermalMaterial& substrate, const Footprint& spot,
                                    double temperature, double frequency) {
    require_conditions(spot, temperature, frequency, braginsky);
    validate(substrate);
    // Notation: S = 8(1+ν)²α²κk_BT²/(√(2π) C² r0³ ω²), r0 = w/√2; for an ellipse ⟨1/w³⟩.
    const double expansion = (1.0 + substrate.elastic.poisson_ratio) * substrate.expansion;
    const double thermal = temperature * expansion / substrate.heat_capacity;
    const double inverse_cube = 2.0 * std::sqrt(2.0) * mean_inverse_cube(spot);
    const double omega = 2.0 * core::pi * frequency;
    return finite_psd(8.0 * core::boltzmann_constant * substrate.conductivity * thermal * thermal *
                          inverse_cube / (std::sqrt(2.0 * core::pi) * omega * omega),
                      spectrum, braginsky);
}

}  // namespace stillcoat::noise
