#pragma once
/// Admissible ranges of what the noise formulas are given. Each throws core::DomainError, also for
/// NaN.

#include "stillcoat/noise/footprint.hpp"

namespace stillcoat::noise {

void require_finite(double value, const char* quantity, const char* unit, const char* source);
void require_positive(double value, const char* quantity, const char* unit, const char* source);
void require_not_negative(double value, const char* quantity, const char* unit, const char* source);

/// Both radii of the spot: greater than 0.
void require_spot(const Footprint& spot, const char* source);

/// Spot, temperature and frequency, which every spectrum needs: all greater than 0.
void require_conditions(const Footprint& spot, double temperature, double frequency,
                        const char* source);

/// The result itself: a spectrum that has overflowed is refused, never passed on.
/// @return `psd`
double finite_psd(double psd, const char* quantity, const char* source);

}  // namespace stillcoat::noise
