#pragma once
/// The heat capacity of a Debye solid.

namespace stillcoat::materials {

/// Debye temperatures that a material file may state [K]: caesium has 38 K, diamond 2230 K.
inline constexpr double lowest_debye_temperature = 10.0;
inline constexpr double highest_debye_temperature = 3000.0;

/// Heat capacity of a Debye solid relative to its high-temperature limit, between 0 and 1.
/// P. Debye, Ann. Phys. (Leipzig) 344, 789 (1912).
/// @param temperature [K], @param debye_temperature [K]; both positive and finite
/// @throws core::DomainError otherwise
double debye_shape(double temperature, double debye_temperature);

}  // namespace stillcoat::materials
