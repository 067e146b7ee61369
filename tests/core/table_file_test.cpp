#include "stillcoat/core/table_file.hpp"

#include <gtest/gtest.h>

#include <random>

namespace {

using namespace stillcoat::core;

std::string problems_of(const Problems& problems) {
    try {
        problems.throw_if_any();
    } catch (const InputError& error) {
        return error.what();
    }
    return "";
}

TEST(TableFile, IsReadWithQuotesBlanksAndEitherLineEnd) {
    Problems problems;
    const TableFile table = parse_table(
        "\xEF\xBB\xBFname, value_nm\r\n\"a, \"\"b\"\"\" ,1.5\r\n\n  c ,\n", "t.csv", problems);
    EXPECT_EQ(problems_of(problems), "");
    ASSERT_EQ(table.rows.size(), 2u);
    EXPECT_EQ(table.rows[0][0].text, "a, \"b\"");
    EXPECT_EQ(table.rows[0][1].text, "1.5");
    EXPECT_EQ(table.rows[1][0].text, "c");
    EXPECT_EQ(table.rows[1][1].text, "");
    EXPECT_EQ(table.rows[1][0].place.line, 4);
    EXPECT_EQ(table.rows[1][0].place.column, 3);
    EXPECT_EQ(table.column("value_nm"), 1u);
}

TEST(TableFile, ReportsRowsAndColumnsThatDoNotFit) {
    Problems problems;
    const TableFile table = parse_table("a,b,b,valeu\n1,2,3,4\n1,2\n", "t.csv", problems);
    EXPECT_FALSE(check_columns(table, {"a", "b", "c"}, {"value"}, problems));
    EXPECT_EQ(problems_of(problems),
              "t.csv:1:1: there is no column \"c\"\n"
              "     1 | a,b,b,valeu\n       | ^\n       needed: a, b, c\n"
              "t.csv:1:5: two columns are named \"b\"\n"
              "     1 | a,b,b,valeu\n       |     ^\n       keep one of the two\n"
              "t.csv:1:7: unknown column \"valeu\"\n"
              "     1 | a,b,b,valeu\n       |       ^^^^^\n       did you mean value?\n"
              "t.csv:3:1: 2 cells where the header has 4\n"
              "     3 | 1,2\n       | ^\n       quote a cell that holds a comma");
    EXPECT_THROW(parse_table("", "t.csv", problems), InputError);
    EXPECT_THROW(parse_table("a\n\"b", "t.csv", problems), InputError);
}

TEST(TableFile, RefusesWhatIsNoNumber) {
    for (const char* text : {"", "x", "1,5", "1e", "nan", "inf", "1e400", "0x10", "1 2", "--1"}) {
        Problems problems;
        EXPECT_FALSE(number_in({text, Place{}}, -9, any_value(), "thickness", problems)) << text;
        EXPECT_EQ(problems.size(), 1u) << text;
    }
    Problems problems;
    EXPECT_FALSE(number_in({"-1", Place{}}, -9, positive("m"), "thickness", problems));
    EXPECT_EQ(problems_of(problems), "thickness is -1\n       it must be greater than 0 m");
}

TEST(TableFile, ReadsBackEveryBitOfAShiftedNumber) {
    Problems problems;
    EXPECT_EQ(shifted_decimal(241.3e-9, -9), "241.3");
    EXPECT_EQ(shifted_decimal(2e-7, -9), "200");
    EXPECT_EQ(shifted_decimal(-5e-12, -9), "-0.005");
    EXPECT_EQ(*number_in({"241.3", Place{}}, -9, any_value(), "", problems), 241.3e-9);
    EXPECT_EQ(*number_in({"2.413E2", Place{}}, -9, any_value(), "", problems), 241.3e-9);
    constexpr unsigned seed = 20261201;
    SCOPED_TRACE(testing::Message() << "seed " << seed);
    std::mt19937_64 random(seed);
    std::uniform_real_distribution<double> exponent(-40.0, 40.0);
    for (int i = 0; i < 20'000; ++i) {
        const double value = std::pow(10.0, exponent(random)) * (i % 2 == 0 ? 1.0 : -1.0);
        const std::string text = shifted_decimal(value, -9);
        ASSERT_EQ(*number_in({text, Place{}}, -9, any_value(), "", problems), value) << text;
    }
}

}  // namespace
