#include "stillcoat/core/errors.hpp"

#include <gtest/gtest.h>

namespace {

using namespace stillcoat::core;

std::string thrown(const Problems& problems) {
    try {
        problems.throw_if_any();
    } catch (const InputError& error) {
        return error.what();
    }
    return "no error";
}

TEST(Problems, GoByFileInTheOrderOfReadingAndByPlaceWithin) {
    Problems problems;
    problems.add(Place{"z", 5, 1, 1, ""}, "one");
    problems.add(Place{"a", 9, 1, 1, ""}, "two");
    problems.add(Place{"z", 2, 1, 1, ""}, "three");
    problems.add(Place{"m", 1, 1, 1, ""}, "four");
    problems.add(Place{"a", 3, 1, 1, ""}, "five");
    EXPECT_EQ(thrown(problems), "z:2:1: three\nz:5:1: one\na:3:1: five\na:9:1: two\nm:1:1: four");
}

TEST(Problems, ThatRepeatAreSaidOnce) {
    Problems problems;
    for (int i = 0; i < 3; ++i) problems.add(Place{"a", 1, 2, 1, ""}, "same");
    EXPECT_EQ(thrown(problems), "a:1:2: same");
}

TEST(Problems, StopTheReadingWhenThereAreEnough) {
    Problems problems;
    std::size_t added = 0;
    try {
        for (; added < 10 * enough_problems; ++added) {
            problems.add(Place{"a", static_cast<int>(added) + 1, 1, 1, ""}, "wrong");
        }
        FAIL() << "no end";
    } catch (const InputError& error) {
        EXPECT_EQ(added + 1, enough_problems);
        EXPECT_EQ(error.problems().size(), enough_problems + 1);
        EXPECT_NE(std::string(error.what()).find("reading stopped after 100 problems"),
                  std::string::npos);
    }
}

TEST(Problem, DoesNotSendControlCharactersToTheTerminal) {
    const Problem problem{Place{"a\x1b[2J", 1, 1, 1, "x = \"\x1b[31m\xC2\x9B\""}, "b\x07", "c\x7F",
                          std::nullopt};
    const std::string text = describe(problem);
    for (const char c : {'\x1b', '\x07', '\x7F', '\x9B'}) {
        EXPECT_EQ(text.find(c), std::string::npos) << static_cast<int>(c);
    }
    EXPECT_EQ(printable("5 µm\tλ – é"), "5 µm λ – é");
}

TEST(NearestSpelling, FindsWhatWasMeant) {
    EXPECT_EQ(nearest_spelling("tantala", {"tantala-ibs", "titania-tantala-ibs"}), "tantala-ibs");
    EXPECT_EQ(nearest_spelling("radios", {"radius", "medium"}), "radius");
    EXPECT_FALSE(nearest_spelling("xyzzy", {"radius", "medium"}).has_value());
}

}  // namespace
