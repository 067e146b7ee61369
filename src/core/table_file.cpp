#include "stillcoat/core/table_file.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <charconv>
#include <cmath>
#include <filesystem>

#include "stillcoat/core/document.hpp"

namespace stillcoat::core {
namespace {

/// Reads cell after cell; a quoted one may hold commas and line ends.
class CellReader {
  public:
    CellReader(const std::string& text, const std::string& name) : text_(text), name_(name) {
        constexpr const char* byte_order_mark = "\xEF\xBB\xBF";
        if (text.rfind(byte_order_mark, 0) == 0) at_ = 3;
        begin_line();
    }

    bool at_end() const { return at_ >= text_.size(); }

    /// The cells of the next line that is not empty; none at the end.
    std::vector<Cell> row() {
        std::vector<Cell> cells;
        while (!at_end()) {
            if (cells.empty() && text_[at_] == '#') {
                at_ = std::min(text_.find('\n', at_), text_.size() - 1) + 1;
                ++line_;
                begin_line();
                continue;
            }
            cells.push_back(cell());
            if (cells.size() > most_columns) {
                throw InputError(
                    {Problem{cells.back().place, fmt::format("more than {} columns", most_columns),
                             "larger tables are refused", std::nullopt}});
            }
            const bool more = !at_end() && text_[at_] == ',';
            if (!at_end()) ++at_;
            if (more) {
                if (at_end()) cells.push_back(Cell{"", place(0)});
                continue;
            }
            ++line_;
            begin_line();
            if (cells.size() == 1 && cells[0].text.empty()) {
                cells.clear();
                continue;
            }
            break;
        }
        return cells;
    }

  private:
    void begin_line() {
        line_begin_ = at_;
        std::size_t end = text_.find('\n', at_);
        if (end == std::string::npos) end = text_.size();
        line_text_ = text_.substr(at_, end - at_);
        if (!line_text_.empty() && line_text_.back() == '\r') line_text_.pop_back();
    }

    Place place(std::size_t length) const {
        const std::size_t column = std::min(at_ - line_begin_, line_text_.size());
        return Place{name_, line_, static_cast<int>(column) + 1,
                     std::max(1, static_cast<int>(length)), line_text_};
    }

    Cell cell() {
        while (!at_end() && text_[at_] == ' ') ++at_;
        Cell result{"", place(1)};
        if (!at_end() && text_[at_] == '"') {
            quoted(result);
        } else {
            const std::size_t end = std::min(text_.find_first_of(",\n", at_), text_.size());
            result.text = text_.substr(at_, end - at_);
            at_ = end;
        }
        result.text.erase(result.text.find_last_not_of(" \r\t") + 1);
        result.place.length = std::max(1, static_cast<int>(result.text.size()));
        return result;
    }

    void quoted(Cell& result) {
        for (++at_; !at_end(); ++at_) {
            if (text_[at_] == '\n') ++line_;
            if (text_[at_] != '"') {
                result.text += text_[at_];
            } else if (at_ + 1 < text_.size() && text_[at_ + 1] == '"') {
                result.text += text_[at_++];
            } else {
                const std::size_t end = std::min(text_.find_first_of(",\n", at_), text_.size());
                const std::size_t rest = text_.find_first_not_of(" \r\t", at_ + 1);
                if (rest < end) {
                    throw InputError(
                        {Problem{result.place, "text behind the closing quote",
                                 "double a quote that belongs to the cell", std::nullopt}});
                }
                at_ = end;
                return;
            }
        }
        throw InputError({Problem{result.place, "a quoted cell does not end",
                                  "close it with a quote", std::nullopt}});
    }

