#pragma once
/// The sources that a result rests on.

#include <string>
#include <vector>

#include "present/wording.hpp"
#include "stillcoat/assess/appraisal.hpp"

namespace stillcoat::present {

/// One source and what it was used for.
struct SourceUse {
    std::string key;  ///< of references.toml; empty for a source stated in the design file
    std::string citation;
    std::vector<std::string> used_for;  ///< "loss angle of silica-ibs (from memory)"
};

std::vector<SourceUse> data_sources(const materials::Library& library,
                                    const assess::Appraisal& appraisal);

/// Formulas used, with what they leave out, each once.
std::vector<std::string> formula_sources(const assess::Appraisal& appraisal);

void sources_section(Page& page, const materials::Library& library,
                     const assess::Appraisal& appraisal);

}  // namespace stillcoat::present
