#include "stillcoat/assess/appraisal.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <numeric>

#include "stillcoat/core/constants.hpp"
#include "stillcoat/noise/coating_brownian.hpp"
#include "stillcoat/noise/substrate.hpp"
#include "support/written_design.hpp"

namespace {

using namespace stillcoat;
using test::mirror_text;
using test::quarter_wave_pairs;

assess::Appraisal appraised(const std::string& text) {
    const auto read = test::read_design(text);
    return assess::appraise(read.design, read.library);
}

const assess::NoiseTerm& term(const assess::Noise& noise, const std::string& key) {
    for (const auto* group : {&noise.terms, &noise.comparisons}) {
        for (const assess::NoiseTerm& item : *group) {
            if (item.key == key) return item;
        }
    }
    throw std::runtime_error("no term " + key);
}

TEST(Appraisal, TotalIsTheSumOfItsTermsAsPower) {
    const assess::Noise noise = appraised(mirror_text(quarter_wave_pairs)).faces[0].noise;
    ASSERT_TRUE(noise.complete);
    for (std::size_t i = 0; i < noise.frequencies.size(); ++i) {
        double sum = 0.0;
        for (const assess::NoiseTerm& item : noise.terms) sum += item.psd[i];
        EXPECT_NEAR(noise.total[i] / sum, 1.0, 1e-14);
    }
    const auto& brownian = term(noise, "coating_brownian");
    double layers = 0.0;
    for (const assess::LayerNoise& layer : noise.layers) layers += layer.psd;
    EXPECT_NEAR(layers / brownian.spot_psd[2], 1.0, 1e-13);
    EXPECT_EQ(noise.layer_frequency, 100.0);
}

/// A coating whose film has the substrate's elastic constants, with light kept at its face, is the
/// published closed form of Nakagawa et al., Phys. Rev. D 65, 102001 (2002), from the design file
/// to the result.
TEST(Appraisal, ReproducesTheClosedFormOfEqualElasticConstants) {
    const std::string same =
        "youngs_modulus = { value = \"72 GPa\", source = \"x\" }\npoisson_ratio = { value = 0.17, "
        "source = \"x\" }\n"
        "loss_angle = { value = 3e-4, source = \"x\" }\nphotoelastic_p12 = { value = 0, source = "
        "\"x\" }\n";
    const assess::Appraisal result = appraised(mirror_text(
        quarter_wave_pairs,
        "[material.tantala-ibs]\n" + same + "[material.silica-ibs]\n" + same +
            "[material.fused-silica]\nyoungs_modulus = { value = \"72 GPa\", source = \"x\" }\n"
            "poisson_ratio = { value = 0.17, source = \"x\" }\n"));
    const double expected = noise::equal_elastic_psd({72e9, 0.17}, result.mirror.coating_thickness,
                                                     3e-4, 0.06, 295.0, 100.0);
    EXPECT_NEAR(term(result.faces[0].noise, "coating_brownian_at_face").spot_psd[2] / expected, 1.0,
                1e-12);
}

TEST(Appraisal, LeavesOutATermWhoseInputIsUnknownAndSaysWhereToGiveIt) {
    const std::string gold =
        "[[coating.block]]\nlayers = [ { material = \"gold-film\", thickness = \"150 nm\" } ]\n";
    const assess::Noise noise = appraised(mirror_text(gold)).faces[0].noise;
    EXPECT_FALSE(noise.complete);
    const auto& thermal = term(noise, "thermal_coherent");
    EXPECT_TRUE(thermal.psd.empty());
    EXPECT_FALSE(thermal.in_total);
    EXPECT_EQ(thermal.missing,
              "dn/dT of gold-film unknown: no value recorded; give it in [material.\"gold-film\"]");
    // What can be known is in the total: the expansion without the index.
    EXPECT_TRUE(term(noise, "thermo_elastic_with_substrate").in_total);
    const assess::Noise given =
        appraised(mirror_text(gold,
                              "[material.gold-film]\nthermo_optic_coefficient = { value = "
                              "\"-1e-4 1/K\", source = \"x\" }\n"))
            .faces[0]
            .noise;
    EXPECT_TRUE(given.complete);
}

TEST(Appraisal, OffNormalGivesOpticsForBothPolarisations) {
    const assess::Appraisal result = appraised(mirror_text(
        quarter_wave_pairs, "",
        "wavelength = \"1064 nm\"\nangle = \"45 deg\"\npolarisation = \"unpolarised\""));
    ASSERT_EQ(result.faces.size(), 2u);
    EXPECT_GT(result.faces[0].response.reflectance, result.faces[1].response.reflectance);
    EXPECT_NEAR(
        mean_over_faces(result, &optics::Response::transmittance),
        0.5 * (result.faces[0].response.transmittance + result.faces[1].response.transmittance),
        1e-18);
}

/// The mirror of the other tests with its light at an angle.
assess::Appraisal tilted(double degrees, const std::string& polarisation) {
    return appraised(mirror_text(quarter_wave_pairs, "",
                                 "wavelength = \"1064 nm\"\nangle = \"" + std::to_string(degrees) +
                                     " deg\"\npolarisation = \"" + polarisation + "\""));
}

TEST(Appraisal, NoiseAtAVanishingAngleIsThatOfNormalIncidence) {
    const assess::Noise normal = appraised(mirror_text(quarter_wave_pairs)).faces[0].noise;
    for (const char* polarisation : {"s", "p"}) {
        const assess::Noise noise = tilted(1e-5, polarisation).faces[0].noise;
        ASSERT_EQ(noise.terms.size(), normal.terms.size());
        for (std::size_t i = 0; i < noise.terms.size(); ++i) {
            EXPECT_NEAR(noise.terms[i].spot_psd[2] / normal.terms[i].spot_psd[2], 1.0, 1e-11)
                << noise.terms[i].key << ' ' << polarisation;
        }
    }
}

TEST(Appraisal, NoiseAtAnAngleFollowsTheFootprint) {
    // Without penetration the coating's noise goes with the inverse area of the spot, cosθ; the
    // substrate's with the mean of 1/√(cos²φ/cos²θ + sin²φ) over the directions.
    constexpr double degrees = 50.0;
    const double cosine = std::cos(degrees * core::pi / 180.0);
    double mean = 0.0;
    constexpr int directions = 400;
    for (int i = 0; i < directions; ++i) {
        const double phi = core::pi * (i + 0.5) / directions;
        mean += 1.0 / std::hypot(std::cos(phi) / cosine, std::sin(phi)) / directions;
    }
    const assess::Noise normal = appraised(mirror_text(quarter_wave_pairs)).faces[0].noise;
    const assess::Appraisal both = tilted(degrees, "unpolarised");
    ASSERT_EQ(both.faces.size(), 2u);
    for (const assess::Face& face : both.faces) {
        const auto ratio = [&](const std::string& key) {
            return term(face.noise, key).spot_psd[2] / term(normal, key).spot_psd[2];
        };
        EXPECT_NEAR(ratio("coating_brownian_at_face"), cosine, 1e-12);
        EXPECT_NEAR(ratio("substrate_brownian"), mean, 1e-12);
    }
    // Light of the two polarisations enters the coating differently deep.
    EXPECT_GT(std::abs(term(both.faces[0].noise, "coating_brownian").spot_psd[2] /
                           term(both.faces[1].noise, "coating_brownian").spot_psd[2] -
                       1.0),
              1e-4);
    EXPECT_EQ(
        std::count_if(both.notes.begin(), both.notes.end(),
                      [](const std::string& note) { return note.rfind("at an angle", 0) == 0; }),
        1);
}

TEST(Appraisal, ExcessLossMultipliesTheFilmsAndIsNamed) {
    const assess::Appraisal plain = appraised(mirror_text(quarter_wave_pairs));
    const assess::Appraisal more =
        appraised(mirror_text("[coating]\nexcess_loss = 1.15\n" + quarter_wave_pairs));
    EXPECT_NEAR(term(more.faces[0].noise, "coating_brownian").psd[5] /
                    term(plain.faces[0].noise, "coating_brownian").psd[5],
                1.15, 1e-12);
    EXPECT_EQ(term(more.faces[0].noise, "substrate_brownian").psd[5],
              term(plain.faces[0].noise, "substrate_brownian").psd[5]);
    EXPECT_NE(std::find_if(more.notes.begin(), more.notes.end(),
                           [](const std::string& note) {
                               return note.find("excess_loss = 1.15") != std::string::npos;
                           }),
              more.notes.end());
}

TEST(Appraisal, WarnsOfASmallBeamAndOfAFiniteMirrorWithTheSizeOfTheError) {
    const auto text_of = [](const assess::Appraisal& result) {
        std::string all;
        for (const std::string& warning : result.warnings) all += warning + "\n";
        return all;
    };
    std::string small = mirror_text(quarter_wave_pairs);
    small.replace(small.find("6 cm"), 4, "100 um");
    EXPECT_NE(text_of(appraised(small)).find("coating is not thin against the beam (d/w = 0.03"),
              std::string::npos);
    std::string finite = mirror_text(quarter_wave_pairs);
    finite.replace(finite.find("\"fused-silica\""), 14,
                   "\"fused-silica\"\ndiameter = \"34 cm\"\nthickness = \"20 cm\"");
    EXPECT_NE(text_of(appraised(finite)).find("differs by -3"), std::string::npos)
        << text_of(appraised(finite));
    EXPECT_EQ(text_of(appraised(mirror_text(quarter_wave_pairs))), "");
}

TEST(Appraisal, SaysThatAbsorptionIsNotStatedInsteadOfCountingItAsZero) {
    const auto read = test::read_design(mirror_text(quarter_wave_pairs));
    materials::Library library = read.library;
    library.materials.at("tantala-ibs")
        .properties.erase(materials::PropertyId::extinction_coefficient);
    const assess::Appraisal result = assess::appraise(read.design, library);
    ASSERT_EQ(result.warnings.size(), 1u);
    EXPECT_EQ(result.warnings[0].rfind("absorption of tantala-ibs at 1064 nm is not stated", 0),
              0u);
}

TEST(Appraisal, WarnsWhereHeatCrossesTheWholeMirrorWithinAPeriod) {
    std::string cold =
        mirror_text(quarter_wave_pairs, "", "wavelength = \"1550 nm\"", "silicon", "20 K");
    cold.replace(cold.find("\"silicon\""), 9,
                 "\"silicon\"\ndiameter = \"26 cm\"\nthickness = \"14 cm\"");
    const assess::Appraisal result = appraised(cold);
    const auto found = std::find_if(
        result.warnings.begin(), result.warnings.end(), [](const std::string& warning) {
            return warning.find("heat crosses the whole mirror") != std::string::npos;
        });
    EXPECT_NE(found, result.warnings.end());
}

TEST(Appraisal, SaysOfAnAntireflectionCoatingThatItsNoiseIsThatOfTheReflectedRemainder) {
    const assess::Appraisal result =
        appraised(mirror_text("[[coating.block]]\nlayers = [ { material = "
                              "\"magnesium-fluoride-ibs\", quarter_waves = 1 } ]\n",
                              "", "wavelength = \"1064 nm\"", "sapphire"));
    ASSERT_LT(result.faces[0].response.reflectance, 0.01);
    EXPECT_EQ(result.warnings.at(0).rfind("only ", 0), 0u) << result.warnings[0];
}

/// The delay of a metal needs the dispersion of both n and k: against differences of its own phase.
TEST(Appraisal, GroupDelayOfGoldFollowsItsPhase) {
    const auto phase_at = [](double nanometres) {
        return appraised(mirror_text("[[coating.block]]\nlayers = [ { material = \"gold-film\", "
                                     "thickness = \"500 nm\" } ]\n",
                                     "", "wavelength = \"" + std::to_string(nanometres) + " nm\""))
            .faces[0]
            .phase.value();
    };
    const auto omega = [](double nanometres) {
        return 2.0 * core::pi * core::speed_of_light / (nanometres * 1e-9);
    };
    const double h = 0.5;
    const double difference =
        (phase_at(1270.0 - h).reflection_phase - phase_at(1270.0 + h).reflection_phase) /
        (omega(1270.0 - h) - omega(1270.0 + h));
    EXPECT_NEAR(phase_at(1270.0).group_delay / difference, 1.0, 1e-4);
}

TEST(Appraisal, OfASiliconMirrorHasNoExpansionNoiseWhereSiliconDoesNotExpand) {
    // The expansion of silicon crosses zero at 123.5 K in the library.
    const auto at = [](const std::string& temperature) {
        const assess::Appraisal result = appraised(mirror_text(
            quarter_wave_pairs, "", "wavelength = \"1550 nm\"", "silicon", temperature));
        return term(result.faces[0].noise, "bare_substrate_thermo_elastic").spot_psd[2];
    };
    EXPECT_LT(at("123.5 K"), 1e-12 * at("140 K"));
}

bool says(const std::vector<std::string>& list, const std::string& part) {
    return std::any_of(list.begin(), list.end(), [&](const std::string& text) {
        return text.find(part) != std::string::npos;
    });
}

TEST(Appraisal, WarnsOfTheLightThatMissesTheFaceAtAnyAngle) {
    // R = 1.5 w. At normal incidence exp(−2 (R/w)²) = 1.1 %; at 1 rad the integral of the oblique
    // Gaussian over the face was taken numerically: 13.45 %.
    const auto with_angle = [](const std::string& light) {
        std::string text = mirror_text(quarter_wave_pairs, "", light);
        const std::string body = "[mirror]\n";
        text.insert(text.find(body) + body.size(), "diameter = \"18 cm\"\nthickness = \"10 cm\"\n");
        return appraised(text);
    };
    const std::string straight = "wavelength = \"1064 nm\"";
    EXPECT_TRUE(says(with_angle(straight).warnings, "1.1 % of the light power misses"));
    EXPECT_TRUE(says(with_angle(straight + "\nangle = \"1 rad\"\npolarisation = \"s\"").warnings,
                     "13 % of the light power misses"));
}

TEST(Appraisal, SaysWhichValuesOfTheDesignChangeNothingOrStateNoRange) {
    const assess::Appraisal result = appraised(mirror_text(
        quarter_wave_pairs,
        "[material.hafnia-ibs]\ndensity = { value = \"9 g/cm3\", source = \"x\" }\n"
        "[material.tantala-ibs]\nyoungs_modulus = { value = \"130 GPa\", source = \"x\" }\n"));
    EXPECT_TRUE(says(result.warnings, "[material.\"hafnia-ibs\"] changes nothing"));
    EXPECT_FALSE(says(result.warnings, "[material.\"tantala-ibs\"] changes nothing"));
    EXPECT_TRUE(says(result.notes, "as they stand: Young's modulus of tantala-ibs"));
}

TEST(Appraisal, HasNoTotalWithoutATermAndNoPhaseWithoutLight) {
    const std::string same =
        "[[coating.block]]\nlayers = [ { material = \"fused-silica\", thickness = \"100 nm\" } ]\n";
    const std::string clear =
        "[material.fused-silica]\nextinction_coefficient = { value = 0, source = \"x\" }\n"
        "loss_angle = { value_at_1_Hz = 1e-9, exponent = 3, source = \"x\" }\n";
    const assess::Appraisal result =
        appraised(mirror_text(same, clear, "wavelength = \"1064 nm\"\nmedium = \"fused-silica\""));
    EXPECT_FALSE(result.faces[0].phase.has_value());
    const assess::Noise& noise = result.faces[0].noise;
    EXPECT_FALSE(noise.complete);
    EXPECT_EQ(term(noise, "coating_brownian").missing,
              "the face reflects nothing, so no phase is read");
    // The loss law exceeds 1 within the band, so no frequency of it is answered.
    EXPECT_NE(term(noise, "substrate_brownian").missing.find("comes out as"), std::string::npos);
    for (const assess::NoiseTerm& one : noise.terms) {
        EXPECT_EQ(one.in_total, !one.spot_psd.empty()) << one.key;
    }
}

}  // namespace
