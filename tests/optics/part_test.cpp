/// Laws and closed forms of the whole part.

#include "stillcoat/optics/part.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <limits>
#include <string>

#include "optics/stacks.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/core/errors.hpp"
#include "support/worst_error.hpp"

namespace stillcoat::optics {
namespace {

using test::relative_error;
using test::WorstError;

constexpr double infinity = std::numeric_limits<double>::infinity();

Part bare_plate(Complex index, double thickness) { return {1.0, {}, index, thickness, {}, 1.0}; }

/// Power reflectance of one bare surface, with angles.
double surface(double n, double angle, Polarisation polarisation) {
    const double c0 = std::cos(angle), c1 = std::cos(std::asin(std::sin(angle) / n));
    const double r = polarisation == Polarisation::s ? (c0 - n * c1) / (c0 + n * c1)
                                                     : (c1 - n * c0) / (c1 + n * c0);
    return r * r;
}

/// Layers on both faces, plate from clear to grey, any media that light can reach.
struct RandomPart {
    Part part;
    Illumination light;
};
RandomPart random_part(RandomStacks& random, double largest_extinction) {
    RandomPart drawn{
        {random.between(1.0, 1.3), {}, random.between(1.4, 3.5), 0.0, {}, random.between(1.3, 1.6)},
        random.light()};
    drawn.part.substrate_thickness = random.between(1e-3, 20e-3);
    for (int j = random.count_between(0, 12); j > 0; --j) {
        drawn.part.front_layers.push_back(
            {random.index(largest_extinction), random.between(0.0, 400e-9)});
    }
    for (int j = random.count_between(0, 12); j > 0; --j) {
        drawn.part.rear_layers.push_back(
            {random.index(largest_extinction), random.between(0.0, 400e-9)});
    }
    return drawn;
}

TEST(BarePlate, OfIntensitiesFollowsTheGeometricSeries) {
    for (const double n : {1.1, 1.45, 3.5}) {
        for (const double angle : {0.0, 0.5, 1.2}) {
            for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
                const double r = surface(n, angle, polarisation);
                const PartResponse found =
                    part_response(bare_plate(n, 5e-3), {wavelength_1064, angle, polarisation});
                EXPECT_NEAR(found.reflectance, 2.0 * r / (1.0 + r), 1e-14);
                EXPECT_LE(relative_error(found.transmittance, (1.0 - r) / (1.0 + r)), 1e-14);
                EXPECT_EQ(found.absorptance, 0.0);
                EXPECT_EQ(found.loss, found.transmittance);
            }
        }
    }
}

TEST(BarePlate, AbsorbingPlateFollowsTheSeriesSummedPassByPass) {
    const Complex n(1.5, 3e-6);
    const double thickness = 10e-3, angle = 0.7;
    for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
        const double r = surface(1.5, angle, polarisation);
        const double cosine = std::cos(std::asin(std::sin(angle) / 1.5));
        const double kept =
            std::exp(-4.0 * core::pi * n.imag() * thickness / (wavelength_1064 * cosine));
        double reflected = r, transmitted = 0.0, power = 1.0 - r;
        for (int pass = 0; pass < 200; ++pass) {
            power *= kept;
            (pass % 2 == 0 ? transmitted : reflected) += power * (1.0 - r);
            power *= r;
        }
        const PartResponse found =
            part_response(bare_plate(n, thickness), {wavelength_1064, angle, polarisation});
        // The exponent's weak-absorption form is right to (k/n)², the rest is rounding.
        EXPECT_NEAR(found.reflectance, reflected, 1e-12);
        EXPECT_NEAR(found.transmittance, transmitted, 1e-12);
        EXPECT_NEAR(found.log_internal_transmittance, std::log(kept), 1e-11);
        EXPECT_NEAR(found.substrate_absorptance, 1.0 - reflected - transmitted, 1e-12);
    }
}

