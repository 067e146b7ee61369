#pragma once
/// A material file to fill in.

#include <string>

namespace stillcoat::present {

/// Text of `my-film.toml`: a file that is accepted as it stands, with every property of the library
/// and the forms that a datum can take; what may be left out stands as a comment whose lines become
/// TOML when the # in front of them goes.
std::string material_template();

}  // namespace stillcoat::present
