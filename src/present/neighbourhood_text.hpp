#pragma once
/// How far the mirror stays what it is, for people.

#include "present/wording.hpp"
#include "stillcoat/assess/appraisal.hpp"
#include "stillcoat/stack/design.hpp"

namespace stillcoat::present {

/// Nothing when it was not asked for.
void neighbourhood_section(Page& page, const stack::Design& design,
                           const assess::Appraisal& appraisal);

}  // namespace stillcoat::present
