#include "materials/dispersion.hpp"

#include <cmath>
#include <stdexcept>

#include "stillcoat/core/constants.hpp"
#include "stillcoat/materials/evaluation.hpp"
#include "stillcoat/numerics/cubic_spline.hpp"

namespace stillcoat::materials {
namespace {

using numerics::Jet;

double polynomial(const std::vector<double>& coefficients, double x) {
    double sum = 0.0;
    for (auto c = coefficients.rbegin(); c != coefficients.rend(); ++c) sum = sum * x + *c;
    return sum;
}

/// Vacuum wavelength in µm as a function of angular frequency.
Jet<double> micrometres(double wavelength) {
    const double omega = 2.0 * core::pi * core::speed_of_light / wavelength;
    const double l = wavelength * 1e6;
    return {l, -l / omega, 2.0 * l / (omega * omega)};
}

/// Tables run in 1/λ², in which dispersion in the transparent range is nearly a straight line.
Jet<double> table_value(const WavelengthTable& table, const Jet<double>& l) {
    std::vector<double> x(table.wavelength.rbegin(), table.wavelength.rend());
    for (double& w : x) w = 1.0 / (w * 1e6 * w * 1e6);
    const numerics::CubicSpline spline(x, {table.value.rbegin(), table.value.rend()});
    return spline(Jet<double>(1.0) / (l * l));
}

Jet<double> formula(const Entry& entry, const Jet<double>& l, double temperature) {
    const Jet<double> l2 = l * l;
    if (const auto* sellmeier = std::get_if<Sellmeier>(&entry.curve)) {
        Jet<double> square(1.0 + sellmeier->constant);
        for (std::size_t i = 0; i < sellmeier->strength.size(); ++i) {
            const double strength = polynomial(sellmeier->strength[i], temperature);
            const double resonance = polynomial(sellmeier->resonance[i], temperature);
            square =
                square + Jet<double>(strength) * l2 / (l2 - Jet<double>(resonance * resonance));
        }
        return sqrt(square);
    }
    if (const auto* cauchy = std::get_if<Cauchy>(&entry.curve)) {
        const Jet<double> inverse = Jet<double>(1.0) / l2;
        return Jet<double>(cauchy->a) +
               inverse * (Jet<double>(cauchy->b) + inverse * Jet<double>(cauchy->c));
    }
    if (const auto* table = std::get_if<WavelengthTable>(&entry.curve))
        return table_value(*table, l);
    if (const auto* scalar = std::get_if<Scalar>(&entry.curve)) return Jet<double>(scalar->value);
    throw std::logic_error("not an optical datum");
}

}  // namespace

bool depends_on_temperature(const Entry& entry) {
    const auto* sellmeier = std::get_if<Sellmeier>(&entry.curve);
    return sellmeier != nullptr && sellmeier->depends_on_temperature;
}

Jet<double> dispersion(const Entry& entry, double wavelength, double temperature) {
    const Jet<double> offset(entry.offset);
    Jet<double> n = formula(entry, micrometres(wavelength), temperature) + offset;
    if (entry.rescaled_to) {
        const Jet<double> there =
            formula(entry, micrometres(entry.rescaled_to->first), temperature) + offset;
        n = n * Jet<double>(entry.rescaled_to->second / there.value);
    }
    if (entry.medium == Medium::air) n = n * Jet<double>(index_of_air);
    return n;
}

double optical_value(const Entry& entry, double wavelength) {
    return formula(entry, micrometres(wavelength), 295.0).value;
}

}  // namespace stillcoat::materials
