#include "stillcoat/optics/standing_wave.hpp"

#include <algorithm>
#include <boost/math/tools/minima.hpp>
#include <cmath>
#include <stdexcept>

#include "optics/field_sweep.hpp"
#include "stillcoat/core/errors.hpp"

namespace stillcoat::optics {

namespace {

void require_layer(const StandingWave& wave, std::size_t layer) {
    if (layer >= wave.layers.size()) throw std::logic_error("the stack has no such layer");
}

/// The depth within [from, to] at which the intensity is largest, starting from even samples.
Peak largest_between(const StandingWave& wave, std::size_t layer, double from, double to) {
    constexpr int steps = 64;
    const auto depth_of = [&](int i) { return i == steps ? to : from + (to - from) * i / steps; };
    Peak best{-1.0, from};
    int best_step = 0;
    for (int i = 0; i <= steps; ++i) {
        const double intensity = relative_intensity(wave, layer, depth_of(i));
        if (intensity > best.intensity) {
            best = {intensity, depth_of(i)};
            best_step = i;
        }
    }
    if (to > from) {
        // The search has an absolute tolerance: it walks a fraction of the bracket, not metres.
        constexpr int bits = 26;  // a maximum is flat: half of the digits are all there is to know
        const double low = depth_of(std::max(best_step - 1, 0));
        const double high = depth_of(std::min(best_step + 1, steps));
        const auto within = [&](double u) { return std::min(low + u * (high - low), high); };
        const auto found = boost::math::tools::brent_find_minima(
            [&](double u) { return -relative_intensity(wave, layer, within(u)); }, 0.0, 1.0, bits);
        if (-found.second > best.intensity) best = {-found.second, within(found.first)};
    }
    return best;
}

}  // namespace

StandingWave standing_wave(const OpticalStack& stack, const Illumination& light) {
    return field_sweep(stack, light).wave;
}

double relative_intensity(const StandingWave& wave, std::size_t layer, double depth) {
    require_layer(wave, layer);
    const double thickness = wave.layers[layer].thickness;
    if (!(depth >= 0.0 && depth <= thickness)) {
        throw core::DomainError("depth inside the layer", depth, "m", "0 to its thickness",
                                "M. Born & E. Wolf, Principles of Optics, §1.6");
    }
    const Tangential<Complex> field = fields_at(wave, layer, depth);
    if (wave.light.polarisation == Polarisation::s) return std::norm(field.electric);
    // Normal component E_z = −β H/n²; the incident tangential amplitude is cosθ0 of the whole
    // field.
    const Complex index = wave.stack.layers[layer].index;
    const double cosine = std::cos(wave.light.angle);
    const double normal =
        beta_square(wave.stack, wave.light) * std::norm(field.magnetic / (index * index));
    return cosine * cosine * (std::norm(field.electric) + normal);
}

double face_intensity(const StandingWave& wave) {
    if (wave.light.polarisation == Polarisation::s) return std::norm(wave.electric_face);
    // E_z = −β H/n0² with H = (n0/cosθ0)(1 − r), times cosθ0: sinθ0 (1 − r).
    const double cosine = std::cos(wave.light.angle);
    const double sine = std::sin(wave.light.angle);
    return cosine * cosine * std::norm(wave.electric_face) +
           sine * sine * std::norm(1.0 - wave.reflection);
}

Peak peak_intensity(const StandingWave& wave, std::size_t layer) {
    require_layer(wave, layer);
    // |E|² is a convex envelope plus a beat of period π/q'. Moving by whole periods towards one of
    // the ends never lowers the envelope, so the largest value lies within one period of an end.
    const LayerField& field = wave.layers[layer];
    const double period = core::pi / std::max(field.wavenumber.real(), 1e-300);
    if (field.thickness <= 2.0 * period) return largest_between(wave, layer, 0.0, field.thickness);
    const Peak first = largest_between(wave, layer, 0.0, period);
    const Peak last = largest_between(wave, layer, field.thickness - period, field.thickness);
    return first.intensity >= last.intensity ? first : last;
}

std::vector<double> stored_energy(const StandingWave& wave) {
    // Notation: s: H_z = β E; p: E_z = −β H/n²; energy density (Re n² |E|² + |H|²)/(2 η0 c) per
    // watt.
    const double eta0 = incident_admittance(wave.stack.incident_index, wave.light);
    const double beta2 = beta_square(wave.stack, wave.light);
    std::vector<double> energy;
    energy.reserve(wave.layers.size());
    for (std::size_t j = 0; j < wave.layers.size(); ++j) {
        const SquaredFields square = squared_fields(wave, j);
        const Complex n = wave.stack.layers[j].index;
        const double permittivity = (n.real() - n.imag()) * (n.real() + n.imag());
        const double density =
            wave.light.polarisation == Polarisation::s
                ? (permittivity + beta2) * square.electric + square.magnetic
                : permittivity * (square.electric + beta2 * square.magnetic / std::norm(n * n)) +
                      square.magnetic;
        energy.push_back(density / (2.0 * eta0 * core::speed_of_light));
    }
    return energy;
}

double energy_penetration_depth(const StandingWave& wave) {
    double total = 0.0;
    for (const double energy : stored_energy(wave)) total += energy;
    return core::speed_of_light * total / (2.0 * wave.stack.incident_index);
}

}  // namespace stillcoat::optics
