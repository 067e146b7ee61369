#pragma once
/// Admissible ranges of what the noise formulas are given. Each throws core::DomainError, also for
/// NaN.

#include <string>

namespace stillcoat::noise {

void require_finite(double value, const std::string& quantity, const std::string& unit,
                    const std::string& source);
void require_positive(double value, const std::string& quantity, const std::string& unit,
                      const std::string& source);
void require_not_negative(double value, const std::string& quantity, const std::string& unit,
                          const std::string& source);

/// Beam radius, temperature and frequency, which every spectrum needs: all greater than 0.
void require_conditions(double beam_radius, double temperature, double frequency,
                        const std::string& source);

/// The result itself: a spectrum that has overflowed is refused, never passed on.
/// @return `psd`
double finite_psd(double psd, const std::string& quantity, const std::string& source);

}  // namespace stillcoat::noise
