#pragma once
/// Values of properties under stated conditions, or the reason why there is none.
///
/// Nothing is extrapolated silently: outside an entry's range only its explicit rule is used, and
/// the result says so. A number that comes out infinite or outside the limits of its property is
/// missing, with the reason.

#include <string>
#include <vector>

#include "stillcoat/materials/debye.hpp"
#include "stillcoat/materials/index.hpp"
#include "stillcoat/materials/library.hpp"
#include "stillcoat/materials/value.hpp"

namespace stillcoat::materials {

/// Any property [SI unit of its kind]; the refractive index without its derivatives, see index_at.
/// extinction_coefficient is derived from absorption_coefficient, k = aλ/4π, when only that is
/// given.
/// @throws std::logic_error for an unknown material
Value evaluate(const Library& library, const std::string& material, PropertyId property,
               const Conditions& conditions);

/// Names of the alternatives of a property whose data hold under these conditions.
std::vector<std::string> alternatives_that_hold(const Library& library, const std::string& material,
                                                PropertyId property, const Conditions& conditions);

/// Linear expansion from one temperature to another, ∫α dT [1], with the data of the whole way; the
/// reason when α is unknown on the way.
/// @param from, to [K]
Value expansion_between(const Library& library, const std::string& material, double from,
                        double to);

}  // namespace stillcoat::materials
