#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "assess/sweep_outcomes.hpp"
#include "stillcoat/assess/sweep.hpp"

/// What a sweep can show of a mirror.

namespace stillcoat::assess {
namespace {

using Getter = std::optional<double> (*)(const Face&);

/// A result of one face.
struct FaceResult {
    const char* key;
    const char* title;
    const char* unit;
    Getter get;
    bool has_mean;  ///< a power: the mean of s and p is that of unpolarised light
};

double sum(const std::vector<double>& list) {
    double total = 0.0;
    for (const double value : list) total += value;
    return total;
}

const FaceResult face_results[] = {
    {"reflectance", "reflectance", "1",
     [](const Face& f) { return std::optional(f.response.reflectance); }, true},
    {"transmittance", "transmittance", "1",
     [](const Face& f) { return std::optional(f.response.transmittance); }, true},
    {"absorptance", "absorptance", "1",
     [](const Face& f) { return std::optional(f.response.absorptance); }, true},
    {"loss", "1 − reflectance", "1", [](const Face& f) { return std::optional(f.response.loss); },
     true},
    {"reflection_phase_rad", "reflection phase", "rad",
     [](const Face& f) {
         return f.phase ? std::optional(f.phase->reflection_phase) : std::nullopt;
     },
     false},
    {"group_delay_s", "group delay", "s",
     [](const Face& f) { return f.phase ? std::optional(f.phase->group_delay) : std::nullopt; },
     false},
    {"group_delay_dispersion_s2", "group delay dispersion", "s²",
     [](const Face& f) {
         return f.phase ? std::optional(f.phase->group_delay_dispersion) : std::nullopt;
     },
     false},
    {"stored_energy_J_per_W", "stored energy", "J/W",
     [](const Face& f) { return std::optional(sum(f.stored_energy)); }, false},
    {"energy_penetration_depth_m", "energy penetration depth", "m",
     [](const Face& f) { return std::optional(f.energy_penetration_depth); }, false},
    {"face_intensity_ratio", "|E|² at the face", "1",
     [](const Face& f) { return std::optional(f.face_intensity); }, false},
    {"peak_intensity_ratio", "largest |E|² in the coating", "1",
     [](const Face& f) {
         return std::optional(*std::max_element(f.peak_intensity.begin(), f.peak_intensity.end()));
     },
     false},
};

/// Noise terms by their keys, as the appraisal names them.
struct NoiseResult {
    const char* term;  ///< null: the total
    const char* title;
};
const NoiseResult noise_results[] = {
    {nullptr, "sum (as power)"},
    {"coating_brownian", "coating Brownian"},
    {"thermal_coherent", "thermal, all coherent"},
    {"substrate_brownian", "substrate Brownian"},
    {"coating_brownian_bulk", "coating Brownian, bulk part"},
    {"coating_brownian_shear", "coating Brownian, shear part"},
    {"coating_thermo_elastic", "coating thermo-elastic alone"},
    {"coating_thermo_refractive", "coating thermo-refractive alone"},
    {"coating_coherent", "coating thermo-optic, coherent"},
    {"bare_substrate_thermo_elastic", "substrate thermo-elastic, bare"},
};

std::string noise_key(const NoiseResult& result) {
    return fmt::format("{}_psd_m2_per_Hz", result.term == nullptr ? "total" : result.term);
}

std::optional<double> noise_value(const NoiseResult& result, const Noise& noise) {
    if (result.term == nullptr) {
        // A sum without one of its terms would jump where that term is lost.
        return noise.complete ? std::optional(noise.spot_total[0]) : std::nullopt;
    }
    for (const auto* group : {&noise.terms, &noise.comparisons}) {
        for (const NoiseTerm& term : *group) {
            if (term.key == result.term && !term.spot_psd.empty()) return term.spot_psd[0];
        }
    }
    return std::nullopt;
}

bool two_faces(const stack::Design& design) {
    return design.light.polarisation == stack::PolarisationChoice::unpolarised;
}

/// Calls `each` with the ending of a key, its words and the face: once, or for s and p.
template <typename Each>
void for_faces(const stack::Design& design, Each&& each) {
    if (!two_faces(design)) {
        each("", "", std::size_t{0});
        return;
    }
    each("_s", ", s", std::size_t{0});
    each("_p", ", p", std::size_t{1});
}

/// A result of the whole part, which a design with a rear face has.
struct PartResult {
    const char* key;
    const char* title;
    double optics::PartResponse::*member;
    bool needs_absorption;
};
const PartResult part_results[] = {
    {"part_reflectance", "reflectance of the whole part", &optics::PartResponse::reflectance,
     false},
    {"part_transmittance", "transmittance of the whole part", &optics::PartResponse::transmittance,
     false},
    {"part_absorptance", "absorptance of the whole part", &optics::PartResponse::absorptance, true},
};

std::optional<double> part_value(const PartResult& result, const Appraisal& appraisal,
                                 std::size_t wanted) {
    if (appraisal.part.empty()) return std::nullopt;
    const PartView& view = appraisal.part[std::min(wanted, appraisal.part.size() - 1)];
    if (!view.response || (result.needs_absorption && !view.absorptance_missing.empty())) {
        return std::nullopt;
    }
    return (*view.response).*result.member;
}

/// At normal incidence one face stands for both.
const Face& face_of(const Appraisal& appraisal, std::size_t wanted) {
    return appraisal.faces[std::min(wanted, appraisal.faces.size() - 1)];
}

/// Every outcome of a design with the way to its value.
struct Source {
    Outcome outcome;
    std::function<std::optional<double>(const Appraisal&)> get;
};
std::vector<Source> sources(const stack::Design& design) {
    std::vector<Source> list;
    for (const FaceResult& result : face_results) {
        if (two_faces(design) && result.has_mean) {
            list.push_back(
                {{result.key, std::string(result.title) + ", mean of s and p", result.unit, false},
                 [get = result.get](const Appraisal& a) {
                     return std::optional(0.5 * (*get(face_of(a, 0)) + *get(face_of(a, 1))));
                 }});
        }
        for_faces(design, [&](const char* ending, const char* words, std::size_t face) {
            list.push_back(
                {{std::string(result.key) + ending, std::string(result.title) + words, result.unit,
                  false},
                 [get = result.get, face](const Appraisal& a) { return get(face_of(a, face)); }});
        });
    }
    if (design.rear_face) {
        for (const PartResult& result : part_results) {
            for_faces(design, [&](const char* ending, const char* words, std::size_t face) {
                list.push_back(
                    {{std::string(result.key) + ending, std::string(result.title) + words, "1",
                      false},
                     [&result, face](const Appraisal& a) { return part_value(result, a, face); }});
            });
        }
    }
    list.push_back({{"coating_thickness_m", "thickness of the coating", "m", false},
                    [](const Appraisal& a) { return std::optional(a.mirror.coating_thickness); }});
    for (const NoiseResult& result : noise_results) {
        for_faces(design, [&](const char* ending, const char* words, std::size_t face) {
            list.push_back(
                {{noise_key(result) + ending, std::string(result.title) + words, "m²/Hz", true},
                 [&result, face](const Appraisal& a) {
                     return noise_value(result, face_of(a, face).noise);
                 }});
        });
    }
    return list;
}

/// The keys that suit what varies: powers for a spectrum, noise for what changes noise.
std::vector<std::string> suitable_keys(const stack::Design& design,
                                       const std::vector<SweepAxis>& axes) {
    const auto is_axis = [&](const char* name) {
        return std::any_of(axes.begin(), axes.end(),
                           [&](const SweepAxis& axis) { return axis.name == name; });
    };
    std::vector<std::string> keys;
    const bool frequency = is_axis("frequency");
    if (!frequency) keys = {"reflectance", "transmittance", "absorptance"};
    if (!frequency && (is_axis("wavelength") || is_axis("angle"))) return keys;
    // What moves the mirror but not the light: beam, elasticity, heat, losses.
    const bool dark = std::all_of(axes.begin(), axes.end(), [](const SweepAxis& axis) {
        const auto property =
            materials::property_by_key(axis.name.substr(axis.name.rfind('.') + 1));
        return axis.name == "beam_radius" ||
               (property && *property != materials::PropertyId::refractive_index &&
                *property != materials::PropertyId::extinction_coefficient &&
                *property != materials::PropertyId::absorption_coefficient);
    });
    if (dark) keys.clear();
    if (is_axis("temperature")) keys = {"transmittance"};
    for_faces(design, [&](const char* ending, const char*, std::size_t) {
        for (const NoiseResult& result : noise_results) {
            const bool first = result.term == nullptr;
            const bool main_term = &result < &noise_results[4];
            if (first || (frequency && main_term)) keys.push_back(noise_key(result) + ending);
        }
    });
    return keys;
}

}  // namespace

std::vector<Outcome> outcomes(const stack::Design& design) {
    std::vector<Outcome> list;
    for (Source& source : sources(design)) list.push_back(std::move(source.outcome));
    return list;
}

std::vector<Outcome> chosen_outcomes(const stack::Design& design,
                                     const std::vector<std::string>& keys,
                                     const std::vector<SweepAxis>& axes) {
    const std::vector<Outcome> known = outcomes(design);
    std::vector<std::string> names;
    for (const Outcome& outcome : known) names.push_back(outcome.key);
    std::vector<Outcome> chosen;
    for (const std::string& key : keys.empty() ? suitable_keys(design, axes) : keys) {
        const auto found = std::find(names.begin(), names.end(), key);
        if (found == names.end()) {
            const auto near = core::nearest_spelling(key, names);
            throw core::InputError(fmt::format("--show: unknown result \"{}\"", key),
                                   near ? fmt::format("did you mean {}?", *near)
                                        : fmt::format("known: {}", fmt::join(names, ", ")));
        }
        const bool twice = std::any_of(chosen.begin(), chosen.end(),
                                       [&](const Outcome& other) { return other.key == key; });
        if (twice) throw core::InputError(fmt::format("--show: {} stands twice", key), "");
        chosen.push_back(known[static_cast<std::size_t>(found - names.begin())]);
    }
    return chosen;
}

std::vector<std::optional<double>> outcome_values(const stack::Design& design,
                                                  const Appraisal& appraisal,
                                                  const std::vector<Outcome>& wanted) {
    const std::vector<Source> known = sources(design);
    std::vector<std::optional<double>> values;
    for (const Outcome& outcome : wanted) {
        const auto source = std::find_if(known.begin(), known.end(), [&](const Source& candidate) {
            return candidate.outcome.key == outcome.key;
        });
        std::optional<double> value = source->get(appraisal);
        if (value && !std::isfinite(*value)) value.reset();
        values.push_back(value);
    }
    return values;
}

}  // namespace stillcoat::assess
