#include <fmt/format.h>

#include <cstdio>
#include <memory>

#include "present/appraisal_csv.hpp"
#include "present/appraisal_figure.hpp"
#include "present/appraisal_json.hpp"
#include "present/appraisal_text.hpp"
#include "present/command.hpp"
#include "present/figure.hpp"
#include "stillcoat/present/command_line.hpp"

/// `stillcoat appraise`.

namespace stillcoat::present {
namespace {

struct AppraiseOptions {
    std::string design;
    std::vector<std::string> materials;
    bool json = false, all_layers = false, strict = false;
    std::string csv, figure, draw = "noise";
    Output output;
};

/// Says which terms of the total are missing; refuses to go on without them when that was asked
/// for.
void report_missing_terms(const assess::Noise& noise, bool strict) {
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
    const stack::Design design = load_design(options.design, library);
    options.output.check();
    if (!options.figure.empty()) {
        check_figure_path(options.figure, files_of(design, options.output),
                          options.output.existing());
    }
    const assess::Appraisal appraisal = assess::appraise(design, library);
    // What is missing is a matter of the materials, so the first face speaks for both.
    report_missing_terms(appraisal.faces.front().noise, options.strict);
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
    if (!options.figure.empty()) {
        draw_appraisal(design, appraisal, options.draw == "field" ? Picture::field : Picture::noise,
                       options.figure, options.output.existing());
    }
    return fine;
}

}  // namespace

Command add_appraise(CLI::App& app, const std::string& program) {
    const auto options = std::make_shared<AppraiseOptions>();
    CLI::App* command = app.add_subcommand(
        "appraise",
        "Judge one mirror: reflectance, transmittance, absorptance, field, stored energy, noise");
    command->add_option("design", options->design, "the design file; - reads standard input")
        ->type_name("DESIGN.toml")
        ->required();
    add_folder_option(*command, options->materials);
    auto* json = command->add_flag("--json", options->json, "everything as a JSON document");
    command->add_option("--csv", options->csv, "one table as CSV: noise, layers or field")
        ->check(CLI::IsMember({"noise", "layers", "field"}))
        ->type_name("TABLE")
        ->excludes(json);
    auto* figure = command
                       ->add_option("--figure", options->figure,
                                    "draw into this .svg, .pdf or .png too, the data beside it")
                       ->type_name("FILE");
    command->add_option("--draw", options->draw, "what the figure shows: noise or field [noise]")
        ->check(CLI::IsMember({"noise", "field"}))
        ->type_name("WHAT")
        ->needs(figure);
    command->add_flag("--all-layers", options->all_layers, "show every layer of a long stack");
    command->add_flag("--strict", options->strict,
                      "exit code 2 when a noise term cannot be computed");
    add_output_options(*command, options->output);
    command->footer("Example:\n  stillcoat appraise mirror.toml --csv noise --out noise.csv");

    return {command, [=] { return appraise_command(program, *options); }};
}

}  // namespace stillcoat::present
