#include "stillcoat/materials/evaluation.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "stillcoat/core/constants.hpp"

namespace {

using namespace stillcoat;
using materials::Conditions;
using materials::Library;
using materials::PropertyId;

/// A library of one material, written as a user would.
Library with(const std::string& properties, const std::string& name = "film") {
    Library library;
    library.references["here"] = {"a test", "", "text"};
    core::Problems problems;
    const std::string text =
        "name = \"" + name + "\"\ntitle = \"test\"\nform = \"film\"\n" + properties;
    auto material =
        materials::read_material(core::parse_document(text, name + ".toml"), library, problems);
    problems.throw_if_any();
    library.materials[name] = *material;
    return library;
}

const std::string provenance =
    "uncertainty = \"not stated\"\nsource = [\"here\"]\nplace = \"p\"\nmeasured_at = \"m\"\n"
    "nature = \"measured\"\nstatus = \"seen\"\n";

double at(const Library& library, PropertyId id, Conditions conditions) {
    const auto value = materials::evaluate(library, "film", id, conditions);
    EXPECT_TRUE(value.number.has_value()) << value.missing;
    return value.number.value_or(std::nan(""));
}

TEST(Evaluation, InterpolatesLogLogWithinOneSignAndLinearlyAcrossZero) {
    const Library library = with(
        "[thermal_expansion]\ntemperature_K = [10, 20, 40]\nvalues = [1, 8, -8]\n"
        "unit = \"1/K\"\n" +
        provenance + "range = { temperature_K = [10, 40] }\n");
    // A cube law is a straight line in log-log.
    EXPECT_NEAR(at(library, PropertyId::thermal_expansion, {15.0, 1e-6, 1.0}), std::pow(1.5, 3),
                1e-12);
    EXPECT_NEAR(at(library, PropertyId::thermal_expansion, {30.0, 1e-6, 1.0}), 0.0, 1e-12);
    EXPECT_NEAR(at(library, PropertyId::thermal_expansion, {20.0, 1e-6, 1.0}), 8.0, 1e-12);
}

TEST(Evaluation, OutsideTheRangeGivesAReasonAndNoNumber) {
    const Library library = with("[youngs_modulus]\nvalue = 70\nunit = \"GPa\"\n" + provenance +
                                 "range = { temperature_K = [283, 313] }\n");
    const auto value =
        materials::evaluate(library, "film", PropertyId::youngs_modulus, {124.0, 1e-6, 1.0});
    EXPECT_FALSE(value.number.has_value());
    EXPECT_EQ(value.missing,
              "Young's modulus of film at 124 K unknown (its data hold for 283–313 K)");
    const auto none = materials::evaluate(library, "film", PropertyId::density, {295.0, 1e-6, 1.0});
    EXPECT_EQ(none.missing, "density of film unknown");
}

TEST(Evaluation, UsesAnExplicitRuleBeyondTheRangeAndSaysSo) {
    const Library library = with(
        "[specific_heat]\nvalue = 300\nunit = \"J/(kg K)\"\nat_temperature_K = 295\n" + provenance +
        "range = { temperature_K = [283, 313] }\n[specific_heat.beyond]\nrule = \"debye\"\n"
        "debye_temperature_K = 470\ntemperature_K = [4, 283]\ngeometric_sd = 1.2\nsource = "
        "[\"here\"]\n");
    const auto value =
        materials::evaluate(library, "film", PropertyId::specific_heat, {77.0, 1e-6, 1.0});
    ASSERT_TRUE(value.number.has_value());
    EXPECT_NEAR(*value.number,
                300.0 * materials::debye_shape(77.0, 470.0) / materials::debye_shape(295.0, 470.0),
                1e-12);
    EXPECT_EQ(value.analogy,
              "specific heat of film at 77 K: scaled as a Debye solid of 470 K from 295 K");
    EXPECT_EQ(value.width.value, 1.2);
}

TEST(DebyeShape, HasItsTwoLimitsAndAHandbookValue) {
    EXPECT_NEAR(materials::debye_shape(1e4, 100.0), 1.0, 1e-5);
    // Low temperatures: (4π⁴/5)(T/θ)³ in units of 3Nk.
    EXPECT_NEAR(materials::debye_shape(5.0, 500.0), 4.0 * std::pow(core::pi, 4) / 5.0 * 1e-6,
                1e-12);
    // Debye function at θ/T = 1: C_V/3Nk = 0.9517 (printed in tables of the Debye heat capacity;
    // from memory).
    EXPECT_NEAR(materials::debye_shape(300.0, 300.0), 0.9517, 5e-5);
}

TEST(Loss, IsAPowerLawWarmATableColdAndJoinsWithoutAStep) {
    const Library library =
        with("[loss_angle]\nvalue_at_1_Hz = 1e-4\nexponent = 0.1\n" + provenance +
             "range = { temperature_K = [283, 313], frequency_Hz = [50, 2e4] }\n[loss_angle.cold]\n"
             "temperature_K = [10, 100, 200, 250]\nvalues = [1e-3, 5e-4, 3e-4, 2e-4]\ngeometric_sd "
             "= 1.4\n"
             "source = [\"here\"]\nplace = \"p\"\nnature = \"measured\"\nstatus = "
             "\"seen\"\njoins_K = [200, 295]\n");
    EXPECT_NEAR(at(library, PropertyId::loss_angle, {295.0, 1e-6, 100.0}),
                1e-4 * std::pow(100.0, 0.1), 1e-18);
    EXPECT_NEAR(at(library, PropertyId::loss_angle, {100.0, 1e-6, 100.0}), 5e-4, 1e-18);
    EXPECT_NEAR(at(library, PropertyId::loss_angle, {200.0, 1e-6, 100.0}), 3e-4, 1e-12);
    const double below = at(library, PropertyId::loss_angle, {294.999, 1e-6, 100.0});
    const double above = at(library, PropertyId::loss_angle, {295.001, 1e-6, 100.0});
    EXPECT_NEAR(below / above, 1.0, 1e-4);
    EXPECT_TRUE(materials::evaluate(library, "film", PropertyId::loss_angle, {295.0, 1e-6, 1.0})
                    .frequency_extrapolated);
    EXPECT_FALSE(materials::evaluate(library, "film", PropertyId::loss_angle, {5.0, 1e-6, 100.0})
                     .number.has_value());
}

TEST(Index, CarriesExactDerivativesWithFrequency) {
    const Library library = with(
        "[refractive_index]\nsellmeier_strength = [1.1, 0.9]\nsellmeier_resonance_um = "
        "[0.1, 9.9]\nmedium = \"air\"\nat_temperature_K = 295\n" +
        provenance + "range = { temperature_K = [283, 313], wavelength_nm = [400, 2000] }\n");
    const double omega = 2.0 * core::pi * core::speed_of_light / 1e-6;
    const auto n = [&](double w) {
        return *materials::index_at(library, "film", 2.0 * core::pi * core::speed_of_light / w,
                                    295.0)
                    .index;
    };
    const double h = 1e-4 * omega;
    const double first = (n(omega + h).value - n(omega - h).value) / (2.0 * h);
    const double second = (n(omega + h).first - n(omega - h).first) / (2.0 * h);
    EXPECT_NEAR(n(omega).first / first, 1.0, 1e-6);
    EXPECT_NEAR(n(omega).second / second, 1.0, 1e-6);
    const double l2 = 1.0, square = 1.0 + 1.1 * l2 / (l2 - 0.01) + 0.9 * l2 / (l2 - 9.9 * 9.9);
    EXPECT_NEAR(n(omega).value, std::sqrt(square) * 1.00027, 1e-12);
}

TEST(Index, IsCarriedFromItsOwnTemperatureByItsSlope) {
    const Library library =
        with("[refractive_index]\nvalue = 2.0\nmedium = \"vacuum\"\nat_temperature_K = 295\n" +
             provenance +
             "range = { temperature_K = [283, 313] }\n[thermo_optic_coefficient]\ntemperature_K = "
             "[100, 200, 300]\n"
             "values = [1e-5, 2e-5, 3e-5]\nunit = \"1/K\"\n" +
             provenance + "range = { temperature_K = [100, 300] }\n");
    // β = 1e-7 T exactly: ∫ from 295 to 150 = 0.5e-7 (150² − 295²).
    const auto index = materials::index_at(library, "film", 1e-6, 150.0);
    ASSERT_TRUE(index.index.has_value()) << index.missing;
    EXPECT_NEAR(index.index->value, 2.0 + 0.5e-7 * (150.0 * 150.0 - 295.0 * 295.0), 1e-9);
    EXPECT_FALSE(materials::index_at(library, "film", 1e-6, 50.0).index.has_value());
}

TEST(Expansion, IsTheIntegralOfTheCoefficient) {
    const Library library = with(
        "[thermal_expansion]\ntemperature_K = [100, 300]\nvalues = [1e-6, 3e-6]\n"
        "unit = \"1/K\"\n" +
        provenance + "range = { temperature_K = [100, 300] }\n");
    const auto strain = materials::expansion_between(library, "film", 300.0, 100.0);
    ASSERT_TRUE(strain.number.has_value());
    EXPECT_NEAR(*strain.number, -0.5e-8 * (9e4 - 1e4), 1e-15);
}

TEST(Absorption, PerLengthBecomesAnExtinctionCoefficient) {
    const Library library = with("[absorption_coefficient]\nvalue = 4\nunit = \"1/m\"\n" +
                                 provenance + "range = { temperature_K = [283, 313] }\n");
    EXPECT_NEAR(at(library, PropertyId::extinction_coefficient, {295.0, 1e-6, 1.0}),
                1e-6 / core::pi, 1e-18);
}

TEST(Width, IsThatOfTheLowestSpanThatApplies) {
    const materials::Width own{materials::Width::Form::absolute, 1.0, 0.0, 0.0};
    const auto span = [](double from, double to, double value) {
        return materials::WidthSpan{from, to, {materials::Width::Form::absolute, value, 0.0, 0.0}};
    };
    const std::vector<materials::WidthSpan> spans{span(0.0, 150.0, 2.0), span(0.0, 40.0, 3.0)};
    EXPECT_EQ(materials::width_at(own, spans, 200.0).value, 1.0);
    EXPECT_EQ(materials::width_at(own, spans, 100.0).value, 2.0);
    EXPECT_EQ(materials::width_at(own, spans, 20.0).value, 3.0);
}

}  // namespace
