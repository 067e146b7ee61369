#include "stillcoat/stack/design.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "stillcoat/core/constants.hpp"
#include "stillcoat/stack/mirror.hpp"
#include "support/written_design.hpp"

namespace {

using namespace stillcoat;
using test::mirror_text;
using test::quarter_wave_pairs;

TEST(Design, IsReadIntoSiWithItsDefaults) {
    const stack::Design design = test::read_design(mirror_text(quarter_wave_pairs)).design;
    EXPECT_DOUBLE_EQ(design.light.wavelength, 1064e-9);
    EXPECT_EQ(design.light.angle, 0.0);
    EXPECT_EQ(design.light.medium, "vacuum");
    EXPECT_DOUBLE_EQ(design.beam_radius, 0.06);
    EXPECT_EQ(design.temperature, 295.0);
    EXPECT_DOUBLE_EQ(design.coating.design_wavelength, 1064e-9);
    EXPECT_EQ(design.coating.reference_temperature, 295.0);
    EXPECT_EQ(design.coating.excess_loss, 1.0);
    EXPECT_EQ(design.coating.layers.size(), 20u);
    EXPECT_EQ(design.coating.layers[1].material, "silica-ibs");
    EXPECT_EQ(design.band.spot, (std::vector<double>{1.0, 10.0, 100.0, 1000.0}));
}

TEST(Design, BandIsEvenInLogarithmAndHoldsItsEnds) {
    const std::vector<double> list = stack::frequencies({0.01, 1000.0, 20, {}});
    ASSERT_EQ(list.size(), 101u);
    EXPECT_EQ(list.front(), 0.01);
    EXPECT_EQ(list.back(), 1000.0);
    EXPECT_EQ(list[20], 0.1);
    EXPECT_EQ(list[40], 1.0);
    for (std::size_t i = 1; i < list.size(); ++i)
        EXPECT_NEAR(list[i] / list[i - 1], std::pow(10.0, 0.05), 1e-10);
}

TEST(Design, KeepsTheDefaultSpotsInsideItsBand) {
    const auto design = test::read_design(mirror_text(quarter_wave_pairs,
                                                      "[band]\nfrom = \"5 Hz\"\nto = \"500 Hz\"\n"))
                            .design;
    EXPECT_EQ(design.band.spot, (std::vector<double>{10.0, 100.0}));
}

TEST(Design, QuotesPowersOfTenOfItsOwnBand) {
    const auto design = test::read_design(mirror_text(quarter_wave_pairs,
                                                      "[band]\nfrom = \"1 mHz\"\nto = \"1 Hz\"\n"))
                            .design;
    EXPECT_EQ(design.band.spot, (std::vector<double>{1e-3, 1e-2, 1e-1, 1.0}));
}

TEST(Design, TakesAWavelengthAtTheEndOfARangeInAnyUnit) {
    for (const char* wavelength : {"400 nm", "0.4 um", "0.0004 mm", "4000 angstrom"}) {
        const auto read = test::read_design(mirror_text(
            quarter_wave_pairs, "", std::string("wavelength = \"") + wavelength + "\""));
        stack::Ledger ledger;
        EXPECT_NO_THROW(stack::at_operating_point(read.design, read.library, ledger)) << wavelength;
    }
}

TEST(Design, NamesTheAlternativeThatReachesWhereTheDefaultDoesNot) {
    const auto read = test::read_design(
        mirror_text(quarter_wave_pairs, "", "wavelength = \"1550 nm\"", "titania-silica-glass"));
    stack::Ledger ledger;
    try {
        stack::at_operating_point(read.design, read.library, ledger);
        FAIL() << "the default index ends at 1100 nm";
    } catch (const core::InputError& error) {
        EXPECT_NE(std::string(error.what())
                      .find("[material.\"titania-silica-glass\"] refractive_index = { "
                            "alternative = \"silica-shape\" }"),
                  std::string::npos)
            << error.what();
    }
}

TEST(Design, ValuesReplaceThoseOfTheLibraryAndTheTwoFormsOfLossExcludeEachOther) {
    const auto both = test::read_design(mirror_text(
        quarter_wave_pairs,
        "[material.tantala-ibs]\nloss_angle_bulk = { value = 3e-4, source = \"x\" }\n"
        "loss_angle_shear = { value = 1e-4, uncertainty = \"10 %\", source = \"x\" }\n"
        "youngs_modulus = { value = \"120 GPa\", uncertainty = \"4 GPa\", source = \"x\" }\n"));
    const auto& film = both.library.at("tantala-ibs");
    EXPECT_EQ(film.properties.count(materials::PropertyId::loss_angle), 0u);
    const auto at = [&](materials::PropertyId id) {
        return materials::evaluate(both.library, "tantala-ibs", id, {295.0, 1064e-9, 7.0});
    };
    EXPECT_EQ(*at(materials::PropertyId::loss_angle_bulk).number, 3e-4);
    EXPECT_NEAR(at(materials::PropertyId::loss_angle_shear).width.value, 1e-5, 1e-18);
    EXPECT_EQ(*at(materials::PropertyId::youngs_modulus).number, 120e9);
    EXPECT_EQ(at(materials::PropertyId::youngs_modulus).width.value, 4e9);
    ASSERT_EQ(both.design.overrides.size(), 1u);
    EXPECT_EQ(both.design.overrides[0].material, "tantala-ibs");
    ASSERT_EQ(both.design.overrides[0].values.size(), 3u);
    EXPECT_EQ(both.design.overrides[0].values[0].key, "loss_angle_bulk");
    EXPECT_EQ(both.design.overrides[0].values[2].key, "youngs_modulus");
    // The library itself is untouched.
    EXPECT_EQ(test::project_library()
                  .at("tantala-ibs")
                  .properties.count(materials::PropertyId::loss_angle),
              1u);
}

TEST(Design, MayChooseANamedAlternative) {
    const auto chosen = test::read_design(
        mirror_text(quarter_wave_pairs,
                    "[material.tantala-ibs]\nloss_angle = { alternative = \"cavity-stack\" }\n"));
    EXPECT_DOUBLE_EQ(
        *materials::evaluate(chosen.library, "tantala-ibs", materials::PropertyId::loss_angle,
                             {295.0, 1064e-9, 100.0})
             .number,
        4e-4);
}

TEST(Mirror, QuarterWavesAreCountedAtTheDesignWavelengthWithTheIndexThere) {
    const auto read = test::read_design(
        mirror_text("[coating]\ndesign_wavelength = \"1200 nm\"\n" + quarter_wave_pairs));
    stack::Ledger ledger;
    const stack::Mirror mirror = stack::at_operating_point(read.design, read.library, ledger);
    const double n = materials::index_at(read.library, "tantala-ibs", 1200e-9, 295.0).index->value;
    EXPECT_NEAR(mirror.layers[0].thickness, 1200e-9 / (4.0 * n), 1e-18);
    const double here =
        materials::index_at(read.library, "tantala-ibs", 1064e-9, 295.0).index->value;
    EXPECT_NEAR(mirror.layers[0].quarter_waves, 4.0 * here * mirror.layers[0].thickness / 1064e-9,
                1e-12);
    EXPECT_EQ(mirror.optical_path_ratio, 1.0);
}

TEST(Mirror, ClampedFilmShrinksOnCoolingAsPlaneStressSays) {
    const auto read = test::read_design(
        mirror_text(quarter_wave_pairs, "", "wavelength = \"1550 nm\"", "silicon", "124 K"));
    stack::Ledger ledger;
    const stack::Mirror mirror = stack::at_operating_point(read.design, read.library, ledger);
    const double film =
        *materials::expansion_between(read.library, "tantala-ibs", 295.0, 124.0).number;
    const double base = *materials::expansion_between(read.library, "silicon", 295.0, 124.0).number;
    const double nu =
        *materials::evaluate(read.library, "tantala-ibs", materials::PropertyId::poisson_ratio,
                             {124.0, 1550e-9, 1.0})
             .number;
    const double strain = ((1.0 + nu) * film - 2.0 * nu * base) / (1.0 - nu);
    EXPECT_LT(strain, 0.0);
    EXPECT_NEAR(mirror.layers[0].thickness / mirror.layers[0].reference_thickness - 1.0, strain,
                1e-15);
    EXPECT_LT(mirror.optical_path_ratio, 1.0);
    EXPECT_FALSE(ledger.analogies().empty());
}

TEST(Mirror, InAMediumHasItsIndex) {
    const auto read = test::read_design(
        mirror_text(quarter_wave_pairs, "", "wavelength = \"1064 nm\"\nmedium = \"fused-silica\""));
    stack::Ledger ledger;
    const stack::Mirror mirror = stack::at_operating_point(read.design, read.library, ledger);
    EXPECT_NEAR(mirror.incident_index.value, 1.45003, 1e-5);
}

}  // namespace
