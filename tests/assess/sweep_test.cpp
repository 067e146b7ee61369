#include "stillcoat/assess/sweep.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "stillcoat/core/constants.hpp"
#include "support/written_design.hpp"

namespace {

using namespace stillcoat;
using assess::SweepPlan;
using test::mirror_text;
using test::quarter_wave_pairs;
using Rows = std::vector<std::optional<assess::SweepRow>>;

const std::string oblique_light =
    "wavelength = \"1064 nm\"\nangle = \"0 deg\"\npolarisation = \"unpolarised\"";

SweepPlan plan_of(const test::ReadDesign& read, const std::vector<std::string>& over,
                  const std::vector<std::string>& show) {
    SweepPlan plan;
    for (const std::string& text : over) {
        plan.axes.push_back(assess::read_axis(text, read.design, read.library));
    }
    plan.outcomes = assess::chosen_outcomes(read.design, show, plan.axes);
    plan.frequency = 100.0;
    return plan;
}

Rows swept(const test::ReadDesign& read, const SweepPlan& plan) {
    Rows rows(plan.size());
    EXPECT_TRUE(
        assess::run_sweep(read.design, read.library, plan, rows, [](std::size_t) { return true; }));
    return rows;
}

std::string refusal(const std::string& axis) {
    const auto read = test::read_design(mirror_text(quarter_wave_pairs));
    try {
        assess::read_axis(axis, read.design, read.library);
    } catch (const core::InputError& error) {
        return error.problems().front().message;
    }
    return "accepted";
}

/// What an appraisal of a changed design says of the same.
assess::Appraisal appraised(const test::ReadDesign& read) {
    return assess::appraise(read.design, read.library);
}

TEST(Sweep, StepsEvenlyOrInTheLogarithm) {
    const auto read = test::read_design(mirror_text(quarter_wave_pairs));
    const auto even = assess::read_axis("wavelength=900nm:1.3um:5", read.design, read.library);
    const std::vector<double> expected{900e-9, 1000e-9, 1100e-9, 1200e-9, 1300e-9};
    ASSERT_EQ(even.values.size(), 5u);
    for (std::size_t i = 0; i < 5; ++i) EXPECT_DOUBLE_EQ(even.values[i], expected[i]);
    const auto log = assess::read_axis("frequency=1Hz:10kHz:5:log", read.design, read.library);
    EXPECT_EQ(log.values, (std::vector<double>{1.0, 10.0, 100.0, 1000.0, 10000.0}));
}

TEST(Sweep, GivesWhatAnAppraisalOfEachChangedDesignGives) {
    const auto read = test::read_design(mirror_text(quarter_wave_pairs));
    const SweepPlan plan =
        plan_of(read, {"wavelength=1000nm:1100nm:3", "beam_radius=1mm:9cm:2"},
                {"transmittance", "loss", "group_delay_s", "total_psd_m2_per_Hz"});
    const Rows rows = swept(read, plan);
    ASSERT_EQ(rows.size(), 6u);
    for (std::size_t point = 0; point < 6; ++point) {
        test::ReadDesign changed = read;
        changed.design.light.wavelength = plan.value(0, point);
        changed.design.beam_radius = plan.value(1, point);
        EXPECT_EQ(plan.value(1, point), point % 2 == 0 ? 1e-3 : 9e-2);
        const assess::Appraisal one = appraised(changed);
        const assess::Face& face = one.faces[0];
        EXPECT_EQ(rows[point]->values[0], face.response.transmittance);
        EXPECT_EQ(rows[point]->values[1], face.response.loss);
        EXPECT_EQ(rows[point]->values[2], face.phase->group_delay);
        EXPECT_EQ(rows[point]->values[3], face.noise.spot_total[2]);
        EXPECT_EQ(rows[point]->lack, "");
    }
}

TEST(Sweep, VariesLayersMaterialsAndTheirProperties) {
    const auto read = test::read_design(mirror_text(quarter_wave_pairs));
    const Rows layer =
        swept(read, plan_of(read, {"layer.2=100nm:200nm:2"}, {"coating_thickness_m"}));
    EXPECT_NEAR(*layer[1]->values[0] - *layer[0]->values[0], 100e-9, 1e-18);
    const Rows factor =
        swept(read, plan_of(read, {"tantala-ibs.thickness=1:2:2"}, {"coating_thickness_m"}));
    double tantala = 0.0;
    for (const stack::MirrorLayer& one : appraised(read).mirror.layers) {
        if (one.material == "tantala-ibs") tantala += one.thickness;
    }
    EXPECT_NEAR(*factor[1]->values[0] - *factor[0]->values[0], tantala, 1e-17);
    // Brownian noise of the substrate goes with its loss; twice the loss, twice the power.
    const Rows loss = swept(read, plan_of(read, {"fused-silica.loss_angle=1e-8:2e-8:2"},
                                          {"substrate_brownian_psd_m2_per_Hz"}));
    EXPECT_NEAR(*loss[1]->values[0] / *loss[0]->values[0], 2.0, 1e-13);
    // The library itself stays as it was.
    const auto loss_now = [&] {
        return *materials::evaluate(read.library, "fused-silica", materials::PropertyId::loss_angle,
                                    {295.0, 1064e-9, 100.0})
                    .number;
    };
    EXPECT_NE(loss_now(), 1e-8);
    EXPECT_NE(loss_now(), 2e-8);
}

TEST(Sweep, OverAnglesShowsBothPolarisationsAndTheirMean) {
    const auto read = test::read_design(mirror_text(quarter_wave_pairs, "", oblique_light));
    const SweepPlan plan = plan_of(read, {"angle=0deg:60deg:3"},
                                   {"transmittance", "transmittance_s", "transmittance_p"});
    const Rows rows = swept(read, plan);
    EXPECT_EQ(rows[0]->values[1], rows[0]->values[2]);
    for (const auto& row : rows) {
        EXPECT_DOUBLE_EQ(*row->values[0], 0.5 * (*row->values[1] + *row->values[2]));
    }
    EXPECT_GT(*rows[2]->values[2], *rows[2]->values[1]);
    EXPECT_EQ(refusal("angle=0deg:60deg:3"), "--over angle: the design states no polarisation");
}

TEST(Sweep, ShowsTheWholePartAndVariesBothItsCoatings) {
    const std::string part =
        "[rear_face]\n[[rear_face.block]]\nlayers = [ { material = \"silica-ibs\", quarter_waves = "
        "1 "
        "} ]\n";
    std::string text = mirror_text(quarter_wave_pairs, part);
    const std::string body = "[mirror]\n";
    text.insert(text.find(body) + body.size(), "diameter = \"5 cm\"\nthickness = \"1 cm\"\n");
    const auto read = test::read_design(text);
    const Rows rows =
        swept(read, plan_of(read, {"silica-ibs.thickness=0.9:1.1:3"},
                            {"part_reflectance", "part_transmittance", "reflectance"}));
    for (std::size_t i = 0; i < 3; ++i) {
        test::ReadDesign changed = read;
        const double factor = 0.9 + 0.1 * static_cast<double>(i);
        for (auto* layers : {&changed.design.coating.layers, &changed.design.rear_face->layers}) {
            for (stack::LayerInput& layer : *layers) {
                if (layer.material == "silica-ibs") *layer.quarter_waves *= factor;
            }
        }
        const assess::Appraisal one = appraised(changed);
        ASSERT_TRUE(one.part.at(0).response.has_value());
        EXPECT_NEAR(*rows[i]->values[0], one.part[0].response->reflectance, 1e-12);
        EXPECT_NEAR(*rows[i]->values[1] / one.part[0].response->transmittance, 1.0, 1e-9);
    }
    EXPECT_NE(rows[0]->values[0], rows[0]->values[2]);
    const auto without = test::read_design(mirror_text(quarter_wave_pairs));
    EXPECT_THROW(assess::chosen_outcomes(without.design, {"part_reflectance"}, {}),
                 core::InputError);
}

TEST(Sweep, LeavesOutWhatIsNotKnownAndSaysWhy) {
    const auto read = test::read_design(mirror_text(quarter_wave_pairs));
    const Rows rows = swept(read, plan_of(read, {"wavelength=1064nm:30um:2"}, {"transmittance"}));
    EXPECT_TRUE(rows[0]->values[0].has_value());
    EXPECT_FALSE(rows[1]->values[0].has_value());
    EXPECT_NE(rows[1]->lack.find("nm only"), std::string::npos) << rows[1]->lack;
    const Rows hot =
        swept(read, plan_of(read, {"temperature=295K:500K:2"}, {"loss", "total_psd_m2_per_Hz"}));
    EXPECT_FALSE(hot[1]->values[1].has_value());
    EXPECT_FALSE(hot[1]->lack.empty());
}

TEST(Sweep, StopsWhenAskedAndGoesOnFromThere) {
    const auto read = test::read_design(mirror_text(quarter_wave_pairs));
    const SweepPlan plan = plan_of(read, {"wavelength=900nm:1300nm:3000"}, {"loss"});
    Rows rows(plan.size());
    EXPECT_FALSE(assess::run_sweep(read.design, read.library, plan, rows,
                                   [](std::size_t) { return false; }));
    // A row that is there stays, even a wrong one: nothing is computed twice.
    rows[7] = assess::SweepRow{{-1.0}, "kept"};
    EXPECT_TRUE(
        assess::run_sweep(read.design, read.library, plan, rows, [](std::size_t) { return true; }));
    const Rows fresh = swept(read, plan);
    for (std::size_t point = 0; point < rows.size(); ++point) {
        ASSERT_TRUE(rows[point].has_value());
        if (point == 7) continue;
        EXPECT_EQ(rows[point]->values, fresh[point]->values) << point;
    }
    EXPECT_EQ(rows[7]->lack, "kept");
}

TEST(Sweep, RefusesAxesThatMeanNothing) {
    EXPECT_EQ(refusal("wavelength"), "--over: \"wavelength\" is no NAME=FROM:TO:COUNT");
    EXPECT_EQ(refusal("wavelength=1um:2um"),
              "--over: \"wavelength=1um:2um\" is no NAME=FROM:TO:COUNT");
    EXPECT_EQ(refusal("colour=1um:2um:3"), "--over: unknown quantity \"colour\"");
    EXPECT_EQ(refusal("layer.21=1nm:2nm:3"), "--over: there is no layer \"21\"");
    EXPECT_EQ(refusal("layer.0=1nm:2nm:3"), "--over: there is no layer \"0\"");
    EXPECT_EQ(refusal("wavelength=1um:2um:1"), "--over wavelength: \"1\" is no number of points");
    EXPECT_EQ(refusal("wavelength=1um:1000nm:5"),
              "--over wavelength: it begins and ends at the same value");
    EXPECT_EQ(refusal("wavelength=1um:2K:5"), "--over wavelength: \"K\" is not a unit of length");
    EXPECT_EQ(refusal("temperature=-5K:5K:3"), "--over temperature: \"-5K\" is out of range");
    EXPECT_EQ(refusal("silica-ibs.thermo_optic_coefficient=-1e-5 1/K:1e-5 1/K:3:log"),
              "--over silica-ibs.thermo_optic_coefficient: a logarithm needs ends above 0");
    EXPECT_EQ(refusal("silica-ibs.loss_angle_bulk=1e-5:2e-5:3"),
              "--over: silica-ibs has one loss angle for bulk and shear");
    const auto read = test::read_design(mirror_text(quarter_wave_pairs));
    EXPECT_THROW(assess::chosen_outcomes(read.design, {"reflectanse"}, {}), core::InputError);
}

}  // namespace
