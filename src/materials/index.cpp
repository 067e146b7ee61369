#include "stillcoat/materials/index.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "materials/dispersion.hpp"
#include "materials/evaluator.hpp"
#include "materials/interpolation.hpp"
#include "materials/mixture_value.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/materials/evaluation.hpp"

namespace stillcoat::materials {
namespace {

using numerics::Jet;

IndexValue missing_index(std::string reason) {
    IndexValue value;
    value.missing = std::move(reason);
    return value;
}

/// The index of one material under one set of conditions, along a walk through references.
class IndexLookup {
  public:
    IndexLookup(Walk& walk, const Library& library, double wavelength, double temperature)
        : walk_(walk), library_(library), wavelength_(wavelength), temperature_(temperature) {}

    IndexValue of(const std::string& material) const {
        std::string reason;
        const Property* found = walk_.enter(material, PropertyId::refractive_index, reason);
        if (found == nullptr) return missing_index(std::move(reason));
        IndexValue value = entry(found->entry, material);
        walk_.leave();
        if (!value.index) return value;
        const Jet<double>& n = *value.index;
        const bool usable = is_admissible(PropertyId::refractive_index, n.value) &&
                            std::isfinite(n.first) && std::isfinite(n.second);
        if (usable) return value;
        return missing_index(fmt::format(
            "refractive index of {} at {:g} K and {:g} nm comes out as {:.3g}; it must be {}",
            material, temperature_, wavelength_ * 1e9, n.value,
            info(PropertyId::refractive_index).limits.words));
    }

  private:
    IndexValue entry(const Entry& datum, const std::string& material) const {
        if (datum.wavelength && !datum.wavelength->contains(wavelength_)) {
            return missing_index(fmt::format(
                "refractive index of {} is known for {:g}–{:g} nm only, not at {:g} nm", material,
                datum.wavelength->lower * 1e9, datum.wavelength->upper * 1e9, wavelength_ * 1e9));
        }
        const bool in_range = !datum.temperature || datum.temperature->contains(temperature_);
        const bool carried = datum.at_temperature && !depends_on_temperature(datum);
        if (carried) {
            IndexValue value = at_own_temperature(datum, material, *datum.at_temperature);
            return temperature_ == *datum.at_temperature || !value.index
                       ? value
                       : carry(std::move(value), material, *datum.at_temperature, in_range);
        }
        if (in_range) return at_own_temperature(datum, material, temperature_);
        const bool by_rule = datum.beyond && datum.beyond->rule == Beyond::Rule::constant &&
                             datum.beyond->temperature &&
                             datum.beyond->temperature->contains(temperature_);
        if (!by_rule) {
            return missing_index(fmt::format("refractive index of {} at {:g} K unknown ({})",
                                             material, temperature_, holds_words(datum)));
        }
        const double end =
            std::clamp(temperature_, datum.temperature->lower, datum.temperature->upper);
        IndexValue value = at_own_temperature(datum, material, end);
        if (!value.index) return value;
        value.width = width_at(datum.beyond->width, datum.beyond->width_spans, temperature_);
        value.analogy = fmt::format("refractive index of {} at {:g} K: held constant from {:g} K",
                                    material, temperature_, end);
        add_basis(value.bases, {material, PropertyId::refractive_index, &datum, Part::rule});
        return value;
    }

    /// The formula or table itself at a temperature within its range.
    IndexValue at_own_temperature(const Entry& datum, const std::string& material,
                                  double temperature) const {
        IndexValue value;
        const Width own = width_at(datum.width, datum.width_spans, temperature);
        value.bases.push_back({material, PropertyId::refractive_index, &datum, Part::datum});
        if (const auto* other = std::get_if<SameAs>(&datum.curve)) {
            value = same(datum, *other, temperature, std::move(value.bases));
            if (own.form != Width::Form::not_stated) value.width = own;
        } else if (const auto* mixture = std::get_if<Mixed>(&datum.curve)) {
            const Evaluator evaluator(walk_, {temperature, wavelength_, 1.0});
            value = mixed_index(evaluator, *mixture, value.bases.front());
        } else {
            value.index = dispersion(datum, wavelength_, temperature);
            value.width = own;
        }
        value.entry = &datum;
        return value;
    }

    IndexValue same(const Entry& datum, const SameAs& other, double temperature,
                    std::vector<Basis> bases) const {
        IndexValue value =
            IndexLookup(walk_, library_, wavelength_, temperature).of(other.material);
        if (!value.index) return value;
        double factor = other.factor;
        if (datum.rescaled_to) {
            const IndexValue there =
                IndexLookup(walk_, library_, datum.rescaled_to->first, temperature)
                    .of(other.material);
            if (!there.index) return there;
            factor = datum.rescaled_to->second / there.index->value;
            add_bases(value.bases, there.bases);
        }
        *value.index = *value.index * Jet<double>(factor) + Jet<double>(datum.offset);
        value.width = scaled(value.width, factor);
        add_bases(bases, value.bases);
        value.bases = std::move(bases);
        return value;
    }

    /// Adds ∫(dn/dT)dT from the temperature `from` of the datum.
    IndexValue carry(IndexValue value, const std::string& material, double from,
                     bool in_range) const {
        const Value change = integral(from, temperature_, [&](double t) {
            return evaluate(library_, material, PropertyId::thermo_optic_coefficient,
                            {t, wavelength_, 1.0});
        });
        if (change.number) {
            value.index->value += *change.number;
            if (!change.analogy.empty()) value.analogy = change.analogy;
            add_bases(value.bases, change.bases);
        } else if (in_range) {
            value.note = fmt::format("index of {} is that at {:g} K, not carried to {:g} K: {}",
                                     material, from, temperature_, change.missing);
        } else {
            return missing_index(change.missing +
                                 ", so its index at the operating temperature is unknown");
        }
        return value;
    }

    Walk& walk_;
    const Library& library_;
    double wavelength_, temperature_;
};

}  // namespace

IndexValue index_on_walk(const Evaluator& evaluator, const std::string& material) {
    Walk& walk = evaluator.walk();
    const Conditions& conditions = evaluator.conditions();
    return IndexLookup(walk, walk.library(), conditions.wavelength, conditions.temperature)
        .of(material);
}

IndexValue index_at(const Library& library, const std::string& material, double wavelength,
                    double temperature) {
    Walk walk(library);
    return index_on_walk(Evaluator(walk, {temperature, wavelength, 1.0}), material);
}

Jet<double> with_dispersion(const Value& extinction, bool per_length, double wavelength) {
    const double k = *extinction.number;
    const double omega = 2.0 * core::pi * core::speed_of_light / wavelength;
    if (per_length) return {k, -k / omega, 2.0 * k / (omega * omega)};
    // A factor of same_as or of a rule scales the curve as a whole; a curve through 0 has no scale.
    if (extinction.derivatives) {
        const Jet<double>& curve = *extinction.derivatives;
        if (curve.value == 0.0) return {k};
        return {k, k / curve.value * curve.first, k / curve.value * curve.second};
    }
    const Entry* entry = extinction.entry;
    const bool table = entry != nullptr && std::holds_alternative<WavelengthTable>(entry->curve) &&
                       (!entry->wavelength || entry->wavelength->contains(wavelength));
    if (!table) return {k};
    const Jet<double> curve = dispersion(*entry, wavelength, 295.0);
    if (curve.value == 0.0) return {k};
    const double factor = k / curve.value;
    return {k, factor * curve.first, factor * curve.second};
}

}  // namespace stillcoat::materials
