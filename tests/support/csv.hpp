#pragma once
/// Reads the data rows of checks: CSV with a header line, cells optionally in double quotes.

#include <fstream>
#include <map>
#include <stdexcept>
#include <string>
#include <vector>

namespace stillcoat::test {

using Row = std::map<std::string, std::string>;

inline std::vector<std::string> split_csv_line(const std::string& line) {
    std::vector<std::string> cells(1);
    bool quoted = false;
    for (std::size_t i = 0; i < line.size(); ++i) {
        const char c = line[i];
        if (c == '"' && quoted && i + 1 < line.size() && line[i + 1] == '"') {
            cells.back() += '"';
            ++i;
        } else if (c == '"') {
            quoted = !quoted;
        } else if (c == ',' && !quoted) {
            cells.emplace_back();
        } else if (c != '\r') {
            cells.back() += c;
        }
    }
    return cells;
}

inline std::vector<Row> read_csv(const std::string& path) {
    std::ifstream stream(path);
    if (!stream) throw std::runtime_error("no file " + path);
    std::string line;
    std::vector<std::string> head;
    std::vector<Row> rows;
    while (std::getline(stream, line)) {
        if (line.empty() || line[0] == '#') continue;
        const std::vector<std::string> cells = split_csv_line(line);
        if (head.empty()) {
            head = cells;
            continue;
        }
        if (cells.size() != head.size())
            throw std::runtime_error(path + ": a row has another length: " + line);
        Row row;
        for (std::size_t i = 0; i < head.size(); ++i) row[head[i]] = cells[i];
        rows.push_back(std::move(row));
    }
    return rows;
}

/// Cell as a number; `otherwise` when empty.
inline double number(const Row& row, const std::string& key, double otherwise) {
    const std::string& cell = row.at(key);
    return cell.empty() ? otherwise : std::stod(cell);
}

}  // namespace stillcoat::test
