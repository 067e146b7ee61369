#pragma once
/// One property of one substance as its file states it: the datum, how wide it is, where it comes
/// from, where it holds, and what may be done outside that range.

#include <array>
#include <optional>
#include <string>
#include <utility>
#include <variant>
#include <vector>

#include "stillcoat/core/quantity.hpp"
#include "stillcoat/core/reader.hpp"

namespace stillcoat::materials {

enum class PropertyId {
    refractive_index,
    extinction_coefficient,
    absorption_coefficient,
    thermo_optic_coefficient,
    photoelastic_p11,
    photoelastic_p12,
    youngs_modulus,
    poisson_ratio,
    density,
    loss_angle,
    loss_angle_bulk,
    loss_angle_shear,
    thermal_conductivity,
    specific_heat,
    thermal_expansion,
};
inline constexpr std::size_t property_count = 15;

/// Key, words, unit and admissible values of a property.
struct PropertyInfo {
    PropertyId id;
    std::string key;    ///< "youngs_modulus"
    std::string title;  ///< "Young's modulus"
    const core::QuantityKind* kind;
    core::Limits limits;
};
const std::array<PropertyInfo, property_count>& property_table();
const PropertyInfo& info(PropertyId id);
std::optional<PropertyId> property_by_key(const std::string& key);
bool is_loss(PropertyId id);

/// Standard uncertainty of a datum.
struct Width {
    enum class Form { not_stated, absolute, relative, geometric, uniform };
    Form form = Form::not_stated;
    double value = 0.0;  ///< absolute: SI; relative: fraction; geometric: standard deviation factor
    double lower = 0.0, upper = 0.0;  ///< uniform: SI
};
struct WidthSpan {
    double from, to;  ///< [K]
    Width width;
};

struct Interval {
    double lower, upper;
    /// Ends included; "0.4 µm" and 400 nm differ by a rounding, which must not decide.
    bool contains(double x) const {
        constexpr double rounding = 1e-12;
        return x >= lower * (1.0 - rounding) && x <= upper * (1.0 + rounding);
    }
};

struct Scalar {
    double value;
};
/// Interpolated in log–log between neighbours of one sign, linearly across a change of sign; ends
/// with its first and last temperature.
struct TemperatureTable {
    std::vector<double> temperature, value;
};
struct WavelengthTable {
    std::vector<double> wavelength, value;  ///< [m], increasing
};
/// value = at_1_Hz · (f/Hz)^exponent
struct PowerLaw {
    double at_1_hz, exponent;
    std::optional<double>
        exponent_uncertainty;  ///< standard uncertainty of the exponent, as stated
};
/// n² = 1 + constant + Σ S_i L²/(L² − λ_i²), L in µm; S_i and λ_i polynomials in T/K, ascending.
struct Sellmeier {
    double constant;
    std::vector<std::vector<double>> strength, resonance;
    bool depends_on_temperature;
};
/// n = A + B/L² + C/L⁴, L in µm.
struct Cauchy {
    double a, b, c;
};
/// The same property of another material, times a factor.
struct SameAs {
    std::string material;
    double factor;
    bool own = false;  ///< the material's own datum in the library, which a design file multiplies
};
/// Follows from two other materials by the rule of its property, see mixture.hpp.
struct Mixed {
    std::string first, second;
    double fraction;                             ///< volume fraction of the second, from 0 to 1
    std::optional<double> fraction_uncertainty;  ///< standard uncertainty; absent: taken as exact
};
using Curve = std::variant<Scalar, TemperatureTable, WavelengthTable, PowerLaw, Sellmeier, Cauchy,
                           SameAs, Mixed>;

/// References from property to property that are followed at most.
inline constexpr int deepest_reference = 64;

/// An explicit rule outside the range of the data.
struct Beyond {
    enum class Rule { constant, debye, follows, heat_capacity };
    Rule rule = Rule::constant;
    double debye_temperature = 0.0;  ///< [K]
    std::string material;            ///< of rule follows
    std::optional<Interval> temperature, wavelength;
    Width width;
    std::vector<WidthSpan> width_spans;
    std::vector<std::string> sources;
    std::string place, note;
};

/// Loss below room temperature: used as printed below `join.lower`, interpolated in log–log to the
/// room temperature entry at `join.upper`.
struct ColdTable {
    TemperatureTable table;
    Interval join;
    Width width;
    std::vector<WidthSpan> width_spans;
    std::vector<std::string> sources;
    std::string place, nature, status, note;
    std::optional<Interval> frequency;  ///< of the measurement [Hz]; absent: not stated
};

enum class Medium { vacuum, air, unstated };

struct Entry {
    Curve curve;
    double offset = 0.0;             ///< added to an index formula
    Medium medium = Medium::vacuum;  ///< refractive index: relative to what
    std::optional<std::pair<double, double>>
        rescaled_to;                       ///< wavelength [m], value: factor on the whole curve
    std::optional<double> at_temperature;  ///< [K]
    Width width;
    std::vector<WidthSpan> width_spans;
    std::optional<Interval> between_laboratories;
    std::vector<std::string> sources;
    std::string place, measured_at, nature, status, note;
    /// Where the datum holds, never beyond the ends of its table; absent: not limited. The
    /// frequency of a loss is that of its measurement, both ends equal for a single one.
    std::optional<Interval> temperature, wavelength, frequency;
    /// The last piece of a table of temperature goes on to here [K], a few kelvin above its end.
    std::optional<double> continued_to;
    std::optional<Beyond> beyond;
    std::optional<ColdTable> cold;
    bool from_design = false;  ///< a value of its own in a design file
};

struct Alternative {
    std::string name, reason;
    Entry entry;
};

struct Property {
    Entry entry;
    std::vector<Alternative> alternatives;
};

/// Width at a temperature: that of the lowest span that applies, or the entry's own.
Width width_at(const Width& own, const std::vector<WidthSpan>& spans, double temperature);

}  // namespace stillcoat::materials
