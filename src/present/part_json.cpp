#include "present/part_json.hpp"

#include <algorithm>
#include <cmath>
#include <optional>
#include <stdexcept>
#include <string>

#include "present/json_values.hpp"

namespace stillcoat::present {
namespace {

using Json = nlohmann::ordered_json;

Json text_or_null(const std::string& text) { return text.empty() ? Json(nullptr) : Json(text); }

Json pair_json(const std::optional<assess::MirrorPair>& pair) {
    if (!pair) return nullptr;
    return {{"round_trip_loss", json_number(pair->round_trip_loss)},
            {"finesse", json_number_or_null(pair->finesse)}};
}

Json rear_layers(const stack::MirrorRear& rear) {
    Json list = Json::array();
    int count = 0;
    for (const stack::MirrorLayer& layer : rear.layers) {
        const stack::OpticalConstants& optical = layer.optical;
        list.push_back(
            {{"number", ++count},
             {"material", layer.material},
             {"reference_thickness_m", json_number(layer.reference_thickness)},
             {"thickness_m", json_number(layer.thickness)},
             {"quarter_waves", json_number(layer.quarter_waves)},
             {"refractive_index", json_number(optical.index.value)},
             {"extinction_coefficient",
              optical.extinction_known ? json_number(optical.extinction.value) : Json(nullptr)}});
    }
    return list;
}

Json polarisation_of_part(const assess::PartView& view, bool lower_limit) {
    const char* keys[] = {
        "reflectance", "transmittance",     "log_transmittance", "absorptance",
        "loss",        "front_absorptance", "rear_absorptance",  "substrate_absorptance"};
    Json document{{"polarisation", view.polarisation == optics::Polarisation::s ? "s" : "p"},
                  {"not_computed_because", text_or_null(view.missing)},
                  {"absorptance_not_known_because", text_or_null(view.absorptance_missing)}};
    for (const char* key : keys) document[key] = nullptr;
    document["absorptance_is_lower_limit"] = nullptr;
    if (!view.response) return document;
    const optics::PartResponse& r = *view.response;
    document["reflectance"] = json_number(r.reflectance);
    document["transmittance"] = json_number(r.transmittance);
    if (std::isfinite(r.log_transmittance)) document["log_transmittance"] = r.log_transmittance;
    if (!view.absorptance_missing.empty()) return document;
    document["absorptance"] = json_number(r.absorptance);
    document["loss"] = json_number(r.loss);
    document["front_absorptance"] = json_number(r.front_absorptance);
    document["rear_absorptance"] = json_number(r.rear_absorptance);
    document["substrate_absorptance"] = json_number(r.substrate_absorptance);
    document["absorptance_is_lower_limit"] = lower_limit;
    return document;
}

}  // namespace

Json losses_json(const assess::FaceLosses& losses) {
    const bool low = losses.absorptance_is_lower_limit || losses.scatter_is_lower_limit;
    return {{"scatter", json_number_or_null(losses.scatter)},
            {"scatter_is_lower_limit",
             losses.scatter ? Json(losses.scatter_is_lower_limit) : Json(nullptr)},
            {"scatter_not_given_because", text_or_null(losses.scatter_missing)},
            {"total", json_number_or_null(losses.total)},
            {"total_is_lower_limit", losses.total ? Json(low) : Json(nullptr)},
            {"pair", pair_json(losses.pair)},
            {"pair_without_scatter", pair_json(losses.pair_without_scatter)}};
}

void add_surface_keys(Json& mirror, const stack::Design& design) {
    std::optional<double> rms, from, to;
    if (design.mirror.roughness) {
        rms = design.mirror.roughness->rms;
        from = design.mirror.roughness->from;
        to = design.mirror.roughness->to;
    }
    mirror["roughness_rms_m"] = json_number_or_null(rms);
    mirror["roughness_from_per_m"] = json_number_or_null(from);
    mirror["roughness_to_per_m"] = json_number_or_null(to);
    mirror["scatter_source"] =
        text_or_null(design.mirror.scatter ? design.mirror.scatter->source : std::string());
}

Json part_json(const stack::Design& design, const assess::Appraisal& appraisal) {
    if (!design.rear_face || !appraisal.mirror.rear) return nullptr;
    const stack::MirrorRear& rear = *appraisal.mirror.rear;
    const auto unknown = [](const stack::MirrorLayer& layer) {
        return !layer.optical.extinction_known;
    };
    const auto& front = appraisal.mirror.layers;
    const bool lower_limit = std::any_of(front.begin(), front.end(), unknown) ||
                             std::any_of(rear.layers.begin(), rear.layers.end(), unknown);
    Json faces = Json::array();
    for (const assess::PartView& view : appraisal.part) {
        faces.push_back(polarisation_of_part(view, lower_limit));
    }
    return {{"light_from", design.light.from_rear ? "rear" : "front"},
            {"passes",
             design.rear_face->passes == stack::Passes::amplitudes ? "amplitudes" : "intensities"},
            {"rear_medium", design.rear_face->medium},
            {"rear_medium_index", json_number(rear.medium_index.value)},
            {"plate_thickness_m", json_number(rear.plate_thickness)},
            {"rear_layers", rear_layers(rear)},
            {"polarisations", std::move(faces)}};
}

}  // namespace stillcoat::present
