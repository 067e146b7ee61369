#include "materials/interpolation.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <boost/math/quadrature/gauss.hpp>
#include <cmath>

namespace stillcoat::materials {
namespace {

/// "α of X at 280 K: how" becomes "α of X from 295 K to 124 K: how".
std::string along(const std::string& analogy, double from, double to) {
    const std::size_t at = analogy.find(" at ");
    const std::size_t how = analogy.find(": ");
    return fmt::format("{} from {:g} K to {:g} K{}", analogy.substr(0, at), from, to,
                       how == std::string::npos ? "" : analogy.substr(how));
}

}  // namespace

double interpolate(const TemperatureTable& table, double temperature) {
    const std::vector<double>& t = table.temperature;
    const auto after = std::upper_bound(t.begin() + 1, t.end() - 1, temperature);
    const std::size_t i = static_cast<std::size_t>(after - t.begin()) - 1;
    const double a = table.value[i];
    const double b = table.value[i + 1];
    if ((a > 0.0 && b > 0.0) || (a < 0.0 && b < 0.0)) {
        const double share = std::log(temperature / t[i]) / std::log(t[i + 1] / t[i]);
        return a * std::pow(b / a, share);
    }
    return a + (b - a) * (temperature - t[i]) / (t[i + 1] - t[i]);
}

Value integral(double from, double to, const std::function<Value(double)>& at) {
    constexpr double panel = 2.0;
    using Gauss = boost::math::quadrature::gauss<double, 7>;
    const int panels = std::max(1, static_cast<int>(std::ceil(std::abs(to - from) / panel)));
    const double half = (to - from) / (2.0 * panels);
    // The far end first: when it is unknown, the message names the temperature that was asked for.
    Value end = at(to);
    if (!end.number) return end;
    Value result;
    double sum = 0.0;
    for (int i = 0; i < panels; ++i) {
        const double middle = from + half * (2 * i + 1);
        for (std::size_t j = 0; j < Gauss::abscissa().size(); ++j) {
            for (const double sign : {-1.0, 1.0}) {
                if (Gauss::abscissa()[j] == 0.0 && sign > 0.0) continue;
                Value value = at(middle + sign * half * Gauss::abscissa()[j]);
                if (!value.number) return value;
                sum += Gauss::weights()[j] * half * *value.number;
                if (result.analogy.empty() && !value.analogy.empty()) {
                    result.analogy = along(value.analogy, from, to);
                }
                result.entry = value.entry;
                add_bases(result.bases, value.bases);
            }
        }
    }
    result.number = sum;
    result.width = end.width;
    return result;
}

}  // namespace stillcoat::materials
