#include "present/part_text.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace stillcoat::present {
namespace {

using assess::Appraisal;
using assess::FaceLosses;
using assess::PartView;

constexpr double per_millimetre = 1e3;

/// "at least " or "at most " where a share of the loss is missing.
std::string when(bool limit, const char* words) { return limit ? words : ""; }

void scatter_row(Page& page, const stack::Design& design, const FaceLosses& losses) {
    if (!losses.scatter) {
        page.row("scatter", losses.scatter_missing == "not stated"
                                ? "not stated"
                                : "not computed: " + losses.scatter_missing);
        return;
    }
    std::string text =
        when(losses.scatter_is_lower_limit, "at least ") + fraction_text(*losses.scatter);
    if (design.mirror.scatter) {
        text += fmt::format(" (stated: {})", design.mirror.scatter->source);
    } else {
        const stack::Roughness& relief = *design.mirror.roughness;
        text += fmt::format(" (rms {} from {:g} to {:g} per mm)", length_text(relief.rms),
                            relief.from / per_millimetre, relief.to / per_millimetre);
    }
    page.row("scatter", text);
}

std::string finesse_text(const assess::MirrorPair& pair, bool at_most) {
    const std::string loses = fmt::format("; {}{} lost in a round trip", when(at_most, "at least "),
                                          fraction_text(pair.round_trip_loss));
    if (!pair.finesse) return "not defined: no width at half maximum" + loses;
    // Four digits without an exponent.
    const double finesse = std::stod(fmt::format("{:.3e}", *pair.finesse));
    return fmt::format("{}{:.10g}{}", when(at_most, "at most "), finesse, loses);
}

std::string part_name(const PartView& view, std::size_t count) {
    return count > 1 ? "The whole part, " + polarisation_text(view.polarisation) + " polarisation"
                     : "The whole part";
}

/// Whether a coating of the part holds a material whose absorption nobody stated.
bool coatings_incomplete(const stack::Mirror& mirror) {
    const auto unknown = [](const stack::MirrorLayer& layer) {
        return !layer.optical.extinction_known;
    };
    const auto any = [&unknown](const std::vector<stack::MirrorLayer>& layers) {
        return std::any_of(layers.begin(), layers.end(), unknown);
    };
    return any(mirror.layers) || any(mirror.rear->layers);
}

std::string rear_face_text(const stack::Design& design) {
    const stack::RearFace& face = *design.rear_face;
    const std::string coat = face.layers.empty() ? "bare" : count_text(face.layers.size(), "layer");
    return fmt::format("{} towards {}; {} of the passes are added", coat, face.medium,
                       face.passes == stack::Passes::intensities ? "intensities" : "amplitudes");
}

void power_shares(Page& page, const Appraisal& appraisal, const PartView& view) {
    const optics::PartResponse& r = *view.response;
    const bool known = view.absorptance_missing.empty();
    const std::string remark = known ? "" : " (plate taken as clear)";
    const std::string least = when(coatings_incomplete(appraisal.mirror), "at least ");
    page.row("reflectance", near_one_text(r.reflectance, r.loss) + remark);
    page.row("transmittance", fmt::format("{} (through both faces{})",
                                          transmittance_text(r.transmittance, r.log_transmittance,
                                                             r.reflectance + r.absorptance),
                                          known ? "" : "; plate taken as clear"));
    if (!known) {
        page.row("absorptance", "not known: " + view.absorptance_missing);
        return;
    }
    page.row(
        "absorptance",
        fmt::format("{}{}: coated face {}, plate {}, rear face {}", least,
                    fraction_text(r.absorptance), fraction_text(r.front_absorptance),
                    fraction_text(r.substrate_absorptance), fraction_text(r.rear_absorptance)));
}

/// R, T and A of unpolarised light: means of s and p.
void mean_section(Page& page, const Appraisal& appraisal) {
    const bool computed =
        std::all_of(appraisal.part.begin(), appraisal.part.end(),
                    [](const PartView& view) { return view.response.has_value(); });
    if (appraisal.part.size() < 2 || !computed) return;
    PartView mean = appraisal.part.front();
    const auto average = [&](double optics::PartResponse::*member) {
        double sum = 0.0;
        for (const PartView& view : appraisal.part) sum += (*view.response).*member;
        return sum / static_cast<double>(appraisal.part.size());
    };
    for (double optics::PartResponse::*member :
         {&optics::PartResponse::reflectance, &optics::PartResponse::transmittance,
          &optics::PartResponse::absorptance, &optics::PartResponse::loss,
          &optics::PartResponse::front_absorptance, &optics::PartResponse::substrate_absorptance,
          &optics::PartResponse::rear_absorptance}) {
        (*mean.response).*member = average(member);
    }
    mean.response->log_transmittance = std::log(mean.response->transmittance);
    page.heading("The whole part, unpolarised (mean of s and p)");
    power_shares(page, appraisal, mean);
}

}  // namespace

void loss_rows(Page& page, const stack::Design& design, const assess::Face& face) {
    const FaceLosses& losses = face.losses;
    scatter_row(page, design, losses);
    const bool low = losses.absorptance_is_lower_limit || losses.scatter_is_lower_limit;
    const std::string remark = losses.scatter            ? " (scatter exceeds what is reflected)"
                               : design.mirror.roughness ? " (scatter not computed)"
                                                         : " (scatter not stated)";
    page.row("loss T + A + S", losses.total
                                   ? when(low, "at least ") + fraction_text(*losses.total)
                                   : "at least " + fraction_text(face.response.loss) + remark);
    if (losses.pair) {
        page.row("finesse, two such mirrors", finesse_text(*losses.pair, low));
    } else if (losses.pair_without_scatter && !losses.scatter) {
        page.row("finesse, two such mirrors", finesse_text(*losses.pair_without_scatter, true));
    }
}

void part_section(Page& page, const stack::Design& design, const Appraisal& appraisal) {
    for (const PartView& view : appraisal.part) {
        page.heading(part_name(view, appraisal.part.size()));
        page.row("light", design.light.from_rear ? "from the rear" : "from the front");
        page.row("rear face", rear_face_text(design));
        if (view.response) {
            power_shares(page, appraisal, view);
        } else {
            page.row("not computed", view.missing);
        }
    }
    mean_section(page, appraisal);
}

}  // namespace stillcoat::present
