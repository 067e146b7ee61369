#pragma once
/// Values of properties under stated conditions, or the reason why there is none.
///
/// Nothing is extrapolated silently: outside an entry's range only its explicit rule is used, and
/// the result says so.

#include <optional>
#include <string>
#include <vector>

#include "stillcoat/materials/library.hpp"
#include "stillcoat/numerics/jet.hpp"

namespace stillcoat::materials {

struct Conditions {
    double temperature;  ///< [K]
    double wavelength;   ///< vacuum [m]; used by optical properties
    double frequency;    ///< [Hz]; used by loss angles
};

/// A value in SI with how it came about.
struct Value {
    std::optional<double> number;
    std::string missing;           ///< reason when there is no number
    const Entry* entry = nullptr;  ///< the datum that was used
    std::string analogy;           ///< how the rule beyond the data gave it; empty within the range
    Width width;
    bool from_cold_table = false;  ///< the entry's cold table was used, at least in part
    bool frequency_extrapolated =
        false;  ///< a loss law used outside the frequencies of its measurement

    bool known() const { return number.has_value(); }
};

/// Any property. For refractive_index see index_at. extinction_coefficient is derived from
/// absorption_coefficient, k = aλ/4π, when only that is given.
/// @throws std::logic_error for an unknown material
Value evaluate(const Library& library, const std::string& material, PropertyId property,
               const Conditions& conditions);

/// Refractive index in vacuum with its derivatives with respect to angular frequency [s, s²].
/// A formula without temperature is carried from its own temperature by ∫(dn/dT)dT.
struct IndexValue {
    std::optional<numerics::Jet<double>> index;
    std::string missing;
    const Entry* entry = nullptr;
    std::string analogy;
    Width width;
};
IndexValue index_at(const Library& library, const std::string& material, double wavelength,
                    double temperature);

/// Derivatives of an extinction coefficient with respect to angular frequency, from the entry that
/// gave its value: those of a table in wavelength, of k = aλ/4π, or none for a single number.
numerics::Jet<double> with_dispersion(const Value& extinction, bool per_length, double wavelength);

/// Names of the alternatives of a property whose data hold under these conditions.
std::vector<std::string> alternatives_that_hold(const Library& library, const std::string& material,
                                                PropertyId property, const Conditions& conditions);

/// Linear expansion from one temperature to another, ∫α dT; the reason when α is unknown on the
/// way.
Value expansion_between(const Library& library, const std::string& material, double from,
                        double to);

/// Heat capacity of a Debye solid relative to its high-temperature limit, at T/θ.
/// P. Debye, Ann. Phys. (Leipzig) 344, 789 (1912).
double debye_shape(double temperature, double debye_temperature);

/// Refractive index of air at 20 °C relative to vacuum, for indices stated relative to air.
inline constexpr double index_of_air = 1.00027;

}  // namespace stillcoat::materials
