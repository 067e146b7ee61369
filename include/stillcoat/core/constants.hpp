#pragma once
/// Exact constants of the SI (CODATA 2018: E. Tiesinga et al., Rev. Mod. Phys. 93, 025010 (2021)).

#include <numbers>

namespace stillcoat::core {

inline constexpr double pi = std::numbers::pi;
inline constexpr double boltzmann_constant = 1.380649e-23;  ///< k_B [J/K], exact
inline constexpr double speed_of_light = 299792458.0;       ///< c [m/s], exact
inline constexpr double planck_constant = 6.62607015e-34;   ///< h [J s], exact

}  // namespace stillcoat::core
