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

/// Share of the coating's Brownian power of each layer; empty when it was not computed.
std::vector<double> brownian_shares(const assess::Noise& noise);

}  // namespace stillcoat::present
