#pragma once
/// gnuplot as a child process.

#include <string>

namespace stillcoat::present {

/// What gnuplot writes to its standard output when it runs `script`. It is started without a shell
/// and without anybody's start-up file, and talks to us through files without names.
/// @throws core::InputError when gnuplot is not on the PATH, fails, or writes nothing.
std::string gnuplot_output(const std::string& script);

}  // namespace stillcoat::present
