#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <iterator>

#include "present/figure_script.hpp"
#include "present/figure_sheet.hpp"
#include "present/figure_text.hpp"

namespace stillcoat::present {
namespace {

// Dark blue to light yellow, lighter all the way, so that it reads in grey too and by people with
// colour-blindness: S. van der Walt and N. Smith, viridis (2015, CC0), every ninth part.
const char* const palette =
    "set palette defined (0 \"#440154\", 1 \"#482878\", 2 \"#3e4989\", 3 \"#31688e\", 4 "
    "\"#26828e\", 5 \"#1f9e89\", 6 \"#35b779\", 7 \"#6ece58\", 8 \"#b5de2b\", 9 \"#fde725\")";
const Stroke contour_on_light{"#000000", 0.4};
const Stroke contour_on_dark{"#ffffff", 0.4};

constexpr double bar_width = 9.0;  // [pt]

// Fine enough for 8.6 cm at 300 dots per inch with two dots to a cell.
constexpr std::size_t raster_columns = 360;
constexpr std::size_t raster_rows = 300;

struct MapScales {
    Scale x, y, z;
};

MapScales scales_of(const Map& map) {
    Extent x, y, z;
    extend(x, map.x, map.x_values);
    extend(y, map.y, map.y_values);
    extend(z, map.z, map.z_values);
    return {scale_of(map.x, x, 0.0), scale_of(map.y, y, 0.0), scale_of(map.z, z, 0.0)};
}

/// Which value's cell lies at each of `count` equal parts of the scale; −1: none does.
std::vector<int> cells_along(const std::vector<double>& values, const Scale& scale,
                             std::size_t count) {
    std::vector<int> known;
    for (std::size_t i = 0; i < values.size(); ++i) {
        if (scale.has(values[i])) known.push_back(static_cast<int>(i));
    }
    std::vector<int> result(count, -1);
    if (known.empty()) return result;
    const auto place = [&](std::size_t k) { return scale.position(values[known[k]]); };
    // A single value fills the scale; the outer cells reach as far out as in.
    const std::size_t last = known.size() - 1;
    const double start = last == 0 ? -1.0 : place(0) - (place(1) - place(0)) / 2.0;
    const double end = last == 0 ? 2.0 : place(last) + (place(last) - place(last - 1)) / 2.0;
    std::size_t k = 0;
    for (std::size_t part = 0; part < count; ++part) {
        const double at = (static_cast<double>(part) + 0.5) / static_cast<double>(count);
        if (at < start || at > end) continue;
        while (k < last && (place(k) + place(k + 1)) / 2.0 < at) ++k;
        result[part] = known[k];
    }
    return result;
}

/// The colours as a matrix of positions on the scale of z, the lowest row first.
std::string raster(const Map& map, const MapScales& scales) {
    const std::vector<int> columns = cells_along(map.x_values, scales.x, raster_columns);
    const std::vector<int> rows = cells_along(map.y_values, scales.y, raster_rows);
    std::string text;
    for (const int row : rows) {
        for (const int column : columns) {
            double z = std::nan("");
            if (row >= 0 && column >= 0) {
                const double value =
                    map.z_values[static_cast<std::size_t>(row) * map.x_values.size() +
                                 static_cast<std::size_t>(column)];
                if (scales.z.has(value)) z = std::clamp(scales.z.position(value), 0.0, 1.0);
            }
            text += std::isnan(z) ? "NaN " : fmt::format("{:.5g} ", z);
        }
        text += "\n";
    }
    return text + "e\n";
}

/// Lines of equal z at those `levels` that lie between two positions, as gnuplot's data `name`.
/// @return whether there are any
bool add_contours(Sheet& sheet, const Map& map, const MapScales& scales,
                  const std::vector<Tic>& levels, double from, double to, const std::string& name) {
    const std::size_t width = map.x_values.size();
    const std::size_t height = map.y_values.size();
    const bool gaps = std::any_of(map.z_values.begin(), map.z_values.end(),
                                  [&](double z) { return !scales.z.has(z); }) ||
                      !scales.x.has(map.x_values[0]) || !scales.y.has(map.y_values[0]);
    std::string list;
    for (const Tic& tic : levels) {
        if (tic.label.empty() || tic.position < from || tic.position >= to) continue;
        list += fmt::format("{}{:.9f}", list.empty() ? "" : ",", tic.position);
    }
    if (!map.contours || gaps || width < 2 || height < 2 || list.empty()) return false;
    sheet.command("set contour base\nunset surface\nset cntrparam linear levels discrete " + list);
    sheet.command("set zrange [*:*]\nset table " + name);
    std::string grid = "splot '-' using 1:2:3\n";
    for (std::size_t j = 0; j < height; ++j) {
        for (std::size_t i = 0; i < width; ++i) {
            fmt::format_to(std::back_inserter(grid), "{:.9g} {:.9g} {:.9g}\n",
                           scales.x.position(map.x_values[i]), scales.y.position(map.y_values[j]),
                           scales.z.position(map.z_values[j * width + i]));
        }
        grid += "\n";
    }
    sheet.command(grid + "e\nunset table\nunset contour\nset surface");
    return true;
}

}  // namespace

Script figure_script(const Map& map, PictureFormat format) {
    const MapScales scales = scales_of(map);
    const Texts texts = texts_of(map.title, map.x, map.y, &map.z);
    const double room = frame_height / font_size;
    const std::vector<Tic> y_tics = tics_of(scales.y, room, false);
    const std::vector<Tic> z_tics = tics_of(scales.z, room, false);
    Frame frame;
    frame.left = edge + height_of(texts.y) + widest(y_tics) + 2.0 * gap;
    const double bar =
        sheet_width - edge - height_of(texts.right) - widest(z_tics) - 2.0 * gap - bar_width;
    frame.right = bar - 1.5 * gap;
    frame.bottom = edge + height_of(texts.x) + 1.25 * line_height;
    frame.top = frame.bottom + frame_height;
    const double height = frame.top + height_of(texts.title) + edge + gap;
    const std::vector<Tic> x_tics = tics_of(scales.x, (frame.right - frame.left) / font_size, true);

    Sheet sheet(format, height, frame);
    const bool dark = add_contours(sheet, map, scales, z_tics, 1e-6, 0.5, "$dark");
    const bool light = add_contours(sheet, map, scales, z_tics, 0.5, 1.0 - 1e-6, "$light");
    sheet.texts(texts);
    sheet.tics(Side::bottom, x_tics);
    sheet.tics(Side::left, y_tics);
    sheet.command(palette);
    sheet.command("set cbrange [0:1]");
    sheet.command(fmt::format(
        "set colorbox vertical user origin screen {:.6f}, screen {:.6f} size screen {:.6f}, screen "
        "{:.6f} front border",
        bar / sheet_width, frame.bottom / height, bar_width / sheet_width, frame_height / height));
    sheet.command("set cbtics scale 0.6,0.3 enhanced " + tic_list(z_tics));
    Plots plots;
    const std::string title = clean_text(map.z.title);
    plots.add(fmt::format("'-' matrix using (($1 + 0.5) / {}):(($2 + 0.5) / {}):3 with image",
                          raster_columns, raster_rows),
              raster(map, scales), title);
    const auto add_lines = [&](const std::string& data, const Stroke& stroke) {
        plots.add(data + " using 1:2 with lines " + sheet.style(stroke), "",
                  "lines of equal " + title);
    };
    if (dark) add_lines("$dark", contour_on_dark);
    if (light) add_lines("$light", contour_on_light);
    return {sheet.commands() + "plot " + plots.requests + "\n" + plots.data, plots.names};
}

}  // namespace stillcoat::present
