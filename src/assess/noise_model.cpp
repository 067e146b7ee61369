#include "assess/noise_model.hpp"

#include <fmt/format.h>

#include "assess/optical_view.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/noise/classic_thermo_optic.hpp"
#include "stillcoat/noise/quantum_limit.hpp"

namespace stillcoat::assess {

using materials::PropertyId;

NoiseModel::NoiseModel(const stack::Design& design, const materials::Library& library,
                       const stack::Mirror& mirror, optics::Polarisation polarisation,
                       stack::Ledger& ledger)
    : design_(design),
      mirror_(mirror),
      polarisation_(polarisation),
      footprint_(noise::oblique_footprint(design.beam_radius, design.light.angle)),
      inputs_(design, library, ledger) {
    read_weights();
    prepare_brownian();
    prepare_thermal();
    prepare_substrate();
}

std::vector<double> NoiseModel::every_frequency() const {
    std::vector<double> list = stack::frequencies(design_.band);
    list.insert(list.end(), design_.band.spot.begin(), design_.band.spot.end());
    return list;
}

void NoiseModel::read_weights() {
    const optics::StandingWave wave = optics::standing_wave(
        optical_stack(mirror_), {design_.light.wavelength, design_.light.angle, polarisation_});
    std::vector<optics::Photoelasticity> photoelastic;
    for (const stack::MirrorLayer& layer : mirror_.layers) {
        photoelastic.push_back(
            {inputs_.photoelastic(layer.material, PropertyId::photoelastic_p11),
             inputs_.photoelastic(layer.material, PropertyId::photoelastic_p12)});
    }
    face_weights_ = optics::surface_readout(wave.stack);
    if (std::abs(wave.reflection) >= optics::smallest_reflection) {
        weights_ = optics::readout_weights(wave, photoelastic);
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
    energies_ = noise::thin_film_energies(*substrate_elastic_.value, elastic_layers_, footprint_);
    face_energies_ = noise::thin_film_energies(*substrate_elastic_.value, at_face, footprint_);
    // A law may leave the admissible losses somewhere in the band.
    for (const double frequency : every_frequency()) {
        if (layer_losses(frequency).empty()) return;
    }
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
        substrate_energy_.value = noise::half_space_energy(*substrate_elastic_.value, footprint_);
    }
    substrate_energy_.missing = substrate_elastic_.missing;
    substrate_brownian_missing_ = substrate_energy_.missing;
    for (const double frequency : every_frequency()) {
        if (!substrate_brownian_missing_.empty()) break;
        substrate_brownian_missing_ = inputs_.loss(name, frequency).missing;
    }
    if (design_.mirror.thickness) {
        mass_ = inputs_.property(name, PropertyId::density);
        const double radius = *design_.mirror.diameter / 2.0;
        if (mass_.value) *mass_.value *= core::pi * radius * radius * *design_.mirror.thickness;
    } else {
        mass_.missing = "diameter and thickness of the mirror not given";
    }
    const Wanted<double> slope = inputs_.property(name, PropertyId::thermo_optic_coefficient);
    if (design_.light.angle > 0.0) {
        path_missing_ = "computed for normal incidence only";
    } else if (!design_.mirror.thickness) {
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

void NoiseModel::add_coating_brownian(double frequency, std::map<std::string, double>& spectra) {
    if (!brownian_missing_.empty()) return;
    const std::vector<noise::Loss> losses = layer_losses(frequency);
    const double bulk = coating_psd(energies_, losses, frequency, true, false);
    const double shear = coating_psd(energies_, losses, frequency, false, true);
    spectra["coating_brownian_bulk"] = bulk;
    spectra["coating_brownian_shear"] = shear;
    spectra["coating_brownian"] = bulk + shear;
    spectra["coating_brownian_at_face"] =
        coating_psd(face_energies_, losses, frequency, true, true);
}

void NoiseModel::add_thermal(double frequency, std::map<std::string, double>& spectra) const {
    if (!substrate_thermal_.value) return;
    const noise::ThermalMaterial& substrate = *substrate_thermal_.value;
    const double t = design_.temperature;
    const noise::Footprint& w = footprint_;
    const double bare = noise::substrate_thermo_elastic_psd(substrate, w, t, frequency);
    spectra["substrate_thermo_elastic"] = bare;
    spectra["bare_substrate_thermo_elastic"] = bare;
    if (path_) {
        spectra["transmitted_thermo_refractive"] =
            noise::thermo_refractive_psd(substrate, *path_, w, t, frequency);
        spectra["transmitted_standing_wave"] =
            noise::standing_wave_thermo_refractive_psd(substrate, *path_, w, t, frequency);
    }
    if (!expansion_missing_.empty()) return;
    const noise::ThermalNoise heat =
        noise::thermal_noise(substrate, thermal_layers_, w, t, frequency);
    spectra["coating_thermo_elastic"] = heat.coating_thermo_elastic;
    spectra["coating_thermo_refractive"] = heat.coating_thermo_refractive;
    spectra["coating_coherent"] = heat.coating_coherent;
    spectra["thermal_coherent"] = heat.everything_coherent;
    spectra["thermo_elastic_with_substrate"] = heat.thermo_elastic_with_substrate;
    spectra["classic_thermo_optic"] =
        noise::classic_thermo_optic(substrate, thermal_layers_, w, t, frequency,
                                    noise::LayerStrain::own_thickness)
            .psd;
}

void NoiseModel::add_substrate(double frequency, std::map<std::string, double>& spectra) {
    if (mass_.value) {
        spectra["free_mass_quantum_limit"] =
            noise::free_mass_quantum_limit_psd(*mass_.value, frequency);
    }
    if (!substrate_brownian_missing_.empty()) return;
    const noise::Loss loss = *inputs_.loss(design_.mirror.substrate, frequency).value;
    spectra["substrate_brownian"] =
        noise::brownian_psd(*substrate_energy_.value, loss, design_.temperature, frequency);
}

std::map<std::string, double> NoiseModel::spectra_at(double frequency) {
    std::map<std::string, double> spectra;
    add_coating_brownian(frequency, spectra);
    add_thermal(frequency, spectra);
    add_substrate(frequency, spectra);
    return spectra;
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

}  // namespace stillcoat::assess
