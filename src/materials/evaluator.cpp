#include "materials/evaluator.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "materials/dispersion.hpp"
#include "materials/interpolation.hpp"
#include "materials/mixture_value.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/materials/debye.hpp"

namespace stillcoat::materials {
namespace {

std::string range_words(const Interval& range) {
    return fmt::format("{:g}–{:g} K", range.lower, range.upper);
}

double nearest(const Interval& range, double x) { return std::clamp(x, range.lower, range.upper); }

/// Where a rule starts from: a scalar from where it was measured, a table from its nearest end.
double reference_temperature(const Entry& datum, double temperature) {
    const double end = nearest(*datum.temperature, temperature);
    return std::holds_alternative<TemperatureTable>(datum.curve)
               ? end
               : datum.at_temperature.value_or(end);
}

bool is_optical(PropertyId id) {
    return id == PropertyId::refractive_index || id == PropertyId::extinction_coefficient ||
           id == PropertyId::absorption_coefficient || id == PropertyId::thermo_optic_coefficient;
}

/// The value itself, or what is wrong with its number.
Value checked(Value value, const std::string& material, PropertyId id,
              const Conditions& conditions) {
    if (!value.number || is_admissible(id, *value.number)) return value;
    std::string also;
    if (is_loss(id)) also = fmt::format(" and {:g} Hz", conditions.frequency);
    if (is_optical(id)) also = fmt::format(" and {:g} nm", conditions.wavelength * 1e9);
    return missing_value(fmt::format("{} of {} at {:g} K{} comes out as {:.3g}; it must be {}",
                                     info(id).title, material, conditions.temperature, also,
                                     *value.number, info(id).limits.words));
}

}  // namespace

Value missing_value(std::string reason) {
    Value value;
    value.missing = std::move(reason);
    return value;
}

bool is_admissible(PropertyId id, double number) {
    const core::Limits& limits = info(id).limits;
    return std::isfinite(number) &&
           (number > limits.lower || (limits.lower_itself && number == limits.lower)) &&
           (number < limits.upper || (limits.upper_itself && number == limits.upper));
}

bool is_per_length(const Library& library, const std::string& material) {
    return library.property(material, PropertyId::extinction_coefficient) == nullptr &&
           library.property(material, PropertyId::absorption_coefficient) != nullptr;
}

Width scaled(const Width& width, double factor) {
    Width other = width;
    if (width.form == Width::Form::absolute) other.value *= std::abs(factor);
    other.lower *= factor;
    other.upper *= factor;
    return other;
}

std::string holds_words(const Entry& entry) {
    std::string words = "its data hold for " + range_words(*entry.temperature);
    if (entry.continued_to) {
        words += fmt::format(", continued to {:g} K", *entry.continued_to);
    }
    if (entry.cold) {
        words += fmt::format(", its cold table from {:g} K", entry.cold->table.temperature.front());
    }
    if (entry.beyond && entry.beyond->temperature) {
        words += ", its rule for " + range_words(*entry.beyond->temperature);
    }
    return words;
}

bool is_continued(const Entry& entry, double temperature) {
    return entry.continued_to && entry.temperature && temperature > entry.temperature->upper &&
           Interval{entry.temperature->upper, *entry.continued_to}.contains(temperature);
}

const Property* Walk::enter(const std::string& material, PropertyId id, std::string& reason) {
    const std::string& title = info(id).title;
    const Material* substance = library_.find(material);
    if (substance == nullptr) {
        reason = fmt::format("{} refers to the unknown material \"{}\"", title, material);
        return nullptr;
    }
    const Property* property = library_.property(material, id);
    if (property == nullptr) {
        const auto why = substance->unknown.find(id);
        reason = fmt::format("{} of {} unknown{}", title, material,
                             why == substance->unknown.end() ? "" : ": " + why->second);
        return nullptr;
    }
    const auto end = path_.begin() + depth_;
    if (std::find(path_.begin(), end, property) != end) {
        reason = fmt::format("{} of {} refers to other materials in a circle", title, material);
        return nullptr;
    }
    if (depth_ == deepest_reference || ++lookups_ > most_lookups) {
        reason = fmt::format("{} of {} is reached through too many other materials (at most {})",
                             title, material, deepest_reference);
        return nullptr;
    }
    path_[static_cast<std::size_t>(depth_++)] = property;
    return property;
}

Value Evaluator::property(const std::string& material, PropertyId id) const {
    std::string reason;
    const Property* found = walk_.enter(material, id, reason);
    if (found == nullptr) return missing_value(std::move(reason));
    Value value = entry({found->entry, material, id});
    walk_.leave();
    return checked(std::move(value), material, id, conditions_);
}

Value Evaluator::extinction(const std::string& material) const {
    if (!is_per_length(walk_.library(), material))
        return property(material, PropertyId::extinction_coefficient);
    Value value = property(material, PropertyId::absorption_coefficient);
    const double lengths = conditions_.wavelength / (4.0 * core::pi);
    if (value.number) *value.number *= lengths;
    value.width = scaled(value.width, lengths);
    return value;
}

Value Evaluator::entry(const Subject& subject) const {
    const Entry& datum = subject.datum;
    const double t = conditions_.temperature;
    const bool warm = !datum.temperature || datum.temperature->contains(t);
    const bool in_light = !datum.wavelength || datum.wavelength->contains(conditions_.wavelength);
    if (datum.cold && in_light && t < datum.cold->join.upper) return cold(subject);
    if (warm && in_light) return plain(subject, t);
    if (in_light && is_continued(datum, t)) {
        Value value = plain(subject, t);
        value.analogy =
            fmt::format("{} of {} at {:g} K: its table is continued from {:g} K",
                        info(subject.id).title, subject.material, t, datum.temperature->upper);
        return value;
    }
    if (datum.beyond) {
        const Beyond& rule = *datum.beyond;
        const bool reaches = warm || (rule.temperature && rule.temperature->contains(t));
        const bool lit =
            in_light || (rule.wavelength && rule.wavelength->contains(conditions_.wavelength));
        if (reaches && lit) return beyond(subject);
    }
    if (!warm && !is_continued(datum, t)) {
        return missing_value(fmt::format("{} of {} at {:g} K unknown ({})", info(subject.id).title,
                                         subject.material, t, holds_words(datum)));
    }
    return missing_value(fmt::format("{} of {} at {:g} nm unknown (its data hold for {:g}–{:g} nm)",
                                     info(subject.id).title, subject.material,
                                     conditions_.wavelength * 1e9, datum.wavelength->lower * 1e9,
                                     datum.wavelength->upper * 1e9));
}

/// The datum itself, whatever its range.
Value Evaluator::plain(const Subject& subject, double temperature) const {
    const Entry& datum = subject.datum;
    if (const auto* other = std::get_if<SameAs>(&datum.curve))
        return same(subject, *other, temperature);
    if (const auto* mixture = std::get_if<Mixed>(&datum.curve))
        return mixed_value(at(temperature), *mixture,
                           {subject.material, subject.id, &datum, Part::datum});
    Value value;
    value.entry = &datum;
    value.bases.push_back({subject.material, subject.id, &datum, Part::datum});
    value.width = width_at(datum.width, datum.width_spans, temperature);
    value.frequency_extrapolated =
        is_loss(subject.id) && datum.frequency && !datum.frequency->contains(conditions_.frequency);
    if (const auto* scalar = std::get_if<Scalar>(&datum.curve)) {
        value.number = scalar->value;
    } else if (const auto* table = std::get_if<TemperatureTable>(&datum.curve)) {
        value.number = interpolate(*table, temperature);
    } else if (const auto* law = std::get_if<PowerLaw>(&datum.curve)) {
        value.number = law->at_1_hz * std::pow(conditions_.frequency, law->exponent);
    } else {
        value.number = optical_value(datum, conditions_.wavelength);
    }
    return value;
}

Value Evaluator::same(const Subject& subject, const SameAs& other, double temperature) const {
    const Entry& datum = subject.datum;
    Value value = at(temperature).property(other.material, subject.id);
    if (!value.number) return value;
    *value.number *= other.factor;
    const Width own = width_at(datum.width, datum.width_spans, temperature);
    value.width = own.form != Width::Form::not_stated ? own : scaled(value.width, other.factor);
    const bool outside =
        is_loss(subject.id) && datum.frequency && !datum.frequency->contains(conditions_.frequency);
    value.frequency_extrapolated = value.frequency_extrapolated || outside;
    std::vector<Basis> bases{{subject.material, subject.id, &datum, Part::datum}};
    add_bases(bases, value.bases);
    value.bases = std::move(bases);
    if (value.analogy.empty() && !other.own) {
        value.analogy = fmt::format("{} of {} at {:g} K: as {}", info(subject.id).title,
                                    subject.material, temperature, other.material);
    }
    return value;
}

Evaluator Evaluator::at(double temperature) const {
    Conditions other = conditions_;
    other.temperature = temperature;
    return {walk_, other};
}

Value Evaluator::cold(const Subject& subject) const {
    const ColdTable& table = *subject.datum.cold;
    const double t = conditions_.temperature;
    const bool inside = Interval{table.table.temperature.front(), table.join.upper}.contains(t);
    if (!inside) {
        return missing_value(fmt::format("{} of {} at {:g} K unknown (its table begins at {:g} K)",
                                         info(subject.id).title, subject.material, t,
                                         table.table.temperature.front()));
    }
    Value value;
    if (t <= table.join.lower) {
        value.entry = &subject.datum;
        value.number = interpolate(table.table, t);
    } else {
        value = plain(subject, table.join.upper);
        if (!value.number) return value;
        const double low = interpolate(table.table, table.join.lower);
        value.number = interpolate({{table.join.lower, table.join.upper}, {low, *value.number}}, t);
    }
    const bool outside = table.frequency && !table.frequency->contains(conditions_.frequency);
    value.frequency_extrapolated = value.frequency_extrapolated || outside;
    value.bases.push_back({subject.material, subject.id, &subject.datum, Part::cold_table});
    value.width = width_at(table.width, table.width_spans, t);
    value.from_cold_table = true;
    if (table.nature == "by analogy") {
        value.analogy =
            fmt::format("{} of {} at {:g} K: {}", info(subject.id).title, subject.material, t,
                        table.note.empty() ? "by analogy" : table.note);
    }
    return value;
}

/// The factor of the rule from the reference temperature to the temperature asked for, in words in
/// `how`; the data behind it, or the reason why there is none, go into `value`.
double Evaluator::rule_factor(const Subject& subject, double reference, Value& value,
                              std::string& how) const {
    const Beyond& rule = *subject.datum.beyond;
    const double t = conditions_.temperature;
    if (rule.rule == Beyond::Rule::debye) {
        how = fmt::format("scaled as a Debye solid of {:g} K", rule.debye_temperature);
        return debye_shape(t, rule.debye_temperature) /
               debye_shape(reference, rule.debye_temperature);
    }
    const bool own = rule.rule == Beyond::Rule::heat_capacity;
    const PropertyId other_id = own ? PropertyId::specific_heat : subject.id;
    const std::string& other = own ? subject.material : rule.material;
    const Value here = property(other, other_id);
    const Value there = here.number ? at(reference).property(other, other_id) : Value{};
    if (!here.number || !there.number) {
        value = here.number ? there : here;
        return 1.0;
    }
    add_bases(value.bases, here.bases);
    add_bases(value.bases, there.bases);
    value.frequency_extrapolated =
        value.frequency_extrapolated || here.frequency_extrapolated || there.frequency_extrapolated;
    how = own ? "scaled with its heat capacity" : "scaled like that of " + other;
    return *here.number / *there.number;
}

Value Evaluator::beyond(const Subject& subject) const {
    const Entry& datum = subject.datum;
    const Beyond& rule = *datum.beyond;
    const double t = conditions_.temperature;
    const bool warm = !datum.temperature || datum.temperature->contains(t);
    const bool lit = !datum.wavelength || datum.wavelength->contains(conditions_.wavelength);
    const double reference = warm ? t : reference_temperature(datum, t);
    Conditions known = conditions_;
    if (!lit) known.wavelength = nearest(*datum.wavelength, conditions_.wavelength);
    Value value = Evaluator(walk_, known).plain(subject, reference);
    if (!value.number) return value;
    if (!lit) value.derivatives.reset();
    std::string how = "held constant";
    if (!warm && rule.rule != Beyond::Rule::constant) {
        const double factor = rule_factor(subject, reference, value, how);
        if (!value.number) return value;
        *value.number *= factor;
    }
    add_basis(value.bases, {subject.material, subject.id, &datum, Part::rule});
    value.width = width_at(rule.width, rule.width_spans, t);
    value.analogy = warm ? fmt::format("{} of {} at {:g} nm: {}", info(subject.id).title,
                                       subject.material, conditions_.wavelength * 1e9, how)
                         : fmt::format("{} of {} at {:g} K: {} from {:g} K", info(subject.id).title,
                                       subject.material, t, how, reference);
    if (!warm && !lit) {
        const char* also = how == "held constant" ? " and" : ", and held constant";
        value.analogy += fmt::format("{} from {:g} nm", also, known.wavelength * 1e9);
    }
    return value;
}

}  // namespace stillcoat::materials
