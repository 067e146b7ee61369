#pragma once
/// The largest error that a test saw and where it saw it: what an accuracy statement rests on.

#include <cmath>
#include <iostream>
#include <string>

namespace stillcoat::test {

class WorstError {
  public:
    /// NaN counts as the largest error of all.
    void see(double error, const std::string& where) {
        if (error <= error_ || std::isnan(error_)) return;
        error_ = error;
        where_ = where;
    }
    double error() const { return error_; }
    void print(const std::string& quantity) const {
        std::cout << "  worst error of " << quantity << ": " << error_ << " (" << where_ << ")\n";
    }

  private:
    double error_ = 0.0;
    std::string where_ = "exact everywhere";
};

inline double relative_error(double value, double expected) {
    return value == expected ? 0.0 : std::abs(value - expected) / std::abs(expected);
}

}  // namespace stillcoat::test
