#pragma once
/// Mirrors that several tests of the noise share.

#include <cmath>
#include <cstdint>
#include <random>
#include <vector>

#include "stillcoat/core/constants.hpp"
#include "stillcoat/noise/coating_brownian.hpp"
#include "stillcoat/noise/thermal.hpp"
#include "stillcoat/optics/readout.hpp"
#include "support/worst_error.hpp"

namespace stillcoat::noise {

using test::relative_error;
using test::WorstError;

inline constexpr double k_b = core::boltzmann_constant;
inline constexpr double pi = core::pi;

struct Mirror {
    ThermalMaterial substrate;
    std::vector<ThermalLayer> layers;

    std::vector<ElasticLayer> elastic_layers() const {
        std::vector<ElasticLayer> list;
        for (const ThermalLayer& layer : layers) {
            list.push_back({layer.material.elastic, layer.readout});
        }
        return list;
    }
    ThermalNoise noise(const Footprint& spot, double temperature, double frequency) const {
        return thermal_noise(substrate, layers, spot, temperature, frequency);
    }
};

inline const Elastic silica_elastic{72e9, 0.17};
inline const Elastic tantala_elastic{140e9, 0.23};
inline const ThermalMaterial silica{silica_elastic, 5.1e-7, 1.38, 1.64e6};
inline const ThermalMaterial tantala{tantala_elastic, 3.6e-6, 33.0, 2.1e6};

/// Silica/tantala quarter waves at 1064 nm on silica, in vacuum.
inline Mirror quarter_wave_mirror(bool high_outermost, int pairs = 19, double extinction = 0.0) {
    optics::OpticalStack stack{1.0, {}, 1.45};
    Mirror mirror{silica, {}};
    for (int j = 0; j < 2 * pairs; ++j) {
        const bool high = (j % 2 == 0) == high_outermost;
        const double n = high ? 2.07 : 1.45;
        stack.layers.push_back({{n, extinction}, 1064e-9 / (4.0 * n)});
        mirror.layers.push_back({high ? tantala : silica, high ? 1.4e-5 : 8e-6, {}});
    }
    const optics::StandingWave wave =
        optics::standing_wave(stack, {1064e-9, 0.0, optics::Polarisation::s});
    const std::vector<optics::ReadoutLayer> weights =
        optics::readout_weights(wave, std::vector<optics::Photoelasticity>(stack.layers.size()));
    for (std::size_t j = 0; j < weights.size(); ++j) mirror.layers[j].readout = weights[j];
    return mirror;
}

/// A readout that does not enter the layer.
inline optics::ReadoutLayer surface_weight(double thickness) {
    return {thickness, 1.0, 0.0, 0.0, {}};
}

/// Mirrors of arbitrary materials, with absorption and photoelasticity. The seed is the test's to
/// print.
class RandomMirrors {
  public:
    explicit RandomMirrors(std::uint32_t seed) : engine_(seed) {}

    double between(double low, double high) {
        return std::uniform_real_distribution<double>(low, high)(engine_);
    }
    double spread(double low, double high) {
        return std::exp(between(std::log(low), std::log(high)));
    }
    Elastic elastic() { return {spread(2e9, 5e11), between(-0.2, 0.45)}; }
    ThermalMaterial material() {
        return {elastic(), between(-1e-6, 1e-5), spread(0.1, 300.0), spread(5e5, 4e6)};
    }
    /// At normal incidence, or at a random angle in s or p light.
    Mirror mirror(int count, double largest_extinction, bool oblique = false) {
        optics::OpticalStack stack{between(1.0, 1.5), {}, between(1.4, 3.5)};
        Mirror mirror{material(), {}};
        std::vector<optics::Photoelasticity> photoelasticity;
        for (int j = 0; j < count; ++j) {
            const double absorbing = between(0.0, 1.0) < 0.4 ? 0.0 : 1.0;
            const double k = absorbing * spread(1e-9, 1.0) * largest_extinction;
            stack.layers.push_back({{between(1.3, 3.5), k}, spread(5e-9, 1e-6)});
            mirror.layers.push_back({material(), between(-1e-5, 2e-4), {}});
            photoelasticity.push_back({between(-0.1, 0.3), between(-0.1, 0.3)});
        }
        optics::Illumination light{between(5e-7, 2e-6), 0.0, optics::Polarisation::s};
        if (oblique) {
            light.angle = between(0.0, 1.4);
            light.polarisation =
                between(0.0, 1.0) < 0.5 ? optics::Polarisation::s : optics::Polarisation::p;
        }
        const optics::StandingWave wave = optics::standing_wave(stack, light);
        const std::vector<optics::ReadoutLayer> weights =
            optics::readout_weights(wave, photoelasticity);
        for (std::size_t j = 0; j < weights.size(); ++j) mirror.layers[j].readout = weights[j];
        return mirror;
    }

  private:
    std::mt19937 engine_;
};

/// The two parts of a layer that is cut at `depth`.
inline std::vector<ThermalLayer> cut_layer(const ThermalLayer& layer, double depth) {
    const double rest = layer.readout.thickness - depth;
    ThermalLayer upper = layer, lower = layer;
    upper.readout.thickness = depth;
    lower.readout.thickness = rest;
    const auto reduce = [](optics::ReadoutTerm& term, double distance) {
        const optics::Complex factor = std::exp(term.rate * distance);
        term.strain *= factor;
        term.in_plane *= factor;
        term.index *= factor;
    };
    for (optics::ReadoutTerm& term : upper.readout.terms) reduce(term, term.upwards ? rest : 0.0);
    for (optics::ReadoutTerm& term : lower.readout.terms) reduce(term, term.upwards ? 0.0 : depth);
    return {upper, lower};
}

/// The six spectra as a list, for comparisons.
inline std::vector<double> listed(const ThermalNoise& noise) {
    return {noise.coating_thermo_elastic, noise.coating_thermo_refractive,
            noise.coating_coherent,       noise.thermo_elastic_with_substrate,
            noise.everything_coherent,    noise.substrate_thermo_elastic};
}

}  // namespace stillcoat::noise
