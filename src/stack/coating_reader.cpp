#include "stack/coating_reader.hpp"

#include <fmt/format.h>

#include <limits>

namespace stillcoat::stack {
namespace {

using core::Node;
using core::TableReader;
namespace kind = core::kind;

/// A file with this many problems is not read further: the rest would only repeat them.
constexpr std::size_t enough_problems = 50;

LayerInput read_layer(const Node& node, int number, const materials::Library& library,
                      core::Problems& problems) {
    TableReader reader(node, fmt::format("layer {} of the block", number), problems);
    LayerInput layer{"", std::nullopt, std::nullopt, &node};
    layer.material = reader.required_text("material");
    if (!layer.material.empty()) check_material(reader, "material", layer.material, library, {});
    layer.quarter_waves = reader.number("quarter_waves", core::positive(""));
    layer.thickness = reader.quantity("thickness", kind::length, core::positive("m"));
    if (reader.has("quarter_waves") && reader.has("thickness")) {
        reader.contradiction("thickness", "quarter_waves",
                             "a layer has one thickness: keep one of the two");
    } else if (!reader.has("quarter_waves") && !reader.has("thickness")) {
        reader.missing("thickness", "\"241.3 nm\", or quarter_waves = 1.0");
    }
    reader.finish();
    return layer;
}

void read_block(const Node& node, std::size_t number, const materials::Library& library,
                core::Problems& problems, std::vector<LayerInput>& layers) {
    TableReader reader(node, fmt::format("[[coating.block]] {}", number), problems);
    const int repeat = reader.whole_number("repeat", 1, static_cast<int>(most_layers)).value_or(1);
    if (!reader.has("layers")) {
        reader.missing("layers", "[ { material = \"silica-ibs\", quarter_waves = 1.0 } ]");
    }
    std::vector<LayerInput> block;
    int count = 0;
    for (const Node* layer : reader.tables("layers")) {
        if (problems.size() > enough_problems) break;
        block.push_back(read_layer(*layer, ++count, library, problems));
    }
    if (reader.has("layers") && block.empty() && problems.empty()) {
        reader.problem_at("layers", reader.name() + " has no layers");
    }
    reader.finish();
    if (layers.size() + block.size() * static_cast<std::size_t>(repeat) > most_layers) {
        reader.problem_at("repeat", fmt::format("the stack has more than {} layers", most_layers),
                          "larger stacks are refused");
        return;
    }
    for (int i = 0; i < repeat; ++i) layers.insert(layers.end(), block.begin(), block.end());
}

}  // namespace

Coating read_coating(TableReader& reader, double wavelength, const materials::Library& library) {
    Coating coating{};
    coating.design_wavelength =
        reader.quantity("design_wavelength", kind::length, core::positive("m"))
            .value_or(wavelength);
    coating.reference_temperature =
        reader.quantity("reference_temperature", kind::temperature, core::positive("K"))
            .value_or(295.0);
    const core::Limits factor{0.0, 100.0, false, true, "greater than 0, at most 100"};
    coating.excess_loss_stated = reader.has("excess_loss");
    coating.excess_loss = reader.number("excess_loss", factor).value_or(1.0);
    if (!reader.has("block")) {
        reader.find("block");
        reader.problems().add(reader.node().place(), "the coating has no layers",
                              "add [[coating.block]] with layers = [ ... ]");
    }
    std::size_t number = 0;
    const std::size_t before = reader.problems().size();
    for (const Node* node : reader.tables("block")) {
        read_block(*node, ++number, library, reader.problems(), coating.layers);
        if (reader.problems().size() > enough_problems) break;
    }
    if (reader.has("block") && coating.layers.empty() && reader.problems().size() == before) {
        reader.problem_at("block", "the coating has no layers",
                          "add [[coating.block]] with layers = [ ... ]");
    }
    return coating;
}

}  // namespace stillcoat::stack
