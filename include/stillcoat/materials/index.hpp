#pragma once
/// Refractive index and extinction coefficient with their dispersion.

#include <optional>
#include <string>
#include <vector>

#include "stillcoat/materials/library.hpp"
#include "stillcoat/materials/value.hpp"
#include "stillcoat/numerics/jet.hpp"

namespace stillcoat::materials {

/// Refractive index in vacuum with its derivatives with respect to angular frequency [s, s²].
struct IndexValue {
    std::optional<numerics::Jet<double>> index;
    std::string missing;           ///< reason when there is no index
    const Entry* entry = nullptr;  ///< the entry of the material itself
    std::vector<Basis> bases;      ///< all data that had a say, each once, those of dn/dT too
    std::string analogy;           ///< how a rule beyond the data gave it; empty within the range
    /// What the reader of a result should know: "index of X is that at 295 K: …"; mostly empty.
    std::string note;
    Width width;
};

/// The index of a material.
///
/// An entry with a temperature of its own (at_temperature_K), a same_as too, is carried from there
/// by ∫(dn/dT)dT. Where dn/dT is unknown the index stays what it is within the entry's range of
/// temperature, with a note, and is missing outside it. An entry without a temperature of its own
/// holds in its range of temperature, or by its rule `constant` beyond it. That of a mixture
/// follows from its constituents at the same temperature; a constituent whose extinction is unknown
/// counts as transparent there, with a note.
/// @param wavelength vacuum [m], within the entry's range; nothing is continued in wavelength
/// @param temperature [K]
IndexValue index_at(const Library& library, const std::string& material, double wavelength,
                    double temperature);

/// An extinction coefficient with its derivatives with respect to angular frequency [s, s²]; its
/// value is that of `extinction`, whatever factor or rule went into it. The derivatives are those
/// of its table in wavelength, of k = aλ/4π, of the rule of a mixture, or 0 for a single number and
/// for a table outside its wavelengths.
/// @param extinction a value with a number
/// @param per_length it was derived from an absorption coefficient
/// @param wavelength vacuum [m], the one at which `extinction` was evaluated
numerics::Jet<double> with_dispersion(const Value& extinction, bool per_length, double wavelength);

/// Index of air at 20 °C relative to vacuum, for indices stated relative to air.
inline constexpr double index_of_air = 1.00027;

}  // namespace stillcoat::materials
