#include "materials/curve_csv.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <charconv>
#include <cmath>
#include <filesystem>
#include <string_view>

#include "materials/evaluator.hpp"

namespace stillcoat::materials {
namespace {

namespace fs = std::filesystem;

/// A line of the file and where it stands.
struct Line {
    std::string text;
    int number;
};
struct Cell {
    std::string text;
    int column;  ///< of its first character, from 1
};

std::vector<Line> lines_of(std::string_view text) {
    constexpr std::string_view byte_order_mark = "\xEF\xBB\xBF";
    if (text.substr(0, byte_order_mark.size()) == byte_order_mark)
        text.remove_prefix(byte_order_mark.size());
    std::vector<Line> lines;
    for (int number = 1; !text.empty(); ++number) {
        const std::size_t end = text.find('\n');
        std::string line(text.substr(0, end));
        if (!line.empty() && line.back() == '\r') line.pop_back();
        text.remove_prefix(end == std::string_view::npos ? text.size() : end + 1);
        const std::size_t first = line.find_first_not_of(" \t");
        if (first != std::string::npos && line[first] != '#')
            lines.push_back({std::move(line), number});
    }
    return lines;
}

std::vector<Cell> cells_of(const std::string& line) {
    std::vector<Cell> cells;
    for (std::size_t begin = 0; begin <= line.size();) {
        const std::size_t end = std::min(line.find(',', begin), line.size());
        const std::string cell = line.substr(begin, end - begin);
        const std::size_t first = cell.find_first_not_of(" \t");
        const std::size_t last = cell.find_last_not_of(" \t");
        const bool empty = first == std::string::npos;
        cells.push_back({empty ? "" : cell.substr(first, last - first + 1),
                         static_cast<int>(begin + (empty ? 0 : first)) + 1});
        begin = end + 1;
    }
    return cells;
}

class CsvReader {
  public:
    CsvReader(std::string file, PropertyId property, core::Problems& problems)
        : file_(std::move(file)), about_(info(property)), problems_(problems) {}

    std::optional<WavelengthTable> table(const std::string& text) {
        const std::vector<Line> lines = lines_of(text);
        if (lines.empty() || !read_header(lines[0])) {
            if (lines.empty()) problems_.add({file_, 0, 0, 1, ""}, file_ + " is empty", header());
            return std::nullopt;
        }
        for (std::size_t i = 1; i < lines.size(); ++i) {
            if (!read_row(lines[i])) return std::nullopt;
        }
        if (result_.wavelength.size() < 2) {
            problems_.add({file_, lines.back().number, 1, 1, lines.back().text},
                          file_ + " has fewer than two wavelengths", "a curve needs two or more");
            return std::nullopt;
        }
        return result_;
    }

  private:
    std::string header() const {
        return "its first line must be wavelength_nm,refractive_index or "
               "wavelength_nm,refractive_index,extinction_coefficient";
    }

    bool fail(const Line& line, const Cell& cell, const std::string& message,
              const std::string& hint) {
        const int length = std::max(1, static_cast<int>(cell.text.size()));
        problems_.add({file_, line.number, cell.column, length, line.text}, message, hint);
        return false;
    }

    bool read_header(const Line& line) {
        const std::vector<std::string> known{"wavelength_nm", "refractive_index",
                                             "extinction_coefficient"};
        std::vector<std::string> names;
        for (const Cell& cell : cells_of(line.text)) {
            if (std::find(known.begin(), known.end(), cell.text) == known.end())
                return fail(line, cell, fmt::format("unknown column \"{}\"", cell.text), header());
            if (std::find(names.begin(), names.end(), cell.text) != names.end())
                return fail(line, cell, fmt::format("column {} stands twice", cell.text), header());
            names.push_back(cell.text);
        }
        columns_ = names.size();
        const auto position = [&names](const std::string& name) {
            return static_cast<std::size_t>(std::find(names.begin(), names.end(), name) -
                                            names.begin());
        };
        wavelength_column_ = position("wavelength_nm");
        value_column_ = position(about_.key);
        for (const std::string& needed : {known[0], about_.key}) {
            if (position(needed) == columns_)
                return fail(line, {line.text, 1}, fmt::format("column {} is missing", needed),
                            header());
        }
        return true;
    }

    std::optional<double> number(const Line& line, const Cell& cell) {
        double value = 0.0;
        const char* end = cell.text.data() + cell.text.size();
        const auto [stop, error] = std::from_chars(cell.text.data(), end, value);
        if (error == std::errc() && stop == end) return value;
        fail(line, cell, fmt::format("\"{}\" is not a number", cell.text),
             "decimal points, commas between the columns");
        return std::nullopt;
    }

    bool read_row(const Line& line) {
        const std::vector<Cell> cells = cells_of(line.text);
        if (cells.size() != columns_) {
            return fail(
                line, cells.back(),
                fmt::format("this line has {} cells, the first one {}", cells.size(), columns_),
                "decimal points, commas between the columns");
        }
        const Cell& value_cell = cells[value_column_];
        const Cell& wavelength_cell = cells[wavelength_column_];
        const auto nanometres = number(line, wavelength_cell);
        const auto value = nanometres ? number(line, value_cell) : std::nullopt;
        if (!value) return false;
        const double wavelength = *nanometres * 1e-9;
        const double before = result_.wavelength.empty() ? 0.0 : result_.wavelength.back();
        if (!std::isfinite(wavelength) || wavelength <= before)
            return fail(line, wavelength_cell, "wavelengths must increase from line to line", "");
        if (!is_admissible(about_.id, *value)) {
            return fail(line, value_cell, fmt::format("{} is {}", about_.key, value_cell.text),
                        "it must be " + about_.limits.words);
        }
        result_.wavelength.push_back(wavelength);
        result_.value.push_back(*value);
        return true;
    }

    std::string file_;
    const PropertyInfo& about_;
    core::Problems& problems_;
    std::size_t columns_ = 0, wavelength_column_ = 0, value_column_ = 0;
    WavelengthTable result_;
};

}  // namespace

std::optional<WavelengthTable> read_curve_csv(core::TableReader& reader, const std::string& key,
                                              PropertyId property) {
    const std::string named = reader.required_text(key);
    if (named.empty()) return std::nullopt;
    const std::string beside = reader.node().find(key)->place().file;
    const std::string file = (fs::path(beside).parent_path() / named).string();
    std::string text;
    try {
        text = core::read_text_file(file);
    } catch (const core::InputError& error) {
        reader.problem_at(
            key, fmt::format("{} in {}: {}", key, reader.name(), error.problems().front().message),
            "a path relative to the folder of this file");
        return std::nullopt;
    }
    return CsvReader(file, property, reader.problems()).table(text);
}

}  // namespace stillcoat::materials
