#include "stillcoat/core/quantity.hpp"

#include <fmt/format.h>
#include <udunits2.h>

#include <algorithm>
#include <array>
#include <charconv>
#include <cmath>
#include <memory>
#include <string_view>

namespace stillcoat::core {

namespace kind {
const QuantityKind length{"length", "m", "1397 nm"};
const QuantityKind angle{"angle", "rad", "10 deg"};
const QuantityKind temperature{"temperature", "K", "295 K"};
const QuantityKind frequency{"frequency", "Hz", "100 Hz"};
const QuantityKind power{"power", "W", "120 W"};
const QuantityKind number{"pure number", "1", "0.5"};
const QuantityKind pressure{"pressure", "Pa", "72 GPa"};
const QuantityKind density{"density", "kg/m3", "2200 kg/m3"};
const QuantityKind thermal_conductivity{"thermal conductivity", "W/(m K)", "1.38 W/(m K)"};
const QuantityKind specific_heat{"specific heat", "J/(kg K)", "740 J/(kg K)"};
const QuantityKind per_kelvin{"change per kelvin", "1/K", "5.1e-7 1/K"};
const QuantityKind per_length{"absorption per length", "1/m", "1e-4 1/m"};
}  // namespace kind

namespace {

struct UnitDeleter {
    void operator()(ut_unit* unit) const { ut_free(unit); }
    void operator()(cv_converter* converter) const { cv_free(converter); }
};
using Unit = std::unique_ptr<ut_unit, UnitDeleter>;
using Converter = std::unique_ptr<cv_converter, UnitDeleter>;

/// The unit database, read once and never changed afterwards.
ut_system* unit_system() {
    static ut_system* const system = [] {
        ut_set_error_message_handler(ut_ignore);
        ut_system* const read = ut_read_xml(nullptr);
        // The database knows "degree" but not the short form that everybody writes.
        if (read != nullptr) {
            const Unit degree(ut_parse(read, "degree", UT_ASCII));
            ut_map_name_to_unit("deg", UT_ASCII, degree.get());
        }
        return read;
    }();
    if (system == nullptr) {
        throw std::logic_error(
            "the unit database of UDUNITS-2 cannot be read: install libudunits2-data");
    }
    return system;
}

QuantityReading failed(std::string message, std::string hint) {
    return {false, 0.0, {std::move(message), std::move(hint)}};
}

std::string example_of(const QuantityKind& kind) {
    return fmt::format("write {} with its unit, for example \"{}\"", with_article(kind.name),
                       kind.example);
}

constexpr std::size_t longest_unit = 60;

/// Whether a digit in a unit is an exponent, as in "m2", "K-1", "m^2", or the 1 of "1/m": anything
/// else, as in "nm 2", would be a factor.
bool digits_are_exponents(const std::string& unit) {
    for (std::size_t i = 0; i < unit.size(); ++i) {
        if (std::isdigit(static_cast<unsigned char>(unit[i])) == 0) continue;
        if (i == 0 && unit.rfind("1/", 0) == 0) continue;
        if (i == 0) return false;
        const char before = unit[i - 1];
        const bool sign =
            (before == '-' || before == '+') && i >= 2 &&
            (std::isalpha(static_cast<unsigned char>(unit[i - 2])) != 0 || unit[i - 2] == '^');
        if (!sign && before != '^' && std::isalnum(static_cast<unsigned char>(before)) == 0) {
            return false;
        }
    }
    return true;
}

/// A unit text begins with a letter, a sign such as %, or "1/"; numbers in front were taken
/// already.
bool looks_like_unit(const std::string& unit) {
    // UDUNITS-2 also reads origins ("K from 3") and logarithms ("lg(re 1 K)"), which no unit here
    // is, and its parser recurses, so that a very long text is refused.
    if (unit.empty() || unit.size() > longest_unit) return false;
    for (const char* word : {" from ", " after ", " since ", " ref ", "(re ", "(re:"}) {
        if (unit.find(word) != std::string::npos) return false;
    }
    const auto first = static_cast<unsigned char>(unit.front());
    if (unit.rfind("1/", 0) == 0) return unit.find('@') == std::string::npos;
    if (!digits_are_exponents(unit)) return false;
    return (std::isalpha(first) != 0 || first == '%' || first >= 0x80) &&
           unit.find_first_of("@,;\n") == std::string::npos;
}

/// The power of the radian in a unit. UDUNITS-2 takes the radian for a pure number, so that "rpm"
/// or "cycle/s" would be read as hertz times 2π and "5 %" as an angle.
std::string radians_in(const ut_unit* unit) {
    std::array<char, 256> words{};
    const int length = ut_format(unit, words.data(), words.size(), UT_ASCII | UT_DEFINITION);
    if (length < 0 || static_cast<std::size_t>(length) >= words.size()) return "unknown";
    const std::string_view text(words.data());
    const std::size_t at = text.find("rad");
    if (at == std::string_view::npos) return "";
    const std::size_t end = std::min(text.find_first_not_of("-0123456789", at + 3), text.size());
    return std::string(text.substr(at, end - at));
}

/// Whether a conversion is a factor, or a factor and an offset as from degrees Celsius: UDUNITS-2
/// also turns seconds into hertz.
bool is_linear(const cv_converter* converter) {
    const double at_0 = cv_convert_double(converter, 0.0);
    const double at_1 = cv_convert_double(converter, 1.0);
    const double at_2 = cv_convert_double(converter, 2.0);
    return std::isfinite(at_0) && std::abs((at_2 - at_1) - (at_1 - at_0)) <=
                                      1e-9 * std::max(std::abs(at_2), std::abs(at_0));
}

QuantityReading converted(double number, const std::string& unit_text, const QuantityKind& kind) {
    if (!std::isfinite(number)) {
        return failed(fmt::format("{} is not a finite number", kind.name), example_of(kind));
    }
    if (kind.si_unit == "1" && unit_text == "dB") return {true, std::pow(10.0, number / 10.0), {}};
    if (!looks_like_unit(unit_text)) {
        const bool brief = unit_text.size() <= longest_unit;
        return failed(brief ? fmt::format("\"{}\" is not a unit", unit_text)
                            : "a text this long is not a unit",
                      example_of(kind));
    }
    const Unit from(ut_parse(unit_system(), unit_text.c_str(), UT_UTF8));
    if (!from)
        return failed(fmt::format("\"{}\" is not a known unit", unit_text),
                      example_of(kind) + "; `stillcoat units` lists the usual ones");
    const Unit to(ut_parse(unit_system(), kind.si_unit.c_str(), UT_UTF8));
    const Converter converter(ut_get_converter(from.get(), to.get()));
    if (!converter || !is_linear(converter.get()) ||
        radians_in(from.get()) != radians_in(to.get())) {
        return failed(fmt::format("\"{}\" is not a unit of {}", unit_text, kind.name),
                      example_of(kind));
    }
    const double value = cv_convert_double(converter.get(), number);
    if (!std::isfinite(value)) {
        return failed(fmt::format("{} is not a finite number", kind.name), example_of(kind));
    }
    return {true, value, {}};
}

}  // namespace

std::string with_article(const std::string& noun) {
    const bool vowel =
        !noun.empty() && std::string("aeiou").find(noun.front()) != std::string::npos;
    return (vowel ? "an " : "a ") + noun;
}

QuantityReading read_quantity(double number, const std::string& unit, const QuantityKind& kind) {
    return converted(number, unit, kind);
}

QuantityReading read_quantity(const std::string& text, const QuantityKind& kind) {
    std::size_t begin = text.find_first_not_of(' ');
    if (begin == std::string::npos) {
        return failed(fmt::format("an empty text where {} is expected", with_article(kind.name)),
                      example_of(kind));
    }
    if (text[begin] == '+' && begin + 1 < text.size() && text[begin + 1] != '-') ++begin;
    double number = 0.0;
    const char* const end = text.data() + text.size();
    const auto [after, error] = std::from_chars(text.data() + begin, end, number);
    if (error == std::errc::result_out_of_range) {
        return failed(fmt::format("the number in \"{}\" is beyond what can be held", text),
                      example_of(kind));
    }
    if (error != std::errc()) {
        return failed(fmt::format("\"{}\" does not begin with a number", text), example_of(kind));
    }
    std::string unit(after, end);
    unit.erase(0, unit.find_first_not_of(' '));
    unit.erase(unit.find_last_not_of(' ') + 1);
    if (unit.empty()) {
        if (kind.si_unit == "1" && std::isfinite(number)) return {true, number, {}};
        return failed(fmt::format("\"{}\" has no unit", text), example_of(kind));
    }
    return converted(number, unit, kind);
}

const std::vector<UsualUnits>& usual_units() {
    static const std::vector<UsualUnits> list{
        {kind::length,
         {"nm", "um", "µm", "mm", "cm", "m", "km", "angstrom"},
         "wavelength, thickness, beam radius"},
        {kind::temperature, {"K", "mK", "degC"}, "temperature"},
        {kind::frequency, {"mHz", "Hz", "kHz", "MHz"}, "noise frequency"},
        {kind::angle, {"deg", "mrad", "urad", "rad", "arcmin", "arcsec"}, "angle of incidence"},
        {kind::power, {"uW", "mW", "W", "kW", "MW"}, "light power"},
        {kind::pressure, {"Pa", "MPa", "GPa"}, "Young's modulus"},
        {kind::density, {"kg/m3", "g/cm3"}, "density"},
        {kind::thermal_conductivity, {"W/(m K)", "W/m/K", "mW/(m K)"}, "thermal conductivity"},
        {kind::specific_heat, {"J/(kg K)", "J/kg/K", "J/(g K)"}, "specific heat"},
        {kind::per_kelvin, {"1/K", "ppm/K", "K-1"}, "expansion, dn/dT"},
        {kind::per_length, {"1/m", "1/cm", "ppm/cm"}, "bulk absorption"},
        {kind::number, {"ppm", "%", "dB"}, "transmittance, loss; a bare number too"},
    };
    return list;
}

}  // namespace stillcoat::core
