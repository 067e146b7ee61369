#pragma once
/// Interpolation in a table of temperature, and integrals over temperature.

#include <functional>

#include "stillcoat/materials/value.hpp"

namespace stillcoat::materials {

/// Between neighbours of one sign log y against log x, linear across a change of sign. The end
/// pieces go on outside the table, which only an explicit statement of the data file may ask for.
double interpolate(const TemperatureTable& table, double temperature);

/// ∫ f dT by Gauss–Legendre on panels of at most 2 K, with the data of the whole way; the first
/// missing value when there is one. Its width is that of f at the far end, not of the integral.
Value integral(double from, double to, const std::function<Value(double)>& at);

}  // namespace stillcoat::materials
