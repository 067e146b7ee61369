#include "materials/entry_reader.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <limits>

#include "materials/curve_reader.hpp"

namespace stillcoat::materials {
namespace {

using core::Node;
using core::TableReader;

const double infinity = std::numeric_limits<double>::infinity();

std::optional<Interval> read_interval(TableReader& reader, const std::string& key, double scale) {
    const auto pair = reader.numbers(key);
    if (!pair) return std::nullopt;
    if (pair->size() != 2 || (*pair)[0] > (*pair)[1] || (*pair)[0] < 0.0) {
        reader.problem_at(key, key + " in " + reader.name() + " must be [lower, upper]",
                          "two numbers, the smaller first, not negative");
        return std::nullopt;
    }
    return Interval{(*pair)[0] * scale, (*pair)[1] * scale};
}

/// Reads the width keys; absent when the table has none.
std::optional<Width> read_width(TableReader& reader, double unit_scale) {
    std::optional<Width> width;
    int stated = 0;
    if (const Node* node = reader.find("uncertainty"); node != nullptr) {
        ++stated;
        if (node->type == Node::Type::text && node->text == "not stated") {
            width = Width{};
        } else if (node->is_number() && std::isfinite(node->number) && node->number >= 0.0) {
            width = Width{Width::Form::absolute, node->number * unit_scale, 0.0, 0.0};
        } else {
            reader.problem_at("uncertainty", "uncertainty in " + reader.name() + " cannot be used",
                              "a number in the unit of the value, 0 or greater, or \"not stated\"");
        }
    }
    const core::Limits not_negative{0.0, infinity, true, false, "0 or greater"};
    if (const auto relative = reader.number("relative_uncertainty", not_negative)) {
        ++stated;
        width = Width{Width::Form::relative, *relative, 0.0, 0.0};
    }
    const core::Limits at_least_one{1.0, infinity, true, false, "1 or greater"};
    if (const auto geometric = reader.number("geometric_sd", at_least_one)) {
        ++stated;
        width = Width{Width::Form::geometric, *geometric, 0.0, 0.0};
    }
    if (const auto ends = reader.numbers("uniform")) {
        ++stated;
        if (ends->size() == 2 && (*ends)[0] < (*ends)[1]) {
            width =
                Width{Width::Form::uniform, 0.0, (*ends)[0] * unit_scale, (*ends)[1] * unit_scale};
        } else {
            reader.problem_at("uniform", "uniform in " + reader.name() + " must be [lower, upper]");
        }
    }
    if (stated > 1) {
        reader.problem_at("uncertainty", reader.name() + " states its width more than once",
                          "keep one of uncertainty, relative_uncertainty, geometric_sd, uniform");
    }
    return width;
}

std::vector<WidthSpan> read_width_spans(TableReader& reader, double unit_scale) {
    std::vector<WidthSpan> spans;
    for (const Node* node : reader.tables("uncertainty_below")) {
        TableReader span(*node, "uncertainty_below of " + reader.name(), reader.problems());
        const auto limit = span.number("temperature_K", core::positive("K"));
        if (!limit) span.missing("temperature_K", "20");
        if (const auto width = read_width(span, unit_scale); width && limit) {
            spans.push_back({0.0, *limit, *width});
        }
        span.finish();
    }
    for (const Node* node : reader.tables("uncertainty_between")) {
        TableReader span(*node, "uncertainty_between of " + reader.name(), reader.problems());
        const auto limits = read_interval(span, "temperature_K", 1.0);
        if (const auto width = read_width(span, unit_scale); width && limits) {
            spans.push_back({limits->lower, limits->upper, *width});
        }
        span.finish();
    }
    return spans;
}

std::vector<std::string> read_sources(TableReader& reader, const EntryContext& context) {
    if (context.from_design) {
        const std::string source = reader.required_text("source");
        return source.empty() ? std::vector<std::string>{} : std::vector<std::string>{source};
    }
    if (!reader.has("source")) {
        reader.missing("source", "[\"key of references.toml\"]");
        return {};
    }
    std::vector<std::string> sources = reader.texts("source").value_or(std::vector<std::string>{});
    std::vector<std::string> keys;
    for (const auto& [key, reference] : context.library->references) keys.push_back(key);
    for (const std::string& key : sources) {
        if (context.library->references.count(key) != 0) continue;
        const auto near = core::nearest_spelling(key, keys);
        reader.problem_at(
            "source",
            fmt::format("source \"{}\" in {} is not in references.toml", key, reader.name()),
            near ? fmt::format("did you mean \"{}\"?", *near) : "add it there");
    }
    if (sources.empty() && reader.has("source")) {
        reader.problem_at("source", "source in " + reader.name() + " is empty",
                          "name at least one key of references.toml");
    }
    return sources;
}

Beyond read_beyond(const Node& node, const std::string& name, const EntryContext& context,
                   double unit_scale, core::Problems& problems) {
    TableReader reader(node, name, problems);
    Beyond beyond;
    const std::vector<std::string> rules{"constant", "debye", "follows", "heat-capacity"};
    if (!reader.has("rule")) reader.missing("rule", "\"constant\"");
    const std::string rule = reader.choice("rule", rules).value_or("constant");
    const auto at = std::find(rules.begin(), rules.end(), rule) - rules.begin();
    beyond.rule = static_cast<Beyond::Rule>(at);
    if (beyond.rule == Beyond::Rule::debye) {
        if (!reader.has("debye_temperature_K")) reader.missing("debye_temperature_K", "470");
        beyond.debye_temperature =
            reader.number("debye_temperature_K", core::positive("K")).value_or(1.0);
    }
    if (beyond.rule == Beyond::Rule::heat_capacity &&
        context.property == PropertyId::specific_heat) {
        reader.problem_at("rule", "rule in " + name + " follows itself",
                          "take debye, follows or constant for the specific heat");
    }
    if (beyond.rule == Beyond::Rule::follows) beyond.material = reader.required_text("material");
    beyond.temperature = read_interval(reader, "temperature_K", 1.0);
    beyond.wavelength = read_interval(reader, "wavelength_nm", 1e-9);
    const auto width = read_width(reader, unit_scale);
    if (!width) reader.missing("geometric_sd", "1.5 (or another width)");
    beyond.width = width.value_or(Width{});
    beyond.width_spans = read_width_spans(reader, unit_scale);
    EntryContext library_context = context;
    library_context.from_design = false;
    beyond.sources = read_sources(reader, library_context);
    beyond.place = reader.text("place").value_or("");
    beyond.note = reader.text("note").value_or("");
    reader.finish();
    return beyond;
}

const std::vector<std::string> natures{"measured", "fit", "estimate", "derived", "by analogy"};
const std::vector<std::string> statuses{"seen", "from memory", "derived"};

ColdTable read_cold(const Node& node, const std::string& name, const EntryContext& context,
                    core::Problems& problems) {
    TableReader reader(node, name, problems);
    ColdTable cold;
    cold.table = read_temperature_table(reader, context.property, 1.0);
    for (const char* key : {"joins_K", "nature", "status"}) {
        if (!reader.has(key))
            reader.missing(key, key[0] == 'j'   ? "[200, 295]"
                                : key[0] == 'n' ? "\"measured\""
                                                : "\"seen\"");
    }
    cold.join = read_interval(reader, "joins_K", 1.0).value_or(Interval{200.0, 295.0});
    cold.width = read_width(reader, 1.0).value_or(Width{});
    cold.width_spans = read_width_spans(reader, 1.0);
    EntryContext library_context = context;
    library_context.from_design = false;
    cold.sources = read_sources(reader, library_context);
    cold.place = reader.required_text("place");
    cold.nature = reader.choice("nature", natures).value_or("");
    cold.status = reader.choice("status", statuses).value_or("");
    cold.note = reader.text("note").value_or("");
    reader.text("measured_at");
    reader.number("at_frequency_Hz", core::positive("Hz"));
    if (const Node* range = reader.table("range"); range != nullptr) {
        TableReader axes(*range, "range of " + name, problems);
        read_interval(axes, "temperature_K", 1.0);
        read_interval(axes, "frequency_Hz", 1.0);
        axes.finish();
    }
    if (!cold.table.temperature.empty() && cold.join.lower > cold.table.temperature.back()) {
        reader.problem_at("joins_K", "joins_K of " + name + " begins above the last temperature");
    }
    reader.finish();
    return cold;
}

void read_ranges(TableReader& reader, Entry& entry, const EntryContext& context) {
    if (!reader.has("range")) {
        if (!context.from_design) reader.missing("range", "{ temperature_K = [283, 313] }");
        return;
    }
    const Node* node = reader.table("range");
    if (node == nullptr) return;
    TableReader axes(*node, "range of " + reader.name(), reader.problems());
    if (!axes.has("temperature_K") && !context.from_design)
        axes.missing("temperature_K", "[283, 313]");
    entry.temperature = read_interval(axes, "temperature_K", 1.0);
    if (const auto nanometres = read_interval(axes, "wavelength_nm", 1e-9))
        entry.wavelength = nanometres;
    if (const auto micrometres = read_interval(axes, "wavelength_um", 1e-6))
        entry.wavelength = micrometres;
    entry.frequency = read_interval(axes, "frequency_Hz", 1.0);
    axes.finish();
}

/// Uncertainty in a design file: "4 GPa", "5 %", or a pure number for a pure number.
Width read_design_width(TableReader& reader, const core::QuantityKind& kind, double value) {
    const Node* node = reader.find("uncertainty");
    if (node == nullptr) return {};
    if (node->type == Node::Type::text && node->text == "not stated") return {};
    double width = std::numeric_limits<double>::quiet_NaN();
    if (node->is_number() && kind.si_unit == "1") width = node->number;
    if (node->type == Node::Type::text) {
        if (const auto fraction = core::read_quantity(node->text, core::kind::number);
            fraction.ok && kind.si_unit != "1") {
            width = fraction.value * std::abs(value);
        } else if (const auto absolute = core::read_quantity(node->text, kind); absolute.ok) {
            const bool percent = kind.si_unit == "1" && node->text.find('%') != std::string::npos;
            width = percent ? absolute.value * std::abs(value) : absolute.value;
        }
    }
    if (std::isfinite(width) && width >= 0.0) return {Width::Form::absolute, width, 0.0, 0.0};
    reader.problem_at(
        "uncertainty", "uncertainty in " + reader.name() + " cannot be used",
        fmt::format("for example \"5 %\", or a {} as in \"{}\"", kind.name, kind.example));
    return {};
}

}  // namespace

Entry read_entry(TableReader& reader, const EntryContext& context) {
    Entry entry;
    entry.from_design = context.from_design;
    const double scale = read_curve(reader, context, entry);
    if (context.from_design) {
        const auto* scalar = std::get_if<Scalar>(&entry.curve);
        entry.width = read_design_width(reader, *info(context.property).kind,
                                        scalar != nullptr ? scalar->value : 0.0);
    } else {
        const auto width = read_width(reader, scale);
        if (!width) reader.missing("uncertainty", "\"not stated\"");
        entry.width = width.value_or(Width{});
        entry.width_spans = read_width_spans(reader, scale);
        reader.number("exponent_uncertainty", {0.0, infinity, true, false, "0 or greater"});
        if (const auto ends = reader.numbers("between_laboratories"); ends && ends->size() == 2) {
            entry.between_laboratories = Interval{(*ends)[0] * scale, (*ends)[1] * scale};
        }
    }
    entry.sources = read_sources(reader, context);
    const bool strict = !context.from_design;
    entry.place = strict ? reader.required_text("place") : reader.text("place").value_or("");
    entry.measured_at =
        strict ? reader.required_text("measured_at") : reader.text("measured_at").value_or("");
    read_ranges(reader, entry, context);
    for (const char* key : {"nature", "status"}) {
        if (strict && !reader.has(key))
            reader.missing(key, key[0] == 'n' ? "\"measured\"" : "\"seen\"");
    }
    entry.nature =
        reader.choice("nature", natures).value_or(strict ? "" : "stated in the design file");
    entry.status =
        reader.choice("status", statuses).value_or(strict ? "" : "stated in the design file");
    entry.note = reader.text("note").value_or("");
    if (const Node* node = reader.table("beyond"); node != nullptr) {
        entry.beyond =
            read_beyond(*node, "beyond of " + reader.name(), context, scale, reader.problems());
    }
    if (is_loss(context.property)) {
        if (const Node* node = reader.table("cold"); node != nullptr) {
            entry.cold = read_cold(*node, "cold of " + reader.name(), context, reader.problems());
        }
    }
    return entry;
}

Property read_property(const Node& table, const std::string& name, const EntryContext& context,
                       core::Problems& problems) {
    TableReader reader(table, name, problems);
    Property property;
    property.entry = read_entry(reader, context);
    for (const Node* node : reader.tables("alternative")) {
        TableReader other(*node, "alternative of " + name, problems);
        Alternative alternative;
        alternative.name = other.required_text("name");
        alternative.reason = other.required_text("reason");
        alternative.entry = read_entry(other, context);
        other.finish();
        const bool twice = std::any_of(
            property.alternatives.begin(), property.alternatives.end(),
            [&alternative](const Alternative& a) { return a.name == alternative.name; });
        if (twice)
            other.problem_at("name",
                             "alternative " + alternative.name + " of " + name + " stands twice");
        property.alternatives.push_back(std::move(alternative));
    }
    reader.finish();
    return property;
}

}  // namespace stillcoat::materials
