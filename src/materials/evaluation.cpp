#include "stillcoat/materials/evaluation.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <boost/math/quadrature/gauss.hpp>
#include <cmath>
#include <stdexcept>

#include "materials/dispersion.hpp"
#include "stillcoat/core/constants.hpp"

namespace stillcoat::materials {
namespace {

/// References from material to material that are followed; more is taken for a circle.
constexpr int longest_chain = 4;

Value missing(std::string reason) {
    Value value;
    value.missing = std::move(reason);
    return value;
}

/// Between neighbours of one sign log y against log x, linear across a change of sign; the end
/// pieces are continued, which an entry's range must allow.
double interpolate(const TemperatureTable& table, double temperature) {
    const std::vector<double>& t = table.temperature;
    const auto after = std::upper_bound(t.begin() + 1, t.end() - 1, temperature);
    const std::size_t i = static_cast<std::size_t>(after - t.begin()) - 1;
    const double a = table.value[i];
    const double b = table.value[i + 1];
    if (a * b > 0.0) {
        const double share = std::log(temperature / t[i]) / std::log(t[i + 1] / t[i]);
        return a * std::pow(b / a, share);
    }
    return a + (b - a) * (temperature - t[i]) / (t[i + 1] - t[i]);
}

std::string range_words(const Interval& range) {
    return fmt::format("{:g}–{:g} K", range.lower, range.upper);
}

/// Where an entry holds, with its rule.
std::string holds_words(const Entry& entry) {
    std::string words = "its data hold for " + range_words(*entry.temperature);
    if (entry.cold) {
        words += fmt::format(", its cold table from {:g} K", entry.cold->table.temperature.front());
    }
    if (entry.beyond && entry.beyond->temperature) {
        words += ", its rule for " + range_words(*entry.beyond->temperature);
    }
    return words;
}

class Evaluator {
  public:
    Evaluator(const Library& library, const Conditions& conditions, int depth = 0)
        : library_(library), conditions_(conditions), depth_(depth) {}

    Value property(const std::string& material, PropertyId id) const {
        if (depth_ > longest_chain) {
            return missing(fmt::format("{} of {} refers to other materials in a circle",
                                       info(id).title, material));
        }
        const auto known = library_.materials.find(material);
        if (known == library_.materials.end()) {
            return missing(
                fmt::format("{} refers to the unknown material \"{}\"", info(id).title, material));
        }
        const Material& substance = known->second;
        const auto found = substance.properties.find(id);
        if (found == substance.properties.end()) {
            const auto reason = substance.unknown.find(id);
            return missing(
                fmt::format("{} of {} unknown{}", info(id).title, material,
                            reason == substance.unknown.end() ? "" : ": " + reason->second));
        }
        return entry(found->second.entry, material, id);
    }

  private:
    /// Value of an entry, by its data within their range, by its rule beyond it.
    Value entry(const Entry& datum, const std::string& material, PropertyId id) const {
        const double t = conditions_.temperature;
        const bool warm = !datum.temperature || datum.temperature->contains(t);
        const bool in_light =
            !datum.wavelength || datum.wavelength->contains(conditions_.wavelength);
        if (warm && in_light) return within(datum, material, id, t);
        if (datum.cold && in_light && t < datum.cold->join.upper) return cold(datum, material, id);
        if (datum.beyond) {
            const Beyond& rule = *datum.beyond;
            const bool reaches = warm || (rule.temperature && rule.temperature->contains(t));
            const bool lit =
                in_light || (rule.wavelength && rule.wavelength->contains(conditions_.wavelength));
            if (reaches && lit) return beyond(datum, material, id);
        }
        if (!warm) {
            return missing(fmt::format("{} of {} at {:g} K unknown ({})", info(id).title, material,
                                       t, holds_words(datum)));
        }
        return missing(fmt::format("{} of {} at {:g} nm unknown (its data hold for {:g}–{:g} nm)",
                                   info(id).title, material, conditions_.wavelength * 1e9,
                                   datum.wavelength->lower * 1e9, datum.wavelength->upper * 1e9));
    }

    Value within(const Entry& datum, const std::string& material, PropertyId id,
                 double temperature) const {
        if (datum.cold && temperature < datum.cold->join.upper) return cold(datum, material, id);
        return plain(datum, material, id, temperature);
    }

