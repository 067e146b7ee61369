#pragma once
/// Numbers of a result as JSON.

#include <cmath>
#include <nlohmann/json.hpp>
#include <optional>
#include <stdexcept>

namespace stillcoat::present {

/// The library would write a number that is not finite as null; here that is our mistake.
/// @throws std::logic_error for such a number
inline nlohmann::ordered_json json_number(double value) {
    if (!std::isfinite(value)) throw std::logic_error("a result is not a finite number");
    return value;
}

/// Null for what is not computed or not stated.
inline nlohmann::ordered_json json_number_or_null(const std::optional<double>& value) {
    return value ? json_number(*value) : nlohmann::ordered_json(nullptr);
}

}  // namespace stillcoat::present
