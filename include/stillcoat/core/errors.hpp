#pragma once
/// The three ways in which something can go wrong.
///
/// * InputError: what the user wrote cannot be used; a list, since all problems of a file are
///   reported at once.
/// * DomainError: a quantity outside the range in which a formula or a datum holds.
/// * std::logic_error: our own mistake.

#include <optional>
#include <stdexcept>
#include <string>
#include <vector>

namespace stillcoat::core {

/// A stretch of text in a file: what an error message underlines.
struct Place {
    std::string file;
    int line = 0;      ///< from 1; 0: the file as a whole
    int column = 0;    ///< from 1
    int length = 1;    ///< characters to underline
    std::string text;  ///< the whole line
};

/// One thing that is wrong, where, and what to do about it.
struct Problem {
    Place place;
    std::string message;
    std::string hint;                  ///< what is allowed or what to do; may be empty
    std::optional<Place> other_place;  ///< the second place of a contradiction
};

/// `text` without the control characters that would move the cursor of a terminal or change its
/// colours: each becomes a question mark, a tabulator a blank.
std::string printable(const std::string& text);

/// A problem as lines of text: `file:line:column: message`, the line with a mark below, the hint.
std::string describe(const Problem& problem);

/// What the user wrote cannot be used.
class InputError : public std::runtime_error {
  public:
    explicit InputError(std::vector<Problem> problems);
    /// An error without a place in a file, such as a bad command line or a missing file.
    InputError(const std::string& message, const std::string& hint);
    const std::vector<Problem>& problems() const { return problems_; }

  private:
    std::vector<Problem> problems_;
};

/// Nobody reads more at once, and a file of a million mistakes must not take hours.
inline constexpr std::size_t enough_problems = 100;

/// Collects what is wrong so that a file is reported whole.
class Problems {
  public:
    /// Adds one; the one that makes them enough_problems is thrown with all before it.
    void add(Problem problem);
    void add(const Place& place, std::string message, std::string hint = "");
    bool empty() const { return list_.empty(); }
    std::size_t size() const { return list_.size(); }
    /// Throws InputError when anything was added.
    void throw_if_any() const;

  private:
    std::vector<Problem> list_;
};

/// A quantity lies outside the range for which a formula or a datum was made.
class DomainError : public std::domain_error {
  public:
    /// @param quantity what is out of range, in words
    /// @param value its value in SI, @param unit the SI unit
    /// @param allowed the allowed range in words, @param source the formula's or datum's source
    DomainError(const std::string& quantity, double value, const std::string& unit,
                const std::string& allowed, const std::string& source);
};

/// The entry of `candidates` that is spelled most like `word`; none when nothing is near.
std::optional<std::string> nearest_spelling(const std::string& word,
                                            const std::vector<std::string>& candidates);

}  // namespace stillcoat::core
