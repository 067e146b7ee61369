#include "optics/validity.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <stdexcept>
#include <string>

#include "stillcoat/core/constants.hpp"
#include "stillcoat/core/errors.hpp"

namespace stillcoat::optics {

namespace {

constexpr double smallest_index = 1e-6;
constexpr double largest_index = 1e6;
/// Beyond this many wavelengths the phase of a double is no longer known to 1e-6 rad.
constexpr double most_wavelengths = 1e9;
constexpr const char* source = "M. Born & E. Wolf, Principles of Optics, §1.6";

/// Comparisons are written so that NaN fails them.
void require(bool in_range, const std::string& quantity, double value, const std::string& unit,
             const std::string& allowed) {
    if (!in_range) throw core::DomainError(quantity, value, unit, allowed, source);
}

void require_index(Complex index, const std::string& medium) {
    require(index.real() >= 0.0 && index.real() <= largest_index, "refractive index of " + medium,
            index.real(), "", "0 to 1e6");
    require(index.imag() >= 0.0 && index.imag() <= largest_index,
            "extinction coefficient of " + medium, index.imag(), "",
            "0 to 1e6 (time factor exp(-i omega t), index n + ik)");
    require(std::abs(index) >= smallest_index, "modulus of the complex index of " + medium,
            std::abs(index), "", "at least 1e-6");
}

void require_finite(Complex value, const std::string& quantity, const std::string& unit) {
    require(std::isfinite(value.real()), quantity + ", real part", value.real(), unit, "finite");
    require(std::isfinite(value.imag()), quantity + ", imaginary part", value.imag(), unit,
            "finite");
}

void require_finite_slopes(const numerics::Jet<Complex>& index, const std::string& medium) {
    require_finite(index.first, "dn/domega of " + medium, "s");
    require_finite(index.second, "d2n/domega2 of " + medium, "s2");
}

}  // namespace

void require_valid(const OpticalStack& stack, const Illumination& light) {
    require(light.wavelength > 1e-100 && light.wavelength < 1e100, "vacuum wavelength",
            light.wavelength, "m", "positive and finite");
    require(light.angle >= 0.0 && light.angle < core::pi / 2.0, "angle of incidence", light.angle,
            "rad", "0 to below pi/2");
    require(stack.incident_index >= smallest_index && stack.incident_index <= largest_index,
            "refractive index of the incident medium", stack.incident_index, "",
            "1e-6 to 1e6, real");
    for (std::size_t j = 0; j < stack.layers.size(); ++j) {
        const OpticalLayer& layer = stack.layers[j];
        const std::string name = fmt::format("layer {} of {}", j + 1, stack.layers.size());
        require_index(layer.index, name);
        const double wavelengths =
            std::max(1.0, std::abs(layer.index)) * layer.thickness / light.wavelength;
        require(layer.thickness >= 0.0 && wavelengths <= most_wavelengths, "thickness of " + name,
                layer.thickness, "m", "0 to 1e9 wavelengths in the layer");
    }
    require_index(stack.substrate_index, "the substrate");
}

void require_valid(const DispersiveStack& stack, const Illumination& light) {
    if (stack.layer_index.size() != stack.thickness.size()) {
        throw std::logic_error("a dispersive stack needs one thickness for each layer index");
    }
    OpticalStack values{stack.incident_index.value, {}, stack.substrate_index.value};
    for (std::size_t j = 0; j < stack.thickness.size(); ++j) {
        values.layers.push_back({stack.layer_index[j].value, stack.thickness[j]});
    }
    require_valid(values, light);
    require_finite_slopes(numerics::to_complex(stack.incident_index), "the incident medium");
    for (std::size_t j = 0; j < stack.layer_index.size(); ++j) {
        require_finite_slopes(stack.layer_index[j],
                              fmt::format("layer {} of {}", j + 1, stack.layer_index.size()));
    }
    require_finite_slopes(stack.substrate_index, "the substrate");
}

}  // namespace stillcoat::optics
