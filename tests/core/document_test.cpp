#include "stillcoat/core/document.hpp"

#include <gtest/gtest.h>
#include <unistd.h>

#include <filesystem>
#include <fstream>

#include "stillcoat/core/reader.hpp"

namespace {

using namespace stillcoat::core;

std::string message_of(const std::function<void()>& action) {
    try {
        action();
    } catch (const InputError& error) {
        return error.what();
    }
    return "no error";
}

TEST(Document, KnowsWhereItsValuesStand) {
    const Document document = parse_document("a = 1\n[light]\nwavelength = 5\n", "d.toml");
    const Node* light = document.root.find("light");
    ASSERT_NE(light, nullptr);
    const Place place = light->find("wavelength")->place();
    EXPECT_EQ(place.file, "d.toml");
    EXPECT_EQ(place.line, 3);
    EXPECT_EQ(place.column, 14);
    EXPECT_EQ(light->key_place("wavelength").column, 1);
}

TEST(Document, ThatIsNotTomlIsRefusedWithItsPlace) {
    const std::string message = message_of([] { parse_document("a = 1\nb = = 2\n", "d.toml"); });
    EXPECT_EQ(message.rfind("d.toml:2:", 0), 0u) << message;
    EXPECT_NE(message.find("not valid TOML"), std::string::npos) << message;
}

TEST(Document, ThatNestsTooDeepIsRefusedBeforeTheParserRecurses) {
    const std::string deep = "a = " + std::string(10'000, '[');
    EXPECT_EQ(message_of([&] { parse_document(deep, "d.toml"); }),
              "d.toml:1:1: nested deeper than 64 levels\n       write the tables flat");
    std::string dotted = "a";
    for (int i = 0; i < 9'000; ++i) dotted += ".a";
    EXPECT_NE(
        message_of([&] { parse_document(dotted + " = 1\n", "d.toml"); }).find("nested deeper"),
        std::string::npos);
}

TEST(Document, WithALineThatWouldTakeTheParserMinutesIsRefused) {
    const std::string line = "a = [" + std::string(longest_line, '1') + "]\n";
    EXPECT_EQ(message_of([&] { parse_document("b = 1\n" + line, "d.toml"); }),
              "d.toml:2:1: this line has 20006 characters; more than 20000 are refused\n"
              "       write a long list over several lines");
}

TEST(Document, MayHoldBracketsInTextsAndComments) {
    const std::string text =
        "a = \"" + std::string(200, '[') + "\"  # " + std::string(200, '{') + "\nb = 1\n";
    EXPECT_EQ(parse_document(text, "d.toml").root.entries.size(), 2u);
}

TEST(Document, MayHoldTextsOfSeveralLines) {
    const std::string brackets(200, '[');
    for (const std::string quotes : {"\"\"\"", "'''"}) {
        const std::string mark(1, quotes[0]);
        // A single quote inside neither ends the text nor begins another one.
        const std::string text =
            "a = " + quotes + "\n" + brackets + mark + "\n" + brackets + quotes + "\nb = 1\n";
        const Document document = parse_document(text, "d.toml");
        EXPECT_EQ(document.root.find("a")->text, brackets + mark + "\n" + brackets);
        // Brackets behind such a text are counted.
        const std::string hidden = "a = " + quotes + mark + " " + quotes +
                                   "\nb = " + std::string(10'000, '[') + mark + "\n";
        EXPECT_NE(message_of([&] { parse_document(hidden, "d.toml"); }).find("nested deeper"),
                  std::string::npos);
    }
}

TEST(Document, DoesNotClampAnIntegerBeyondSixtyFourBits) {
    const Document document =
        parse_document("a = 99999999999999999999999\nb = -99999999999999999999999\n", "d.toml");
    Problems problems;
    TableReader reader(document.root, "the file", problems);
    EXPECT_FALSE(reader.number("a", any_value()).has_value());
    EXPECT_FALSE(reader.whole_number("b", -5, 5).has_value());
    EXPECT_EQ(problems.size(), 2u);
}

class Folder {
  public:
    Folder()
        : path_(std::filesystem::temp_directory_path() /
                ("stillcoat-" + std::to_string(::getpid()))) {
        std::filesystem::create_directories(path_);
    }
    ~Folder() { std::filesystem::remove_all(path_); }
    std::string operator/(const std::string& name) const { return (path_ / name).string(); }
    std::string name() const { return path_.string(); }

  private:
    std::filesystem::path path_;
};

TEST(File, ThatCannotBeUsedIsRefused) {
    const Folder folder;
    EXPECT_EQ(message_of([&] { read_text_file(folder / "none.toml"); }),
              (folder / "none.toml") + ": no such file\n       check the name and folder");
    EXPECT_EQ(message_of([&] { read_text_file(folder.name()); }),
              folder.name() + ": is a directory\n       give a file");
    std::ofstream(folder / "big.toml") << std::string(largest_file_bytes + 1, '#');
    EXPECT_EQ(message_of([&] { read_text_file(folder / "big.toml"); }),
              (folder / "big.toml") +
                  ": 8000001 bytes; files above 8000000 bytes are refused\n       use `repeat` for "
                  "periodic stacks");
    EXPECT_NE(message_of([&] { read_text_file("/dev/zero"); }).find("files above"),
              std::string::npos);
    // Reading this file fails for every user, also for root, whom no permission stops.
    EXPECT_EQ(message_of([&] { read_text_file("/proc/self/mem"); }),
              "/proc/self/mem: cannot be read\n       check its permissions");
}

TEST(Reader, ReportsEveryProblemOfATable) {
    const Document document = parse_document(
        "[beam]\nradius = 3\nradios = \"4 mm\"\n[light]\nwavelength = \"5 K\"\nangle = nan\n",
        "d.toml");
    Problems problems;
    TableReader beam(*document.root.find("beam"), "[beam]", problems);
    beam.quantity("radius", kind::length, positive("m"));
    beam.finish();
    TableReader light(*document.root.find("light"), "[light]", problems);
    light.quantity("wavelength", kind::length, positive("m"));
    light.number("angle", any_value());
    light.required_text("medium");
    light.finish();
    const std::string message = message_of([&] { problems.throw_if_any(); });
    EXPECT_NE(
        message.find(
            "d.toml:2:10: radius in [beam] needs a length with a unit, here it is a bare number\n"
            "     2 | radius = 3\n"
            "       |          ^\n"
            "       for example radius = \"1397 nm\""),
        std::string::npos)
        << message;
    EXPECT_NE(message.find("d.toml:3:1: unknown key radios in [beam]"), std::string::npos)
        << message;
    EXPECT_NE(message.find("did you mean radius?"), std::string::npos);
    EXPECT_NE(message.find("\"K\" is not a unit of length"), std::string::npos);
    EXPECT_NE(message.find("angle in [light] is nan"), std::string::npos);
    EXPECT_NE(message.find("medium is missing in [light]"), std::string::npos);
}

TEST(Reader, ShowsBothPlacesOfAContradiction) {
    const Document document = parse_document("[a]\nx = 1\ny = 2\n", "d.toml");
    Problems problems;
    TableReader reader(*document.root.find("a"), "[a]", problems);
    reader.contradiction("x", "y", "keep one");
    const std::string message = message_of([&] { problems.throw_if_any(); });
    EXPECT_EQ(message,
              "d.toml:2:1: x and y in [a] contradict each other\n"
              "     2 | x = 1\n"
              "       | ^\n"
              "       and here: d.toml:3:1\n"
              "     3 | y = 2\n"
              "       | ^\n"
              "       keep one");
}

TEST(NearestSpelling, IsOfferedOnlyWhenNear) {
    EXPECT_EQ(nearest_spelling("tantalla-ibs", {"tantala-ibs", "silica-ibs"}), "tantala-ibs");
    EXPECT_EQ(nearest_spelling("xylophone", {"tantala-ibs", "silica-ibs"}), std::nullopt);
}

}  // namespace
