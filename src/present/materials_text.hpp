#pragma once
/// The materials library for people.

#include <string>

#include "present/wording.hpp"
#include "stillcoat/materials/evaluation.hpp"

namespace stillcoat::present {

/// One line per material.
std::string materials_list(const materials::Library& library, bool colour);

/// Everything the file of one material states.
std::string material_page(const materials::Library& library, const std::string& name, bool colour);

/// One property under stated conditions, with its source.
std::string property_page(const materials::Library& library, const std::string& name,
                          materials::PropertyId property, const materials::Conditions& conditions,
                          bool colour);

/// The list of usual units.
std::string units_page(bool colour);

}  // namespace stillcoat::present
