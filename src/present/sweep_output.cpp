#include "present/sweep_output.hpp"

#include <fmt/format.h>

#include <nlohmann/json.hpp>

namespace stillcoat::present {
namespace {

using Json = nlohmann::ordered_json;

std::string axis_column(const assess::SweepAxis& axis) {
    return axis.unit == "1" ? axis.name : fmt::format("{}_{}", axis.name, unit_ending(axis.unit));
}

Json values_of(const assess::SweepRow& row) {
    Json list = Json::array();
    for (const std::optional<double>& value : row.values) {
        list.push_back(value ? Json(*value) : Json(nullptr));
    }
    return list;
}

}  // namespace

std::string unit_ending(const std::string& unit) {
    std::string ending;
    for (const char c : unit)
        ending += c == '/'                                           ? "_per_"
                  : std::isalnum(static_cast<unsigned char>(c)) != 0 ? std::string(1, c)
                                                                     : std::string();
    return ending.rfind("1_per_", 0) == 0 ? ending.substr(2) : ending;
}

std::string sweep_csv(const assess::SweepPlan& plan, const SweepRows& rows) {
    std::vector<std::string> names;
    for (const assess::SweepAxis& axis : plan.axes) names.push_back(axis_column(axis));
    std::string text = fmt::format("{}", fmt::join(names, ","));
    for (const assess::Outcome& outcome : plan.outcomes) text += "," + outcome.key;
    text += "\n";
    for (std::size_t point = 0; point < rows.size(); ++point) {
        if (!rows[point]) continue;
        for (std::size_t axis = 0; axis < plan.axes.size(); ++axis) {
            text += fmt::format("{}{}", axis == 0 ? "" : ",", plan.value(axis, point));
        }
        for (const std::optional<double>& value : rows[point]->values) {
            text += value ? fmt::format(",{}", *value) : ",";
        }
        text += "\n";
    }
    return text;
}

std::string sweep_json(const stack::Design& design, const assess::SweepPlan& plan,
                       const SweepRows& rows, const assess::SweepRemarks& remarks) {
    Json axes = Json::array();
    for (const assess::SweepAxis& axis : plan.axes) {
        axes.push_back({{"name", axis.name},
                        {"title", axis.title},
                        {"unit", axis.unit},
                        {"values", axis.values}});
    }
    Json shown = Json::array();
    for (const assess::Outcome& outcome : plan.outcomes) {
        shown.push_back({{"key", outcome.key}, {"title", outcome.title}, {"unit", outcome.unit}});
    }
    Json points = Json::array();
    for (std::size_t point = 0; point < rows.size(); ++point) {
        if (!rows[point]) continue;
        Json at = Json::array();
        for (std::size_t axis = 0; axis < plan.axes.size(); ++axis) {
            at.push_back(plan.value(axis, point));
        }
        const std::string& lack = rows[point]->lack;
        points.push_back({{"at", std::move(at)},
                          {"values", values_of(*rows[point])},
                          {"not_computed_because", lack.empty() ? Json(nullptr) : Json(lack)}});
    }
    const Json document{{"document", "sweep"},
                        {"program", "stillcoat"},
                        {"version", STILLCOAT_VERSION},
                        {"title", design.title},
                        {"design_file", design.document.name},
                        {"noise_frequency_Hz", plan.frequency},
                        {"over", std::move(axes)},
                        {"show", std::move(shown)},
                        {"complete", points.size() == rows.size()},
                        {"warnings_at_the_ends", remarks.warnings},
                        {"values_by_analogy_at_the_ends", remarks.analogies},
                        {"points", std::move(points)}};
    return document.dump(2, ' ', false, Json::error_handler_t::replace) + "\n";
}

}  // namespace stillcoat::present
