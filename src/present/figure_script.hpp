#pragma once
/// Figures as programs for gnuplot: all layout, colours and line styles are decided here.

#include <string>
#include <vector>

#include "present/figure.hpp"

namespace stillcoat::present {

enum class PictureFormat { svg, pdf, png };

struct Script {
    std::string text;
    /// Full names of the things that are plotted, in gnuplot's order.
    std::vector<std::string> names;
};

Script figure_script(const Figure& figure, PictureFormat format);
Script figure_script(const Map& map, PictureFormat format);

}  // namespace stillcoat::present
