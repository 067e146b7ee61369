#include "stillcoat/core/document.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <filesystem>
#include <fstream>
#include <limits>
#include <sstream>
#include <toml.hpp>

namespace stillcoat::core {
namespace {

Place place_in(const toml::value& value) {
    const toml::source_location where = value.location();
    Place place;
    place.file = where.file_name();
    place.line = static_cast<int>(where.line());
    place.column = static_cast<int>(where.column());
    place.text = where.line_str();
    // A region may span several lines; the mark stays on the first.
    const int to_end = static_cast<int>(place.text.size()) - place.column + 1;
    place.length = std::max(1, std::min(static_cast<int>(where.region()), to_end));
    return place;
}

Node to_node(const toml::value& value) {
    Node node;
    node.origin = &value;
    switch (value.type()) {
        case toml::value_t::string:
            node.type = Node::Type::text;
            node.text = value.as_string().str;
            break;
        case toml::value_t::integer:
            node.type = Node::Type::integer;
            node.number = static_cast<double>(value.as_integer());
            // The library stops at the ends of 64 bits without a word; readers refuse infinity.
            if (value.as_integer() == std::numeric_limits<std::int64_t>::max() ||
                value.as_integer() == std::numeric_limits<std::int64_t>::min()) {
                node.number = std::copysign(std::numeric_limits<double>::infinity(), node.number);
            }
            break;
        case toml::value_t::floating:
            node.type = Node::Type::real;
            node.number = value.as_floating();
            // A number like 1e400 is read as the largest double; it is infinity to us, which
            // readers refuse.
            if (std::abs(node.number) == std::numeric_limits<double>::max()) {
                node.number = std::copysign(std::numeric_limits<double>::infinity(), node.number);
            }
            break;
        case toml::value_t::boolean:
            node.type = Node::Type::boolean;
            node.truth = value.as_boolean();
            break;
        case toml::value_t::array:
            node.type = Node::Type::array;
            for (const toml::value& item : value.as_array()) node.items.push_back(to_node(item));
            break;
        case toml::value_t::table:
            node.type = Node::Type::table;
            for (const auto& [key, entry] : value.as_table()) {
                node.entries.push_back({key, to_node(entry)});
            }
            std::sort(node.entries.begin(), node.entries.end(),
                      [](const Entry& a, const Entry& b) { return a.key < b.key; });
            break;
        default:
            break;
    }
    return node;
}

/// Index of the last character of the text that begins at `begin`, as TOML 1.0 delimits it; the end
/// of the document when it is not closed. A text of one line ends at the line's end at the latest.
std::size_t end_of_text(const std::string& document, std::size_t begin) {
    const char quote = document[begin];
    const bool escapes = quote == '"';
    const std::string triple(3, quote);
    const bool many_lines = document.compare(begin, 3, triple) == 0;
    std::size_t i = begin + (many_lines ? 3 : 1);
    for (; i < document.size(); ++i) {
        if (document[i] == '\\' && escapes) {
            ++i;
        } else if (!many_lines && (document[i] == quote || document[i] == '\n')) {
            return i;
        } else if (many_lines && document.compare(i, 3, triple) == 0) {
            // Up to two quotes may stand directly before the closing three.
            i += 2;
            while (i + 1 < document.size() && document[i + 1] == quote) ++i;
            return i;
        }
    }
    return document.size();
}

/// Refuses nesting that the recursive parser could not survive: counts brackets and dots outside
/// texts and comments.
void check_nesting(const std::string& text, const std::string& name) {
    int depth = 0;
    int dots = 0;
    int line = 1;
    for (std::size_t i = 0; i < text.size(); ++i) {
        const char c = text[i];
        if (c == '"' || c == '\'' || c == '#') {
            const std::size_t end = c == '#' ? text.find('\n', i) : end_of_text(text, i);
            if (end >= text.size()) return;
            line += static_cast<int>(std::count(text.begin() + static_cast<std::ptrdiff_t>(i),
                                                text.begin() + static_cast<std::ptrdiff_t>(end) + 1,
                                                '\n'));
            if (text[end] == '\n') dots = 0;
            i = end;
            continue;
        }
        if (c == '\n') ++line;
        if (c == '[' || c == '{') ++depth;
        if (c == ']' || c == '}') --depth;
        if (c == '.') ++dots;
        if (c == '\n' || c == ',' || c == '=') dots = 0;
        if (depth > deepest_nesting || dots > deepest_nesting) {
            throw InputError({Problem{Place{name, line, 1, 1, ""},
                                      fmt::format("nested deeper than {} levels", deepest_nesting),
                                      "write the tables flat", std::nullopt}});
        }
    }
}

/// The TOML library's message without its own banner; it carries line numbers and the excerpt.
std::string without_banner(const std::string& message) {
    std::string text = message;
    const std::string banner = "[error] ";
    if (text.rfind(banner, 0) == 0) text.erase(0, banner.size());
    const std::size_t arrow = text.find("\n -->");
    std::string headline = text.substr(0, arrow);
    const std::size_t parser_name = headline.find(": ");
    if (headline.rfind("toml::", 0) == 0 && parser_name != std::string::npos) {
        headline.erase(0, parser_name + 2);
    }
    return headline;
}

Place place_in(const toml::source_location& where, const std::string& name) {
    return Place{name, static_cast<int>(where.line()), static_cast<int>(where.column()), 1,
                 where.line_str()};
}

}  // namespace

const Node* Node::find(const std::string& key) const {
    for (const Entry& entry : entries) {
        if (entry.key == key) return &entry.value;
    }
    return nullptr;
}

Place Node::place() const {
    if (origin == nullptr) return Place{};
    return place_in(*static_cast<const toml::value*>(origin));
}

Place Node::key_place(const std::string& key) const {
    const Node* value = find(key);
    if (value == nullptr) return place();
    Place place = value->place();
    const std::size_t at = place.text.rfind(key, static_cast<std::size_t>(place.column));
    if (at == std::string::npos) return place;
    place.column = static_cast<int>(at) + 1;
    place.length = static_cast<int>(key.size());
    return place;
}

std::string describe(Node::Type type) {
    switch (type) {
        case Node::Type::text:
            return "a text";
        case Node::Type::integer:
        case Node::Type::real:
            return "a number";
        case Node::Type::boolean:
            return "true or false";
        case Node::Type::array:
            return "a list";
        case Node::Type::table:
            return "a table";
        case Node::Type::other:
            break;
    }
    return "a date or time";
}

std::string read_text_file(const std::string& path) {
    namespace fs = std::filesystem;
    std::error_code error;
    const fs::file_status status = fs::status(path, error);
    if (status.type() == fs::file_type::not_found) {
        throw InputError(path + ": no such file", "check the name and folder");
    }
    if (error) throw InputError(path + ": " + error.message(), "check the name and folder");
    if (fs::is_directory(status)) throw InputError(path + ": is a directory", "give a file");
    if (fs::is_regular_file(status)) {
        const std::uintmax_t size = fs::file_size(path, error);
        if (!error && size > largest_file_bytes) {
            throw InputError(fmt::format("{}: {} bytes; files above {} bytes are refused", path,
                                         size, largest_file_bytes),
                             "use `repeat` for periodic stacks");
        }
    }
    std::ifstream stream(path, std::ios::binary);
    // Read at most one byte beyond the limit, so that a pipe without end is refused too.
    std::string text(largest_file_bytes + 1, '\0');
    stream.read(text.data(), static_cast<std::streamsize>(text.size()));
    if (stream.bad() || (stream.fail() && !stream.eof())) {
        throw InputError(path + ": cannot be read", "check its permissions");
    }
    text.resize(static_cast<std::size_t>(stream.gcount()));
    if (text.size() > largest_file_bytes) {
        throw InputError(
            fmt::format("{}: files above {} bytes are refused", path, largest_file_bytes),
            "use `repeat` for periodic stacks");
    }
    return text;
}

void check_line_lengths(const std::string& text, const std::string& name) {
    int line = 1;
    std::size_t begin = 0;
    while (begin < text.size()) {
        const std::size_t end = std::min(text.find('\n', begin), text.size());
        if (end - begin > longest_line) {
            throw InputError({Problem{Place{name, line, 1, 1, ""},
                                      fmt::format("this line has {} characters; more than {} are "
                                                  "refused",
                                                  end - begin, longest_line),
                                      "write a long list over several lines", std::nullopt}});
        }
        begin = end + 1;
        ++line;
    }
}

Document parse_document(const std::string& text, const std::string& name) {
    check_line_lengths(text, name);
    check_nesting(text, name);
    std::istringstream stream(text);
    try {
        auto value = std::make_shared<toml::value>(toml::parse(stream, name));
        Document document{name, value, to_node(*value)};
        if (document.root.type != Node::Type::table) {
            throw InputError(name + ": empty", "a TOML document with tables is expected");
        }
        return document;
    } catch (const toml::syntax_error& error) {
        throw InputError({Problem{place_in(error.location(), name),
                                  "not valid TOML: " + without_banner(error.what()),
                                  "the format is TOML 1.0, https://toml.io", std::nullopt}});
    } catch (const InputError&) {
        throw;
    } catch (const std::exception& error) {
        // The library reports some faults by a plain exception.
        throw InputError(fmt::format("{}: not valid TOML: {}", name, without_banner(error.what())),
                         "the format is TOML 1.0, https://toml.io");
    }
}

Document read_document(const std::string& path) {
    return parse_document(read_text_file(path), path);
}

}  // namespace stillcoat::core
