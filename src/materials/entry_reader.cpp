#include "materials/entry_reader.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <set>

#include "materials/curve_csv.hpp"
#include "materials/curve_reader.hpp"
#include "materials/range_reader.hpp"
#include "materials/width_reader.hpp"
#include "stillcoat/materials/debye.hpp"

namespace stillcoat::materials {
namespace {

using core::Node;
using core::TableReader;

/// Every source must be in references.toml; the first few that are not are named.
void check_sources(TableReader& reader, const std::vector<std::string>& sources,
                   const Library& library) {
    constexpr int most_named = 5;
    int unknown = 0;
    for (const std::string& key : sources) {
        if (library.references.count(key) != 0) continue;
        if (++unknown > most_named) continue;
        std::vector<std::string> keys;
        for (const auto& [known, reference] : library.references) keys.push_back(known);
        const auto near = core::nearest_spelling(key, keys);
        reader.problem_at(
            "source",
            fmt::format("source \"{}\" in {} is not in references.toml", key, reader.name()),
            near ? fmt::format("did you mean \"{}\"?", *near) : "add it there");
    }
    if (unknown > most_named) {
        reader.problem_at("source", fmt::format("{} more sources in {} are not in references.toml",
                                                unknown - most_named, reader.name()));
    }
}

}  // namespace

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
    check_sources(reader, sources, *context.library);
    if (sources.empty() && reader.has("source")) {
        reader.problem_at("source", "source in " + reader.name() + " is empty",
                          "name at least one key of references.toml");
    }
    return sources;
}

namespace {

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
        const core::Limits solids{lowest_debye_temperature, highest_debye_temperature, true, true,
                                  fmt::format("from {:g} K to {:g} K: caesium has 38 K, diamond "
                                              "2230 K",
                                              lowest_debye_temperature, highest_debye_temperature)};
        beyond.debye_temperature =
            reader.number("debye_temperature_K", solids).value_or(lowest_debye_temperature);
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
                    const Entry& entry, core::Problems& problems) {
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
    read_cold_ranges(reader, cold, entry);
    reader.finish();
    return cold;
}

void check_loss_forms(TableReader& reader) {
    for (const char* part : {"loss_angle_bulk", "loss_angle_shear"}) {
        if (reader.has("loss_angle") && reader.has(part)) {
            reader.contradiction(
                part, "loss_angle",
                "give loss_angle for both, or loss_angle_bulk with loss_angle_shear");
        }
    }
    if (reader.has("loss_angle")) return;
    if (reader.has("loss_angle_bulk") != reader.has("loss_angle_shear")) {
        const bool bulk = reader.has("loss_angle_bulk");
        // A factor on one of them leaves the library's other one.
        const Node* given = reader.node().find(bulk ? "loss_angle_bulk" : "loss_angle_shear");
        if (given->find("times") != nullptr) return;
        reader.problem_at(bulk ? "loss_angle_bulk" : "loss_angle_shear",
                          fmt::format("{} in {} stands alone",
                                      bulk ? "loss_angle_bulk" : "loss_angle_shear", reader.name()),
                          "bulk and shear loss belong together: give both");
    }
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
            entry.cold =
                read_cold(*node, "cold of " + reader.name(), context, entry, reader.problems());
        }
    }
    return entry;
}

void check_exclusive_forms(TableReader& reader) {
    check_unread_extinction(reader);
    check_loss_forms(reader);
    if (reader.has("extinction_coefficient") && reader.has("absorption_coefficient")) {
        reader.contradiction("extinction_coefficient", "absorption_coefficient",
                             "each follows from the other: keep one of the two");
    }
}

Property read_property(const Node& table, const std::string& name, const EntryContext& context,
                       core::Problems& problems) {
    TableReader reader(table, name, problems);
    Property property;
    property.entry = read_entry(reader, context);
    std::set<std::string> names;
    for (const Node* node : reader.tables("alternative")) {
        TableReader other(*node, "alternative of " + name, problems);
        Alternative alternative;
        alternative.name = other.required_text("name");
        alternative.reason = other.required_text("reason");
        alternative.entry = read_entry(other, context);
        other.finish();
        const bool twice = !names.insert(alternative.name).second;
        if (twice)
            other.problem_at("name",
                             "alternative " + alternative.name + " of " + name + " stands twice");
        property.alternatives.push_back(std::move(alternative));
    }
    reader.finish();
    return property;
}

}  // namespace stillcoat::materials
