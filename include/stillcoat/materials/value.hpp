#pragma once
/// A value of a property under stated conditions, with how it came about.

#include <optional>
#include <string>
#include <vector>

#include "stillcoat/materials/property.hpp"
#include "stillcoat/materials/provenance.hpp"
#include "stillcoat/numerics/jet.hpp"

namespace stillcoat::materials {

struct Conditions {
    double temperature;  ///< [K]
    double wavelength;   ///< vacuum [m]; used by optical properties
    double frequency;    ///< [Hz]; used by loss angles
};

/// A value in SI with how it came about. A number is finite and within the limits of its property.
struct Value {
    std::optional<double> number;
    std::string missing;           ///< reason when there is no number
    const Entry* entry = nullptr;  ///< the datum of the number; of a same_as the other material's
    std::vector<Basis> bases;      ///< all data that had a say, each once; empty without a number
    std::string analogy;           ///< how the rule beyond the data gave it; empty within the range
    /// Of an extinction coefficient that follows from two others: with its derivatives with respect
    /// to angular frequency, up to a factor; see with_dispersion.
    std::optional<numerics::Jet<double>> derivatives;
    Width width;  ///< in the unit of the number; of a same_as its own when stated, else the other's
    bool from_cold_table = false;  ///< the entry's cold table was used, at least in part
    /// A loss angle outside the frequencies that the data in `bases` state (see frequencies_of).
    bool frequency_extrapolated = false;

    bool known() const { return number.has_value(); }
};

}  // namespace stillcoat::materials
