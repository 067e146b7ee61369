#include "stillcoat/present/command_line.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cstdio>
#include <sstream>

#include "present/command.hpp"

namespace stillcoat::present {
namespace {

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

/// Asks CLI11 to read the words; its own answer (help, version, a complaint) when there is one.
std::optional<int> parse(CLI::App& app, std::vector<std::string> arguments) {
    // `--help units` is easier to find than the command.
    const bool help = arguments.size() == 2 && (arguments[0] == "--help" || arguments[0] == "-h");
    if (help && arguments[1] == "units") arguments = {"units"};
    std::reverse(arguments.begin(), arguments.end());
    try {
        app.parse(arguments);
        return std::nullopt;
    } catch (const CLI::ParseError& error) {
        std::ostringstream answer, complaint;
        const int code = app.exit(error, answer, complaint);
        if (!answer.str().empty()) Output{}.write(answer.str());
        std::fputs(complaint.str().c_str(), stderr);
        return code == 0 ? fine : bad_input;
    }
}

int dispatch(const std::string& program, const std::vector<std::string>& arguments) {
    CLI::App app{
        "Stillcoat: low-noise mirror coatings. One design file in, optics and thermal noise out.",
        "stillcoat"};
    app.set_version_flag("--version", std::string("stillcoat ") + STILLCOAT_VERSION);
    app.require_subcommand(0, 1);
    app.footer(
        "Example:\n  stillcoat appraise examples/end-mirror/design.toml\n\n"
        "Exit codes: 0 fine, 1 a requirement is not met, 2 bad input, 3 no answer, 4 our mistake.\n"
        "Work with lasers, vacuum and cryogens follows local rules and licensed practice.");
    const std::vector<Command> commands{add_draft(app, program),     add_appraise(app, program),
                                        add_layers(app, program),    add_sweep(app, program),
                                        add_materials(app, program), add_units(app)};
    if (!arguments.empty() && arguments[0].rfind('-', 0) != 0) {
        std::vector<std::string> names;
        for (const Command& command : commands) names.push_back(command.app->get_name());
        if (std::find(names.begin(), names.end(), arguments[0]) == names.end()) {
            const auto near = core::nearest_spelling(arguments[0], names);
            throw core::InputError(fmt::format("unknown command \"{}\"", arguments[0]),
                                   near ? fmt::format("did you mean {}?", *near)
                                        : "`stillcoat --help` lists the commands");
        }
    }
    if (const auto answered = parse(app, arguments)) return *answered;
    for (const Command& command : commands) {
        if (command.app->parsed()) return command.run();
    }
    Output{}.write(app.help());
    return fine;
}

}  // namespace

int run(const std::string& program, const std::vector<std::string>& arguments) {
    return guarded([&] { return dispatch(program, arguments); });
}

}  // namespace stillcoat::present
