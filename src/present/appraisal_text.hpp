#pragma once
/// The appraisal as a page for people.

#include <string>

#include "stillcoat/assess/appraisal.hpp"

namespace stillcoat::present {

struct PageOptions {
    bool colour = false;
    bool all_layers = false;
};

std::string appraisal_text(const stack::Design& design, const materials::Library& library,
                           const assess::Appraisal& appraisal, const PageOptions& options);

}  // namespace stillcoat::present
