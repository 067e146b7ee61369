#include "materials/mixture_reader.hpp"

#include <fmt/format.h>

#include "materials/entry_reader.hpp"
#include "materials/mixture_value.hpp"

namespace stillcoat::materials {
namespace {

using core::TableReader;

/// The table itself: what the derived entries have in common.
struct MixtureTable {
    Mixed mixture;
    std::vector<std::string> sources;
    std::string place, note;
};

void read_constituents(TableReader& reader, const std::string& own, Mixed& mixture) {
    if (!reader.has("of")) {
        reader.missing("of", "[\"silica-ibs\", \"titania-ibs\"]");
        return;
    }
    const auto names = reader.texts("of");
    if (!names) return;
    if (names->size() != 2 || (*names)[0] == (*names)[1]) {
        reader.problem_at("of", "of in " + reader.name() + " must name two materials",
                          "for more, mix a mixture");
        return;
    }
    mixture.first = (*names)[0];
    mixture.second = (*names)[1];
    if (mixture.first == own || mixture.second == own)
        reader.problem_at("of", "of in " + reader.name() + " names the mixture itself");
}

MixtureTable read_table(const core::Node& table, const std::string& own, const Library& library,
                        core::Problems& problems) {
    TableReader reader(table, "[mixture]", problems);
    MixtureTable result{};
    read_constituents(reader, own, result.mixture);
    if (!reader.has("volume_fraction")) reader.missing("volume_fraction", "0.25");
    const core::Limits fraction{0.0, 1.0, true, true, "from 0 to 1, that of the second material"};
    result.mixture.fraction = reader.number("volume_fraction", fraction).value_or(0.5);
    const core::Limits width{0.0, 1.0, true, false, "from 0 to less than 1"};
    if (const core::Node* node = table.find("uncertainty");
        node != nullptr && node->type == core::Node::Type::text && node->text == "not stated") {
        reader.find("uncertainty");
    } else {
        result.mixture.fraction_uncertainty = reader.number("uncertainty", width);
    }
    result.sources =
        read_sources(reader, {&library, PropertyId::refractive_index, /*from_design=*/false});
    result.place = reader.text("place").value_or("");
    result.note = reader.text("note").value_or("");
    reader.finish();
    return result;
}

Entry derived_entry(const MixtureTable& table, const MixtureRule& rule) {
    Entry entry;
    entry.curve = table.mixture;
    entry.sources = table.sources;
    if (*rule.reference != '\0') entry.sources.emplace_back(rule.reference);
    entry.place = rule.words;
    if (!table.place.empty()) entry.place += "; the fraction: " + table.place;
    entry.nature = "derived";
    entry.status = fmt::format("derived: {}", rule.words);
    entry.note = table.note;
    return entry;
}

/// Whether the file says something of a property, in either of its forms.
bool is_stated(const Material& material, PropertyId id) {
    const auto said = [&material](PropertyId one) {
        return material.properties.count(one) != 0 || material.unknown.count(one) != 0;
    };
    if (said(id)) return true;
    if (id == PropertyId::extinction_coefficient) return said(PropertyId::absorption_coefficient);
    return id == PropertyId::loss_angle && said(PropertyId::loss_angle_bulk);
}

}  // namespace

void read_mixture(const core::Node& table, Material& material, const Library& library,
                  core::Problems& problems) {
    const MixtureTable read = read_table(table, material.name, library, problems);
    material.mixture = read.mixture;
    for (const MixtureRule& rule : mixture_rules()) {
        if (!is_stated(material, rule.property))
            material.properties[rule.property] = Property{derived_entry(read, rule), {}};
    }
    for (const PropertyId id : {PropertyId::thermo_optic_coefficient, PropertyId::photoelastic_p11,
                                PropertyId::photoelastic_p12, PropertyId::loss_angle}) {
        if (is_stated(material, id)) continue;
        material.unknown[id] =
            fmt::format("a mixture's {} follows from no rule: give it", info(id).title);
    }
}

}  // namespace stillcoat::materials
