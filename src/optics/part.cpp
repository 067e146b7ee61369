#include "stillcoat/optics/part.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <numeric>

#include "optics/recursion.hpp"
#include "optics/validity.hpp"
#include "stillcoat/core/errors.hpp"

namespace stillcoat::optics {

namespace {

constexpr const char* source = "M. Born & E. Wolf, Principles of Optics, §7.6";
/// exp(−40) is below the rounding of 1: no trace of a fringe is left.
constexpr double log_opaque = -40.0;
constexpr double largest_decay_per_phase = 0.01;

/// The wave in the plate.
struct Plate {
    Complex normal;                     ///< q in units of k0
    double log_internal_transmittance;  ///< ln τ
};

Plate plate(const Part& part, const Illumination& light) {
    require_valid(coherent_stack(part), light);
    if (!(part.substrate_thickness > 0.0)) {
        throw core::DomainError("thickness of the substrate plate", part.substrate_thickness, "m",
                                "above 0", source);
    }
    const double beta = part.incident_index * std::sin(light.angle);
    const Complex normal =
        decaying_root(part.substrate_index * part.substrate_index - Complex(beta * beta));
    const double path = 2.0 * core::pi / light.wavelength * part.substrate_thickness;
    return {normal, 0.0 - 2.0 * path * normal.imag()};
}

/// The faces as stacks between half-spaces, both with the real index of the plate.
FaceResponses face_responses(const Part& part, const Illumination& light, const Plate& inside) {
    const double decay = inside.normal.imag(), phase = inside.normal.real();
    if (!(decay <= largest_decay_per_phase * phase) || phase == 0.0) {
        const double ratio = phase > 0.0 ? decay / phase : std::numeric_limits<double>::infinity();
        throw core::DomainError("attenuation per phase of the wave in the substrate plate", ratio,
                                "", "at most 0.01 where intensities are added; add amplitudes",
                                source);
    }
    const double n = part.substrate_index.real();
    const double sine = part.incident_index * std::sin(light.angle) / n;
    const Illumination within{light.wavelength, std::asin(std::min(sine, 1.0)), light.polarisation};
    OpticalStack front_from_inside{n, part.front_layers, part.incident_index};
    std::reverse(front_from_inside.layers.begin(), front_from_inside.layers.end());
    return {response({part.incident_index, part.front_layers, n}, light),
            response(front_from_inside, within),
            response({n, part.rear_layers, part.rear_index}, within)};
}

double sum(const std::vector<double>& terms) {
    return std::accumulate(terms.begin(), terms.end(), 0.0);
}

void add_up(PartResponse& result) {
    result.front_absorptance = sum(result.front_layer_absorptance);
    result.rear_absorptance = sum(result.rear_layer_absorptance);
    result.absorptance =
        result.front_absorptance + result.substrate_absorptance + result.rear_absorptance;
    result.loss = result.transmittance + result.absorptance;
}

PartResponse sum_of_amplitudes(const Part& part, const Illumination& light, const Plate& inside) {
    const Response whole = response(coherent_stack(part), light);
    const auto plate_layer =
        whole.layer_absorptance.begin() + static_cast<std::ptrdiff_t>(part.front_layers.size());
    PartResponse result{};
    result.reflectance = whole.reflectance;
    result.transmittance = whole.transmittance;
    result.log_transmittance = whole.log_transmittance;
    result.front_layer_absorptance.assign(whole.layer_absorptance.begin(), plate_layer);
    result.substrate_absorptance = *plate_layer;
    result.rear_layer_absorptance.assign(plate_layer + 1, whole.layer_absorptance.end());
    result.log_internal_transmittance = inside.log_internal_transmittance;
    add_up(result);
    return result;
}

/// ln D. Where D underflows nothing absorbs, and D = T1' + T2 is added up in logarithms.
double log_denominator(double denominator, const FaceResponses& faces) {
    if (denominator >= std::numeric_limits<double>::min()) return std::log(denominator);
    const double a = faces.front_from_inside.log_transmittance;
    const double b = faces.rear_from_inside.log_transmittance;
    const double larger = std::max(a, b);
    return std::isinf(larger) ? larger : larger + std::log1p(std::exp(std::min(a, b) - larger));
}

PartResponse sum_of_intensities(const Part& part, const Illumination& light, const Plate& inside) {
    // Notation: τ, R1, T1, A1, R1', T1', A1', R2, T2, A2, L = 1 − R, D, u as in the header.
    const FaceResponses faces = face_responses(part, light, inside);
    const Response& front = faces.front;
    const Response& back = faces.front_from_inside;
    const Response& rear = faces.rear_from_inside;
    const double log_tau = inside.log_internal_transmittance;
    const double tau = std::exp(log_tau);
    const double lost_twice = -std::expm1(2.0 * log_tau);  // 1 − τ²
    const double d = back.loss + back.reflectance * (rear.loss + rear.reflectance * lost_twice);
    const double log_d = log_denominator(d, faces);

    double entered = 0.0;  // u
    PartResponse result{};
    result.log_transmittance = -std::numeric_limits<double>::infinity();
    if (!std::isinf(front.log_transmittance)) {
        entered = d >= std::numeric_limits<double>::min()
                      ? front.transmittance / d
                      : std::exp(front.log_transmittance - log_d);
        result.log_transmittance =
            front.log_transmittance + log_tau + rear.log_transmittance - log_d;
    }
    const double at_rear = entered * tau;
    const double returned = at_rear * tau * rear.reflectance;
    result.reflectance = front.reflectance + returned * back.transmittance;
    result.transmittance = at_rear * rear.transmittance;
    result.substrate_absorptance = entered * -std::expm1(log_tau) * (1.0 + tau * rear.reflectance);
    const std::size_t count = part.front_layers.size();
    for (std::size_t j = 0; j < count; ++j) {
        result.front_layer_absorptance.push_back(front.layer_absorptance[j] +
                                                 returned * back.layer_absorptance[count - 1 - j]);
    }
    for (const double absorbed : rear.layer_absorptance) {
        result.rear_layer_absorptance.push_back(at_rear * absorbed);
    }
    result.log_internal_transmittance = log_tau;
    add_up(result);
    return result;
}

}  // namespace

PartResponse part_response(const Part& part, const Illumination& light, Summation summation) {
    const Plate inside = plate(part, light);
    if (summation == Summation::amplitudes || inside.log_internal_transmittance < log_opaque) {
        return sum_of_amplitudes(part, light, inside);
    }
    return sum_of_intensities(part, light, inside);
}

FaceResponses face_responses(const Part& part, const Illumination& light) {
    return face_responses(part, light, plate(part, light));
}

Part turned_around(const Part& part) {
    Part other{part.rear_index,          part.rear_layers,  part.substrate_index,
               part.substrate_thickness, part.front_layers, part.incident_index};
    std::reverse(other.front_layers.begin(), other.front_layers.end());
    std::reverse(other.rear_layers.begin(), other.rear_layers.end());
    return other;
}

Illumination light_from_rear(const Part& part, const Illumination& light) {
    require_valid(coherent_stack(part), light);
    const double sine = part.incident_index * std::sin(light.angle) / part.rear_index;
    const double angle = std::asin(std::min(sine, 1.0));
    if (!(sine < 1.0) || !(angle < core::pi / 2.0)) {
        throw core::DomainError("sine of the angle in the rear medium", sine, "", "below 1",
                                "Snell's law");
    }
    return {light.wavelength, angle, light.polarisation};
}

OpticalStack coherent_stack(const Part& part) {
    OpticalStack stack{part.incident_index, part.front_layers, part.rear_index};
    stack.layers.push_back({part.substrate_index, part.substrate_thickness});
    stack.layers.insert(stack.layers.end(), part.rear_layers.begin(), part.rear_layers.end());
    return stack;
}

}  // namespace stillcoat::optics
