#pragma once
/// Tables in CSV files: comma-separated, one header line whose names end with their units.
/// Format: RFC 4180 (Y. Shafranovich, 2005), with either line ending; empty lines
/// and lines that begin with # are skipped.

#include <optional>
#include <string>
#include <vector>

#include "stillcoat/core/errors.hpp"
#include "stillcoat/core/reader.hpp"

namespace stillcoat::core {

inline constexpr std::size_t most_columns = 100;

struct Cell {
    std::string text;  ///< without its quotes and the blanks around it
    Place place;
};

/// A table whose rows all have as many cells as its header.
struct TableFile {
    std::string name;  ///< of the file as given
    std::vector<Cell> header;
    std::vector<std::vector<Cell>> rows;

    /// Which column has this name; none when there is no such column.
    std::optional<std::size_t> column(const std::string& name) const;
};

/// The table in `text`; rows of a wrong length are problems and left out.
/// @throws InputError when there is no header or a quoted cell does not end
TableFile parse_table(const std::string& text, const std::string& name, Problems& problems);

/// read_text_file and parse_table in one.
TableFile read_table(const std::string& path, Problems& problems);

/// Reports columns that are named twice, neither `required` nor `optional`, or missing.
/// True when every required column is there.
bool check_columns(const TableFile& table, const std::vector<std::string>& required,
                   const std::vector<std::string>& optional, Problems& problems);

/// The number in a cell times 10^`power`, rounded once, so that "241.3" with power −9 is the very
/// double that 241.3e-9 is; absent, with a problem, when it is no number or outside `limits`.
std::optional<double> number_in(const Cell& cell, int power, const Limits& limits,
                                const std::string& what, Problems& problems);

/// The shortest decimal text of `value` times 10^−`power` that number_in reads back as `value`.
std::string shifted_decimal(double value, int power);

}  // namespace stillcoat::core
