#include "stillcoat/stack/layer_table.hpp"

#include <gtest/gtest.h>
#include <unistd.h>

#include <filesystem>
#include <fstream>

#include "support/project_library.hpp"

namespace {

using namespace stillcoat;
namespace fs = std::filesystem;

const std::string head =
    "[light]\nwavelength = \"1064 nm\"\n[beam]\nradius = \"1 mm\"\n"
    "[mirror]\nsubstrate = \"fused-silica\"\n[environment]\ntemperature = \"120 K\"\n"
    "[coating]\ndesign_wavelength = \"1397 nm\"\n";

class LayerTable : public ::testing::Test {
  protected:
    void SetUp() override { fs::create_directories(folder_); }
    void TearDown() override { fs::remove_all(folder_); }

    void write(const std::string& name, const std::string& content) const {
        std::ofstream(folder_ / name) << content;
    }
    stack::Design design(const std::string& coating) {
        library_ = test::project_library();
        return stack::read_design(
            core::parse_document(head + coating, (folder_ / "design.toml").string()), library_);
    }
    std::string refusal(const std::string& table) {
        write("t.csv", table);
        try {
            design("table = \"t.csv\"\n");
        } catch (const core::InputError& error) {
            std::string text = error.what();
            const std::string folder = folder_.string() + "/";
            for (std::size_t at; (at = text.find(folder)) != std::string::npos;) {
                text.erase(at, folder.size());
            }
            return text;
        }
        return "accepted";
    }

    materials::Library library_;
    fs::path folder_ =
        fs::temp_directory_path() / ("stillcoat-table-" + std::to_string(::getpid()));
};

const std::string mixed =
    "[[coating.block]]\nrepeat = 3\nlayers = [\n"
    "  { material = \"silica-ibs\", quarter_waves = 0.7 },\n"
    "  { repeat = 2, layers = [ { material = \"tantala-ibs\", thickness = \"101.37 nm\" },\n"
    "                           { material = \"silica-ibs\", quarter_waves = 1.1 } ] },\n]\n"
    "[[coating.block]]\nlayers = [ { material = \"hafnia-ibs\", quarter_waves = 2.0 } ]\n";

TEST_F(LayerTable, ReadsBackEveryThicknessToTheLastBit) {
    const stack::Design original = design(mixed);
    stack::Ledger ledger;
    const stack::Mirror coated = stack::as_coated(original, library_, ledger);
    write("run.csv", stack::layer_table(coated));
    const stack::Design again = design("table = \"run.csv\"\n");
    stack::Ledger unused;
    const stack::Mirror before = stack::at_operating_point(original, library_, unused);
    const stack::Mirror after = stack::at_operating_point(again, library_, unused);
    ASSERT_EQ(after.layers.size(), 16u);
    for (std::size_t j = 0; j < 16; ++j) {
        EXPECT_EQ(after.layers[j].material, before.layers[j].material);
        EXPECT_EQ(after.layers[j].reference_thickness, before.layers[j].reference_thickness);
        EXPECT_EQ(after.layers[j].thickness, before.layers[j].thickness);
    }
    EXPECT_NE(before.layers[0].thickness, before.layers[0].reference_thickness);
    EXPECT_EQ(coated.layers[0].thickness, before.layers[0].reference_thickness);
    EXPECT_NEAR(coated.layers[0].quarter_waves, 0.7, 1e-12);
}

TEST_F(LayerTable, WritesOutRepeatsInsideRepeats) {
    const std::vector<stack::LayerInput> layers = design(mixed).coating.layers;
    ASSERT_EQ(layers.size(), 16u);
    const std::vector<std::string> period{"silica-ibs", "tantala-ibs", "silica-ibs", "tantala-ibs",
                                          "silica-ibs"};
    for (std::size_t j = 0; j < 15; ++j) EXPECT_EQ(layers[j].material, period[j % 5]) << j;
    EXPECT_EQ(layers[15].material, "hafnia-ibs");
    std::string deep = "{ material = \"silica-ibs\", quarter_waves = 1 }";
    for (int i = 0; i < 15; ++i) deep = "{ repeat = 2, layers = [ " + deep + " ] }";
    EXPECT_THROW(design("[[coating.block]]\nlayers = [ " + deep + " ]\n"), core::InputError);
}

TEST_F(LayerTable, RefusesWhatItCannotReadAndSaysWhere) {
    EXPECT_EQ(
        refusal("material,thickness_nm\nsilica-ib,10\ntantala-ibs,-1\nsilica-ibs,ten\n"),
        "t.csv:2:1: unknown material \"silica-ib\"\n     2 | silica-ib,10\n       | ^^^^^^^^^\n"
        "       did you mean \"silica-ibs\"? `stillcoat materials` lists all\n"
        "t.csv:3:13: thickness_nm is -1\n     3 | tantala-ibs,-1\n       |             ^^\n"
        "       it must be from 1e-6 nm to 1e9 nm\n"
        "t.csv:4:12: \"ten\" is not a number for thickness_nm\n     4 | silica-ibs,ten\n"
        "       |            ^^^\n       a decimal number such as 241.3 is expected");
    EXPECT_EQ(
        refusal("material,thickness_nm\n"),
        "t.csv:1:1: the table has no layers\n     1 | material,thickness_nm\n       | ^^^^^^^^\n"
        "       one line for each layer");
    EXPECT_EQ(refusal("number,material,thickness_nm\n1,silica-ibs,10\n3,silica-ibs,10\n"),
              "t.csv:3:1: layer 2 is numbered \"3\"\n     3 | 3,silica-ibs,10\n       | ^\n"
              "       layers count from 1, the outermost; leave the column out if it does not "
              "matter");
    EXPECT_EQ(refusal("material,thickness\nsilica-ibs,10\n"),
              "t.csv:1:1: there is no column \"thickness_nm\"\n     1 | material,thickness\n"
              "       | ^^^^^^^^\n       needed: material, thickness_nm\n"
              "t.csv:1:10: unknown column \"thickness\"\n     1 | material,thickness\n"
              "       |          ^^^^^^^^^\n       did you mean thickness_nm?");
    EXPECT_THROW(design("table = \"none.csv\"\n"), core::InputError);
    write("t.csv", "material,thickness_nm\nsilica-ibs,10\n");
    EXPECT_THROW(design("table = \"t.csv\"\n" + mixed), core::InputError);
}

}  // namespace
