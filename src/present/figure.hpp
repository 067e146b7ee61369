#pragma once
/// Pictures of results: curves over one quantity, and a quantity over two others, as SVG, PDF or
/// PNG at the width of a journal's column (8.6 cm), with the data shown beside them as CSV.
///
/// gnuplot draws them. All text comes out as written, nothing in it is a command or mark-up. Text
/// that is too long is broken into lines and, at the last, cut with "…"; the CSV has it whole, and
/// an SVG file too, as <title>. PDF and PNG show "□" for characters beyond Latin, Greek, Cyrillic
/// and symbols.

#include <optional>
#include <string>
#include <vector>

#include "stillcoat/core/file_writer.hpp"

namespace stillcoat::present {

struct Axis {
    std::string title;              ///< with its unit in brackets: "frequency [Hz]"; not empty
    bool logarithmic = false;       ///< values ≤ 0 then leave gaps
    std::optional<double> lower{};  ///< where it starts; none: where the data start
    std::optional<double> upper{};
};

/// How the points of a curve are joined.
enum class Shape {
    line,   ///< straight from point to point
    steps,  ///< y[i] holds from x[i] to x[i + 1]: the index over depth
    points  ///< not joined
};

struct Curve {
    std::string name;
    std::vector<double> x;  ///< in the unit of the axis; as many as y, at least one
    std::vector<double> y;
    Shape shape = Shape::line;
    bool emphasised = false;  ///< black and heavy: a total among its parts
};

/// A second scale on the right; its curves lie behind the others.
struct SecondAxis {
    Axis axis;
    std::vector<Curve> curves;
};

/// A vertical line at x, such as a layer boundary or the operating wavelength. The label, which may
/// be empty, stands above the frame; one that finds no room in four rows is left out there, not in
/// the CSV.
struct Mark {
    double x = 0.0;
    std::string label;
};

struct Figure {
    std::string title;  ///< may be empty
    Axis x;
    Axis y;
    std::vector<Curve> curves;
    std::optional<SecondAxis> second{};
    std::vector<Mark> marks{};
};

/// A quantity z over two others, as colours with lines of equal z. Each value fills the cell that
/// reaches halfway to its neighbours; nothing is smoothed. Limits of z bound the colours only.
struct Map {
    std::string title;
    Axis x;
    Axis y;
    Axis z;
    std::vector<double> x_values;  ///< increasing
    std::vector<double> y_values;  ///< increasing
    std::vector<double>
        z_values;          ///< z_values[j * x_values.size() + i] at x_values[i], y_values[j]
    bool contours = true;  ///< lines at the labelled values of the colour scale
};

/// Curves in one picture, those of the second axis included: as many as can be told apart in grey.
inline constexpr std::size_t most_curves = 12;

/// The data as CSV with one header line of names and units, numbers in full double precision.
/// Curves over the same x share its column; shorter columns end in empty cells; marks come last.
/// @throws std::logic_error as draw does.
std::string figure_data_csv(const Figure& figure);
/// One row for each cell of the map: x, y, z.
std::string figure_data_csv(const Map& map);

/// Refuses, before anything is computed, what draw would refuse of a path and what would overwrite
/// another file of the same command. @param others inputs and results; "-" and "" are none
/// @throws core::InputError
void check_figure_path(const std::string& path, const std::vector<std::string>& others,
                       core::Existing existing);

/// Draws into `path`, whose ending .svg, .pdf or .png says the format, and writes the data beside
/// it under its name with .csv behind. What stands in the files depends on the figure and on
/// gnuplot's version and fonts only. A value outside an axis with given limits is cut off there.
/// @throws core::InputError another ending, "-", a file that is to be kept (both files are looked
///     for before gnuplot starts), gnuplot missing or failing, a file that cannot be written.
/// @throws std::logic_error values that are not finite, no curve or more than most_curves, columns
///     of unequal length, an axis without title or with limits that are not increasing (or ≤ 0 on
///     a logarithmic one), values of a map's axes that do not increase.
void draw(const Figure& figure, const std::string& path, core::Existing existing);
void draw(const Map& map, const std::string& path, core::Existing existing);

}  // namespace stillcoat::present
