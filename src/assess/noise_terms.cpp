#include <fmt/format.h>

#include "assess/noise_model.hpp"

/// What the terms are called and what they rest on.

namespace stillcoat::assess {
namespace {

NoiseTerm named(const std::string& key, const std::string& title, const std::string& source,
                const std::string& missing) {
    NoiseTerm term;
    term.key = key;
    term.title = title;
    term.source = source;
    term.missing = missing;
    return term;
}

}  // namespace

std::vector<NoiseTerm> NoiseModel::terms() const {
    std::vector<NoiseTerm> list{
        named("coating_brownian", "coating Brownian",
              "thin film on a half-space with light penetration and photoelasticity, bulk and "
              "shear loss: "
              "Hong et al., Phys. Rev. D 87, 082001 (2013); leaves out the ratio of thickness to "
              "beam",
              brownian_missing_),
        named("thermal_coherent", "thermal, all coherent",
              "one heat equation for coating and substrate, expansion and refraction coherent: "
              "Evans et al., "
              "Phys. Rev. D 78, 102003 (2008) with Levin, Phys. Lett. A 372, 1941 (2008)",
              refraction_missing_),
        named("substrate_brownian", "substrate Brownian",
              "half-space: Bondu, Hello & Vinet, Phys. Lett. A 246, 227 (1998); leaves out surface "
              "loss",
              substrate_brownian_missing_)};
    // Without dn/dT the expansion alone is still known, and without the coating's data the
    // substrate's.
    if (!refraction_missing_.empty() && substrate_thermal_.value) {
        NoiseTerm part =
            expansion_missing_.empty()
                ? named("thermo_elastic_with_substrate", "thermo-elastic alone",
                        "as the coherent term, without dn/dT", "")
                : named("substrate_thermo_elastic", "substrate thermo-elastic",
                        "bare half-space: Cerdonio et al., Phys. Rev. D 63, 082003 (2001)", "");
        list.push_back(std::move(part));
    }
    for (NoiseTerm& term : list) term.in_total = term.missing.empty();
    return list;
}

std::vector<NoiseTerm> NoiseModel::comparisons() const {
    const std::string heat =
        "parts of the coherent heat equation; they interfere and are not to be added";
    return {
        named("coating_brownian_bulk", "coating Brownian, bulk part", "", brownian_missing_),
        named("coating_brownian_shear", "coating Brownian, shear part", "", brownian_missing_),
        named("coating_brownian_at_face", "coating Brownian, light kept at the face",
              "g = 1: Harry et al., Class. Quantum Grav. 19, 897 (2002) with equal losses",
              brownian_missing_),
        named("coating_thermo_elastic", "coating thermo-elastic alone", heat, expansion_missing_),
        named("coating_thermo_refractive", "coating thermo-refractive alone", heat,
              refraction_missing_),
        named("coating_coherent", "coating thermo-optic, coherent", heat, refraction_missing_),
        named("bare_substrate_thermo_elastic", "substrate thermo-elastic, bare",
              "Cerdonio et al., Phys. Rev. D 63, 082003 (2001)", substrate_thermal_.missing),
        named("classic_thermo_optic", "coating thermo-optic, classic form",
              "Evans et al., Phys. Rev. D 78, 102003 (2008): the substrate's share at the "
              "coating's heat capacity subtracted, layer strain without substrate bending",
              refraction_missing_),
        named("transmitted_thermo_refractive", "light crossing the substrate once",
              "optical path: Braginsky & Vyatchanin, Phys. Lett. A 324, 345 (2004)", path_missing_),
        named("transmitted_standing_wave", "its standing-wave part",
              "Benthem & Levin, Phys. Rev. D 80, 062004 (2009)", path_missing_),
        named("free_mass_quantum_limit",
              mass_.value ? fmt::format("quantum limit of a free mass of {:.3g} kg", *mass_.value)
                          : "quantum limit of the free mass",
              "a reference curve, not a noise of the mirror: Kimble et al., Phys. Rev. D 65, "
              "022002 (2001)",
              mass_.missing),
    };
}

}  // namespace stillcoat::assess
