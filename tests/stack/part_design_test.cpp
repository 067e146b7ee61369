/// What a design file says of the whole part and of the coated face's relief.

#include <gtest/gtest.h>

#include <string>
#include <vector>

#include "stillcoat/stack/design.hpp"
#include "stillcoat/stack/mirror.hpp"
#include "support/written_design.hpp"
#include "support/written_material.hpp"

namespace {

using namespace stillcoat;
using test::mentions;

const std::string plate = "diameter = \"5 cm\"\nthickness = \"6 mm\"\n";

/// A design whose [mirror] holds `mirror`, whose [light] holds `light`; `rest` comes last.
std::string part_text(const std::string& mirror, const std::string& rest,
                      const std::string& light = "", const std::string& temperature = "295 K") {
    return "[light]\nwavelength = \"1064 nm\"\n" + light +
           "[beam]\nradius = \"1 mm\"\n[mirror]\nsubstrate = \"fused-silica\"\n" + mirror +
           "[environment]\ntemperature = \"" + temperature + "\"\n" + test::quarter_wave_pairs +
           rest;
}

std::vector<std::string> problems_of_design(const std::string& text) {
    return test::messages([&](core::Problems&) { test::read_design(text); });
}

TEST(PartKeys, AreAbsentWithDefaultsWhereNothingIsStated) {
    const stack::Design design = test::read_design(part_text("", "")).design;
    EXPECT_FALSE(design.light.from_rear);
    EXPECT_FALSE(design.mirror.roughness);
    EXPECT_FALSE(design.mirror.scatter);
    EXPECT_FALSE(design.rear_face);
}

TEST(PartKeys, AreReadIntoSi) {
    const stack::Design design =
        test::read_design(
            part_text(plate + "roughness = { rms = \"0.1 nm\", band = [\"1 1/mm\", \"1 1/um\"] }\n",
                      "[rear_face]\nmedium = \"air\"\npasses = \"amplitudes\"\n"
                      "[[rear_face.block]]\nrepeat = 2\nlayers = [ { material = \"silica-ibs\", "
                      "quarter_waves = 1 }, { material = \"tantala-ibs\", thickness = \"90 nm\" } "
                      "]\n",
                      "from = \"rear\"\n"))
            .design;
    EXPECT_TRUE(design.light.from_rear);
    ASSERT_TRUE(design.mirror.roughness);
    EXPECT_DOUBLE_EQ(design.mirror.roughness->rms, 1e-10);
    EXPECT_DOUBLE_EQ(design.mirror.roughness->from, 1e3);
    EXPECT_DOUBLE_EQ(design.mirror.roughness->to, 1e6);
    ASSERT_TRUE(design.rear_face);
    EXPECT_EQ(design.rear_face->medium, "air");
    EXPECT_EQ(design.rear_face->passes, stack::Passes::amplitudes);
    ASSERT_EQ(design.rear_face->layers.size(), 4u);
    EXPECT_EQ(design.rear_face->layers[0].material, "silica-ibs");
    EXPECT_EQ(design.coating.layers.size(), 20u);
}

TEST(PartKeys, EmptyRearFaceIsABareOneInVacuumWhosePassesAddAsIntensities) {
    const stack::Design design = test::read_design(part_text(plate, "[rear_face]\n")).design;
    ASSERT_TRUE(design.rear_face);
    EXPECT_EQ(design.rear_face->medium, "vacuum");
    EXPECT_EQ(design.rear_face->passes, stack::Passes::intensities);
    EXPECT_TRUE(design.rear_face->layers.empty());
}

TEST(PartKeys, StatedScatterKeepsItsSource) {
    const stack::Design design =
        test::read_design(
            part_text("scatter = { value = \"3 ppm\", source = \"sphere, 2 mm spot\" }\n", ""))
            .design;
    ASSERT_TRUE(design.mirror.scatter);
    EXPECT_DOUBLE_EQ(design.mirror.scatter->value, 3e-6);
    EXPECT_EQ(design.mirror.scatter->source, "sphere, 2 mm spot");
}

TEST(PartKeys, AreRefusedWhereTheySayTooLittle) {
    mentions(problems_of_design(part_text("roughness = { rms = \"0.1 nm\" }\n", "")),
             "band is missing in roughness of [mirror]");
    mentions(
        problems_of_design(part_text("roughness = { band = [\"1 1/mm\", \"100 1/mm\"] }\n", "")),
        "rms is missing in roughness of [mirror]");
    mentions(problems_of_design(part_text("scatter = { value = \"3 ppm\" }\n", "")),
             "source is missing in scatter of [mirror]");
    mentions(problems_of_design(part_text("scatter = { source = \"x\" }\n", "")),
             "value is missing in scatter of [mirror]");
    mentions(problems_of_design(part_text("", "[rear_face]\n")),
             "[rear_face] stands behind a half-space");
    mentions(problems_of_design(part_text(plate, "", "from = \"rear\"\n")),
             "light from the rear needs [rear_face]");
}

TEST(PartKeys, AreRefusedWhereTheySayWhatCannotBe) {
    for (const char* band : {"[\"10 1/mm\", \"1 1/mm\"]", "[\"1 1/mm\"]",
                             "[\"1 1/mm\", \"1 1/mm\"]", "[\"1 1/mm\", \"2 1/mm\", \"3 1/mm\"]"}) {
        mentions(problems_of_design(part_text(
                     "roughness = { rms = \"0.1 nm\", band = " + std::string(band) + " }\n", "")),
                 "needs two spatial frequencies, the lower one first");
    }
    mentions(problems_of_design(part_text(
                 "roughness = { rms = \"0.1 nm\", band = [\"1 K\", \"100 1/mm\"] }\n", "")),
             "\"K\" is not a unit of spatial frequency");
    mentions(problems_of_design(part_text(
                 "roughness = { rms = \"0.1 nm\", band = [\"1 rad/mm\", \"100 1/mm\"] }\n", "")),
             "rad/mm");
    mentions(problems_of_design(part_text("scatter = { value = \"200 %\", source = \"x\" }\n", "")),
             "value in scatter of [mirror] is \"200 %\"");
    mentions(problems_of_design(part_text(plate, "[rear_face]\nmedium = \"vacum\"\n")),
             "unknown material \"vacum\"");
    mentions(problems_of_design(part_text(plate, "[rear_face]\nblock = []\n")),
             "add [[rear_face.block]] with layers");
    mentions(problems_of_design(part_text(plate,
                                          "[[rear_face.block]]\nlayers = [ { material = "
                                          "\"silica-ibs\" } ]\n")),
             "layer 1 of [[rear_face.block]] 1");
    mentions(problems_of_design(part_text(plate, "[rear_face]\nwedge = \"1 deg\"\n")),
             "unknown key wedge in [rear_face]");
}

/// The same layer on either face has the same thickness, counted and cooled alike.
TEST(RearLayers, AreCountedAndCooledLikeThoseOfTheCoating) {
    const auto read = test::read_design(
        part_text(plate,
                  "[[rear_face.block]]\nlayers = [ { material = \"silica-ibs\", quarter_waves = 1 "
                  "}, { material = \"tantala-ibs\", quarter_waves = 1 } ]\n",
                  "", "285 K"));
    stack::Ledger ledger;
    const stack::Mirror mirror = stack::at_operating_point(read.design, read.library, ledger);
    ASSERT_TRUE(mirror.rear);
    EXPECT_EQ(mirror.rear->plate_thickness, 6e-3);
    EXPECT_EQ(mirror.rear->medium_index.value, 1.0);
    ASSERT_EQ(mirror.rear->layers.size(), 2u);
    EXPECT_EQ(mirror.rear->layers[0].thickness, mirror.layers[1].thickness);
    EXPECT_EQ(mirror.rear->layers[1].thickness, mirror.layers[0].thickness);
    EXPECT_NE(mirror.rear->layers[1].thickness, mirror.rear->layers[1].reference_thickness);
    // The rear face is no part of the coating.
    const auto front = test::read_design(part_text(plate, "", "", "285 K"));
    const stack::Mirror alone = stack::at_operating_point(front.design, front.library, ledger);
    EXPECT_EQ(mirror.coating_thickness, alone.coating_thickness);
    EXPECT_EQ(mirror.optical_path_ratio, alone.optical_path_ratio);
    EXPECT_FALSE(alone.rear);
}

TEST(RearLayers, ReportMaterialsWhoseIndexIsUnknownThere) {
    const auto read = test::read_design(part_text(plate, "[rear_face]\nmedium = \"gold-film\"\n"));
    stack::Ledger ledger;
    try {
        stack::at_operating_point(read.design, read.library, ledger);
        FAIL() << "gold absorbs";
    } catch (const core::InputError& error) {
        EXPECT_NE(std::string(error.what()).find("an absorbing rear medium is refused"),
                  std::string::npos)
            << error.what();
    }
}

}  // namespace
