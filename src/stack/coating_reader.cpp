#include "stack/coating_reader.hpp"

#include <fmt/format.h>

#include <filesystem>

#include "stillcoat/stack/layer_table.hpp"

namespace stillcoat::stack {
namespace {

using core::Node;
using core::TableReader;
namespace kind = core::kind;

const core::Limits layer_quarter_waves{1e-9, 1e9, true, true, "from 1e-9 to 1e9"};

LayerInput read_layer(TableReader& reader, const materials::Library& library) {
    LayerInput layer{"", std::nullopt, std::nullopt, &reader.node(), {}};
    layer.material = reader.required_text("material");
    if (!layer.material.empty()) check_material(reader, "material", layer.material, library, {});
    layer.quarter_waves = reader.number("quarter_waves", layer_quarter_waves);
    layer.thickness = reader.quantity("thickness", kind::length, admissible::layer_thickness());
    if (reader.has("quarter_waves") && reader.has("thickness")) {
        reader.contradiction("thickness", "quarter_waves",
                             "a layer has one thickness: keep one of the two");
    } else if (!reader.has("quarter_waves") && !reader.has("thickness")) {
        reader.missing("thickness", "\"241.3 nm\", or quarter_waves = 1.0");
    }
    return layer;
}

/// Reads `repeat` and `layers`, in which an entry with layers of its own is a block inside.
void read_block(TableReader& reader, const materials::Library& library,
                std::vector<LayerInput>& layers) {
    const int repeat = reader.whole_number("repeat", 1, static_cast<int>(most_layers)).value_or(1);
    if (!reader.has("layers")) {
        reader.missing("layers", "[ { material = \"silica-ibs\", quarter_waves = 1.0 } ]");
    }
    std::vector<LayerInput> block;
    int count = 0;
    for (const Node* node : reader.tables("layers")) {
        const std::string name = fmt::format("layer {} of {}", ++count, reader.name());
        const bool inner = node->find("layers") != nullptr || node->find("repeat") != nullptr;
        TableReader entry(*node, inner ? "the block " + name : name, reader.problems());
        if (inner && entry.has("material") && !entry.has("layers")) {
            entry.problem_at("material", entry.name() + " repeats, so it needs layers of its own",
                             "write { repeat = 4, layers = [ { material = ... } ] }");
            return;
        }
        if (inner) {
            read_block(entry, library, block);
        } else {
            block.push_back(read_layer(entry, library));
        }
        entry.finish();
    }
    if (reader.has("layers") && block.empty() && reader.problems().empty()) {
        reader.problem_at("layers", reader.name() + " has no layers");
    }
    if (layers.size() + block.size() * static_cast<std::size_t>(repeat) > most_layers) {
        reader.problem_at(reader.has("repeat") ? "repeat" : "layers",
                          fmt::format("the stack has more than {} layers", most_layers),
                          "larger stacks are refused");
        return;
    }
    for (int i = 0; i < repeat; ++i) layers.insert(layers.end(), block.begin(), block.end());
}

/// The layers in the file that `table` names, beside the design file.
void read_table_key(TableReader& reader, const materials::Library& library, Coating& coating) {
    coating.table = reader.text("table").value_or("");
    if (coating.table.empty()) return;
    if (reader.has("block")) {
        reader.contradiction("table", "block",
                             "a coating has one list of layers: keep one of the two");
        reader.find("block");
        return;
    }
    try {
        coating.layers = read_layer_table(beside(reader.node().place().file, coating.table),
                                          library, reader.problems());
    } catch (const core::InputError& failure) {
        for (const core::Problem& problem : failure.problems()) {
            if (problem.place.file.empty()) {
                reader.problem_at("table", problem.message, problem.hint);
            } else {
                reader.problems().add(problem);
            }
        }
    }
}

}  // namespace

// An atom is 1e-10 m; above a metre no layer is one.
core::Limits admissible::layer_thickness() { return core::between(1e-15, 1.0, "m"); }

std::string beside(const std::string& design, const std::string& file) {
    return (std::filesystem::path(design).parent_path() / file).string();
}

void read_blocks(TableReader& reader, const std::string& key, const materials::Library& library,
                 std::vector<LayerInput>& layers) {
    // "[coating]" and "block" make "[[coating.block]]".
    const std::string& table = reader.name();
    const std::string blocks = fmt::format("[{}.{}]]", table.substr(0, table.size() - 1), key);
    const std::string hint = fmt::format("add {} with layers = [ ... ]", blocks);
    if (!reader.has(key)) {
        reader.find(key);
        reader.problems().add(reader.node().place(), "the coating has no layers", hint);
        return;
    }
    std::size_t number = 0;
    const std::size_t before = reader.problems().size();
    for (const Node* node : reader.tables(key)) {
        TableReader block(*node, fmt::format("{} {}", blocks, ++number), reader.problems());
        read_block(block, library, layers);
        block.finish();
    }
    if (layers.empty() && reader.problems().size() == before) {
        reader.problem_at(key, "the coating has no layers", hint);
    }
}

Coating read_coating(TableReader& reader, double wavelength, const materials::Library& library) {
    Coating coating{};
    coating.design_wavelength =
        reader.quantity("design_wavelength", kind::length, admissible::wavelength())
            .value_or(wavelength);
    coating.reference_temperature =
        reader.quantity("reference_temperature", kind::temperature, admissible::temperature())
            .value_or(295.0);
    const core::Limits factor{0.0, 100.0, false, true, "greater than 0, at most 100"};
    coating.excess_loss_stated = reader.has("excess_loss");
    coating.excess_loss = reader.number("excess_loss", factor).value_or(1.0);
    if (reader.has("table")) {
        read_table_key(reader, library, coating);
        return coating;
    }
    read_blocks(reader, "block", library, coating.layers);
    return coating;
}

}  // namespace stillcoat::stack
