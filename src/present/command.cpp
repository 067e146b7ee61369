#include "present/command.hpp"

#include <fmt/format.h>
#include <unistd.h>

#include <cstdlib>
#include <filesystem>

namespace stillcoat::present {

namespace fs = std::filesystem;

core::Existing Output::existing() const {
    return replace ? core::Existing::replace : core::Existing::keep;
}

void Output::write(const std::string& text) const { core::write_file(path, text, existing()); }

void Output::check() const { core::check_writable(path, existing()); }

bool Output::colour() const {
    return path == "-" && ::isatty(STDOUT_FILENO) == 1 && std::getenv("NO_COLOR") == nullptr;
}

void add_output_options(CLI::App& command, Output& output) {
    command.add_option("-o,--out", output.path, "write to this file; - is standard output")
        ->type_name("FILE");
    command.add_flag("--replace", output.replace, "overwrite an existing file");
}

void add_folder_option(CLI::App& command, std::vector<std::string>& folders) {
    command
        .add_option("--materials", folders,
                    "folder of material files that add to or replace the library's")
        ->type_name("DIR")
        ->allow_extra_args(false);
}

namespace {

/// Where an installed program has a folder of its data.
fs::path installed_folder(const std::string& program, const std::string& name) {
    std::error_code error;
    const fs::path real = fs::read_symlink("/proc/self/exe", error);
    const fs::path self = error ? fs::path(program) : real;
    return (self.parent_path() / STILLCOAT_DATA_FROM_PROGRAM / name).lexically_normal();
}

/// The folder of materials that belongs to this program: beside an installed program, else in the
/// source tree that it was built from.
std::string own_materials(const std::string& program) {
    std::error_code error;
    const fs::path installed = installed_folder(program, "materials");
    if (fs::is_directory(installed, error)) return installed.string();
    if (fs::is_directory(STILLCOAT_BUILD_MATERIALS, error)) return STILLCOAT_BUILD_MATERIALS;
    throw core::InputError(fmt::format("the materials folder is missing: neither {} nor {}",
                                       installed.string(), STILLCOAT_BUILD_MATERIALS),
                           "reinstall, or name folders with --materials");
}

}  // namespace

std::vector<std::string> material_folders(const std::string& program,
                                          const std::vector<std::string>& folders) {
    std::vector<std::string> all{own_materials(program)};
    all.insert(all.end(), folders.begin(), folders.end());
    return all;
}

materials::Library load_library(const std::string& program,
                                const std::vector<std::string>& folders) {
    materials::Library library;
    core::Problems problems;
    for (const std::string& folder : material_folders(program, folders)) {
        materials::add_folder(library, folder, problems);
    }
    // A file that could not be read would be missed by all that refer to it.
    problems.throw_if_any();
    materials::check_links(library, problems);
    problems.throw_if_any();
    return library;
}

std::string schema_path(const std::string& program, const std::string& document) {
    std::error_code error;
    const fs::path file = installed_folder(program, "schemas") / (document + ".schema.json");
    return fs::exists(file, error) ? file.string() : "";
}

stack::Design load_design(const std::string& path, materials::Library& library) {
    core::Document document =
        path == "-" ? core::parse_document(core::read_text_file("/dev/stdin"), "standard input")
                    : core::read_document(path);
    return stack::read_design(std::move(document), library);
}

std::vector<std::string> files_of(const stack::Design& design, const Output& output) {
    std::vector<std::string> files{design.document.name, output.path};
    for (const std::string& file : stack::files_beside(design)) files.push_back(file);
    return files;
}

double quantity_option(const std::string& option, const std::string& text,
                       const core::QuantityKind& kind) {
    const core::QuantityReading reading = core::read_quantity(text, kind);
    if (!reading.ok)
        throw core::InputError(option + ": " + reading.failure.message, reading.failure.hint);
    if (!(reading.value > 0.0)) throw core::InputError(option + " must be greater than 0", "");
    return reading.value;
}

}  // namespace stillcoat::present
