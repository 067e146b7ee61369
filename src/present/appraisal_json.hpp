#pragma once
/// The appraisal as a JSON document and as CSV tables.

#include <string>

#include "stillcoat/assess/appraisal.hpp"

namespace stillcoat::present {

/// The whole document, indented; described by schemas/appraisal.schema.json.
std::string appraisal_json(const stack::Design& design, const materials::Library& library,
                           const assess::Appraisal& appraisal);

enum class CsvTable { noise, layers, field };

/// One table with a header line whose names end with their units.
std::string appraisal_csv(const assess::Appraisal& appraisal, CsvTable table);

}  // namespace stillcoat::present
