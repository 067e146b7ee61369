#pragma once
/// Tables of published check values: one row each, columns
/// row,quantity,inputs,value_as_printed,unit,relative_tolerance,source,place,status,remark.
/// `inputs` is a list `name = value; name = value`.

#include <algorithm>
#include <map>
#include <stdexcept>
#include <string>
#include <vector>

#include "support/csv.hpp"

namespace stillcoat::test {

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

/// @throws std::runtime_error for a malformed or empty file.
inline std::vector<PublishedRow> published_rows(const std::string& path) {
    std::vector<PublishedRow> rows;
    for (const Row& row : read_csv(path)) {
        rows.push_back({row.at("row"), row.at("quantity"), named_inputs(row.at("inputs")),
                        std::stod(row.at("value_as_printed")), row.at("unit"),
                        std::stod(row.at("relative_tolerance"))});
    }
    if (rows.empty()) throw std::runtime_error(path + " has no rows");
    return rows;
}

}  // namespace stillcoat::test
