#include "stillcoat/stack/design.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "stack/coating_reader.hpp"
#include "stack/part_reader.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/core/reader.hpp"

namespace stillcoat::stack {
namespace {

using core::Node;
using core::Problems;
using core::TableReader;
namespace kind = core::kind;

// What no mirror leaves, and within which no formula overflows.
const core::Limits frequency_limits = core::between(1e-12, 1e15, "Hz");
const core::Limits beam_limits = core::between(1e-9, 1e3, "m");
const core::Limits body_limits = core::between(1e-6, 1e3, "m");
const core::Limits power_limits = core::between(1e-30, 1e18, "W");

/// A length whose example is a beam radius.
const core::QuantityKind beam_radius_kind{"length", "m", "0.42 mm"};

/// The reader of a required table of the document.
std::optional<TableReader> section(TableReader& document, const std::string& key,
                                   const std::string& example) {
    if (!document.has(key)) {
        document.find(key);
        document.problems().add(core::Place{document.node().place().file, 0, 0, 1, ""},
                                fmt::format("[{}] is missing", key), "add " + example);
        return std::nullopt;
    }
    const Node* node = document.table(key);
    if (node == nullptr) return std::nullopt;
    return TableReader(*node, "[" + key + "]", document.problems());
}

Light read_light(TableReader& document, const materials::Library& library) {
    Light light{};
    auto reader = section(document, "light", "[light] with wavelength = \"1064 nm\"");
    if (!reader) return light;
    light.wavelength =
        reader->required_quantity("wavelength", kind::length, admissible::wavelength());
    const core::Limits acute{0.0, core::pi / 2.0, true, false, "from 0 deg to less than 90 deg"};
    light.angle = reader->quantity("angle", kind::angle, acute).value_or(0.0);
    const auto polarisation = reader->choice("polarisation", {"s", "p", "unpolarised"});
    if (light.angle > 0.0 && !reader->has("polarisation")) {
        reader->missing("polarisation", "\"s\", \"p\" or \"unpolarised\" (off normal incidence)");
    }
    light.polarisation_stated = polarisation.has_value();
    light.polarisation = polarisation == "p"             ? PolarisationChoice::p
                         : polarisation == "unpolarised" ? PolarisationChoice::unpolarised
                                                         : PolarisationChoice::s;
    light.medium = read_medium(*reader, library);
    light.from_rear = reader->choice("from", {"front", "rear"}) == "rear";
    if (light.from_rear && !document.has("rear_face")) {
        reader->problem_at("from", "light from the rear needs [rear_face]",
                           "add [rear_face]; an empty table is a bare rear face");
    }
    light.power = reader->quantity("power", kind::power, power_limits);
    reader->finish();
    return light;
}

MirrorBody read_mirror(TableReader& document, const materials::Library& library) {
    MirrorBody mirror;
    auto reader = section(document, "mirror", "[mirror] with substrate = \"fused-silica\"");
    if (!reader) return mirror;
    mirror.substrate = reader->required_text("substrate");
    if (!mirror.substrate.empty())
        check_material(*reader, "substrate", mirror.substrate, library, {});
    mirror.diameter = reader->quantity("diameter", kind::length, body_limits);
    mirror.thickness = reader->quantity("thickness", kind::length, body_limits);
    if (reader->has("diameter") != reader->has("thickness")) {
        const bool diameter = reader->has("diameter");
        reader->problem_at(
            diameter ? "diameter" : "thickness",
            fmt::format("{} in [mirror] stands alone", diameter ? "diameter" : "thickness"),
            "give diameter and thickness for a finite mirror, neither for a half-space");
    }
    read_surface(*reader, mirror);
    reader->finish();
    return mirror;
}

/// Powers of ten in the band, at most six from its beginning; its ends when there is none.
std::vector<double> powers_of_ten(const Band& band) {
    constexpr std::size_t most = 6;
    std::vector<double> list;
    for (int power = -300; power <= 300 && list.size() < most; ++power) {
        const double f = std::stod(fmt::format("1e{}", power));
        if (f >= band.from && f <= band.to) list.push_back(f);
    }
    if (list.empty()) list = {band.from, band.to};
    return list;
}

Band read_band(TableReader& document) {
    Band band{1.0, 1e4, 20, {1.0, 10.0, 100.0, 1000.0}};
    if (!document.has("band")) {
        document.find("band");
        return band;
    }
    const Node* node = document.table("band");
    if (node == nullptr) return band;
    TableReader reader(*node, "[band]", document.problems());
    band.from = reader.quantity("from", kind::frequency, frequency_limits).value_or(band.from);
    band.to = reader.quantity("to", kind::frequency, frequency_limits).value_or(band.to);
    band.points_per_decade = reader.whole_number("points_per_decade", 1, 1000).value_or(20);
    if (const auto spot = reader.quantities("spot", kind::frequency, frequency_limits)) {
        band.spot = *spot;
        std::vector<double> sorted = *spot;
        std::sort(sorted.begin(), sorted.end());
        if (sorted.empty() || std::adjacent_find(sorted.begin(), sorted.end()) != sorted.end()) {
            reader.problem_at("spot", "spot in [band] must hold at least one frequency, each once",
                              "leave it out for the powers of ten in the band");
        }
    } else if (reader.has("from") || reader.has("to")) {
        band.spot = powers_of_ten(band);
    }
    if (band.from >= band.to) {
        reader.problem_at("to",
                          fmt::format("the band ends at {:g} Hz, before it begins at {:g} Hz",
                                      band.to, band.from),
                          "to must lie above from");
    } else if (std::log10(band.to / band.from) * band.points_per_decade >
               static_cast<double>(most_frequencies)) {
        reader.problem_at("points_per_decade",
                          fmt::format("the band has more than {} frequencies", most_frequencies),
                          "take fewer points per decade");
    }
    reader.finish();
    return band;
}

void read_overrides(TableReader& document, Design& design, materials::Library& library) {
    const Node* node = document.table("material");
    if (node == nullptr) return;
    for (const core::Entry& entry : node->entries) {
        const std::string& name = entry.key;
        if (library.materials.count(name) == 0) {
            const auto near = core::nearest_spelling(name, library.names());
            document.problems().add(entry.value.place(),
                                    fmt::format("unknown material \"{}\"", name),
                                    near ? fmt::format("did you mean \"{}\"?", *near)
                                         : "`stillcoat materials` lists the known ones");
            continue;
        }
        materials::override_properties(library, name, entry.value, document.problems());
        Override replaced{name, {}};
        for (const core::Entry& value : entry.value.entries) {
            const Node* alternative = value.value.find("alternative");
            replaced.values.push_back({value.key, alternative != nullptr ? alternative->text : ""});
        }
        design.overrides.push_back(std::move(replaced));
    }
}

/// A stack and a band that are each admissible may take hours together.
void check_effort(const Design& design, Problems& problems) {
    if (!problems.empty()) return;
    const double points =
        std::log10(design.band.to / design.band.from) * design.band.points_per_decade +
        static_cast<double>(design.band.spot.size());
    const double layers = static_cast<double>(design.coating.layers.size());
    if (points * layers <= static_cast<double>(most_layer_frequencies)) return;
    problems.add(core::Place{design.document.name, 0, 0, 1, ""},
                 fmt::format("{:.0f} layers at {:.0f} frequencies: the product is above {}", layers,
                             points, most_layer_frequencies),
                 "take fewer points per decade, or a narrower [band]");
}

}  // namespace

core::Limits admissible::wavelength() { return core::between(1e-9, 1.0, "m"); }

core::Limits admissible::temperature() { return core::between(1e-3, 1e5, "K"); }

void check_material(TableReader& reader, const std::string& key, const std::string& name,
                    const materials::Library& library, const std::vector<std::string>& others) {
    if (library.materials.count(name) != 0) return;
    std::vector<std::string> names = library.names();
    names.insert(names.end(), others.begin(), others.end());
    reader.problem_at(key, fmt::format("unknown material \"{}\"", name),
                      known_materials_hint(name, names));
}

std::string known_materials_hint(const std::string& name, const std::vector<std::string>& names) {
    const auto near = core::nearest_spelling(name, names);
    return near ? fmt::format("did you mean \"{}\"? `stillcoat materials` lists all", *near)
                : "`stillcoat materials` lists the known ones";
}

core::Place LayerInput::place() const {
    return node != nullptr ? node->find("material")->place() : cell;
}

Design read_design(core::Document document, materials::Library& library) {
    Problems problems;
    Design design{};
    design.document = std::move(document);
    TableReader reader(design.document.root, "the design file", problems);
    design.title = reader.text("title").value_or("Untitled mirror");
    read_overrides(reader, design, library);
    design.light = read_light(reader, library);
    if (auto beam =
            section(reader, "beam", "[beam] with radius = \"0.42 mm\" (1/e² intensity radius)")) {
        design.beam_radius = beam->required_quantity("radius", beam_radius_kind, beam_limits);
        beam->finish();
    }
    design.mirror = read_mirror(reader, library);
    if (auto room = section(reader, "environment", "[environment] with temperature = \"295 K\"")) {
        design.temperature =
            room->required_quantity("temperature", kind::temperature, admissible::temperature());
        room->finish();
    }
    design.band = read_band(reader);
    if (auto coating = section(reader, "coating", "[coating] and at least one [[coating.block]]")) {
        design.coating = read_coating(*coating, design.light.wavelength, library);
        coating->finish();
    }
    design.rear_face = read_rear_face(reader, design.mirror, library);
    reader.finish();
    check_effort(design, problems);
    problems.throw_if_any();
    return design;
}

std::vector<std::string> files_beside(const Design& design) {
    std::vector<std::string> files;
    if (!design.coating.table.empty()) {
        files.push_back(beside(design.document.name, design.coating.table));
    }
    const Node* materials = design.document.root.find("material");
    if (materials == nullptr) return files;
    for (const core::Entry& material : materials->entries) {
        for (const core::Entry& property : material.value.entries) {
            const Node* curve = property.value.find("wavelength_csv");
            if (curve != nullptr) files.push_back(beside(design.document.name, curve->text));
        }
    }
    return files;
}

std::vector<double> frequencies(const Band& band) {
    if (band.from == band.to) return {band.from};
    const double decades = std::log10(band.to / band.from);
    const int intervals =
        std::max(1, static_cast<int>(std::lround(decades * band.points_per_decade)));
    std::vector<double> list;
    for (int i = 0; i < intervals; ++i) {
        // Round to twelve digits so that 10 Hz prints as 10 Hz.
        const double exact = band.from * std::pow(10.0, decades * i / intervals);
        list.push_back(std::stod(fmt::format("{:.11e}", exact)));
    }
    list.push_back(band.to);
    return list;
}

}  // namespace stillcoat::stack
