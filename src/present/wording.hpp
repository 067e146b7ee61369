#pragma once
/// Numbers and lengths as the trade writes them.

#include <string>
#include <vector>

#include "stillcoat/materials/property.hpp"
#include "stillcoat/optics/response.hpp"

namespace stillcoat::present {

std::string length_text(double metres);      ///< "5.927 µm"
std::string fraction_text(double fraction);  ///< "5.305 ppm" below 0.1 %, else "1.234 %"
/// A fraction near 1 as "1 − 6.988 ppm", from what it lacks; any other as fraction_text.
std::string near_one_text(double fraction, double lack);
/// A transmittance, as a power of ten when it is very small. @param logarithm ln T
std::string transmittance_text(double transmittance, double logarithm, double lack);
std::string count_text(std::size_t count, const std::string& noun);  ///< "1 layer", "2 layers"
std::string time_text(double seconds);                               ///< "2.862 fs"
std::string frequency_text(double hertz);                            ///< "100 Hz", "10 kHz"
std::string power_text(double watts);                                ///< "103.3 mW"
std::string energy_text(double joules_per_watt);                     ///< "12.3 fJ/W"
std::string amplitude_text(double psd);  ///< √psd in m/√Hz, "6.107e-21"
std::string polarisation_text(optics::Polarisation polarisation);
std::string width_text(const materials::Width& width, const core::QuantityKind& kind);

/// A page of plain text: headings, aligned rows, wrapped paragraphs.
class Page {
  public:
    explicit Page(bool colour) : colour_(colour) {}
    void heading(const std::string& text);
    void line(const std::string& text);
    /// "  label            value", the value wrapped under itself.
    void row(const std::string& label, const std::string& value);
    /// A paragraph behind a mark, wrapped and indented.
    void item(const std::string& text, bool important = false);
    /// Aligned columns, the first to the left, the others to the right.
    void table(const std::vector<std::string>& head,
               const std::vector<std::vector<std::string>>& rows, std::size_t left_columns = 1);
    const std::string& text() const { return text_; }

  private:
    bool colour_;
    std::string text_;
};

/// Words of `text` in lines of at most `width` characters.
std::vector<std::string> wrapped(const std::string& text, std::size_t width);

}  // namespace stillcoat::present
