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

/// What makes two sweeps the same.
Json plan_of(const assess::SweepPlan& plan) {
    Json axes = Json::array();
    for (const assess::SweepAxis& axis : plan.axes) {
        axes.push_back({{"name", axis.name}, {"values", axis.values}});
    }
    Json keys = Json::array();
    for (const assess::Outcome& outcome : plan.outcomes) keys.push_back(outcome.key);
    return {{"version", STILLCOAT_VERSION},
            {"over", std::move(axes)},
            {"show", std::move(keys)},
            {"noise_frequency_Hz", plan.frequency}};
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
    std::string text;
    for (const assess::SweepAxis& axis : plan.axes) {
        text += (text.empty() ? "" : ",") + axis_column(axis);
    }
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
                       const SweepRows& rows) {
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
                        {"points", std::move(points)}};
    return document.dump(2, ' ', false, Json::error_handler_t::replace) + "\n";
}

std::string unfinished_sweep(const assess::SweepPlan& plan, const SweepRows& rows) {
    Json done = Json::array();
    for (std::size_t point = 0; point < rows.size(); ++point) {
        if (rows[point]) done.push_back({point, values_of(*rows[point]), rows[point]->lack});
    }
    const Json document{{"document", "unfinished sweep"}, {"plan", plan_of(plan)}, {"done", done}};
    return document.dump(-1, ' ', false, Json::error_handler_t::replace) + "\n";
}

SweepRows read_unfinished_sweep(const std::string& text, const std::string& file,
                                const assess::SweepPlan& plan) {
    const auto refuse = [&](const std::string& what) {
        throw core::InputError(fmt::format("{}: {}", file, what),
                               "start the sweep without --resume, or remove the file");
    };
    SweepRows rows(plan.size());
    const Json document = Json::parse(text, nullptr, false);
    try {
        if (document.is_discarded() || document.at("document") != "unfinished sweep") {
            refuse("is no unfinished sweep");
        }
        // Through text, so that both sides have passed the same rounding.
        if (document.at("plan").dump() != Json::parse(plan_of(plan).dump()).dump()) {
            refuse("belongs to another sweep");
        }
        for (const Json& item : document.at("done")) {
            assess::SweepRow row;
            for (const Json& value : item.at(1)) {
                row.values.push_back(value.is_null() ? std::nullopt
                                                     : std::optional(value.get<double>()));
            }
            row.lack = item.at(2).get<std::string>();
            if (row.values.size() != plan.outcomes.size()) refuse("is damaged");
            rows.at(item.at(0).get<std::size_t>()) = std::move(row);
        }
    } catch (const Json::exception&) {
        refuse("is damaged");
    } catch (const std::out_of_range&) {
        refuse("is damaged");
    }
    return rows;
}

}  // namespace stillcoat::present
