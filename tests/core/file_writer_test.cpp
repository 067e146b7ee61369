#include "stillcoat/core/file_writer.hpp"

#include <gtest/gtest.h>
#include <unistd.h>

#include <filesystem>
#include <fstream>
#include <sstream>

#include "stillcoat/core/errors.hpp"

namespace {

using namespace stillcoat::core;
namespace fs = std::filesystem;

class FileWriter : public ::testing::Test {
  protected:
    void SetUp() override { fs::create_directories(folder_); }
    void TearDown() override { fs::remove_all(folder_); }
    std::string content(const std::string& name) const {
        std::ifstream stream(folder_ / name);
        std::stringstream text;
        text << stream.rdbuf();
        return text.str();
    }
    std::size_t files() const {
        return static_cast<std::size_t>(
            std::distance(fs::directory_iterator(folder_), fs::directory_iterator()));
    }
    fs::path folder_ =
        fs::temp_directory_path() / ("stillcoat-writer-" + std::to_string(::getpid()));
};

TEST_F(FileWriter, KeepsAnExistingFileUnlessToldOtherwise) {
    write_file((folder_ / "a").string(), "one", Existing::keep);
    EXPECT_THROW(write_file((folder_ / "a").string(), "two", Existing::keep), InputError);
    EXPECT_EQ(content("a"), "one");
    write_file((folder_ / "a").string(), "two", Existing::replace);
    EXPECT_EQ(content("a"), "two");
    EXPECT_EQ(files(), 1u);
}

TEST_F(FileWriter, KeepsPermissionsAndLinksOfWhatItReplaces) {
    write_file((folder_ / "a").string(), "one", Existing::keep);
    fs::permissions(folder_ / "a", fs::perms::owner_read | fs::perms::owner_write);
    fs::create_symlink(folder_ / "a", folder_ / "link");
    write_file((folder_ / "link").string(), "two", Existing::replace);
    EXPECT_EQ(content("a"), "two");
    EXPECT_TRUE(fs::is_symlink(folder_ / "link"));
    EXPECT_EQ(fs::status(folder_ / "a").permissions(),
              fs::perms::owner_read | fs::perms::owner_write);
    fs::create_symlink(folder_ / "nowhere", folder_ / "dangling");
    for (const Existing existing : {Existing::keep, Existing::replace}) {
        EXPECT_THROW(write_file((folder_ / "dangling").string(), "x", existing), InputError);
    }
    EXPECT_EQ(files(), 3u);
}

TEST_F(FileWriter, LeavesNothingBehindWhenItCannotWrite) {
    EXPECT_THROW(write_file((folder_ / "none" / "a").string(), "x", Existing::keep), InputError);
    EXPECT_THROW(write_file(folder_.string(), "x", Existing::replace), InputError);
    // /dev/full refuses every byte, as a full disk does.
    EXPECT_THROW(write_file("/dev/full", "x", Existing::replace), InputError);
    EXPECT_EQ(files(), 0u);
}

}  // namespace