TEST(BarePlate, OfAmplitudesFollowsAirysFormula) {
    const double n = 3.5;
    for (const double angle : {0.0, 0.6, 1.2}) {
        for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
            const double r = surface(n, angle, polarisation);
            const double cosine = std::cos(std::asin(std::sin(angle) / n));
            const double contrast = 4.0 * r / ((1.0 - r) * (1.0 - r));
            for (const double order : {50.0, 50.125, 50.25, 50.4, 50.5}) {
                const double thickness = order * wavelength_1064 / (2.0 * n * cosine);
                const double sine = std::sin(core::pi * order);
                const PartResponse found =
                    part_response(bare_plate(n, thickness), {wavelength_1064, angle, polarisation},
                                  Summation::amplitudes);
                EXPECT_NEAR(found.transmittance, 1.0 / (1.0 + contrast * sine * sine), 2e-13);
            }
            // Maximum 1 at whole orders, minimum (1 − r)²/(1 + r)² half-way between.
            const auto transmitted = [&](double order) {
                return part_response(bare_plate(n, order * wavelength_1064 / (2.0 * n * cosine)),
                                     {wavelength_1064, angle, polarisation}, Summation::amplitudes)
                    .transmittance;
            };
            EXPECT_NEAR(transmitted(7.0), 1.0, 1e-13);
            EXPECT_NEAR(transmitted(7.5), std::pow((1.0 - r) / (1.0 + r), 2), 1e-13);
        }
    }
}

/// Mean over plates whose thickness is spread evenly over one fringe, half a wavelength.
PartResponse fringe_mean(Part part, const Illumination& light, int samples) {
    const double n = part.substrate_index.real();
    const double sine = part.incident_index * std::sin(light.angle) / n;
    const double fringe = light.wavelength / (2.0 * n * std::cos(std::asin(sine)));
    const double start = part.substrate_thickness;
    PartResponse mean{};
    for (int j = 0; j < samples; ++j) {
        part.substrate_thickness = start + fringe * j / samples;
        const PartResponse one = part_response(part, light, Summation::amplitudes);
        mean.reflectance += one.reflectance / samples;
        mean.transmittance += one.transmittance / samples;
        mean.front_absorptance += one.front_absorptance / samples;
        mean.substrate_absorptance += one.substrate_absorptance / samples;
        mean.rear_absorptance += one.rear_absorptance / samples;
    }
    return mean;
}

TEST(FringeMean, OfALosslessPlateIsTheSumOfIntensities) {
    const std::uint32_t seed = 811;
    RandomStacks random(seed);
    WorstError worst;
    int compared = 0;
    for (int trial = 0; trial < 60; ++trial) {
        auto [part, light] = random_part(random, trial % 2 == 0 ? 0.0 : 0.3);
        part.substrate_thickness = random.between(20e-6, 60e-6);  // phase known to 1e-13
        const PartResponse sum = part_response(part, light);
        if (sum.log_transmittance == -infinity) continue;
        const FaceResponses faces = face_responses(part, light);
        // The mean of n samples misses the harmonics n, 2n, …, of order (r1 r2)^n.
        const double r1r2 =
            std::sqrt(faces.front_from_inside.reflectance * faces.rear_from_inside.reflectance);
        if (r1r2 > 0.9) continue;
        const int samples = 20 + static_cast<int>(std::log(1e-15) / std::log(r1r2));
        const PartResponse mean = fringe_mean(part, light, samples);
        const std::string where =
            "seed " + std::to_string(seed) + ", trial " + std::to_string(trial);
        for (const auto& [a, b] : {std::pair(mean.reflectance, sum.reflectance),
                                   std::pair(mean.transmittance, sum.transmittance),
                                   std::pair(mean.front_absorptance, sum.front_absorptance),
                                   std::pair(mean.rear_absorptance, sum.rear_absorptance)}) {
            EXPECT_NEAR(a, b, 1e-13) << where;
            worst.see(std::abs(a - b), where);
        }
        EXPECT_EQ(mean.substrate_absorptance, 0.0);
        ++compared;
    }
    EXPECT_GE(compared, 30);
    worst.print("mean over a fringe, absolute");
}

