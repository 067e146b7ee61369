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

/// Which medium a message is about. Its words are put together only when something is wrong: these
/// checks run for every wavelength of a spectrum.
struct Place {
    int layer;  ///< from 1; 0: the incident medium; −1: the substrate
    std::size_t count;
    std::string name() const {
        if (layer > 0) return fmt::format("layer {} of {}", layer, count);
        return layer == 0 ? "the incident medium" : "the substrate";
    }
};

/// Comparisons are written so that NaN fails them.
void require(bool in_range, const char* quantity, double value, const char* unit,
             const char* allowed) {
    if (!in_range) throw core::DomainError(quantity, value, unit, allowed, source);
}

void require(bool in_range, const char* quantity, const Place& place, double value,
             const char* unit, const char* allowed) {
    if (in_range) return;
    throw core::DomainError(fmt::format("{} of {}", quantity, place.name()), value, unit, allowed,
                            source);
}

void require_index(Complex index, const Place& place) {
    require(index.real() >= 0.0 && index.real() <= largest_index, "refractive index", place,
            index.real(), "", "0 to 1e6");
    require(index.imag() >= 0.0 && index.imag() <= largest_index, "extinction coefficient", place,
            index.imag(), "", "0 to 1e6 (time factor exp(-i omega t), index n + ik)");
    require(std::abs(index) >= smallest_index, "modulus of the complex index", place,
            std::abs(index), "", "at least 1e-6");
}

void require_finite_slopes(const numerics::Jet<Complex>& index, const Place& place) {
    const auto finite = [](Complex z) {
        return std::isfinite(z.real()) && std::isfinite(z.imag());
    };
    require(finite(index.first), "dn/domega", place, std::abs(index.first), "s", "finite");
    require(finite(index.second), "d2n/domega2", place, std::abs(index.second), "s2", "finite");
}

}  // namespace

void require_valid(const OpticalStack& stack, const Illumination& light) {
    // The bounds of the wavelength only keep 2π/λ and its square away from overflow.
    require(light.wavelength > 1e-100 && light.wavelength < 1e100, "vacuum wavelength",
            light.wavelength, "m", "positive and finite");
    require(light.angle >= 0.0 && light.angle < core::pi / 2.0, "angle of incidence", light.angle,
            "rad", "0 to below pi/2");
    require(stack.incident_index >= smallest_index && stack.incident_index <= largest_index,
            "refractive index", {0, 0}, stack.incident_index, "", "1e-6 to 1e6, real");
    const std::size_t count = stack.layers.size();
    for (std::size_t j = 0; j < count; ++j) {
        const OpticalLayer& layer = stack.layers[j];
        const Place place{static_cast<int>(j) + 1, count};
        require_index(layer.index, place);
        const double wavelengths =
            std::max(1.0, std::abs(layer.index)) * layer.thickness / light.wavelength;
        require(layer.thickness >= 0.0 && wavelengths <= most_wavelengths, "thickness", place,
                layer.thickness, "m", "0 to 1e9 wavelengths in the layer");
    }
    require_index(stack.substrate_index, {-1, count});
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
    const std::size_t count = stack.layer_index.size();
    require_finite_slopes(numerics::to_complex(stack.incident_index), {0, count});
    for (std::size_t j = 0; j < count; ++j) {
        require_finite_slopes(stack.layer_index[j], {static_cast<int>(j) + 1, count});
    }
    require_finite_slopes(stack.substrate_index, {-1, count});
}

}  // namespace stillcoat::optics
