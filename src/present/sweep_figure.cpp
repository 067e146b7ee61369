#include "present/sweep_figure.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <filesystem>

#include "present/figure.hpp"
#include "present/wording.hpp"
#include "stillcoat/core/constants.hpp"

namespace stillcoat::present {
namespace {

/// How a quantity is drawn: its values times `factor`, in this unit.
struct Scale {
    double factor;
    std::string unit;
};

Scale axis_scale(const assess::SweepAxis& axis) {
    if (axis.name == "wavelength" || axis.name.rfind("layer.", 0) == 0) return {1e9, "nm"};
    if (axis.name == "beam_radius") return {1e3, "mm"};
    if (axis.unit == "rad") return {180.0 / core::pi, "°"};
    return {1.0, axis.unit == "1" ? "" : axis.unit};
}

std::string with_unit(const std::string& title, const std::string& unit) {
    return unit.empty() ? title : fmt::format("{} [{}]", title, unit);
}

bool is_density(const assess::Outcome& outcome) { return outcome.unit == "m²/Hz"; }

/// What people read: an amplitude for a density, the number itself for the rest.
double drawn(const assess::Outcome& outcome, double value) {
    return is_density(outcome) ? std::sqrt(value) : value;
}

std::string drawn_unit(const assess::Outcome& outcome) {
    return is_density(outcome) ? "m/√Hz" : outcome.unit == "1" ? "" : outcome.unit;
}

/// Even steps of the logarithm.
bool is_geometric(const std::vector<double>& values) {
    if (values.size() < 3 || !(values[0] > 0.0) || !(values[1] > 0.0)) return false;
    const double first = values[1] / values[0];
    const double last = values[values.size() - 1] / values[values.size() - 2];
    return std::abs(first / last - 1.0) < 1e-6 && std::abs(first - 1.0) > 1e-3;
}

/// Positive values over more than two decades.
bool spans_decades(const std::vector<double>& values) {
    if (values.empty()) return false;
    const auto [low, high] = std::minmax_element(values.begin(), values.end());
    constexpr double two_decades = 100.0;
    return *low > 0.0 && *high > two_decades * *low;
}

Axis drawn_axis(const assess::SweepAxis& axis) {
    return Axis{with_unit(axis.title, axis_scale(axis).unit), is_geometric(axis.values), {}, {}};
}

std::vector<double> scaled(const assess::SweepAxis& axis) {
    std::vector<double> list;
    for (const double value : axis.values) list.push_back(value * axis_scale(axis).factor);
    return list;
}

/// The outcomes of one unit, as curves over the only axis.
struct Group {
    std::string unit;
    std::vector<Curve> curves;
    std::vector<double> all;
};

std::vector<Group> grouped(const assess::SweepPlan& plan, const SweepRows& rows) {
    const std::vector<double> x = scaled(plan.axes[0]);
    std::vector<Group> groups;
    for (std::size_t i = 0; i < plan.outcomes.size(); ++i) {
        const assess::Outcome& outcome = plan.outcomes[i];
        Curve curve;
        curve.name = outcome.title;
        curve.emphasised = outcome.key.rfind("total_", 0) == 0 && plan.outcomes.size() > 1;
        for (std::size_t point = 0; point < rows.size(); ++point) {
            const std::optional<double>& value = rows[point]->values[i];
            if (!value) continue;
            curve.x.push_back(x[point]);
            curve.y.push_back(drawn(outcome, *value));
        }
        if (curve.x.empty()) continue;
        const std::string unit = drawn_unit(outcome);
        auto group = std::find_if(groups.begin(), groups.end(),
                                  [&](const Group& known) { return known.unit == unit; });
        if (group == groups.end()) group = groups.insert(groups.end(), Group{unit, {}, {}});
        group->all.insert(group->all.end(), curve.y.begin(), curve.y.end());
        group->curves.push_back(std::move(curve));
    }
    return groups;
}

/// The words of an axis: the only curve's name, or what the unit says.
Axis value_axis(const Group& group, const std::string& where) {
    const std::string title = group.unit == "m/√Hz"      ? "displacement"
                              : group.curves.size() == 1 ? group.curves[0].name
                              : group.unit.empty()       ? "share of the light"
                                                         : "result";
    const bool noise = group.unit == "m/√Hz";
    return Axis{
        with_unit(noise ? title + where : title, group.unit), spans_decades(group.all), {}, {}};
}

/// Where the design itself stands.
std::optional<double> own_value(const stack::Design& design, const std::string& name) {
    if (name == "wavelength") return design.light.wavelength;
    if (name == "angle") return design.light.angle;
    if (name == "temperature") return design.temperature;
    if (name == "beam_radius") return design.beam_radius;
    const std::size_t dot = name.rfind('.');
    if (dot != std::string::npos && name.substr(dot) == ".thickness") return 1.0;
    return std::nullopt;
}

std::size_t units_of(const assess::SweepPlan& plan) {
    std::vector<std::string> units;
    for (const assess::Outcome& outcome : plan.outcomes) units.push_back(drawn_unit(outcome));
    std::sort(units.begin(), units.end());
    return static_cast<std::size_t>(std::unique(units.begin(), units.end()) - units.begin());
}

void draw_curves(const stack::Design& design, const assess::SweepPlan& plan, const SweepRows& rows,
                 const std::string& path, core::Existing existing) {
    std::vector<Group> groups = grouped(plan, rows);
    if (groups.empty()) {
        throw core::InputError("there is nothing to draw: no point has a value", "");
    }
    Figure figure;
    figure.title = design.title;
    figure.x = drawn_axis(plan.axes[0]);
    const bool over_frequency = plan.axes[0].name == "frequency";
    const std::string where = over_frequency ? "" : " at " + frequency_text(plan.frequency);
    figure.y = value_axis(groups[0], where);
    figure.curves = std::move(groups[0].curves);
    if (groups.size() > 1) {
        figure.second.emplace();
        figure.second->axis = value_axis(groups[1], where);
        figure.second->curves = std::move(groups[1].curves);
    }
    const auto own = own_value(design, plan.axes[0].name);
    const auto [low, high] =
        std::minmax_element(plan.axes[0].values.begin(), plan.axes[0].values.end());
    if (own && *own > *low && *own < *high) {
        figure.marks.push_back(Mark{*own * axis_scale(plan.axes[0]).factor, "design"});
    }
    draw(figure, path, existing);
}

void draw_map(const stack::Design& design, const assess::SweepPlan& plan, const SweepRows& rows,
              const std::string& path, core::Existing existing) {
    const assess::Outcome& outcome = plan.outcomes[0];
    Map map;
    map.title = design.title;
    map.y = drawn_axis(plan.axes[0]);
    map.x = drawn_axis(plan.axes[1]);
    map.y_values = scaled(plan.axes[0]);
    map.x_values = scaled(plan.axes[1]);
    std::vector<double> values;
    for (const auto& row : rows) {
        if (row->values[0]) values.push_back(drawn(outcome, *row->values[0]));
    }
    const bool over_frequency =
        plan.axes[0].name == "frequency" || plan.axes[1].name == "frequency";
    const std::string where = outcome.of_noise && !over_frequency
                                  ? " at " + frequency_text(plan.frequency)
                                  : std::string();
    map.z =
        Axis{with_unit(outcome.title + where, drawn_unit(outcome)), spans_decades(values), {}, {}};
    if (values.size() != rows.size()) {
        throw core::InputError("no figure: some points of the map have no value",
                               "narrow the ranges of --over");
    }
    map.z_values = std::move(values);
    draw(map, path, existing);
}

}  // namespace

void check_sweep_figure(const assess::SweepPlan& plan, const std::string& path,
                        const std::vector<std::string>& others, core::Existing existing) {
    check_figure_path(path, others, existing);
    if (plan.axes.size() == 2 && plan.outcomes.size() != 1) {
        throw core::InputError(
            fmt::format("a map shows one result, here are {}", plan.outcomes.size()),
            "choose one with --show, for example --show transmittance");
    }
    for (const assess::SweepAxis& axis : plan.axes) {
        if (plan.axes.size() == 2 && axis.values.front() > axis.values.back()) {
            throw core::InputError("a map needs axes that increase: " + axis.name,
                                   "exchange FROM and TO");
        }
    }
    if (plan.outcomes.size() > most_curves || units_of(plan) > 2) {
        throw core::InputError(
            fmt::format("a figure shows at most {} results in two units", most_curves),
            "choose them with --show");
    }
}

void draw_sweep(const stack::Design& design, const assess::SweepPlan& plan, const SweepRows& rows,
                const std::string& path, core::Existing existing) {
    if (plan.axes.size() == 2) {
        draw_map(design, plan, rows, path, existing);
    } else {
        draw_curves(design, plan, rows, path, existing);
    }
}

}  // namespace stillcoat::present
