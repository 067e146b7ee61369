#pragma once
/// Pictures of an appraisal.

#include <string>

#include "stillcoat/assess/appraisal.hpp"
#include "stillcoat/core/file_writer.hpp"

namespace stillcoat::present {

enum class Picture { noise, field };

/// Noise: the terms of the sum against frequency, as amplitudes. Field: |E|² and the index through
/// the stack. Of two polarisations each has its curves.
/// @throws core::InputError when no term of the noise is known, or as draw does
void draw_appraisal(const stack::Design& design, const assess::Appraisal& appraisal,
                    Picture picture, const std::string& path, core::Existing existing);

}  // namespace stillcoat::present