/// What taking the plate's index as real costs: of the order k/n, and proportional to it.
TEST(FringeMean, OfAnAbsorbingPlateDiffersByLessThanItsExtinction) {
    WorstError worst;
    for (const double k : {1e-6, 1e-5, 1e-4}) {
        Part part{1.0, quarter_wave_stack(2.07, 1.45, 6, 1.45).layers, Complex(1.45, k), 1e-3, {},
                  1.0};
        part.front_layers[2].thickness *= 1.3;
        part.rear_layers = {{1.9, 100e-9}};
        for (const double angle : {0.0, 0.8}) {
            for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
                const Illumination light{wavelength_1064, angle, polarisation};
                const PartResponse mean = fringe_mean(part, light, 100);
                const PartResponse sum = part_response(part, light);
                // Within one fringe the attenuation itself changes by about 2π k/n.
                const double scale = k / 1.45;
                for (const double error :
                     {std::abs(mean.reflectance - sum.reflectance),
                      std::abs(mean.transmittance - sum.transmittance),
                      std::abs(mean.substrate_absorptance - sum.substrate_absorptance)}) {
                    EXPECT_LE(error, 4.0 * scale);
                    worst.see(error / scale, "k " + std::to_string(k));
                }
            }
        }
    }
    worst.print("intensities with the plate's index taken as real, in units of k/n");
}

TEST(PartEnergy, AddsUpToOneAndSplitsIntoCoatingsAndPlate) {
    const std::uint32_t seed = 812;
    RandomStacks random(seed);
    WorstError worst;
    for (int trial = 0; trial < 600; ++trial) {
        auto [part, light] = random_part(random, 1.0);
        const double k = std::exp(random.between(std::log(1e-10), std::log(1e-4)));
        part.substrate_index.imag(trial % 3 == 0 ? 0.0 : k);
        for (const Summation summation : {Summation::intensities, Summation::amplitudes}) {
            const PartResponse found = part_response(part, light, summation);
            const double error = std::abs(found.reflectance + found.loss - 1.0);
            const std::string where = "trial " + std::to_string(trial);
            EXPECT_LE(error, 1e-13) << where;
            worst.see(error, where);
            EXPECT_EQ(found.loss, found.transmittance + found.absorptance);
            EXPECT_EQ(found.absorptance, found.front_absorptance + found.substrate_absorptance +
                                             found.rear_absorptance);
            double layers = 0.0;
            for (const double a : found.front_layer_absorptance) layers += a;
            EXPECT_EQ(found.front_absorptance, layers);
            EXPECT_GE(found.substrate_absorptance, 0.0);
            if (trial % 3 == 0) {
                EXPECT_EQ(found.substrate_absorptance, 0.0);
            }
        }
    }
    worst.print("R + T + A = 1 of a part, absolute");
}

TEST(PartReciprocity, TransmittanceIsTheSameFromBothSides) {
    const std::uint32_t seed = 813;
    RandomStacks random(seed);
    WorstError worst[2];
    int compared = 0;
    for (int trial = 0; trial < 600; ++trial) {
        auto [part, light] = random_part(random, 1.0);
        part.substrate_index.imag(std::exp(random.between(std::log(1e-10), std::log(1e-3))));
        if (part.incident_index * std::sin(light.angle) > 0.97 * part.rear_index) continue;
        const Part other = turned_around(part);
        const Illumination from_rear = light_from_rear(part, light);
        const double path = 2.0 * core::pi / light.wavelength * part.substrate_thickness * 3.5;
        for (const Summation summation : {Summation::intensities, Summation::amplitudes}) {
            const PartResponse forward = part_response(part, light, summation);
            const PartResponse backward = part_response(other, from_rear, summation);
            // The angle in the rear medium is rounded once; a thick plate multiplies that.
            const double tolerance = summation == Summation::intensities ? 1e-12 : 1e-15 * path;
            const double error = std::abs(forward.log_transmittance - backward.log_transmittance);
            EXPECT_LE(error, tolerance + 1e-14 * std::abs(forward.log_transmittance))
                << "seed " << seed << ", trial " << trial;
            worst[static_cast<int>(summation)].see(error, "trial " + std::to_string(trial));
            ++compared;
        }
    }
    EXPECT_GE(compared, 800);
    worst[0].print("ln T from both sides, intensities");
    worst[1].print("ln T from both sides, amplitudes");
}

