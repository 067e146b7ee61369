#pragma once
/// The appraisal as a JSON document.

#include <string>

#include "stillcoat/assess/appraisal.hpp"

namespace stillcoat::present {

/// The whole document, indented; described by schemas/appraisal.schema.json.
std::string appraisal_json(const stack::Design& design, const materials::Library& library,
                           const assess::Appraisal& appraisal);

}  // namespace stillcoat::present
