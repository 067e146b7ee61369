#include "present/figure_sheet.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "present/figure_text.hpp"

namespace stillcoat::present {
namespace {

constexpr double points_per_inch = 72.0;
constexpr double svg_pixels_per_inch = 96.0;   // by definition (CSS)
constexpr double png_pixels_per_inch = 300.0;  // what journals ask for

// gnuplot's cairo terminals take a font's points for 1/72 of 96 pixels or points: 0.75 undoes it.
std::string terminal(PictureFormat format, double height) {
    switch (format) {
        case PictureFormat::svg: {
            const double scale = svg_pixels_per_inch / points_per_inch;
            return fmt::format(
                "set terminal svg enhanced size {:.0f},{:.0f} font \"sans-serif,{:.2f}\" "
                "background \"#ffffff\" rounded",
                sheet_width * scale, height * scale, font_size * scale);
        }
        case PictureFormat::pdf:
            return fmt::format(
                "set terminal pdfcairo enhanced size {:.4f}in,{:.4f}in font \"Sans,{}\" "
                "fontscale 0.75 background \"#ffffff\" rounded",
                sheet_width / points_per_inch, height / points_per_inch, font_size);
        case PictureFormat::png:
            break;
    }
    const double scale = png_pixels_per_inch / points_per_inch;
    return fmt::format(
        "set terminal pngcairo enhanced size {:.0f},{:.0f} font \"Sans,{}\" fontscale {:.4f} "
        "background \"#ffffff\" rounded",
        sheet_width * scale, height * scale, font_size, 0.75 * scale);
}

const char* word(Align align) {
    return align == Align::left ? "left" : align == Align::centre ? "center" : "right";
}

const Stroke grid_stroke{"#dddddd", 0.4};

}  // namespace

double widest(const std::vector<Tic>& tics) {
    double width = 0.0;
    for (const Tic& tic : tics) width = std::max(width, label_width(tic.label));
    constexpr double wider_fonts = 1.06;
    return width * font_size * wider_fonts;
}

double height_of(const std::vector<std::string>& lines) {
    return static_cast<double>(lines.size()) * line_height;
}

/// An axis' title in two lines at the most; its unit, in brackets at the end, is kept.
std::vector<std::string> axis_lines(const std::string& title, double width) {
    const std::string clean = clean_text(title);
    const std::size_t bracket = clean.rfind(" [");
    const std::string unit = bracket == std::string::npos ? "" : clean.substr(bracket);
    const bool short_enough = text_width(unit) < width / 2.0;
    return lines_of(clean, width, 2, short_enough ? "…" + unit : "…");
}

Texts texts_of(const std::string& title, const Axis& x, const Axis& y, const Axis* right) {
    const double wide = (sheet_width - 2.0 * edge) / font_size;
    const double high = frame_height / font_size;
    Texts texts;
    texts.title = lines_of(title, wide, 3);
    texts.x = axis_lines(x.title, 0.75 * wide);
    texts.y = axis_lines(y.title, high);
    if (right != nullptr) texts.right = axis_lines(right->title, high);
    return texts;
}

std::string tic_list(const std::vector<Tic>& tics) {
    std::string list;
    for (const Tic& tic : tics) {
        const std::string start = list.empty() ? "" : ", ";
        // Labels are made here, of digits and "^{…}": the one place where gnuplot's mark-up is on.
        list += fmt::format("{}\"{}\" {:.9f}{}", start, tic.label, tic.position,
                            tic.label.empty() ? " 1" : "");
    }
    return "(" + list + ")";
}

Sheet::Sheet(PictureFormat format, double height, const Frame& frame)
    : format_(format), height_(height), frame_(frame) {
    // Measured in the files that gnuplot 5.4 writes.
    line_unit_ = format == PictureFormat::svg   ? svg_pixels_per_inch / points_per_inch
                 : format == PictureFormat::pdf ? 2.0
                                                : png_pixels_per_inch / points_per_inch;
    dash_unit_ = format == PictureFormat::svg ? 2.0 : 3.636;
    symbol_unit_ = format == PictureFormat::png ? 2.0 : 0.5;
    command("set encoding utf8");
    command(terminal(format, height));
    command("unset key");
    command("set xrange [0:1]");
    command("set yrange [0:1]");
    command("set clip two");
    command(fmt::format("set lmargin at screen {:.6f}", frame.left / sheet_width));
    command(fmt::format("set rmargin at screen {:.6f}", frame.right / sheet_width));
    command(fmt::format("set bmargin at screen {:.6f}", frame.bottom / height));
    command(fmt::format("set tmargin at screen {:.6f}", frame.top / height));
    command("set tics front");
    command("set border 15 front " + style({"#333333", 0.5}));
}

std::string Sheet::place(double x, double y) const {
    return fmt::format("screen {:.6f}, screen {:.6f}", x / sheet_width, y / height_);
}

std::string Sheet::style(const Stroke& stroke) const {
    std::string dashes;
    for (std::size_t i = 0; i < stroke.dashes.size(); ++i) {
        // The round caps, half a width at either end, belong to the dash.
        const double caps = i % 2 == 0 ? -stroke.width : stroke.width;
        const double length = std::max(stroke.dashes[i] + caps, 0.05);
        // gnuplot counts dashes in widths of their line.
        dashes +=
            fmt::format("{}{:.3f}", dashes.empty() ? "" : ",", length * dash_unit_ / stroke.width);
    }
    return fmt::format("lc rgb \"{}\" lw {:.3f} dt {}", stroke.colour, stroke.width * line_unit_,
                       dashes.empty() ? "solid" : "(" + dashes + ")");
}

void Sheet::text(double x, double y, const std::string& line, Align align, bool upright) {
    // In an SVG file the reader's own fonts are used, which have more characters.
    const std::string drawn = format_ == PictureFormat::svg ? line : drawable_text(line);
    command(fmt::format("set label {} at {} {}{} noenhanced front", gnuplot_quoted(drawn),
                        place(x, y), word(align), upright ? " rotate by 90" : ""));
}

void Sheet::paragraph(double x, double y, const std::vector<std::string>& lines, Align align) {
    for (const std::string& line : lines) {
        text(x, y, line, align);
        y -= line_height;
    }
}

void Sheet::line(double x1, double y1, double x2, double y2, const Stroke& stroke, bool behind) {
    command(fmt::format("set arrow {} from {} to {} nohead {} {}", ++arrows_, place(x1, y1),
                        place(x2, y2), behind ? "back" : "front", style(stroke)));
}

std::string Sheet::symbol_style(int type, const std::string& colour) const {
    return fmt::format("pt {} ps {:.3f} lc rgb \"{}\"", type, symbol_unit_, colour);
}

void Sheet::symbol(double x, double y, const std::string& style) {
    command(fmt::format("set label \"\" at {} point {} front", place(x, y), style));
}

void Sheet::upright_title(double x, const std::vector<std::string>& lines) {
    for (const std::string& line : lines) {
        text(x, (frame_.bottom + frame_.top) / 2.0, line, Align::centre, true);
        x += line_height;
    }
}

void Sheet::tics(Side side, const std::vector<Tic>& tics) {
    const char* axis = side == Side::bottom ? "x" : side == Side::left ? "y" : "y2";
    if (side == Side::right) command("set y2range [0:1]");
    command(fmt::format("set {}tics {} scale 0.6,0.3 offset 0,{} enhanced {}", axis,
                        side == Side::right || side == Side::left ? "nomirror" : "mirror",
                        side == Side::bottom ? "0.3" : "0", tic_list(tics)));
}

void Sheet::grid(const std::vector<Tic>& x, const std::vector<Tic>& y) {
    for (const Tic& tic : x) {
        const double place = frame_.left + tic.position * (frame_.right - frame_.left);
        if (!tic.label.empty()) {
            line(place, frame_.bottom, place, frame_.top, grid_stroke, true);
        }
    }
    for (const Tic& tic : y) {
        const double place = frame_.bottom + tic.position * (frame_.top - frame_.bottom);
        if (!tic.label.empty()) {
            line(frame_.left, place, frame_.right, place, grid_stroke, true);
        }
    }
}

void Sheet::texts(const Texts& texts) {
    const double middle = (frame_.left + frame_.right) / 2.0;
    paragraph(sheet_width / 2.0, height_ - edge - line_height / 2.0, texts.title, Align::centre);
    paragraph(middle, frame_.bottom - 1.75 * line_height, texts.x, Align::centre);
    upright_title(edge + line_height / 2.0, texts.y);
    upright_title(sheet_width - edge - height_of(texts.right) + line_height / 2.0, texts.right);
}

}  // namespace stillcoat::present
