#include "stillcoat/noise/finite_mirror_estimate.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "stillcoat/core/errors.hpp"

namespace {

using namespace stillcoat::noise;

/// Fully stated cases, evaluated independently from the published sums (Bondu, Hello & Vinet 1998;
/// Liu & Thorne 2000) with the same approximation of the light at the rim; digits as printed there.
TEST(FiniteMirrorEstimate, ReproducesStatedCases) {
    const FiniteMirrorEstimate large =
        finite_mirror_estimate({72e9, 0.17}, {140e9, 0.23}, 0.17, 0.20, 0.06);
    EXPECT_NEAR(large.substrate_brownian, 0.671864, 5e-7);
    EXPECT_NEAR(large.substrate_thermo_elastic, 1.024480, 5e-7);
    EXPECT_NEAR(large.coating_brownian, 0.945597, 5e-7);
    const FiniteMirrorEstimate flat =
        finite_mirror_estimate({73e9, 0.17}, {140e9, 0.23}, 0.175, 0.10, 0.02);
    EXPECT_NEAR(flat.substrate_brownian, 1.07435670875551, 4e-15);  // the same sum with 30 digits
    EXPECT_NEAR(flat.substrate_thermo_elastic, 1.062623, 5e-7);
    EXPECT_NEAR(flat.coating_brownian, 1.246175, 5e-7);
    const FiniteMirrorEstimate sapphire =
        finite_mirror_estimate({4e11, 0.23}, {140e9, 0.23}, 0.14, 0.123, 0.04 * std::sqrt(2.0));
    EXPECT_NEAR(sapphire.substrate_brownian, 0.657565, 5e-7);
    EXPECT_NEAR(sapphire.substrate_thermo_elastic, 1.200436, 5e-7);
}

TEST(FiniteMirrorEstimate, TendsToTheHalfSpace) {
    const FiniteMirrorEstimate far =
        finite_mirror_estimate({72e9, 0.17}, {140e9, 0.23}, 1.0, 1.0, 0.002);
    EXPECT_NEAR(far.substrate_brownian, 1.0, 5e-3);
    EXPECT_NEAR(far.substrate_thermo_elastic, 1.0, 1e-4);
    EXPECT_NEAR(far.coating_brownian, 1.0, 1e-4);
}

TEST(FiniteMirrorEstimate, DependsOnRatiosOfLengthsOnly) {
    const FiniteMirrorEstimate one =
        finite_mirror_estimate({72e9, 0.17}, {140e9, 0.23}, 0.17, 0.20, 0.06);
    const FiniteMirrorEstimate other =
        finite_mirror_estimate({72e10, 0.17}, {140e10, 0.23}, 0.51, 0.60, 0.18);
    EXPECT_NEAR(one.substrate_brownian, other.substrate_brownian, 1e-15);
    EXPECT_NEAR(one.coating_brownian, other.coating_brownian, 1e-15);
}

TEST(FiniteMirrorEstimate, RefusesLengthsThatAreNotPositive) {
    EXPECT_THROW(finite_mirror_estimate({72e9, 0.17}, {140e9, 0.23}, 0.0, 0.2, 0.06),
                 stillcoat::core::DomainError);
}

}  // namespace
