#pragma once
/// The whole part and the losses of the coated face for people.

#include <string>

#include "present/wording.hpp"
#include "stillcoat/assess/appraisal.hpp"

namespace stillcoat::present {

/// Scatter, T + A + S, and at normal incidence the finesse of two such mirrors, as rows of the
/// section that stands above them.
void loss_rows(Page& page, const stack::Design& design, const assess::Face& face);

/// "The whole part", once per polarisation and as their mean; nothing without a rear face.
void part_section(Page& page, const stack::Design& design, const assess::Appraisal& appraisal);

}  // namespace stillcoat::present
