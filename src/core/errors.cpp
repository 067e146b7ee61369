#include "stillcoat/core/errors.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <map>
#include <numeric>
#include <tuple>

namespace stillcoat::core {
namespace {

constexpr int longest_excerpt = 100;

std::string where(const Place& place) {
    if (place.line == 0) return place.file;
    return fmt::format("{}:{}:{}", place.file, place.line, place.column);
}

/// Characters, not bytes: continuation bytes of UTF-8 take no room on the screen.
int width_of(const std::string& text) {
    return static_cast<int>(std::count_if(text.begin(), text.end(), [](char c) {
        return (static_cast<unsigned char>(c) & 0xC0) != 0x80;
    }));
}

std::string excerpt(const Place& place) {
    if (place.line == 0 || place.text.empty()) return "";
    // A long line is shown from a little before the marked stretch.
    const int size = static_cast<int>(place.text.size());
    const int mark = std::clamp(place.column - 1, 0, size);
    int first =
        mark > longest_excerpt / 2 && size > longest_excerpt ? mark - longest_excerpt / 2 : 0;
    while (first > 0 && (static_cast<unsigned char>(place.text[first]) & 0xC0) == 0x80) --first;
    std::string shown = place.text.substr(first, longest_excerpt);
    while (!shown.empty() && size > first + longest_excerpt &&
           (static_cast<unsigned char>(shown.back()) & 0x80) != 0) {
        shown.pop_back();
    }
    const int before = width_of(place.text.substr(first, mark - first));
    const int room = std::max(1, static_cast<int>(shown.size()) - (mark - first));
    const int marked = std::clamp(place.length, 1, room);
    return fmt::format("\n {:>5} | {}\n       | {}{}", place.line, printable(shown),
                       std::string(before, ' '), std::string(marked, '^'));
}

}  // namespace

std::string printable(const std::string& text) {
    constexpr unsigned char escape_lead = 0xC2;  // U+0080 … U+009F are C2 80 … C2 9F in UTF-8
    std::string shown = text;
    for (std::size_t i = 0; i < shown.size(); ++i) {
        const auto byte = static_cast<unsigned char>(shown[i]);
        const bool second_set = byte == escape_lead && i + 1 < shown.size() &&
                                static_cast<unsigned char>(shown[i + 1]) < 0xA0;
        if (second_set) shown.replace(i, 2, "?");
        if (byte < 0x20 || byte == 0x7F) shown[i] = byte == '\t' ? ' ' : '?';
    }
    return shown;
}

std::string describe(const Problem& problem) {
    std::string text;
    if (!problem.place.file.empty()) text = printable(where(problem.place)) + ": ";
    text += printable(problem.message) + excerpt(problem.place);
    if (problem.other_place) {
        text += fmt::format("\n       and here: {}", printable(where(*problem.other_place)));
        text += excerpt(*problem.other_place);
    }
    if (!problem.hint.empty()) text += "\n       " + printable(problem.hint);
    return text;
}

namespace {

std::string describe_all(const std::vector<Problem>& problems) {
    std::string text;
    for (const Problem& problem : problems) {
        if (!text.empty()) text += "\n";
        text += describe(problem);
    }
    return text;
}

}  // namespace

InputError::InputError(std::vector<Problem> problems)
    : std::runtime_error(describe_all(problems)), problems_(std::move(problems)) {}

InputError::InputError(const std::string& message, const std::string& hint)
    : InputError(std::vector<Problem>{Problem{Place{}, message, hint, std::nullopt}}) {}

void Problems::add(Problem problem) {
    list_.push_back(std::move(problem));
    if (list_.size() < enough_problems) return;
    list_.push_back(Problem{Place{},
                            fmt::format("reading stopped after {} problems", enough_problems),
                            "mend these first", std::nullopt});
    throw_if_any();
}

void Problems::add(const Place& place, std::string message, std::string hint) {
    add(Problem{place, std::move(message), std::move(hint), std::nullopt});
}

void Problems::throw_if_any() const {
    if (list_.empty()) return;
    // Files stay in the order in which they were read; within a file problems go by their place.
    std::map<std::string, std::size_t> turn;
    for (const Problem& problem : list_) turn.emplace(problem.place.file, turn.size());
    std::vector<Problem> sorted = list_;
    std::stable_sort(sorted.begin(), sorted.end(), [&turn](const Problem& a, const Problem& b) {
        return std::tuple(turn[a.place.file], a.place.line, a.place.column) <
               std::tuple(turn[b.place.file], b.place.line, b.place.column);
    });
    // The same value may be asked for on several ways.
    const auto repeats =
        std::unique(sorted.begin(), sorted.end(), [](const Problem& a, const Problem& b) {
            return std::tie(a.place.file, a.place.line, a.place.column, a.message) ==
                   std::tie(b.place.file, b.place.line, b.place.column, b.message);
        });
    sorted.erase(repeats, sorted.end());
    throw InputError(std::move(sorted));
}

DomainError::DomainError(const std::string& quantity, double value, const std::string& unit,
                         const std::string& allowed, const std::string& source)
    : std::domain_error(
          std::isfinite(value)
              ? fmt::format("{} is {:.6g}{}{}; allowed: {} ({})", quantity, value,
                            unit.empty() ? "" : " ", unit, allowed, source)
              : fmt::format("{} is beyond what can be computed with; allowed: {} ({})", quantity,
                            allowed, source)) {}

std::optional<std::string> nearest_spelling(const std::string& word,
                                            const std::vector<std::string>& candidates) {
    // A word that was cut short, "tantala" for "tantala-ibs": the shortest that begins with it.
    constexpr std::size_t shortest_stem = 3;
    std::optional<std::string> longer;
    for (const std::string& candidate : candidates) {
        const bool begins = word.size() >= shortest_stem && candidate.rfind(word, 0) == 0;
        if (begins && (!longer || candidate.size() < longer->size())) longer = candidate;
    }
    if (longer) return longer;
    // Levenshtein distance, one row at a time.
    const auto distance = [&word](const std::string& other) {
        std::vector<std::size_t> row(other.size() + 1);
        std::iota(row.begin(), row.end(), std::size_t{0});
        for (std::size_t i = 0; i < word.size(); ++i) {
            std::size_t diagonal = row[0];
            row[0] = i + 1;
            for (std::size_t j = 0; j < other.size(); ++j) {
                const std::size_t substitution = diagonal + (word[i] == other[j] ? 0 : 1);
                diagonal = row[j + 1];
                row[j + 1] = std::min({substitution, row[j] + 1, row[j + 1] + 1});
            }
        }
        return row.back();
    };
    std::optional<std::string> best;
    std::size_t best_distance = std::max<std::size_t>(2, word.size() / 3) + 1;
    for (const std::string& candidate : candidates) {
        // "tantla" means "tantala-ibs": the stem alone counts too.
        const std::size_t d =
            std::min(distance(candidate), distance(candidate.substr(0, candidate.find('-'))));
        if (d < best_distance) {
            best_distance = d;
            best = candidate;
        }
    }
    return best;
}

}  // namespace stillcoat::core
