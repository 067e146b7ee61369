#include <fmt/format.h>
#include <unistd.h>

#include <algorithm>
#include <csignal>
#include <cstdio>
#include <filesystem>
#include <memory>

#include "present/command.hpp"
#include "present/sweep_figure.hpp"
#include "present/sweep_output.hpp"
#include "present/wording.hpp"
#include "stillcoat/present/command_line.hpp"

/// `stillcoat sweep`.

namespace stillcoat::present {
namespace {

namespace fs = std::filesystem;

struct SweepOptions {
    std::string design;
    std::vector<std::string> over, show, materials;
    std::string frequency = "100 Hz", figure;
    bool json = false, resume = false;
    Output output;
};

volatile std::sig_atomic_t interrupted = 0;

/// While it lives, Ctrl-C asks the sweep to stop instead of ending the program.
class InterruptGuard {
  public:
    InterruptGuard() {
        interrupted = 0;
        struct sigaction action {};
        action.sa_handler = [](int) { interrupted = 1; };
        ::sigaction(SIGINT, &action, &interrupt_before_);
        ::sigaction(SIGTERM, &action, &terminate_before_);
    }
    ~InterruptGuard() {
        ::sigaction(SIGINT, &interrupt_before_, nullptr);
        ::sigaction(SIGTERM, &terminate_before_, nullptr);
    }
    InterruptGuard(const InterruptGuard&) = delete;
    InterruptGuard& operator=(const InterruptGuard&) = delete;