TEST(TurnedAround, TwiceIsThePartItself) {
    RandomStacks random(814);
    const auto [part, light] = random_part(random, 0.1);
    const Part twice = turned_around(turned_around(part));
    EXPECT_EQ(part_response(part, light).reflectance, part_response(twice, light).reflectance);
    const Illumination back =
        light_from_rear(turned_around(part), light_from_rear(part, normal_light()));
    EXPECT_EQ(back.angle, 0.0);
    Part dense = part;
    dense.incident_index = 1.5;
    dense.rear_index = 1.0;
    EXPECT_THROW(light_from_rear(dense, {1e-6, 0.8, Polarisation::s}), core::DomainError);
    EXPECT_NEAR(light_from_rear(dense, {1e-6, 0.3, Polarisation::s}).angle,
                std::asin(1.5 * std::sin(0.3)), 1e-15);
}

/// T = T1 T2/(T1 + T2 − T1 T2): two equal lossless mirrors pass T1/(2 − T1), however good they are.
TEST(TwoMirrors, OfAnyQualityPassHalfOfWhatOnePasses) {
    for (const int pairs : {5, 20, 60, 120, 300}) {
        const OpticalStack mirror = quarter_wave_stack(2.07, 1.45, 2 * pairs, 1.45);
        Part part{1.0, mirror.layers, 1.45, 1e-3, {mirror.layers.rbegin(), mirror.layers.rend()},
                  1.0};
        const Response face = response(mirror, normal_light());
        const PartResponse found = part_response(part, normal_light());
        EXPECT_LE(
            relative_error(found.transmittance, face.transmittance / (2.0 - face.transmittance)),
            1e-12)
            << pairs;
        EXPECT_GT(found.transmittance, 0.0);
    }
}

/// T1 of 1e-620 is not a double; the logarithm must survive, and no 0/0 appear.
TEST(TwoMirrors, KeepTheLogarithmWhereEachOneUnderflows) {
    Part part{1.8, {{1.0, 120e-6}}, 1.75, 1e-3, {{1.0, 150e-6}}, 1.8};
    const Illumination light{wavelength_1064, 1.1, Polarisation::s};
    const FaceResponses faces = face_responses(part, light);
    ASSERT_EQ(faces.front.transmittance, 0.0);
    ASSERT_EQ(faces.rear_from_inside.transmittance, 0.0);
    const PartResponse found = part_response(part, light);
    // The better face limits: T = T1 T2/(T1 + T2), T2 ≪ T1.
    EXPECT_LE(relative_error(found.log_transmittance, faces.rear_from_inside.log_transmittance),
              1e-13);
    EXPECT_EQ(found.transmittance, 0.0);
    EXPECT_EQ(found.loss, 0.0);
    EXPECT_NEAR(found.reflectance, 1.0, 1e-14);
    // With an absorbing plate of the same shape nothing is divided by zero either.
    part.substrate_index.imag(1e-9);
    const PartResponse grey = part_response(part, light);
    EXPECT_LT(grey.log_transmittance, found.log_transmittance);
    EXPECT_EQ(grey.loss, 0.0);
}

TEST(OpaquePlate, ReflectsAsItsFrontFaceAndKeepsTheLogarithmOfT) {
    const OpticalStack coating = quarter_wave_stack(2.07, 1.45, 6, {0.2, 6.7});
    const Part metal{1.0, coating.layers, {0.2, 6.7}, 5e-3, {}, 1.0};
    const Response face = response(coating, normal_light());
    const PartResponse found = part_response(metal, normal_light());
    EXPECT_NEAR(found.reflectance, face.reflectance, 1e-14);
    EXPECT_LE(relative_error(found.substrate_absorptance, face.transmittance), 1e-11);
    EXPECT_EQ(found.transmittance, 0.0);
    EXPECT_TRUE(std::isfinite(found.log_transmittance));
    EXPECT_NEAR(found.log_transmittance / found.log_internal_transmittance, 1.0, 1e-4);
}

