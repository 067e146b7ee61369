#include "stillcoat/assess/appraisal.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <set>

#include "assess/noise_assembly.hpp"
#include "assess/noise_validity.hpp"
#include "assess/optical_view.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/optics/standing_wave.hpp"

namespace stillcoat::assess {
namespace {

using materials::PropertyId;

std::vector<FieldSample> field_profile(const stack::Mirror& mirror,
                                       const optics::StandingWave& wave) {
    constexpr int samples_per_layer = 24;
    std::vector<FieldSample> field;
    double top = 0.0;
    for (std::size_t j = 0; j < mirror.layers.size(); ++j) {
        const stack::MirrorLayer& layer = mirror.layers[j];
        for (int i = 0; i <= samples_per_layer; ++i) {
            const double depth = std::min(layer.thickness, layer.thickness * i / samples_per_layer);
            field.push_back({top + depth, j, layer.optical.index.value,
                             optics::relative_intensity(wave, j, depth)});
        }
        top += layer.thickness;
    }
    return field;
}

Face face_optics(const stack::Mirror& mirror, const optics::Illumination& light,
                 const Scope& scope) {
    Face face{};
    face.polarisation = light.polarisation;
    const optics::OpticalStack stack = optical_stack(mirror);
    face.response = optics::response(stack, light);
    const optics::PhaseResponse phase = optics::phase_response(dispersive_stack(mirror), light);
    if (std::isfinite(phase.reflection_phase) && std::isfinite(phase.group_delay) &&
        std::isfinite(phase.group_delay_dispersion)) {
        face.phase = phase;
    }
    const optics::StandingWave wave = optics::standing_wave(stack, light);
    face.stored_energy = optics::stored_energy(wave);
    face.energy_penetration_depth = optics::energy_penetration_depth(wave);
    face.face_intensity = optics::face_intensity(wave);
    for (std::size_t j = 0; j < stack.layers.size(); ++j) {
        const optics::Peak peak = optics::peak_intensity(wave, j);
        face.peak_intensity.push_back(peak.intensity);
        face.peak_depth.push_back(peak.depth);
    }
    if (scope.field) face.field = field_profile(mirror, wave);
    return face;
}

void add_once(std::vector<std::string>& list, std::string text) {
    if (std::find(list.begin(), list.end(), text) == list.end()) list.push_back(std::move(text));
}

/// Layers whose absorption nobody stated count as transparent, which the result must say.
void warn_of_unknown_absorption(const stack::Mirror& mirror, double wavelength,
                                std::vector<std::string>& warnings) {
    std::set<std::string> unknown;
    for (const stack::MirrorLayer& layer : mirror.layers) {
        if (!layer.optical.extinction_known) unknown.insert(layer.material);
    }
    for (const std::string& material : unknown) {
        warnings.push_back(fmt::format(
            "absorption of {} at {:g} nm is not stated: its layers count as transparent and the "
            "absorptance is a lower limit; give extinction_coefficient in [material.\"{}\"]",
            material, wavelength * 1e9, material));
    }
}

/// The non-dispersive energy is no energy where Re(n²) < 0.
void note_metals(const stack::Mirror& mirror, std::vector<std::string>& notes) {
    std::set<std::string> metals;
    for (const stack::MirrorLayer& layer : mirror.layers) {
        if (layer.optical.extinction.value > layer.optical.index.value)
            metals.insert(layer.material);
    }
    for (const std::string& material : metals) {
        notes.push_back(fmt::format(
            "stored energy of {} is given in the non-dispersive form, which in a metal is not "
            "the whole energy",
            material));
    }
}

/// Phase, delay and noise belong to the reflected light, also where there is little of it.
void warn_of_weak_reflection(const std::vector<Face>& faces, std::vector<std::string>& warnings) {
    constexpr double weak = 0.01;
    for (const Face& face : faces) {
        if (face.response.reflectance >= weak) continue;
        const std::string light = faces.size() == 1 ? "the"
                                  : face.polarisation == optics::Polarisation::s
                                      ? "the s polarised"
                                      : "the p polarised";
        warnings.push_back(
            fmt::format("only {:.2g} % of {} light is reflected: reflection phase, delay and noise "
                        "describe that remainder, not the light that passes",
                        face.response.reflectance * 100.0, light));
    }
}

/// Values that the file replaces for a material that this mirror does not hold.
void warn_of_unused_overrides(const stack::Design& design,
                              const std::vector<stack::Ledger::Use>& uses,
                              std::vector<std::string>& warnings) {
    for (const stack::Override& values : design.overrides) {
        const bool used = std::any_of(uses.begin(), uses.end(), [&](const auto& use) {
            return std::any_of(use.bases.begin(), use.bases.end(), [&](const auto& basis) {
                return basis.material == values.material;
            });
        });
        if (used) continue;
        warnings.push_back(fmt::format("[material.\"{}\"] changes nothing: the mirror holds no {}",
                                       values.material, values.material));
    }
}

/// A value of the design file that states no range is taken as it is wherever the mirror works.
void note_unlimited_values(const std::vector<stack::Ledger::Use>& uses,
                           std::vector<std::string>& notes) {
    std::vector<std::string> list;
    for (const stack::Ledger::Use& use : uses) {
        for (const materials::Basis& basis : use.bases) {
            if (!basis.entry->from_design || basis.entry->temperature) continue;
            const std::string what =
                fmt::format("{} of {}", materials::info(basis.property).title, basis.material);
            if (std::find(list.begin(), list.end(), what) == list.end()) list.push_back(what);
        }
    }
    if (list.empty()) return;
    notes.push_back(fmt::format(
        "values of the design file that state no range are used at the operating temperature as "
        "they stand: {}",
        fmt::join(list, ", ")));
}

/// Data whose file calls them an analogy, also where their range holds.
void add_analogous_data(const std::vector<stack::Ledger::Use>& uses,
                        std::vector<std::string>& analogies) {
    for (const stack::Ledger::Use& use : uses) {
        for (const materials::Basis& basis : use.bases) {
            const bool said = basis.part == materials::Part::rule ||
                              materials::nature_of(basis) != "by analogy" ||
                              std::holds_alternative<materials::SameAs>(basis.entry->curve);
            if (said) continue;
            const std::string text = fmt::format(
                "{} of {}: {}", materials::info(basis.property).title, basis.material,
                basis.entry->note.empty() ? "by analogy in its source" : basis.entry->note);
            const bool known =
                std::any_of(analogies.begin(), analogies.end(), [&](const std::string& other) {
                    return other.rfind(text.substr(0, text.find(": ")), 0) == 0;
                });
            if (!known) analogies.push_back(text);
        }
    }
}

/// Near a zero of the substrate's expansion its thermo-elastic noise is known no better than that
/// zero.
void note_uncertain_expansion(const stack::Design& design, const materials::Library& library,
                              std::vector<std::string>& notes) {
    const materials::Value alpha =
        materials::evaluate(library, design.mirror.substrate, PropertyId::thermal_expansion,
                            {design.temperature, design.light.wavelength, 1.0});
    const bool known = alpha.number && alpha.width.form == materials::Width::Form::absolute;
    if (!known || std::abs(*alpha.number) >= alpha.width.value) return;
    notes.push_back(
        fmt::format("linear expansion of {} is {:.2g} ± {:.2g} 1/K here, less than its own "
                    "uncertainty: so is the "
                    "substrate's thermo-elastic noise, which goes with its square",
                    design.mirror.substrate, *alpha.number, alpha.width.value));
}

void add_part_and_losses(const stack::Design& design, Appraisal& result) {
    for (Face& face : result.faces) {
        face.losses = face_losses(design, result.mirror, face.response);
        for (std::string& text : loss_warnings(design, result.mirror, face.losses))
            add_once(result.warnings, std::move(text));
        if (!result.mirror.rear) continue;
        result.part.push_back(part_view(design, result.mirror, face.polarisation));
    }
    for (std::string& text : part_warnings(design, result.mirror, result.part))
        add_once(result.warnings, std::move(text));
    for (std::string& text : part_notes(design)) add_once(result.notes, std::move(text));
}

std::optional<LightLoad> light_load(const stack::Design& design, const Appraisal& appraisal) {
    if (!design.light.power) return std::nullopt;
    const double w = design.beam_radius;
    double peak = 0.0;
    for (const Face& face : appraisal.faces) {
        for (const double intensity : face.peak_intensity) peak = std::max(peak, intensity);
    }
    LightLoad load{};
    load.power = *design.light.power;
    load.absorbed = load.power * mean_over_faces(appraisal, &optics::Response::absorptance);
    load.centre_intensity = 2.0 * load.power / (core::pi * w * w);
    load.largest_intensity = load.centre_intensity * peak;
    return load;
}

std::vector<std::string> without_uncertainty(const std::vector<stack::Ledger::Use>& uses) {
    std::vector<std::string> list;
    for (const stack::Ledger::Use& use : uses) {
        if (use.width.form != materials::Width::Form::not_stated) continue;
        list.push_back(fmt::format("{} of {}", materials::info(use.property).title, use.material));
    }
    return list;
}

std::vector<std::string> extrapolated_losses(const std::vector<stack::Ledger::Use>& uses) {
    std::vector<std::string> list;
    for (const stack::Ledger::Use& use : uses) {
        if (!use.frequency_extrapolated) continue;
        for (const materials::Basis& basis : use.bases) {
            const auto measured = materials::frequencies_of(basis);
            if (!measured) continue;
            const std::string where =
                measured->lower == measured->upper
                    ? fmt::format("at {:g} Hz", measured->lower)
                    : fmt::format("from {:g} Hz to {:g} Hz", measured->lower, measured->upper);
            list.push_back(fmt::format("{} of {} was measured {}; it is used outside too",
                                       materials::info(basis.property).title, basis.material,
                                       where));
        }
    }
    return list;
}

}  // namespace

double mean_over_faces(const Appraisal& appraisal, double optics::Response::*member) {
    double sum = 0.0;
    for (const Face& face : appraisal.faces) sum += face.response.*member;
    return sum / static_cast<double>(appraisal.faces.size());
}

Appraisal appraise(const stack::Design& design, const materials::Library& library,
                   const Scope& scope) {
    Appraisal result;
    stack::Ledger ledger;
    result.mirror = stack::at_operating_point(design, library, ledger);
    using stack::PolarisationChoice;
    const PolarisationChoice choice = design.light.polarisation;
    std::vector<optics::Polarisation> polarisations;
    if (choice != PolarisationChoice::p) polarisations.push_back(optics::Polarisation::s);
    if (choice != PolarisationChoice::s) polarisations.push_back(optics::Polarisation::p);
    if (design.light.angle == 0.0) polarisations = {optics::Polarisation::s};
    for (const optics::Polarisation polarisation : polarisations) {
        result.faces.push_back(face_optics(
            result.mirror, {design.light.wavelength, design.light.angle, polarisation}, scope));
    }
    add_part_and_losses(design, result);
    result.light_load = light_load(design, result);
    if (scope.neighbourhood) result.around = neighbourhood(design, library, result.mirror);
    warn_of_unknown_absorption(result.mirror, design.light.wavelength, result.warnings);
    note_metals(result.mirror, result.notes);
    warn_of_beam(design, result.warnings);
    warn_of_weak_reflection(result.faces, result.warnings);
    if (scope.noise) note_uncertain_expansion(design, library, result.notes);
    for (Face& face : result.faces) {
        if (!scope.noise) break;
        std::vector<std::string> warnings;  // what holds for s and p is said once
        face.noise =
            assemble_noise(design, library, result.mirror, face.polarisation, ledger, warnings);
        for (std::string& warning : warnings) add_once(result.warnings, std::move(warning));
    }
    warn_of_unused_overrides(design, ledger.uses(), result.warnings);
    note_unlimited_values(ledger.uses(), result.notes);
    for (const std::string& note : ledger.notes()) result.notes.push_back(note);
    for (std::string& note : extrapolated_losses(ledger.uses()))
        result.notes.push_back(std::move(note));
    result.analogies = ledger.analogies();
    add_analogous_data(ledger.uses(), result.analogies);
    result.fixed = without_uncertainty(ledger.uses());
    result.uses = ledger.uses();
    return result;
}

}  // namespace stillcoat::assess
