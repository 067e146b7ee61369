#pragma once
/// Quantities as people write them: a number and a unit, "1397 nm", "0.42 mm", "5 ppm".
///
/// Units are those of the UDUNITS-2 library (Unidata), which knows the SI with its prefixes,
/// products, quotients and powers; "dB" (ten times the decimal logarithm of a power ratio) is added
/// here. A quantity is read into SI.

#include <string>
#include <vector>

namespace stillcoat::core {

/// What a quantity measures: the SI unit that fixes its dimension, and an example for messages.
struct QuantityKind {
    std::string name;     ///< "length"
    std::string si_unit;  ///< "m"; "1" for a pure number
    std::string example;  ///< "1397 nm"
};

namespace kind {
extern const QuantityKind length, angle, temperature, frequency, power, number, pressure, density,
    thermal_conductivity, specific_heat, per_kelvin, per_length;
}

/// "a length", "an angle".
std::string with_article(const std::string& noun);

/// A quantity text that cannot be read; `hint` says what would be accepted.
struct QuantityFailure {
    std::string message;
    std::string hint;
};

/// Result of reading: SI value, or why not.
struct QuantityReading {
    bool ok = false;
    double value = 0.0;  ///< in the SI unit of the kind, always finite when ok
    QuantityFailure failure;
};

/// The SI value of a text such as "1397 nm" [SI unit of `kind`].
QuantityReading read_quantity(const std::string& text, const QuantityKind& kind);

/// The SI value of `number` given in `unit`, as in a table with one unit for a column.
QuantityReading read_quantity(double number, const std::string& unit, const QuantityKind& kind);

/// One line of the list of usual units.
struct UsualUnits {
    QuantityKind kind;
    std::vector<std::string> units;
    std::string used_for;
};

/// The units that this trade uses, by kind; each is accepted by read_quantity.
const std::vector<UsualUnits>& usual_units();

}  // namespace stillcoat::core
