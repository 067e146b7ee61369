#include "present/figure_axis.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "present/figure_text.hpp"

namespace stillcoat::present {
namespace {

constexpr long double slack = 1e-9L;  ///< so that a limit on a tic keeps the tic

std::string with_minus_sign(std::string number) {
    if (number.empty() || number[0] != '-') return number;
    if (number.find_first_of("123456789") == std::string::npos) return number.substr(1);
    return "−" + number.substr(1);
}

std::string power_of_ten(int exponent) {
    return "10^{" + with_minus_sign(std::to_string(exponent)) + "}";
}

int floor_int(long double value) { return static_cast<int>(std::floor(value)); }

struct Step {
    long double size = 1.0L;
    int exponent = 0;  ///< of the last decimal that a multiple has
    int parts = 5;     ///< minor intervals
};

/// The smallest of 1, 2, 5 times a power of ten that is not below `least`.
Step round_step(long double least) {
    const int exponent = floor_int(std::log10(least) + slack);
    const long double power = std::pow(10.0L, static_cast<long double>(exponent));
    const long double mantissa = least / power * (1.0L - slack);
    if (mantissa <= 1.0L) return {power, exponent, 5};
    if (mantissa <= 2.0L) return {2.0L * power, exponent, 4};
    if (mantissa <= 5.0L) return {5.0L * power, exponent, 5};
    return {10.0L * power, exponent + 1, 5};
}

std::string linear_label(long double value, const Step& step, long double largest) {
    const int size = floor_int(std::log10(largest) + slack);
    if (size >= -4 && size < 6 && step.exponent > -9) {
        return with_minus_sign(fmt::format("{:.{}f}", value, std::max(0, -step.exponent)));
    }
    if (std::abs(value) < step.size / 2.0L) return "0";
    const long double mantissa = value / std::pow(10.0L, static_cast<long double>(size));
    return with_minus_sign(
               fmt::format("{:.{}f}", mantissa, std::clamp(size - step.exponent, 0, 17))) +
           "×" + power_of_ten(size);
}

/// Round values between two others in at most `wanted` steps; those between them without a label.
std::vector<std::pair<long double, std::string>> round_values(long double lower, long double upper,
                                                              int wanted, bool minor) {
    const long double largest = std::max(std::abs(lower), std::abs(upper));
    const Step step = round_step((upper - lower) / static_cast<long double>(wanted));
    std::vector<std::pair<long double, std::string>> result;
    const long double fine = minor ? step.size / step.parts : step.size;
    const int parts = minor ? step.parts : 1;
    const long double first = std::ceil(lower / fine - slack);
    const long double last = std::floor(upper / fine + slack);
    for (long double k = first; k <= last && result.size() < 200; k += 1.0L) {
        const bool whole = std::fmod(k, static_cast<long double>(parts)) == 0.0L;
        result.emplace_back(k * fine, whole ? linear_label(k * fine, step, largest) : "");
    }
    return result;
}

std::vector<Tic> linear_tics(const Scale& scale, int wanted) {
    std::vector<Tic> tics;
    for (const auto& [value, label] : round_values(scale.lower, scale.upper, wanted, true)) {
        tics.push_back(
            {static_cast<double>((value - scale.lower) / (scale.upper - scale.lower)), label});
    }
    return tics;
}

double position_of_logarithm(const Scale& scale, long double logarithm) {
    return static_cast<double>((logarithm - scale.lower) / (scale.upper - scale.lower));
}

std::string logarithmic_label(int mantissa, int exponent, bool plain) {
    if (plain) {
        const double value = mantissa * std::pow(10.0, exponent);
        return fmt::format("{:.{}f}", value, std::max(0, -exponent));
    }
    if (mantissa == 1) return power_of_ten(exponent);
    return std::to_string(mantissa) + "×" + power_of_ten(exponent);
}

/// Less than two round values of a logarithmic scale are in sight: those of a linear one.
std::vector<Tic> narrow_logarithmic_tics(const Scale& scale, int wanted) {
    const auto value = [](long double logarithm) { return std::pow(10.0L, logarithm); };
    std::vector<Tic> tics;
    for (const auto& [number, label] :
         round_values(value(scale.lower), value(scale.upper), wanted, false)) {
        if (number <= 0.0L) continue;
        tics.push_back({position_of_logarithm(scale, std::log10(number)), label});
    }
    return tics;
}

std::vector<Tic> logarithmic_tics(const Scale& scale, int wanted) {
    const int first = static_cast<int>(std::ceil(scale.lower - slack));
    const int last = floor_int(scale.upper + slack);
    const int decades = last - first + 1;
    const int stride = std::max(1, (decades + wanted - 1) / wanted);
    const bool plain = scale.lower > -3.5L && scale.upper < 3.5L;
    const bool narrow = decades <= 2;
    std::vector<Tic> tics;
    int labelled = 0;
    for (int n = first - 1; n <= last; ++n) {
        for (int mantissa = 1; mantissa <= (stride == 1 ? 9 : 1); ++mantissa) {
            const long double logarithm = n + std::log10(static_cast<long double>(mantissa));
            if (logarithm < scale.lower - slack || logarithm > scale.upper + slack) continue;
            const bool major =
                mantissa == 1 ? n % stride == 0 : narrow && (mantissa == 2 || mantissa == 5);
            labelled += major ? 1 : 0;
            tics.push_back({position_of_logarithm(scale, logarithm),
                            major ? logarithmic_label(mantissa, n, plain) : ""});
        }
    }
    return labelled >= 2 ? tics : narrow_logarithmic_tics(scale, wanted);
}

double longest_label(const std::vector<Tic>& tics) {
    double longest = 0.0;
    for (const Tic& tic : tics) longest = std::max(longest, label_width(tic.label));
    return longest;
}

}  // namespace

void extend(Extent& extent, const Axis& axis, const std::vector<double>& values) {
    for (const double value : values) {
        if (axis.logarithmic && value <= 0.0) continue;
        extent.least = extent.empty ? value : std::min(extent.least, value);
        extent.most = extent.empty ? value : std::max(extent.most, value);
        extent.empty = false;
    }
}

double Scale::position(double value) const {
    const long double place =
        logarithmic ? std::log10(static_cast<long double>(value)) : static_cast<long double>(value);
    return static_cast<double>((place - lower) / (upper - lower));
}

Scale scale_of(const Axis& axis, const Extent& data, double margin) {
    const auto place = [&](double value) {
        const long double number = value;
        return axis.logarithmic ? std::log10(number) : number;
    };
    Scale scale;
    scale.logarithmic = axis.logarithmic;
    scale.lower = axis.lower ? place(*axis.lower) : data.empty ? 0.0L : place(data.least);
    scale.upper = axis.upper ? place(*axis.upper) : data.empty ? 1.0L : place(data.most);
    const long double size = std::max(std::abs(scale.lower), std::abs(scale.upper));
    // Values that differ by rounding only are one value; it gets a scale around it.
    const bool one_value = !(scale.upper - scale.lower > 1e-12L * size);
    if (one_value) {
        const long double half = axis.logarithmic ? 0.5L : size == 0.0L ? 1.0L : 0.1L * size;
        const long double middle = axis.lower ? scale.lower : scale.upper;
        if (!axis.lower) scale.lower = middle - half;
        if (!axis.upper) scale.upper = middle + half;
        return scale;
    }
    const long double free = (scale.upper - scale.lower) * static_cast<long double>(margin);
    if (!axis.lower) scale.lower -= free;
    if (!axis.upper) scale.upper += free;
    return scale;
}

std::vector<Tic> tics_of(const Scale& scale, double room, bool along) {
    const auto tics = [&](int wanted) {
        return scale.logarithmic ? logarithmic_tics(scale, wanted) : linear_tics(scale, wanted);
    };
    for (int wanted = along ? 8 : static_cast<int>(std::clamp(room / 2.0, 2.0, 8.0)); wanted > 2;
         --wanted) {
        std::vector<Tic> result = tics(wanted);
        if (!along) return result;
        const auto labels = std::count_if(result.begin(), result.end(),
                                          [](const Tic& tic) { return !tic.label.empty(); });
        const double spaced = longest_label(result) + 1.2;
        if (static_cast<double>(labels) * spaced <= room) return result;
    }
    return tics(2);
}

double label_width(const std::string& label) {
    const std::size_t raised = label.find("^{");
    if (raised == std::string::npos) return text_width(label);
    const std::string high = label.substr(raised + 2, label.size() - raised - 3);
    return text_width(label.substr(0, raised)) + 0.8 * text_width(high);
}

}  // namespace stillcoat::present
