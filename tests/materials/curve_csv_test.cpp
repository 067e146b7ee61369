/// A measured curve of index or extinction from a CSV file beside the file that names it.

#include <gtest/gtest.h>
#include <unistd.h>

#include <filesystem>
#include <fstream>

#include "support/written_material.hpp"

namespace {

using namespace stillcoat;
using materials::Library;
using materials::PropertyId;
namespace fs = std::filesystem;

class CurveFile : public testing::Test {
  protected:
    void SetUp() override {
        folder_ = fs::temp_directory_path() / ("stillcoat_curve_" + std::to_string(getpid()));
        fs::create_directories(folder_);
    }
    void TearDown() override { fs::remove_all(folder_); }

    /// Problems of an override that names run.csv with this content, "line:column message".
    std::vector<std::string> read(const std::string& csv, const std::string& table) {
        std::ofstream(folder_ / "run.csv") << csv;
        std::vector<std::string> list;
        const core::Document document =
            core::parse_document(table, (folder_ / "design.toml").string());
        try {
            core::Problems problems;
            materials::override_properties(library_, "film", document.root, problems);
            problems.throw_if_any();
        } catch (const core::InputError& error) {
            for (const core::Problem& problem : error.problems()) {
                list.push_back(fs::path(problem.place.file).filename().string() + ":" +
                               std::to_string(problem.place.line) + ":" +
                               std::to_string(problem.place.column) + " " + problem.message);
            }
        }
        return list;
    }

    const std::string index_ =
        "refractive_index = { wavelength_csv = \"run.csv\", medium = \"air\", source = \"run 7\" }";
    fs::path folder_;
    Library library_ = test::written("");
};

using Words = std::vector<std::string>;

TEST_F(CurveFile, GivesIndexAndExtinctionWithinItsWavelengths) {
    const std::string csv =
        "\xEF\xBB\xBF# run 7\r\nwavelength_nm, refractive_index, extinction_coefficient\r\n"
        "900,2.10,3e-5\r\n\r\n1000,2.08,2e-5\r\n1100,2.07,1e-5\r\n";
    EXPECT_EQ(read(csv, index_ + "\nextinction_coefficient = { wavelength_csv = \"run.csv\", "
                                 "source = \"run 7\" }"),
              Words{});
    const auto index = materials::index_at(library_, "film", 1e-6, 295.0);
    ASSERT_TRUE(index.index.has_value()) << index.missing;
    EXPECT_NEAR(index.index->value, 2.08 * materials::index_of_air, 1e-12);
    EXPECT_GT(index.index->first, 0.0);  // normal dispersion: n grows with frequency
    const auto k = materials::evaluate(library_, "film", PropertyId::extinction_coefficient,
                                       {295.0, 1.1e-6, 1.0});
    EXPECT_NEAR(k.number.value_or(0.0), 1e-5, 1e-17);
    EXPECT_EQ(materials::index_at(library_, "film", 1.2e-6, 295.0).missing,
              "refractive index of film is known for 900–1100 nm only, not at 1200 nm");
    EXPECT_EQ(materials::sources_of(index.bases.at(0)), Words{"run 7"});
}

TEST_F(CurveFile, SaysWhereItCannotBeRead) {
    const std::string header = "wavelength_nm,refractive_index\n";
    EXPECT_EQ(read(header + "900,2.1\n1000,abc\n", index_),
              Words{"run.csv:3:6 \"abc\" is not a number for refractive_index"});
    EXPECT_EQ(read(header + "900,2.1\n\n900,2.1\n", index_),
              Words{"run.csv:4:1 wavelengths must increase from line to line"});
    EXPECT_EQ(read(header + "900,2.1\n1000, -2\n", index_),
              Words{"run.csv:3:7 refractive_index is -2"});
    EXPECT_EQ(read(header + "900,2.1,3\n", index_),
              Words{"run.csv:2:1 3 cells where the header has 2"});
    EXPECT_EQ(read(header + "900,nan\n1000,2\n", index_),
              Words{"run.csv:2:5 \"nan\" is not a number for refractive_index"});
    EXPECT_EQ(read("wavelength,refractive_index\n", index_),
              (Words{"run.csv:1:1 unknown column \"wavelength\"",
                     "run.csv:1:1 there is no column \"wavelength_nm\""}));
    EXPECT_EQ(
        read("wavelength_nm,extinction_coefficient\n", index_),
        (Words{"design.toml:1:20 the column extinction_coefficient of run.csv would not be read",
               "run.csv:1:1 there is no column \"refractive_index\""}));
    EXPECT_EQ(read(header + "900,2.1\n", index_).size(), 1u);
    EXPECT_EQ(read("", index_).size(), 1u);
    EXPECT_EQ(read("",
                   "refractive_index = { wavelength_csv = \"no.csv\", medium = \"air\", source = "
                   "\"a\" }")
                  .at(0)
                  .substr(0, 14),
              "design.toml:1:");
}

TEST_F(CurveFile, NeedsAMediumAndAnOpticalProperty) {
    const std::string csv = "wavelength_nm,refractive_index\n900,2.1\n1000,2\n";
    const auto list =
        read(csv, "refractive_index = { wavelength_csv = \"run.csv\", source = \"run 7\" }");
    ASSERT_EQ(list.size(), 1u);
    EXPECT_NE(list[0].find("medium is missing"), std::string::npos) << list[0];
    test::mentions(read(csv,
                        "refractive_index = { wavelength_csv = \"run.csv\", medium = "
                        "\"unstated\", source = \"run 7\" }"),
                   "medium in refractive_index of film is \"unstated\"");
    test::mentions(read(csv, "density = { wavelength_csv = \"run.csv\", source = \"run 7\" }"),
                   "wavelength_csv is no form of density");
}

TEST_F(CurveFile, DoesNotLoseAColumnThatNobodyReads) {
    test::mentions(read("wavelength_nm,refractive_index,extinction_coefficient\n900,2.1,1e-5\n"
                        "1000,2.0,1e-5\n",
                        index_),
                   "the column extinction_coefficient of run.csv would not be read");
}

TEST_F(CurveFile, RefusesACurveThatSwings) {
    const std::string jump =
        "wavelength_nm,refractive_index\n900,2.07\n1000,2.06\n1060,2.055\n1061,2.50\n1070,2.05\n"
        "1200,2.04\n";
    test::mentions(read(jump, index_),
                   "the curve through wavelength_csv in refractive_index of film");
}

}  // namespace
