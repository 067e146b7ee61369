#include "stillcoat/noise/elastic.hpp"

#include "noise/limits.hpp"
#include "stillcoat/core/errors.hpp"

namespace stillcoat::noise {
namespace {

constexpr char source[] = "Landau & Lifshitz, Theory of Elasticity, sect. 5";

}  // namespace

void validate(const Elastic& elastic) {
    require_positive(elastic.youngs_modulus, "Young's modulus", "Pa", source);
    if (!(elastic.poisson_ratio > -1.0 && elastic.poisson_ratio < 0.5)) {
        throw core::DomainError("Poisson ratio", elastic.poisson_ratio, "1",
                                "greater than -1 and less than 0.5", source);
    }
}

double lame_lambda(const Elastic& elastic) {
    const double nu = elastic.poisson_ratio;
    return elastic.youngs_modulus * nu / ((1.0 + nu) * (1.0 - 2.0 * nu));
}

double shear_modulus(const Elastic& elastic) {
    return elastic.youngs_modulus / (2.0 * (1.0 + elastic.poisson_ratio));
}

double bulk_modulus(const Elastic& elastic) {
    return elastic.youngs_modulus / (3.0 * (1.0 - 2.0 * elastic.poisson_ratio));
}

double p_wave_modulus(const Elastic& elastic) {
    const double nu = elastic.poisson_ratio;
    return elastic.youngs_modulus * (1.0 - nu) / ((1.0 + nu) * (1.0 - 2.0 * nu));
}

double face_dilatation(const Elastic& substrate) {
    const double nu = substrate.poisson_ratio;
    return (1.0 + nu) * (1.0 - 2.0 * nu) / substrate.youngs_modulus;
}

}  // namespace stillcoat::noise
