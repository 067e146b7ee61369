#include "stillcoat/materials/evaluation.hpp"

#include <fmt/format.h>

#include "materials/evaluator.hpp"
#include "materials/interpolation.hpp"

namespace stillcoat::materials {
namespace {

Value index_as_value(IndexValue index) {
    Value value;
    if (index.index) value.number = index.index->value;
    value.missing = std::move(index.missing);
    value.entry = index.entry;
    value.bases = std::move(index.bases);
    value.analogy = std::move(index.analogy);
    value.width = index.width;
    return value;
}

}  // namespace

Value evaluate(const Library& library, const std::string& material, PropertyId property,
               const Conditions& conditions) {
    if (property == PropertyId::refractive_index) {
        return index_as_value(
            index_at(library, material, conditions.wavelength, conditions.temperature));
    }
    Walk walk(library);
    const Evaluator evaluator(walk, conditions);
    library.at(material);
    if (property == PropertyId::extinction_coefficient) return evaluator.extinction(material);
    return evaluator.property(material, property);
}

std::vector<std::string> alternatives_that_hold(const Library& library, const std::string& material,
                                                PropertyId property, const Conditions& conditions) {
    std::vector<std::string> names;
    const auto& properties = library.at(material).properties;
    const auto found = properties.find(property);
    if (found == properties.end()) return names;
    for (const Alternative& other : found->second.alternatives) {
        const Entry& entry = other.entry;
        const bool warm = !entry.temperature ||
                          entry.temperature->contains(conditions.temperature) ||
                          is_continued(entry, conditions.temperature);
        const bool lit = !entry.wavelength || entry.wavelength->contains(conditions.wavelength);
        if (warm && lit) names.push_back(other.name);
    }
    return names;
}

Value expansion_between(const Library& library, const std::string& material, double from,
                        double to) {
    if (from == to) {
        Value none;
        none.number = 0.0;
        return none;
    }
    return integral(from, to, [&](double t) {
        return evaluate(library, material, PropertyId::thermal_expansion, {t, 1e-6, 1.0});
    });
}

}  // namespace stillcoat::materials
