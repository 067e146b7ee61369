#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <iterator>
#include <stdexcept>

#include "present/figure.hpp"
#include "present/figure_text.hpp"

namespace stillcoat::present {
namespace {

void require(bool holds, const std::string& what) {
    if (!holds) throw std::logic_error("figure: " + what);
}

void check(const Axis& axis) {
    require(!axis.title.empty(), "an axis without title");
    for (const auto& limit : {axis.lower, axis.upper}) {
        if (!limit) continue;
        require(std::isfinite(*limit), axis.title + ": a limit that is not finite");
        require(!axis.logarithmic || *limit > 0.0, axis.title + ": a limit ≤ 0, logarithmic");
    }
    if (axis.lower && axis.upper) {
        require(*axis.lower < *axis.upper, axis.title + ": limits that do not increase");
    }
}

void check(const std::vector<double>& values, const std::string& name) {
    for (const double value : values) {
        require(std::isfinite(value), fmt::format("{}: the value {}", name, value));
    }
}

void check(const std::vector<Curve>& curves) {
    for (const Curve& curve : curves) {
        require(!curve.x.empty(), curve.name + ": a curve without points");
        require(curve.x.size() == curve.y.size(), curve.name + ": columns of unequal length");
        check(curve.x, curve.name);
        check(curve.y, curve.name);
    }
}

void check(const Figure& figure) {
    check(figure.x);
    check(figure.y);
    check(figure.curves);
    std::size_t count = figure.curves.size();
    if (figure.second) {
        check(figure.second->axis);
        check(figure.second->curves);
        count += figure.second->curves.size();
    }
    require(!figure.curves.empty(), "no curve");
    require(count <= most_curves, fmt::format("{} curves; at most {}", count, most_curves));
    for (const Mark& mark : figure.marks) check({mark.x}, "mark " + mark.label);
}

void check(const Map& map) {
    for (const Axis* axis : {&map.x, &map.y, &map.z}) check(*axis);
    for (const auto* values : {&map.x_values, &map.y_values}) {
        require(!values->empty(), "a map without values");
        check(*values, "an axis of a map");
        for (std::size_t i = 1; i < values->size(); ++i) {
            require((*values)[i - 1] < (*values)[i], "values of a map's axis that do not increase");
        }
    }
    require(map.z_values.size() == map.x_values.size() * map.y_values.size(),
            "a map with another number of values than its axes say");
    check(map.z_values, map.z.title);
}

std::string cell(const std::string& text) {
    const std::string clean = clean_text(text);
    if (clean.find_first_of("\",") == std::string::npos) return clean;
    std::string quoted = "\"";
    for (const char c : clean) quoted += c == '"' ? "\"\"" : std::string(1, c);
    return quoted + "\"";
}

struct Column {
    std::string head;
    std::vector<std::string> cells;
};

Column numbers(const std::string& head, const std::vector<double>& values) {
    Column column{head, {}};
    // The shortest text that reads back as the same double.
    for (const double value : values) column.cells.push_back(fmt::format("{}", value));
    return column;
}

std::string csv(const std::vector<Column>& columns) {
    std::string text;
    std::size_t rows = 0;
    for (std::size_t i = 0; i < columns.size(); ++i) {
        if (i > 0) text += ",";
        text += cell(columns[i].head);
        rows = std::max(rows, columns[i].cells.size());
    }
    text += "\n";
    for (std::size_t row = 0; row < rows; ++row) {
        for (std::size_t i = 0; i < columns.size(); ++i) {
            if (i > 0) text += ",";
            if (row < columns[i].cells.size()) text += columns[i].cells[row];
        }
        text += "\n";
    }
    return text;
}

}  // namespace

std::string figure_data_csv(const Figure& figure) {
    check(figure);
    struct Entry {
        const Curve* curve;
        const Axis* axis;
    };
    std::vector<Entry> entries;
    for (const Curve& curve : figure.curves) entries.push_back({&curve, &figure.y});
    if (figure.second) {
        for (const Curve& curve : figure.second->curves) {
            entries.push_back({&curve, &figure.second->axis});
        }
    }
    const auto own_x = [&](std::size_t i) {
        return i == 0 || entries[i].curve->x != entries[i - 1].curve->x;
    };
    bool several = false;
    for (std::size_t i = 1; i < entries.size(); ++i) several = several || own_x(i);
    std::vector<Column> columns;
    for (std::size_t i = 0; i < entries.size(); ++i) {
        const Curve& curve = *entries[i].curve;
        if (own_x(i)) {
            columns.push_back(
                numbers(several ? figure.x.title + " of " + curve.name : figure.x.title, curve.x));
        }
        columns.push_back(numbers(curve.name + ": " + entries[i].axis->title, curve.y));
    }
    if (!figure.marks.empty()) {
        Column places{figure.x.title + " of marks", {}};
        Column labels{"marks", {}};
        for (const Mark& mark : figure.marks) {
            places.cells.push_back(fmt::format("{}", mark.x));
            labels.cells.push_back(cell(mark.label));
        }
        columns.push_back(places);
        columns.push_back(labels);
    }
    return csv(columns);
}

std::string figure_data_csv(const Map& map) {
    check(map);
    std::string text = cell(map.x.title) + "," + cell(map.y.title) + "," + cell(map.z.title) + "\n";
    for (std::size_t j = 0; j < map.y_values.size(); ++j) {
        for (std::size_t i = 0; i < map.x_values.size(); ++i) {
            fmt::format_to(std::back_inserter(text), "{},{},{}\n", map.x_values[i], map.y_values[j],
                           map.z_values[j * map.x_values.size() + i]);
        }
    }
    return text;
}

}  // namespace stillcoat::present
