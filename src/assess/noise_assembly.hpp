#pragma once
/// Puts the noise terms of one mirror together from the library's values; leaves out, with the
/// reason, what an unknown value makes impossible.

#include "stillcoat/assess/appraisal.hpp"

namespace stillcoat::assess {

/// Noise of the face in one polarisation. Uses and notes go to `ledger`, warnings to `warnings`.
Noise assemble_noise(const stack::Design& design, const materials::Library& library,
                     const stack::Mirror& mirror, optics::Polarisation polarisation,
                     stack::Ledger& ledger, std::vector<std::string>& warnings);

}  // namespace stillcoat::assess
