#include "materials/curve_reader.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <limits>
#include <optional>

#include "materials/curve_csv.hpp"
#include "materials/dispersion.hpp"

namespace stillcoat::materials {
namespace {

using core::Node;
using core::TableReader;

/// Factor from the unit that the table names to SI; 1 for pure numbers.
double unit_scale(TableReader& reader, const core::QuantityKind& kind, bool needed) {
    if (kind.si_unit == "1") return 1.0;
    if (!reader.has("unit")) {
        if (needed) reader.missing("unit", fmt::format("\"{}\"", kind.si_unit));
        return 1.0;
    }
    const std::string unit = reader.required_text("unit");
    const core::QuantityReading reading = core::read_quantity(1.0, unit, kind);
    if (!reading.ok)
        reader.problem_at("unit", "unit in " + reader.name() + ": " + reading.failure.message,
                          reading.failure.hint);
    return reading.ok ? reading.value : 1.0;
}

void check_values(TableReader& reader, const std::string& key, std::vector<double>& values,
                  PropertyId property, double scale) {
    const core::Limits& limits = info(property).limits;
    for (double& value : values) {
        value *= scale;
        const bool ok = (value > limits.lower || (limits.lower_itself && value == limits.lower)) &&
                        value < limits.upper;
        if (!ok) {
            reader.problem_at(key,
                              fmt::format("{} in {} holds {}", key, reader.name(), value / scale),
                              "each must be " + limits.words);
            return;
        }
    }
}

bool increasing(const std::vector<double>& list) {
    return std::adjacent_find(list.begin(), list.end(), std::greater_equal<>()) == list.end();
}

/// Abscissa and values of a table with equal lengths and strictly increasing abscissa.
std::pair<std::vector<double>, std::vector<double>> read_table(TableReader& reader,
                                                               const std::string& axis,
                                                               PropertyId property, double scale) {
    std::vector<double> x = reader.numbers(axis).value_or(std::vector<double>{});
    if (!reader.has("values")) reader.missing("values", "[...]");
    std::vector<double> y = reader.numbers("values").value_or(std::vector<double>{});
    check_values(reader, "values", y, property, scale);
    if (x.size() != y.size() || x.size() < 2) {
        reader.problem_at("values",
                          fmt::format("{} in {} has {} entries, values has {}", axis, reader.name(),
                                      x.size(), y.size()),
                          "both need the same number, two or more");
        return {{1.0, 2.0}, {1.0, 1.0}};
    }
    if (!increasing(x) || x.front() <= 0.0) {
        reader.problem_at(axis,
                          axis + " in " + reader.name() + " must increase from entry to entry");
        return {{1.0, 2.0}, {1.0, 1.0}};
    }
    return {x, y};
}

/// One coefficient list of a polynomial in T; empty with a problem at the list itself.
std::vector<double> read_polynomial(TableReader& reader, const std::string& key, const Node& row,
                                    std::size_t position) {
    const std::string where = fmt::format("entry {} of {} in {}", position, key, reader.name());
    if (row.type != Node::Type::array) {
        reader.problems().add(
            row.place(), fmt::format("{} is {}, others are lists", where, describe(row.type)),
            "all must be numbers, or all lists of the coefficients of a polynomial in T/K");
        return {};
    }
    if (row.items.empty()) {
        reader.problems().add(row.place(), where + " is empty",
                              "it must hold the coefficients of a polynomial in T/K");
        return {};
    }
    std::vector<double> coefficients;
    for (const Node& item : row.items) {
        if (!item.is_number() || !std::isfinite(item.number)) {
            reader.problems().add(item.place(), where + " must hold finite numbers only");
            return {};
        }
        coefficients.push_back(item.number);
    }
    return coefficients;
}

/// A list of numbers, or a list of lists of numbers (polynomials in T); absent with a problem.
std::optional<std::vector<std::vector<double>>> read_polynomials(TableReader& reader,
                                                                 const std::string& key,
                                                                 bool& nested) {
    std::vector<std::vector<double>> list;
    const Node* node = reader.find(key);
    nested = node != nullptr &&
             std::any_of(node->items.begin(), node->items.end(),
                         [](const Node& item) { return item.type == Node::Type::array; });
    if (!nested) {
        const auto numbers = reader.numbers(key);
        if (node != nullptr && !numbers) return std::nullopt;
        for (double number : numbers.value_or(std::vector<double>{})) list.push_back({number});
        return list;
    }
    for (const Node& row : node->items) {
        list.push_back(read_polynomial(reader, key, row, list.size() + 1));
        if (list.back().empty()) return std::nullopt;
    }
    return list;
}

Sellmeier read_sellmeier(TableReader& reader) {
    Sellmeier formula{};
    bool nested_strength = false;
    bool nested_resonance = false;
    const auto strength = read_polynomials(reader, "sellmeier_strength", nested_strength);
    const auto resonance = read_polynomials(reader, "sellmeier_resonance_um", nested_resonance);
    formula.constant = reader.number("sellmeier_constant", core::any_value()).value_or(0.0);
    formula.depends_on_temperature = nested_strength || nested_resonance;
    if (!strength || !resonance) return formula;
    formula.strength = *strength;
    formula.resonance = *resonance;
    if (formula.strength.empty() || formula.strength.size() != formula.resonance.size()) {
        reader.problem_at("sellmeier_strength",
                          fmt::format("{} has {} strengths and {} resonances", reader.name(),
                                      formula.strength.size(), formula.resonance.size()),
                          "each strength needs its resonance");
    }
    return formula;
}

Curve read_scalar(TableReader& reader, const EntryContext& context, double& scale) {
    const PropertyInfo& about = info(context.property);
    const Node* node = reader.node().find("value");
    const bool with_unit_inside = node != nullptr && node->type == Node::Type::text;
    if (context.from_design || with_unit_inside || about.kind->si_unit == "1") {
        if (reader.has("unit")) {
            reader.find("unit");
            const bool pure = about.kind->si_unit == "1";
            reader.problem_at("unit", "unit in " + reader.name() + " is not used here",
                              pure ? "it is a pure number: leave the unit out"
                                   : fmt::format("write value = \"{}\"", about.kind->example));
        }
        return Scalar{reader.quantity("value", *about.kind, about.limits).value_or(1.0)};
    }
    scale = unit_scale(reader, *about.kind, true);
    core::Limits limits = about.limits;
    const double number = reader.number("value", core::any_value()).value_or(1.0) * scale;
    if (!(number > limits.lower || (limits.lower_itself && number == limits.lower)) ||
        !(number < limits.upper)) {
        reader.problem_at("value", fmt::format("value in {} is {}", reader.name(), number / scale),
                          "it must be " + limits.words);
    }
    return Scalar{number};
}

void read_index_keys(TableReader& reader, const EntryContext& context, Entry& entry) {
    entry.offset = reader.number("offset", core::any_value()).value_or(0.0);
    const bool follows = std::holds_alternative<SameAs>(entry.curve);
    // A measured curve means nothing without it, in a design file too.
    const bool from_csv = reader.has("wavelength_csv");
    const bool needed = !context.from_design || from_csv;
    if (!reader.has("medium") && needed && !follows) reader.missing("medium", "\"vacuum\"");
    const std::vector<std::string> media =
        from_csv ? std::vector<std::string>{"vacuum", "air"}
                 : std::vector<std::string>{"vacuum", "air", "unstated"};
    const std::string medium = reader.choice("medium", media).value_or("vacuum");
    entry.medium = medium == "air"      ? Medium::air
                   : medium == "vacuum" ? Medium::vacuum
                                        : Medium::unstated;
    if (const Node* node = reader.table("rescaled_to"); node != nullptr) {
        TableReader point(*node, "rescaled_to of " + reader.name(), reader.problems());
        if (!point.has("wavelength_nm")) point.missing("wavelength_nm", "1064");
        if (!point.has("value")) point.missing("value", "2.05");
        const auto wavelength = point.number("wavelength_nm", core::positive("nm"));
        const auto value = point.number("value", core::positive(""));
        if (wavelength && value) entry.rescaled_to = {*wavelength * 1e-9, *value};
        point.finish();
    }
}

}  // namespace

TemperatureTable read_temperature_table(TableReader& reader, PropertyId property, double scale) {
    auto [temperature, value] = read_table(reader, "temperature_K", property, scale);
    return {std::move(temperature), std::move(value)};
}

namespace {

const std::vector<std::string> forms{"value",         "temperature_K",      "wavelength_nm",
                                     "value_at_1_Hz", "sellmeier_strength", "cauchy",
                                     "same_as",       "wavelength_csv"};

/// The one form that the table has; absent with a problem.
std::optional<std::string> form_of(TableReader& reader) {
    std::vector<std::string> given;
    std::copy_if(forms.begin(), forms.end(), std::back_inserter(given),
                 [&reader](const std::string& key) { return reader.has(key); });
    if (given.empty()) {
        reader.missing("value", fmt::format("... (or one of {})", fmt::join(forms, ", ")));
        return std::nullopt;
    }
    if (given.size() > 1) {
        reader.contradiction(given[0], given[1], "a property has one datum: keep one of the two");
        for (const std::string& key : forms) reader.find(key);
        return std::nullopt;
    }
    return given[0];
}

PowerLaw read_power_law(TableReader& reader, PropertyId property) {
    const double at_1_hz = reader.number("value_at_1_Hz", info(property).limits).value_or(0.0);
    if (!reader.has("exponent")) reader.missing("exponent", "0.0");
    const double exponent = reader.number("exponent", core::any_value()).value_or(0.0);
    const double infinity = std::numeric_limits<double>::infinity();
    return {at_1_hz, exponent,
            reader.number("exponent_uncertainty", {0.0, infinity, true, false, "0 or greater"})};
}

Cauchy read_cauchy(TableReader& reader) {
    const auto c = reader.numbers("cauchy");
    if (c && c->size() == 3) return {(*c)[0], (*c)[1], (*c)[2]};
    if (c) reader.problem_at("cauchy", "cauchy in " + reader.name() + " needs [A, B, C]");
    return {1.0, 0.0, 0.0};
}

/// A smooth curve through values that jump swings far beyond them: refused.
void check_swing(TableReader& reader, const std::string& key, const WavelengthTable& table) {
    constexpr int samples = 16;
    constexpr double allowed = 0.25;  // of the span of the values
    const auto [low, high] = std::minmax_element(table.value.begin(), table.value.end());
    const double margin = allowed * (*high - *low) + 1e-9 * std::abs(*high);
    Entry entry;
    entry.curve = table;
    for (std::size_t i = 0; i + 1 < table.wavelength.size(); ++i) {
        const double step = (table.wavelength[i + 1] - table.wavelength[i]) / samples;
        for (int j = 1; j < samples; ++j) {
            const double wavelength = table.wavelength[i] + j * step;
            const double value = optical_value(entry, wavelength);
            if (value >= *low - margin && value <= *high + margin) continue;
            reader.problem_at(
                key,
                fmt::format("the curve through {} in {} swings to {:.4g} at {:.6g} nm", key,
                            reader.name(), value, wavelength * 1e9),
                "a value next to it may be wrong, or points are missing there");
            return;
        }
    }
}

/// The datum in its form; `scale` becomes the factor from its unit to SI.
Curve read_form(TableReader& reader, const EntryContext& context, const std::string& form,
                double& scale) {
    const PropertyInfo& about = info(context.property);
    const bool index = context.property == PropertyId::refractive_index;
    const bool optical = index || context.property == PropertyId::extinction_coefficient;
    if (form == "value") return read_scalar(reader, context, scale);
    if (form == "temperature_K") {
        scale = unit_scale(reader, *about.kind, true);
        return read_temperature_table(reader, context.property, scale);
    }
    if (form == "wavelength_nm" && optical) {
        auto [nanometres, value] = read_table(reader, form, context.property, 1.0);
        for (double& x : nanometres) x *= 1e-9;
        WavelengthTable table{std::move(nanometres), std::move(value)};
        check_swing(reader, form, table);
        return table;
    }
    if (form == "wavelength_csv" && optical) {
        auto curve = read_curve_csv(reader, form, context.property);
        if (!curve) return Scalar{1.0};
        check_swing(reader, form, *curve);
        return std::move(*curve);
    }
    if (form == "value_at_1_Hz" && is_loss(context.property))
        return read_power_law(reader, context.property);
    if (form == "sellmeier_strength" && index) return read_sellmeier(reader);
    if (form == "cauchy" && index) return read_cauchy(reader);
    if (form == "same_as") {
        return SameAs{reader.required_text(form),
                      reader.number("factor", core::positive("")).value_or(1.0)};
    }
    reader.find(form);
    reader.problem_at(form, fmt::format("{} is no form of {}", form, about.key));
    return Scalar{1.0};
}

}  // namespace

double read_curve(TableReader& reader, const EntryContext& context, Entry& entry) {
    entry.curve = Scalar{1.0};
    const std::optional<std::string> form = form_of(reader);
    if (!form) return 1.0;
    double scale = 1.0;
    entry.curve = read_form(reader, context, *form, scale);
    if (context.property == PropertyId::refractive_index) read_index_keys(reader, context, entry);
    entry.at_temperature = reader.number("at_temperature_K", core::positive("K"));
    reader.number("at_wavelength_nm", core::positive("nm"));
    if (const auto frequency = reader.number("at_frequency_Hz", core::positive("Hz"));
        frequency && is_loss(context.property)) {
        entry.frequency = Interval{*frequency, *frequency};
    }
    return scale;
}

}  // namespace stillcoat::materials
