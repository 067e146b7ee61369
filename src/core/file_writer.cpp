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

[[noreturn]] void fail(const std::string& path, const std::string& what, int error,
                       const std::string& hint = "nothing was written") {
    throw InputError(fmt::format("{}: {}: {}", path, what, std::strerror(error)), hint);
}

void write_all(int descriptor, const std::string& content, const std::string& path,
               const std::string& hint) {
    std::size_t done = 0;
    while (done < content.size()) {
        const ssize_t count = ::write(descriptor, content.data() + done, content.size() - done);
        if (count < 0 && errno == EINTR) continue;
        if (count < 0) fail(path, "cannot write", errno, hint);
        done += static_cast<std::size_t>(count);
    }
}

/// Writes into a stream that cannot be replaced by renaming: standard output, a pipe, a device.
void write_stream(int descriptor, const std::string& content, const std::string& path) {
    write_all(descriptor, content, path, "what it holds now is not complete");
}

/// The permissions of a new file: those of the one that it replaces, or the usual ones.
mode_t permissions(const std::string& path) {
    struct stat status {};
    if (::stat(path.c_str(), &status) == 0) return status.st_mode & 0777;
    const mode_t mask = ::umask(0);
    ::umask(mask);
    return 0666 & ~mask;
}

void write_beside_and_rename(const std::string& path, const std::string& content,
                             Existing existing) {
    std::string temporary = path + ".XXXXXX";
    const int descriptor = ::mkstemp(temporary.data());
    if (descriptor < 0) fail(path, "cannot create", errno);
    try {
        write_all(descriptor, content, path, "nothing was written");
        if (::fchmod(descriptor, permissions(path)) != 0) {
            fail(path, "cannot set permissions", errno);
        }
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

}  // namespace

void check_writable(const std::string& path, Existing existing) {
    if (path == "-") return;
    namespace fs = std::filesystem;
    std::error_code error;
    const fs::file_status status = fs::status(path, error);
    const bool exists = fs::exists(status);
    if (!exists && status.type() != fs::file_type::not_found) {
        throw InputError(path + ": " + error.message(), "give another name");
    }
    if (!exists && fs::is_symlink(fs::symlink_status(path, error))) {
        throw InputError(path + ": is a link to a file that is not there", "give a file name");
    }
    if (!exists) {
        const std::string folder = fs::path(path).parent_path().string();
        if (::access(folder.empty() ? "." : folder.c_str(), W_OK) != 0) {
            fail(path, "cannot create", errno);
        }
        return;
    }
    if (fs::is_directory(status)) throw InputError(path + ": is a directory", "give a file name");
    if (existing == Existing::keep && fs::is_regular_file(status)) {
        throw InputError(path + ": exists already and was kept", "give --replace to overwrite it");
    }
    if (::access(path.c_str(), W_OK) != 0) fail(path, "cannot replace", errno);
}

void write_file(const std::string& path, const std::string& content, Existing existing) {
    if (path == "-") {
        write_stream(STDOUT_FILENO, content, "standard output");
        return;
    }
    namespace fs = std::filesystem;
    check_writable(path, existing);
    std::error_code ignored;
    if (!fs::exists(path, ignored)) {
        write_beside_and_rename(path, content, existing);
        return;
    }
    if (fs::is_regular_file(path, ignored)) {
        // A link stays a link: what it points to is replaced.
        write_beside_and_rename(fs::canonical(path).string(), content, existing);
        return;
    }
    const int descriptor = ::open(path.c_str(), O_WRONLY | O_CLOEXEC);
    if (descriptor < 0) fail(path, "cannot open", errno);
    write_stream(descriptor, content, path);
    if (::close(descriptor) != 0) fail(path, "cannot close", errno);
}

}  // namespace stillcoat::core