    /// The datum itself, whatever its range.
    Value plain(const Entry& datum, const std::string& material, PropertyId id,
                double temperature) const {
        Value value;
        value.entry = &datum;
        value.width = width_at(datum.width, datum.width_spans, temperature);
        if (const auto* scalar = std::get_if<Scalar>(&datum.curve)) {
            value.number = scalar->value;
        } else if (const auto* table = std::get_if<TemperatureTable>(&datum.curve)) {
            value.number = interpolate(*table, temperature);
        } else if (const auto* law = std::get_if<PowerLaw>(&datum.curve)) {
            value.number = law->at_1_hz * std::pow(conditions_.frequency, law->exponent);
            value.frequency_extrapolated =
                datum.frequency && !datum.frequency->contains(conditions_.frequency);
        } else if (const auto* same = std::get_if<SameAs>(&datum.curve)) {
            Value other =
                Evaluator(library_, at(temperature), depth_ + 1).property(same->material, id);
            if (other.number) *other.number *= same->factor;
            if (other.analogy.empty()) {
                other.analogy = fmt::format("{} of {} at {:g} K: as {}", info(id).title, material,
                                            temperature, same->material);
            }
            return other;
        } else {
            value.number = optical_value(datum, conditions_.wavelength);
        }
        return value;
    }

    Conditions at(double temperature) const {
        Conditions other = conditions_;
        other.temperature = temperature;
        return other;
    }

    Value cold(const Entry& datum, const std::string& material, PropertyId id) const {
        const ColdTable& table = *datum.cold;
        const double t = conditions_.temperature;
        if (t < table.table.temperature.front()) {
            return missing(fmt::format("{} of {} at {:g} K unknown (its table begins at {:g} K)",
                                       info(id).title, material, t,
                                       table.table.temperature.front()));
        }
        Value value = plain(datum, material, id, table.join.upper);
        if (!value.number) return value;
        value.width = width_at(table.width, table.width_spans, t);
        value.from_cold_table = true;
        if (t <= table.join.lower) {
            value.number = interpolate(table.table, t);
            value.frequency_extrapolated = false;
        } else {
            const double low = interpolate(table.table, table.join.lower);
            value.number =
                interpolate({{table.join.lower, table.join.upper}, {low, *value.number}}, t);
        }
        if (table.nature == "by analogy") {
            value.analogy = fmt::format("{} of {} at {:g} K: {}", info(id).title, material, t,
                                        table.note.empty() ? "by analogy" : table.note);
        }
        return value;
    }

    static double nearest(const Interval& range, double x) {
        return std::clamp(x, range.lower, range.upper);
    }

    /// Where a rule starts from: a scalar from where it was measured, a table from its nearest end.
    static double reference_temperature(const Entry& datum, double temperature) {
        const double end = nearest(*datum.temperature, temperature);
        return std::holds_alternative<TemperatureTable>(datum.curve)
                   ? end
                   : datum.at_temperature.value_or(end);
    }

    Value beyond(const Entry& datum, const std::string& material, PropertyId id) const {
        const Beyond& rule = *datum.beyond;
        const double t = conditions_.temperature;
        const bool warm = !datum.temperature || datum.temperature->contains(t);
        const bool lit = !datum.wavelength || datum.wavelength->contains(conditions_.wavelength);
        const double reference = warm ? t : reference_temperature(datum, t);
        Conditions known = conditions_;
        if (!lit) known.wavelength = nearest(*datum.wavelength, conditions_.wavelength);
        Value value = Evaluator(library_, known, depth_).plain(datum, material, id, reference);
        if (!value.number) return value;
        double factor = 1.0;
        std::string how = "held constant";
        if (!warm && rule.rule == Beyond::Rule::debye) {
            factor = debye_shape(t, rule.debye_temperature) /
                     debye_shape(reference, rule.debye_temperature);
            how = fmt::format("scaled as a Debye solid of {:g} K", rule.debye_temperature);
        } else if (!warm && rule.rule != Beyond::Rule::constant) {
            const bool own = rule.rule == Beyond::Rule::heat_capacity;
            const PropertyId other_id = own ? PropertyId::specific_heat : id;
            const std::string& other = own ? material : rule.material;
            const Value here = Evaluator(library_, at(t), depth_ + 1).property(other, other_id);
            const Value there =
                Evaluator(library_, at(reference), depth_ + 1).property(other, other_id);
            if (!here.number) return here;
            if (!there.number) return there;
            factor = *here.number / *there.number;
            how = own ? "scaled with its heat capacity" : "scaled like that of " + other;
        }
        *value.number *= factor;
        value.width = width_at(rule.width, rule.width_spans, t);
        value.analogy = warm ? fmt::format("{} of {} at {:g} nm: {}", info(id).title, material,
                                           conditions_.wavelength * 1e9, how)
                             : fmt::format("{} of {} at {:g} K: {} from {:g} K", info(id).title,
                                           material, t, how, reference);
        return value;
    }

