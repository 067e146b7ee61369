#include "stillcoat/optics/scatter.hpp"

#include <cmath>

#include "stillcoat/core/constants.hpp"
#include "stillcoat/core/errors.hpp"

namespace stillcoat::optics {

namespace {

constexpr const char* source = "H. E. Bennett & J. O. Porteus, J. Opt. Soc. Am. 51, 123 (1961)";
constexpr double largest_phase = 0.3;

/// Comparisons are written so that NaN fails them.
void require(bool in_range, const char* quantity, double value, const char* unit,
             const char* allowed) {
    if (!in_range) throw core::DomainError(quantity, value, unit, allowed, source);
}

void require_fraction(double value, const char* quantity) {
    require(value >= 0.0 && value <= 1.0, quantity, value, "", "0 to 1");
}

void require_light(double incident_index, const Illumination& light) {
    require(incident_index >= 1e-6 && incident_index <= 1e6, "refractive index", incident_index, "",
            "1e-6 to 1e6, real");
    require(light.wavelength > 1e-100 && light.wavelength < 1e100, "vacuum wavelength",
            light.wavelength, "m", "positive and finite");
    require(light.angle >= 0.0 && light.angle < core::pi / 2.0, "angle of incidence", light.angle,
            "rad", "0 to below pi/2");
}

}  // namespace

double total_integrated_scatter(double reflectance, double roughness, double incident_index,
                                const Illumination& light) {
    require_light(incident_index, light);
    require_fraction(reflectance, "reflectance");
    require(roughness >= 0.0, "rms roughness", roughness, "m", "0 or more");
    const double phase =
        4.0 * core::pi * (roughness / light.wavelength) * incident_index * std::cos(light.angle);
    require(phase <= largest_phase, "4 pi n cos(angle) times rms roughness over wavelength", phase,
            "", "at most 0.3");
    return reflectance * -std::expm1(-phase * phase);
}

double largest_scattering_frequency(double incident_index, const Illumination& light) {
    require_light(incident_index, light);
    return incident_index * (1.0 + std::sin(light.angle)) / light.wavelength;
}

MirrorLoss mirror_loss(double transmittance, double absorptance, double scatter) {
    require_fraction(transmittance, "transmittance");
    require_fraction(absorptance, "absorptance");
    require_fraction(scatter, "total integrated scatter");
    const double total = transmittance + absorptance + scatter;
    require(total <= 1.0 + 1e-9, "sum of transmittance, absorptance and scatter", total, "",
            "0 to 1");
    return {transmittance, absorptance, scatter, total};
}

}  // namespace stillcoat::optics
