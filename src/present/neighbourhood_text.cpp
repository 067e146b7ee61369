#include "present/neighbourhood_text.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "stillcoat/core/constants.hpp"

namespace stillcoat::present {
namespace {

using assess::BandEdge;
using assess::Reflected;
using assess::ReflectionBand;

std::string degrees_text(double angle) { return fmt::format("{:g}°", angle * 180.0 / core::pi); }

std::string nanometres(double wavelength, int digits = 5) {
    return fmt::format("{:.{}g} nm", wavelength * 1e9, digits);
}

/// "935.9 nm", or why there is no edge.
std::string edge_text(const BandEdge& edge, int digits) {
    switch (edge.state) {
        case optics::EdgeState::found:
            return nanometres(edge.wavelength, digits);
        case optics::EdgeState::beyond_data:
            return fmt::format("beyond the data of {} ({})", edge.material,
                               nanometres(edge.wavelength));
        case optics::EdgeState::beyond_search:
            return fmt::format("beyond {}, where the search ended", nanometres(edge.wavelength));
    }
    return "";
}

std::string band_text(const ReflectionBand& band) {
    // Enough digits to tell the edges of a narrow band apart.
    const double width = band.relative_half_width.value_or(1.0);
    const int digits = std::clamp(static_cast<int>(std::ceil(3.0 - std::log10(width))), 5, 10);
    std::string text = fmt::format("from {} to {}", edge_text(band.short_edge, digits),
                                   edge_text(band.long_edge, digits));
    if (band.centre) {
        text += fmt::format("; centre {}, ± {:.3g} % in frequency",
                            nanometres(*band.centre, digits), width * 100.0);
    }
    if (!band.operating_wavelength_inside) text += "; the operating wavelength lies outside";
    return text;
}

void band_rows(Page& page, const assess::Neighbourhood& around, bool both) {
    if (!around.s_band && !around.p_band) {
        page.row("stop band", fmt::format("none: the coating reflects at most {} hereabouts",
                                          fraction_text(around.top_reflectance)));
        return;
    }
    const auto row = [&](const std::optional<ReflectionBand>& band, const std::string& name) {
        if (!band && !both) return;
        page.row(both ? "stop band, " + name : "stop band",
                 band ? band_text(*band) : "none: no reflector in this polarisation");
    };
    row(around.s_band, "s");
    row(around.p_band, "p");
}

/// "; centre of the stop band −1.02 nm", or what edge is known; empty when none is.
std::string shift_text(const ReflectionBand& band, const std::string& polarisation) {
    const auto words = [&](const std::string& what, double shift) {
        return fmt::format("; {} of the stop band{} {:+.2f} nm", what, polarisation, shift * 1e9);
    };
    if (band.centre_shift) return words("centre", *band.centre_shift);
    if (band.short_edge.shift) return words("short edge", *band.short_edge.shift);
    if (band.long_edge.shift) return words("long edge", *band.long_edge.shift);
    return "";
}

/// The move of the spectrum from the reference to the operating temperature.
void shift_row(Page& page, const stack::Design& design, const assess::Appraisal& appraisal) {
    const double from = design.coating.reference_temperature;
    if (design.temperature == from) return;
    const double change = appraisal.mirror.optical_path_ratio - 1.0;
    const bool both = appraisal.faces.size() > 1;
    std::string moves;
    const assess::Neighbourhood& around = *appraisal.around;
    if (around.s_band) moves += shift_text(*around.s_band, both ? " in s" : "");
    if (around.p_band) moves += shift_text(*around.p_band, both ? " in p" : "");
    if (moves.empty()) {
        moves = fmt::format("; without dispersion the spectrum moves by {:+.2f} nm",
                            change * design.light.wavelength * 1e9);
    }
    page.row(design.temperature < from ? "on cooling" : "on warming",
             fmt::format("{:g} K → {:g} K: optical thickness {:+.0f} ppm{}", from,
                         design.temperature, change * 1e6, moves));
}

std::vector<std::string> table_row(const std::string& label, const Reflected& light) {
    return {label, near_one_text(light.reflectance, light.loss),
            transmittance_text(light.transmittance, light.log_transmittance,
                               light.reflectance + light.absorptance)};
}

/// What differs from the operating point, first its size.
std::string departure_text(const stack::Design& design, const assess::Departure& departure) {
    std::string text;
    if (departure.wavelength != design.light.wavelength) {
        text = fmt::format("{} ({:+.0f} %)", nanometres(departure.wavelength),
                           (departure.wavelength / design.light.wavelength - 1.0) * 100.0);
    } else {
        text = degrees_text(departure.angle);
        if (design.light.angle > 0.0) {
            const bool more = departure.angle > design.light.angle;
            text += fmt::format(" ({:+.0f}°)", (more ? 1.0 : -1.0) * assess::angle_departure);
        } else {
            text += departure.s && departure.p ? " (mean of s and p)"
                    : departure.s              ? " (s)"
                                               : " (p)";
        }
    }
    return departure.missing.empty() && !departure.absorption_known
               ? text + ", absorption not stated"
               : text;
}

}  // namespace

void neighbourhood_section(Page& page, const stack::Design& design,
                           const assess::Appraisal& appraisal) {
    if (!appraisal.around) return;
    const assess::Neighbourhood& around = *appraisal.around;
    const bool both = appraisal.faces.size() > 1;
    page.heading("Around the operating point");
    band_rows(page, around, both);
    shift_row(page, design, appraisal);
    std::vector<std::vector<std::string>> rows;
    for (const assess::Departure& departure : around.departures) {
        if (departure.mean) {
            rows.push_back(table_row(departure_text(design, departure), *departure.mean));
        } else {
            rows.push_back({departure_text(design, departure), "–", "–"});
        }
    }
    page.table({both ? "light (mean of s and p)" : "light", "reflectance", "transmittance"}, rows);
    for (const assess::Departure& departure : around.departures) {
        if (!departure.missing.empty()) page.item("not computed: " + departure.missing);
    }
}

}  // namespace stillcoat::present
