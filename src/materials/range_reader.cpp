#include "materials/range_reader.hpp"

#include <fmt/format.h>

namespace stillcoat::materials {
namespace {

using core::Node;
using core::TableReader;

/// The most that a table of temperature may be continued above its end: about 15 K at 295 K.
constexpr double longest_continuation = 1.05;

/// Within `outer`, a rounding apart.
bool lies_in(const Interval& inner, const Interval& outer) {
    return outer.contains(inner.lower) && outer.contains(inner.upper);
}

/// The range of a table: as stated, which must lie between its ends, or between its ends.
void limit_to_table(TableReader& axes, const std::string& key, double unit,
                    std::optional<Interval>& range, const Interval& ends, const char* hint) {
    if (range && !lies_in(*range, ends)) {
        axes.problem_at(key,
                        fmt::format("{} in {} is [{:g}, {:g}], its table ends at {:g} and {:g}",
                                    key, axes.name(), range->lower / unit, range->upper / unit,
                                    ends.lower / unit, ends.upper / unit),
                        hint);
        range.reset();
    }
    if (!range) range = ends;
}

void limit_to_curve(TableReader& reader, TableReader& axes, Entry& entry) {
    if (const auto* table = std::get_if<TemperatureTable>(&entry.curve)) {
        limit_to_table(axes, "temperature_K", 1.0, entry.temperature,
                       {table->temperature.front(), table->temperature.back()},
                       "a little above the end: continued_to_K; further: a rule under beyond");
    }
    if (const auto* table = std::get_if<WavelengthTable>(&entry.curve)) {
        limit_to_table(axes, axes.has("wavelength_um") ? "wavelength_um" : "wavelength_nm",
                       axes.has("wavelength_um") ? 1e-6 : 1e-9, entry.wavelength,
                       {table->wavelength.front(), table->wavelength.back()},
                       "the range must lie within the table");
    }
    if (entry.rescaled_to && entry.wavelength &&
        !entry.wavelength->contains(entry.rescaled_to->first)) {
        reader.problem_at(
            "rescaled_to",
            fmt::format("rescaled_to of {} lies at {:g} nm, its data hold for {:g}–{:g} nm",
                        reader.name(), entry.rescaled_to->first * 1e9,
                        entry.wavelength->lower * 1e9, entry.wavelength->upper * 1e9));
    }
}

void read_continuation(TableReader& reader, Entry& entry) {
    const auto to = reader.number("continued_to_K", core::positive("K"));
    if (!to) return;
    const std::string key = "continued_to_K";
    const auto* table = std::get_if<TemperatureTable>(&entry.curve);
    if (table == nullptr) {
        reader.problem_at(key, key + " in " + reader.name() + " needs a table temperature_K");
        return;
    }
    const double end = table->temperature.back();
    if (!entry.temperature || entry.temperature->upper != end) {
        reader.problem_at(key,
                          key + " in " + reader.name() + " needs a range up to its table's end",
                          fmt::format("that is {:g} K", end));
        return;
    }
    if (*to <= end || *to > end * longest_continuation) {
        reader.problem_at(key, fmt::format("{} in {} is {:g}", key, reader.name(), *to),
                          fmt::format("it must lie above the table's end and at most 5 % above: "
                                      "more than {:g}, up to {:g}",
                                      end, end * longest_continuation));
        return;
    }
    entry.continued_to = to;
}

}  // namespace

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

void read_ranges(TableReader& reader, Entry& entry, const EntryContext& context) {
    if (!reader.has("range") && !context.from_design)
        reader.missing("range", "{ temperature_K = [283, 313] }");
    static const Node nothing = [] {
        Node node;
        node.type = Node::Type::table;
        return node;
    }();
    const Node* node = reader.table("range");
    TableReader axes(node != nullptr ? *node : nothing, "range of " + reader.name(),
                     reader.problems());
    if (node != nullptr && !axes.has("temperature_K") && !context.from_design)
        axes.missing("temperature_K", "[283, 313]");
    entry.temperature = read_interval(axes, "temperature_K", 1.0);
    if (const auto nanometres = read_interval(axes, "wavelength_nm", 1e-9))
        entry.wavelength = nanometres;
    if (const auto micrometres = read_interval(axes, "wavelength_um", 1e-6))
        entry.wavelength = micrometres;
    if (const auto frequency = read_interval(axes, "frequency_Hz", 1.0))
        entry.frequency = frequency;
    axes.finish();
    limit_to_curve(reader, axes, entry);
    read_continuation(reader, entry);
}

void read_cold_ranges(TableReader& reader, ColdTable& cold, const Entry& entry) {
    const Interval ends{cold.table.temperature.front(), cold.table.temperature.back()};
    if (const auto frequency = reader.number("at_frequency_Hz", core::positive("Hz")))
        cold.frequency = Interval{*frequency, *frequency};
    if (const Node* range = reader.table("range"); range != nullptr) {
        TableReader axes(*range, "range of " + reader.name(), reader.problems());
        std::optional<Interval> temperature = read_interval(axes, "temperature_K", 1.0);
        limit_to_table(axes, "temperature_K", 1.0, temperature, ends,
                       "the range must lie within the table");
        if (const auto frequency = read_interval(axes, "frequency_Hz", 1.0))
            cold.frequency = frequency;
        axes.finish();
    }
    const Interval& join = cold.join;
    if (!ends.contains(join.lower)) {
        reader.problem_at(
            "joins_K",
            fmt::format("joins_K of {} begins at {:g} K, outside its table of {:g}–{:g} K",
                        reader.name(), join.lower, ends.lower, ends.upper));
    }
    if (join.lower == join.upper) {
        reader.problem_at("joins_K", "joins_K of " + reader.name() + " spans no temperature",
                          "its upper end must be above its lower one");
    }
    if (entry.temperature && !entry.temperature->contains(join.upper)) {
        reader.problem_at(
            "joins_K",
            fmt::format("joins_K of {} ends at {:g} K, where the warm datum does not hold",
                        reader.name(), join.upper),
            fmt::format("it holds for {:g}–{:g} K", entry.temperature->lower,
                        entry.temperature->upper));
    }
}

}  // namespace stillcoat::materials
