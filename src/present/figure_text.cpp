#include "present/figure_text.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <iterator>

namespace stillcoat::present {
namespace {

bool continues(unsigned char byte) { return (byte & 0xC0U) == 0x80U; }

/// Length of the UTF-8 character at `at`; 0 when there is none.
std::size_t character_length(const std::string& text, std::size_t at) {
    const auto byte = [&](std::size_t i) {
        return i < text.size() ? static_cast<unsigned char>(text[i]) : 0U;
    };
    const unsigned first = byte(at);
    const unsigned second = byte(at + 1);
    if (first < 0x80) return 1;
    std::size_t length = 0;
    if (first >= 0xC2 && first <= 0xDF) length = 2;
    if (first >= 0xE0 && first <= 0xEF) length = 3;
    if (first >= 0xF0 && first <= 0xF4) length = 4;
    for (std::size_t i = 1; i < length; ++i) {
        if (!continues(static_cast<unsigned char>(byte(at + i)))) return 0;
    }
    // Overlong forms, surrogates, beyond U+10FFFF; U+FFFE and U+FFFF, which XML does not allow.
    if ((first == 0xE0 && second < 0xA0) || (first == 0xED && second > 0x9F)) return 0;
    if ((first == 0xF0 && second < 0x90) || (first == 0xF4 && second > 0x8F)) return 0;
    if (first == 0xEF && second == 0xBF && byte(at + 2) >= 0xBE) return 0;
    return length;
}

std::vector<std::string> characters_of(const std::string& text) {
    std::vector<std::string> result;
    for (std::size_t at = 0; at < text.size();) {
        const std::size_t length = character_length(text, at);
        result.push_back(length == 0 ? "\uFFFD" : text.substr(at, length));
        at += length == 0 ? 1 : length;
    }
    return result;
}

unsigned code_point(const std::string& character) {
    const auto byte = [&](std::size_t i) { return static_cast<unsigned char>(character[i]); };
    if (character.size() == 1) return byte(0);
    unsigned code = byte(0) & (0xFFU >> (character.size() + 1));
    for (std::size_t i = 1; i < character.size(); ++i) code = code << 6U | (byte(i) & 0x3FU);
    return code;
}

double character_width(const std::string& character) {
    if (character.size() > 2 && static_cast<unsigned char>(character[0]) >= 0xE3) return 1.0;
    if (character.size() > 1) return 0.64;
    const char one = character[0];
    if (std::string("ijl'|").find(one) != std::string::npos) return 0.29;
    if (std::string(" .,;:frtI()[]/-\\!\"").find(one) != std::string::npos) return 0.38;
    if (std::string("mMW@%").find(one) != std::string::npos) return 0.97;
    if (std::string("w+=<>~#&").find(one) != std::string::npos) return 0.83;
    if (one >= 'A' && one <= 'Z') return 0.7;
    return 0.62;
}

/// The longest start of `text` that is not wider than `width`, one character at least.
std::string start_of(const std::string& text, double width) {
    std::string result;
    double used = 0.0;
    for (const std::string& character : characters_of(text)) {
        used += character_width(character);
        if (!result.empty() && used > width) break;
        result += character;
    }
    return result;
}

void add_paragraph(std::vector<std::string>& lines, const std::string& paragraph, double width) {
    std::string line;
    const auto add_word = [&](std::string word) {
        if (!line.empty() && text_width(line + " " + word) > width) {
            lines.push_back(line);
            line.clear();
        }
        while (line.empty() && text_width(word) > width) {
            const std::string start = start_of(word, width);
            lines.push_back(start);
            word.erase(0, start.size());
        }
        if (!word.empty()) line += (line.empty() ? "" : " ") + word;
    };
    std::size_t at = 0;
    while (at <= paragraph.size()) {
        const std::size_t end = std::min(paragraph.find(' ', at), paragraph.size());
        add_word(paragraph.substr(at, end - at));
        at = end + 1;
    }
    if (!line.empty()) lines.push_back(line);
}

}  // namespace

std::string clean_text(const std::string& text) {
    std::string result;
    for (const std::string& character : characters_of(text)) {
        const auto first = static_cast<unsigned char>(character[0]);
        const bool c1_control = first == 0xC2 && static_cast<unsigned char>(character[1]) < 0xA0;
        result += first < 0x20 || first == 0x7F || c1_control ? " " : character;
    }
    return result;
}

std::string drawable_text(const std::string& text) {
    struct Block {
        unsigned first, last;
    };
    const Block blocks[] = {{0x20, 0x2E9},    {0x300, 0x34F},   {0x391, 0x3A1},   {0x3A3, 0x525},
                            {0x1E00, 0x1EFB}, {0x2010, 0x205E}, {0x2074, 0x208E}, {0x20A0, 0x20B5},
                            {0x2126, 0x2126}, {0x212B, 0x212B}, {0x2190, 0x22FF}, {0x25A0, 0x25FF}};
    std::string result;
    for (const std::string& character : characters_of(text)) {
        const unsigned code = code_point(character);
        const bool known = std::any_of(
            std::begin(blocks), std::end(blocks),
            [&](const Block& block) { return code >= block.first && code <= block.last; });
        // gnuplot leaves ">" as it is, and XML does not allow this end of a section in a text.
        const bool ends_section = character == ">" && result.size() >= 2 &&
                                  result.compare(result.size() - 2, 2, "]]") == 0;
        if (ends_section) result.push_back(' ');
        result += known ? character : "□";
    }
    return result;
}

std::string gnuplot_quoted(const std::string& text) {
    std::string result = "\"";
    for (const char c : text) {
        if ((c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z') || c == ' ') {
            result += c;
        } else {
            // Digits too: gnuplot takes them into the number of an escape before them.
            result += fmt::format("\\{:03o}", static_cast<unsigned char>(c));
        }
    }
    return result + "\"";
}

std::string xml_escaped(const std::string& text) {
    std::string result;
    for (const char c : text) {
        switch (c) {
            case '&':
                result += "&amp;";
                break;
            case '<':
                result += "&lt;";
                break;
            case '>':
                result += "&gt;";
                break;
            default:
                result += c;
        }
    }
    return result;
}

double text_width(const std::string& text) {
    double width = 0.0;
    for (const std::string& character : characters_of(text)) width += character_width(character);
    return width;
}

std::vector<std::string> lines_of(const std::string& text, double width, std::size_t most_lines,
                                  const std::string& ending) {
    std::vector<std::string> lines;
    std::size_t at = 0;
    while (at < text.size()) {
        const std::size_t end = std::min(text.find('\n', at), text.size());
        add_paragraph(lines, clean_text(text.substr(at, end - at)), width);
        at = end + 1;
    }
    if (lines.size() > most_lines) {
        lines.resize(most_lines);
        lines.back() = start_of(lines.back(), width - text_width(ending)) + ending;
    }
    return lines;
}

}  // namespace stillcoat::present
