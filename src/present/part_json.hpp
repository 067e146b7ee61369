#pragma once
/// The whole part and the losses of the coated face in the JSON document. null: not stated, not
/// known, or the design has no rear face.

#include <nlohmann/json.hpp>

#include "stillcoat/assess/appraisal.hpp"

namespace stillcoat::present {

nlohmann::ordered_json losses_json(const assess::FaceLosses& losses);

/// Roughness and source of the scatter as keys of "mirror".
void add_surface_keys(nlohmann::ordered_json& mirror, const stack::Design& design);

nlohmann::ordered_json part_json(const stack::Design& design, const assess::Appraisal& appraisal);

}  // namespace stillcoat::present
