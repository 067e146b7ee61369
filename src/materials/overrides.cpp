#include <fmt/format.h>

#include "materials/entry_reader.hpp"
#include "materials/links.hpp"
#include "stillcoat/materials/library.hpp"

/// What a design file puts in the place of library values.

namespace stillcoat::materials {
namespace {

using core::Node;
using core::TableReader;

/// Takes the named alternative of a property as its entry.
void choose_alternative(Material& material, PropertyId id, const Node& table,
                        const std::string& title, core::Problems& problems) {
    TableReader choice(table, title, problems);
    const std::string wanted = choice.text("alternative").value_or("");
    choice.finish();
    const auto known = material.properties.find(id);
    std::string names;
    if (known != material.properties.end()) {
        for (const Alternative& alternative : known->second.alternatives) {
            names += (names.empty() ? "" : ", ") + alternative.name;
            if (alternative.name != wanted) continue;
            Entry entry = alternative.entry;
            known->second.entry = std::move(entry);
            return;
        }
    }
    if (wanted.empty()) return;
    choice.problem_at("alternative", fmt::format("{} has no alternative \"{}\"", title, wanted),
                      names.empty() ? "it has none" : "known: " + names);
}

/// Why a property that the library does not have cannot be multiplied.
std::string other_form_hint(const Material& material, PropertyId id) {
    const auto has = [&material](PropertyId other) {
        return material.properties.count(other) != 0;
    };
    if (id == PropertyId::loss_angle && has(PropertyId::loss_angle_bulk))
        return "it has loss_angle_bulk and loss_angle_shear: multiply both";
    if (is_loss(id) && has(PropertyId::loss_angle)) return "it has loss_angle: multiply that";
    if (id == PropertyId::extinction_coefficient && has(PropertyId::absorption_coefficient))
        return "it has absorption_coefficient: multiply that";
    if (id == PropertyId::absorption_coefficient && has(PropertyId::extinction_coefficient))
        return "it has extinction_coefficient: multiply that";
    return "give a value";
}

/// What decides on a value in another way than a factor.
bool contradicts_factor(TableReader& reader) {
    for (const core::Entry& entry : reader.node().entries) {
        if (entry.key == "times" || entry.key == "source" || entry.key == "note") continue;
        reader.find(entry.key);
        reader.contradiction("times", entry.key,
                             "times multiplies the library's own value, range and width: only "
                             "source, and a note, go with it");
        return true;
    }
    return false;
}

/// The property becomes the library's own times a factor. The library's entry stays under a name
/// that no file can have; when a design is read twice over one library, the same one.
void multiply(Library& library, Material& material, PropertyId id, const Node& table,
              const std::string& title, core::Problems& problems) {
    TableReader reader(table, title, problems);
    if (contradicts_factor(reader)) {
        for (const core::Entry& entry : table.entries) reader.find(entry.key);
        return;
    }
    const core::Limits limits = core::between(smallest_factor, largest_factor, "");
    const double factor = reader.number("times", limits).value_or(1.0);
    Entry entry;
    entry.sources = read_sources(reader, {&library, id, /*from_design=*/true});
    entry.note = reader.text("note").value_or("");
    reader.finish();
    const auto known = material.properties.find(id);
    if (known == material.properties.end()) {
        reader.problem_at("times",
                          fmt::format("{} is unknown: there is nothing to multiply", title),
                          other_form_hint(material, id));
        return;
    }
    const std::string reserved = material.name + " (library)";
    const auto* before = std::get_if<SameAs>(&known->second.entry.curve);
    if (before == nullptr || !before->own) {
        Material& kept = library.kept[reserved];
        kept.name = material.name;
        kept.properties[id] = known->second;
    }
    entry.curve = SameAs{reserved, factor, true};
    entry.place = fmt::format("times {:g}", factor);
    entry.nature = "stated in the design file";
    entry.status = fmt::format("the library's times {:g}, stated in the design file", factor);
    known->second = Property{std::move(entry), {}};
}

/// Two forms of one thing exclude each other: the design's replaces the library's.
void drop_other_forms(Material& material, PropertyId id) {
    if (id == PropertyId::loss_angle) {
        material.properties.erase(PropertyId::loss_angle_bulk);
        material.properties.erase(PropertyId::loss_angle_shear);
    } else if (is_loss(id)) {
        material.properties.erase(PropertyId::loss_angle);
    }
    if (id == PropertyId::extinction_coefficient) {
        material.properties.erase(PropertyId::absorption_coefficient);
    } else if (id == PropertyId::absorption_coefficient) {
        material.properties.erase(PropertyId::extinction_coefficient);
    }
}

/// What a replaced property now refers to must exist and must not lead back to it.
void check_override_links(const Library& library, const std::string& name, PropertyId id,
                          const std::string& title, TableReader& reader) {
    const auto& properties = library.materials.at(name).properties;
    const auto changed = properties.find(id);
    if (changed == properties.end()) return;
    const std::string& key = info(id).key;
    int suggestions = 0;
    check_targets(
        library, links_of(name, id, changed->second.entry), suggestions,
        [&](const std::string& target, const std::string& hint) {
            reader.problem_at(
                key, fmt::format("{} refers to the unknown material \"{}\"", title, target), hint);
        });
    const std::string fault = LinkCheck(library).fault(name, id);
    if (!fault.empty()) reader.problem_at(key, title + " " + fault);
}

}  // namespace

void override_properties(Library& library, const std::string& name, const Node& table,
                         core::Problems& problems) {
    TableReader reader(table, fmt::format("[material.\"{}\"]", name), problems);
    Material& material = library.materials.at(name);
    check_exclusive_forms(reader);
    for (const PropertyInfo& about : property_table()) {
        const Node* node = reader.find(about.key);
        if (node == nullptr) continue;
        if (node->type != Node::Type::table) {
            const bool pure = about.kind->si_unit == "1";
            reader.problem_at(
                about.key, fmt::format("{} in {} must be a table", about.key, reader.name()),
                fmt::format("for example {} = {{ value = {}, source = \"...\" }}", about.key,
                            is_loss(about.id) ? "3e-4"
                            : pure            ? "0.2"
                                              : "\"" + about.kind->example + "\""));
            continue;
        }
        const std::string title = fmt::format("{} of {}", about.key, name);
        if (node->find("times") != nullptr) {
            multiply(library, material, about.id, *node, title, problems);
        } else if (node->find("alternative") != nullptr) {
            choose_alternative(material, about.id, *node, title, problems);
        } else {
            material.properties[about.id] =
                read_property(*node, title, {&library, about.id, true}, problems);
        }
        check_override_links(library, name, about.id, title, reader);
        material.unknown.erase(about.id);
        drop_other_forms(material, about.id);
    }
    reader.finish();
}

void replace_value(Library& library, const std::string& name, PropertyId property, double value,
                   const std::string& source) {
    Material& material = library.materials.at(name);
    Entry entry;
    entry.curve = Scalar{value};
    entry.sources = {source};
    entry.nature = entry.status = "stated in the design file";
    entry.from_design = true;
    material.properties[property] = Property{std::move(entry), {}};
    material.unknown.erase(property);
    drop_other_forms(material, property);
}

}  // namespace stillcoat::materials
