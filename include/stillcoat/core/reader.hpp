#pragma once
/// Reads one table of a document strictly: every key is asked for by name, every quantity carries
/// its unit, whatever is left over is an unknown key. Problems are collected, never thrown, so that
/// a file is reported whole; after a problem a value is absent.

#include <optional>
#include <string>
#include <vector>

#include "stillcoat/core/document.hpp"
#include "stillcoat/core/quantity.hpp"

namespace stillcoat::core {

/// Limits of an admissible value in SI. The words are for the message: "greater than 0 m".
struct Limits {
    double lower;
    double upper;
    bool lower_itself = false;  ///< whether the lower limit itself is admissible
    bool upper_itself = false;
    std::string words;

    /// Whether a value is finite and within.
    bool admit(double value) const;
};

/// Any finite value.
Limits any_value();
/// Strictly positive; `unit` for the message.
Limits positive(const std::string& unit);
/// From `lower` to `upper`, both admissible: what no user means to leave and the formulas survive.
Limits between(double lower, double upper, const std::string& unit);

class TableReader {
  public:
    /// @param table a node of type table (anything else is reported as a problem)
    /// @param name what the table is, for messages: "[light]"
    TableReader(const Node& table, std::string name, Problems& problems);

    const std::string& name() const { return name_; }
    Problems& problems() const { return problems_; }
    const Node& node() const { return *table_; }
    bool has(const std::string& key) const { return table_->find(key) != nullptr; }

    /// The node of a key, marked as known; null when absent.
    const Node* find(const std::string& key);
    std::optional<double> quantity(const std::string& key, const QuantityKind& kind,
                                   const Limits& limits);
    double required_quantity(const std::string& key, const QuantityKind& kind,
                             const Limits& limits);
    /// A pure number: bare, or a text with ppm, % or dB.
    std::optional<double> number(const std::string& key, const Limits& limits);
    std::optional<int> whole_number(const std::string& key, int lower, int upper);
    std::optional<std::string> text(const std::string& key);
    std::string required_text(const std::string& key);
    /// One of a few words; the nearest spelling is offered for anything else.
    std::optional<std::string> choice(const std::string& key,
                                      const std::vector<std::string>& allowed);
    /// A list of bare finite numbers.
    std::optional<std::vector<double>> numbers(const std::string& key);
    std::optional<std::vector<std::string>> texts(const std::string& key);
    std::optional<std::vector<double>> quantities(const std::string& key, const QuantityKind& kind,
                                                  const Limits& limits);
    /// The sub-table of a key; null when absent or not a table.
    const Node* table(const std::string& key);
    /// The tables of an array of tables; empty when absent.
    std::vector<const Node*> tables(const std::string& key);

    void missing(const std::string& key, const std::string& example);
    void problem_at(const std::string& key, const std::string& message,
                    const std::string& hint = "");
    /// Two keys that must not stand together.
    void contradiction(const std::string& key, const std::string& other, const std::string& why);
    /// Reports every key that was not asked for.
    void finish();

  private:
    std::optional<double> quantity_of(const Node& value, const std::string& key,
                                      const QuantityKind& kind, const Limits& limits);
    void check(double value, const Node& node, const std::string& key, const Limits& limits,
               std::optional<double>& result);
    const Node* find_of_type(const std::string& key, Node::Type type, const std::string& expected);

    const Node* table_;
    std::string name_;
    Problems& problems_;
    std::vector<std::string> known_;
};

}  // namespace stillcoat::core
