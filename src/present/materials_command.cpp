#include <fmt/format.h>

#include <filesystem>
#include <memory>

#include "present/command.hpp"
#include "present/material_template.hpp"
#include "present/materials_text.hpp"
#include "stillcoat/present/command_line.hpp"

/// `stillcoat materials` and `stillcoat units`.

namespace stillcoat::present {
namespace {

namespace fs = std::filesystem;

std::string nearest_material_hint(const materials::Library& library, const std::string& name) {
    const auto near = core::nearest_spelling(name, library.names());
    return near ? fmt::format("did you mean \"{}\"?", *near)
                : "`stillcoat materials` lists the known ones";
}

void require_material(const materials::Library& library, const std::string& name) {
    if (library.materials.count(name) != 0) return;
    throw core::InputError(fmt::format("unknown material \"{}\"", name),
                           nearest_material_hint(library, name));
}

struct MaterialsOptions {
    std::string name, property, temperature = "295 K", wavelength = "1064 nm", frequency = "100 Hz",
                                check;
    bool wants_template = false;
    std::vector<std::string> materials;
    Output output;
};

int materials_command(const std::string& program, const MaterialsOptions& options) {
    if (options.wants_template) {
        options.output.write(material_template());
        return fine;
    }
    const materials::Library library = load_library(program, options.materials);
    const bool colour = options.output.colour();
    if (!options.check.empty()) {
        core::Problems problems;
        materials::Library changed = library;
        if (fs::path(options.check).filename() == "references.toml") {
            throw core::InputError(
                options.check + ": holds references, not a material",
                "check a material file beside it; its references are read with it");
        }
        const fs::path folder = fs::path(options.check).parent_path();
        materials::add_references(changed, folder.empty() ? "." : folder.string(), problems);
        auto material =
            materials::read_material(core::read_document(options.check), changed, problems);
        if (material) {
            changed.materials[material->name] = *material;
            materials::check_links(changed, problems);
        }
        problems.throw_if_any();
        options.output.write(
            fmt::format("{}: no problems, {}\n", options.check,
                        count_text(material->properties.size(), "property table")));
        return fine;
    }
    if (options.name.empty()) {
        options.output.write(materials_list(library, colour));
        return fine;
    }
    require_material(library, options.name);
    if (options.property.empty()) {
        options.output.write(material_page(library, options.name, colour));
        return fine;
    }
    const auto property = materials::property_by_key(options.property);
    if (!property) {
        std::vector<std::string> keys;
        for (const auto& about : materials::property_table()) keys.push_back(about.key);
        const auto near = core::nearest_spelling(options.property, keys);
        throw core::InputError(fmt::format("unknown property \"{}\"", options.property),
                               near ? fmt::format("did you mean {}?", *near)
                                    : fmt::format("known: {}", fmt::join(keys, ", ")));
    }
    const materials::Conditions conditions{
        quantity_option("--temperature", options.temperature, core::kind::temperature),
        quantity_option("--wavelength", options.wavelength, core::kind::length),
        quantity_option("--frequency", options.frequency, core::kind::frequency)};
    options.output.write(property_page(library, options.name, *property, conditions, colour));
    return fine;
}

}  // namespace

Command add_materials(CLI::App& app, const std::string& program) {
    const auto options = std::make_shared<MaterialsOptions>();
    CLI::App* command = app.add_subcommand(
        "materials", "List the materials; show one with sources and validity; check a file");
    command->add_option("name", options->name, "a material")->type_name("NAME");
    command->add_option("property", options->property, "one of its properties")
        ->type_name("PROPERTY");
    command->add_option("--temperature", options->temperature, "[295 K]")->type_name("\"T K\"");
    command->add_option("--wavelength", options->wavelength, "[1064 nm]")->type_name("\"λ nm\"");
    command->add_option("--frequency", options->frequency, "[100 Hz]")->type_name("\"f Hz\"");
    command->add_option("--check", options->check, "check a material file")->type_name("FILE");
    command->add_flag("--template", options->wants_template, "a material file to fill in")
        ->excludes("name", "property", "--check");
    add_folder_option(*command, options->materials);
    add_output_options(*command, options->output);
    command->footer(
        "Examples:\n  stillcoat materials tantala-ibs\n"
        "  stillcoat materials --template --out my-film.toml\n"
        "  stillcoat materials silicon thermal_expansion --temperature \"123.5 K\"");

    return {command, [=] { return materials_command(program, *options); }};
}

Command add_units(CLI::App& app) {
    CLI::App* command = app.add_subcommand("units", "List the accepted units (also: --help units)");
    return {command, [] {
                const Output output;
                output.write(units_page(output.colour()));
                return fine;
            }};
}

}  // namespace stillcoat::present
