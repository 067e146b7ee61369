#include "stillcoat/materials/library.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <filesystem>
#include <stdexcept>

#include "materials/entry_reader.hpp"

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

/// The material that a rule or same_as of an entry points to.
std::vector<std::string> links_of(const Entry& entry) {
    std::vector<std::string> links;
    if (const auto* same = std::get_if<SameAs>(&entry.curve)) links.push_back(same->material);
    if (entry.beyond && entry.beyond->rule == Beyond::Rule::follows)
        links.push_back(entry.beyond->material);
    return links;
}

constexpr int longest_chain = 4;

bool runs_in_circle(const Library& library, const std::string& name, PropertyId id, int depth) {
    if (depth > longest_chain) return true;
    const auto material = library.materials.find(name);
    if (material == library.materials.end()) return false;
    const auto property = material->second.properties.find(id);
    if (property == material->second.properties.end()) return false;
    for (const std::string& link : links_of(property->second.entry)) {
        if (runs_in_circle(library, link, id, depth + 1)) return true;
    }
    return false;
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
    check_loss_forms(reader);
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
    std::error_code error;
    if (!fs::is_directory(folder, error)) {
        throw core::InputError(folder + ": no such folder of materials",
                               "it must hold one TOML file per material");
    }
    std::vector<fs::path> files;
    for (const fs::directory_entry& item : fs::directory_iterator(folder)) {
        if (item.path().extension() == ".toml") files.push_back(item.path());
    }
    std::sort(files.begin(), files.end());
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
    for (const auto& [name, material] : library.materials) {
        for (const auto& [id, property] : material.properties) {
            const core::Place place{material.file, 0, 0, 1, ""};
            std::vector<std::string> links = links_of(property.entry);
            for (const Alternative& other : property.alternatives) {
                for (std::string& link : links_of(other.entry)) links.push_back(std::move(link));
            }
            for (const std::string& link : links) {
                if (library.materials.count(link) != 0) continue;
                const auto near = core::nearest_spelling(link, library.names());
                problems.add(
                    place,
                    fmt::format("{} refers to the unknown material \"{}\"", info(id).key, link),
                    near ? fmt::format("did you mean \"{}\"?", *near) : "");
            }
            if (runs_in_circle(library, name, id, 0)) {
                problems.add(place,
                             fmt::format("{} refers to other materials in a circle", info(id).key));
            }
        }
    }
}

void override_properties(Library& library, const std::string& name, const Node& table,
                         core::Problems& problems) {
    TableReader reader(table, fmt::format("[material.\"{}\"]", name), problems);
    Material& material = library.materials.at(name);
    check_loss_forms(reader);
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
            TableReader choice(*node, title, problems);
            const std::string wanted = choice.text("alternative").value_or("");
            choice.finish();
            const auto known = material.properties.find(about.id);
            const Alternative* found = nullptr;
            std::vector<std::string> names;
            if (known != material.properties.end()) {
                for (const Alternative& alternative : known->second.alternatives) {
                    names.push_back(alternative.name);
                    if (alternative.name == wanted) found = &alternative;
                }
            }
            if (found != nullptr) {
                Entry entry = found->entry;
                known->second.entry = std::move(entry);
            } else if (!wanted.empty()) {
                choice.problem_at("alternative",
                                  fmt::format("{} has no alternative \"{}\"", title, wanted),
                                  names.empty() ? "it has none"
                                                : fmt::format("known: {}", fmt::join(names, ", ")));
            }
        }
        const auto changed = material.properties.find(about.id);
        if (changed != material.properties.end()) {
            for (const std::string& link : links_of(changed->second.entry)) {
                if (library.materials.count(link) != 0) continue;
                const auto near = core::nearest_spelling(link, library.names());
                reader.problem_at(
                    about.key, fmt::format("{} refers to the unknown material \"{}\"", title, link),
                    near ? fmt::format("did you mean \"{}\"?", *near) : "");
            }
            if (runs_in_circle(library, name, about.id, 0)) {
                reader.problem_at(about.key, title + " refers to other materials in a circle");
            }
        }
        material.unknown.erase(about.id);
        // The two forms of the loss exclude each other: the design's replaces the library's.
        if (about.id == PropertyId::loss_angle) {
            material.properties.erase(PropertyId::loss_angle_bulk);
            material.properties.erase(PropertyId::loss_angle_shear);
        } else if (is_loss(about.id)) {
            material.properties.erase(PropertyId::loss_angle);
        }
        if (about.id == PropertyId::extinction_coefficient) {
            material.properties.erase(PropertyId::absorption_coefficient);
        } else if (about.id == PropertyId::absorption_coefficient) {
            material.properties.erase(PropertyId::extinction_coefficient);
        }
    }
    reader.finish();
}

}  // namespace stillcoat::materials
