/// Where data hold: tables end with their ends, losses at the frequencies of their measurement,
/// and no number leaves the limits of its property.

#include <gtest/gtest.h>

#include <cmath>

#include "support/written_material.hpp"

namespace {

using namespace stillcoat;
using materials::evaluate;
using materials::Library;
using materials::PropertyId;
using test::mentions;
using test::problems_of;
using test::provenance;
using test::warm;
using test::written;

const std::string falling_loss =
    "[loss_angle]\ntemperature_K = [100, 200, 300]\nvalues = [0.2, 0.1, 0.0]\n";

TEST(TemperatureTable, IsRefusedARangeBeyondItsEnds) {
    const auto list =
        problems_of(falling_loss + provenance + "range = { temperature_K = [100, 1000] }\n");
    ASSERT_EQ(list.size(), 1u);
    EXPECT_EQ(list[0],
              "temperature_K in range of [loss_angle] is [100, 1000], its table ends at 100 and "
              "300 | a little above the end: continued_to_K; further: a rule under beyond");
    mentions(problems_of(falling_loss + provenance + "range = { temperature_K = [50, 200] }\n"),
             "its table ends at 100 and 300");
    EXPECT_TRUE(problems_of(falling_loss + provenance + "range = { temperature_K = [120, 250] }\n")
                    .empty());
}

TEST(TemperatureTable, OfADesignWithoutRangeHoldsBetweenItsEnds) {
    Library library = written("");
    EXPECT_TRUE(test::problems_of_override(
                    library, falling_loss + "source = \"a test\"\nuncertainty = \"5 %\"\n")
                    .empty());
    const auto at = [&](double t) {
        return evaluate(library, "film", PropertyId::loss_angle, {t, 1e-6, 1.0});
    };
    EXPECT_NEAR(*at(250.0).number, 0.05, 1e-15);
    for (const double t : {99.0, 301.0}) {
        EXPECT_FALSE(at(t).number.has_value());
        EXPECT_NE(at(t).missing.find("its data hold for 100–300 K"), std::string::npos);
    }
}

TEST(TemperatureTable, IsContinuedOnlyWhereItsFileSaysSo) {
    const std::string table =
        "[thermal_expansion]\ntemperature_K = [100, 200, 300]\nvalues = [1, 2, 3]\n"
        "unit = \"1/K\"\n" +
        provenance + "range = { temperature_K = [100, 300] }\n";
    const Library library = written(table + "continued_to_K = 310\n");
    const auto at = [&](double t) {
        return evaluate(library, "film", PropertyId::thermal_expansion, {t, 1e-6, 1.0});
    };
    // The last piece of a straight line through the origin is that line.
    EXPECT_NEAR(*at(309.0).number, 3.09, 1e-12);
    EXPECT_EQ(at(309.0).analogy,
              "linear expansion of film at 309 K: its table is continued from 300 K");
    EXPECT_EQ(at(299.0).analogy, "");
    EXPECT_FALSE(at(311.0).number.has_value());
    EXPECT_NE(at(311.0).missing.find("continued to 310 K"), std::string::npos);
    mentions(problems_of(table + "continued_to_K = 316\n"), "at most 5 % above");
    mentions(problems_of(table + "continued_to_K = 300\n"), "at most 5 % above");
    mentions(problems_of("[density]\nvalue = 3\nunit = \"g/cm3\"\nat_temperature_K = 295\n" +
                         provenance + warm + "continued_to_K = 310\n"),
             "needs a table temperature_K");
}

TEST(WavelengthTable, DoesNotAnswerOutsideItsEnds) {
    const std::string table =
        "[refractive_index]\nwavelength_nm = [400, 500, 600]\nvalues = [2.2, 2.1, 2.05]\n";
    Library library = written("");
    EXPECT_TRUE(test::problems_of_override(library, table + "source = \"a test\"\n").empty());
    EXPECT_TRUE(materials::index_at(library, "film", 550e-9, 295.0).index.has_value());
    const auto outside = materials::index_at(library, "film", 1064e-9, 295.0);
    EXPECT_FALSE(outside.index.has_value());
    EXPECT_EQ(outside.missing,
              "refractive index of film is known for 400–600 nm only, not at 1064 nm");
    const auto as_value =
        evaluate(library, "film", PropertyId::refractive_index, {295.0, 1064e-9, 1.0});
    EXPECT_EQ(as_value.missing, outside.missing);
    mentions(test::problems_of_override(
                 library, table + "source = \"a test\"\nrange = { wavelength_nm = [400, 1100] }\n"),
             "wavelength_nm in range of refractive_index of film is [400, 1100], its table ends "
             "at 400 and 600");
    mentions(problems_of(table + "medium = \"vacuum\"\n" + provenance + warm +
                         "[refractive_index.rescaled_to]\nwavelength_nm = 1064\nvalue = 2.0\n"),
             "rescaled_to of [refractive_index] lies at 1064 nm, its data hold for 400–600 nm");
}

const std::string cold_part =
    "[loss_angle.cold]\ntemperature_K = [10, 100, 200]\nvalues = [1e-3, 5e-4, 3e-4]\n"
    "geometric_sd = 1.4\nsource = [\"cold\"]\nplace = \"p\"\nnature = \"measured\"\n"
    "status = \"seen\"\n";

TEST(ColdTable, MustJoinWhereBothSidesHold) {
    const std::string loss =
        "[loss_angle]\nvalue = 1e-4\nat_temperature_K = 295\n" + provenance + warm + cold_part;
    EXPECT_TRUE(problems_of(loss + "joins_K = [200, 295]\n").empty());
    mentions(problems_of(loss + "joins_K = [5, 295]\n"), "outside its table of 10–200 K");
    mentions(problems_of(loss + "joins_K = [220, 295]\n"), "outside its table of 10–200 K");
    mentions(problems_of(loss + "joins_K = [200, 200]\n"), "spans no temperature");
    mentions(problems_of(loss + "joins_K = [200, 250]\n"), "where the warm datum does not hold");
    mentions(problems_of(loss + "joins_K = [200, 295]\nrange = { temperature_K = [4, 200] }\n"),
             "its table ends at 10 and 200");
}

TEST(LossAngle, SaysOfEveryFormWhenTheFrequencyWasNotMeasured) {
    const std::string in_band =
        "range = { temperature_K = [283, 313], frequency_Hz = [50, 2e4] }\n";
    const std::string table =
        "[loss_angle]\ntemperature_K = [283, 313]\nvalues = [1e-4, 2e-4]\n" + provenance + in_band;
    const std::string scalar =
        "[loss_angle]\nvalue = 1e-4\nat_temperature_K = 295\n" + provenance + in_band;
    const std::string law =
        "[loss_angle]\nvalue_at_1_Hz = 1e-4\nexponent = 0.1\n" + provenance + in_band;
    for (const std::string& text : {table, scalar, law}) {
        const Library library = written(text);
        const auto at = [&](double f) {
            return evaluate(library, "film", PropertyId::loss_angle, {295.0, 1e-6, f});
        };
        EXPECT_TRUE(at(1.0).frequency_extrapolated) << text;
        EXPECT_FALSE(at(100.0).frequency_extrapolated) << text;
    }
    const Library single =
        written("[loss_angle]\nvalue = 1e-4\nat_temperature_K = 295\nat_frequency_Hz = 2800\n" +
                provenance + warm);
    const auto at = [&](double f) {
        return evaluate(single, "film", PropertyId::loss_angle, {295.0, 1e-6, f});
    };
    EXPECT_FALSE(at(2800.0).frequency_extrapolated);
    EXPECT_TRUE(at(100.0).frequency_extrapolated);
    ASSERT_TRUE(materials::frequencies_of(at(100.0).bases.at(0)).has_value());
    EXPECT_EQ(materials::frequencies_of(at(100.0).bases.at(0))->upper, 2800.0);
}

TEST(LossAngle, CountsTheFrequencyOfItsColdTableOnlyWhereThatIsUsed) {
    const Library library =
        written("[loss_angle]\nvalue_at_1_Hz = 1e-4\nexponent = 0.1\n" + provenance +
                "range = { temperature_K = [283, 313], frequency_Hz = [50, 100] }\n" + cold_part +
                "joins_K = [200, 295]\nat_frequency_Hz = 1000\n");
    const auto outside = [&](double t, double f) {
        return evaluate(library, "film", PropertyId::loss_angle, {t, 1e-6, f})
            .frequency_extrapolated;
    };
    EXPECT_FALSE(outside(100.0, 1000.0));  // the table alone
    EXPECT_TRUE(outside(100.0, 70.0));
    EXPECT_TRUE(outside(250.0, 1000.0));  // the datum is joined
    EXPECT_TRUE(outside(250.0, 70.0));
    EXPECT_FALSE(outside(300.0, 70.0));  // the datum alone
}

TEST(LossAngle, KeepsTheUncertaintyOfItsExponent) {
    const Library library = written(
        "[loss_angle]\nvalue_at_1_Hz = 1e-4\nexponent = 0.1\nexponent_uncertainty = 0.02\n" +
        provenance + warm);
    const auto& curve = library.at("film").properties.at(PropertyId::loss_angle).entry.curve;
    EXPECT_EQ(std::get<materials::PowerLaw>(curve).exponent_uncertainty, 0.02);
}

TEST(Evaluation, GivesNoNumberOutsideTheLimitsOfItsProperty) {
    const Library library =
        written("[loss_angle]\nvalue_at_1_Hz = 1e-9\nexponent = 2\n" + provenance + warm);
    const auto at = [&](double f) {
        return evaluate(library, "film", PropertyId::loss_angle, {295.0, 1e-6, f});
    };
    EXPECT_NEAR(*at(1e3).number, 1e-3, 1e-15);
    EXPECT_FALSE(at(1e6).number.has_value());
    EXPECT_EQ(at(1e6).missing,
              "loss angle of film at 295 K and 1e+06 Hz comes out as 1e+03; it must be from 0 to "
              "less than 1");
    EXPECT_FALSE(at(1e200).number.has_value());
    EXPECT_TRUE(at(1e6).bases.empty());
    // n² of this formula is negative at 1 µm.
    const Library imaginary = written(
        "[refractive_index]\nsellmeier_strength = [5]\nsellmeier_resonance_um = [1.1]\n"
        "medium = \"vacuum\"\n" +
        provenance + warm);
    const auto index = materials::index_at(imaginary, "film", 1e-6, 295.0);
    EXPECT_FALSE(index.index.has_value());
    EXPECT_NE(index.missing.find("comes out as"), std::string::npos) << index.missing;
}

TEST(Rule, SaysWhatItHoldsConstantInTemperatureAndInWavelength) {
    const Library library =
        written("[extinction_coefficient]\nvalue = 1e-5\n" + provenance +
                "range = { temperature_K = [283, 313], wavelength_nm = [1000, 1100] }\n"
                "[extinction_coefficient.beyond]\nrule = \"constant\"\ntemperature_K = [4, 283]\n"
                "wavelength_nm = [1100, 2000]\ngeometric_sd = 3\nsource = [\"rule\"]\n");
    const auto how = [&](double t, double wavelength) {
        return evaluate(library, "film", PropertyId::extinction_coefficient, {t, wavelength, 1.0})
            .analogy;
    };
    const std::string start = "extinction coefficient of film at ";
    EXPECT_EQ(how(100.0, 1.05e-6), start + "100 K: held constant from 283 K");
    EXPECT_EQ(how(295.0, 1.5e-6), start + "1500 nm: held constant");
    EXPECT_EQ(how(100.0, 1.5e-6), start + "100 K: held constant from 283 K and from 1100 nm");
}

TEST(DebyeShape, IsFiniteHoweverColdOrHotAndRefusesNonsense) {
    EXPECT_GE(materials::debye_shape(300.0, 1e300), 0.0);
    EXPECT_TRUE(std::isfinite(materials::debye_shape(300.0, 1e300)));
    EXPECT_NEAR(materials::debye_shape(1e300, 300.0), 1.0, 1e-15);
    EXPECT_THROW(materials::debye_shape(0.0, 300.0), core::DomainError);
    EXPECT_THROW(materials::debye_shape(300.0, std::nan("")), core::DomainError);
    // The pieces meet: at T = θ/60 the cube law, at T = 1000 θ the series.
    for (const double top : {60.0, 1e-3}) {
        const double below = materials::debye_shape(1.0, top * (1.0 - 1e-9));
        const double above = materials::debye_shape(1.0, top * (1.0 + 1e-9));
        EXPECT_NEAR(below / above, 1.0, 1e-8) << top;
    }
}

TEST(DebyeRule, IsRefusedAnImplausibleTemperature) {
    const auto with_theta = [](const std::string& theta) {
        return problems_of(
            "[specific_heat]\nvalue = 300\nunit = \"J/(kg K)\"\n"
            "at_temperature_K = 295\n" +
            provenance + warm +
            "[specific_heat.beyond]\nrule = \"debye\"\ndebye_temperature_K = " + theta +
            "\ntemperature_K = [4, 283]\ngeometric_sd = 1.2\n"
            "source = [\"rule\"]\n");
    };
    EXPECT_TRUE(with_theta("470").empty());
    mentions(with_theta("1e300"), "it must be from 10 K to 3000 K");
    mentions(with_theta("1e-9"), "it must be from 10 K to 3000 K");
}

}  // namespace
