#include "stillcoat/assess/draft.hpp"

#include <fmt/format.h>

#include <cmath>

#include "assess/optical_view.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/core/errors.hpp"
#include "stillcoat/stack/design.hpp"
#include "stillcoat/stack/mirror.hpp"

namespace stillcoat::assess {
namespace {

void require_material(const materials::Library& library, const std::string& role,
                      const std::string& name) {
    if (library.materials.count(name) != 0) return;
    const auto near = core::nearest_spelling(name, library.names());
    throw core::InputError(fmt::format("{}: unknown material \"{}\"", role, name),
                           near ? fmt::format("did you mean \"{}\"?", *near)
                                : "`stillcoat materials` lists the known ones");
}

std::string layer_line(const std::string& material, const std::string& quarter_waves) {
    return fmt::format("    {{ material = \"{}\", quarter_waves = {} }},\n", material,
                       quarter_waves);
}

/// Everything but the layers, with comments.
std::string design_head(const DraftRequest& request, const std::string& title) {
    std::string text;
    if (!request.schema.empty()) text += fmt::format("#:schema {}\n", request.schema);
    text += fmt::format(
        "# Drafted by `stillcoat draft`. Every value is yours to change; lines with # are "
        "options.\n"
        "title = \"{}\"\n\n"
        "[light]\n"
        "wavelength = \"{}\"          # in vacuum\n"
        "# angle = \"0 deg\"               # of incidence; off normal also polarisation = \"s\", "
        "\"p\" or \"unpolarised\"\n"
        "# power = \"1 W\"                 # incident: gives absorbed watts and intensities\n\n"
        "[beam]\n"
        "radius = \"{}\"                 # 1/e² intensity radius on the mirror: put yours, the "
        "noise depends on it\n\n"
        "[mirror]\n"
        "substrate = \"{}\"\n"
        "# diameter = \"5 cm\"             # diameter and thickness: a finite mirror; neither: a "
        "half-space\n"
        "# thickness = \"1 cm\"\n\n"
        "[environment]\n"
        "temperature = \"{}\"\n\n"
        "# [band]                        # frequencies of the noise; these are the defaults\n"
        "# from = \"1 Hz\"\n"
        "# to = \"10 kHz\"\n"
        "# spot = [\"1 Hz\", \"10 Hz\", \"100 Hz\", \"1 kHz\"]\n\n"
        "[coating]                       # from the light to the substrate; thicknesses hold at "
        "295 K\n\n",
        title, request.wavelength, request.beam_radius, request.substrate, request.temperature);
    return text;
}

/// The tables that take alternatives of the library.
std::string alternatives_text(const DraftRequest& request) {
    std::string text;
    for (const std::string& alternative : request.alternatives) {
        const std::size_t equal = alternative.find('=');
        const std::size_t dot = alternative.rfind('.', equal);
        const bool whole = equal != std::string::npos && dot != std::string::npos && dot > 0 &&
                           alternative.find_first_of("\"\\\n") == std::string::npos;
        if (!whole) {
            throw core::InputError(
                fmt::format("--alternative: \"{}\" is no MATERIAL.PROPERTY=NAME", alternative),
                "for example silicon.refractive_index=visible");
        }
        text += fmt::format(
            "\n[material.\"{}\"]\n{} = {{ alternative = \"{}\" }}\n", alternative.substr(0, dot),
            alternative.substr(dot + 1, equal - dot - 1), alternative.substr(equal + 1));
    }
    return text;
}

std::string reflecting_text(const DraftRequest& request, int pairs, const std::string& comment) {
    std::string text = design_head(request, fmt::format("Draft: {} {} of {} and {} on {}", pairs,
                                                        pairs == 1 ? "pair" : "pairs", request.low,
                                                        request.high, request.substrate));
    text += comment;
    if (request.cap != Cap::none) {
        text += "[[coating.block]]               # the cap\nlayers = [\n" +
                layer_line(request.low, request.cap == Cap::half_wave ? "2.0" : "1.0") + "]\n\n";
    }
    if (pairs > 0) {
        text += fmt::format("[[coating.block]]\nrepeat = {}\nlayers = [\n", pairs) +
                layer_line(request.high, "1.0") + layer_line(request.low, "1.0") + "]\n\n";
    }
    return text + "[[coating.block]]               # the last high layer, on the substrate\n" +
           "layers = [\n" + layer_line(request.high, "1.0") + "]\n" + alternatives_text(request);
}

/// The mirror that a text describes, with its response at normal incidence.
struct Trial {
    stack::Mirror mirror;
    optics::Response response;
};
Trial trial(const materials::Library& library, const std::string& text) try {
    materials::Library own = library;
    const stack::Design design = stack::read_design(core::parse_document(text, "draft"), own);
    stack::Ledger unused;
    Trial result{stack::at_operating_point(design, own, unused), {}};
    result.response = optics::response(optical_stack(result.mirror),
                                       {design.light.wavelength, 0.0, optics::Polarisation::s});
    return result;
} catch (const core::InputError& error) {
    // Nobody has the file that the places point to.
    std::vector<core::Problem> problems = error.problems();
    for (core::Problem& problem : problems) {
        problem.place = core::Place{};
        problem.other_place.reset();
        if (problem.hint.find("alternative = ") != std::string::npos) {
            problem.hint += "; here: --alternative MATERIAL.PROPERTY=NAME";
        }
    }
    throw core::InputError(std::move(problems));
}

void check_request(const materials::Library& library, const DraftRequest& request) {
    for (const std::string* text :
         {&request.wavelength, &request.beam_radius, &request.temperature, &request.schema}) {
        if (text->find_first_of("\"\\\n") == std::string::npos) continue;
        throw core::InputError(fmt::format("\"{}\" cannot stand in a design file", *text),
                               "leave out quotes and backslashes");
    }
    require_material(library, "--high", request.high);
    require_material(library, "--low", request.low);
    require_material(library, "--substrate", request.substrate);
    // One layer of each, so that the layers' indices can be compared.
    const Trial both = trial(library, reflecting_text(request, 1, ""));
    const std::size_t first = request.cap == Cap::none ? 0 : 1;
    const double high = both.mirror.layers[first].optical.index.value;
    const double low = both.mirror.layers[first + 1].optical.index.value;
    if (high > low) return;
    throw core::InputError(
        fmt::format("the high index ({}: {:.4f}) is not above the low one ({}: {:.4f})",
                    request.high, high, request.low, low),
        "exchange --high and --low, or choose other materials");
}

}  // namespace

Draft reflecting_draft(const materials::Library& library, const DraftRequest& request,
                       double transmittance) {
    check_request(library, request);
    const auto count = [&](int pairs) {
        return PairCount{
            pairs, trial(library, reflecting_text(request, pairs, "")).response.transmittance};
    };
    Draft draft;
    PairCount here = count(0);
    while (here.transmittance > transmittance) {
        if (here.pairs == most_draft_pairs) {
            draft.impossible = fmt::format(
                "{} pairs still transmit {:.3g}: the indices of {} and {} are too much alike",
                most_draft_pairs, here.transmittance, request.high, request.low);
            return draft;
        }
        draft.fewer = here;
        here = count(here.pairs + 1);
    }
    draft.chosen = here;
    draft.more = count(here.pairs + 1);
    std::string comment = "# Transmittance into the substrate at normal incidence:";
    for (const auto& item : {draft.fewer, draft.chosen, draft.more}) {
        if (!item) continue;
        comment += fmt::format("\n#   {} pair{}: {:.4g} ppm{}", item->pairs,
                               item->pairs == 1 ? "" : "s", item->transmittance * 1e6,
                               item->pairs == here.pairs ? "   (this design)" : "");
    }
    draft.text = reflecting_text(request, here.pairs, comment + "\n");
    return draft;
}

namespace {

/// Phase thicknesses of the outer and inner layer; none when no real ones exist.
struct PhasePair {
    double outer, inner;  ///< [rad], from 0 to π
};
std::optional<PhasePair> antireflecting_phases(double incident, double outer, double inner,
                                               double substrate) {
    // Notation (Macleod): n0, n1 outer, n2 inner, ns;
    //   tan²δ1 = (ns−n0)(n2²−n0 ns) n1² / ((n1² ns − n0 n2²)(n0 ns − n1²))
    //   tan²δ2 = (ns−n0)(n0 ns−n1²) n2² / ((n1² ns − n0 n2²)(n2² − n0 ns))
    const double n0 = incident, n1 = outer, n2 = inner, ns = substrate;
    const double contrast = n1 * n1 * ns - n0 * n2 * n2;
    const double inside = n2 * n2 - n0 * ns;
    const double outside = n0 * ns - n1 * n1;
    const double first = (ns - n0) * inside * n1 * n1 / (contrast * outside);
    const double second = (ns - n0) * outside * n2 * n2 / (contrast * inside);
    if (!(first >= 0.0) || !(second >= 0.0) || !std::isfinite(first) || !std::isfinite(second)) {
        return std::nullopt;
    }
    // The squares leave two signs: the pair that reflects least, of two the thinner.
    std::optional<PhasePair> best;
    double least = 1e-9;
    for (const double a : {std::atan(std::sqrt(first)), core::pi - std::atan(std::sqrt(first))}) {
        for (const double b :
             {std::atan(std::sqrt(second)), core::pi - std::atan(std::sqrt(second))}) {
            constexpr double wavelength = 1.0;
            const auto thickness = [](double phase, double n) {
                return phase / (2.0 * core::pi * n);
            };
            const double r =
                optics::response({n0, {{n1, thickness(a, n1)}, {n2, thickness(b, n2)}}, ns},
                                 {wavelength, 0.0, optics::Polarisation::s})
                    .reflectance;
            const bool thinner =
                !best || thickness(a, n1) + thickness(b, n2) <
                             thickness(best->outer, n1) + thickness(best->inner, n2);
            if (r < least && thinner) best = PhasePair{a, b};
        }
    }
    return best;
}

/// Why there are no real thicknesses: with A = n1² ns − n0 n2², B = n2² − n0 ns, C = n0 ns − n1²
/// the product ABC must be positive, which bounds n2/n1 by √(ns/n0) from above or below.
std::string impossible_pair(const DraftRequest& request, const stack::Mirror& mirror,
                            std::size_t high_layer) {
    const double n0 = mirror.incident_index.value;
    const double ns = mirror.substrate_optical.index.value;
    const double high = mirror.layers[high_layer].optical.index.value;
    const double low = mirror.layers[high_layer + 1].optical.index.value;
    const bool at_most = (high * high - n0 * ns) * (n0 * ns - low * low) > 0.0;
    return fmt::format(
        "no thicknesses of {} ({:.4f}) outside and {} ({:.4f}) make the reflection of {} ({:.4f}) "
        "vanish: the ratio of the two indices is {:.4f}, with these it would have to be at {} "
        "{:.4f}",
        request.low, low, request.high, high, request.substrate, ns, high / low,
        at_most ? "most" : "least", std::sqrt(ns / n0));
}

}  // namespace

Draft antireflecting_draft(const materials::Library& library, const DraftRequest& request) {
    check_request(library, request);
    const Trial pair = trial(library, reflecting_text(request, 1, ""));
    const std::size_t first = request.cap == Cap::none ? 0 : 1;
    const auto phases = antireflecting_phases(
        pair.mirror.incident_index.value, pair.mirror.layers[first + 1].optical.index.value,
        pair.mirror.layers[first].optical.index.value, pair.mirror.substrate_optical.index.value);
    Draft draft;
    if (!phases) {
        draft.impossible = impossible_pair(request, pair.mirror, first);
        return draft;
    }
    // Quarter waves are counted at 295 K, the phases hold at the operating temperature: the trial's
    // layers are one quarter wave there and `quarter_waves` here.
    const auto quarter_waves = [&](double phase, std::size_t layer) {
        return fmt::format("{:.6f}",
                           phase / (core::pi / 2.0) / pair.mirror.layers[layer].quarter_waves);
    };
    draft.text = design_head(request, fmt::format("Draft: two layers against reflection on {}",
                                                  request.substrate)) +
                 "[[coating.block]]\nlayers = [\n" +
                 layer_line(request.low, quarter_waves(phases->outer, first + 1)) +
                 layer_line(request.high, quarter_waves(phases->inner, first)) + "]\n" +
                 alternatives_text(request);
    draft.reflectance = trial(library, draft.text).response.reflectance;
    return draft;
}

std::string smallest_design(const std::string& schema) {
    const DraftRequest request{"tantala-ibs", "silica-ibs", "fused-silica", "1064 nm",
                               "2 cm",        "295 K",      Cap::none,      schema};
    return reflecting_text(request, 10, "");
}

}  // namespace stillcoat::assess
