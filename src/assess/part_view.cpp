#include "stillcoat/assess/part_view.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <set>
#include <stdexcept>

#include "assess/optical_view.hpp"
#include "stillcoat/core/errors.hpp"
#include "stillcoat/optics/cavity_pair.hpp"
#include "stillcoat/optics/scatter.hpp"

namespace stillcoat::assess {
namespace {

constexpr double per_millimetre = 1e3;

const stack::MirrorRear& rear_of(const stack::Mirror& mirror) {
    if (!mirror.rear) throw std::logic_error("a mirror without a rear face is no part");
    return *mirror.rear;
}

/// Names the shares by the faces of the part instead of by the light that came from behind.
void name_by_faces(optics::PartResponse& response) {
    std::swap(response.front_absorptance, response.rear_absorptance);
    std::swap(response.front_layer_absorptance, response.rear_layer_absorptance);
    std::reverse(response.front_layer_absorptance.begin(), response.front_layer_absorptance.end());
    std::reverse(response.rear_layer_absorptance.begin(), response.rear_layer_absorptance.end());
}

MirrorPair mirror_pair(double loss) {
    const double at_most_all = std::min(loss, 1.0);
    const optics::RoundTrip trip = optics::round_trip(at_most_all, at_most_all);
    MirrorPair pair{trip.loss, std::nullopt};
    try {
        pair.finesse = optics::finesse_from_half_width(trip);
    } catch (const core::DomainError&) {
        // Nothing is lost, or too much for a half width.
    }
    return pair;
}

/// S from what the design states, or the reason why there is none.
void find_scatter(const stack::Design& design, const stack::Mirror& mirror,
                  const optics::Response& face, FaceLosses& losses) {
    if (design.mirror.scatter) {
        losses.scatter = design.mirror.scatter->value;
        return;
    }
    if (!design.mirror.roughness) {
        losses.scatter_missing = "not stated";
        return;
    }
    const stack::Roughness& roughness = *design.mirror.roughness;
    const double index = mirror.incident_index.value;
    // The polarisation plays no part in it.
    const optics::Illumination light{design.light.wavelength, design.light.angle,
                                     optics::Polarisation::s};
    try {
        losses.scatter =
            optics::total_integrated_scatter(face.reflectance, roughness.rms, index, light);
        losses.scatter_is_lower_limit =
            roughness.to < optics::largest_scattering_frequency(index, light);
    } catch (const core::DomainError& error) {
        losses.scatter_missing = error.what();
    }
}

bool unknown(const stack::MirrorLayer& layer) { return !layer.optical.extinction_known; }

}  // namespace

optics::Part optical_part(const stack::Mirror& mirror) {
    const stack::MirrorRear& rear = rear_of(mirror);
    const optics::OpticalStack front = optical_stack(mirror);
    optics::Part part{front.incident_index, front.layers, front.substrate_index,
                      rear.plate_thickness, {},           rear.medium_index.value};
    for (const stack::MirrorLayer& layer : rear.layers) {
        part.rear_layers.push_back(
            {{layer.optical.index.value, layer.optical.extinction.value}, layer.thickness});
    }
    return part;
}

PartView part_view(const stack::Design& design, const stack::Mirror& mirror,
                   optics::Polarisation polarisation) {
    const optics::Part part = optical_part(mirror);
    const optics::Illumination light{design.light.wavelength, design.light.angle, polarisation};
    const bool amplitudes =
        design.rear_face && design.rear_face->passes == stack::Passes::amplitudes;
    const optics::Summation passes =
        amplitudes ? optics::Summation::amplitudes : optics::Summation::intensities;
    PartView view{polarisation, std::nullopt, "", ""};
    try {
        if (design.light.from_rear) {
            view.response = optics::part_response(optics::turned_around(part),
                                                  optics::light_from_rear(part, light), passes);
            name_by_faces(*view.response);
        } else {
            view.response = optics::part_response(part, light, passes);
        }
    } catch (const core::DomainError& error) {
        view.missing = error.what();
    }
    if (!mirror.substrate_optical.extinction_known) {
        view.absorptance_missing = fmt::format("absorption of {} at {:g} nm is not stated",
                                               mirror.substrate, design.light.wavelength * 1e9);
    }
    return view;
}

FaceLosses face_losses(const stack::Design& design, const stack::Mirror& mirror,
                       const optics::Response& face) {
    FaceLosses losses;
    find_scatter(design, mirror, face, losses);
    losses.absorptance_is_lower_limit =
        std::any_of(mirror.layers.begin(), mirror.layers.end(), unknown);
    const bool normal = design.light.angle == 0.0;
    if (losses.scatter) {
        try {
            losses.total =
                optics::mirror_loss(face.transmittance, face.absorptance, *losses.scatter).total;
        } catch (const core::DomainError&) {
            // More is said to be scattered than is reflected: loss_warnings() says so.
        }
    }
    if (normal) losses.pair_without_scatter = mirror_pair(face.loss);
    if (normal && losses.total) losses.pair = mirror_pair(*losses.total);
    return losses;
}

std::vector<std::string> part_warnings(const stack::Design& design, const stack::Mirror& mirror,
                                       const std::vector<PartView>& part) {
    std::vector<std::string> list;
    if (part.empty()) return list;
    for (const PartView& view : part) {
        if (view.missing.empty()) continue;
        list.push_back("the whole part is not computed: " + view.missing);
        break;
    }
    const std::string& substrate = mirror.substrate;
    if (!part.front().absorptance_missing.empty()) {
        list.push_back(fmt::format(
            "{}: the absorptance of the whole part is not given, and its reflectance and "
            "transmittance are those of a clear plate; give absorption_coefficient in "
            "[material.\"{}\"]",
            part.front().absorptance_missing, substrate));
    }
    std::set<std::string> materials;
    for (const stack::MirrorLayer& layer : rear_of(mirror).layers) {
        if (unknown(layer)) materials.insert(layer.material);
    }
    for (const std::string& material : materials) {
        list.push_back(fmt::format(
            "absorption of {} at {:g} nm is not stated: its layers on the rear face count as "
            "transparent; give extinction_coefficient in [material.\"{}\"]",
            material, design.light.wavelength * 1e9, material));
    }
    return list;
}

std::vector<std::string> loss_warnings(const stack::Design& design, const stack::Mirror& mirror,
                                       const FaceLosses& losses) {
    std::vector<std::string> list;
    if (!losses.scatter) {
        if (design.mirror.roughness) {
            list.push_back("scatter is not computed: " + losses.scatter_missing);
        }
        return list;
    }
    if (losses.scatter_is_lower_limit) {
        const double largest = optics::largest_scattering_frequency(
            mirror.incident_index.value,
            {design.light.wavelength, design.light.angle, optics::Polarisation::s});
        list.push_back(fmt::format(
            "the roughness is stated up to {:g} per mm, but relief up to {:.4g} per mm scatters "
            "this light: the scatter is a lower bound",
            design.mirror.roughness->to / per_millimetre, largest / per_millimetre));
    }
    if (!losses.total) {
        list.push_back(
            fmt::format("scatter of {:g} in [mirror] is more than the coated face reflects: it is "
                        "not added to transmittance and absorptance",
                        *losses.scatter));
    }
    return list;
}

std::vector<std::string> part_notes(const stack::Design& design) {
    std::vector<std::string> list;
    if (design.rear_face) {
        std::string text =
            "the whole part is a plane-parallel plate: wedge is ignored, and so are passes that "
            "miss each other, scatter and the spectral width of the light (sum over the beams of a "
            "plate, Born & Wolf, Principles of Optics, §7.6); ";
        text += design.rear_face->passes == stack::Passes::intensities
                    ? "intensities of the passes are added, fringes of the plate average out"
                    : "amplitudes of the passes are added, so the result hangs on the plate's "
                      "thickness to a small part of the wavelength";
        list.push_back(std::move(text));
    }
    if (design.light.from_rear) {
        list.push_back(
            "light from the rear, along the same ray, holds for the whole part; light, field and "
            "noise of the coated face are those of light from the front");
    }
    if (design.mirror.roughness) {
        list.push_back(fmt::format(
            "scatter follows from the relief of the coated face between {:g} and {:g} per mm: "
            "other interfaces, coarser relief, particles and points are left out (H. E. Bennett & "
            "J. O. Porteus, J. Opt. Soc. Am. 51, 123 (1961))",
            design.mirror.roughness->from / per_millimetre,
            design.mirror.roughness->to / per_millimetre));
    }
    if (design.light.angle == 0.0) {
        list.push_back(
            "finesse of two such mirrors: free spectral range over full width at half maximum of "
            "Airy's formula (Born & Wolf, Principles of Optics, §7.6); mode matching and "
            "diffraction are left out, light that enters a substrate is lost");
    }
    return list;
}

}  // namespace stillcoat::assess
