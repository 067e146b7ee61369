#include "assess/noise_validity.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "stillcoat/core/constants.hpp"
#include "stillcoat/noise/finite_mirror_estimate.hpp"

namespace stillcoat::assess {
namespace {

/// Mean elastic constants by thickness: enough for an estimate.
noise::Elastic mean_elastic(const std::vector<noise::ElasticLayer>& layers) {
    double thickness = 0.0, modulus = 0.0, poisson = 0.0;
    for (const noise::ElasticLayer& layer : layers) {
        thickness += layer.readout.thickness;
        modulus += layer.readout.thickness * layer.elastic.youngs_modulus;
        poisson += layer.readout.thickness * layer.elastic.poisson_ratio;
    }
    return {modulus / thickness, poisson / thickness};
}

std::string percent_change(double ratio) { return fmt::format("{:+.1f} %", (ratio - 1.0) * 100.0); }

/// The ratio of coating thickness to beam radius at which the thin-film formula stops being a
/// formula.
void warn_of_small_beam(const stack::Design& design, const stack::Mirror& mirror,
                        std::vector<std::string>& warnings) {
    // Layered elasticity of a silica/tantala coating on silica: the exact energy falls below the
    // thin-film one by 3.7 d/w (bulk) to 7.3 d/w (shear) for small d/w (independent derivation).
    constexpr double bulk_slope = 3.7, shear_slope = 7.3, worth_saying = 0.01, last_linear = 0.05;
    const double ratio = mirror.coating_thickness / design.beam_radius;
    if (ratio > last_linear) {
        warnings.push_back(
            fmt::format("the coating is not thin against the beam (d/w = {:.2g}): the thin-film "
                        "formula of coating Brownian noise does not apply",
                        ratio));
    } else if (shear_slope * ratio > worth_saying) {
        warnings.push_back(
            fmt::format("the coating is not thin against the beam (d/w = {:.2g}): for "
                        "silica/tantala on silica the thin-film "
                        "formula of coating Brownian noise power is then too high by {:.1f} % "
                        "(bulk) to {:.1f} % (shear); "
                        "other materials differ, soft films on a stiff substrate even in sign",
                        ratio, bulk_slope * ratio * 100.0, shear_slope * ratio * 100.0));
    }
}

void warn_of_finite_mirror(const stack::Design& design, const noise::Elastic& substrate,
                           const noise::Elastic& film, std::vector<std::string>& warnings) {
    const double radius = *design.mirror.diameter / 2.0;
    const double height = *design.mirror.thickness;
    // The sums know circles only: that of the ellipse's area.
    const double w = design.beam_radius / std::sqrt(std::cos(design.light.angle));
    const std::string shape =
        fmt::format("beam radius / mirror radius {:.2g}, thickness / radius {:.2g}", w / radius,
                    height / radius);
    constexpr double widest_beam = 0.6, thinnest_plate = 0.1, worth_saying = 0.01;
    if (w > widest_beam * radius || height < thinnest_plate * radius) {
        warnings.push_back(
            fmt::format("a half-space does not describe this mirror ({}): do not use the noise "
                        "figures",
                        shape));
    } else {
        const noise::FiniteMirrorEstimate estimate =
            noise::finite_mirror_estimate(substrate, film, radius, height, w);
        const double worst = std::max({std::abs(estimate.substrate_brownian - 1.0),
                                       std::abs(estimate.substrate_thermo_elastic - 1.0),
                                       std::abs(estimate.coating_brownian - 1.0)});
        if (worst > worth_saying) {
            warnings.push_back(
                fmt::format("noise is that of a half-space; for this mirror ({}) the closed sums "
                            "of the literature give a "
                            "noise power that differs by {} (substrate Brownian), {} (substrate "
                            "thermo-elastic while heat "
                            "stays near the beam), {} (coating Brownian, a rough figure)",
                            shape, percent_change(estimate.substrate_brownian),
                            percent_change(estimate.substrate_thermo_elastic),
                            percent_change(estimate.coating_brownian)));
        }
    }
}

/// Below this frequency heat crosses the whole mirror within a period, which a half-space does not
/// know.
void warn_of_heat_in_mirror(const stack::Design& design, const noise::ThermalMaterial& substrate,
                            std::vector<std::string>& warnings) {
    const double size = std::min(*design.mirror.diameter / 2.0, *design.mirror.thickness);
    const double frequency =
        substrate.conductivity / (substrate.heat_capacity * 2.0 * core::pi * size * size);
    if (frequency <= design.band.from) return;
    warnings.push_back(fmt::format(
        "below {:.2g} Hz heat crosses the whole mirror within a period: the half-space's "
        "thermal noise does not hold there",
        frequency));
}

/// Share of a Gaussian beam's power outside a circle of radius R that it meets at an angle: the
/// footprint w/cosθ × w is averaged over the direction.
double missed_power(double beam_radius, double angle, double mirror_radius) {
    constexpr int directions = 180;
    double sum = 0.0;
    for (int i = 0; i < directions; ++i) {
        const double phi = core::pi * (i + 0.5) / directions;
        const double stretch = std::cos(angle) * std::cos(phi);
        const double u = stretch * stretch + std::sin(phi) * std::sin(phi);
        sum += std::cos(angle) / u * std::exp(-2.0 * u * std::pow(mirror_radius / beam_radius, 2));
    }
    return sum / directions;
}

}  // namespace

void warn_of_beam(const stack::Design& design, std::vector<std::string>& warnings) {
    const double divergence = design.light.wavelength / (core::pi * design.beam_radius);
    constexpr double largest_divergence = 0.05;
    if (divergence > largest_divergence) {
        warnings.push_back(fmt::format(
            "the beam diverges by {:.2g} rad: a plane wave no longer describes it", divergence));
    }
    if (!design.mirror.diameter) return;
    const double missed =
        missed_power(design.beam_radius, design.light.angle, *design.mirror.diameter / 2.0);
    constexpr double worth_saying = 1e-6;
    if (missed > worth_saying) {
        warnings.push_back(
            fmt::format("{:.2g} % of the light power misses the mirror's face", missed * 100.0));
    }
}

void warn_of_validity(const stack::Design& design, const stack::Mirror& mirror,
                      const NoiseModel& model, std::vector<std::string>& warnings) {
    warn_of_small_beam(design, mirror, warnings);
    const bool finite = design.mirror.diameter && design.mirror.thickness;
    if (finite && model.substrate_elastic().value && !model.elastic_layers().empty()) {
        warn_of_finite_mirror(design, *model.substrate_elastic().value,
                              mean_elastic(model.elastic_layers()), warnings);
    }
    if (finite && model.substrate_thermal().value) {
        warn_of_heat_in_mirror(design, *model.substrate_thermal().value, warnings);
    }
    const double quantum = design.band.to * core::planck_constant / core::boltzmann_constant;
    if (quantum > 0.05 * design.temperature) {
        warnings.push_back(
            fmt::format("at {:g} Hz a quantum is no longer small against k_B T", design.band.to));
    }
}

}  // namespace stillcoat::assess
