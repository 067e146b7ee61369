#include "stillcoat/optics/response.hpp"

#include "optics/field_sweep.hpp"

namespace stillcoat::optics {

Response response(const OpticalStack& stack, const Illumination& light) {
    const FieldSweep sweep = field_sweep(stack, light);
    const double k0 = 2.0 * core::pi / light.wavelength;
    const double eta0 = incident_admittance(stack.incident_index, light);
    const double beta2 = beta_square(stack, light);
    Response result{};
    result.reflection = sweep.wave.reflection;
    result.reflectance = std::norm(result.reflection);
    result.transmittance = sweep.transmittance;
    result.log_transmittance = sweep.log_transmittance;
    result.layer_absorptance.reserve(stack.layers.size());
    for (std::size_t j = 0; j < stack.layers.size(); ++j) {
        const Complex index_square = stack.layers[j].index * stack.layers[j].index;
        double absorbed = 0.0;
        if (index_square.imag() > 0.0) {
            const SquaredFields square = squared_fields(sweep.wave, j);
            const double normal = light.polarisation == Polarisation::s
                                      ? 0.0
                                      : beta2 * square.magnetic / std::norm(index_square);
            absorbed = k0 / eta0 * index_square.imag() * (square.electric + normal);
        }
        result.layer_absorptance.push_back(absorbed);
        result.absorptance += absorbed;
    }
    result.loss = result.transmittance + result.absorptance;
    return result;
}

}  // namespace stillcoat::optics
