#include "stillcoat/materials/library.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <set>

#include "stillcoat/materials/evaluation.hpp"
#include "support/csv.hpp"
#include "support/project_library.hpp"

namespace {

using namespace stillcoat;
using materials::PropertyId;

const materials::Library& library() { return test::project_library(); }

TEST(Library, HoldsTheMaterialsThatItPromises) {
    for (const char* name : {"fused-silica",
                             "silicon",
                             "sapphire",
                             "titania-silica-glass",
                             "calcium-fluoride",
                             "silica-ibs",
                             "tantala-ibs",
                             "titania-tantala-ibs",
                             "titania-germania-ibs",
                             "hafnia-ibs",
                             "silica-hafnia-ibs",
                             "niobia-ibs",
                             "titania-ibs",
                             "alumina-ibs",
                             "silicon-nitride-lpcvd",
                             "amorphous-silicon",
                             "gallium-arsenide",
                             "aluminium-gallium-arsenide-92",
                             "magnesium-fluoride-ibs",
                             "zirconia-ibs",
                             "gold-film"}) {
        EXPECT_EQ(library().materials.count(name), 1u) << name;
    }
}

TEST(Library, StatesSourcePlaceNatureAndStatusOfEveryEntry) {
    int entries = 0;
    const auto check = [&entries](const materials::Entry& entry, const std::string& where) {
        ++entries;
        EXPECT_FALSE(entry.sources.empty()) << where;
        EXPECT_FALSE(entry.place.empty()) << where;
        EXPECT_FALSE(entry.nature.empty()) << where;
        EXPECT_FALSE(entry.status.empty()) << where;
        EXPECT_TRUE(entry.temperature.has_value()) << where;
    };
    for (const auto& [name, material] : library().materials) {
        for (const auto& [id, property] : material.properties) {
            check(property.entry, name + " " + materials::info(id).key);
            for (const auto& other : property.alternatives)
                check(other.entry, name + " " + other.name);
        }
    }
    EXPECT_GT(entries, 250);
}

/// What a noise calculation needs is there for every material, at room temperature and in the cold,
/// or the gap is listed here on purpose.
TEST(Library, LetsNoiseBeComputedFromTheColdToRoomTemperature) {
    std::set<std::string> gaps;
    for (const auto& [name, material] : library().materials) {
        for (const double t : {4.5, 20.0, 77.0, 124.0, 200.0, 290.0, 295.0, 300.0}) {
            for (const PropertyId id : {PropertyId::youngs_modulus, PropertyId::poisson_ratio,
                                        PropertyId::density, PropertyId::thermal_conductivity,
                                        PropertyId::specific_heat, PropertyId::thermal_expansion}) {
                const auto value = materials::evaluate(library(), name, id, {t, 1064e-9, 100.0});
                if (value.number) {
                    EXPECT_TRUE(std::isfinite(*value.number)) << name;
                } else {
                    gaps.insert(name + " " + materials::info(id).key);
                }
            }
        }
    }
    // Nothing is known of the gold film in the cold; nothing of the expansion of titania-silica
    // glass below 50 K.
    const std::set<std::string> known{"gold-film density",
                                      "gold-film poisson_ratio",
                                      "gold-film specific_heat",
                                      "gold-film youngs_modulus",
                                      "gold-film thermal_expansion",
                                      "gold-film thermal_conductivity",
                                      "titania-silica-glass thermal_expansion"};
    EXPECT_EQ(gaps.size(), known.size());
    for (const std::string& gap : gaps) EXPECT_EQ(known.count(gap), 1u) << "new gap: " << gap;
}

TEST(Library, ReproducesThePublishedSpotChecks) {
    int rows = 0;
    for (const test::Row& row :
         test::read_csv(std::string(STILLCOAT_PUBLISHED) + "/materials_spot_checks.csv")) {
        ++rows;
        const std::string material = row.at("material");
        const double t = test::number(row, "temperature_K", 295.0);
        const double wavelength = test::number(row, "wavelength_nm", 1064.0) * 1e-9;
        const double frequency = test::number(row, "frequency_Hz", 100.0);
        materials::Library chosen = library();
        std::string key = row.at("property");
        const bool in_air = key == "refractive_index_in_air";
        if (in_air) key = "refractive_index";
        const auto id = materials::property_by_key(key);
        ASSERT_TRUE(id.has_value()) << key;
        if (!row.at("alternative").empty()) {
            auto& property = chosen.materials.at(material).properties.at(*id);
            bool found = false;
            for (const auto& other : property.alternatives) {
                if (other.name != row.at("alternative")) continue;
                const materials::Entry entry = other.entry;
                property.entry = entry;
                found = true;
                break;
            }
            ASSERT_TRUE(found) << material << " " << row.at("alternative");
        }
        double value = 0.0;
        if (*id == PropertyId::refractive_index) {
            const auto index = materials::index_at(chosen, material, wavelength, t);
            ASSERT_TRUE(index.index.has_value()) << material << ": " << index.missing;
            value = index.index->value / (in_air ? materials::index_of_air : 1.0);
        } else {
            const auto number =
                materials::evaluate(chosen, material, *id, {t, wavelength, frequency});
            ASSERT_TRUE(number.number.has_value()) << material << ": " << number.missing;
            value = *number.number;
        }
        const double printed = std::stod(row.at("printed"));
        EXPECT_NEAR(value, printed, std::abs(printed) * std::stod(row.at("relative_tolerance")))
            << material << " " << key << " at " << t << " K, " << row.at("source") << " "
            << row.at("remark");
        EXPECT_FALSE(row.at("status").empty());
    }
    EXPECT_GE(rows, 20);
}

}  // namespace
