#pragma once
/// The sheet that a figure is set on: lengths in points, texts and lines at places of our choice.

#include <string>
#include <vector>

#include "present/figure_axis.hpp"
#include "present/figure_script.hpp"

namespace stillcoat::present {

inline constexpr double sheet_width = 243.8;  ///< [pt] 8.6 cm, one column of a journal
inline constexpr double font_size = 8.0;      ///< [pt]
inline constexpr double line_height = 10.0;   ///< [pt]

inline constexpr double frame_height = 150.0;  ///< [pt]
inline constexpr double edge = 4.0;            ///< [pt] free at the sheet's sides
inline constexpr double gap = 4.0;             ///< [pt] between things that belong together

/// A line's look; lengths in points.
struct Stroke {
    std::string colour;  ///< "#rrggbb"
    double width = 0.5;
    std::vector<double> dashes{};  ///< lengths of dash and gap in turn; empty: solid
};

enum class Align { left, centre, right };
enum class Side { bottom, left, right };

/// Where the frame stands on the sheet.
struct Frame {
    double left = 0.0;
    double right = 0.0;  ///< from the sheet's left side
    double bottom = 0.0;
    double top = 0.0;  ///< from the sheet's lower side
};

/// Lines of the texts around a frame.
struct Texts {
    std::vector<std::string> title, x, y, right;
};

/// @param right the axis on the right, if any
Texts texts_of(const std::string& title, const Axis& x, const Axis& y, const Axis* right);
double height_of(const std::vector<std::string>& lines);  ///< [pt]
double widest(const std::vector<Tic>& tics);              ///< [pt] of their labels

class Sheet {
  public:
    Sheet(PictureFormat format, double height, const Frame& frame);

    /// One line of text, centred on y. Upright text is turned to read upwards.
    void text(double x, double y, const std::string& line, Align align, bool upright = false);
    /// Lines one above the other, the first on top and centred on y.
    void paragraph(double x, double y, const std::vector<std::string>& lines, Align align);
    void line(double x1, double y1, double x2, double y2, const Stroke& stroke, bool behind);
    void symbol(double x, double y, const std::string& style);
    /// The title's lines side by side at a side of the frame, the first at `x`.
    void upright_title(double x, const std::vector<std::string>& lines);
    void tics(Side side, const std::vector<Tic>& tics);
    /// Light lines at the labelled tics, behind everything.
    void grid(const std::vector<Tic>& x, const std::vector<Tic>& y);
    void texts(const Texts& texts);
    void command(const std::string& text) { text_ += text + "\n"; }

    const Frame& frame() const { return frame_; }
    /// How a line with this look is plotted: "lw … lc … dt …".
    std::string style(const Stroke& stroke) const;
    /// A symbol of gnuplot's type, about 3 pt wide: "pt … ps … lc …".
    std::string symbol_style(int type, const std::string& colour) const;
    const std::string& commands() const { return text_; }

  private:
    std::string place(double x, double y) const;

    PictureFormat format_;
    double height_;
    Frame frame_;
    double line_unit_;    ///< gnuplot's line width for 1 pt
    double dash_unit_;    ///< gnuplot's dash length for 1 pt in a line 1 pt wide
    double symbol_unit_;  ///< gnuplot's size of a symbol 3 pt wide
    int arrows_ = 0;
    std::string text_;
};

/// Plots: what is asked of gnuplot, and the numbers that follow.
struct Plots {
    std::string requests;
    std::string data;
    std::vector<std::string> names;

    void add(const std::string& request, const std::string& numbers, const std::string& name) {
        requests += (requests.empty() ? "" : ", ") + request;
        data += numbers;
        names.push_back(name);
    }
};

/// gnuplot's list of tics: ("label" position, "" position 1, …).
std::string tic_list(const std::vector<Tic>& tics);

}  // namespace stillcoat::present
