#include "noise/limits.hpp"

#include <cmath>

#include "stillcoat/core/errors.hpp"

namespace stillcoat::noise {

void require_finite(double value, const char* quantity, const char* unit, const char* source) {
    if (!std::isfinite(value)) throw core::DomainError(quantity, value, unit, "finite", source);
}

void require_positive(double value, const char* quantity, const char* unit, const char* source) {
    if (!(value > 0.0) || !std::isfinite(value)) {
        throw core::DomainError(quantity, value, unit, "greater than 0 and finite", source);
    }
}

void require_not_negative(double value, const char* quantity, const char* unit,
                          const char* source) {
    if (!(value >= 0.0) || !std::isfinite(value)) {
        throw core::DomainError(quantity, value, unit, "0 or greater, and finite", source);
    }
}

void require_spot(const Footprint& spot, const char* source) {
    require_positive(spot.radius_x, "beam radius", "m", source);
    require_positive(spot.radius_y, "beam radius", "m", source);
}

void require_conditions(const Footprint& spot, double temperature, double frequency,
                        const char* source) {
    require_spot(spot, source);
    require_positive(temperature, "temperature", "K", source);
    require_positive(frequency, "frequency", "Hz", source);
}

double finite_psd(double psd, const char* quantity, const char* source) {
    if (!std::isfinite(psd)) {
        throw core::DomainError(quantity, psd, "m^2/Hz", "within the range of double precision",
                                source);
    }
    return psd;
}

}  // namespace stillcoat::noise
