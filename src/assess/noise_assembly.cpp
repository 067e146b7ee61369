#include "assess/noise_assembly.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <functional>

#include "assess/noise_inputs.hpp"
#include "assess/noise_validity.hpp"
#include "assess/optical_view.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/noise/classic_thermo_optic.hpp"
#include "stillcoat/noise/quantum_limit.hpp"
#include "stillcoat/noise/substrate.hpp"
#include "stillcoat/optics/readout.hpp"

namespace stillcoat::assess {
namespace {

using materials::PropertyId;

/// One mirror made ready: what does not depend on frequency is computed once.
class NoiseModel {
  public:
    NoiseModel(const stack::Design& design, const materials::Library& library,
               const stack::Mirror& mirror, stack::Ledger& ledger)
        : design_(design), mirror_(mirror), inputs_(design, library, mirror, ledger) {
        read_weights();
        prepare_brownian();
        prepare_thermal();
        prepare_substrate();
    }

    /// Computes every term at each of `list` into the member of `Term` that `target` names.
    void fill(Noise& noise, const std::vector<double>& list, std::vector<double> NoiseTerm::*target,
              std::vector<double> Noise::*total);
    std::vector<LayerNoise> layer_noise(double frequency);
    std::vector<NoiseTerm> terms() const;
    std::vector<NoiseTerm> comparisons() const;
    const Wanted<noise::Elastic>& substrate_elastic() const { return substrate_elastic_; }
    const std::vector<noise::ElasticLayer>& elastic_layers() const { return elastic_layers_; }

  private:
    void read_weights();
    void prepare_brownian();
    void prepare_thermal();
    void prepare_substrate();
    /// Losses of all layers at a frequency; the reason in brownian_missing_ when one is unknown.
    std::vector<noise::Loss> layer_losses(double frequency);
    double coating_psd(const std::vector<noise::StrainEnergy>& energies,
                       const std::vector<noise::Loss>& losses, double frequency, bool bulk,
                       bool shear) const;

