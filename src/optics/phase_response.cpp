#include <cmath>
#include <limits>

#include "optics/recursion.hpp"
#include "optics/validity.hpp"

namespace stillcoat::optics {

namespace {

/// Fields as series in ω, and what was divided out of them on the way, as d ln(factor)/dω.
struct JetFields {
    Tangential<ComplexJet> fields;
    Complex log_factor_slope;
};

/// Powers of two are constants. A common factor f(ω) whose derivatives outgrow its value (they add
/// up layer by layer) is divided out too: neither r nor, with its slope counted, t depends on it.
void renormalise(JetFields& state, double omega) {
    Tangential<ComplexJet>& v = state.fields;
    const int excess = excess_exponent({v.electric.value, v.magnetic.value});
    if (excess != 0) {
        const ComplexJet scale(Complex(std::ldexp(1.0, -excess)));
        v = {v.electric * scale, v.magnetic * scale};
    }
    const ComplexJet& leading =
        std::abs(v.electric.value) > std::abs(v.magnetic.value) ? v.electric : v.magnetic;
    constexpr double tolerated = 8.0;
    if (std::abs(leading.first) * omega <= tolerated * std::abs(leading.value)) return;
    state.log_factor_slope += leading.first / leading.value;
    const ComplexJet factor = ComplexJet(leading.value) / leading;
    v = {v.electric * factor, v.magnetic * factor};
}

/// d ln(a)/dω; a constant has none, even the constant zero of p light leaving along the boundary.
Complex log_slope(const ComplexJet& a) {
    return a.first == Complex(0.0) ? Complex(0.0) : a.first / a.value;
}

PhaseResponse undefined_phase() {
    const double nan = std::numeric_limits<double>::quiet_NaN();
    return {nan, nan, nan, nan};
}

}  // namespace

PhaseResponse phase_response(const DispersiveStack& stack, const Illumination& light) {
    // Notation: η0 incident admittance, r = (η0 E − H)/(η0 E + H).
    require_valid(stack, light);
    const double omega = 2.0 * core::pi * core::speed_of_light / light.wavelength;
    const auto constant = [](double value) { return ComplexJet(Complex(value)); };
    const ComplexJet n0 = numerics::to_complex(stack.incident_index);
    const ComplexJet beta = n0 * constant(std::sin(light.angle));
    const ComplexJet beta2 = beta * beta;
    const ComplexJet eta0 = n0 * constant(incident_admittance(1.0, light));  // n0 cosθ0 or n0/cosθ0

    const Medium<ComplexJet> substrate = medium(stack.substrate_index, beta2, light.polarisation);
    JetFields state{
        outgoing_wave(substrate, decaying_root(substrate.normal_square), light.polarisation), 0.0};
    const ComplexJet transmitted = state.fields.electric;
    for (std::size_t j = stack.thickness.size(); j-- > 0;) {
        const Medium<ComplexJet> layer = medium(stack.layer_index[j], beta2, light.polarisation);
        const double path_per_omega = stack.thickness[j] / core::speed_of_light;
        const ComplexJet path(2.0 * core::pi / light.wavelength * stack.thickness[j],
                              path_per_omega, 0.0);
        const Rotation<ComplexJet> turn = rotation(path * path * layer.normal_square);
        state.fields = fields_above(layer, path, turn, state.fields);
        state.log_factor_slope += turn.growth.first;
        renormalise(state, omega);
    }
    const ComplexJet incident = eta0 * state.fields.electric + state.fields.magnetic;
    const ComplexJet reflection = (eta0 * state.fields.electric - state.fields.magnetic) / incident;
    if (!(std::abs(reflection.value) >= smallest_reflection)) return undefined_phase();
    const ComplexJet log_reflection = log(reflection);
    // t = 2 η0 E_substrate/(η0 E + H); the real η0 leaves its argument alone.
    const Complex log_transmission_slope =
        log_slope(transmitted) - log_slope(incident) - state.log_factor_slope;
    // A negative real r may carry either sign of zero: its phase is +π.
    const double phase = log_reflection.value.imag();
    const PhaseResponse result{phase == -core::pi ? core::pi : phase, log_reflection.first.imag(),
                               log_reflection.second.imag(), log_transmission_slope.imag()};
    const bool finite = std::isfinite(result.group_delay) &&
                        std::isfinite(result.group_delay_dispersion) &&
                        std::isfinite(result.transmission_group_delay);
    return finite ? result : undefined_phase();
}

DispersiveStack without_dispersion(const OpticalStack& stack) {
    DispersiveStack dispersive{stack.incident_index, {}, {}, stack.substrate_index};
    for (const OpticalLayer& layer : stack.layers) {
        dispersive.layer_index.emplace_back(layer.index);
        dispersive.thickness.push_back(layer.thickness);
    }
    return dispersive;
}

}  // namespace stillcoat::optics
