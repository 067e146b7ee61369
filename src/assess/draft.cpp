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

std::string reflecting_text(const DraftRequest& request, int pairs, const std::string& comment) {
    std::string text =
        design_head(request, fmt::format("Draft: {} pairs of {} and {} on {}", pairs, request.low,
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
           "layers = [\n" + layer_line(request.high, "1.0") + "]\n";
}

/// The mirror that a text describes, with its response at normal incidence.
struct Trial {
    stack::Mirror mirror;
    optics::Response response;
};
Trial trial(const materials::Library& library, const std::string& text) {
    materials::Library own = library;
    const stack::Design design =
        stack::read_design(core::parse_document(text, "the drafted design"), own);
    stack::Ledger unused;
    Trial result{stack::at_operating_point(design, own, unused), {}};
    result.response = optics::response(optical_stack(result.mirror),
                                       {design.light.wavelength, 0.0, optics::Polarisation::s});
    return result;
}

void check_request(const materials::Library& library, const DraftRequest& request) {
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
        comment +=
            fmt::format("\n#   {} pairs: {:.4g} ppm{}", item->pairs, item->transmittance * 1e6,
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
        draft.impossible = fmt::format(
            "no thicknesses of {} on {} make the reflection of {} vanish; other indices do: "
            "low and high must stand on both sides of the square root of the substrate's index",
            request.low, request.high, request.substrate);
        return draft;
    }
    const auto quarter_waves = [](double phase) {
        return fmt::format("{:.6f}", phase / (core::pi / 2.0));
    };
    draft.text =
        design_head(request,
                    fmt::format("Draft: two layers against reflection on {}", request.substrate)) +
        "[[coating.block]]\nlayers = [\n" + layer_line(request.low, quarter_waves(phases->outer)) +
        layer_line(request.high, quarter_waves(phases->inner)) + "]\n";
    draft.reflectance = trial(library, draft.text).response.reflectance;
    return draft;
}

std::string smallest_design(const std::string& schema) {
    const DraftRequest request{"tantala-ibs", "silica-ibs", "fused-silica", "1064 nm",
                               "2 cm",        "295 K",      Cap::none,      schema};
    return reflecting_text(request, 10, "");
}

}  // namespace stillcoat::assess
