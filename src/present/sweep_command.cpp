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
#include "present/sweep_resume.hpp"
#include "present/wording.hpp"
#include "stillcoat/present/command_line.hpp"

/// `stillcoat sweep`.

namespace stillcoat::present {
namespace {

namespace fs = std::filesystem;

struct SweepOptions {
    std::string design;
    std::vector<std::string> over, show, materials;
    std::string frequency, figure;
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
    const bool varies = std::any_of(plan.axes.begin(), plan.axes.end(),
                                    [](const auto& axis) { return axis.name == "frequency"; });
    if (varies && !options.frequency.empty()) {
        throw core::InputError("--frequency is given, and --over varies it",
                               "leave one of the two out");
    }
    plan.frequency = options.frequency.empty()
                         ? 100.0
                         : quantity_option("--frequency", options.frequency, core::kind::frequency);
    return plan;
}

/// Every file that the result rests on.
std::vector<std::string> inputs_of(const std::string& program, const SweepOptions& options,
                                   const stack::Design& design) {
    std::vector<std::string> files = stack::files_beside(design);
    if (options.design != "-") files.push_back(options.design);
    for (const std::string& folder : material_folders(program, options.materials)) {
        std::vector<std::string> inside;
        for (const fs::directory_entry& item : fs::directory_iterator(folder)) {
            const std::string ending = item.path().extension().string();
            if (item.is_regular_file() && (ending == ".toml" || ending == ".csv")) {
                inside.push_back(item.path().string());
            }
        }
        std::sort(inside.begin(), inside.end());
        files.insert(files.end(), inside.begin(), inside.end());
    }
    return files;
}

/// The rows that an earlier run left.
SweepRows earlier_rows(const SweepOptions& options, const assess::SweepPlan& plan,
                       const std::string& inputs) {
    if (!options.resume) return SweepRows(plan.size());
    const std::string file = unfinished_path(options.output.path);
    return read_unfinished_sweep(core::read_text_file(file), file, plan, inputs);
}

/// What holds where the sweep ends; an appraisal there says more.
void report_remarks(const assess::SweepRemarks& remarks) {
    for (const std::string& warning : remarks.warnings) {
        fmt::print(stderr, "warning: {}\n", core::printable(warning));
    }
    if (remarks.analogies.empty()) return;
    fmt::print(stderr,
               "note: {} by analogy at the ends of the sweep; `stillcoat appraise` there, or "
               "--json, lists them\n",
               count_text(remarks.analogies.size(), "value"));
}

/// Says how many points lack values and why the first one does; whether there is any value at all.
bool report_gaps(const SweepRows& rows) {
    std::size_t lacking = 0;
    bool any_value = false;
    std::string reason;
    for (const auto& row : rows) {
        for (const auto& value : row->values) any_value = any_value || value.has_value();
        if (row->lack.empty()) continue;
        if (lacking++ == 0) reason = row->lack;
    }
    if (!any_value) {
        fmt::print(stderr, "no point has a value: {}\n", core::printable(reason));
        return false;
    }
    if (lacking == 0) return true;
    fmt::print(stderr, "warning: {} without every value, the first because {}\n",
               count_text(lacking, "point"), core::printable(reason));
    return true;
}

void check_options(const SweepOptions& options) {
    const bool to_file = options.output.path != "-";
    if (options.resume && (!to_file || options.design == "-")) {
        throw core::InputError("--resume needs a design file and --out FILE",
                               "an interrupted sweep is kept beside its file");
    }
    options.output.check();
    std::error_code ignored;
    if (to_file && !options.resume && fs::exists(unfinished_path(options.output.path), ignored)) {
        throw core::InputError(
            unfinished_path(options.output.path) + ": an earlier sweep stopped here",
            "give --resume to go on with it, or remove the file");
    }
}

/// Keeps what was done; returns the exit code.
int keep_unfinished(const SweepOptions& options, const stack::Design& design,
                    const assess::SweepPlan& plan, const std::string& inputs,
                    const SweepRows& rows) {
    const auto done =
        std::count_if(rows.begin(), rows.end(), [](const auto& row) { return row.has_value(); });
    if (options.output.path == "-") {
        options.output.write(options.json ? sweep_json(design, plan, rows, {})
                                          : sweep_csv(plan, rows));
        fmt::print(stderr,
                   "\nstopped after {} of {} points, which were printed; with --out FILE they are "
                   "kept for --resume\n",
                   done, rows.size());
        return no_answer;
    }
    const std::string file = unfinished_path(options.output.path);
    core::write_file(file, unfinished_sweep(plan, inputs, rows), core::Existing::replace);
    fmt::print(stderr,
               "\nstopped after {} of {} points, kept in {}\n       the same command with --resume "
               "goes on\n",
               done, rows.size(), file);
    return no_answer;
}

int sweep_command(const std::string& program, const SweepOptions& options) {
    const InterruptGuard guard;  // from the start: nothing is lost while the library is read
    check_options(options);
    materials::Library library = load_library(program, options.materials);
    const stack::Design design = load_design(options.design, library);
    const assess::SweepPlan plan = read_plan(options, design, library);
    if (!options.figure.empty())
        check_sweep_figure(plan, options.figure, files_of(design, options.output),
                           options.output.existing());
    const std::string inputs = fingerprint(inputs_of(program, options, design));
    SweepRows rows = earlier_rows(options, plan, inputs);
    const bool complete = assess::run_sweep(design, library, plan, rows, [&](std::size_t done) {
        show_progress(done, rows.size());
        return interrupted == 0;
    });
    if (!complete) return keep_unfinished(options, design, plan, inputs, rows);
    show_progress(rows.size(), rows.size());
    if (!report_gaps(rows)) return no_answer;
    const assess::SweepRemarks remarks = assess::sweep_remarks(design, library, plan);
    options.output.write(options.json ? sweep_json(design, plan, rows, remarks)
                                      : sweep_csv(plan, rows));
    report_remarks(remarks);
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
                     "results, separated by commas; for unpolarised light also with _s and _p; any "
                     "other word lists them")
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
