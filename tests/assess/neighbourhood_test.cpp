#include "stillcoat/assess/neighbourhood.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <functional>
#include <iostream>

#include "stillcoat/assess/appraisal.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/core/errors.hpp"
#include "support/written_design.hpp"

namespace {

using namespace stillcoat;
using assess::Neighbourhood;
using optics::EdgeState;
using test::mirror_text;
using test::quarter_wave_pairs;

constexpr assess::Scope optics_only{false, false, false};

Neighbourhood around(const std::string& text) {
    const auto read = test::read_design(text);
    return assess::appraise(read.design, read.library, {false, false, true}).around.value();
}

/// The library's films with constant indices, so that nothing disperses.
std::string constant_indices(double high, double low) {
    const auto index = [](const std::string& material, double value) {
        return "[material.\"" + material +
               "\"]\nrefractive_index = { value = " + std::to_string(value) +
               ", source = \"x\" }\n";
    };
    return index("tantala-ibs", high) + index("silica-ibs", low);
}

/// 1550 nm silicon mirror, cold, its quarter waves counted at room temperature.
const std::string cold_silicon = mirror_text(
    "[coating]\ndesign_wavelength = \"1550 nm\"\nreference_temperature = \"295 K\"\n"
    "[[coating.block]]\nrepeat = 8\nlayers = [ { material = \"silica-ibs\", "
    "quarter_waves = 1 }, { material = \"amorphous-silicon\", quarter_waves = 1 } ]\n",
    "", "wavelength = \"1550 nm\"", "silicon", "124 K");

/// The same for 1397 nm with films whose data reach beyond both edges.
const std::string cooled_pairs =
    mirror_text("[coating]\ndesign_wavelength = \"1397 nm\"\nreference_temperature = \"295 K\"\n" +
                    quarter_wave_pairs,
                "", "wavelength = \"1397 nm\"", "silicon", "124 K");

TEST(Neighbourhood, GivesTheBandOfALongQuarterWaveStackAsTheClosedFormSays) {
    for (const auto& [high, low] : {std::pair(2.07, 1.45), std::pair(2.35, 1.38)}) {
        for (const int pairs : {20, 80}) {
            std::string blocks = quarter_wave_pairs;
            blocks.replace(blocks.find("= 10"), 4, "= " + std::to_string(pairs));
            const Neighbourhood result = around(mirror_text(blocks, constant_indices(high, low)));
            ASSERT_TRUE(result.s_band);
            EXPECT_FALSE(result.p_band);
            const assess::ReflectionBand& band = *result.s_band;
            ASSERT_TRUE(band.centre && band.relative_half_width);
            EXPECT_EQ(band.short_edge.state, EdgeState::found);
            EXPECT_EQ(band.long_edge.state, EdgeState::found);
            EXPECT_TRUE(band.operating_wavelength_inside);
            EXPECT_FALSE(band.centre_shift);  // no change of temperature
            const double expected = optics::quarter_wave_half_width(high, low);
            const double excess = *band.relative_half_width - expected;
            std::cout << "  n " << high << "/" << low << ", " << pairs << " pairs: half width "
                      << *band.relative_half_width << ", limit " << expected << '\n';
            // The first dip of a finite stack lies 1/(2 Δ N²) outside, Δ = half width.
            EXPECT_GT(excess, 0.0);
            EXPECT_LT(excess, 1.3 / (2.0 * expected * pairs * pairs));
            // The substrate disperses and is no part of the period: the two edges of a finite
            // stack differ a little.
            EXPECT_NEAR(*band.centre / 1064e-9, 1.0, 1e-5);
        }
    }
}

void expect_equal(const assess::Reflected& here, const optics::Response& there) {
    EXPECT_EQ(here.reflectance, there.reflectance);
    EXPECT_EQ(here.loss, there.loss);
    EXPECT_EQ(here.transmittance, there.transmittance);
    EXPECT_EQ(here.log_transmittance, there.log_transmittance);
    EXPECT_EQ(here.absorptance, there.absorptance);
}

/// Every departure against the appraisal of a design that has its wavelength and angle.
void expect_separate_appraisals(const std::string& text, std::size_t departures) {
    const auto read = test::read_design(text);
    const Neighbourhood result =
        assess::appraise(read.design, read.library, {false, false, true}).around.value();
    ASSERT_EQ(result.departures.size(), departures);
    for (const assess::Departure& departure : result.departures) {
        EXPECT_EQ(departure.missing, "");
        for (const bool s : {true, false}) {
            const auto& light = s ? departure.s : departure.p;
            if (!light) continue;
            stack::Design changed = read.design;
            changed.light.wavelength = departure.wavelength;
            changed.light.angle = departure.angle;
            changed.light.polarisation =
                s ? stack::PolarisationChoice::s : stack::PolarisationChoice::p;
            const assess::Appraisal other = assess::appraise(changed, read.library, optics_only);
            ASSERT_EQ(other.faces.size(), 1u);
            EXPECT_FALSE(other.around);
            expect_equal(*light, other.faces[0].response);
        }
        ASSERT_TRUE(departure.mean);
        stack::Design both = read.design;
        both.light.wavelength = departure.wavelength;
        both.light.angle = departure.angle;
        if (departure.s && departure.p) {
            both.light.polarisation = stack::PolarisationChoice::unpolarised;
        }
        const assess::Appraisal other = assess::appraise(both, read.library, optics_only);
        EXPECT_EQ(departure.mean->loss, mean_over_faces(other, &optics::Response::loss));
        EXPECT_EQ(departure.mean->transmittance,
                  mean_over_faces(other, &optics::Response::transmittance));
    }
}

TEST(Neighbourhood, DepartsAsSeparateAppraisalsOfChangedDesignsSay) {
    expect_separate_appraisals(mirror_text(quarter_wave_pairs), 3);
    // Cold: carried indices and shrunk layers.
    expect_separate_appraisals(cold_silicon, 3);
    for (const char* polarisation : {"s", "p", "unpolarised"}) {
        expect_separate_appraisals(
            mirror_text(quarter_wave_pairs, "",
                        std::string("wavelength = \"1064 nm\"\nangle = \"45 deg\"\nmedium = "
                                    "\"air\"\npolarisation = \"") +
                            polarisation + "\""),
            4);
    }
}

TEST(Neighbourhood, DepartsByOnePerCentAndFiveDegreesWithinTheQuarterCircle) {
    const auto tilted = [](const std::string& degrees) {
        return around(mirror_text(
            quarter_wave_pairs, "",
            "wavelength = \"1064 nm\"\nangle = \"" + degrees + " deg\"\npolarisation = \"p\""));
    };
    constexpr double degree = core::pi / 180.0;
    const Neighbourhood middle = tilted("45");
    ASSERT_EQ(middle.departures.size(), 4u);
    EXPECT_NEAR(middle.departures[0].wavelength, 0.99 * 1064e-9, 1e-20);
    EXPECT_NEAR(middle.departures[1].wavelength, 1.01 * 1064e-9, 1e-20);
    EXPECT_NEAR(middle.departures[2].angle, 40.0 * degree, 1e-14);
    EXPECT_NEAR(middle.departures[3].angle, 50.0 * degree, 1e-14);
    EXPECT_FALSE(middle.departures[0].s);
    EXPECT_FALSE(middle.s_band);
    EXPECT_TRUE(middle.p_band);
    // Three degrees less five is two on the other side of the normal.
    EXPECT_NEAR(tilted("3").departures[2].angle, 2.0 * degree, 1e-14);
    // More than 85 degrees can only be lessened.
    EXPECT_EQ(tilted("86").departures.size(), 3u);
    // At normal incidence a design that names no polarisation is tilted in both.
    const Neighbourhood normal = around(mirror_text(quarter_wave_pairs));
    EXPECT_FALSE(normal.departures[0].p);
    EXPECT_TRUE(normal.departures[2].s && normal.departures[2].p);
}

/// Edge of the band without any cleverness: steps of 5 nm outwards until half of the highest
/// reflectance, bisected between the last two.
double scanned_edge(const stack::Design& design, const materials::Library& library, double step) {
    const auto reflectance = [&](double wavelength) {
        stack::Design changed = design;
        changed.light.wavelength = wavelength;
        return assess::appraise(changed, library, optics_only).faces[0].response.reflectance;
    };
    const double start = design.light.wavelength;
    double top = 0.0, inside = start;
    for (int j = -40; j <= 40; j += 5) top = std::max(top, reflectance(start + j * 1e-9));
    while (reflectance(inside + step) >= 0.5 * top) inside += step;
    double outside = inside + step;
    for (int turn = 0; turn < 30; ++turn) {
        const double middle = 0.5 * (inside + outside);
        (reflectance(middle) >= 0.5 * top ? inside : outside) = middle;
    }
    return inside;
}

TEST(Neighbourhood, ShiftsOnCoolingAsTheBandFoundByBruteForce) {
    const auto read = test::read_design(cooled_pairs);
    const assess::Appraisal result =
        assess::appraise(read.design, read.library, {false, false, true});
    const assess::ReflectionBand& band = result.around.value().s_band.value();
    ASSERT_TRUE(band.centre && band.centre_shift && band.short_edge.shift && band.long_edge.shift);
    stack::Design warm = read.design;
    warm.temperature = warm.coating.reference_temperature;
    const double cold_short = scanned_edge(read.design, read.library, -5e-9);
    const double cold_long = scanned_edge(read.design, read.library, 5e-9);
    const double warm_short = scanned_edge(warm, read.library, -5e-9);
    const double warm_long = scanned_edge(warm, read.library, 5e-9);
    const auto centre = [](double a, double b) { return 2.0 / (1.0 / a + 1.0 / b); };
    const double expected = centre(cold_short, cold_long) - centre(warm_short, warm_long);
    std::cout << "  shift " << *band.centre_shift * 1e9 << " nm, by brute force " << expected * 1e9
              << " nm, from the optical thickness alone "
              << (result.mirror.optical_path_ratio - 1.0) * 1397.0 << " nm\n";
    EXPECT_NEAR(band.short_edge.wavelength / cold_short, 1.0, 1e-8);
    EXPECT_NEAR(band.long_edge.wavelength / cold_long, 1.0, 1e-8);
    EXPECT_NEAR(*band.centre_shift / expected, 1.0, 1e-4);
    EXPECT_NEAR(*band.short_edge.shift / (cold_short - warm_short), 1.0, 1e-4);
    EXPECT_NEAR(*band.long_edge.shift / (cold_long - warm_long), 1.0, 1e-4);
}

TEST(Neighbourhood, ShiftsTheEdgeThatIsKnownWhereTheDataEndBeforeTheOther) {
    const auto read = test::read_design(cold_silicon);
    const assess::ReflectionBand band =
        assess::appraise(read.design, read.library, {false, false, true})
            .around.value()
            .s_band.value();
    EXPECT_EQ(band.long_edge.material, "amorphous-silicon");
    EXPECT_FALSE(band.centre || band.centre_shift || band.long_edge.shift);
    ASSERT_TRUE(band.short_edge.shift);
    stack::Design warm = read.design;
    warm.temperature = warm.coating.reference_temperature;
    const double expected =
        scanned_edge(read.design, read.library, -5e-9) - scanned_edge(warm, read.library, -5e-9);
    std::cout << "  shift of the edge " << *band.short_edge.shift * 1e9 << " nm, by brute force "
              << expected * 1e9 << " nm\n";
    EXPECT_NEAR(*band.short_edge.shift / expected, 1.0, 1e-4);
}

/// Where dn/dT is not the same at all wavelengths, the way in temperature is taken anew at each.
TEST(Neighbourhood, FollowsAThermoOpticCoefficientThatDisperses) {
    const auto read = test::read_design(cooled_pairs);
    materials::Library library = read.library;
    materials::Entry& slope = library.materials.at("tantala-ibs")
                                  .properties.at(materials::PropertyId::thermo_optic_coefficient)
                                  .entry;
    slope.curve = materials::WavelengthTable{{1.0e-6, 1.4e-6, 1.8e-6}, {9e-5, 3e-5, 1e-5}};
    slope.temperature.reset();
    slope.wavelength.reset();
    slope.beyond.reset();
    const auto carried = [&](double wavelength) {
        return materials::index_at(library, "tantala-ibs", wavelength, 124.0).index->value -
               materials::index_at(library, "tantala-ibs", wavelength, 295.0).index->value;
    };
    ASSERT_LT(carried(1.3e-6), 1.2 * carried(1.4e-6));
    const assess::ReflectionBand band =
        assess::appraise(read.design, library, {false, false, true}).around.value().s_band.value();
    EXPECT_NEAR(band.short_edge.wavelength / scanned_edge(read.design, library, -5e-9), 1.0, 1e-8);
    EXPECT_NEAR(band.long_edge.wavelength / scanned_edge(read.design, library, 5e-9), 1.0, 1e-8);
}

TEST(Neighbourhood, EndsWhereAThermoOpticCoefficientEnds) {
    const auto read = test::read_design(cooled_pairs);
    materials::Library library = read.library;
    library.materials.at("tantala-ibs")
        .properties.at(materials::PropertyId::thermo_optic_coefficient)
        .entry.wavelength = materials::Interval{1350e-9, 3e-6};
    ASSERT_FALSE(materials::index_at(library, "tantala-ibs", 1340e-9, 124.0).index);
    const assess::ReflectionBand band =
        assess::appraise(read.design, library, {false, false, true}).around.value().s_band.value();
    EXPECT_EQ(band.short_edge.material, "tantala-ibs");
    EXPECT_NEAR(band.short_edge.wavelength / 1350e-9, 1.0, 2e-12);
    EXPECT_EQ(band.long_edge.state, EdgeState::found);
}

TEST(Neighbourhood, WithoutDispersionShiftsByTheOpticalThickness) {
    // Constant indices at all temperatures, so that only the thickness changes; both films have
    // one expansion and one Poisson ratio, so that the spectrum is scaled as a whole.
    const std::string same =
        "thermal_expansion = { value = \"3e-5 1/K\", source = \"x\" }\n"
        "poisson_ratio = { value = 0.2, source = \"x\" }\n"
        "thermo_optic_coefficient = { value = \"0 1/K\", source = \"x\" }\n";
    std::string values = constant_indices(2.07, 1.45);
    values.insert(values.find("[material.\"silica"), same);
    values += same;
    const std::string steady =
        "[material.\"fused-silica\"]\nrefractive_index = { value = 1.45, source = \"x\" }\n"
        "thermal_expansion = { value = \"0 1/K\", source = \"x\" }\n"
        "thermo_optic_coefficient = { value = \"0 1/K\", source = \"x\" }\n";
    const auto read = test::read_design(
        mirror_text("[coating]\nreference_temperature = \"295 K\"\n" + quarter_wave_pairs,
                    values + steady, "wavelength = \"1064 nm\"", "fused-silica", "345 K"));
    const assess::Appraisal result =
        assess::appraise(read.design, read.library, {false, false, true});
    const double change = result.mirror.optical_path_ratio - 1.0;
    EXPECT_NEAR(change, 1.2 / 0.8 * 3e-5 * 50.0, 1e-12);
    const assess::ReflectionBand& band = result.around->s_band.value();
    ASSERT_TRUE(band.centre_shift);
    EXPECT_NEAR(*band.centre_shift / (*band.centre - *band.centre_shift), change, 1e-8);
}

TEST(Neighbourhood, NamesTheMaterialWhoseDataEndInsideTheBand) {
    const auto read = test::read_design(mirror_text(quarter_wave_pairs));
    materials::Library library = read.library;
    auto& index = library.materials.at("tantala-ibs")
                      .properties.at(materials::PropertyId::refractive_index)
                      .entry;
    index.wavelength = materials::Interval{1060e-9, 5e-6};
    const assess::Appraisal result = assess::appraise(read.design, library, {false, false, true});
    const assess::ReflectionBand& band = result.around->s_band.value();
    EXPECT_EQ(band.short_edge.state, EdgeState::beyond_data);
    EXPECT_EQ(band.short_edge.material, "tantala-ibs");
    EXPECT_NEAR(band.short_edge.wavelength / 1060e-9, 1.0, 2e-12);
    EXPECT_EQ(band.long_edge.state, EdgeState::found);
    EXPECT_EQ(band.long_edge.material, "");
    EXPECT_FALSE(band.centre || band.relative_half_width || band.centre_shift);
    // The edge on the other side is what it was.
    const assess::ReflectionBand whole = around(mirror_text(quarter_wave_pairs)).s_band.value();
    EXPECT_NEAR(band.long_edge.wavelength / whole.long_edge.wavelength, 1.0, 1e-9);
    // 1 % shorter is outside the data, 1 % longer is not.
    const auto& departures = result.around->departures;
    EXPECT_EQ(departures[0].missing.rfind("refractive index of tantala-ibs is known for", 0), 0u)
        << departures[0].missing;
    EXPECT_FALSE(departures[0].s || departures[0].mean);
    EXPECT_EQ(departures[1].missing, "");
    EXPECT_TRUE(departures[1].s);

    // The substrate's data count as well, and both sides can end.
    library.materials.at("fused-silica")
        .properties.at(materials::PropertyId::refractive_index)
        .entry.wavelength = materials::Interval{3e-7, 1070e-9};
    const assess::ReflectionBand narrow =
        assess::appraise(read.design, library, {false, false, true}).around->s_band.value();
    EXPECT_EQ(narrow.short_edge.material, "tantala-ibs");
    EXPECT_EQ(narrow.long_edge.state, EdgeState::beyond_data);
    EXPECT_EQ(narrow.long_edge.material, "fused-silica");
}

TEST(Neighbourhood, GivesNoBandForACoatingThatIsNoReflector) {
    const Neighbourhood result =
        around(mirror_text("[[coating.block]]\nlayers = [ { material = \"magnesium-fluoride-ibs\", "
                           "quarter_waves = 1 } ]\n",
                           "", "wavelength = \"1064 nm\"", "sapphire"));
    EXPECT_FALSE(result.s_band || result.p_band);
    EXPECT_LT(result.top_reflectance, 0.2);
    EXPECT_EQ(result.departures.size(), 3u);
}

TEST(Scope, LeavesOutWhatIsNotAskedForAndChangesNothingElse) {
    const auto read = test::read_design(cold_silicon);
    const assess::Appraisal all = assess::appraise(read.design, read.library);
    const assess::Appraisal some = assess::appraise(read.design, read.library, optics_only);
    EXPECT_TRUE(some.faces[0].field.empty());
    EXPECT_TRUE(some.faces[0].noise.terms.empty());
    EXPECT_FALSE(some.around);
    EXPECT_FALSE(all.faces[0].field.empty());
    EXPECT_FALSE(all.faces[0].noise.terms.empty());
    EXPECT_EQ(some.faces[0].response.loss, all.faces[0].response.loss);
    EXPECT_EQ(some.faces[0].energy_penetration_depth, all.faces[0].energy_penetration_depth);
    const assess::Appraisal noisy =
        assess::appraise(read.design, read.library, {false, true, false});
    EXPECT_EQ(noisy.faces[0].noise.total, all.faces[0].noise.total);
    EXPECT_EQ(noisy.warnings, all.warnings);
}

}  // namespace
