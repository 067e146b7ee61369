/// The whole part and the losses of the coated face, from the design file to the result.

#include "stillcoat/assess/part_view.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <string>

#include "stillcoat/assess/appraisal.hpp"
#include "stillcoat/core/constants.hpp"
#include "support/written_design.hpp"

namespace {

using namespace stillcoat;

const std::string clear_substrate =
    "[material.fused-silica]\nextinction_coefficient = { value = 0, source = \"x\" }\n";
const std::string matched =
    "[[coating.block]]\nlayers = [ { material = \"fused-silica\", thickness = \"100 nm\" } ]\n";
const std::string grey_layers =
    "[material.tantala-ibs]\nextinction_coefficient = { value = 2e-3, source = \"x\" }\n"
    "[material.silica-ibs]\nextinction_coefficient = { value = 1e-3, source = \"x\" }\n"
    "[material.fused-silica]\nextinction_coefficient = { value = 1e-6, source = \"x\" }\n";
const std::string rear_layers =
    "[[rear_face.block]]\nlayers = [ { material = \"silica-ibs\", quarter_waves = 1.3 }, { "
    "material = \"tantala-ibs\", quarter_waves = 0.6 } ]\n";

std::string part_text(const std::string& coating, const std::string& rest,
                      const std::string& light = "", const std::string& mirror = "") {
    return "[light]\nwavelength = \"1064 nm\"\n" + light +
           "[beam]\nradius = \"1 mm\"\n[mirror]\nsubstrate = \"fused-silica\"\n"
           "diameter = \"5 cm\"\nthickness = \"6 mm\"\n" +
           mirror + "[environment]\ntemperature = \"295 K\"\n" + coating + rest;
}

assess::Appraisal appraised(const std::string& text) {
    const auto read = test::read_design(text);
    return assess::appraise(read.design, read.library);
}

bool says(const std::vector<std::string>& list, const std::string& words) {
    for (const std::string& text : list) {
        if (text.find(words) != std::string::npos) return true;
    }
    return false;
}

const optics::PartResponse& part(const assess::Appraisal& result, std::size_t face = 0) {
    return result.part.at(face).response.value();
}

TEST(WholePart, IsNotThereWithoutARearFace) {
    EXPECT_TRUE(appraised(part_text(test::quarter_wave_pairs, "")).part.empty());
}

TEST(WholePart, BarePlateFollowsTheGeometricSeries) {
    for (const char* from : {"front", "rear"}) {
        for (const double degrees : {0.0, 40.0}) {
            const std::string light = std::string("from = \"") + from + "\"\nangle = \"" +
                                      std::to_string(degrees) +
                                      " deg\"\npolarisation = \"unpolarised\"\n";
            const assess::Appraisal result =
                appraised(part_text(matched, "[rear_face]\n" + clear_substrate, light));
            ASSERT_EQ(result.part.size(), degrees == 0.0 ? 1u : 2u);
            const double n = result.mirror.substrate_optical.index.value;
            const double outside = degrees * core::pi / 180.0;
            const double inside = std::asin(std::sin(outside) / n);
            for (const assess::PartView& view : result.part) {
                const bool s = view.polarisation == optics::Polarisation::s;
                const double a = s ? std::cos(outside) : std::cos(inside);
                const double b = s ? n * std::cos(inside) : n * std::cos(outside);
                const double r = std::pow((a - b) / (a + b), 2);
                ASSERT_TRUE(view.response) << view.missing;
                EXPECT_NEAR(view.response->reflectance, 2.0 * r / (1.0 + r), 1e-14);
                EXPECT_NEAR(view.response->transmittance, (1.0 - r) / (1.0 + r), 1e-14);
                EXPECT_EQ(view.response->absorptance, 0.0);
                EXPECT_EQ(view.absorptance_missing, "");
            }
        }
    }
}

TEST(WholePart, BarePlateOfAmplitudesFollowsAirysFormula) {
    const assess::Appraisal result =
        appraised(part_text(matched, "[rear_face]\npasses = \"amplitudes\"\n" + clear_substrate));
    const double n = result.mirror.substrate_optical.index.value;
    const double r = std::pow((n - 1.0) / (n + 1.0), 2);
    // The matched layer is as much plate as the rest.
    const double phase = 2.0 * core::pi * n * (6e-3 + result.mirror.layers[0].thickness) / 1064e-9;
    const double f = 4.0 * r / std::pow(1.0 - r, 2);
    const double sine = std::sin(phase);
    // The phase is 5e4 rad: its rounding is worth 1e-11.
    EXPECT_NEAR(part(result).transmittance, 1.0 / (1.0 + f * sine * sine), 1e-10);
}

/// T is the same from both sides for any part (reciprocity); R and A are not when layers absorb.
TEST(WholePart, TransmitsTheSameFromBothSides) {
    for (const char* passes : {"intensities", "amplitudes"}) {
        for (const char* angle : {"0 deg", "35 deg"}) {
            const std::string rest = std::string("[rear_face]\npasses = \"") + passes + "\"\n" +
                                     rear_layers + grey_layers;
            const std::string light =
                std::string("angle = \"") + angle + "\"\npolarisation = \"unpolarised\"\n";
            const assess::Appraisal front =
                appraised(part_text(test::quarter_wave_pairs, rest, light));
            const assess::Appraisal rear =
                appraised(part_text(test::quarter_wave_pairs, rest, light + "from = \"rear\"\n"));
            ASSERT_EQ(front.part.size(), rear.part.size());
            for (std::size_t i = 0; i < front.part.size(); ++i) {
                const optics::PartResponse& a = part(front, i);
                const optics::PartResponse& b = part(rear, i);
                // The phase of the plate is 5e4 rad in the sum of amplitudes.
                EXPECT_NEAR(a.transmittance / b.transmittance, 1.0, 1e-10) << passes << angle;
                EXPECT_NEAR(a.reflectance + a.transmittance + a.absorptance, 1.0, 1e-10);
                EXPECT_NEAR(b.reflectance + b.transmittance + b.absorptance, 1.0, 1e-10);
                EXPECT_GT(std::abs(a.absorptance - b.absorptance), 1e-4);
                EXPECT_GT(a.front_absorptance, 0.0);
            }
        }
    }
}

/// Shares are named by the faces: a clear rear coating absorbs nothing from either side.
TEST(WholePart, NamesAbsorptionByTheFacesAlsoForLightFromBehind) {
    const std::string rest =
        "[[rear_face.block]]\nlayers = [ { material = \"fused-silica\", thickness = \"10 nm\" }, { "
        "material = \"fused-silica\", thickness = \"20 nm\" } ]\n" +
        clear_substrate +
        "[material.tantala-ibs]\nextinction_coefficient = { value = 2e-3, source = \"x\" }\n"
        "[material.silica-ibs]\nextinction_coefficient = { value = 0, source = \"x\" }\n";
    for (const char* from : {"front", "rear"}) {
        const assess::Appraisal result = appraised(
            part_text(test::quarter_wave_pairs, rest, std::string("from = \"") + from + "\"\n"));
        const optics::PartResponse& r = part(result);
        EXPECT_EQ(r.rear_absorptance, 0.0) << from;
        EXPECT_GT(r.front_absorptance, 1e-5) << from;
        ASSERT_EQ(r.front_layer_absorptance.size(), 20u);
        ASSERT_EQ(r.rear_layer_absorptance.size(), 2u);
        // Tantala comes first in each pair of the design, whatever side the light is on.
        EXPECT_GT(r.front_layer_absorptance[0], 0.0) << from;
        EXPECT_EQ(r.front_layer_absorptance[1], 0.0) << from;
    }
}

TEST(WholePart, OfASubstrateOfUnknownAbsorptionHasNoAbsorptance) {
    const auto read = test::read_design(part_text(test::quarter_wave_pairs, "[rear_face]\n"));
    stack::Ledger ledger;
    stack::Mirror mirror = stack::at_operating_point(read.design, read.library, ledger);
    mirror.substrate_optical.extinction_known = false;
    mirror.substrate_optical.extinction = numerics::Jet<double>(0.0);
    const assess::PartView view = assess::part_view(read.design, mirror, optics::Polarisation::s);
    EXPECT_TRUE(view.response);
    EXPECT_EQ(view.absorptance_missing, "absorption of fused-silica at 1064 nm is not stated");
    EXPECT_TRUE(says(assess::part_warnings(read.design, mirror, {view}),
                     "give absorption_coefficient in [material.\"fused-silica\"]"));
}

TEST(WholePart, ThatOpticsRefusesIsAReasonAndNotAnEnd) {
    // Beyond the critical angle of the rear medium no ray comes from behind.
    const assess::Appraisal result = appraised(
        part_text(test::quarter_wave_pairs, "[rear_face]\n",
                  "medium = \"fused-silica\"\nangle = \"60 deg\"\npolarisation = \"s\"\nfrom = "
                  "\"rear\"\n"));
    ASSERT_EQ(result.part.size(), 1u);
    EXPECT_FALSE(result.part[0].response);
    EXPECT_NE(result.part[0].missing.find("angle in the rear medium"), std::string::npos);
    EXPECT_TRUE(says(result.warnings, "the whole part is not computed"));
    EXPECT_GT(result.faces[0].response.reflectance, 0.0);
}

TEST(WholePart, SaysThatWedgeIsIgnored) {
    EXPECT_TRUE(says(appraised(part_text(test::quarter_wave_pairs, "[rear_face]\n")).notes,
                     "wedge is ignored"));
}

TEST(Scatter, IsNotZeroButAbsentWhenNothingIsStated) {
    const assess::FaceLosses losses =
        appraised(part_text(test::quarter_wave_pairs, "")).faces[0].losses;
    EXPECT_FALSE(losses.scatter);
    EXPECT_EQ(losses.scatter_missing, "not stated");
    EXPECT_FALSE(losses.total);
    EXPECT_FALSE(losses.pair);
    EXPECT_TRUE(losses.pair_without_scatter);
}

TEST(Scatter, FollowsTheLawOfSmallRoughness) {
    for (const char* angle : {"0 deg", "50 deg"}) {
        const assess::Appraisal result = appraised(
            part_text(test::quarter_wave_pairs, "",
                      std::string("angle = \"") + angle + "\"\npolarisation = \"s\"\n",
                      "roughness = { rms = \"0.2 nm\", band = [\"1 1/mm\", \"2000 1/mm\"] }\n"));
        const assess::Face& face = result.faces[0];
        const double cosine = std::cos(std::stod(angle) * core::pi / 180.0);
        const double law =
            face.response.reflectance * std::pow(4.0 * core::pi * 0.2e-9 * cosine / 1064e-9, 2);
        ASSERT_TRUE(face.losses.scatter);
        // The exact form is less by x²/2 = 3e-6 of it.
        EXPECT_NEAR(*face.losses.scatter / law, 1.0, 5e-6);
        EXPECT_FALSE(face.losses.scatter_is_lower_limit);
        EXPECT_NEAR(*face.losses.total / (face.response.loss + law), 1.0, 1e-6);
        EXPECT_EQ(face.losses.pair.has_value(), cosine == 1.0);
    }
}

TEST(Scatter, OfABandThatEndsEarlyIsALowerBoundAndSaysSo) {
    // Light of 1064 nm at normal incidence scatters from relief up to 939.8 per mm.
    for (const auto& [to, narrow] : {std::pair("939 1/mm", true), std::pair("940 1/mm", false)}) {
        const assess::Appraisal result =
            appraised(part_text(test::quarter_wave_pairs, "", "",
                                "roughness = { rms = \"0.1 nm\", band = [\"1 1/mm\", \"" +
                                    std::string(to) + "\"] }\n"));
        EXPECT_EQ(result.faces[0].losses.scatter_is_lower_limit, narrow) << to;
        EXPECT_EQ(says(result.warnings, "the scatter is a lower bound"), narrow) << to;
    }
}

TEST(Scatter, OfARoughnessBeyondTheLawIsMissingWithItsReason) {
    const assess::Appraisal result = appraised(
        part_text(test::quarter_wave_pairs, "", "",
                  "roughness = { rms = \"100 nm\", band = [\"1 1/mm\", \"1000 1/mm\"] }\n"));
    EXPECT_FALSE(result.faces[0].losses.scatter);
    EXPECT_FALSE(result.faces[0].losses.total);
    EXPECT_TRUE(says(result.warnings, "scatter is not computed"));
}

TEST(Scatter, OfMoreThanIsReflectedIsNotAddedUp) {
    const assess::Appraisal result = appraised(part_text(
        matched, clear_substrate, "", "scatter = { value = \"50 %\", source = \"x\" }\n"));
    EXPECT_FALSE(result.faces[0].losses.total);
    EXPECT_TRUE(says(result.warnings, "is more than the coated face reflects"));
}

TEST(Finesse, OfTwoSuchMirrorsFollowsTheClosedForm) {
    const assess::Appraisal result = appraised(part_text(
        test::quarter_wave_pairs, "", "", "scatter = { value = \"30 ppm\", source = \"x\" }\n"));
    const assess::Face& face = result.faces[0];
    const double loss = face.response.transmittance + face.response.absorptance + 30e-6;
    EXPECT_NEAR(*face.losses.total / loss, 1.0, 1e-14);
    ASSERT_TRUE(face.losses.pair);
    const double kept = 1.0 - loss;
    EXPECT_NEAR(face.losses.pair->round_trip_loss / (1.0 - kept * kept), 1.0, 1e-12);
    // Equal mirrors keep the amplitude R in a round trip.
    const double usual = core::pi * std::sqrt(kept) / loss;
    EXPECT_NEAR(*face.losses.pair->finesse / (usual * (1.0 - loss * loss / 24.0 / kept)), 1.0,
                1e-10);
    const double without = face.response.loss;
    const double exact = core::pi / (2.0 * std::asin(0.5 * without / std::sqrt(1.0 - without)));
    EXPECT_NEAR(*face.losses.pair_without_scatter->finesse / exact, 1.0, 1e-12);
    EXPECT_GT(exact, *face.losses.pair->finesse);
}

TEST(Finesse, OfAFaceThatHardlyReflectsIsNotDefined) {
    const assess::FaceLosses losses =
        appraised(part_text(matched, clear_substrate)).faces[0].losses;
    ASSERT_TRUE(losses.pair_without_scatter);
    EXPECT_FALSE(losses.pair_without_scatter->finesse);
    EXPECT_GT(losses.pair_without_scatter->round_trip_loss, 0.99);
}

}  // namespace
