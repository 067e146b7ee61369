#include "present/wording.hpp"

#include "stillcoat/core/errors.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <sstream>

namespace stillcoat::present {
namespace {

constexpr std::size_t page_width = 100;
constexpr std::size_t label_width = 26;

std::size_t characters(const std::string& text) {
    return static_cast<std::size_t>(std::count_if(text.begin(), text.end(), [](char c) {
        return (static_cast<unsigned char>(c) & 0xC0) != 0x80;
    }));
}

std::string padded(const std::string& text, std::size_t width, bool left) {
    const std::size_t size = characters(text);
    const std::string blanks(width > size ? width - size : 0, ' ');
    return left ? text + blanks : blanks + text;
}

struct Scale {
    double unit;
    const char* name;
};

/// The largest unit that leaves at least one digit before the point.
std::string scaled(double value, const std::vector<Scale>& scales, int digits) {
    if (value == 0.0) return fmt::format("0 {}", scales.back().name);
    const Scale* best = &scales.back();
    for (const Scale& scale : scales) {
        if (std::abs(value) >= scale.unit * 0.99995) {
            best = &scale;
            break;
        }
    }
    return fmt::format("{:.{}g} {}", value / best->unit, digits, best->name);
}

}  // namespace

std::string length_text(double metres) {
    return scaled(metres,
                  {{1e3, "km"}, {1.0, "m"}, {1e-2, "cm"}, {1e-3, "mm"}, {1e-6, "µm"}, {1e-9, "nm"}},
                  5);
}

std::string fraction_text(double fraction) {
    if (fraction == 0.0) return "0";
    if (std::abs(fraction) < 1e-3) return fmt::format("{:.4g} ppm", fraction * 1e6);
    return fmt::format("{:.4g} %", fraction * 100.0);
}

std::string near_one_text(double fraction, double lack) {
    return lack < 1e-3 ? "1 − " + fraction_text(lack) : fraction_text(fraction);
}

std::string transmittance_text(double transmittance, double logarithm, double lack) {
    constexpr double still_ppm = 1e-12;
    if (transmittance < still_ppm && std::isfinite(logarithm)) {
        return fmt::format("10^{:.2f}", logarithm / std::log(10.0));
    }
    return near_one_text(transmittance, lack);
}

std::string count_text(std::size_t count, const std::string& noun) {
    return fmt::format("{} {}{}", count, noun, count == 1 ? "" : "s");
}

std::string time_text(double seconds) {
    return scaled(
        seconds,
        {{1.0, "s"}, {1e-3, "ms"}, {1e-6, "µs"}, {1e-9, "ns"}, {1e-12, "ps"}, {1e-15, "fs"}}, 4);
}

std::string frequency_text(double hertz) {
    return scaled(
        hertz,
        {{1e9, "GHz"}, {1e6, "MHz"}, {1e3, "kHz"}, {1.0, "Hz"}, {1e-3, "mHz"}, {1e-6, "µHz"}}, 4);
}

std::string power_text(double watts) {
    return scaled(
        watts, {{1e6, "MW"}, {1e3, "kW"}, {1.0, "W"}, {1e-3, "mW"}, {1e-6, "µW"}, {1e-9, "nW"}}, 4);
}

std::string energy_text(double joules_per_watt) {
    return scaled(joules_per_watt,
                  {{1e-9, "nJ/W"}, {1e-12, "pJ/W"}, {1e-15, "fJ/W"}, {1e-18, "aJ/W"}}, 4);
}

std::string amplitude_text(double psd) { return fmt::format("{:.3e}", std::sqrt(psd)); }

std::string polarisation_text(optics::Polarisation polarisation) {
    return polarisation == optics::Polarisation::s ? "s" : "p";
}

std::string width_text(const materials::Width& width, const core::QuantityKind& kind) {
    using Form = materials::Width::Form;
    const std::string unit = kind.si_unit == "1" ? "" : " " + kind.si_unit;
    switch (width.form) {
        case Form::absolute:
            return fmt::format("± {:.3g}{}", width.value, unit);
        case Form::relative:
            return fmt::format("± {:.3g} %", width.value * 100.0);
        case Form::geometric:
            return fmt::format("×/÷ {:.3g} (log-normal)", width.value);
        case Form::uniform:
            return fmt::format("anywhere from {:.3g} to {:.3g}{}", width.lower, width.upper, unit);
        case Form::not_stated:
            break;
    }
    return "uncertainty not stated";
}

std::vector<std::string> wrapped(const std::string& text, std::size_t width) {
    std::vector<std::string> lines;
    std::istringstream words(core::printable(text));
    std::string word;
    std::string line;
    while (words >> word) {
        if (!line.empty() && characters(line) + 1 + characters(word) > width) {
            lines.push_back(line);
            line.clear();
        }
        line += (line.empty() ? "" : " ") + word;
    }
    if (!line.empty()) lines.push_back(line);
    return lines;
}

void Page::heading(const std::string& text) {
    if (!text_.empty()) text_ += "\n";
    const std::string shown = core::printable(text);
    text_ += colour_ ? fmt::format("\x1b[1m{}\x1b[0m\n", shown) : shown + "\n";
}

void Page::line(const std::string& text) { text_ += core::printable(text) + "\n"; }

void Page::row(const std::string& label, const std::string& value) {
    std::string start = "  " + padded(core::printable(label), label_width, true);
    for (const std::string& part : wrapped(value, page_width - label_width - 2)) {
        text_ += start + part + "\n";
        start = std::string(label_width + 2, ' ');
    }
}

void Page::item(const std::string& text, bool important) {
    std::string start = important && colour_ ? "  \x1b[1m!\x1b[0m " : important ? "  ! " : "  - ";
    for (const std::string& part : wrapped(text, page_width - 4)) {
        text_ += start + part + "\n";
        start = "    ";
    }
}

void Page::table(const std::vector<std::string>& head,
                 const std::vector<std::vector<std::string>>& rows, std::size_t left_columns) {
    std::vector<std::size_t> widths;
    for (const std::string& cell : head) widths.push_back(characters(cell));
    for (const auto& row : rows) {
        for (std::size_t i = 0; i < row.size() && i < widths.size(); ++i) {
            widths[i] = std::max(widths[i], characters(row[i]));
        }
    }
    const auto print = [&](const std::vector<std::string>& row) {
        std::string line;
        for (std::size_t i = 0; i < row.size(); ++i) {
            line += "  " + padded(row[i], i < widths.size() ? widths[i] : 0, i < left_columns);
        }
        line.erase(line.find_last_not_of(' ') + 1);
        text_ += line + "\n";
    };
    print(head);
    for (const auto& row : rows) print(row);
}

}  // namespace stillcoat::present
