#pragma once
/// The range in which the optics of this room holds.

#include "stillcoat/optics/response.hpp"

namespace stillcoat::optics {

/// @throws core::DomainError naming the first quantity that is out of range.
void require_valid(const OpticalStack& stack, const Illumination& light);

/// The same, and the derivatives are finite. @throws std::logic_error when the counts differ.
void require_valid(const DispersiveStack& stack, const Illumination& light);

}  // namespace stillcoat::optics
