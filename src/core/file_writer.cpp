#include "stillcoat/core/file_writer.hpp"

#include <fcntl.h>
#include <fmt/format.h>
#include <sys/stat.h>
#include <unistd.h>

#include <cerrno>
#include <cstdio>
#include <cstdlib>
#include <cstring>
#include <filesystem>

#include "stillcoat/core/errors.hpp"

namespace stillcoat::core {
namespace {

[[noreturn]] void fail(const std::string& path, const std::string& what, int error) {
    throw InputError(fmt::format("{}: {}: {}", path, what, std::strerror(error)),
                     "nothing was written");
}

void write_all(int descriptor, const std::string& content, const std::string& path) {
    std::size_t done = 0;
    while (done < content.size()) {
        const ssize_t count = ::write(descriptor, content.data() + done, content.size() - done);
        if (count < 0 && errno == EINTR) continue;
        if (count < 0) fail(path, "cannot write", errno);
        done += static_cast<std::size_t>(count);
    }
}

}  // namespace

void write_file(const std::string& path, const std::string& content, Existing existing) {
    if (path == "-") {
        write_all(STDOUT_FILENO, content, "standard output");
        return;
    }
    namespace fs = std::filesystem;
    std::error_code ignored;
    const bool exists = fs::exists(path, ignored);
    if (exists && fs::is_directory(path, ignored)) {
        throw InputError(path + ": is a directory", "give a file name");
    }
    if (exists && existing == Existing::keep) {
        throw InputError(path + ": exists already and was kept", "give --replace to overwrite it");
    }
    if (exists && !fs::is_regular_file(path, ignored)) {
        // A device or pipe cannot be replaced by renaming; it takes the text as it is.
        const int descriptor = ::open(path.c_str(), O_WRONLY | O_CLOEXEC);
        if (descriptor < 0) fail(path, "cannot open", errno);
        write_all(descriptor, content, path);
        if (::close(descriptor) != 0) fail(path, "cannot close", errno);
        return;
    }
    std::string temporary = path + ".XXXXXX";
    const int descriptor = ::mkstemp(temporary.data());
    if (descriptor < 0) fail(path, "cannot create", errno);
    try {
        write_all(descriptor, content, path);
        const mode_t mask = ::umask(0);
        ::umask(mask);
        if (::fchmod(descriptor, 0666 & ~mask) != 0) fail(path, "cannot set permissions", errno);
        if (::fsync(descriptor) != 0) fail(path, "cannot write", errno);
        if (::close(descriptor) != 0) fail(path, "cannot close", errno);
        // link() fails where rename() would replace a file that appeared in the meantime.
        if (existing == Existing::keep) {
            if (::link(temporary.c_str(), path.c_str()) != 0) fail(path, "cannot create", errno);
            ::unlink(temporary.c_str());
        } else if (::rename(temporary.c_str(), path.c_str()) != 0) {
            fail(path, "cannot replace", errno);
        }
    } catch (...) {
        ::unlink(temporary.c_str());
        throw;
    }
}

}  // namespace stillcoat::core