/// Just above and below ln τ = −40 the two ways differ by k/n at most.
TEST(OpaquePlate, HasNoStepBeyondTheOrderOfItsExtinction) {
    const double k = 4e-4;
    Part part{1.0, quarter_wave_stack(2.07, 1.45, 7, 1.5).layers, {1.5, k}, 0.0, {}, 1.0};
    const double limit = 40.0 * wavelength_1064 / (4.0 * core::pi * k);
    part.substrate_thickness = limit * (1.0 - 1e-6);
    const PartResponse below = part_response(part, normal_light());
    part.substrate_thickness = limit * (1.0 + 1e-6);
    const PartResponse above = part_response(part, normal_light());
    EXPECT_NEAR(above.reflectance, below.reflectance, k / 1.5);
    EXPECT_NEAR(above.log_transmittance, below.log_transmittance, 2e-4 + 2.0 * k / 1.5);
    EXPECT_NE(above.reflectance, below.reflectance);
}

TEST(TotalReflection, AtTheRearFaceLosesOnlyWhatAbsorbs) {
    const Part clear{1.45, {}, 1.5, 2e-3, {{1.38, 200e-9}}, 1.0};
    for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
        const Illumination light{wavelength_1064, 1.0, polarisation};
        EXPECT_EQ(face_responses(clear, light).rear_from_inside.loss, 0.0);
        const PartResponse found = part_response(clear, light);
        EXPECT_EQ(found.loss, 0.0);
        EXPECT_EQ(found.log_transmittance, -infinity);
        EXPECT_NEAR(found.reflectance, 1.0, 1e-14);
        EXPECT_THROW(light_from_rear(clear, light), core::DomainError);
        Part grey = clear;
        grey.substrate_index.imag(1e-8);
        const PartResponse absorbing = part_response(grey, light);
        EXPECT_GT(absorbing.substrate_absorptance, 0.0);
        EXPECT_EQ(absorbing.loss, absorbing.substrate_absorptance);
    }
}

TEST(FaceFromInside, PassesAsMuchAsFromOutside) {
    RandomStacks random(815);
    for (int trial = 0; trial < 200; ++trial) {
        const auto [part, light] = random_part(random, 0.5);
        const FaceResponses faces = face_responses(part, light);
        EXPECT_NEAR(faces.front.log_transmittance, faces.front_from_inside.log_transmittance,
                    1e-11);
        EXPECT_NEAR(faces.front_from_inside.reflectance + faces.front_from_inside.loss, 1.0, 1e-13);
    }
}

TEST(PartValidity, RefusesWhatTheSumOfIntensitiesDoesNotHoldFor) {
    const Illumination light = normal_light();
    // Strong absorption in a film so thin that light comes through.
    EXPECT_THROW(part_response(bare_plate({1.5, 0.05}, 20e-6), light), core::DomainError);
    EXPECT_NO_THROW(part_response(bare_plate({1.5, 0.05}, 20e-6), light, Summation::amplitudes));
    EXPECT_THROW(face_responses(bare_plate({0.2, 6.7}, 1e-3), light), core::DomainError);
    // Beyond the critical angle of a thin plate: frustrated total reflection, not rays.
    const Part gap{1.5, {}, 1.0, 1e-6, {}, 1.5};
    EXPECT_THROW(part_response(gap, {1e-6, 0.9, Polarisation::s}), core::DomainError);
    EXPECT_GT(part_response(gap, {1e-6, 0.9, Polarisation::s}, Summation::amplitudes).transmittance,
              0.0);
    for (const double thickness : {0.0, -1e-3, infinity, std::nan(""), 1e5}) {
        for (const Summation summation : {Summation::intensities, Summation::amplitudes}) {
            EXPECT_THROW(part_response(bare_plate(1.5, thickness), light, summation),
                         core::DomainError);
        }
    }
    Part part = bare_plate(1.5, 1e-3);
    part.rear_index = -1.0;
    EXPECT_THROW(part_response(part, light), core::DomainError);
}

}  // namespace
}  // namespace stillcoat::optics
