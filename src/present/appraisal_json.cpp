#include "present/appraisal_json.hpp"

#include <algorithm>
#include <cmath>
#include <nlohmann/json.hpp>
#include <numeric>
#include <stdexcept>

#include "present/json_values.hpp"
#include "present/part_json.hpp"
#include "present/sources.hpp"
#include "present/wording.hpp"

namespace stillcoat::present {
namespace {

using Json = nlohmann::ordered_json;
using assess::Appraisal;

Json numbers(const std::vector<double>& list) {
    Json array = Json::array();
    for (const double value : list) array.push_back(json_number(value));
    return array;
}

/// An empty list is one that could not be computed.
Json list_or_null(const std::vector<double>& list) {
    return list.empty() ? Json(nullptr) : numbers(list);
}

Json operating_point(const stack::Design& design, const Appraisal& appraisal) {
    const bool normal = design.light.angle == 0.0;
    const char* names[] = {"s", "p", "unpolarised"};
    return {{"wavelength_m", json_number(design.light.wavelength)},
            {"angle_rad", json_number(design.light.angle)},
            {"polarisation",
             normal ? Json(nullptr) : Json(names[static_cast<int>(design.light.polarisation)])},
            {"medium", design.light.medium},
            {"medium_index", json_number(appraisal.mirror.incident_index.value)},
            {"incident_power_W", json_number_or_null(design.light.power)},
            {"beam_radius_m", json_number(design.beam_radius)},
            {"temperature_K", json_number(design.temperature)}};
}

Json coating(const stack::Design& design, const Appraisal& appraisal) {
    Json layers = Json::array();
    int count = 0;
    for (const stack::MirrorLayer& layer : appraisal.mirror.layers) {
        layers.push_back(
            {{"number", ++count},
             {"material", layer.material},
             {"reference_thickness_m", json_number(layer.reference_thickness)},
             {"thickness_m", json_number(layer.thickness)},
             {"quarter_waves", json_number(layer.quarter_waves)},
             {"refractive_index", json_number(layer.optical.index.value)},
             {"extinction_coefficient", layer.optical.extinction_known
                                            ? json_number(layer.optical.extinction.value)
                                            : Json(nullptr)}});
    }
    return {{"layer_count", count},
            {"thickness_m", json_number(appraisal.mirror.coating_thickness)},
            {"design_wavelength_m", json_number(design.coating.design_wavelength)},
            {"reference_temperature_K", json_number(design.coating.reference_temperature)},
            {"optical_thickness_ratio", json_number(appraisal.mirror.optical_path_ratio)},
            {"excess_loss", json_number(design.coating.excess_loss)},
            {"layers", std::move(layers)}};
}

Json term(const assess::NoiseTerm& noise_term) {
    const bool computed = noise_term.missing.empty();
    return {{"key", noise_term.key},
            {"title", noise_term.title},
            {"in_total", noise_term.in_total},
            {"psd_m2_per_Hz", computed ? numbers(noise_term.psd) : Json(nullptr)},
            {"spot_psd_m2_per_Hz", computed ? numbers(noise_term.spot_psd) : Json(nullptr)},
            {"not_computed_because", computed ? Json(nullptr) : Json(noise_term.missing)},
            {"source", noise_term.source}};
}

Json noise(const assess::Noise& result) {
    Json terms = Json::array();
    for (const assess::NoiseTerm& item : result.terms) terms.push_back(term(item));
    Json comparisons = Json::array();
    for (const assess::NoiseTerm& item : result.comparisons) comparisons.push_back(term(item));
    Json layers = Json::array();
    for (std::size_t j = 0; j < result.layers.size(); ++j) {
        layers.push_back({{"number", j + 1},
                          {"bulk_energy_J_per_N2", json_number(result.layers[j].bulk_energy)},
                          {"shear_energy_J_per_N2", json_number(result.layers[j].shear_energy)},
                          {"psd_m2_per_Hz", json_number(result.layers[j].psd)}});
    }
    Json dominance = Json::array();
    for (const assess::Dominance& stretch : result.dominance) {
        dominance.push_back({{"from_Hz", json_number(stretch.from)},
                             {"to_Hz", json_number(stretch.to)},
                             {"title", stretch.title}});
    }
    return {{"complete", result.complete},
            {"frequencies_Hz", numbers(result.frequencies)},
            {"spot_frequencies_Hz", numbers(result.spot)},
            {"terms", std::move(terms)},
            {"total_psd_m2_per_Hz", list_or_null(result.total)},
            {"spot_total_psd_m2_per_Hz", list_or_null(result.spot_total)},
            {"comparisons", std::move(comparisons)},
            {"coating_brownian_layer_frequency_Hz", json_number(result.layer_frequency)},
            {"coating_brownian_layers", std::move(layers)},
            {"largest_term", std::move(dominance)}};
}

/// With null for what was not searched for or is no reflector.
Json reflection_band(const std::optional<assess::ReflectionBand>& band) {
    if (!band) return nullptr;
    const auto edge = [](const assess::BandEdge& found) {
        const char* states[] = {"found", "beyond the data", "beyond the search"};
        const bool known = found.state == optics::EdgeState::found;
        return Json{{"wavelength_m", known ? json_number(found.wavelength) : Json(nullptr)},
                    {"state", states[static_cast<int>(found.state)]},
                    {"searched_to_m", known ? Json(nullptr) : json_number(found.wavelength)},
                    {"data_end_of", found.material.empty() ? Json(nullptr) : Json(found.material)},
                    {"shift_m", json_number_or_null(found.shift)}};
    };
    return {{"short_edge", edge(band->short_edge)},
            {"long_edge", edge(band->long_edge)},
            {"centre_wavelength_m", json_number_or_null(band->centre)},
            {"relative_half_width", json_number_or_null(band->relative_half_width)},
            {"top_reflectance", json_number(band->top_reflectance)},
            {"operating_wavelength_inside", band->operating_wavelength_inside},
            {"centre_shift_m", json_number_or_null(band->centre_shift)}};
}

Json reflected(const std::optional<assess::Reflected>& light) {
    if (!light) return nullptr;
    const bool dark = !std::isfinite(light->log_transmittance);
    return {{"reflectance", json_number(light->reflectance)},
            {"loss", json_number(light->loss)},
            {"transmittance", json_number(light->transmittance)},
            {"log_transmittance", dark ? Json(nullptr) : json_number(light->log_transmittance)},
            {"absorptance", json_number(light->absorptance)}};
}

Json around(const Appraisal& appraisal) {
    if (!appraisal.around) return nullptr;
    Json departures = Json::array();
    for (const assess::Departure& departure : appraisal.around->departures) {
        const bool missing = !departure.missing.empty();
        departures.push_back(
            {{"wavelength_m", json_number(departure.wavelength)},
             {"angle_rad", json_number(departure.angle)},
             {"not_computed_because", missing ? Json(departure.missing) : Json(nullptr)},
             {"absorptance_is_lower_limit",
              missing ? Json(nullptr) : Json(!departure.absorption_known)},
             {"s", reflected(departure.s)},
             {"p", reflected(departure.p)},
             {"mean", reflected(departure.mean)}});
    }
    return {{"stop_band_s", reflection_band(appraisal.around->s_band)},
            {"stop_band_p", reflection_band(appraisal.around->p_band)},
            {"top_reflectance", json_number(appraisal.around->top_reflectance)},
            {"departures", std::move(departures)}};
}

Json face(const assess::Face& optics, const stack::Mirror& mirror) {
    const optics::Response& r = optics.response;
    Json layers = Json::array();
    for (std::size_t j = 0; j < optics.stored_energy.size(); ++j) {
        layers.push_back({{"number", j + 1},
                          {"absorptance", mirror.layers[j].optical.extinction_known
                                              ? json_number(r.layer_absorptance[j])
                                              : Json(nullptr)},
                          {"stored_energy_J_per_W", json_number(optics.stored_energy[j])},
                          {"peak_intensity_ratio", json_number(optics.peak_intensity[j])},
                          {"peak_depth_m", json_number(optics.peak_depth[j])}});
    }
    const bool lower_limit = std::any_of(
        mirror.layers.begin(), mirror.layers.end(),
        [](const stack::MirrorLayer& layer) { return !layer.optical.extinction_known; });
    const bool dark = !std::isfinite(r.log_transmittance);
    Json document{{"polarisation", optics.polarisation == optics::Polarisation::s ? "s" : "p"},
                  {"reflectance", json_number(r.reflectance)},
                  {"transmittance", json_number(r.transmittance)},
                  {"log_transmittance", dark ? Json(nullptr) : json_number(r.log_transmittance)},
                  {"absorptance", json_number(r.absorptance)},
                  {"absorptance_is_lower_limit", lower_limit},
                  {"loss", json_number(r.loss)},
                  {"reflection_amplitude_real", json_number(r.reflection.real())},
                  {"reflection_amplitude_imaginary", json_number(r.reflection.imag())}};
    std::optional<double> phase, delay, dispersion;
    if (optics.phase) {
        phase = optics.phase->reflection_phase;
        delay = optics.phase->group_delay;
        dispersion = optics.phase->group_delay_dispersion;
    }
    document["reflection_phase_rad"] = json_number_or_null(phase);
    document["group_delay_s"] = json_number_or_null(delay);
    document["group_delay_dispersion_s2"] = json_number_or_null(dispersion);
    document["stored_energy_J_per_W"] =
        json_number(std::accumulate(optics.stored_energy.begin(), optics.stored_energy.end(), 0.0));
    document["energy_penetration_depth_m"] = json_number(optics.energy_penetration_depth);
    document["face_intensity_ratio"] = json_number(optics.face_intensity);
    document["layers"] = std::move(layers);
    document["losses"] = losses_json(optics.losses);
    document["noise"] = noise(optics.noise);
    return document;
}

Json values_from_the_design(const stack::Design& design) {
    Json list = Json::array();
    for (const stack::Override& values : design.overrides) {
        for (const stack::ReplacedValue& value : values.values) {
            list.push_back({{"material", values.material},
                            {"property", value.key},
                            {"alternative",
                             value.alternative.empty() ? Json(nullptr) : Json(value.alternative)}});
        }
    }
    return list;
}

/// Null when the design states no power.
Json light_load(const Appraisal& appraisal) {
    if (!appraisal.light_load) return nullptr;
    const assess::LightLoad& load = *appraisal.light_load;
    return {{"incident_power_W", json_number(load.power)},
            {"absorbed_in_coating_W", json_number(load.absorbed)},
            {"centre_intensity_W_per_m2", json_number(load.centre_intensity)},
            {"largest_intensity_in_coating_W_per_m2", json_number(load.largest_intensity)}};
}

Json sources(const materials::Library& library, const Appraisal& appraisal) {
    Json data = Json::array();
    for (const SourceUse& source : data_sources(library, appraisal)) {
        data.push_back(
            {{"key", source.key}, {"citation", source.citation}, {"used_for", source.used_for}});
    }
    return {{"formulas", formula_sources(appraisal)}, {"data", std::move(data)}};
}

}  // namespace

std::string appraisal_json(const stack::Design& design, const materials::Library& library,
                           const Appraisal& appraisal) {
    Json faces = Json::array();
    for (const assess::Face& item : appraisal.faces) faces.push_back(face(item, appraisal.mirror));
    Json mirror{{"substrate", design.mirror.substrate},
                {"substrate_index", json_number(appraisal.mirror.substrate_optical.index.value)},
                {"diameter_m", json_number_or_null(design.mirror.diameter)},
                {"thickness_m", json_number_or_null(design.mirror.thickness)}};
    add_surface_keys(mirror, design);
    const Json document{
        {"document", "appraisal"},
        {"program", "stillcoat"},
        {"version", STILLCOAT_VERSION},
        {"title", design.title},
        {"design_file", design.document.name},
        {"operating_point", operating_point(design, appraisal)},
        {"mirror", std::move(mirror)},
        {"coating", coating(design, appraisal)},
        {"values_from_the_design", values_from_the_design(design)},
        {"reflectance", json_number(mean_over_faces(appraisal, &optics::Response::reflectance))},
        {"transmittance",
         json_number(mean_over_faces(appraisal, &optics::Response::transmittance))},
        {"absorptance", json_number(mean_over_faces(appraisal, &optics::Response::absorptance))},
        {"light_load", light_load(appraisal)},
        {"part", part_json(design, appraisal)},
        {"around", around(appraisal)},
        {"faces", std::move(faces)},
        {"warnings", appraisal.warnings},
        {"assumed_or_left_out", appraisal.notes},
        {"values_by_analogy", appraisal.analogies},
        {"uncertainty", {{"propagated", false}, {"inputs_without_uncertainty", appraisal.fixed}}},
        {"sources", sources(library, appraisal)},
    };
    // A file name need not be UTF-8, a JSON document must be.
    return document.dump(2, ' ', false, Json::error_handler_t::replace) + "\n";
}

}  // namespace stillcoat::present
