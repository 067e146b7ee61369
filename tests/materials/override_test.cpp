/// The library's value times a factor of the design file.

#include <gtest/gtest.h>

#include <cmath>

#include "support/project_library.hpp"
#include "support/written_material.hpp"

namespace {

using namespace stillcoat;
using materials::evaluate;
using materials::Library;
using materials::PropertyId;
using materials::Value;
using materials::Width;
using test::mentions;
using test::provenance;
using test::warm;

/// The library under a table [material."name"] of a design file.
Library under(Library library, const std::string& name, const std::string& table) {
    core::Problems problems;
    materials::override_properties(library, name, core::parse_document(table, "design.toml").root,
                                   problems);
    problems.throw_if_any();
    return library;
}

std::string times(const std::string& key, const char* factor) {
    return key + " = { times = " + factor + ", source = \"witness sample\" }\n";
}

void expect_scaled(const Width& width, const Width& library, double factor) {
    ASSERT_EQ(width.form, library.form);
    const bool absolute = library.form == Width::Form::absolute;
    EXPECT_DOUBLE_EQ(width.value, library.value * (absolute ? factor : 1.0));
    EXPECT_DOUBLE_EQ(width.lower, library.lower * factor);
    EXPECT_DOUBLE_EQ(width.upper, library.upper * factor);
}

TEST(Times, ScalesEveryValueOfTheLibraryUnderAllConditions) {
    const Library& library = test::project_library();
    int values = 0;
    for (const auto& [name, material] : library.materials) {
        for (const auto& [id, property] : material.properties) {
            const Library changed = under(library, name, times(materials::info(id).key, "0.75"));
            for (const double t : {10.0, 124.0, 250.0, 295.0, 302.0, 900.0}) {
                for (const double wavelength : {633e-9, 1064e-9, 1550e-9}) {
                    const materials::Conditions at{t, wavelength, 37.0};
                    const Value before = evaluate(library, name, id, at);
                    const Value after = evaluate(changed, name, id, at);
                    ASSERT_EQ(after.known(), before.known()) << name << after.missing;
                    if (!before.known()) continue;
                    ++values;
                    EXPECT_NEAR(*after.number, 0.75 * *before.number,
                                1e-15 * std::abs(*before.number))
                        << name << " " << materials::info(id).key;
                    expect_scaled(after.width, before.width, 0.75);
                    EXPECT_EQ(after.bases.size(), before.bases.size() + 1);
                    EXPECT_EQ(after.bases.at(0).material, name);
                    EXPECT_EQ(materials::sources_of(after.bases.at(0)),
                              std::vector<std::string>{"witness sample"});
                    EXPECT_EQ(after.analogy.empty(), before.analogy.empty()) << after.analogy;
                    EXPECT_EQ(after.frequency_extrapolated, before.frequency_extrapolated);
                    EXPECT_EQ(after.from_cold_table, before.from_cold_table);
                }
            }
        }
    }
    EXPECT_GT(values, 2000);
}

TEST(Times, ScalesTheIndexWithItsDispersionAndTheExtinctionToo) {
    const Library& library = test::project_library();
    const Library changed =
        under(library, "gold-film",
              times("refractive_index", "1.01") + times("extinction_coefficient", "1.02"));
    const auto before = materials::index_at(library, "gold-film", 1064e-9, 295.0);
    const auto after = materials::index_at(changed, "gold-film", 1064e-9, 295.0);
    ASSERT_TRUE(before.index && after.index);
    EXPECT_NE(before.index->first, 0.0);
    EXPECT_NEAR(after.index->first / before.index->first, 1.01, 1e-14);
    EXPECT_NEAR(after.index->second / before.index->second, 1.01, 1e-14);
    const auto extinction = [](const Library& from) {
        return materials::with_dispersion(
            evaluate(from, "gold-film", PropertyId::extinction_coefficient, {295.0, 1064e-9, 1.0}),
            false, 1064e-9);
    };
    EXPECT_NE(extinction(library).first, 0.0);
    EXPECT_NEAR(extinction(changed).first / extinction(library).first, 1.02, 1e-13);
}

TEST(Times, ShowsTheDatumOfTheLibraryAndNoNewMaterial) {
    const Library& library = test::project_library();
    const Library changed = under(library, "tantala-ibs", times("youngs_modulus", "1.01"));
    EXPECT_EQ(changed.names(), library.names());
    const Value value =
        evaluate(changed, "tantala-ibs", PropertyId::youngs_modulus, {295.0, 1e-6, 1.0});
    ASSERT_EQ(value.bases.size(), 2u);
    EXPECT_EQ(value.bases[1].material, "tantala-ibs (library)");
    EXPECT_EQ(materials::place_of(value.bases[0]), "times 1.01");
    EXPECT_EQ(materials::status_of(value.bases[0]),
              "the library's times 1.01, stated in the design file");
    core::Problems problems;
    materials::check_links(changed, problems);
    EXPECT_TRUE(problems.empty());
    // A design that is read twice over one library.
    const Library twice = under(changed, "tantala-ibs", times("youngs_modulus", "1.01"));
    EXPECT_EQ(evaluate(twice, "tantala-ibs", PropertyId::youngs_modulus, {295.0, 1e-6, 1.0}).number,
              value.number);
}

TEST(Times, LeavesTheHeatCapacityThatARuleFollowsAsTheDesignHasIt) {
    const Library& library = test::project_library();
    const std::string factor = times("thermo_optic_coefficient", "2");
    const std::string heat = "specific_heat = { value = \"500 J/(kg K)\", source = \"x\" }\n";
    const auto cold = [](const Library& from) {
        return *evaluate(from, "titania-ibs", PropertyId::thermo_optic_coefficient,
                         {124.0, 1e-6, 1.0})
                    .number;
    };
    EXPECT_DOUBLE_EQ(cold(under(library, "titania-ibs", factor)), 2.0 * cold(library));
    EXPECT_DOUBLE_EQ(cold(under(library, "titania-ibs", factor + heat)),
                     2.0 * cold(under(library, "titania-ibs", heat)));
    EXPECT_NE(cold(under(library, "titania-ibs", heat)), cold(library));
}

TEST(Times, StandsWithASourceOnlyAndWithinItsLimits) {
    Library library;
    test::add(library, "film",
              "[loss_angle_bulk]\nvalue = 1e-4\nat_temperature_K = 295\n" + provenance + warm +
                  "[loss_angle_shear]\nvalue = 1e-4\nat_temperature_K = 295\n" + provenance + warm);
    const auto problems = [&library](const std::string& table) {
        Library copy = library;
        const auto list = test::problems_of_override(copy, table);
        EXPECT_EQ(list.size(), 1u) << testing::PrintToString(list);
        return list;
    };
    const std::string shear = "loss_angle_shear = { times = 2, source = \"x\"";
    for (const char* other :
         {"value = 1e-4", "alternative = \"y\"", "uncertainty = \"5 %\"", "same_as = \"silicon\"",
          "value_at_1_Hz = 1e-4", "range = { temperature_K = [4, 300] }"}) {
        mentions(problems(shear + ", " + other + " }\n"), "contradict each other");
    }
    mentions(problems("loss_angle_shear = { times = 2 }\n"), "source is missing");
    for (const char* factor : {"0", "-1", "0.9e-3", "1.1e3", "nan", "\"5 K\""}) {
        mentions(problems("loss_angle_shear = { times = " + std::string(factor) +
                          ", source = \"x\" }\n"),
                 "times in loss_angle_shear of film");
    }
    mentions(problems("loss_angle = { times = 2, source = \"x\" }\n"),
             "loss_angle of film is unknown: there is nothing to multiply | it has "
             "loss_angle_bulk and loss_angle_shear: multiply both");
    mentions(problems("density = { times = 2, source = \"x\" }\n"), "| give a value");
}

}  // namespace
