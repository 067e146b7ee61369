#include "stillcoat/materials/library.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <filesystem>
#include <stdexcept>

#include "materials/entry_reader.hpp"
#include "materials/links.hpp"

namespace stillcoat::materials {
namespace {

using core::Node;
using core::TableReader;
namespace fs = std::filesystem;

void read_references(const core::Document& document, Library& library, core::Problems& problems) {
    for (const core::Entry& entry : document.root.entries) {
        TableReader reader(entry.value, "reference [" + entry.key + "]", problems);
        Reference reference;
        reference.citation = reader.required_text("citation");
        reference.doi = reader.text("doi").value_or("");
        reference.seen = reader.required_text("seen");
        reader.text("note");
        reader.finish();
        library.references[entry.key] = std::move(reference);
    }
}

/// The document of a file; its problems are added when it cannot be read.
std::optional<core::Document> read_or_report(const fs::path& file, core::Problems& problems) {
    try {
        return core::read_document(file.string());
    } catch (const core::InputError& failure) {
        for (const core::Problem& problem : failure.problems()) problems.add(problem);
        return std::nullopt;
    }
}

std::vector<std::string> property_keys() {
    std::vector<std::string> keys;
    for (const PropertyInfo& about : property_table()) keys.push_back(about.key);
    return keys;
}

void check_loss_forms(TableReader& reader) {
    for (const char* part : {"loss_angle_bulk", "loss_angle_shear"}) {
        if (reader.has("loss_angle") && reader.has(part)) {
            reader.contradiction(
                part, "loss_angle",
                "give loss_angle for both, or loss_angle_bulk with loss_angle_shear");
        }
    }
    if (reader.has("loss_angle")) return;
    if (reader.has("loss_angle_bulk") != reader.has("loss_angle_shear")) {
        const bool bulk = reader.has("loss_angle_bulk");
        reader.problem_at(bulk ? "loss_angle_bulk" : "loss_angle_shear",
                          fmt::format("{} in {} stands alone",
                                      bulk ? "loss_angle_bulk" : "loss_angle_shear", reader.name()),
                          "bulk and shear loss belong together: give both");
    }
}

/// Suggestions cost a comparison with every name: only so many are made.
constexpr int most_suggestions = 20;

/// Adds nothing for a material that exists.
template <typename Report>
void check_targets(const Library& library, const std::vector<Link>& links, int& suggestions,
                   Report&& report) {
    for (const auto& [target, property] : links) {
        if (library.materials.count(target) != 0) continue;
        std::optional<std::string> near;
        if (suggestions++ < most_suggestions)
            near = core::nearest_spelling(target, library.names());
        report(target, near ? fmt::format("did you mean \"{}\"?", *near) : "");
    }
}

/// The properties that cannot stand together in one table.
void check_exclusive_forms(TableReader& reader) {
    check_loss_forms(reader);
    if (reader.has("extinction_coefficient") && reader.has("absorption_coefficient")) {
        reader.contradiction("extinction_coefficient", "absorption_coefficient",
                             "each follows from the other: keep one of the two");
    }
}

/// Takes the named alternative of a property as its entry.
void choose_alternative(Material& material, PropertyId id, const Node& table,
                        const std::string& title, core::Problems& problems) {
    TableReader choice(table, title, problems);
    const std::string wanted = choice.text("alternative").value_or("");
    choice.finish();
    const auto known = material.properties.find(id);
    std::vector<std::string> names;
    if (known != material.properties.end()) {
        for (const Alternative& alternative : known->second.alternatives) {
            names.push_back(alternative.name);
            if (alternative.name != wanted) continue;
            Entry entry = alternative.entry;
            known->second.entry = std::move(entry);
            return;
        }
    }
    if (wanted.empty()) return;
    choice.problem_at(
        "alternative", fmt::format("{} has no alternative \"{}\"", title, wanted),
        names.empty() ? "it has none" : fmt::format("known: {}", fmt::join(names, ", ")));
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

std::vector<fs::path> toml_files(const std::string& folder) {
    std::error_code error;
    if (!fs::is_directory(folder, error)) {
        throw core::InputError(folder + ": no such folder of materials",
                               "it must hold one TOML file per material");
    }
    std::vector<fs::path> files;
    fs::directory_iterator item(folder, error);
    while (!error && item != fs::directory_iterator()) {
        if (item->path().extension() == ".toml") files.push_back(item->path());
        item.increment(error);
    }
    if (error) {
        throw core::InputError(
            fmt::format("{}: this folder of materials cannot be read: {}", folder, error.message()),
            "it must hold one TOML file per material");
    }
    std::sort(files.begin(), files.end());
    return files;
}

}  // namespace

const Material& Library::at(const std::string& name) const {
    const auto found = materials.find(name);
    if (found == materials.end()) throw std::logic_error("no material " + name);
    return found->second;
}

std::vector<std::string> Library::names() const {
    std::vector<std::string> list;
    for (const auto& [name, material] : materials) list.push_back(name);
    return list;
}

std::optional<Material> read_material(const core::Document& document, const Library& library,
                                      core::Problems& problems) {
    const std::size_t before = problems.size();
    TableReader reader(document.root, "material file", problems);
    Material material;
    material.file = document.name;
    material.name = reader.required_text("name");
    material.title = reader.required_text("title");
    if (!reader.has("form")) reader.missing("form", "\"film\"");
    material.form = reader.choice("form", {"film", "bulk", "metal"}).value_or("film");
    material.composition = reader.text("composition").value_or("");
    material.remark = reader.text("remark").value_or("");
    if (const Node* node = reader.table("unknown"); node != nullptr) {
        TableReader unknown(*node, "[unknown]", problems);
        for (const std::string& key : property_keys()) {
            if (const auto reason = unknown.text(key))
                material.unknown[*property_by_key(key)] = *reason;
        }
        unknown.finish();
    }
    check_exclusive_forms(reader);
    for (const PropertyInfo& about : property_table()) {
        const Node* node = reader.table(about.key);
        if (node == nullptr) continue;
        if (material.unknown.count(about.id) != 0) {
            reader.problem_at(about.key, about.key + " is given and listed under [unknown] too");
        }
        material.properties[about.id] =
            read_property(*node, "[" + about.key + "]", {&library, about.id, false}, problems);
    }
    reader.finish();
    const std::string stem = fs::path(document.name).stem().string();
    if (!material.name.empty() && material.name != stem) {
        reader.problem_at(
            "name", fmt::format("name \"{}\" differs from the file name {}", material.name, stem),
            "rename one of the two");
    }
    if (problems.size() != before) return std::nullopt;
    return material;
}

void add_references(Library& library, const std::string& folder, core::Problems& problems) {
    const fs::path file = fs::path(folder) / "references.toml";
    std::error_code error;
    if (!fs::exists(file, error)) return;
    if (const auto document = read_or_report(file, problems))
        read_references(*document, library, problems);
}

void add_folder(Library& library, const std::string& folder, core::Problems& problems) {
    const std::vector<fs::path> files = toml_files(folder);
    add_references(library, folder, problems);
    for (const fs::path& file : files) {
        if (file.filename() == "references.toml") continue;
        const auto document = read_or_report(file, problems);
        if (!document) continue;
        if (auto material = read_material(*document, library, problems)) {
            library.materials[material->name] = std::move(*material);
        }
    }
}

void check_links(const Library& library, core::Problems& problems) {
    LinkCheck check(library);
    int suggestions = 0;
    for (const auto& [name, material] : library.materials) {
        for (const auto& [id, property] : material.properties) {
            const core::Place place{material.file, 0, 0, 1, ""};
            const std::string& key = info(id).key;
            const auto report = [&](const std::string& target, const std::string& hint) {
                problems.add(place,
                             fmt::format("{} refers to the unknown material \"{}\"", key, target),
                             hint);
            };
            check_targets(library, links_of(name, id, property.entry), suggestions, report);
            for (const Alternative& other : property.alternatives)
                check_targets(library, links_of(name, id, other.entry), suggestions, report);
            const std::string fault = check.fault(name, id);
            if (!fault.empty()) problems.add(place, key + " " + fault);
        }
    }
}

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
        if (node->find("alternative") == nullptr) {
            material.properties[about.id] =
                read_property(*node, title, {&library, about.id, true}, problems);
        } else {
            choose_alternative(material, about.id, *node, title, problems);
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
