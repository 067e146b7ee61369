#include "present/gnuplot.hpp"

#include <fcntl.h>
#include <fmt/format.h>
#include <spawn.h>
#include <sys/mman.h>
#include <sys/wait.h>
#include <unistd.h>

#include <cerrno>
#include <cstring>
#include <vector>

#include "stillcoat/core/errors.hpp"

namespace stillcoat::present {
namespace {

[[noreturn]] void fail(const std::string& what, int error) {
    throw core::InputError(fmt::format("no figure: {}: {}", what, std::strerror(error)),
                           "nothing was written");
}

/// A file in memory, without a name and gone with this object. Unlike a pipe it cannot fill up
/// while both sides wait, and a child that ends early does not raise SIGPIPE.
class MemoryFile {
  public:
    explicit MemoryFile(const char* purpose) : descriptor_(::memfd_create(purpose, MFD_CLOEXEC)) {
        if (descriptor_ < 0) fail("no file in memory", errno);
    }
    ~MemoryFile() { ::close(descriptor_); }
    MemoryFile(const MemoryFile&) = delete;
    MemoryFile& operator=(const MemoryFile&) = delete;

    int descriptor() const { return descriptor_; }
    void write(const std::string& text) {
        std::size_t done = 0;
        while (done < text.size()) {
            const ssize_t count = ::write(descriptor_, text.data() + done, text.size() - done);
            if (count < 0 && errno == EINTR) continue;
            if (count < 0) fail("cannot hand the data to gnuplot", errno);
            done += static_cast<std::size_t>(count);
        }
        if (::lseek(descriptor_, 0, SEEK_SET) != 0) fail("cannot rewind", errno);
    }
    std::string content() const {
        std::string text;
        char part[65536];
        for (;;) {
            const ssize_t count =
                ::pread(descriptor_, part, sizeof part, static_cast<off_t>(text.size()));
            if (count < 0 && errno == EINTR) continue;
            if (count < 0) fail("cannot read what gnuplot wrote", errno);
            if (count == 0) return text;
            text.append(part, static_cast<std::size_t>(count));
        }
    }

  private:
    int descriptor_;
};

/// The environment, but with messages and numbers as in C.
std::vector<std::string> plain_environment() {
    std::vector<std::string> result;
    for (char** entry = environ; *entry != nullptr; ++entry) {
        const std::string text = *entry;
        if (text.rfind("LC_ALL=", 0) != 0) result.push_back(text);
    }
    result.emplace_back("LC_ALL=C");
    return result;
}

int exit_status(pid_t child) {
    int status = 0;
    while (::waitpid(child, &status, 0) < 0) {
        if (errno != EINTR) fail("lost gnuplot", errno);
    }
    return status;
}

/// @return the status as of waitpid, or none when there is no such program.
int run(const std::vector<const char*>& arguments, const MemoryFile& in, const MemoryFile& out,
        const MemoryFile& messages) {
    std::vector<std::string> environment = plain_environment();
    std::vector<char*> variables;
    for (std::string& entry : environment) variables.push_back(entry.data());
    variables.push_back(nullptr);
    std::vector<char*> words;
    // posix_spawnp takes char*, by promise without writing to it.
    for (const char* word : arguments) words.push_back(const_cast<char*>(word));
    words.push_back(nullptr);

    posix_spawn_file_actions_t actions;
    ::posix_spawn_file_actions_init(&actions);
    ::posix_spawn_file_actions_adddup2(&actions, in.descriptor(), STDIN_FILENO);
    ::posix_spawn_file_actions_adddup2(&actions, out.descriptor(), STDOUT_FILENO);
    ::posix_spawn_file_actions_adddup2(&actions, messages.descriptor(), STDERR_FILENO);
    pid_t child = 0;
    const int error =
        ::posix_spawnp(&child, arguments[0], &actions, nullptr, words.data(), variables.data());
    ::posix_spawn_file_actions_destroy(&actions);
    if (error == ENOENT) {
        throw core::InputError(
            "no figure: gnuplot is not on the PATH",
            "install it (Debian and Ubuntu: apt install gnuplot-nox), version 5.4 or later");
    }
    if (error != 0) fail("cannot start gnuplot", error);
    return exit_status(child);
}

/// The last lines that say something, in one.
std::string end_of(const std::string& messages) {
    std::vector<std::string> lines;
    std::string line;
    for (const char c : messages + "\n") {
        if (c != '\n') {
            line += c;
            continue;
        }
        const std::size_t first = line.find_first_not_of(" \t\r^");
        if (first != std::string::npos) {
            lines.push_back(line.substr(first, line.find_last_not_of(" \t\r") + 1 - first));
        }
        line.clear();
    }
    constexpr std::size_t enough = 4;
    std::string result;
    for (std::size_t i = lines.size() > enough ? lines.size() - enough : 0; i < lines.size(); ++i) {
        result += (result.empty() ? "" : " | ") + lines[i].substr(0, 200);
    }
    return result.empty() ? "it gave no reason" : result;
}

}  // namespace

std::string gnuplot_output(const std::string& script) {
    MemoryFile in("script");
    MemoryFile out("picture");
    MemoryFile messages("messages");
    in.write(script);
    // -d: neither the system's nor the user's start-up file. By name, since gnuplot reads what it
    // takes for a terminal byte by byte.
    const int status = run({"gnuplot", "-d", "/dev/stdin"}, in, out, messages);
    const std::string picture = out.content();
    if (WIFSIGNALED(status)) {
        throw core::InputError(fmt::format("no figure: gnuplot was ended by signal {}: {}",
                                           WTERMSIG(status), end_of(messages.content())),
                               "nothing was written");
    }
    if (!WIFEXITED(status) || WEXITSTATUS(status) != 0 || picture.empty()) {
        throw core::InputError("no figure: gnuplot failed: " + end_of(messages.content()),
                               "nothing was written; gnuplot 5.4 or later is needed");
    }
    return picture;
}

}  // namespace stillcoat::present
