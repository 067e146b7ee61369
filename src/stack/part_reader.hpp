#pragma once
/// Reads what a design file says of the whole part: the relief or the scatter of the coated face in
/// [mirror], and [rear_face].

#include <optional>
#include <string>

#include "stillcoat/core/reader.hpp"
#include "stillcoat/stack/design.hpp"

namespace stillcoat::stack {

/// `medium` of a table: "vacuum" where none is stated; a name that nothing has is a problem.
std::string read_medium(core::TableReader& reader, const materials::Library& library);

/// `roughness` and `scatter` of [mirror], of which at most one may stand.
void read_surface(core::TableReader& reader, MirrorBody& mirror);

/// [rear_face]; absent when the design has none. A rear face needs the thickness of its plate.
/// @param mirror as read before
std::optional<RearFace> read_rear_face(core::TableReader& document, const MirrorBody& mirror,
                                       const materials::Library& library);

}  // namespace stillcoat::stack
