#pragma once
/// Tables of published check values: one row each, columns
/// row,quantity,inputs,value_as_printed,unit,relative_tolerance,source,place,status,remark.
/// `inputs` is a list `name = value; name = value`. Fields with commas stand in double quotes.

#include <fstream>
#include <map>
#include <stdexcept>
#include <string>
#include <vector>

namespace stillcoat::support {

struct PublishedRow {
    std::string row;
    std::string quantity;
    std::map<std::string, std::string> inputs;
    double value;
    std::string unit;
    double relative_tolerance;

    double input(const std::string& name) const { return std::stod(text(name)); }
    const std::string& text(const std::string& name) const {
        const auto found = inputs.find(name);
        if (found == inputs.end()) throw std::runtime_error(row + " has no input " + name);
        return found->second;
    }
};

inline std::vector<std::string> comma_separated_fields(const std::string& line) {
    std::vector<std::string> fields(1);
    bool quoted = false;
    for (const char c : line) {
        if (c == '"') {
            quoted = !quoted;
        } else if (c == ',' && !quoted) {
            fields.emplace_back();
        } else {
            fields.back() += c;
        }
    }
    return fields;
}

inline std::string trimmed(const std::string& text) {
    const std::size_t first = text.find_first_not_of(' ');
    if (first == std::string::npos) return "";
    return text.substr(first, text.find_last_not_of(' ') - first + 1);
}

inline std::map<std::string, std::string> named_inputs(const std::string& text) {
    std::map<std::string, std::string> inputs;
    std::size_t start = 0;
    while (start < text.size()) {
        const std::size_t end = std::min(text.find(';', start), text.size());
        const std::string item = text.substr(start, end - start);
        const std::size_t equals = item.find('=');
        if (equals == std::string::npos) throw std::runtime_error("not `name = value`: " + item);
        inputs[trimmed(item.substr(0, equals))] = trimmed(item.substr(equals + 1));
        start = end + 1;
    }
    return inputs;
}

/// All rows of STILLCOAT_PUBLISHED/<file>. @throws std::runtime_error for a malformed or empty
/// file.
inline std::vector<PublishedRow> published_rows(const std::string& path) {
    std::ifstream file(path);
    std::string line;
    std::vector<PublishedRow> rows;
    std::getline(file, line);
    if (line !=
        "row,quantity,inputs,value_as_printed,unit,relative_tolerance,source,place,status,remark") {
        throw std::runtime_error(path + ": missing, or other columns than expected");
    }
    while (std::getline(file, line)) {
        if (line.empty()) continue;
        const std::vector<std::string> f = comma_separated_fields(line);
        if (f.size() != 10) throw std::runtime_error(path + ": not ten fields: " + line);
        rows.push_back({f[0], f[1], named_inputs(f[2]), std::stod(f[3]), f[4], std::stod(f[5])});
    }
    if (rows.empty()) throw std::runtime_error(path + " has no rows");
    return rows;
}

}  // namespace stillcoat::support
