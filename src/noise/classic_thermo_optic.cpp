#include "stillcoat/noise/classic_thermo_optic.hpp"

#include <cmath>
#include <limits>

#include "noise/footprint_averages.hpp"
#include "noise/heat_layer.hpp"
#include "noise/limits.hpp"
#include "noise/wavenumber_rule.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/core/errors.hpp"

namespace stillcoat::noise {
namespace {

constexpr char evans[] = "Evans et al., Phys. Rev. D 78, 102003 (2008)";
constexpr char face[] = "Braginsky et al., Phys. Lett. A 271, 303 (2000)";
constexpr char order[] = "Gorodetsky, Phys. Lett. A 372, 6813 (2008)";

/// Γ = elastic_squared·p_E² + crossed·p_E p_R + refractive_squared·p_R².
struct ThicknessWeights {
    double elastic_squared, crossed, refractive_squared;
};

/// (sinh ξ − sin ξ)/ξ² for ξ < 1, without cancellation.
double difference_over_square(double xi) {
    // 2 Σ ξ^{4n+3}/(4n+3)!
    const double fourth = xi * xi * xi * xi;
    return 2.0 * xi *
           (1.0 / 6.0 +
            fourth * (1.0 / 5040.0 + fourth * (1.0 / 39916800.0 + fourth / 1307674368000.0)));
}

ThicknessWeights thickness_weights(double xi, double ratio) {
    // Notation: Γ = [p_E²Γ0 + p_E p_R ξΓ1 + p_R²ξ²Γ2]/(R ξ²Γ_D). Numerator and denominator are
    // multiplied by e^{−ξ}, so that no thickness overflows.
    const double r = ratio;
    const double scale = std::exp(-xi);
    const double sinh_xi = -0.5 * std::expm1(-2.0 * xi);
    const double cosh_xi = 0.5 * (1.0 + std::exp(-2.0 * xi));
    const double sinh_half = -0.5 * std::expm1(-xi);       // times e^{−ξ/2}
    const double cosh_half = 0.5 * (1.0 + std::exp(-xi));  // times e^{−ξ/2}
    const double sine = scale * std::sin(xi);
    const double cosine = scale * std::cos(xi);
    const double sinc_half = xi == 0.0 ? 0.5 : std::sin(0.5 * xi) / xi;
    const double sinhc_half = xi == 0.0 ? 0.5 : sinh_half / xi;
    // (cosh ξ − cos ξ)/ξ² = 2 (sinh²(ξ/2) + sin²(ξ/2))/ξ²
    const double even = 2.0 * (sinhc_half * sinhc_half + scale * sinc_half * sinc_half);
    const double odd = xi < 1.0 ? scale * difference_over_square(xi) : (sinh_xi - sine) / (xi * xi);
    const double gamma0 = 2.0 * odd + 2.0 * r * even;  // Γ0/ξ²
    const double gamma1 =
        8.0 * std::exp(-0.5 * xi) * sinc_half * (r * cosh_half + sinh_half);  // Γ1/ξ
    const double gamma2 = (1.0 + r * r) * sinh_xi + (1.0 - r * r) * sine + 2.0 * r * cosh_xi;
    const double denominator =
        r * ((1.0 + r * r) * cosh_xi + (1.0 - r * r) * cosine + 2.0 * r * sinh_xi);
    return {gamma0 / denominator, gamma1 / denominator, gamma2 / denominator};
}

/// The coating as one film: what the closed form knows of it.
struct Film {
    double elastic_length = 0.0;     // ᾱ_c d − ᾱ_s d C_c/C_s [m/K]
    double refractive_length = 0.0;  // β̄λ [m/K]
    double thickness = 0.0;          // d [m]
    double heat_capacity = 0.0;      // d C_c [J/(m² K)]
    double resistance = 0.0;         // d/κ_c [m² K/W]
};

Film film(const ThermalMaterial& substrate, const std::vector<ThermalLayer>& layers,
          LayerStrain strain) {
    Film result;
    const double substrate_expansion =
        2.0 * substrate.expansion * (1.0 + substrate.elastic.poisson_ratio);
    for (const ThermalLayer& layer : layers) {
        const double nu = layer.material.elastic.poisson_ratio;
        const double d = layer.readout.thickness;
        const double own = layer.material.expansion * (1.0 + nu) / (1.0 - nu);
        const double effective = heat_layer(substrate.elastic, layer).expansion;
        const optics::ReadoutIntegrals weights = optics::readout_integrals(layer.readout);
        const double growth = strain == LayerStrain::own_thickness ? own : effective;
        result.elastic_length +=
            d * (effective -
                 substrate_expansion * layer.material.heat_capacity / substrate.heat_capacity);
        result.refractive_length -=
            weights.index * layer.index_slope + (weights.strain - d) * growth;
        result.thickness += d;
        result.heat_capacity += d * layer.material.heat_capacity;
        result.resistance += d / layer.material.conductivity;
    }
    return result;
}

}  // namespace

ClassicThermoOptic classic_thermo_optic(const ThermalMaterial& substrate,
                                        const std::vector<ThermalLayer>& layers,
                                        const Footprint& spot, double temperature, double frequency,
                                        LayerStrain strain) {
    require_conditions(spot, temperature, frequency, evans);
    validate(substrate);
    for (const ThermalLayer& layer : layers) validate(layer);
    const Film coating = film(substrate, layers, strain);
    const double omega = 2.0 * core::pi * frequency;
    double xi = 0.0, ratio = 1.0;
    if (coating.thickness > 0.0) {
        // ξ = d √(2ωC_c/κ_c), R = √(κ_cC_c/(κ_sC_s))
        xi = std::sqrt(2.0 * omega * coating.heat_capacity * coating.resistance);
        ratio = std::sqrt(coating.heat_capacity / coating.resistance /
                          (substrate.conductivity * substrate.heat_capacity));
    }
    const ThicknessWeights weights = thickness_weights(xi, ratio);
    const double elastic = coating.elastic_length, refractive = -coating.refractive_length;
    const double square = weights.elastic_squared * elastic * elastic +
                          weights.crossed * elastic * refractive +
                          weights.refractive_squared * refractive * refractive;
    ClassicThermoOptic result{};
    result.temperature_psd = face_temperature_psd(substrate.conductivity, substrate.heat_capacity,
                                                  spot, temperature, frequency);
    result.thermo_elastic_length = coating.elastic_length;
    result.thermo_refractive_length = coating.refractive_length;
    const double sum = elastic + refractive;
    if (square == 0.0) {
        result.thickness_factor = 1.0;
    } else {
        result.thickness_factor =
            sum == 0.0 ? std::numeric_limits<double>::infinity() : square / (sum * sum);
    }
    result.psd = finite_psd(result.temperature_psd * square, "thermo-optic spectrum", evans);
    return result;
}

double face_temperature_psd(double conductivity, double heat_capacity, const Footprint& spot,
                            double temperature, double frequency) {
    require_positive(conductivity, "thermal conductivity", "W/(m K)", face);
    require_positive(heat_capacity, "heat capacity per volume", "J/(m^3 K)", face);
    require_conditions(spot, temperature, frequency, face);
    const double omega = 2.0 * core::pi * frequency;
    const WavenumberRule rule =
        wavenumber_rule(spot, std::sqrt(omega * heat_capacity / conductivity));
    double sum = 0.0;
    for (std::size_t i = 0; i < rule.wavenumber.size(); ++i) {
        const Complex gamma =
            thermal_wavenumber(rule.wavenumber[i], omega, heat_capacity, conductivity).gamma;
        sum += rule.weight[i] * gamma.real() / std::norm(gamma);
    }
    return finite_psd(2.0 * core::boltzmann_constant * temperature * temperature /
                          (core::pi * conductivity) * sum,
                      "temperature spectrum", face);
}

double face_temperature_psd_one_dimensional(double conductivity, double heat_capacity,
                                            const Footprint& spot, double temperature,
                                            double frequency) {
    require_positive(conductivity, "thermal conductivity", "W/(m K)", face);
    require_positive(heat_capacity, "heat capacity per volume", "J/(m^3 K)", face);
    require_conditions(spot, temperature, frequency, face);
    // S = 2√2 k_BT²/(π w² √(κCω))
    const double omega = 2.0 * core::pi * frequency;
    return finite_psd(2.0 * std::sqrt(2.0) * core::boltzmann_constant * temperature * temperature *
                          squared_pressure(spot) / std::sqrt(conductivity * heat_capacity * omega),
                      "temperature spectrum", face);
}

double thick_coating_factor(double xi, double ratio, double elastic_share) {
    require_not_negative(xi, "scaled coating thickness", "1", evans);
    require_positive(ratio, "ratio of effusivities", "1", evans);
    require_finite(elastic_share, "elastic share", "1", evans);
    const ThicknessWeights weights = thickness_weights(xi, ratio);
    const double p_e = elastic_share, p_r = 1.0 - elastic_share;
    return weights.elastic_squared * p_e * p_e + weights.crossed * p_e * p_r +
           weights.refractive_squared * p_r * p_r;
}

double quarter_wave_index_slope(double high_index, double low_index, double high_slope,
                                double low_slope, bool high_index_outermost) {
    require_positive(low_index, "low refractive index", "1", order);
    require_finite(high_slope, "dn/dT of the high index", "1/K", order);
    require_finite(low_slope, "dn/dT of the low index", "1/K", order);
    if (!(high_index > low_index) || !std::isfinite(high_index)) {
        throw core::DomainError("high refractive index", high_index, "1",
                                "greater than the low index and finite", order);
    }
    const double high_square = high_index * high_index, low_square = low_index * low_index;
    const double weighted = high_index_outermost
                                ? high_slope + low_slope
                                : high_square * low_slope + low_square * high_slope;
    return weighted / (4.0 * (high_square - low_square));
}

}  // namespace stillcoat::noise
