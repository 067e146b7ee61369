#include "stillcoat/materials/library.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <filesystem>
#include <stdexcept>

#include "materials/entry_reader.hpp"
#include "materials/links.hpp"
#include "materials/mixture_reader.hpp"
#include "materials/mixture_value.hpp"

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
    const Material* found = find(name);
    if (found == nullptr) throw std::logic_error("no material " + name);
    return *found;
}

std::vector<std::string> Library::names() const {
    std::vector<std::string> list;
    for (const auto& [name, material] : materials) list.push_back(name);
    return list;
}

const Material* Library::find(const std::string& name) const {
    const auto found = materials.find(name);
    if (found != materials.end()) return &found->second;
    const auto scaled = kept.find(name);
    return scaled == kept.end() ? nullptr : find(scaled->second.name);
}

const Property* Library::property(const std::string& name, PropertyId id) const {
    const auto original = kept.find(name);
    if (original != kept.end()) {
        const auto found = original->second.properties.find(id);
        if (found != original->second.properties.end()) return &found->second;
    }
    const Material* material = find(name);
    if (material == nullptr) return nullptr;
    const auto found = material->properties.find(id);
    return found == material->properties.end() ? nullptr : &found->second;
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
    if (const Node* node = reader.table("mixture"); node != nullptr)
        read_mixture(*node, material, library, problems);
    reader.finish();
    // Names stand in CSV cells, in keys and on command lines.
    if (material.name.find_first_not_of("abcdefghijklmnopqrstuvwxyzABCDEFGHIJKLMNOPQRSTUVWXYZ"
                                        "0123456789._-") != std::string::npos) {
        reader.problem_at("name", fmt::format("name \"{}\" holds other characters", material.name),
                          "letters, digits, point, hyphen and underscore are allowed");
    }
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
    library.references.insert(mixture_references().begin(), mixture_references().end());
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

namespace {

/// The constituents of a mixture must exist and must not lead back to it: said once, not for each
/// property that follows from them.
void check_constituents(const Library& library, const Material& material, LinkCheck& check,
                        int& suggestions, core::Problems& problems) {
    const core::Place place{material.file, 0, 0, 1, ""};
    std::string fault;
    for (const auto& [id, property] : material.properties) {
        if (std::holds_alternative<Mixed>(property.entry.curve) && fault.empty())
            fault = check.fault(material.name, id);
    }
    if (!fault.empty()) problems.add(place, "[mixture] " + fault);
    const std::vector<Link> links{{material.mixture->first, PropertyId::density},
                                  {material.mixture->second, PropertyId::density}};
    check_targets(
        library, links, suggestions, [&](const std::string& target, const std::string& hint) {
            problems.add(place,
                         fmt::format("[mixture] refers to the unknown material \"{}\"", target),
                         hint);
        });
}

}  // namespace

void check_links(const Library& library, core::Problems& problems) {
    LinkCheck check(library);
    int suggestions = 0;
    for (const auto& [name, material] : library.materials) {
        if (material.mixture) check_constituents(library, material, check, suggestions, problems);
        for (const auto& [id, property] : material.properties) {
            if (std::holds_alternative<Mixed>(property.entry.curve)) continue;
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

}  // namespace stillcoat::materials
