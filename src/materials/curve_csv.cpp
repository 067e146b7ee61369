#include "materials/curve_csv.hpp"

#include <fmt/format.h>

#include <filesystem>

#include "stillcoat/core/table_file.hpp"

namespace stillcoat::materials {
namespace {

constexpr int nanometre = -9;  // power of ten

std::string beside(const core::Node& name) {
    const std::filesystem::path folder = std::filesystem::path(name.place().file).parent_path();
    return (folder / name.text).string();
}

/// The table that a key names; problems without a place of their own are put at the key.
std::optional<core::TableFile> named_table(core::TableReader& reader, const std::string& key) {
    try {
        return core::read_table(beside(*reader.node().find(key)), reader.problems());
    } catch (const core::InputError& error) {
        for (const core::Problem& problem : error.problems()) {
            if (!problem.place.file.empty()) {
                reader.problems().add(problem);
                continue;
            }
            reader.problem_at(key, fmt::format("{} in {}: {}", key, reader.name(), problem.message),
                              "a path relative to the folder of this file");
        }
        return std::nullopt;
    }
}

}  // namespace

std::optional<WavelengthTable> read_curve_csv(core::TableReader& reader, const std::string& key,
                                              PropertyId property) {
    if (reader.required_text(key).empty()) return std::nullopt;
    const std::size_t before = reader.problems().size();
    const auto table = named_table(reader, key);
    const PropertyInfo& about = info(property);
    if (!table ||
        !core::check_columns(*table, {"wavelength_nm", about.key},
                             {"refractive_index", "extinction_coefficient"}, reader.problems())) {
        return std::nullopt;
    }
    const std::size_t x = *table->column("wavelength_nm");
    const std::size_t y = *table->column(about.key);
    WavelengthTable curve;
    for (const std::vector<core::Cell>& row : table->rows) {
        const auto wavelength = core::number_in(row[x], nanometre, core::positive("nm"),
                                                "wavelength_nm", reader.problems());
        const auto value = core::number_in(row[y], 0, about.limits, about.key, reader.problems());
        if (!wavelength || !value) continue;
        if (!curve.wavelength.empty() && *wavelength <= curve.wavelength.back()) {
            reader.problems().add(row[x].place, "wavelengths must increase from line to line");
            break;
        }
        curve.wavelength.push_back(*wavelength);
        curve.value.push_back(*value);
    }
    if (reader.problems().size() != before) return std::nullopt;
    if (curve.wavelength.size() < 2) {
        reader.problems().add(table->header.front().place,
                              "the table has fewer than two wavelengths",
                              "a curve needs two or more");
        return std::nullopt;
    }
    return curve;
}

void check_unread_extinction(core::TableReader& material) {
    const core::Node* index = material.node().find("refractive_index");
    const core::Node* file = index != nullptr && index->type == core::Node::Type::table
                                 ? index->find("wavelength_csv")
                                 : nullptr;
    if (file == nullptr || file->type != core::Node::Type::text ||
        material.has("extinction_coefficient") || material.has("absorption_coefficient")) {
        return;
    }
    core::Problems unused;  // the reader of the index reports them
    try {
        if (!core::read_table(beside(*file), unused).column("extinction_coefficient")) return;
    } catch (const core::InputError&) {
        return;
    }
    material.problem_at(
        "refractive_index",
        fmt::format("the column extinction_coefficient of {} would not be read", file->text),
        fmt::format("add extinction_coefficient = {{ wavelength_csv = \"{}\", ... }}, or take the "
                    "column out",
                    file->text));
}

}  // namespace stillcoat::materials
