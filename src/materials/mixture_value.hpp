#pragma once
/// Values of a mixture from those of its constituents under the same conditions.
///
/// The width of a value is that of the constituents' own data and of the volume fraction, taken as
/// independent and to first order; how well the rule itself holds is not in it.

#include <vector>

#include "materials/evaluator.hpp"
#include "stillcoat/materials/index.hpp"

namespace stillcoat::materials {

/// The rule by which a property of a mixture follows from its constituents.
struct MixtureRule {
    PropertyId property;
    const char* words;               ///< for the provenance
    const char* reference;           ///< key of mixture_references(); empty for an exact rule
    std::vector<PropertyId> needed;  ///< of each constituent
};
const std::vector<MixtureRule>& mixture_rules();
/// The works that the rules come from, by key.
const std::map<std::string, Reference>& mixture_references();

/// What a property of a mixture needs of each constituent; empty when there is no rule for it.
std::vector<PropertyId> needed_for_mixture(PropertyId property);

/// A property other than the refractive index. @param own the entry of the mixture itself
Value mixed_value(const Evaluator& evaluator, const Mixed& mixture, const Basis& own);
IndexValue mixed_index(const Evaluator& evaluator, const Mixed& mixture, const Basis& own);

/// The index of a material under the conditions of the evaluator, as a further step of its walk.
IndexValue index_on_walk(const Evaluator& evaluator, const std::string& material);

}  // namespace stillcoat::materials
