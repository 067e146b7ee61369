#pragma once
/// The mirror as the optics room sees it.

#include "stillcoat/optics/response.hpp"
#include "stillcoat/stack/mirror.hpp"

namespace stillcoat::assess {

optics::OpticalStack optical_stack(const stack::Mirror& mirror);
optics::DispersiveStack dispersive_stack(const stack::Mirror& mirror);

}  // namespace stillcoat::assess
