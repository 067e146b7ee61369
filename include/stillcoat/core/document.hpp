#pragma once
/// A TOML document as a tree of plain nodes, each knowing where it stands in its file.
/// The one door to the TOML library: nothing else in the project includes it.
/// Format: TOML 1.0 (https://toml.io/en/v1.0.0).

#include <cstdint>
#include <memory>
#include <string>
#include <vector>

#include "stillcoat/core/errors.hpp"

namespace stillcoat::core {

inline constexpr std::uintmax_t largest_file_bytes = 8'000'000;
inline constexpr int deepest_nesting = 64;
inline constexpr std::size_t longest_line = 20'000;  ///< bytes

struct Entry;

struct Node {
    enum class Type { text, integer, real, boolean, array, table, other };
    Type type = Type::other;
    std::string text;            ///< of a text
    double number = 0.0;         ///< of an integer or real; may be infinite or nan as TOML allows
    bool truth = false;          ///< of a boolean
    std::vector<Node> items;     ///< of an array
    std::vector<Entry> entries;  ///< of a table
    const void* origin = nullptr;

    /// The value of a key of this table, or null.
    const Node* find(const std::string& key) const;
    /// Where the value stands.
    Place place() const;
    /// Where the key stands, when it is on the line of its value; the value's place otherwise.
    Place key_place(const std::string& key) const;
    bool is_number() const { return type == Type::integer || type == Type::real; }
};

/// A key and its value; a table holds them in the order of their names.
struct Entry {
    std::string key;
    Node value;
};

/// What a node is, in words: "a number", "a table".
std::string describe(Node::Type type);

/// A parsed document; keeps alive what the places of its nodes refer to.
struct Document {
    std::string name;  ///< file name as given
    std::shared_ptr<const void> keep_alive;
    Node root;
};

/// The content of a file.
/// @throws InputError when it is missing, a directory, unreadable or larger than the limit.
std::string read_text_file(const std::string& path);

/// @throws InputError when a line is longer than the limit, for which the readers would need time
/// or memory with the square of its length.
void check_line_lengths(const std::string& text, const std::string& name);

/// The document in `text`; `name` stands in messages.
/// @throws InputError when the text is not TOML, nests deeper or has a longer line than the limit.
Document parse_document(const std::string& text, const std::string& name);

/// read_text_file and parse_document in one.
Document read_document(const std::string& path);

}  // namespace stillcoat::core
