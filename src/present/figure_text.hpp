#pragma once
/// Text in pictures: made safe, measured, broken into lines.

#include <string>
#include <vector>

namespace stillcoat::present {

/// Valid UTF-8 without control characters: other bytes become U+FFFD, controls a space.
std::string clean_text(const std::string& text);

/// `text` with "□" for characters that fonts need not have: what the font that Debian puts beside
/// gnuplot (DejaVu Sans) has is Latin, Greek, Cyrillic, punctuation, mathematics, arrows and
/// shapes. A character that no font has would be drawn as a shape larger than the picture in PDF
/// and PNG.
std::string drawable_text(const std::string& text);

/// A double-quoted gnuplot string whose bytes other than letters and spaces are octal escapes: none
/// of them can end the string or start a substitution.
std::string gnuplot_quoted(const std::string& text);

std::string xml_escaped(const std::string& text);

/// Roughly the width in units of the font size, after a broad sans-serif face.
double text_width(const std::string& text);

/// Lines no wider than `width` [font sizes], broken at spaces and in words where one is too long;
/// at most `most_lines`; what is then cut off is replaced by `ending`. Line ends in the text are
/// kept.
std::vector<std::string> lines_of(const std::string& text, double width, std::size_t most_lines,
                                  const std::string& ending = "…");

}  // namespace stillcoat::present
