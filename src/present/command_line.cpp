#include "stillcoat/present/command_line.hpp"

#include <fmt/format.h>
#include <unistd.h>

#include <CLI/CLI.hpp>
#include <algorithm>
#include <cstdio>
#include <cstdlib>
#include <filesystem>
#include <iostream>

#include "present/appraisal_json.hpp"
#include "present/appraisal_text.hpp"
#include "present/materials_text.hpp"
#include "stillcoat/core/file_writer.hpp"

namespace stillcoat::present {
namespace {

namespace fs = std::filesystem;

struct Output {
    std::string path = "-";
    bool replace = false;

    void write(const std::string& text) const {
        core::write_file(path, text, replace ? core::Existing::replace : core::Existing::keep);
    }
    /// Colour only where a person reads it, and not where NO_COLOR (no-color.org) forbids it.
    bool colour() const {
        return path == "-" && ::isatty(STDOUT_FILENO) == 1 && std::getenv("NO_COLOR") == nullptr;
    }
};

/// The folder of materials that belongs to this program: beside an installed program, else in the
/// source tree that it was built from.
std::string own_materials(const std::string& program) {
    std::error_code error;
    const fs::path real = fs::read_symlink("/proc/self/exe", error);
    const fs::path self = error ? fs::path(program) : real;
    const fs::path installed =
        (self.parent_path() / STILLCOAT_DATA_FROM_PROGRAM / "materials").lexically_normal();
    if (fs::is_directory(installed, error)) return installed.string();
    if (fs::is_directory(STILLCOAT_BUILD_MATERIALS, error)) return STILLCOAT_BUILD_MATERIALS;
    throw core::InputError(fmt::format("the materials folder is missing: neither {} nor {}",
                                       installed.string(), STILLCOAT_BUILD_MATERIALS),
                           "reinstall, or name folders with --materials");
}

materials::Library load_library(const std::string& program,
                                const std::vector<std::string>& folders) {
    materials::Library library;
    core::Problems problems;
    materials::add_folder(library, own_materials(program), problems);
    for (const std::string& folder : folders) materials::add_folder(library, folder, problems);
    materials::check_links(library, problems);
    problems.throw_if_any();
    return library;
}

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

double quantity_option(const std::string& option, const std::string& text,
                       const core::QuantityKind& kind) {
    const core::QuantityReading reading = core::read_quantity(text, kind);
    if (!reading.ok)
        throw core::InputError(option + ": " + reading.failure.message, reading.failure.hint);
    if (!(reading.value > 0.0)) throw core::InputError(option + " must be greater than 0", "");
    return reading.value;
}

struct AppraiseOptions {
    std::string design;
    std::vector<std::string> materials;
    bool json = false, all_layers = false, strict = false;
    std::string csv;
    Output output;
};

/// Says which terms of the total are missing; refuses to go on without them when that was asked
/// for.
void report_missing_terms(const assess::Noise& noise, bool strict) {
    if (!noise.computed && strict) {
        throw core::InputError("noise not computed: " + noise.missing,
                               "refused because of --strict; nothing was written");
    }
    for (const assess::NoiseTerm& term : noise.terms) {
        if (term.missing.empty()) continue;
        const std::string message = fmt::format("{} not computed: {}", term.title, term.missing);
        if (strict)
            throw core::InputError(message, "refused because of --strict; nothing was written");
        fmt::print(stderr, "warning: {}\n", message);
    }
}

int appraise_command(const std::string& program, const AppraiseOptions& options) {
    materials::Library library = load_library(program, options.materials);
    core::Document document =
        options.design == "-"
            ? core::parse_document(core::read_text_file("/dev/stdin"), "standard input")
            : core::read_document(options.design);
    const stack::Design design = stack::read_design(std::move(document), library);
    const assess::Appraisal appraisal = assess::appraise(design, library);
    report_missing_terms(appraisal.noise, options.strict);
    std::string text;
    if (options.json) {
        text = appraisal_json(design, library, appraisal);
    } else if (!options.csv.empty()) {
        const CsvTable table = options.csv == "noise"    ? CsvTable::noise
                               : options.csv == "layers" ? CsvTable::layers
                                                         : CsvTable::field;
        text = appraisal_csv(appraisal, table);
    } else {
        text = appraisal_text(design, library, appraisal,
                              {options.output.colour(), options.all_layers});
    }
    options.output.write(text);
    return fine;
}

struct MaterialsOptions {
    std::string name, property, temperature = "295 K", wavelength = "1064 nm", frequency = "100 Hz",
                                check;
    std::vector<std::string> materials;
    Output output;
};

int materials_command(const std::string& program, const MaterialsOptions& options) {
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

void add_output(CLI::App& command, Output& output) {
    command.add_option("-o,--out", output.path, "write to this file; - is standard output")
        ->type_name("FILE");
    command.add_flag("--replace", output.replace, "overwrite an existing file");
}

void add_materials(CLI::App& command, std::vector<std::string>& folders) {
    command
        .add_option("--materials", folders,
                    "folder of material files that add to or replace the library's")
        ->type_name("DIR")
        ->expected(1);
}

int guarded(const std::function<int()>& command) {
    try {
        return command();
    } catch (const core::InputError& error) {
        std::fputs((std::string(error.what()) + "\n").c_str(), stderr);
        if (error.problems().size() > 1)
            fmt::print(stderr, "{} problems\n", error.problems().size());
        return bad_input;
    } catch (const core::DomainError& error) {
        fmt::print(stderr, "{}\n", error.what());
        return bad_input;
    } catch (const std::bad_alloc&) {
        fmt::print(stderr, "not enough memory\n");
        return no_answer;
    } catch (const std::exception& error) {
        fmt::print(stderr, "stillcoat made a mistake: {}\nPlease report it with the design file.\n",
                   error.what());
        return our_mistake;
    }
}

}  // namespace

int run(const std::string& program, const std::vector<std::string>& arguments) {
    CLI::App app{
        "Stillcoat: low-noise mirror coatings. One design file in, optics and thermal noise out.",
        "stillcoat"};
    app.set_version_flag("--version", std::string("stillcoat ") + STILLCOAT_VERSION);
    app.require_subcommand(0, 1);
    app.footer(
        "Example:\n  stillcoat appraise examples/end-mirror/design.toml\n\n"
        "Exit codes: 0 fine, 1 a requirement is not met, 2 bad input, 3 no answer, 4 our mistake.\n"
        "Work with lasers, vacuum and cryogens follows local rules and licensed practice.");

    AppraiseOptions appraise;
    CLI::App* appraise_app = app.add_subcommand(
        "appraise",
        "Judge one mirror: reflectance, transmittance, absorptance, field, stored energy, noise");
    appraise_app->add_option("design", appraise.design, "the design file; - reads standard input")
        ->type_name("DESIGN.toml")
        ->required();
    add_materials(*appraise_app, appraise.materials);
    auto* json = appraise_app->add_flag("--json", appraise.json, "everything as a JSON document");
    appraise_app->add_option("--csv", appraise.csv, "one table as CSV: noise, layers or field")
        ->check(CLI::IsMember({"noise", "layers", "field"}))
        ->type_name("TABLE")
        ->excludes(json);
    appraise_app->add_flag("--all-layers", appraise.all_layers, "show every layer of a long stack");
    appraise_app->add_flag("--strict", appraise.strict,
                           "exit code 2 when a noise term cannot be computed");
    add_output(*appraise_app, appraise.output);
    appraise_app->footer("Example:\n  stillcoat appraise mirror.toml --csv noise --out noise.csv");

    MaterialsOptions materials;
    CLI::App* materials_app = app.add_subcommand(
        "materials", "List the materials; show one with sources and validity; check a file");
    materials_app->add_option("name", materials.name, "a material")->type_name("NAME");
    materials_app->add_option("property", materials.property, "one of its properties")
        ->type_name("PROPERTY");
    materials_app->add_option("--temperature", materials.temperature, "[295 K]")
        ->type_name("\"T K\"");
    materials_app->add_option("--wavelength", materials.wavelength, "[1064 nm]")
        ->type_name("\"λ nm\"");
    materials_app->add_option("--frequency", materials.frequency, "[100 Hz]")
        ->type_name("\"f Hz\"");
    materials_app->add_option("--check", materials.check, "check a material file")
        ->type_name("FILE");
    add_materials(*materials_app, materials.materials);
    add_output(*materials_app, materials.output);
    materials_app->footer(
        "Examples:\n  stillcoat materials tantala-ibs\n"
        "  stillcoat materials silicon thermal_expansion --temperature \"123.5 K\"");

    CLI::App* units_app =
        app.add_subcommand("units", "List the accepted units (also: --help units)");

    std::vector<std::string> reversed(arguments.rbegin(), arguments.rend());
    // `--help units` is easier to find than the command.
    if (arguments.size() == 2 && (arguments[0] == "--help" || arguments[0] == "-h") &&
        arguments[1] == "units") {
        reversed = {"units"};
    }
    const std::vector<std::string> commands{"appraise", "materials", "units"};
    if (!arguments.empty() && arguments[0].rfind('-', 0) != 0 &&
        std::find(commands.begin(), commands.end(), arguments[0]) == commands.end()) {
        const auto near = core::nearest_spelling(arguments[0], commands);
        fmt::print(stderr, "unknown command \"{}\"\n       {}\n", arguments[0],
                   near ? fmt::format("did you mean {}?", *near)
                        : "`stillcoat --help` lists the commands");
        return bad_input;
    }
    try {
        app.parse(reversed);
    } catch (const CLI::ParseError& error) {
        const int code = app.exit(error, std::cout, std::cerr);
        return code == 0 ? fine : bad_input;
    }
    if (appraise_app->parsed()) return guarded([&] { return appraise_command(program, appraise); });
    if (materials_app->parsed())
        return guarded([&] { return materials_command(program, materials); });
    if (units_app->parsed()) {
        return guarded([] {
            Output output;
            output.write(units_page(output.colour()));
            return fine;
        });
    }
    std::cout << app.help();
    return fine;
}

}  // namespace stillcoat::present
