#include "stack/part_reader.hpp"

#include <fmt/format.h>

#include "stack/coating_reader.hpp"

namespace stillcoat::stack {
namespace {

using core::Node;
using core::TableReader;

const core::QuantityKind rms_kind{"length", "m", "0.1 nm"};
const core::QuantityKind spatial_frequency_kind{"spatial frequency", "1/m", "10 1/mm"};

// From far below an atom to what no polished face is left with; a band from kilometres to atoms.
const core::Limits rms_limits = core::between(1e-15, 1e-3, "m");
const core::Limits spatial_frequency_limits = core::between(1e-3, 1e12, "1/m");
const core::Limits fraction{0.0, 1.0, true, true, "from 0 to 1"};

std::optional<Roughness> read_roughness(TableReader& mirror) {
    const Node* node = mirror.table("roughness");
    if (node == nullptr) return std::nullopt;
    TableReader reader(*node, "roughness of [mirror]", mirror.problems());
    Roughness roughness{reader.required_quantity("rms", rms_kind, rms_limits), 0.0, 0.0};
    if (!reader.has("band")) {
        // An rms grows with the band it is taken over: alone it is no value.
        reader.missing("band", "[\"1 1/mm\", \"1000 1/mm\"], the spatial frequencies of the rms");
    }
    const auto band = reader.quantities("band", spatial_frequency_kind, spatial_frequency_limits);
    if (band && band->size() == 2 && band->front() < band->back()) {
        roughness.from = band->front();
        roughness.to = band->back();
    } else if (band) {
        reader.problem_at("band",
                          "band in roughness of [mirror] needs two spatial frequencies, the lower "
                          "one first",
                          "for example band = [\"1 1/mm\", \"1000 1/mm\"]");
    }
    reader.finish();
    return roughness;
}

std::optional<StatedScatter> read_scatter(TableReader& mirror) {
    const Node* node = mirror.table("scatter");
    if (node == nullptr) return std::nullopt;
    TableReader reader(*node, "scatter of [mirror]", mirror.problems());
    if (!reader.has("value")) reader.missing("value", "\"3 ppm\"");
    StatedScatter scatter{reader.number("value", fraction).value_or(0.0),
                          reader.required_text("source")};
    reader.finish();
    return scatter;
}

}  // namespace

std::string read_medium(TableReader& reader, const materials::Library& library) {
    const std::string medium = reader.text("medium").value_or("vacuum");
    if (medium != "vacuum" && medium != "air") {
        check_material(reader, "medium", medium, library, {"vacuum", "air"});
    }
    return medium;
}

void read_surface(TableReader& reader, MirrorBody& mirror) {
    mirror.roughness = read_roughness(reader);
    mirror.scatter = read_scatter(reader);
    if (reader.has("roughness") && reader.has("scatter")) {
        reader.contradiction("scatter", "roughness",
                             "scatter is stated, or it follows from the roughness: keep one");
    }
}

std::optional<RearFace> read_rear_face(TableReader& document, const MirrorBody& mirror,
                                       const materials::Library& library) {
    const Node* node = document.table("rear_face");
    if (node == nullptr) return std::nullopt;
    TableReader reader(*node, "[rear_face]", document.problems());
    RearFace face{};
    face.medium = read_medium(reader, library);
    face.passes = reader.choice("passes", {"intensities", "amplitudes"}) == "amplitudes"
                      ? Passes::amplitudes
                      : Passes::intensities;
    if (reader.has("block")) {
        read_blocks(reader, "block", library, face.layers);
    } else {
        reader.find("block");
    }
    if (!mirror.diameter && !mirror.thickness) {
        document.problems().add(node->place(), "[rear_face] stands behind a half-space",
                                "give diameter and thickness in [mirror]");
    }
    reader.finish();
    return face;
}

}  // namespace stillcoat::stack
