#pragma once
/// The one place that writes files: whole or not at all.

#include <string>

namespace stillcoat::core {

/// What to do with a file that exists already.
enum class Existing { keep, replace };

/// Writes `content` to `path`; "-" is standard output. The text goes to a new file beside it, is
/// forced to the disk and then takes its name in one step, so no reader ever sees half a file.
/// @throws InputError when the file exists and is to be kept, or cannot be written.
void write_file(const std::string& path, const std::string& content, Existing existing);

/// What would make write_file fail for sure, found before any work is done: a folder that is not
/// there or not writable, a file that is to be kept, a directory.
/// @throws InputError
void check_writable(const std::string& path, Existing existing);

}  // namespace stillcoat::core
