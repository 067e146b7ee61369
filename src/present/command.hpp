#pragma once
/// What the sub-commands share: where output goes, the library of a run, options that are
/// quantities.

#include <CLI/CLI.hpp>
#include <functional>
#include <string>
#include <vector>

#include "stillcoat/core/file_writer.hpp"
#include "stillcoat/materials/library.hpp"
#include "stillcoat/stack/design.hpp"

namespace stillcoat::present {

/// A sub-command: what the command line knows of it, and what it does when it was asked for.
struct Command {
    CLI::App* app;
    std::function<int()> run;  ///< returns the exit code
};

/// Each adds its sub-command to `app`. @param program path of the running program
Command add_appraise(CLI::App& app, const std::string& program);
Command add_draft(CLI::App& app, const std::string& program);
Command add_layers(CLI::App& app, const std::string& program);
Command add_materials(CLI::App& app, const std::string& program);
Command add_sweep(CLI::App& app, const std::string& program);
Command add_units(CLI::App& app);

/// Where a command's result goes.
struct Output {
    std::string path = "-";
    bool replace = false;

    core::Existing existing() const;
    void write(const std::string& text) const;
    /// Refuses before any work what write would refuse. @throws core::InputError
    void check() const;
    /// Colour only where a person reads it, and not where NO_COLOR (no-color.org) forbids it.
    bool colour() const;
};
void add_output_options(CLI::App& command, Output& output);

/// The option --materials of a command.
void add_folder_option(CLI::App& command, std::vector<std::string>& folders);

/// The folder of materials that belongs to the program, and those of the user.
std::vector<std::string> material_folders(const std::string& program,
                                          const std::vector<std::string>& folders);

/// The library that belongs to the program with the folders of the user.
/// @throws core::InputError with every problem of every file
materials::Library load_library(const std::string& program,
                                const std::vector<std::string>& folders);

/// Where an installed program has the schema of a kind of document ("design", "material"); empty
/// for one that runs from its build folder, whose paths mean nothing elsewhere.
std::string schema_path(const std::string& program, const std::string& document);

/// Reads a design; "-" is standard input.
stack::Design load_design(const std::string& path, materials::Library& library);

/// The files that a command reads and writes, so that a figure does not overwrite one of them.
std::vector<std::string> files_of(const stack::Design& design, const Output& output);

/// The SI value of an option, greater than 0. @throws core::InputError naming the option
double quantity_option(const std::string& option, const std::string& text,
                       const core::QuantityKind& kind);

}  // namespace stillcoat::present
