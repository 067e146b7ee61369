#include "optics/recursion.hpp"

#include <algorithm>
#include <array>
#include <limits>

namespace stillcoat::optics {

namespace {

/// sinc √w and its first two derivatives by w, from the power series Σ (−w)^k/(2k+1)!, |w| < 1.
std::array<Complex, 3> sinc_series(Complex w) {
    constexpr int terms = 11;
    std::array<double, terms> coefficient{};
    coefficient[0] = 1.0;
    for (int k = 1; k < terms; ++k)
        coefficient[k] = -coefficient[k - 1] / (2.0 * k * (2.0 * k + 1.0));
    std::array<Complex, 3> s{};
    for (int k = terms - 1; k >= 0; --k) {
        s[0] = s[0] * w + coefficient[k];
        if (k >= 1) s[1] = s[1] * w + k * coefficient[k];
        if (k >= 2) s[2] = s[2] * w + k * (k - 1.0) * coefficient[k];
    }
    return s;
}

}  // namespace

Complex decaying_root(Complex w) {
    if (w.imag() == 0.0) {  // without this, −0 would select the growing branch
        return w.real() >= 0.0 ? Complex(std::sqrt(w.real()), 0.0)
                               : Complex(0.0, std::sqrt(-w.real()));
    }
    return std::sqrt(w);
}

ComplexJet decaying_root(const ComplexJet& w) {
    const Complex root = decaying_root(w.value);
    if (root == Complex(0.0) && w.first == Complex(0.0) && w.second == Complex(0.0)) return {};
    return chain(w, root, Complex(0.5) / root, Complex(-0.25) / (root * w.value));
}

Rotation<Complex> rotation(Complex w) {
    const Complex delta = decaying_root(w);
    if (delta == Complex(0.0)) return {1.0, 1.0, 0.0};
    const double growth = delta.imag();
    const double cosine = std::cos(delta.real());
    const double sine = std::sin(delta.real());
    if (growth == 0.0) return {cosine, sine / delta.real(), 0.0};
    const double sinh = -0.5 * std::expm1(-2.0 * growth);  // exp(−growth) sinh(growth)
    const double cosh = 1.0 - sinh;
    return {Complex(cosine * cosh, -sine * sinh), Complex(sine * cosh, cosine * sinh) / delta,
            growth};
}

Rotation<ComplexJet> rotation(const ComplexJet& w) {
    // Notation: c, s = cos √w, sinc √w; c' = −s/2, s' = (c − s)/(2w), s'' = −(s/2 + 3s')/(2w).
    const Rotation<Complex> turn = rotation(w.value);
    if (turn.growth.real() > 1.0) {
        // e^{iδ} cos δ = (1 + e^{2iδ})/2, e^{iδ} sinc δ = (e^{2iδ} − 1)/(2iδ)
        const ComplexJet i_delta = ComplexJet(Complex(0.0, 1.0)) * decaying_root(w);
        const ComplexJet round_trip = exp(i_delta + i_delta);
        const ComplexJet half(Complex(0.5));
        return {half + half * round_trip, half * (round_trip - ComplexJet(Complex(1.0))) / i_delta,
                -i_delta};
    }
    const Complex c = turn.cosine;
    std::array<Complex, 3> s{turn.sinc, 0.0, 0.0};
    if (std::abs(w.value) < 1.0) {
        s = sinc_series(w.value);
        const double scale = std::exp(-turn.growth.real());
        for (Complex& term : s) term *= scale;
    } else {
        s[1] = (c - s[0]) / (2.0 * w.value);
        s[2] = -(0.5 * s[0] + 3.0 * s[1]) / (2.0 * w.value);
    }
    return {chain(w, c, -0.5 * s[0], -0.5 * s[1]), chain(w, s[0], s[1], s[2]),
            ComplexJet(turn.growth)};
}

int excess_exponent(const Tangential<Complex>& fields) {
    const auto largest_part = [](Complex z) {
        return std::max(std::abs(z.real()), std::abs(z.imag()));
    };
    const double size = std::max(largest_part(fields.electric), largest_part(fields.magnetic));
    constexpr double reach = 4294967296.0;
    if (size == 0.0 || (size < reach && size > 1.0 / reach)) return 0;
    return std::ilogb(size);
}

double incident_admittance(double incident_index, const Illumination& light) {
    const double cosine = std::cos(light.angle);
    return light.polarisation == Polarisation::s ? incident_index * cosine
                                                 : incident_index / cosine;
}

}  // namespace stillcoat::optics
