#include "stillcoat/noise/substrate.hpp"

#include <cmath>

#include "noise/footprint_averages.hpp"
#include "noise/limits.hpp"
#include "noise/wavenumber_rule.hpp"
#include "stillcoat/core/constants.hpp"

namespace stillcoat::noise {
namespace {

constexpr char bondu[] = "Bondu, Hello & Vinet, Phys. Lett. A 246, 227 (1998)";
constexpr char vyatchanin[] = "Braginsky & Vyatchanin, Phys. Lett. A 324, 345 (2004)";
constexpr char benthem[] = "Benthem & Levin, Phys. Rev. D 80, 062004 (2009)";

void validate(const TransmittedPath& path, const char* source) {
    require_positive(path.index, "refractive index", "1", source);
    require_finite(path.index_slope, "dn/dT", "1/K", source);
    require_not_negative(path.length, "path through the substrate", "m", source);
    require_positive(path.wavelength, "wavelength", "m", source);
}

/// k_BT²β²l/π [m³ K...]: what all thermo-refractive terms share.
double path_strength(const TransmittedPath& path, double temperature) {
    const double slope = path.index_slope * temperature;
    return core::boltzmann_constant * slope * slope * path.length / core::pi;
}

}  // namespace

StrainEnergy half_space_energy(const Elastic& substrate, const Footprint& spot) {
    validate(substrate);
    require_spot(spot, bondu);
    const double nu = substrate.poisson_ratio;
    const double total = (1.0 - nu * nu) / (2.0 * std::sqrt(core::pi) * substrate.youngs_modulus) *
                         mean_inverse_radius(spot);
    const double bulk_share = (1.0 + nu) * (1.0 - 2.0 * nu) / (3.0 * (1.0 - nu));
    return {total * bulk_share, total * (1.0 - bulk_share)};
}

double thermo_refractive_psd(const ThermalMaterial& substrate, const TransmittedPath& path,
                             const Footprint& spot, double temperature, double frequency) {
    validate(substrate);
    validate(path, vyatchanin);
    require_conditions(spot, temperature, frequency, vyatchanin);
    // Notation: S = (2k_BT²β²l/π) ∫k dk ⟨|p|²⟩ k²/(κ(k⁴ + k_T⁴)), k_T² = ωC/κ.
    const double omega = 2.0 * core::pi * frequency;
    const double k_t = std::sqrt(omega * substrate.heat_capacity / substrate.conductivity);
    const WavenumberRule rule = wavenumber_rule(spot, k_t);
    double sum = 0.0;
    for (std::size_t i = 0; i < rule.wavenumber.size(); ++i) {
        const double ratio = rule.wavenumber[i] / k_t;
        const double square = ratio * ratio;
        sum += rule.weight[i] * square / (1.0 + square * square);
    }
    return finite_psd(
        2.0 * path_strength(path, temperature) / (substrate.conductivity * k_t * k_t) * sum,
        "thermo-refractive spectrum", vyatchanin);
}

double standing_wave_thermo_refractive_psd(const ThermalMaterial& substrate,
                                           const TransmittedPath& path, const Footprint& spot,
                                           double temperature, double frequency) {
    validate(substrate);
    validate(path, benthem);
    require_conditions(spot, temperature, frequency, benthem);
    // Notation: (k_BT²β²l/π)(2/(wx wy)) κk_L²/(ω²C² + κ²k_L⁴), k_L = 2nk0.
    const double omega = 2.0 * core::pi * frequency;
    const double k_l = 4.0 * core::pi * path.index / path.wavelength;
    const double conducted = substrate.conductivity * k_l * k_l;
    const double stored = omega * substrate.heat_capacity;
    const double relaxation = conducted / (stored * stored + conducted * conducted);
    return finite_psd(
        2.0 * path_strength(path, temperature) / (spot.radius_x * spot.radius_y) * relaxation,
        "thermo-refractive spectrum", benthem);
}

}  // namespace stillcoat::noise
