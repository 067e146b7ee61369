#include "stillcoat/stack/layer_table.hpp"

#include <fmt/format.h>

#include "stack/coating_reader.hpp"
#include "stillcoat/core/table_file.hpp"

namespace stillcoat::stack {
namespace {

constexpr int nanometre = -9;  // power of ten

/// The number column, when there is one, must count from 1: a table that was cut or sorted is
/// found.
bool check_number(const core::Cell& cell, std::size_t expected, core::Problems& problems) {
    if (cell.text == std::to_string(expected)) return true;
    problems.add(cell.place, fmt::format("layer {} is numbered \"{}\"", expected, cell.text),
                 "layers count from 1, the outermost; leave the column out if it does not matter");
    return false;
}

/// The limits of a layer in the unit of the column.
core::Limits in_nanometres() {
    core::Limits limits = admissible::layer_thickness();
    limits.words = "from 1e-6 nm to 1e9 nm";
    return limits;
}

void check_known(const core::Cell& cell, const materials::Library& library,
                 core::Problems& problems) {
    if (library.materials.count(cell.text) != 0) return;
    problems.add(cell.place, fmt::format("unknown material \"{}\"", cell.text),
                 known_materials_hint(cell.text, library.names()));
}

}  // namespace

Mirror as_coated(const Design& design, const materials::Library& library, Ledger& ledger) {
    Design coated = design;
    coated.light.wavelength = design.coating.design_wavelength;
    coated.light.angle = 0.0;
    coated.temperature = design.coating.reference_temperature;
    return at_operating_point(coated, library, ledger);
}

std::string layer_table(const Mirror& coated) {
    std::string text =
        "number,material,thickness_nm,quarter_waves,refractive_index,extinction_coefficient,"
        "total_thickness_nm\n";
    double total = 0.0;
    std::size_t number = 0;
    for (const MirrorLayer& layer : coated.layers) {
        total += layer.thickness;
        text += fmt::format(
            "{},{},{},{},{},{},{}\n", ++number, layer.material,
            core::shifted_decimal(layer.reference_thickness, nanometre), layer.quarter_waves,
            layer.optical.index.value,
            layer.optical.extinction_known ? fmt::format("{}", layer.optical.extinction.value) : "",
            core::shifted_decimal(total, nanometre));
    }
    return text;
}

std::vector<LayerInput> read_layer_table(const std::string& path, const materials::Library& library,
                                         core::Problems& problems) {
    const core::TableFile table = core::read_table(path, problems);
    std::vector<LayerInput> layers;
    if (!core::check_columns(table, {"material", "thickness_nm"},
                             {"number", "quarter_waves", "refractive_index",
                              "extinction_coefficient", "total_thickness_nm"},
                             problems)) {
        return layers;
    }
    if (table.rows.empty() && !problems.empty()) return layers;
    if (table.rows.empty() || table.rows.size() > most_layers) {
        problems.add(table.header.front().place,
                     table.rows.empty()
                         ? "the table has no layers"
                         : fmt::format("the stack has more than {} layers", most_layers),
                     table.rows.empty() ? "one line for each layer" : "larger stacks are refused");
        return layers;
    }
    const std::size_t material = *table.column("material");
    const std::size_t thickness = *table.column("thickness_nm");
    const auto number = table.column("number");
    bool counted = true;  // the first break of the numbers says it all
    for (const std::vector<core::Cell>& row : table.rows) {
        if (number && counted) {
            counted = check_number(row[*number], layers.size() + 1, problems);
        }
        check_known(row[material], library, problems);
        layers.push_back(
            {row[material].text, std::nullopt,
             core::number_in(row[thickness], nanometre, in_nanometres(), "thickness_nm", problems),
             nullptr, row[material].place});
    }
    return layers;
}

}  // namespace stillcoat::stack
