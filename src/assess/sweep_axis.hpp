#pragma once
/// How a value of a sweep is put into a design.

#include "stillcoat/assess/sweep.hpp"

namespace stillcoat::assess {

/// Puts a value of the axis into `design`, or into `own`, a copy of
/// `library` made when it is absent, when it is a material's.
void put_value(const SweepAxis& axis, double value, const materials::Library& library,
               stack::Design& design, std::optional<materials::Library>& own);

}  // namespace stillcoat::assess