    const Library& library_;
    Conditions conditions_;
    int depth_;  // references followed so far
};

/// "α of X at 280 K: how" becomes "α of X from 295 K to 124 K: how".
std::string along(const std::string& analogy, double from, double to) {
    const std::size_t at = analogy.find(" at ");
    const std::size_t how = analogy.find(": ");
    return fmt::format("{} from {:g} K to {:g} K{}", analogy.substr(0, at), from, to,
                       analogy.substr(how));
}

/// ∫ f dT by Gauss–Legendre on panels of at most `panel` kelvin; stops at the first missing value.
template <typename Function>
Value integral(double from, double to, Function&& at) {
    constexpr double panel = 2.0;
    using Gauss = boost::math::quadrature::gauss<double, 7>;
    const int panels = std::max(1, static_cast<int>(std::ceil(std::abs(to - from) / panel)));
    const double half = (to - from) / (2.0 * panels);
    // The far end first: when it is unknown, the message names the temperature that was asked for.
    const Value end = at(to);
    if (!end.number) return end;
    Value result;
    double sum = 0.0;
    for (int i = 0; i < panels; ++i) {
        const double middle = from + half * (2 * i + 1);
        for (std::size_t j = 0; j < Gauss::abscissa().size(); ++j) {
            for (const double sign : {-1.0, 1.0}) {
                if (Gauss::abscissa()[j] == 0.0 && sign > 0.0) continue;
                Value value = at(middle + sign * half * Gauss::abscissa()[j]);
                if (!value.number) return value;
                sum += Gauss::weights()[j] * half * *value.number;
                if (result.analogy.empty() && !value.analogy.empty()) {
                    result.analogy = along(value.analogy, from, to);
                }
                result.entry = value.entry;
            }
        }
    }
    result.number = sum;
    return result;
}

}  // namespace

double debye_shape(double temperature, double debye_temperature) {
    // C_V/(3Nk) = 3 (T/θ)³ ∫₀^{θ/T} x⁴ eˣ/(eˣ−1)² dx; the integrand is below 1e-20 beyond x = 60.
    const double top = debye_temperature / temperature;
    using Gauss = boost::math::quadrature::gauss<double, 20>;
    const auto integrand = [](double x) {
        if (x < 1e-8) return x * x;
        const double e = std::expm1(x);
        return x * x * x * x * (e + 1.0) / (e * e);
    };
    const double end = std::min(top, 60.0);
    constexpr int panels = 8;
    double sum = 0.0;
    for (int i = 0; i < panels; ++i) {
        sum += Gauss::integrate(integrand, end * i / panels, end * (i + 1) / panels);
    }
    return 3.0 * sum / (top * top * top);
}

Value evaluate(const Library& library, const std::string& material, PropertyId property,
               const Conditions& conditions) {
    const Evaluator evaluator(library, conditions);
    if (property == PropertyId::extinction_coefficient) {
        const auto& properties = library.at(material).properties;
        const bool per_length = properties.count(property) == 0 &&
                                properties.count(PropertyId::absorption_coefficient) != 0;
        if (per_length) {
            Value value = evaluator.property(material, PropertyId::absorption_coefficient);
            if (value.number) *value.number *= conditions.wavelength / (4.0 * core::pi);
            return value;
        }
    }
    return evaluator.property(material, property);
}

namespace {

IndexValue index_through(const Library& library, const std::string& material, double wavelength,
                         double temperature, int depth) {
    IndexValue result;
    const auto known = library.materials.find(material);
    if (known == library.materials.end() || depth > longest_chain) {
        result.missing =
            known == library.materials.end()
                ? fmt::format("refractive index refers to the unknown material \"{}\"", material)
                : fmt::format("refractive index of {} refers to other materials in a circle",
                              material);
        return result;
    }
    const Material& substance = known->second;
    const auto found = substance.properties.find(PropertyId::refractive_index);
    if (found == substance.properties.end()) {
        const auto reason = substance.unknown.find(PropertyId::refractive_index);
        result.missing =
            fmt::format("refractive index of {} unknown{}", material,
                        reason == substance.unknown.end() ? "" : ": " + reason->second);
        return result;
    }
    const Entry& entry = found->second.entry;
    if (const auto* same = std::get_if<SameAs>(&entry.curve)) {
        result = index_through(library, same->material, wavelength, temperature, depth + 1);
        if (!result.index) return result;
        numerics::Jet<double> factor(same->factor);
        if (entry.rescaled_to) {
            const auto there = index_through(library, same->material, entry.rescaled_to->first,
                                             entry.at_temperature.value_or(temperature), depth + 1);
            if (!there.index) return there;
            factor = numerics::Jet<double>(entry.rescaled_to->second / there.index->value);
        }
        *result.index = *result.index * factor + numerics::Jet<double>(entry.offset);
        result.entry = &entry;
        result.width = entry.width;
        return result;
    }
    if (entry.wavelength && !entry.wavelength->contains(wavelength)) {
        result.missing = fmt::format(
            "refractive index of {} is known for {:g}–{:g} nm only, not at {:g} nm", material,
            entry.wavelength->lower * 1e9, entry.wavelength->upper * 1e9, wavelength * 1e9);
        return result;
    }
    const bool in_range = !entry.temperature || entry.temperature->contains(temperature);
    double formula_temperature = temperature;
    if (depends_on_temperature(entry) && !in_range) {
        const bool by_rule = entry.beyond && entry.beyond->rule == Beyond::Rule::constant &&
                             entry.beyond->temperature &&
                             entry.beyond->temperature->contains(temperature);
        if (!by_rule) {
            result.missing = fmt::format("refractive index of {} at {:g} K unknown ({})", material,
                                         temperature, holds_words(entry));
            return result;
        }
        formula_temperature =
            std::clamp(temperature, entry.temperature->lower, entry.temperature->upper);
        result.analogy = fmt::format("refractive index of {} at {:g} K: held constant from {:g} K",
                                     material, temperature, formula_temperature);
    }
    result.index = dispersion(entry, wavelength, formula_temperature);
    result.entry = &entry;
    result.width = entry.width;
    if (depends_on_temperature(entry) || !entry.at_temperature ||
        temperature == *entry.at_temperature) {
        return result;
    }
    const Value change = integral(*entry.at_temperature, temperature, [&](double t) {
        return evaluate(library, material, PropertyId::thermo_optic_coefficient,
                        {t, wavelength, 1.0});
    });
    if (change.number) {
        result.index->value += *change.number;
        result.analogy = change.analogy;
    } else if (!in_range) {
        result.index.reset();
        result.missing = change.missing + ", so its index at the operating temperature is unknown";
    }
    return result;
}

}  // namespace

IndexValue index_at(const Library& library, const std::string& material, double wavelength,
                    double temperature) {
    return index_through(library, material, wavelength, temperature, 0);
}

numerics::Jet<double> with_dispersion(const Value& extinction, bool per_length, double wavelength) {
    const double k = *extinction.number;
    const double omega = 2.0 * core::pi * core::speed_of_light / wavelength;
    const Entry* entry = extinction.entry;
    if (per_length) return {k, -k / omega, 2.0 * k / (omega * omega)};
    const bool table = entry != nullptr && std::holds_alternative<WavelengthTable>(entry->curve) &&
                       (!entry->wavelength || entry->wavelength->contains(wavelength));
    return table ? dispersion(*entry, wavelength, 295.0) : numerics::Jet<double>(k);
}

std::vector<std::string> alternatives_that_hold(const Library& library, const std::string& material,
                                                PropertyId property, const Conditions& conditions) {
    std::vector<std::string> names;
    const auto& properties = library.at(material).properties;
    const auto found = properties.find(property);
    if (found == properties.end()) return names;
    for (const Alternative& other : found->second.alternatives) {
        const bool warm =
            !other.entry.temperature || other.entry.temperature->contains(conditions.temperature);
        const bool lit =
            !other.entry.wavelength || other.entry.wavelength->contains(conditions.wavelength);
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