  private:
    struct sigaction interrupt_before_ {};
    struct sigaction terminate_before_ {};
};

/// A bar on a terminal, nothing elsewhere.
void show_progress(std::size_t done, std::size_t all) {
    if (::isatty(STDERR_FILENO) != 1) return;
    constexpr std::size_t width = 40;
    const std::size_t filled = width * done / all;
    fmt::print(stderr, "\r[{}{}] {}/{}", std::string(filled, '='), std::string(width - filled, ' '),
               done, all);
    if (done == all) fmt::print(stderr, "\n");
    std::fflush(stderr);
}

/// Where an interrupted sweep into a file is kept.
std::string unfinished_path(const std::string& path) { return path + ".unfinished"; }

assess::SweepPlan read_plan(const SweepOptions& options, const stack::Design& design,
                            const materials::Library& library) {
    assess::SweepPlan plan;
    if (options.over.empty() || options.over.size() > 2) {
        throw core::InputError(fmt::format("--over is given {} times", options.over.size()),
                               "once or twice, for example --over wavelength=900nm:1300nm:401");
    }
    for (const std::string& text : options.over) {
        plan.axes.push_back(assess::read_axis(text, design, library));
    }
    if (plan.axes.size() == 2 && plan.axes[0].name == plan.axes[1].name) {
        throw core::InputError("--over: both vary " + plan.axes[0].name, "vary two quantities");
    }
    if (plan.size() > assess::most_sweep_points) {
        throw core::InputError(
            fmt::format("the sweep has {} points", plan.size()),
            fmt::format("at most {} are computed: take fewer", assess::most_sweep_points));
    }
    plan.outcomes = assess::chosen_outcomes(design, options.show, plan.axes);
    plan.frequency = quantity_option("--frequency", options.frequency, core::kind::frequency);
    return plan;
}

/// The rows that an earlier run left, checked by computing one of them again.
SweepRows earlier_rows(const SweepOptions& options, const stack::Design& design,
                       const materials::Library& library, const assess::SweepPlan& plan) {
    if (!options.resume) return SweepRows(plan.size());
    const std::string file = unfinished_path(options.output.path);
    SweepRows rows = read_unfinished_sweep(core::read_text_file(file), file, plan);
    const auto first =
        std::find_if(rows.begin(), rows.end(), [](const auto& row) { return row.has_value(); });
    if (first == rows.end()) return rows;
    const auto point = static_cast<std::size_t>(first - rows.begin());
    const assess::SweepRow again = assess::sweep_row(design, library, plan, point);
    if (again.values == (*first)->values && again.lack == (*first)->lack) return rows;
    throw core::InputError(
        fmt::format("{}: its first point comes out differently now", file),
        "the design or a material has changed: start the sweep without --resume");
}

/// Says how many points lack values and why the first one does; all of all: nothing to show.
void report_gaps(const SweepRows& rows) {
    std::size_t lacking = 0;
    bool any_value = false;
    std::string reason;
    for (const auto& row : rows) {
        for (const auto& value : row->values) any_value = any_value || value.has_value();
        if (row->lack.empty()) continue;
        if (lacking++ == 0) reason = row->lack;
    }
    if (!any_value) throw core::InputError("no point has a value: " + reason, "");
    if (lacking == 0) return;
    fmt::print(stderr, "warning: {} without every value, the first because {}\n",
               count_text(lacking, "point"), core::printable(reason));
}

void check_options(const SweepOptions& options) {
    const bool to_file = options.output.path != "-";
    if (options.resume && !to_file) {
        throw core::InputError("--resume needs --out FILE",
                               "an interrupted sweep is kept beside its file");
    }
    if (to_file && !options.output.replace && fs::exists(options.output.path)) {
        throw core::InputError(options.output.path + ": exists already and was kept",
                               "give --replace to overwrite it");
    }
    if (to_file && !options.resume && fs::exists(unfinished_path(options.output.path))) {
        throw core::InputError(
            unfinished_path(options.output.path) + ": an earlier sweep stopped here",
            "give --resume to go on with it, or remove the file");
    }
}

/// Keeps what was done; returns the exit code.
int keep_unfinished(const SweepOptions& options, const assess::SweepPlan& plan,
                    const SweepRows& rows) {
    const auto done =
        std::count_if(rows.begin(), rows.end(), [](const auto& row) { return row.has_value(); });
    if (options.output.path == "-") {
        options.output.write(sweep_csv(plan, rows));
        fmt::print(stderr, "\nstopped after {} of {} points\n", done, rows.size());
        return no_answer;
    }
    const std::string file = unfinished_path(options.output.path);
    core::write_file(file, unfinished_sweep(plan, rows), core::Existing::replace);
    fmt::print(stderr,
               "\nstopped after {} of {} points, kept in {}\n       the same command with --resume "
               "goes on\n",
               done, rows.size(), file);
    return no_answer;
}

int sweep_command(const std::string& program, const SweepOptions& options) {
    check_options(options);
    materials::Library library = load_library(program, options.materials);
    const stack::Design design = load_design(options.design, library);
    const assess::SweepPlan plan = read_plan(options, design, library);
    if (!options.figure.empty())
        check_sweep_figure(plan, options.figure, options.output.path, options.output.existing());
    SweepRows rows = earlier_rows(options, design, library, plan);
    bool complete = false;
    {
        const InterruptGuard guard;
        complete = assess::run_sweep(design, library, plan, rows, [&](std::size_t done) {
            show_progress(done, rows.size());
            return interrupted == 0;
        });
    }
    if (!complete) return keep_unfinished(options, plan, rows);
    show_progress(rows.size(), rows.size());
    report_gaps(rows);
    options.output.write(options.json ? sweep_json(design, plan, rows) : sweep_csv(plan, rows));
    if (options.resume) fs::remove(unfinished_path(options.output.path));
    if (!options.figure.empty()) {
        draw_sweep(design, plan, rows, options.figure, options.output.existing());
    }
    return fine;
}

}  // namespace

Command add_sweep(CLI::App& app, const std::string& program) {
    const auto options = std::make_shared<SweepOptions>();
    CLI::App* command = app.add_subcommand(
        "sweep",
        "Vary one or two quantities: a spectrum, angles, temperatures, thicknesses, values");
    command->add_option("design", options->design, "the design file; - reads standard input")
        ->type_name("DESIGN.toml")
        ->required();
    command
        ->add_option("--over", options->over,
                     "what varies; twice for a map. NAME: wavelength, angle, temperature, "
                     "beam_radius, frequency, layer.N, MATERIAL.thickness (a factor), "
                     "MATERIAL.PROPERTY; :log at the end for even steps of the logarithm")
        ->type_name("NAME=FROM:TO:COUNT")
        ->required()
        ->allow_extra_args(false);
    command
        ->add_option("--show", options->show,
                     "results, separated by commas; any other word lists them")
        ->type_name("KEYS")
        ->delimiter(',')
        ->allow_extra_args(false);
    command
        ->add_option("--frequency", options->frequency,
                     "of the noise, where it does not vary [100 Hz]")
        ->type_name("\"f Hz\"");
    command->add_flag("--json", options->json, "a JSON document instead of CSV");
    command->add_option("--figure", options->figure, "draw into this .svg, .pdf or .png too")
        ->type_name("FILE");
    command->add_flag("--resume", options->resume, "go on with a sweep that was interrupted");
    add_folder_option(*command, options->materials);
    add_output_options(*command, options->output);
    command->footer(
        "Layers counted in quarter waves keep their thickness while the wavelength varies, and "
        "their quarter waves while an index does.\n"
        "Examples:\n"
        "  stillcoat sweep mirror.toml --over wavelength=900nm:1300nm:401 --figure spectrum.svg\n"
        "  stillcoat sweep mirror.toml --over tantala-ibs.loss_angle=1e-4:6e-4:11 --show "
        "total_psd_m2_per_Hz");
    return {command, [=] { return sweep_command(program, *options); }};
}

}  // namespace stillcoat::present
