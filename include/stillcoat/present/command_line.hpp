#pragma once
/// The program's commands.

#include <string>
#include <vector>

namespace stillcoat::present {

/// Exit codes.
enum ExitCode { fine = 0, requirement_not_met = 1, bad_input = 2, no_answer = 3, our_mistake = 4 };

/// Runs one command line (without the program's name) and returns the exit code. Results go to
/// standard output or files, everything else to standard error.
/// @param program path of the running program, from which installed data are found
int run(const std::string& program, const std::vector<std::string>& arguments);

}  // namespace stillcoat::present
