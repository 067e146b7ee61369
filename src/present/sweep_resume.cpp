#include "present/sweep_resume.hpp"

#include <fmt/format.h>

#include <cstdint>
#include <nlohmann/json.hpp>

#include "stillcoat/core/document.hpp"

namespace stillcoat::present {
namespace {

using Json = nlohmann::ordered_json;

Json values_of(const assess::SweepRow& row) {
    Json list = Json::array();
    for (const std::optional<double>& value : row.values) {
        list.push_back(value ? Json(*value) : Json(nullptr));
    }
    return list;
}

/// What makes two sweeps the same.
    Json plan_of(const assess::SweepPlan& plan, const std::string& fingerprint) {
        Json axes = Json::array();
        for (const assess::SweepAxis& axis : plan.axes) {
            axes.push_back({{"name", axis.name}, {"values", axis.values}});
        }
        Json keys = Json::array();
        for (const assess::Outcome& outcome : plan.outcomes) keys.push_back(outcome.key);
        return {{"version", STILLCOAT_VERSION},
                {"over", std::move(axes)},
                {"show", std::move(keys)},
                {"noise_frequency_Hz", plan.frequency},
                {"inputs", fingerprint}};
    }

}  // namespace

std::string fingerprint(const std::vector<std::string>& files) {
    // FNV-1a, 64 bits: finds a change, does not resist forgery.
    std::uint64_t hash = 14695981039346656037ULL;
    for (const std::string& file : files) {
        for (const char c : core::read_text_file(file) + '\0') {
            hash = (hash ^ static_cast<unsigned char>(c)) * 1099511628211ULL;
        }
    }
    return fmt::format("{:016x}", hash);
}

std::string unfinished_sweep(const assess::SweepPlan& plan, const std::string& fingerprint,
                             const SweepRows& rows) {
    Json done = Json::array();
    for (std::size_t point = 0; point < rows.size(); ++point) {
        if (rows[point]) done.push_back({point, values_of(*rows[point]), rows[point]->lack});
    }
    const Json document{
        {"document", "unfinished sweep"}, {"plan", plan_of(plan, fingerprint)}, {"done", done}};
    return document.dump(-1, ' ', false, Json::error_handler_t::replace) + "\n";
}

SweepRows read_unfinished_sweep(const std::string& text, const std::string& file,
                                const assess::SweepPlan& plan, const std::string& fingerprint) {
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
        if (document.at("plan").dump() != Json::parse(plan_of(plan, fingerprint).dump()).dump()) {
            refuse("belongs to another sweep, or the design or a material has changed");
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
