#include <fmt/format.h>

#include <cstdio>
#include <memory>

#include "present/command.hpp"
#include "present/wording.hpp"
#include "stillcoat/assess/draft.hpp"
#include "stillcoat/present/command_line.hpp"

/// `stillcoat draft`.

namespace stillcoat::present {
namespace {

struct DraftOptions {
    std::string high, low, substrate, wavelength, transmittance, cap = "none";
    std::string beam_radius = "2 cm", temperature = "295 K";
    bool antireflecting = false;
    std::vector<std::string> materials, alternatives;
    Output output;
};

/// Every option that the two kinds of draft need, or none of them.
bool asks_for_the_example(const DraftOptions& options) {
    const bool anything = options.antireflecting || !options.high.empty() || !options.low.empty() ||
                          !options.substrate.empty() || !options.wavelength.empty() ||
                          !options.transmittance.empty() || !options.alternatives.empty() ||
                          options.cap != "none" || options.beam_radius != "2 cm" ||
                          options.temperature != "295 K";
    if (!anything) return true;
    std::vector<std::string> missing;
    if (options.high.empty()) missing.push_back("--high");
    if (options.low.empty()) missing.push_back("--low");
    if (options.substrate.empty()) missing.push_back("--substrate");
    if (options.wavelength.empty()) missing.push_back("--wavelength");
    if (options.transmittance.empty() && !options.antireflecting) {
        missing.push_back("--transmittance (or --antireflecting)");
    }
    if (missing.empty()) return false;
    throw core::InputError(fmt::format("missing: {}", fmt::join(missing, ", ")),
                           "without any option the smallest example is written");
}

void report(const assess::Draft& draft) {
    if (!draft.chosen) {
        fmt::print(stderr, "reflects {} at the wavelength\n", fraction_text(draft.reflectance));
        return;
    }
    for (const auto& item : {draft.fewer, draft.chosen, draft.more}) {
        if (!item) continue;
        fmt::print(stderr, "{} {} {}{}\n",
                   count_text(static_cast<std::size_t>(item->pairs), "pair"),
                   item->pairs == 1 ? "transmits" : "transmit", fraction_text(item->transmittance),
                   item->pairs == draft.chosen->pairs ? "  <- drafted" : "");
    }
}

double wanted_transmittance(const std::string& text) {
    const double value = quantity_option("--transmittance", text, core::kind::number);
    if (value < 1.0) return value;
    throw core::InputError("--transmittance must be below 1",
                           "for example --transmittance \"5 ppm\"");
}

int draft_command(const std::string& program, const DraftOptions& options) {
    const std::string schema = schema_path(program, "design");
    if (asks_for_the_example(options)) {
        options.output.write(assess::smallest_design(schema));
        return fine;
    }
    const materials::Library library = load_library(program, options.materials);
    quantity_option("--wavelength", options.wavelength, core::kind::length);
    quantity_option("--beam-radius", options.beam_radius, core::kind::length);
    quantity_option("--temperature", options.temperature, core::kind::temperature);
    const assess::Cap cap = options.cap == "half-wave"      ? assess::Cap::half_wave
                            : options.cap == "quarter-wave" ? assess::Cap::quarter_wave
                                                            : assess::Cap::none;
    const assess::DraftRequest request{options.high,
                                       options.low,
                                       options.substrate,
                                       options.wavelength,
                                       options.beam_radius,
                                       options.temperature,
                                       cap,
                                       schema,
                                       options.alternatives};
    const assess::Draft draft =
        options.antireflecting ? assess::antireflecting_draft(library, request)
                               : assess::reflecting_draft(
                                     library, request, wanted_transmittance(options.transmittance));
    if (!draft.impossible.empty()) {
        fmt::print(stderr, "no such design: {}\n", draft.impossible);
        return no_answer;
    }
    options.output.write(draft.text);
    report(draft);
    return fine;
}

}  // namespace

Command add_draft(CLI::App& app, const std::string& program) {
    const auto options = std::make_shared<DraftOptions>();
    CLI::App* command = app.add_subcommand(
        "draft",
        "Start a design file: quarter waves to a transmittance, or two layers that "
        "reflect nothing");
    command->add_option("--high", options->high, "material of the high index")->type_name("NAME");
    command->add_option("--low", options->low, "material of the low index")->type_name("NAME");
    command->add_option("--substrate", options->substrate, "material below the coating")
        ->type_name("NAME");
    command->add_option("--wavelength", options->wavelength, "in vacuum")->type_name("\"λ nm\"");
    auto* target = command
                       ->add_option("--transmittance", options->transmittance,
                                    "largest allowed; the fewest pairs are taken")
                       ->type_name("\"T ppm\"");
    auto* cap = command
                    ->add_option("--cap", options->cap,
                                 "low-index layer on the light's side: none, quarter-wave, "
                                 "half-wave [none]")
                    ->check(CLI::IsMember({"none", "quarter-wave", "half-wave"}))
                    ->type_name("CAP");
    command
        ->add_flag("--antireflecting", options->antireflecting,
                   "two layers, low on high, that reflect nothing")
        ->excludes(target)
        ->excludes(cap);
    command->add_option("--beam-radius", options->beam_radius, "1/e² intensity radius [2 cm]")
        ->type_name("\"w mm\"");
    command->add_option("--temperature", options->temperature, "[295 K]")->type_name("\"T K\"");
    command
        ->add_option("--alternative", options->alternatives,
                     "take a named alternative of the library, silicon.refractive_index=visible")
        ->type_name("MATERIAL.PROPERTY=NAME")
        ->allow_extra_args(false);
    add_folder_option(*command, options->materials);
    add_output_options(*command, options->output);
    command->footer(
        "Without options: the smallest complete example.\n"
        "Example:\n  stillcoat draft --high tantala-ibs --low silica-ibs --substrate fused-silica "
        "\\\n"
        "      --wavelength \"1397 nm\" --transmittance \"5 ppm\" --out mirror.toml");
    return {command, [=] { return draft_command(program, *options); }};
}

}  // namespace stillcoat::present
