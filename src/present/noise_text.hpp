#pragma once
/// The noise of one face for people.

#include <string>
#include <vector>

#include "present/wording.hpp"
#include "stillcoat/assess/appraisal.hpp"

namespace stillcoat::present {

/// Share of the coating's Brownian power of each layer; empty when it was not computed.
std::vector<double> brownian_shares(const assess::Noise& noise);

/// The noise in one sentence, at the frequency of the layer table; empty when none was computed.
std::string movement_text(const assess::Noise& noise);

/// @param light what the heading says of the light: "" or ", s polarisation"
void noise_section(Page& page, const stack::Mirror& mirror, const assess::Noise& noise,
                   const std::string& light);

}  // namespace stillcoat::present
