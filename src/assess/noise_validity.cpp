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

}  // namespace

void warn_of_validity(const stack::Design& design, const stack::Mirror& mirror,
                      const Wanted<noise::Elastic>& substrate,
                      const std::vector<noise::ElasticLayer>& layers,
                      std::vector<std::string>& warnings) {
    // Layered elasticity of a silica/tantala coating on silica: the exact energy falls below the
    // thin-film one by 3.7 d/w (bulk) to 7.3 d/w (shear) for small d/w (independent derivation).
    constexpr double bulk_slope = 3.7, shear_slope = 7.3, worth_saying = 0.01;
    const double ratio = mirror.coating_thickness / design.beam_radius;
    if (shear_slope * ratio > worth_saying) {
        warnings.push_back(
            fmt::format("the coating is not thin against the beam (d/w = {:.2g}): coating Brownian "
                        "noise power is given "
                        "by the thin-film formula and is too high by some {:.0f}–{:.0f} % for "
                        "stiff films on silica",
                        ratio, std::min(50.0, bulk_slope * ratio * 100.0),
                        std::min(55.0, shear_slope * ratio * 100.0)));
    }
    const bool finite = design.mirror.diameter && design.mirror.thickness;
    if (finite && substrate.value && !layers.empty()) {
        const double radius = *design.mirror.diameter / 2.0;
        const double height = *design.mirror.thickness;
        const noise::FiniteMirrorEstimate estimate = noise::finite_mirror_estimate(
            *substrate.value, mean_elastic(layers), radius, height, design.beam_radius);
        const double worst = std::max({std::abs(estimate.substrate_brownian - 1.0),
                                       std::abs(estimate.substrate_thermo_elastic - 1.0),
                                       std::abs(estimate.coating_brownian - 1.0)});
        if (worst > worth_saying) {
            warnings.push_back(
                fmt::format("noise is that of a half-space; for this mirror (beam radius / mirror "
                            "radius {:.2f}, thickness / "
                            "radius {:.2f}) the closed sums of the literature give a noise power "
                            "that differs by {} "
                            "(substrate Brownian), {} (substrate thermo-elastic), {} (coating "
                            "Brownian, a rough figure)",
                            design.beam_radius / radius, height / radius,
                            percent_change(estimate.substrate_brownian),
                            percent_change(estimate.substrate_thermo_elastic),
                            percent_change(estimate.coating_brownian)));
        }
        const double missed = std::exp(-2.0 * std::pow(radius / design.beam_radius, 2));
        if (missed > 1e-6) {
            warnings.push_back(
                fmt::format("{:.2g} of the light power misses the mirror's face", missed));
        }
    }
    const double hottest = design.band.to * core::planck_constant / core::boltzmann_constant;
    if (hottest > 0.05 * design.temperature) {
        warnings.push_back(
            fmt::format("at {:g} Hz a quantum is no longer small against k_B T", design.band.to));
    }
}

}  // namespace stillcoat::assess
