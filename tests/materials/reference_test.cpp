/// References from material to material, the index that is carried or not, and what the reader
/// refuses.

#include <gtest/gtest.h>
#include <unistd.h>

#include <chrono>
#include <filesystem>
#include <fstream>

#include "stillcoat/core/constants.hpp"
#include "support/project_library.hpp"
#include "support/written_material.hpp"

namespace {

using namespace stillcoat;
using materials::evaluate;
using materials::index_at;
using materials::Library;
using materials::PropertyId;
using test::mentions;
using test::problems_of;
using test::provenance;
using test::warm;
using test::written;

const std::string vacuum = "medium = \"vacuum\"\n";

TEST(Extinction, CarriesFactorsIntoItsDispersion) {
    Library library;
    test::add(library, "metal",
              "[extinction_coefficient]\nwavelength_nm = [900, 1000, 1100]\nvalues = [5, 6, 7]\n" +
                  provenance + warm);
    test::add(library, "film",
              "[extinction_coefficient]\nsame_as = \"metal\"\nfactor = 0.1\n" + provenance + warm);
    const auto jet_of = [&](const char* name, double wavelength) {
        return materials::with_dispersion(
            evaluate(library, name, PropertyId::extinction_coefficient, {295.0, wavelength, 1.0}),
            false, wavelength);
    };
    const auto metal = jet_of("metal", 1e-6);
    const auto film = jet_of("film", 1e-6);
    EXPECT_NEAR(metal.value, 6.0, 1e-12);
    EXPECT_NEAR(film.value, 0.6, 1e-12);
    EXPECT_NEAR(film.first, 0.1 * metal.first, 1e-12 * std::abs(metal.first));
    EXPECT_NEAR(film.second, 0.1 * metal.second, 1e-12 * std::abs(metal.second));
    // By difference quotient.
    const double omega = 2.0 * core::pi * core::speed_of_light / 1e-6;
    const double h = 1e-4 * omega;
    const auto at = [&](double w) {
        return jet_of("film", 2.0 * core::pi * core::speed_of_light / w).value;
    };
    EXPECT_NEAR(film.first / ((at(omega + h) - at(omega - h)) / (2.0 * h)), 1.0, 1e-6);
}

TEST(Absorption, ScalesItsWidthWithItsValue) {
    const Library library = written(
        "[absorption_coefficient]\nvalue = 4\nunit = \"1/m\"\nuncertainty = 1\nsource = "
        "[\"here\"]\nplace = \"p\"\nmeasured_at = \"m\"\nnature = \"measured\"\nstatus = "
        "\"seen\"\n" +
        warm);
    const auto k =
        evaluate(library, "film", PropertyId::extinction_coefficient, {295.0, 1e-6, 1.0});
    EXPECT_NEAR(k.width.value / *k.number, 0.25, 1e-12);
}

TEST(Index, SaysSoWhenItsSlopeIsUnknown) {
    const Library library = written("[refractive_index]\nvalue = 2.0\nat_temperature_K = 295\n" +
                                    vacuum + provenance + warm);
    EXPECT_EQ(index_at(library, "film", 1e-6, 295.0).note, "");
    const auto near = index_at(library, "film", 1e-6, 312.0);
    ASSERT_TRUE(near.index.has_value());
    EXPECT_EQ(near.index->value, 2.0);
    EXPECT_EQ(near.note,
              "index of film is that at 295 K, not carried to 312 K: dn/dT of film unknown");
    EXPECT_FALSE(index_at(library, "film", 1e-6, 320.0).index.has_value());
    // Gallium arsenide: dn/dT is known from 1300 nm on.
    const Library& all = test::project_library();
    EXPECT_EQ(index_at(all, "gallium-arsenide", 1550e-9, 300.0).note, "");
    EXPECT_EQ(index_at(all, "gallium-arsenide", 1064e-9, 312.0).note.substr(0, 67),
              "index of gallium-arsenide is that at 295 K, not carried to 312 K: d");
    const auto warmer = index_at(all, "gallium-arsenide", 1064e-9, 300.0);
    EXPECT_NE(warmer.note.find("at 1064 nm unknown"), std::string::npos) << warmer.note;
}

TEST(Index, WithoutATemperatureOfItsOwnHoldsInItsRangeOnly) {
    const std::string formula =
        "[refractive_index]\ncauchy = [1.5, 0.003, 0]\n" + vacuum + provenance + warm;
    const Library library = written(formula);
    EXPECT_TRUE(index_at(library, "film", 1e-6, 300.0).index.has_value());
    const auto cold = index_at(library, "film", 1e-6, 124.0);
    EXPECT_FALSE(cold.index.has_value());
    EXPECT_EQ(cold.missing,
              "refractive index of film at 124 K unknown (its data hold for 283–313 K)");
    const Library ruled =
        written(formula +
                "[refractive_index.beyond]\nrule = \"constant\"\ntemperature_K = [4, 283]\n"
                "uncertainty = 0.07\nsource = [\"rule\"]\nplace = \"p\"\n");
    const auto held = index_at(ruled, "film", 1e-6, 124.0);
    ASSERT_TRUE(held.index.has_value());
    EXPECT_EQ(held.analogy, "refractive index of film at 124 K: held constant from 283 K");
    EXPECT_EQ(held.width.value, 0.07);
}

TEST(Index, OfSameAsKeepsToItsOwnRanges) {
    Library library;
    test::add(library, "glass",
              "[refractive_index]\nsellmeier_strength = [[1.1, 1e-4]]\n"
              "sellmeier_resonance_um = [[0.1]]\n" +
                  vacuum + provenance +
                  "range = { temperature_K = [20, 313], wavelength_nm = [400, 2600] }\n");
    const std::string slope =
        "[thermo_optic_coefficient]\nvalue = 1e-5\nunit = \"1/K\"\nat_temperature_K = 295\n" +
        provenance + "range = { temperature_K = [100, 313] }\n";
    const std::string like =
        "[refractive_index]\nsame_as = \"glass\"\n" + provenance +
        "range = { temperature_K = [283, 313], wavelength_nm = [400, 1100] }\n";
    test::add(library, "film", like + slope);
    EXPECT_TRUE(index_at(library, "film", 1e-6, 300.0).index.has_value());
    EXPECT_EQ(index_at(library, "film", 1.5e-6, 300.0).missing,
              "refractive index of film is known for 400–1100 nm only, not at 1500 nm");
    EXPECT_EQ(index_at(library, "film", 1e-6, 124.0).missing,
              "refractive index of film at 124 K unknown (its data hold for 283–313 K)");
    // With a temperature of its own it is carried by its own dn/dT, not by the glass.
    test::add(library, "carried", like + "at_temperature_K = 295\n" + slope);
    const double warm_index = index_at(library, "glass", 1e-6, 295.0).index->value;
    EXPECT_NEAR(index_at(library, "carried", 1e-6, 124.0).index->value,
                warm_index + 1e-5 * (124.0 - 295.0), 1e-12);
}

TEST(References, AChainOfFiveIsNoCircleAndACircleIsOne) {
    const auto chain = [](int length, bool closed) {
        Library library;
        for (int i = 0; i < length; ++i) {
            const bool last = i + 1 == length;
            const std::string next = "m" + std::to_string(last ? 0 : i + 1);
            test::add(library, "m" + std::to_string(i),
                      last && !closed
                          ? "[density]\nvalue = 2\nunit = \"g/cm3\"\nat_temperature_K = 295\n" +
                                provenance + warm
                          : "[density]\nsame_as = \"" + next + "\"\n" + provenance + warm);
        }
        return library;
    };
    const auto faults = [](const Library& library) {
        return test::messages(
            [&](core::Problems& problems) { materials::check_links(library, problems); });
    };
    const auto density = [](const Library& library) {
        return evaluate(library, "m0", PropertyId::density, {295.0, 1e-6, 1.0});
    };
    for (const int length : {5, 12, 64}) {
        const Library open = chain(length, false);
        EXPECT_TRUE(faults(open).empty()) << length;
        EXPECT_NEAR(density(open).number.value_or(0.0), 2000.0, 1e-9) << length;
        EXPECT_EQ(density(open).bases.size(), static_cast<std::size_t>(length));
    }
    for (const int length : {1, 2, 5}) {
        const Library closed = chain(length, true);
        EXPECT_EQ(faults(closed).size(), static_cast<std::size_t>(length));
        mentions(faults(closed), "density refers to other materials in a circle");
        EXPECT_NE(density(closed).missing.find("in a circle"), std::string::npos);
    }
    const Library deep = chain(1000, false);
    mentions(faults(deep), "density refers to other materials through more than 63 steps");
    EXPECT_NE(density(deep).missing.find("too many other materials"), std::string::npos);
    mentions(faults(chain(1000, true)), "in a circle");
}

TEST(References, DoNotMultiplyWithoutEnd) {
    // Each material follows the next and is the same as it: twice the ways at every step.
    Library library;
    for (int i = 0; i < 60; ++i) {
        const std::string next = "m" + std::to_string(i + 1);
        test::add(library, "m" + std::to_string(i),
                  "[density]\nsame_as = \"" + next + "\"\n" + provenance + warm +
                      "[density.beyond]\nrule = \"follows\"\nmaterial = \"" + next +
                      "\"\ntemperature_K = [4, 283]\ngeometric_sd = 1.2\nsource = [\"rule\"]\n");
    }
    test::add(library, "m60",
              "[density]\nvalue = 2\nunit = \"g/cm3\"\nat_temperature_K = 295\n" + provenance +
                  "range = { temperature_K = [4, 313] }\n");
    const auto start = std::chrono::steady_clock::now();
    const auto value = evaluate(library, "m0", PropertyId::density, {100.0, 1e-6, 1.0});
    EXPECT_LT(std::chrono::steady_clock::now() - start, std::chrono::seconds(5));
    EXPECT_TRUE(value.number.has_value() || !value.missing.empty());
}

TEST(MaterialFile, MayNotStateExtinctionAndAbsorptionTogether) {
    const std::string both = "[extinction_coefficient]\nvalue = 1e-5\n" + provenance + warm +
                             "[absorption_coefficient]\nvalue = 4\nunit = \"1/m\"\n" + provenance +
                             warm;
    mentions(problems_of(both),
             "extinction_coefficient and absorption_coefficient in material file contradict each "
             "other");
    Library library = written("");
    mentions(test::problems_of_override(
                 library,
                 "extinction_coefficient = { value = 1e-5, source = \"a\" }\n"
                 "absorption_coefficient = { value = \"4 1/m\", source = \"a\" }\n"),
             "extinction_coefficient and absorption_coefficient in [material.\"film\"] contradict "
             "each other");
}

TEST(IndexFormula, IsCheckedTypeByType) {
    const auto with = [](const std::string& strength, const std::string& resonance,
                         const std::string& more = "") {
        return problems_of("[refractive_index]\nsellmeier_strength = " + strength +
                           "\nsellmeier_resonance_um = " + resonance + "\n" + vacuum + provenance +
                           warm + more);
    };
    EXPECT_TRUE(with("[[1.1], [2.0, 1e-4]]", "[0.1, 9.9]").empty());
    mentions(with("[[1.1], 2]", "[0.1, 9.9]"),
             "entry 2 of sellmeier_strength in [refractive_index] is a number, others are lists");
    mentions(with("[1.1, [2]]", "[0.1, 9.9]"),
             "entry 1 of sellmeier_strength in [refractive_index] is a number, others are lists");
    mentions(with("[[]]", "[0.1]"), "entry 1 of sellmeier_strength in [refractive_index] is empty");
    mentions(with("[1.1]", "[[0.1], [\"x\"]]"), "entry 2 of sellmeier_resonance_um");
    EXPECT_EQ(with("[[1.1], 2]", "[0.1, 9.9]").size(), 1u);
    mentions(with("[1.1]", "[0.1]", "[refractive_index.rescaled_to]\nvalue = 2.0\n"),
             "wavelength_nm is missing in rescaled_to of [refractive_index]");
    mentions(with("[1.1]", "[0.1]", "[refractive_index.rescaled_to]\nwavelength_nm = 1064\n"),
             "value is missing in rescaled_to of [refractive_index]");
}

TEST(MaterialFile, NamesOnlyTheFirstOfManyUnknownSources) {
    std::string sources;
    for (int i = 0; i < 2000; ++i) sources += "\"unknown" + std::to_string(i) + "\",\n";
    const auto list = problems_of(
        "[density]\nvalue = 2\nunit = \"g/cm3\"\nat_temperature_K = 295\nuncertainty = 1\n"
        "source = [" +
        sources +
        "]\nplace = \"p\"\nmeasured_at = \"m\"\nnature = \"measured\"\nstatus = "
        "\"seen\"\n" +
        warm);
    EXPECT_EQ(list.size(), 6u);
    mentions(list, "1995 more sources in [density] are not in references.toml");
}

TEST(Folder, ThatCannotBeReadIsAnInputError) {
    const auto folder = std::filesystem::temp_directory_path() /
                        ("stillcoat_unreadable_" + std::to_string(getpid()));
    std::filesystem::create_directory(folder);
    std::filesystem::permissions(folder, std::filesystem::perms::none);
    // The superuser reads everything: be somebody else for a moment.
    const uid_t user = geteuid();
    const bool changed = user == 0 && seteuid(65534) == 0;
    Library library;
    core::Problems problems;
    std::string said;
    try {
        materials::add_folder(library, folder.string(), problems);
    } catch (const core::InputError& error) {
        said = error.problems().at(0).message;
    } catch (const std::exception& error) {
        said = std::string("not an input error: ") + error.what();
    }
    if (changed) {
        EXPECT_EQ(seteuid(user), 0);
    }
    std::filesystem::permissions(folder, std::filesystem::perms::owner_all);
    std::filesystem::remove(folder);
    EXPECT_NE(said.find("this folder of materials cannot be read"), std::string::npos) << said;
}

}  // namespace
