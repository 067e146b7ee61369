#pragma once
/// The appraisal as CSV tables.

#include <string>

#include "stillcoat/assess/appraisal.hpp"

namespace stillcoat::present {

enum class CsvTable { noise, layers, field };

/// One table with a header line whose names end with their units.
std::string appraisal_csv(const assess::Appraisal& appraisal, CsvTable table);

}  // namespace stillcoat::present
