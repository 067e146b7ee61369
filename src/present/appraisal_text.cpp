#include "present/appraisal_text.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <map>
#include <numeric>

#include "present/neighbourhood_text.hpp"
#include "present/noise_text.hpp"
#include "present/part_text.hpp"
#include "present/sources.hpp"
#include "present/wording.hpp"
#include "stillcoat/core/constants.hpp"

namespace stillcoat::present {
namespace {

using assess::Appraisal;
using assess::Face;

/// Above this number of layers the page shows the outermost and the innermost ones only.
constexpr std::size_t layers_on_page = 24;
constexpr std::size_t outermost_on_page = 12;
constexpr std::size_t innermost_on_page = 4;

double sum(const std::vector<double>& list) {
    return std::accumulate(list.begin(), list.end(), 0.0);
}

std::string reflectance_text(const optics::Response& response) {
    return near_one_text(response.reflectance, response.loss);
}

/// Transmittance of one face, or of unpolarised light from the mean.
std::string transmittance_text(const optics::Response& response) {
    return present::transmittance_text(response.transmittance, response.log_transmittance,
                                       response.reflectance + response.absorptance);
}

/// Means over the faces as one response: what unpolarised light sees.
optics::Response mean_response(const Appraisal& appraisal) {
    optics::Response mean = appraisal.faces.front().response;
    if (appraisal.faces.size() == 1) return mean;
    mean.reflectance = mean_over_faces(appraisal, &optics::Response::reflectance);
    mean.transmittance = mean_over_faces(appraisal, &optics::Response::transmittance);
    mean.absorptance = mean_over_faces(appraisal, &optics::Response::absorptance);
    mean.loss = mean_over_faces(appraisal, &optics::Response::loss);
    mean.log_transmittance = std::log(mean.transmittance);
    return mean;
}

bool absorption_unknown(const Appraisal& appraisal) {
    return std::any_of(
        appraisal.mirror.layers.begin(), appraisal.mirror.layers.end(),
        [](const stack::MirrorLayer& layer) { return !layer.optical.extinction_known; });
}

void mirror_section(Page& page, const stack::Design& design, const Appraisal& appraisal) {
    const stack::Mirror& mirror = appraisal.mirror;
    page.heading("Mirror");
    page.row("light",
             fmt::format("{:g} nm in vacuum, {:g}°{} from {}", design.light.wavelength * 1e9,
                         design.light.angle * 180.0 / core::pi,
                         design.light.angle == 0.0 ? " (normal)" : "", design.light.medium));
    page.row("beam",
             fmt::format("radius {} (1/e² intensity), Gaussian{}", length_text(design.beam_radius),
                         design.light.angle == 0.0
                             ? ""
                             : fmt::format("; on the face {} × {}", length_text(design.beam_radius),
                                           length_text(design.beam_radius /
                                                       std::cos(design.light.angle)))));
    page.row("temperature", fmt::format("{:g} K", design.temperature));
    std::string body = design.mirror.substrate;
    if (design.mirror.diameter) {
        body += fmt::format(", {} across, {} thick", length_text(*design.mirror.diameter),
                            length_text(*design.mirror.thickness));
    } else {
        body += ", taken as a half-space";
    }
    page.row("substrate",
             fmt::format("{}; index {:.5f}", body, mirror.substrate_optical.index.value));
    page.row("coating",
             fmt::format(
                 "{}, {}; thicknesses hold at {:g} K, quarter waves counted at {:g} nm",
                 count_text(mirror.layers.size(), "layer"), length_text(mirror.coating_thickness),
                 design.coating.reference_temperature, design.coating.design_wavelength * 1e9));
    std::vector<std::string> replaced;
    for (const stack::Override& values : design.overrides) {
        std::vector<std::string> what;
        for (const stack::ReplacedValue& value : values.values) {
            what.push_back(value.alternative.empty() ? value.key
                                                     : fmt::format("{} (alternative \"{}\")",
                                                                   value.key, value.alternative));
        }
        replaced.push_back(fmt::format("{} of {}", fmt::join(what, ", "), values.material));
    }
    if (!replaced.empty()) {
        page.row("values from the design", fmt::format("{}", fmt::join(replaced, "; ")));
    }
}

void power_rows(Page& page, const Appraisal& appraisal) {
    if (!appraisal.light_load) return;
    constexpr double square_centimetre = 1e-4;
    const assess::LightLoad& load = *appraisal.light_load;
    page.row("incident power", power_text(load.power));
    page.row("absorbed in the coating", power_text(load.absorbed));
    page.row(
        "intensity at the centre",
        fmt::format("{:.4g} W/cm² incident; {:.4g} W/cm² at the field's maximum in the coating{}",
                    load.centre_intensity * square_centimetre,
                    load.largest_intensity * square_centimetre,
                    appraisal.faces.size() > 1 ? " (of s and p the larger)" : ""));
}

void face_section(Page& page, const stack::Design& design, const Face& face, bool label,
                  bool lower_limit) {
    const optics::Response& r = face.response;
    page.heading(label ? "Light, " + polarisation_text(face.polarisation) + " polarisation"
                       : "Light");
    page.row("reflectance", (lower_limit ? "at most " : "") + reflectance_text(r));
    page.row("transmittance", transmittance_text(r) + " (into the substrate)");
    page.row("absorptance", (lower_limit ? "at least " : "") + fraction_text(r.absorptance));
    loss_rows(page, design, face);
    if (!face.phase) {
        page.row("reflection phase",
                 "not defined: too little is reflected, or the light only just "
                 "enters the substrate (critical angle)");
    } else {
        // −π and π are one phase; rounding must not choose the sign.
        const double phase = face.phase->reflection_phase;
        const bool at_end = std::abs(phase) > core::pi - 5e-5;
        page.row("reflection phase", fmt::format("{:.4f} rad", at_end ? core::pi : phase));
        // Adding zero turns a rounded −0.00 into 0.00.
        const double dispersion = std::round(face.phase->group_delay_dispersion * 1e32) / 1e2 + 0.0;
        page.row("group delay", fmt::format("{}, dispersion {:.2f} fs²",
                                            time_text(face.phase->group_delay), dispersion));
    }
    page.row("stored energy", energy_text(sum(face.stored_energy)) + " of incident light");
    page.row("energy penetration depth", length_text(face.energy_penetration_depth));
    const auto peak = std::max_element(face.peak_intensity.begin(), face.peak_intensity.end());
    const auto layer = static_cast<std::size_t>(peak - face.peak_intensity.begin());
    page.row("|E/E_incident|²",
             fmt::format(
                 "{:.4g} at the face; in the coating at most {:.4g}, in layer {}, {} below its top",
                 face.face_intensity, *peak, layer + 1, length_text(face.peak_depth[layer])));
}

/// Which of two faces a line is about; nothing when there is one.
std::string light_words(const Appraisal& appraisal, const Face& face) {
    if (appraisal.faces.size() == 1) return "";
    return ", " + polarisation_text(face.polarisation) + " polarisation";
}

std::string percent(double share) { return fmt::format("{:.2f}", share * 100.0); }

void material_section(Page& page, const Appraisal& appraisal, const Face& face) {
    struct Sum {
        int layers = 0;
        double thickness = 0.0, absorptance = 0.0, energy = 0.0, peak = 0.0, noise = 0.0;
        bool absorption_known = true;
    };
    const std::vector<double> shares = brownian_shares(face.noise);
    std::map<std::string, Sum> sums;
    std::vector<std::string> order;
    for (std::size_t j = 0; j < appraisal.mirror.layers.size(); ++j) {
        const stack::MirrorLayer& layer = appraisal.mirror.layers[j];
        if (sums.count(layer.material) == 0) order.push_back(layer.material);
        Sum& s = sums[layer.material];
        ++s.layers;
        s.thickness += layer.thickness;
        s.absorptance += face.response.layer_absorptance[j];
        s.energy += face.stored_energy[j];
        s.peak = std::max(s.peak, face.peak_intensity[j]);
        s.absorption_known = layer.optical.extinction_known;
        if (!shares.empty()) s.noise += shares[j];
    }
    page.heading("Materials of the coating" + light_words(appraisal, face));
    std::vector<std::vector<std::string>> rows;
    const double energy = sum(face.stored_energy);
    for (const std::string& name : order) {
        const Sum& s = sums[name];
        rows.push_back(
            {name, std::to_string(s.layers), fmt::format("{:.1f}", s.thickness * 1e9),
             s.absorption_known ? fmt::format("{:.4g}", s.absorptance * 1e6) : "not stated",
             percent(s.energy / energy), fmt::format("{:.4g}", s.peak),
             shares.empty() ? "–" : percent(s.noise)});
    }
    page.table({"material", "layers", "nm", "absorbs ppm", "energy %", "|E|² max", "Brownian %"},
               rows);
}

void layer_section(Page& page, const stack::Design& design, const Appraisal& appraisal,
                   const PageOptions& options) {
    const Face& face = appraisal.faces.front();
    const std::vector<double> shares = brownian_shares(face.noise);
    const std::size_t count = appraisal.mirror.layers.size();
    const bool all = options.all_layers || count <= layers_on_page;
    const double energy = sum(face.stored_energy);
    page.heading(appraisal.faces.size() > 1
                     ? "Layers, from the light to the substrate (s polarisation)"
                     : "Layers, from the light to the substrate");
    std::vector<std::vector<std::string>> rows;
    for (std::size_t j = 0; j < count; ++j) {
        if (!all && j == outermost_on_page) rows.push_back({"…", "…"});
        if (!all && j >= outermost_on_page && j < count - innermost_on_page) continue;
        const stack::MirrorLayer& layer = appraisal.mirror.layers[j];
        rows.push_back(
            {std::to_string(j + 1), layer.material, fmt::format("{:.2f}", layer.thickness * 1e9),
             fmt::format("{:.4f}", layer.quarter_waves),
             fmt::format("{:.5f}", layer.optical.index.value),
             layer.optical.extinction_known
                 ? fmt::format("{:.3g}", face.response.layer_absorptance[j] * 1e6)
                 : "not stated",
             percent(face.stored_energy[j] / energy), fmt::format("{:.3g}", face.peak_intensity[j]),
             shares.empty() ? "–" : percent(shares[j])});
    }
    page.table({"no", "material", "nm", "quarter waves", "index", "absorbs ppm", "energy %",
                "|E|² max", "Brownian %"},
               rows, 2);
    if (design.coating.design_wavelength != design.light.wavelength) {
        page.line(
            fmt::format("  quarter waves here are those of the light, {:g} nm; `stillcoat layers` "
                        "counts them at {:g} nm",
                        design.light.wavelength * 1e9, design.coating.design_wavelength * 1e9));
    }
    if (appraisal.faces.size() > 1) {
        page.line("  the same for p polarisation: --csv layers");
    }
    if (!all) {
        page.line(fmt::format("  … {} more layers: --all-layers, or --csv layers",
                              count - outermost_on_page - innermost_on_page));
    }
}

/// The answer in two lines, for those who read no further.
void short_section(Page& page, const Appraisal& appraisal) {
    page.heading("In short");
    const optics::Response mean = mean_response(appraisal);
    const bool lower_limit = absorption_unknown(appraisal);
    page.item(fmt::format(
        "reflects {}{}, transmits {}, absorbs {}{}{}", lower_limit ? "at most " : "",
        reflectance_text(mean), transmittance_text(mean), lower_limit ? "at least " : "",
        fraction_text(mean.absorptance), appraisal.faces.size() > 1 ? " (unpolarised)" : ""));
    for (const Face& face : appraisal.faces) {
        // Of a coating that lets the light pass, the noise of what it reflects is no summary.
        constexpr double mirror_from = 0.01;
        if (face.response.reflectance < mirror_from) continue;
        const std::string movement = movement_text(face.noise);
        const std::string light =
            appraisal.faces.size() == 1
                ? ""
                : "in " + polarisation_text(face.polarisation) + " polarisation ";
        if (!movement.empty()) page.item(light + movement);
    }
    if (!appraisal.warnings.empty()) {
        page.item(count_text(appraisal.warnings.size(), "warning") + " below", true);
    }
}

void list_section(Page& page, const std::string& title, const std::vector<std::string>& list,
                  bool important) {
    if (list.empty()) return;
    page.heading(title);
    for (const std::string& text : list) page.item(text, important);
}

/// Values that share a rule share a line; the operating temperature is known to the reader.
std::vector<std::string> by_rule(const std::vector<std::string>& analogies, double temperature) {
    std::vector<std::pair<std::string, std::string>> rules;
    for (const std::string& analogy : analogies) {
        const std::size_t colon = analogy.find(": ");
        const std::string how = analogy.substr(colon + 2);
        std::string what = analogy.substr(0, colon);
        const std::string here = fmt::format(" at {:g} K", temperature);
        if (what.size() > here.size() &&
            what.compare(what.size() - here.size(), here.size(), here) == 0) {
            what.erase(what.size() - here.size());
        }
        const auto known = std::find_if(rules.begin(), rules.end(),
                                        [&how](const auto& rule) { return rule.first == how; });
        if (known == rules.end()) {
            rules.emplace_back(how, what);
        } else {
            known->second += "; " + what;
        }
    }
    std::vector<std::string> lines;
    for (const auto& [how, what] : rules) lines.push_back(how + ": " + what);
    return lines;
}

}  // namespace

std::string appraisal_text(const stack::Design& design, const materials::Library& library,
                           const Appraisal& appraisal, const PageOptions& options) {
    Page page(options.colour);
    page.heading(design.title);
    page.line("  " + design.document.name);
    short_section(page, appraisal);
    mirror_section(page, design, appraisal);
    const bool lower_limit = absorption_unknown(appraisal);
    for (const Face& face : appraisal.faces) {
        face_section(page, design, face, design.light.angle > 0.0, lower_limit);
    }
    if (appraisal.faces.size() > 1) {
        page.heading("Light, unpolarised (mean of s and p)");
        const optics::Response mean = mean_response(appraisal);
        page.row("reflectance", reflectance_text(mean));
        page.row("transmittance", transmittance_text(mean));
        page.row("absorptance", (lower_limit ? "at least " : "") + fraction_text(mean.absorptance));
    }
    power_rows(page, appraisal);
    part_section(page, design, appraisal);
    neighbourhood_section(page, design, appraisal);
    for (const Face& face : appraisal.faces) material_section(page, appraisal, face);
    const assess::Noise& noise = appraisal.faces.front().noise;
    if (!noise.layers.empty()) {
        page.line(fmt::format("  Brownian %: share of the coating's Brownian noise power at {}",
                              frequency_text(noise.layer_frequency)));
    }
    layer_section(page, design, appraisal, options);
    for (const Face& face : appraisal.faces) {
        noise_section(page, appraisal.mirror, face.noise, light_words(appraisal, face));
    }
    list_section(page, "Warnings", appraisal.warnings, true);
    list_section(page, "Assumed or left out", appraisal.notes, false);
    list_section(page, "Values by analogy", by_rule(appraisal.analogies, design.temperature),
                 false);
    page.heading("Uncertainty");
    page.item(
        "results are given without uncertainty: the material values below carry theirs, see "
        "`stillcoat "
        "materials NAME`");
    if (!appraisal.fixed.empty()) {
        page.item(
            fmt::format("no uncertainty is stated for: {}", fmt::join(appraisal.fixed, ", ")));
    }
    sources_section(page, library, appraisal);
    return page.text();
}

}  // namespace stillcoat::present
