#pragma once
/// Reads the table [mixture] of a material file.

#include "stillcoat/core/reader.hpp"
#include "stillcoat/materials/library.hpp"

namespace stillcoat::materials {

/// Reads [mixture] and gives `material`, whose own tables are read already, the properties that
/// follow from it; a property without a rule that it does not state becomes unknown.
void read_mixture(const core::Node& table, Material& material, const Library& library,
                  core::Problems& problems);

}  // namespace stillcoat::materials