    const stack::Design& design_;
    const stack::Mirror& mirror_;
    NoiseInputs inputs_;
    std::vector<optics::ReadoutLayer> weights_, face_weights_;
    std::string weights_missing_;
    Wanted<noise::Elastic> substrate_elastic_;
    std::vector<noise::ElasticLayer> elastic_layers_;
    std::vector<noise::StrainEnergy> energies_, face_energies_;
    std::string brownian_missing_;
    Wanted<noise::ThermalMaterial> substrate_thermal_;
    std::vector<noise::ThermalLayer> thermal_layers_;
    std::string expansion_missing_;   // coating thermo-elastic impossible
    std::string refraction_missing_;  // coating thermo-refractive impossible
    Wanted<noise::StrainEnergy> substrate_energy_;
    std::string substrate_brownian_missing_;
    Wanted<double> mass_;  // of a finite mirror [kg]
    std::optional<noise::TransmittedPath> path_;
    std::string path_missing_;
};

void NoiseModel::read_weights() {
    const optics::StandingWave wave = optics::standing_wave(
        optical_stack(mirror_), {design_.light.wavelength, 0.0, optics::Polarisation::s});
    std::vector<double> p12;
    for (const stack::MirrorLayer& layer : mirror_.layers) {
        p12.push_back(inputs_.photoelastic(layer.material, PropertyId::photoelastic_p12));
    }
    face_weights_ = optics::surface_readout(wave.stack);
    if (std::norm(wave.reflection) > 0.0) {
        weights_ = optics::readout_weights(wave, p12);
    } else {
        weights_missing_ = "the face reflects nothing, so no phase is read";
    }
}

void NoiseModel::prepare_brownian() {
    substrate_elastic_ = inputs_.elastic(design_.mirror.substrate);
    brownian_missing_ = !weights_missing_.empty() ? weights_missing_ : substrate_elastic_.missing;
    std::vector<noise::ElasticLayer> at_face;
    for (std::size_t j = 0; j < mirror_.layers.size() && brownian_missing_.empty(); ++j) {
        const Wanted<noise::Elastic> elastic = inputs_.elastic(mirror_.layers[j].material);
        brownian_missing_ = elastic.missing;
        if (!elastic.value) break;
        elastic_layers_.push_back({*elastic.value, weights_[j]});
        at_face.push_back({*elastic.value, face_weights_[j]});
    }
    if (!brownian_missing_.empty()) return;
    energies_ =
        noise::thin_film_energies(*substrate_elastic_.value, elastic_layers_, design_.beam_radius);
    face_energies_ =
        noise::thin_film_energies(*substrate_elastic_.value, at_face, design_.beam_radius);
    layer_losses(design_.band.from);
}

void NoiseModel::prepare_thermal() {
    substrate_thermal_ = inputs_.thermal(design_.mirror.substrate);
    expansion_missing_ = !weights_missing_.empty() ? weights_missing_ : substrate_thermal_.missing;
    for (std::size_t j = 0; j < mirror_.layers.size() && expansion_missing_.empty(); ++j) {
        const stack::MirrorLayer& layer = mirror_.layers[j];
        const Wanted<noise::ThermalMaterial> material = inputs_.thermal(layer.material);
        const Wanted<double> slope =
            inputs_.free_index_slope(layer.material, layer.optical.index.value);
        if (!material.value) {
            expansion_missing_ = material.missing;
            break;
        }
        if (!slope.value && refraction_missing_.empty()) refraction_missing_ = slope.missing;
        thermal_layers_.push_back({*material.value, slope.value.value_or(0.0), weights_[j]});
    }
    if (!expansion_missing_.empty()) refraction_missing_ = expansion_missing_;
}

void NoiseModel::prepare_substrate() {
    const std::string& name = design_.mirror.substrate;
    if (substrate_elastic_.value) {
        substrate_energy_.value =
            noise::half_space_energy(*substrate_elastic_.value, design_.beam_radius);
    }
    substrate_energy_.missing = substrate_elastic_.missing;
    const Wanted<noise::Loss> loss = inputs_.loss(name, design_.band.from);
    substrate_brownian_missing_ =
        !substrate_energy_.value ? substrate_energy_.missing : loss.missing;
    if (design_.mirror.thickness) {
        mass_ = inputs_.property(name, PropertyId::density);
        const double radius = *design_.mirror.diameter / 2.0;
        if (mass_.value) *mass_.value *= core::pi * radius * radius * *design_.mirror.thickness;
    } else {
        mass_.missing = "diameter and thickness of the mirror not given";
    }
    const Wanted<double> slope = inputs_.property(name, PropertyId::thermo_optic_coefficient);
    if (!design_.mirror.thickness) {
        path_missing_ = mass_.missing;
    } else if (!substrate_thermal_.value) {
        path_missing_ = substrate_thermal_.missing;
    } else if (!slope.value) {
        path_missing_ = slope.missing;
    } else {
        path_ = noise::TransmittedPath{mirror_.substrate_optical.index.value, *slope.value,
                                       *design_.mirror.thickness, design_.light.wavelength};
    }
}

std::vector<noise::Loss> NoiseModel::layer_losses(double frequency) {
    std::map<std::string, noise::Loss> known;
    std::vector<noise::Loss> losses;
    const double factor = design_.coating.excess_loss;
    for (const stack::MirrorLayer& layer : mirror_.layers) {
        if (known.count(layer.material) == 0) {
            const Wanted<noise::Loss> loss = inputs_.loss(layer.material, frequency);
            if (!loss.value) {
                brownian_missing_ = loss.missing;
                return {};
            }
            known[layer.material] = {factor * loss.value->bulk, factor * loss.value->shear};
        }
        losses.push_back(known[layer.material]);
    }
    return losses;
}

double NoiseModel::coating_psd(const std::vector<noise::StrainEnergy>& energies,
                               const std::vector<noise::Loss>& losses, double frequency, bool bulk,
                               bool shear) const {
    double sum = 0.0;
    for (std::size_t j = 0; j < energies.size(); ++j) {
        const noise::Loss loss{bulk ? losses[j].bulk : 0.0, shear ? losses[j].shear : 0.0};
        sum += noise::brownian_psd(energies[j], loss, design_.temperature, frequency);
    }
    return sum;
}

NoiseTerm named(const std::string& key, const std::string& title, const std::string& source,
                const std::string& missing) {
    NoiseTerm term;
    term.key = key;
    term.title = title;
    term.source = source;
    term.missing = missing;
    return term;
}

std::vector<NoiseTerm> NoiseModel::terms() const {
    std::vector<NoiseTerm> list{
        named("coating_brownian", "coating Brownian",
              "thin film on a half-space with light penetration and photoelasticity, bulk and "
              "shear loss: "
              "Hong et al., Phys. Rev. D 87, 082001 (2013); leaves out the ratio of thickness to "
              "beam",
              brownian_missing_),
        named("thermal_coherent", "thermal, all coherent",
              "one heat equation for coating and substrate, expansion and refraction coherent: "
              "Evans et al., "
              "Phys. Rev. D 78, 102003 (2008) with Levin, Phys. Lett. A 372, 1941 (2008)",
              refraction_missing_),
        named("substrate_brownian", "substrate Brownian",
              "half-space: Bondu, Hello & Vinet, Phys. Lett. A 246, 227 (1998); leaves out surface "
              "loss",
              substrate_brownian_missing_)};
    // Without dn/dT the expansion alone is still known, and without the coating's data the
    // substrate's.
    if (!refraction_missing_.empty() && substrate_thermal_.value) {
        NoiseTerm part =
            expansion_missing_.empty()
                ? named("thermo_elastic_with_substrate", "thermo-elastic alone",
                        "as the coherent term, without dn/dT", "")
                : named("substrate_thermo_elastic", "substrate thermo-elastic",
                        "bare half-space: Cerdonio et al., Phys. Rev. D 63, 082003 (2001)", "");
        list.push_back(std::move(part));
    }
    for (NoiseTerm& term : list) term.in_total = term.missing.empty();
    return list;
}

std::vector<NoiseTerm> NoiseModel::comparisons() const {
    const std::string heat =
        "parts of the coherent heat equation; they interfere and are not to be added";
    return {
        named("coating_brownian_bulk", "coating Brownian, bulk part", "", brownian_missing_),
        named("coating_brownian_shear", "coating Brownian, shear part", "", brownian_missing_),
        named("coating_brownian_at_face", "coating Brownian, light kept at the face",
              "g = 1: Harry et al., Class. Quantum Grav. 19, 897 (2002) with equal losses",
              brownian_missing_),
        named("coating_thermo_elastic", "coating thermo-elastic alone", heat, expansion_missing_),
        named("coating_thermo_refractive", "coating thermo-refractive alone", heat,
              refraction_missing_),
        named("coating_coherent", "coating thermo-optic, coherent", heat, refraction_missing_),
        named("bare_substrate_thermo_elastic", "substrate thermo-elastic, bare",
              "Cerdonio et al., Phys. Rev. D 63, 082003 (2001)", substrate_thermal_.missing),
        named(
            "classic_thermo_optic", "classic closed form of coating thermo-optic",
            "Evans et al., Phys. Rev. D 78, 102003 (2008), layer strain without substrate bending",
            refraction_missing_),
        named("transmitted_thermo_refractive", "light crossing the substrate once",
              "optical path: Braginsky & Vyatchanin, Phys. Lett. A 324, 345 (2004)", path_missing_),
        named("transmitted_standing_wave", "its standing-wave part",
              "Benthem & Levin, Phys. Rev. D 80, 062004 (2009)", path_missing_),
        named("free_mass_quantum_limit",
              mass_.value ? fmt::format("quantum limit of a free mass of {:.3g} kg", *mass_.value)
                          : "quantum limit of the free mass",
              "a reference curve, not a noise of the mirror: Kimble et al., Phys. Rev. D 65, "
              "022002 (2001)",
              mass_.missing),
    };
}

void NoiseModel::fill(Noise& noise, const std::vector<double>& list,
                      std::vector<double> NoiseTerm::*target, std::vector<double> Noise::*total) {
    const double t = design_.temperature, w = design_.beam_radius;
    const std::string& substrate = design_.mirror.substrate;
    for (const double f : list) {
        std::map<std::string, double> values;
        if (brownian_missing_.empty()) {
            const std::vector<noise::Loss> losses = layer_losses(f);
            values["coating_brownian_bulk"] = coating_psd(energies_, losses, f, true, false);
            values["coating_brownian_shear"] = coating_psd(energies_, losses, f, false, true);
            values["coating_brownian"] =
                values["coating_brownian_bulk"] + values["coating_brownian_shear"];
            values["coating_brownian_at_face"] = coating_psd(face_energies_, losses, f, true, true);
        }
        if (expansion_missing_.empty()) {
            const noise::ThermalNoise heat =
                noise::thermal_noise(*substrate_thermal_.value, thermal_layers_, w, t, f);
            values["coating_thermo_elastic"] = heat.coating_thermo_elastic;
            values["coating_thermo_refractive"] = heat.coating_thermo_refractive;
            values["coating_coherent"] = heat.coating_coherent;
            values["thermal_coherent"] = heat.everything_coherent;
            values["thermo_elastic_with_substrate"] = heat.thermo_elastic_with_substrate;
            values["classic_thermo_optic"] =
                noise::classic_thermo_optic(*substrate_thermal_.value, thermal_layers_, w, t, f,
                                            noise::LayerStrain::own_thickness)
                    .psd;
        }
        if (substrate_thermal_.value) {
            values["substrate_thermo_elastic"] =
                noise::substrate_thermo_elastic_psd(*substrate_thermal_.value, w, t, f);
            values["bare_substrate_thermo_elastic"] = values["substrate_thermo_elastic"];
        }
        if (path_) {
            values["transmitted_thermo_refractive"] =
                noise::thermo_refractive_psd(*substrate_thermal_.value, *path_, w, t, f);
            values["transmitted_standing_wave"] = noise::standing_wave_thermo_refractive_psd(
                *substrate_thermal_.value, *path_, w, t, f);
        }
        if (mass_.value) {
            values["free_mass_quantum_limit"] = noise::free_mass_quantum_limit_psd(*mass_.value, f);
        }
        if (substrate_brownian_missing_.empty()) {
            values["substrate_brownian"] = noise::brownian_psd(
                *substrate_energy_.value, *inputs_.loss(substrate, f).value, t, f);
        }
        double sum = 0.0;
        for (std::vector<NoiseTerm>* group : {&noise.terms, &noise.comparisons}) {
            for (NoiseTerm& term : *group) {
                if (!term.missing.empty()) continue;
                const double value = values.at(term.key);
                (term.*target).push_back(value);
                if (term.in_total) sum += value;
            }
        }
        (noise.*total).push_back(sum);
    }
}

std::vector<LayerNoise> NoiseModel::layer_noise(double frequency) {
    std::vector<LayerNoise> list;
    if (!brownian_missing_.empty()) return list;
    const std::vector<noise::Loss> losses = layer_losses(frequency);
    for (std::size_t j = 0; j < energies_.size(); ++j) {
        list.push_back(
            {energies_[j].bulk, energies_[j].shear,
             noise::brownian_psd(energies_[j], losses[j], design_.temperature, frequency)});
    }
    return list;
}

/// Stretches of the band over which one term of the total is the largest.
std::vector<Dominance> dominance(const Noise& noise) {
    std::vector<Dominance> list;
    for (std::size_t i = 0; i < noise.frequencies.size(); ++i) {
        const NoiseTerm* largest = nullptr;
        for (const NoiseTerm& term : noise.terms) {
            if (term.psd.empty()) continue;
            if (largest == nullptr || term.psd[i] > largest->psd[i]) largest = &term;
        }
        if (largest == nullptr) return {};
        if (list.empty() || list.back().title != largest->title) {
            list.push_back({noise.frequencies[i], noise.frequencies[i], largest->title});
        }
        list.back().to = noise.frequencies[i];
    }
    return list;
}

}  // namespace

Noise assemble_noise(const stack::Design& design, const materials::Library& library,
                     const stack::Mirror& mirror, stack::Ledger& ledger,
                     std::vector<std::string>& warnings) {
    Noise noise;
    NoiseModel model(design, library, mirror, ledger);
    noise.computed = true;
    noise.frequencies = stack::frequencies(design.band);
    noise.spot = design.band.spot;
    noise.terms = model.terms();
    noise.comparisons = model.comparisons();
    noise.complete = std::all_of(noise.terms.begin(), noise.terms.end(),
                                 [](const NoiseTerm& term) { return term.missing.empty(); });
    model.fill(noise, noise.frequencies, &NoiseTerm::psd, &Noise::total);
    model.fill(noise, noise.spot, &NoiseTerm::spot_psd, &Noise::spot_total);
    noise.layer_frequency =
        noise.spot.empty() ? std::sqrt(design.band.from * design.band.to) : noise.spot[0];
    for (const double f : noise.spot) {
        if (std::abs(std::log(f / 100.0)) < std::abs(std::log(noise.layer_frequency / 100.0))) {
            noise.layer_frequency = f;
        }
    }
    noise.layers = model.layer_noise(noise.layer_frequency);
    noise.dominance = dominance(noise);
    if (design.coating.excess_loss_stated) {
        ledger.note(fmt::format("the films' loss angles are multiplied by excess_loss = {:g}",
                                design.coating.excess_loss));
    }
    warn_of_validity(design, mirror, model.substrate_elastic(), model.elastic_layers(), warnings);
    return noise;
}

}  // namespace stillcoat::assess