    const std::string& text_;
    std::string name_;
    std::size_t at_ = 0;
    std::size_t line_begin_ = 0;
    int line_ = 1;
    std::string line_text_;
};

}  // namespace

std::optional<std::size_t> TableFile::column(const std::string& wanted) const {
    const auto found = std::find_if(header.begin(), header.end(),
                                    [&](const Cell& cell) { return cell.text == wanted; });
    if (found == header.end()) return std::nullopt;
    return static_cast<std::size_t>(found - header.begin());
}

TableFile parse_table(const std::string& text, const std::string& name, Problems& problems) {
    check_line_lengths(text, name);
    CellReader reader(text, name);
    TableFile table{name, reader.row(), {}};
    if (table.header.empty()) {
        throw InputError(name + ": empty",
                         "a header line with the names of the columns is expected");
    }
    if (table.header.size() == 1 &&
        table.header[0].text.find_first_of(";\t") != std::string::npos) {
        throw InputError({Problem{table.header[0].place, "the columns are not separated by commas",
                                  "save the table with commas between the cells and points in the "
                                  "numbers",
                                  std::nullopt}});
    }
    while (!reader.at_end()) {
        std::vector<Cell> row = reader.row();
        if (row.empty()) break;
        if (row.size() == table.header.size()) {
            table.rows.push_back(std::move(row));
            continue;
        }
        problems.add(
            row.front().place,
            fmt::format("{} cells where the header has {}", row.size(), table.header.size()),
            "quote a cell that holds a comma");
    }
    return table;
}

TableFile read_table(const std::string& path, Problems& problems) {
    // A pipe would wait for ever.
    std::error_code ignored;
    if (std::filesystem::exists(path, ignored) &&
        !std::filesystem::is_regular_file(path, ignored)) {
        throw InputError(path + ": is no regular file", "give a CSV file");
    }
    return parse_table(read_text_file(path), path, problems);
}

bool check_columns(const TableFile& table, const std::vector<std::string>& required,
                   const std::vector<std::string>& optional, Problems& problems) {
    std::vector<std::string> known = required;
    known.insert(known.end(), optional.begin(), optional.end());
    for (std::size_t i = 0; i < table.header.size(); ++i) {
        const Cell& cell = table.header[i];
        if (table.column(cell.text) != i) {
            problems.add(cell.place, fmt::format("two columns are named \"{}\"", cell.text),
                         "keep one of the two");
        } else if (std::find(known.begin(), known.end(), cell.text) == known.end()) {
            const auto near = nearest_spelling(cell.text, known);
            problems.add(cell.place, fmt::format("unknown column \"{}\"", cell.text),
                         near ? fmt::format("did you mean {}?", *near)
                              : fmt::format("allowed: {}", fmt::join(known, ", ")));
        }
    }
    bool complete = true;
    for (const std::string& name : required) {
        if (table.column(name)) continue;
        complete = false;
        problems.add(table.header.front().place, fmt::format("there is no column \"{}\"", name),
                     fmt::format("needed: {}", fmt::join(required, ", ")));
    }
    return complete;
}

std::optional<double> number_in(const Cell& cell, int power, const Limits& limits,
                                const std::string& what, Problems& problems) {
    // The exponent is changed in the text: a product would be rounded a second time.
    const std::size_t mark = cell.text.find_first_of("eE");
    int exponent = 0;
    bool ok = !cell.text.empty();
    if (mark != std::string::npos) {
        const char* const end = cell.text.data() + cell.text.size();
        const char* begin = cell.text.data() + mark + 1;
        if (begin < end && *begin == '+') ++begin;
        const auto [after, error] = std::from_chars(begin, end, exponent);
        ok = error == std::errc() && after == end && std::abs(exponent) < 10'000;
    }
    double value = 0.0;
    if (ok) {
        const std::string text = fmt::format("{}e{}", cell.text.substr(0, mark), exponent + power);
        const auto [after, error] = std::from_chars(text.data(), text.data() + text.size(), value);
        ok = error == std::errc() && after == text.data() + text.size() && std::isfinite(value);
    }
    if (!ok) {
        problems.add(cell.place, fmt::format("\"{}\" is not a number for {}", cell.text, what),
                     "a decimal number such as 241.3 is expected");
        return std::nullopt;
    }
    if (!limits.admit(value)) {
        problems.add(cell.place, fmt::format("{} is {}", what, cell.text),
                     fmt::format("it must be {}", limits.words));
        return std::nullopt;
    }
    return value;
}

namespace {

/// The digits with a point behind the first `before`; none when that is all of them.
std::string with_point(const std::string& digits, int before) {
    const auto split = static_cast<std::size_t>(before);
    if (split >= digits.size()) return digits;
    return fmt::format("{}.{}", digits.substr(0, split), digits.substr(split));
}

}  // namespace

std::string shifted_decimal(double value, int power) {
    // Shortest digits and exponent of the double itself, then the point is moved.
    std::string shortest = fmt::format("{}", value);
    for (int digits = 0; digits <= 17; ++digits) {
        const std::string tried = fmt::format("{:.{}e}", value, digits);
        double back = 0.0;
        std::from_chars(tried.data(), tried.data() + tried.size(), back);
        if (back == value) {
            shortest = tried;
            break;
        }
    }
    const std::size_t mark = shortest.find('e');
    if (mark == std::string::npos) return shortest;
    std::string digits = shortest.substr(0, mark);
    const bool negative = digits.front() == '-';
    if (negative) digits.erase(0, 1);
    digits.erase(std::remove(digits.begin(), digits.end(), '.'), digits.end());
    const int exponent = std::stoi(shortest.substr(mark + 1)) - power;
    const int size = static_cast<int>(digits.size());
    std::string text;
    if (exponent < -7 || exponent > 15) {
        text = fmt::format("{}e{}", with_point(digits, 1), exponent);
    } else if (exponent < 0) {
        text = "0." + std::string(static_cast<std::size_t>(-exponent - 1), '0') + digits;
    } else if (exponent >= size - 1) {
        text = digits + std::string(static_cast<std::size_t>(exponent - size + 1), '0');
    } else {
        text = with_point(digits, exponent + 1);
    }
    return (negative ? "-" : "") + text;
}

}  // namespace stillcoat::core
