#pragma once
/// Dispersion formulas and tables with exact derivatives.

#include "stillcoat/materials/property.hpp"
#include "stillcoat/numerics/jet.hpp"

namespace stillcoat::materials {

bool depends_on_temperature(const Entry& entry);

/// Index in vacuum of an entry (not same_as), with derivatives with respect to angular frequency.
numerics::Jet<double> dispersion(const Entry& entry, double wavelength, double temperature);

/// Value of an optical property from a table, formula or scalar at a wavelength.
double optical_value(const Entry& entry, double wavelength);

}  // namespace stillcoat::materials
