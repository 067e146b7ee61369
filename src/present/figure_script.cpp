#include "present/figure_script.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <iterator>

#include "present/figure_sheet.hpp"
#include "present/figure_text.hpp"

namespace stillcoat::present {
namespace {

constexpr double sample_length = 26.0;  // [pt] of a line in the key

const Stroke mark_stroke{"#777777", 0.5, {1.5, 1.5}};

// Colours that people with colour-blindness tell apart: M. Okabe and K. Ito, Color Universal Design
// (2008). Their black is for emphasised curves; their yellow is too pale on white.
const char* const colours[] = {"#0072B2", "#D55E00", "#009E73", "#CC79A7", "#56B4E9", "#E69F00"};
// With two line widths, twelve looks that differ without colour.
const std::vector<double> dash_patterns[] = {
    {}, {7.0, 2.5}, {1.5, 2.2}, {8.0, 2.2, 1.5, 2.2}, {3.5, 2.0}, {8.0, 2.2, 1.5, 2.2, 1.5, 2.2}};

struct Look {
    Stroke stroke;
    int symbol = 7;  ///< gnuplot's point type
};

Look look_of(std::size_t index, bool emphasised, bool second) {
    const std::size_t patterns = std::size(dash_patterns);
    const double width = index < patterns ? 1.2 : 0.7;
    const int symbols[] = {7, 5, 9, 13, 11, 6};
    const std::vector<double>& dashes = dash_patterns[(index + index / patterns) % patterns];
    const int symbol = symbols[index % std::size(symbols)];
    if (second) return {{"#8c8c8c", 0.75 * width, dashes}, symbol};
    if (emphasised) return {{"#000000", 1.6 * width, dashes}, symbol};
    // The colours run once more through the second width in another order of patterns.
    return {{colours[index % std::size(colours)], width, dashes}, symbol};
}

struct Point {
    double x = 0.0;
    double y = 0.0;
};
using Run = std::vector<Point>;

/// The stretches of a curve without a gap, in positions on the scales.
std::vector<Run> runs_of(const Curve& curve, const Scale& x, const Scale& y) {
    std::vector<Run> runs(1);
    for (std::size_t i = 0; i < curve.x.size(); ++i) {
        if (!x.has(curve.x[i]) || !y.has(curve.y[i])) {
            if (!runs.back().empty()) runs.emplace_back();
            continue;
        }
        const Point point{x.position(curve.x[i]), y.position(curve.y[i])};
        if (curve.shape == Shape::steps && !runs.back().empty()) {
            runs.back().push_back({point.x, runs.back().back().y});
        }
        runs.back().push_back(point);
    }
    if (runs.back().empty()) runs.pop_back();
    return runs;
}

/// A curve as it is drawn.
struct Trace {
    const Curve* curve = nullptr;
    Look look;
    std::vector<Run> lines;
    std::vector<Run> symbols;  ///< points that are not joined, and those alone between gaps
};

Trace trace_of(const Curve& curve, const Scale& x, const Scale& y, const Look& look) {
    Trace trace{&curve, look, {}, {}};
    for (Run& run : runs_of(curve, x, y)) {
        const bool joined = curve.shape != Shape::points && run.size() > 1;
        (joined ? trace.lines : trace.symbols).push_back(std::move(run));
    }
    return trace;
}

/// Those of the second axis come last.
std::vector<Trace> traces_of(const Figure& figure, const Scale& x, const Scale& y,
                             const Scale& second) {
    std::vector<Trace> traces;
    std::size_t plain = 0;
    std::size_t emphasised = 0;
    for (const Curve& curve : figure.curves) {
        std::size_t& index = curve.emphasised ? emphasised : plain;
        traces.push_back(trace_of(curve, x, y, look_of(index++, curve.emphasised, false)));
    }
    std::size_t index = 0;
    if (figure.second) {
        for (const Curve& curve : figure.second->curves) {
            traces.push_back(trace_of(curve, x, second, look_of(index++, false, true)));
        }
    }
    return traces;
}

std::string numbers_of(const std::vector<Run>& runs) {
    std::string text;
    for (const Run& run : runs) {
        for (const Point& point : run) {
            fmt::format_to(std::back_inserter(text), "{:.9g} {:.9g}\n", point.x, point.y);
        }
        text += "\n";
    }
    return text + "e\n";
}

/// The curves of the second axis first, so that they lie behind; symbols last, on top of lines.
Plots plots_of(const Sheet& sheet, const std::vector<Trace>& traces, std::size_t front_curves) {
    Plots plots;
    const auto add_lines = [&](const Trace& trace) {
        if (trace.lines.empty()) return;
        plots.add("'-' using 1:2 with lines " + sheet.style(trace.look.stroke),
                  numbers_of(trace.lines), clean_text(trace.curve->name));
    };
    for (std::size_t i = front_curves; i < traces.size(); ++i) add_lines(traces[i]);
    for (std::size_t i = 0; i < front_curves; ++i) add_lines(traces[i]);
    for (const Trace& trace : traces) {
        if (trace.symbols.empty()) continue;
        plots.add("'-' using 1:2 with points " +
                      sheet.symbol_style(trace.look.symbol, trace.look.stroke.colour),
                  numbers_of(trace.symbols),
                  clean_text(trace.curve->name) + (trace.lines.empty() ? "" : " (single points)"));
    }
    // gnuplot draws the frame only together with a plot.
    if (plots.names.empty()) plots.add("NaN", "", "nothing to show");
    return plots;
}

/// The key below the frame: samples and names in rows.
struct Key {
    std::size_t columns = 1;
    std::vector<std::vector<std::string>> names;
    std::vector<std::size_t> row_lines;
    double height = 0.0;
};

Key key_of(const std::vector<Trace>& traces) {
    const double room = sheet_width - 2.0 * edge;
    double longest = 0.0;
    for (const Trace& trace : traces) {
        longest = std::max(longest, font_size * text_width(clean_text(trace.curve->name)));
    }
    Key key;
    const double wanted = room / (sample_length + 3.0 * gap + longest);
    key.columns = static_cast<std::size_t>(std::clamp(wanted, 1.0, 3.0));
    key.columns = std::min(key.columns, traces.size());
    const double column = room / static_cast<double>(key.columns);
    const double text_room = (column - sample_length - 2.0 * gap) / font_size;
    for (std::size_t i = 0; i < traces.size(); ++i) {
        key.names.push_back(lines_of(clean_text(traces[i].curve->name), text_room, 2));
        if (i % key.columns == 0) key.row_lines.push_back(1);
        key.row_lines.back() = std::max(key.row_lines.back(), key.names.back().size());
    }
    for (const std::size_t lines : key.row_lines) {
        key.height += static_cast<double>(lines) * line_height + 1.0;
    }
    return key;
}

void draw_key(Sheet& sheet, const Key& key, const std::vector<Trace>& traces) {
    const double column = (sheet_width - 2.0 * edge) / static_cast<double>(key.columns);
    double y = edge + key.height - line_height / 2.0;
    for (std::size_t i = 0; i < traces.size(); ++i) {
        const double x = edge + static_cast<double>(i % key.columns) * column;
        const Look& look = traces[i].look;
        if (traces[i].lines.empty() && !traces[i].symbols.empty()) {
            sheet.symbol(x + sample_length / 2.0, y,
                         sheet.symbol_style(look.symbol, look.stroke.colour));
        } else {
            sheet.line(x, y, x + sample_length, y, look.stroke, false);
        }
        sheet.paragraph(x + sample_length + gap, y, key.names[i], Align::left);
        if ((i + 1) % key.columns == 0) {
            y -= static_cast<double>(key.row_lines[i / key.columns]) * line_height + 1.0;
        }
    }
}

/// Labels of marks, each in the lowest row where it does not touch another.
struct MarkLabel {
    double x = 0.0;  ///< its middle [pt]
    std::size_t row = 0;
    std::string text;
};

std::vector<MarkLabel> mark_labels(const Figure& figure, const Scale& x, const Frame& frame) {
    constexpr std::size_t rows = 4;
    std::vector<MarkLabel> labels;
    for (const Mark& mark : figure.marks) {
        if (mark.label.empty() || !x.has(mark.x)) continue;
        const double position = x.position(mark.x);
        if (position < 0.0 || position > 1.0) continue;
        const std::vector<std::string> line =
            lines_of(clean_text(mark.label), (sheet_width - 2.0 * edge) / font_size, 1);
        if (line.empty()) continue;
        const double half = font_size * text_width(line[0]) / 2.0;
        const double middle = frame.left + position * (frame.right - frame.left);
        MarkLabel label{std::clamp(middle, edge + half, sheet_width - edge - half), 0, line[0]};
        const auto touches = [&](const MarkLabel& other) {
            const double other_half = font_size * text_width(other.text) / 2.0;
            return other.row == label.row && std::abs(other.x - label.x) < half + other_half + gap;
        };
        while (label.row < rows && std::any_of(labels.begin(), labels.end(), touches)) ++label.row;
        if (label.row < rows) labels.push_back(label);
    }
    return labels;
}

void draw_marks(Sheet& sheet, const Figure& figure, const Scale& x) {
    const Frame& frame = sheet.frame();
    for (const Mark& mark : figure.marks) {
        if (!x.has(mark.x)) continue;
        const double position = x.position(mark.x);
        if (position < 0.0 || position > 1.0) continue;
        const double place = frame.left + position * (frame.right - frame.left);
        sheet.line(place, frame.bottom, place, frame.top, mark_stroke, true);
    }
}

}  // namespace

Script figure_script(const Figure& figure, PictureFormat format) {
    Extent x_data;
    Extent y_data;
    Extent second_data;
    for (const Curve& curve : figure.curves) {
        extend(x_data, figure.x, curve.x);
        extend(y_data, figure.y, curve.y);
    }
    if (figure.second) {
        for (const Curve& curve : figure.second->curves) {
            extend(x_data, figure.x, curve.x);
            extend(second_data, figure.second->axis, curve.y);
        }
    }
    const Axis* right = figure.second ? &figure.second->axis : nullptr;
    const Scale x = scale_of(figure.x, x_data, 0.0);
    const Scale y = scale_of(figure.y, y_data, 0.04);
    const Scale second = right != nullptr ? scale_of(*right, second_data, 0.04) : Scale{};
    const std::vector<Trace> traces = traces_of(figure, x, y, second);

    const Texts texts = texts_of(figure.title, figure.x, figure.y, right);
    const double room = frame_height / font_size;
    const std::vector<Tic> y_tics = tics_of(y, room, false);
    const std::vector<Tic> right_tics =
        right != nullptr ? tics_of(second, room, false) : std::vector<Tic>{};
    const Key key = key_of(traces);
    Frame frame;
    frame.left = edge + height_of(texts.y) + widest(y_tics) + 2.0 * gap;
    frame.right = sheet_width - edge - height_of(texts.right) - widest(right_tics) - 2.0 * gap;
    frame.bottom = edge + key.height + gap + height_of(texts.x) + 1.25 * line_height;
    frame.top = frame.bottom + frame_height;
    const std::vector<Tic> x_tics = tics_of(x, (frame.right - frame.left) / font_size, true);
    frame.right = std::min(frame.right, sheet_width - edge - widest(x_tics) / 2.0);
    const std::vector<MarkLabel> labels = mark_labels(figure, x, frame);
    double label_rows = 0.0;
    for (const MarkLabel& label : labels) {
        label_rows = std::max(label_rows, static_cast<double>(label.row) + 1.0);
    }
    const double height =
        frame.top + label_rows * line_height + height_of(texts.title) + edge + gap;

    Sheet sheet(format, height, frame);
    sheet.grid(x_tics, y_tics);
    draw_marks(sheet, figure, x);
    for (const MarkLabel& label : labels) {
        sheet.text(label.x, frame.top + (static_cast<double>(label.row) + 0.6) * line_height,
                   label.text, Align::centre);
    }
    sheet.tics(Side::bottom, x_tics);
    sheet.tics(Side::left, y_tics);
    if (right != nullptr) sheet.tics(Side::right, right_tics);
    sheet.texts(texts);
    draw_key(sheet, key, traces);
    const Plots plots = plots_of(sheet, traces, figure.curves.size());
    return {sheet.commands() + "plot " + plots.requests + "\n" + plots.data, plots.names};
}

}  // namespace stillcoat::present
