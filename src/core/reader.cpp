#include "stillcoat/core/reader.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <limits>

namespace stillcoat::core {
namespace {

const Node& empty_table() {
    static const Node node = [] {
        Node n;
        n.type = Node::Type::table;
        return n;
    }();
    return node;
}

std::string in_quotes(const std::vector<std::string>& words) {
    std::string text;
    for (const std::string& word : words) {
        text += fmt::format("{}\"{}\"", text.empty() ? "" : ", ", word);
    }
    return text;
}

}  // namespace

bool Limits::admit(double value) const {
    const bool above = value > lower || (lower_itself && value == lower);
    const bool below = value < upper || (upper_itself && value == upper);
    return std::isfinite(value) && above && below;
}

Limits any_value() {
    const double infinity = std::numeric_limits<double>::infinity();
    return {-infinity, infinity, false, false, "finite"};
}

Limits positive(const std::string& unit) {
    return {0.0, std::numeric_limits<double>::infinity(), false, false,
            unit.empty() ? "greater than 0" : "greater than 0 " + unit};
}

Limits between(double lower, double upper, const std::string& unit) {
    const std::string behind = unit.empty() ? "" : " " + unit;
    return {lower, upper, true, true,
            fmt::format("from {:g}{} to {:g}{}", lower, behind, upper, behind)};
}

TableReader::TableReader(const Node& table, std::string name, Problems& problems)
    : table_(&table), name_(std::move(name)), problems_(problems) {
    if (table.type == Node::Type::table) return;
    problems_.add(table.place(),
                  fmt::format("{} must be a table, here it is {}", name_, describe(table.type)));
    table_ = &empty_table();
}

const Node* TableReader::find(const std::string& key) {
    known_.push_back(key);
    return table_->find(key);
}

const Node* TableReader::find_of_type(const std::string& key, Node::Type type,
                                      const std::string& expected) {
    const Node* node = find(key);
    if (node == nullptr || node->type == type) return node;
    problems_.add(node->place(), fmt::format("{} in {} must be {}, here it is {}", key, name_,
                                             expected, describe(node->type)));
    return nullptr;
}

void TableReader::check(double value, const Node& node, const std::string& key,
                        const Limits& limits, std::optional<double>& result) {
    if (limits.admit(value)) {
        result = value;
        return;
    }
    // A quantity is quoted as it was written, a bare number as it was understood.
    const std::string found =
        node.type == Node::Type::text ? "\"" + node.text + "\"" : fmt::format("{:.6g}", value);
    problems_.add(node.place(), fmt::format("{} in {} is {}", key, name_, found),
                  fmt::format("it must be {}", limits.words));
}

std::optional<double> TableReader::quantity_of(const Node& value, const std::string& key,
                                               const QuantityKind& kind, const Limits& limits) {
    std::optional<double> result;
    const bool pure = kind.si_unit == "1";
    if (value.is_number() && pure) {
        check(value.number, value, key, limits, result);
        return result;
    }
    if (value.type != Node::Type::text) {
        const std::string found = value.is_number() ? "a bare number" : describe(value.type);
        problems_.add(value.place(),
                      fmt::format("{} in {} needs {} with a unit, here it is {}", key, name_,
                                  with_article(kind.name), found),
                      fmt::format("for example {} = \"{}\"", key, kind.example));
        return result;
    }
    const QuantityReading reading = read_quantity(value.text, kind);
    if (!reading.ok) {
        problems_.add(value.place(),
                      fmt::format("{} in {}: {}", key, name_, reading.failure.message),
                      reading.failure.hint);
        return result;
    }
    check(reading.value, value, key, limits, result);
    return result;
}

std::optional<double> TableReader::quantity(const std::string& key, const QuantityKind& kind,
                                            const Limits& limits) {
    const Node* node = find(key);
    if (node == nullptr) return std::nullopt;
    return quantity_of(*node, key, kind, limits);
}

double TableReader::required_quantity(const std::string& key, const QuantityKind& kind,
                                      const Limits& limits) {
    if (!has(key)) missing(key, fmt::format("\"{}\"", kind.example));
    return quantity(key, kind, limits).value_or(std::numeric_limits<double>::quiet_NaN());
}

std::optional<double> TableReader::number(const std::string& key, const Limits& limits) {
    return quantity(key, kind::number, limits);
}

std::optional<int> TableReader::whole_number(const std::string& key, int lower, int upper) {
    const Node* node = find(key);
    if (node == nullptr) return std::nullopt;
    if (node->type == Node::Type::integer && node->number >= lower && node->number <= upper) {
        return static_cast<int>(node->number);
    }
    const std::string found =
        node->is_number() ? fmt::format("{}", node->number) : describe(node->type);
    problems_.add(node->place(), fmt::format("{} in {} is {}", key, name_, found),
                  fmt::format("it must be a whole number from {} to {}", lower, upper));
    return std::nullopt;
}

std::optional<std::string> TableReader::text(const std::string& key) {
    const Node* node = find_of_type(key, Node::Type::text, "a text in quotes");
    if (node == nullptr) return std::nullopt;
    if (node->text.empty()) {
        problems_.add(node->place(), fmt::format("{} in {} is empty", key, name_));
        return std::nullopt;
    }
    return node->text;
}

std::string TableReader::required_text(const std::string& key) {
    if (!has(key)) missing(key, "\"...\"");
    return text(key).value_or("");
}

std::optional<std::string> TableReader::choice(const std::string& key,
                                               const std::vector<std::string>& allowed) {
    std::optional<std::string> word = text(key);
    if (!word) return std::nullopt;
    if (std::find(allowed.begin(), allowed.end(), *word) != allowed.end()) return word;
    problem_at(key, fmt::format("{} in {} is \"{}\"", key, name_, *word),
               fmt::format("it must be one of {}", in_quotes(allowed)));
    return std::nullopt;
}

std::optional<std::vector<double>> TableReader::numbers(const std::string& key) {
    const Node* node = find_of_type(key, Node::Type::array, "a list of numbers");
    if (node == nullptr) return std::nullopt;
    std::vector<double> list;
    for (const Node& item : node->items) {
        if (!item.is_number() || !std::isfinite(item.number)) {
            problems_.add(item.place(),
                          fmt::format("{} in {} must hold finite numbers only", key, name_));
            return std::nullopt;
        }
        list.push_back(item.number);
    }
    return list;
}

std::optional<std::vector<std::string>> TableReader::texts(const std::string& key) {
    const Node* node = find_of_type(key, Node::Type::array, "a list of texts");
    if (node == nullptr) return std::nullopt;
    std::vector<std::string> list;
    for (const Node& item : node->items) {
        if (item.type != Node::Type::text || item.text.empty()) {
            problems_.add(item.place(),
                          fmt::format("{} in {} must hold texts in quotes", key, name_));
            return std::nullopt;
        }
        list.push_back(item.text);
    }
    return list;
}

std::optional<std::vector<double>> TableReader::quantities(const std::string& key,
                                                           const QuantityKind& kind,
                                                           const Limits& limits) {
    const Node* node =
        find_of_type(key, Node::Type::array, fmt::format("a list such as [\"{}\"]", kind.example));
    if (node == nullptr) return std::nullopt;
    std::vector<double> list;
    for (const Node& item : node->items) {
        const std::optional<double> value = quantity_of(item, key, kind, limits);
        if (!value) return std::nullopt;
        list.push_back(*value);
    }
    return list;
}

const Node* TableReader::table(const std::string& key) {
    return find_of_type(key, Node::Type::table, "a table");
}

std::vector<const Node*> TableReader::tables(const std::string& key) {
    std::vector<const Node*> list;
    const Node* node =
        find_of_type(key, Node::Type::array, fmt::format("a list of tables [[{}]]", key));
    if (node == nullptr) return list;
    for (const Node& item : node->items) {
        if (item.type == Node::Type::table) {
            list.push_back(&item);
        } else {
            problems_.add(item.place(), fmt::format("{} in {} must hold tables, here it is {}", key,
                                                    name_, describe(item.type)));
        }
    }
    return list;
}

void TableReader::missing(const std::string& key, const std::string& example) {
    known_.push_back(key);
    problems_.add(table_->place(), fmt::format("{} is missing in {}", key, name_),
                  fmt::format("add {} = {}", key, example));
}

void TableReader::problem_at(const std::string& key, const std::string& message,
                             const std::string& hint) {
    const Node* node = table_->find(key);
    problems_.add(node != nullptr ? node->place() : table_->place(), message, hint);
}

void TableReader::contradiction(const std::string& key, const std::string& other,
                                const std::string& why) {
    problems_.add(Problem{table_->key_place(key),
                          fmt::format("{} and {} in {} contradict each other", key, other, name_),
                          why, table_->key_place(other)});
}

void TableReader::finish() {
    for (const Entry& entry : table_->entries) {
        const std::string& key = entry.key;
        if (std::find(known_.begin(), known_.end(), key) != known_.end()) continue;
        const std::optional<std::string> near = nearest_spelling(key, known_);
        std::vector<std::string> allowed = known_;
        std::sort(allowed.begin(), allowed.end());
        allowed.erase(std::unique(allowed.begin(), allowed.end()), allowed.end());
        problems_.add(table_->key_place(key), fmt::format("unknown key {} in {}", key, name_),
                      near ? fmt::format("did you mean {}?", *near)
                           : fmt::format("allowed: {}", fmt::join(allowed, ", ")));
    }
}

}  // namespace stillcoat::core
