#include "present/figure.hpp"

#include <fmt/format.h>

#include <cmath>
#include <filesystem>
#include <stdexcept>

#include "present/figure_script.hpp"
#include "present/figure_text.hpp"
#include "present/gnuplot.hpp"
#include "stillcoat/core/errors.hpp"

namespace stillcoat::present {
namespace {

namespace fs = std::filesystem;

PictureFormat format_of(const std::string& path) {
    const std::string ending = fs::path(path).extension().string();
    if (ending == ".svg") return PictureFormat::svg;
    if (ending == ".pdf") return PictureFormat::pdf;
    if (ending == ".png") return PictureFormat::png;
    throw core::InputError(
        fmt::format("{}: a figure goes into a file whose name ends in .svg, .pdf or .png", path),
        "for example noise.svg");
}

std::string data_path_of(const std::string& path) { return path + ".csv"; }

/// Both files, or none that was not there before.
void write_both(const std::string& path, const std::string& picture, const std::string& data_path,
                const std::string& data, core::Existing existing) {
    std::error_code ignored;
    const bool had_data = fs::exists(data_path, ignored);
    core::write_file(data_path, data, existing);
    try {
        core::write_file(path, picture, existing);
    } catch (...) {
        if (!had_data) fs::remove(data_path, ignored);
        throw;
    }
}

/// Names for people who hear a picture instead of seeing it, in place of gnuplot's own.
std::string named_svg(const std::string& svg, const std::string& title,
                      const std::vector<std::string>& names) {
    std::string result;
    std::size_t done = 0;
    const auto replace_title = [&](const std::string& before, const std::string& name) {
        const std::size_t group = svg.find(before, done);
        if (group == std::string::npos) return;
        const std::size_t start = svg.find("<title>", group);
        const std::size_t end = svg.find("</title>", group);
        if (start == std::string::npos || end == std::string::npos) return;
        result += svg.substr(done, start + 7 - done) + xml_escaped(name);
        done = end;
    };
    replace_title("<svg", clean_text(title));
    for (std::size_t i = 0; i < names.size(); ++i) {
        replace_title(fmt::format("id=\"gnuplot_plot_{}\"", i + 1), names[i]);
    }
    return result + svg.substr(done);
}

/// The date of making would make equal figures unequal; another of the same length keeps every
/// offset in the file.
std::string undated_pdf(std::string pdf) {
    const std::string key = "/CreationDate (D:";
    const std::size_t at = pdf.find(key);
    if (at == std::string::npos) return pdf;
    const std::string no_date = "20000101000000";
    const std::size_t start = at + key.size();
    for (std::size_t i = 0; i < no_date.size() && start + i < pdf.size(); ++i) {
        if (pdf[start + i] < '0' || pdf[start + i] > '9') break;
        pdf[start + i] = no_date[i];
    }
    return pdf;
}

template <typename Picture>
void draw_picture(const Picture& picture, const std::string& path, core::Existing existing) {
    const std::string data = figure_data_csv(picture);
    const PictureFormat format = format_of(path);
    const std::string data_path = data_path_of(path);
    core::check_writable(path, existing);
    core::check_writable(data_path, existing);
    const Script script = figure_script(picture, format);
    std::string content = gnuplot_output(script.text);
    if (format == PictureFormat::svg) content = named_svg(content, picture.title, script.names);
    if (format == PictureFormat::pdf) content = undated_pdf(content);
    write_both(path, content, data_path, data, existing);
}

}  // namespace

void check_figure_path(const std::string& path, const std::vector<std::string>& others,
                       core::Existing existing) {
    format_of(path);
    for (const std::string& own : {path, data_path_of(path)}) {
        for (const std::string& other : others) {
            std::error_code ignored;
            if (other.empty() || other == "-") continue;
            if (fs::weakly_canonical(own, ignored) != fs::weakly_canonical(other, ignored))
                continue;
            throw core::InputError(fmt::format("{}: the figure would overwrite {}", own, other),
                                   "give the figure another name");
        }
        core::check_writable(own, existing);
    }
}

void draw(const Figure& figure, const std::string& path, core::Existing existing) {
    draw_picture(figure, path, existing);
}

void draw(const Map& map, const std::string& path, core::Existing existing) {
    draw_picture(map, path, existing);
}

}  // namespace stillcoat::present
