/// Every piece of data that had a say in a value is named, each once, and no other.

#include <gtest/gtest.h>

#include <chrono>
#include <string>
#include <vector>

#include "support/project_library.hpp"
#include "support/written_material.hpp"

namespace {

using namespace stillcoat;
using materials::Basis;
using materials::evaluate;
using materials::Library;
using materials::Part;
using materials::PropertyId;
using test::provenance;
using test::warm;
using test::written;

/// "film loss_angle cold_table" for each basis.
std::vector<std::string> words(const std::vector<Basis>& bases) {
    std::vector<std::string> list;
    for (const Basis& basis : bases) {
        const char* part = basis.part == Part::datum        ? "datum"
                           : basis.part == Part::cold_table ? "cold_table"
                                                            : "rule";
        list.push_back(basis.material + " " + materials::info(basis.property).key + " " + part);
    }
    return list;
}

using Words = std::vector<std::string>;

std::string rule(const std::string& property, const std::string& what,
                 const std::string& range = "[4, 283]") {
    return "[" + property + ".beyond]\nrule = \"" + what + "\"\ntemperature_K = " + range +
           "\ngeometric_sd = 1.2\nsource = [\"rule\"]\nplace = \"general rule\"\n";
}

TEST(Basis, OfALossIsItsColdTableItsDatumOrBothAcrossTheJoin) {
    const Library library = written(
        "[loss_angle]\nvalue = 1e-4\nat_temperature_K = 295\n" + provenance + warm +
        "[loss_angle.cold]\ntemperature_K = [10, 200]\nvalues = [1e-3, 3e-4]\njoins_K = [200, "
        "295]\ngeometric_sd = 1.4\nsource = [\"cold\"]\nplace = \"figure 2\"\nnature = \"fit\"\n"
        "status = \"from memory\"\n");
    const auto at = [&](double t) {
        return evaluate(library, "film", PropertyId::loss_angle, {t, 1e-6, 1.0});
    };
    EXPECT_EQ(words(at(100.0).bases), Words{"film loss_angle cold_table"});
    EXPECT_EQ(words(at(200.0).bases), Words{"film loss_angle cold_table"});
    EXPECT_EQ(words(at(250.0).bases),
              (Words{"film loss_angle datum", "film loss_angle cold_table"}));
    EXPECT_EQ(words(at(295.0).bases), Words{"film loss_angle datum"});
    const Basis cold = at(100.0).bases.at(0);
    EXPECT_EQ(materials::sources_of(cold), Words{"cold"});
    EXPECT_EQ(materials::status_of(cold), "from memory");
    EXPECT_EQ(materials::nature_of(cold), "fit");
    EXPECT_EQ(materials::place_of(cold), "figure 2");
    const Basis datum = at(295.0).bases.at(0);
    EXPECT_EQ(materials::sources_of(datum), Words{"here"});
    EXPECT_EQ(materials::status_of(datum), "seen");
    EXPECT_EQ(materials::nature_of(datum), "measured");
    EXPECT_EQ(materials::place_of(datum), "p");
}

TEST(Basis, OfARuleIsTheDatumTheRuleAndWhatItFollows) {
    Library library;
    const std::string heat =
        "[specific_heat]\nvalue = 700\nunit = \"J/(kg K)\"\n"
        "at_temperature_K = 295\n" +
        provenance + warm;
    const std::string expansion =
        "[thermal_expansion]\nvalue = 1e-6\nunit = \"1/K\"\n"
        "at_temperature_K = 295\n" +
        provenance + warm;
    test::add(library, "film",
              heat + rule("specific_heat", "follows") + "material = \"glass\"\n" + expansion +
                  rule("thermal_expansion", "heat-capacity"));
    test::add(library, "glass",
              "[specific_heat]\ntemperature_K = [4, 300]\nvalues = [7, 700]\nunit = "
              "\"J/(kg K)\"\n" +
                  provenance + "range = { temperature_K = [4, 300] }\n");
    const auto alpha = evaluate(library, "film", PropertyId::thermal_expansion, {100.0, 1e-6, 1.0});
    EXPECT_EQ(words(alpha.bases), (Words{"film thermal_expansion datum", "film specific_heat datum",
                                         "glass specific_heat datum", "film specific_heat rule",
                                         "film thermal_expansion rule"}));
    const Basis by_rule = alpha.bases.back();
    EXPECT_EQ(materials::sources_of(by_rule), Words{"rule"});
    EXPECT_EQ(materials::nature_of(by_rule), "by analogy");
    EXPECT_EQ(materials::status_of(by_rule), "not stated");
    EXPECT_EQ(materials::place_of(by_rule), "general rule");
    EXPECT_EQ(
        words(evaluate(library, "film", PropertyId::thermal_expansion, {300.0, 1e-6, 1.0}).bases),
        Words{"film thermal_expansion datum"});
}

TEST(Basis, OfSameAsIsBothDataAndTheWidthIsItsOwnWhenStated) {
    Library library;
    test::add(library, "glass",
              "[photoelastic_p11]\nvalue = 0.12\nuncertainty = 0.01\nsource = [\"here\"]\n"
              "place = \"p\"\nmeasured_at = \"m\"\nnature = \"measured\"\nstatus = \"seen\"\n" +
                  warm);
    test::add(library, "film",
              "[photoelastic_p11]\nsame_as = \"glass\"\nfactor = 2\nuncertainty = 0.05\nsource = "
              "[\"rule\"]\nplace = \"p\"\nmeasured_at = \"m\"\nnature = \"by analogy\"\nstatus = "
              "\"derived\"\n" +
                  warm);
    test::add(library, "other",
              "[photoelastic_p11]\nsame_as = \"glass\"\nfactor = 2\n" + provenance + warm);
    const auto of = [&](const char* name) {
        return evaluate(library, name, PropertyId::photoelastic_p11, {295.0, 1e-6, 1.0});
    };
    EXPECT_EQ(words(of("film").bases),
              (Words{"film photoelastic_p11 datum", "glass photoelastic_p11 datum"}));
    EXPECT_EQ(of("film").width.value, 0.05);
    EXPECT_EQ(of("other").width.value, 0.02);  // the other's, times the factor
}

TEST(Basis, OfACarriedIndexAndOfAnIntegralIsTheWholeWay) {
    const Library library =
        written("[refractive_index]\nvalue = 2.0\nmedium = \"vacuum\"\nat_temperature_K = 295\n" +
                provenance + warm + "[thermo_optic_coefficient]\nvalue = 1e-5\nunit = \"1/K\"\n" +
                "at_temperature_K = 295\n" + provenance + warm +
                rule("thermo_optic_coefficient", "constant") +
                "[thermal_expansion]\nvalue = 1e-6\nunit = \"1/K\"\nat_temperature_K = 295\n" +
                provenance + warm + rule("thermal_expansion", "constant"));
    EXPECT_EQ(words(materials::index_at(library, "film", 1e-6, 295.0).bases),
              Words{"film refractive_index datum"});
    EXPECT_EQ(words(materials::index_at(library, "film", 1e-6, 300.0).bases),
              (Words{"film refractive_index datum", "film thermo_optic_coefficient datum"}));
    EXPECT_EQ(words(materials::index_at(library, "film", 1e-6, 100.0).bases),
              (Words{"film refractive_index datum", "film thermo_optic_coefficient datum",
                     "film thermo_optic_coefficient rule"}));
    EXPECT_EQ(words(materials::expansion_between(library, "film", 295.0, 100.0).bases),
              (Words{"film thermal_expansion datum", "film thermal_expansion rule"}));
}

TEST(Basis, IsThereForEveryNumberOfTheLibrary) {
    const Library& library = test::project_library();
    int values = 0;
    for (const auto& [name, material] : library.materials) {
        for (const auto& [id, property] : material.properties) {
            for (const double t : {4.5, 124.0, 250.0, 295.0, 302.0}) {
                const auto value = evaluate(library, name, id, {t, 1064e-9, 100.0});
                EXPECT_EQ(value.bases.empty(), !value.number) << name << " at " << t;
                for (const Basis& basis : value.bases) {
                    EXPECT_FALSE(materials::sources_of(basis).empty()) << name;
                    EXPECT_FALSE(materials::nature_of(basis).empty()) << name;
                }
                values += value.number ? 1 : 0;
            }
        }
    }
    EXPECT_GT(values, 900);
}

}  // namespace
