#include "stillcoat/assess/neighbourhood.hpp"

#include <algorithm>
#include <cmath>
#include <functional>
#include <map>

#include "assess/optical_view.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/materials/evaluation.hpp"

namespace stillcoat::assess {
namespace {

using optics::Polarisation;

/// A wavelength at which a material has no data.
struct NoData {
    std::string material, message;
};

/// The index of one material at one temperature. Where it is carried from the temperature of its
/// datum by a dn/dT that is the same at all wavelengths, the way is integrated once.
class IndexAtTemperature {
  public:
    IndexAtTemperature(const materials::Library& library, std::string material, double temperature,
                       double wavelength)
        : library_(library), material_(std::move(material)), temperature_(temperature) {
        const materials::IndexValue here =
            materials::index_at(library, material_, wavelength, temperature);
        if (!here.index || here.entry == nullptr || !here.entry->at_temperature) return;
        const bool carried =
            std::any_of(here.bases.begin(), here.bases.end(), [&](const materials::Basis& basis) {
                return basis.material == material_ &&
                       basis.property == materials::PropertyId::thermo_optic_coefficient;
            });
        const double own = *here.entry->at_temperature;
        const materials::IndexValue there =
            materials::index_at(library, material_, wavelength, own);
        if (!carried || own == temperature || !there.index) return;
        carried_from_ = own;
        change_ = here.index->value - there.index->value;
        slopes_ = slopes(wavelength);
    }

    materials::IndexValue whole_way(double wavelength) const {
        return materials::index_at(library_, material_, wavelength, temperature_);
    }

    /// Equals whole_way() up to rounding.
    materials::IndexValue quick(double wavelength) const {
        if (!carried_from_ || slopes(wavelength) != slopes_) return whole_way(wavelength);
        materials::IndexValue value =
            materials::index_at(library_, material_, wavelength, *carried_from_);
        if (value.index) value.index->value += change_;
        return value;
    }

  private:
    /// dn/dT on the way. One datum with one range of wavelengths gives it, so a few points tell.
    std::vector<std::optional<double>> slopes(double wavelength) const {
        constexpr int steps = 4;
        std::vector<std::optional<double>> list;
        for (int i = 0; i <= steps; ++i) {
            const double t = *carried_from_ + (temperature_ - *carried_from_) * i / steps;
            list.push_back(materials::evaluate(library_, material_,
                                               materials::PropertyId::thermo_optic_coefficient,
                                               {t, wavelength, 1.0})
                               .number);
        }
        return list;
    }

    const materials::Library& library_;
    std::string material_;
    double temperature_;
    std::optional<double> carried_from_;  ///< [K]
    double change_ = 0.0;
    std::vector<std::optional<double>> slopes_;
};

/// The mirror's layers under light of any wavelength. Every material is looked up once for each
/// wavelength, by the rules of stack::at_operating_point.
class Spectrum {
  public:
    /// @param temperature the operating or the reference temperature
    Spectrum(const stack::Design& design, const materials::Library& library,
             const stack::Mirror& mirror, double temperature)
        : library_(library),
          temperature_(temperature),
          medium_(design.light.medium),
          stack_(optical_stack(mirror)) {
        for (std::size_t j = 0; j < mirror.layers.size(); ++j) {
            const stack::MirrorLayer& layer = mirror.layers[j];
            slots_.push_back(slot(layer.material, design.light.wavelength));
            stack_.layers[j].thickness =
                temperature == design.temperature ? layer.thickness : layer.reference_thickness;
        }
        film_count_ = lookups_.size();
        substrate_slot_ = slot(mirror.substrate, design.light.wavelength);
        if (medium_ != "vacuum" && medium_ != "air") {
            medium_slot_ = slot(medium_, design.light.wavelength);
        }
    }

    /// As a separate evaluation at that wavelength says, to the last digit.
    /// @throws NoData
    optics::Response exact_response(const optics::Illumination& light) {
        put(look_up(light.wavelength, true));
        return optics::response(stack_, light);
    }

    /// The same up to rounding.
    /// @throws NoData
    optics::Response response(const optics::Illumination& light) {
        auto known = colours_.find(light.wavelength);
        if (known == colours_.end()) {
            known = colours_.emplace(light.wavelength, look_up(light.wavelength, false)).first;
        }
        put(known->second);
        return optics::response(stack_, light);
    }

    bool absorption_known(double wavelength) const {
        return look_up(wavelength, true).absorption_known;
    }

    bool has_data(double wavelength) const {
        try {
            look_up(wavelength, false);
            return true;
        } catch (const NoData&) {
            return false;
        }
    }

  private:
    struct Colour {
        std::vector<optics::Complex> indices;  ///< of the materials
        bool absorption_known = true;          ///< of the films
    };

    std::size_t slot(const std::string& material, double wavelength) {
        const auto known = std::find(names_.begin(), names_.end(), material);
        if (known != names_.end()) return static_cast<std::size_t>(known - names_.begin());
        names_.push_back(material);
        lookups_.emplace_back(library_, material, temperature_, wavelength);
        return names_.size() - 1;
    }

    Colour look_up(double wavelength, bool exact) const {
        Colour colour;
        for (std::size_t i = 0; i < names_.size(); ++i) {
            const materials::IndexValue n =
                exact ? lookups_[i].whole_way(wavelength) : lookups_[i].quick(wavelength);
            if (!n.index) throw NoData{names_[i], n.missing};
            const materials::Value k = materials::evaluate(
                library_, names_[i], materials::PropertyId::extinction_coefficient,
                {temperature_, wavelength, 1.0});
            if (!k.number) {
                if (library_.at(names_[i]).form == "metal") throw NoData{names_[i], k.missing};
                if (i < film_count_) colour.absorption_known = false;
            }
            colour.indices.emplace_back(n.index->value, k.number.value_or(0.0));
            if (medium_slot_ == i && k.number.value_or(0.0) > largest_medium_extinction) {
                throw NoData{names_[i], "the incident medium absorbs there"};
            }
        }
        return colour;
    }

    void put(const Colour& colour) {
        for (std::size_t j = 0; j < slots_.size(); ++j) {
            stack_.layers[j].index = colour.indices[slots_[j]];
        }
        stack_.substrate_index = colour.indices[substrate_slot_];
        if (medium_slot_) stack_.incident_index = colour.indices[*medium_slot_].real();
    }

    static constexpr double largest_medium_extinction = 1e-6;
    const materials::Library& library_;
    double temperature_;
    std::string medium_;
    optics::OpticalStack stack_;
    std::vector<std::string> names_;
    std::vector<IndexAtTemperature> lookups_;
    std::vector<std::size_t> slots_;  ///< of each layer's material
    std::size_t film_count_ = 0, substrate_slot_ = 0;
    std::optional<std::size_t> medium_slot_;
    std::map<double, Colour> colours_;
};

/// The last wavelength with data on the way from one with to one without.
double end_of_data(const Spectrum& spectrum, double with, double without) {
    for (;;) {
        const double middle = std::sqrt(with * without);
        if (!(std::min(with, without) < middle && middle < std::max(with, without))) return with;
        (spectrum.has_data(middle) ? with : without) = middle;
    }
}

struct FoundBand {
    optics::StopBand band;
    std::string short_material, long_material;  ///< whose data end the search on either side
};

/// The band around a wavelength that has data. Where the search meets a wavelength without, it
/// starts again with this as its limit; what was looked up is kept.
FoundBand search(Spectrum& spectrum, const optics::Illumination& light) {
    optics::WavelengthRange data;
    FoundBand found{};
    for (;;) {
        double asked = light.wavelength;
        const std::function<optics::Response(double)> response_at = [&](double wavelength) {
            asked = wavelength;
            return spectrum.response({wavelength, light.angle, light.polarisation});
        };
        try {
            found.band = optics::stop_band(response_at, light.wavelength, data);
            return found;
        } catch (const NoData& missing) {
            if (asked == light.wavelength) throw;
            const double last = end_of_data(spectrum, light.wavelength, asked);
            const bool shorter = asked < light.wavelength;
            // Each turn brings an end nearer, so that this ends.
            (shorter ? data.shortest : data.longest) = last;
            (shorter ? found.short_material : found.long_material) = missing.material;
        }
    }
}

BandEdge edge(const optics::StopBandEdge& found, const std::string& material) {
    const bool data = found.state == optics::EdgeState::beyond_data;
    return {found.wavelength, found.state, data ? material : "", std::nullopt};
}

std::optional<double> centre(const optics::StopBand& band) {
    const bool both = band.short_edge.state == optics::EdgeState::found &&
                      band.long_edge.state == optics::EdgeState::found;
    return both ? std::optional<double>(band.centre_wavelength) : std::nullopt;
}

ReflectionBand band_of(const FoundBand& found) {
    const optics::StopBand& band = found.band;
    ReflectionBand result{};
    result.short_edge = edge(band.short_edge, found.short_material);
    result.long_edge = edge(band.long_edge, found.long_material);
    result.centre = centre(band);
    if (result.centre) result.relative_half_width = band.relative_half_width;
    result.top_reflectance = band.top_reflectance;
    result.operating_wavelength_inside = band.operating_wavelength_inside;
    return result;
}

/// How edges and centre moved since the reference temperature. The search there begins where the
/// operating wavelength was in the band, as far as the optical thickness tells.
void add_shifts(Spectrum& earlier, const stack::Mirror& mirror, optics::Illumination light,
                ReflectionBand& band) {
    light.wavelength /= mirror.optical_path_ratio;
    if (!earlier.has_data(light.wavelength)) return;
    const optics::StopBand before = search(earlier, light).band;
    const auto shift = [](BandEdge& now, const optics::StopBandEdge& then) {
        const bool both =
            now.state == optics::EdgeState::found && then.state == optics::EdgeState::found;
        if (both) now.shift = now.wavelength - then.wavelength;
    };
    shift(band.short_edge, before.short_edge);
    shift(band.long_edge, before.long_edge);
    const std::optional<double> centre_before = centre(before);
    if (band.centre && centre_before) band.centre_shift = *band.centre - *centre_before;
}

Reflected reflected(const optics::Response& r) {
    return {r.reflectance, r.loss, r.transmittance, r.log_transmittance, r.absorptance};
}

Reflected mean_of(const Reflected& s, const Reflected& p) {
    const double transmittance = (s.transmittance + p.transmittance) / 2.0;
    return {(s.reflectance + p.reflectance) / 2.0, (s.loss + p.loss) / 2.0, transmittance,
            std::log(transmittance), (s.absorptance + p.absorptance) / 2.0};
}

Departure departure(Spectrum& spectrum, double wavelength, double angle, bool s, bool p) {
    Departure result{};
    result.wavelength = wavelength;
    result.angle = angle;
    try {
        if (s) result.s = reflected(spectrum.exact_response({wavelength, angle, Polarisation::s}));
        if (p) result.p = reflected(spectrum.exact_response({wavelength, angle, Polarisation::p}));
        result.absorption_known = spectrum.absorption_known(wavelength);
        result.mean = s && p ? mean_of(*result.s, *result.p) : s ? result.s : result.p;
    } catch (const NoData& missing) {
        result.missing = missing.message;
    }
    return result;
}

std::vector<Departure> departures(const stack::Design& design, Spectrum& spectrum) {
    const stack::Light& light = design.light;
    using stack::PolarisationChoice;
    const bool normal = light.angle == 0.0;
    const bool either = normal && !light.polarisation_stated;
    const bool s = either || light.polarisation != PolarisationChoice::p;
    const bool p = either || light.polarisation != PolarisationChoice::s;
    std::vector<Departure> list;
    for (const double share : {-wavelength_departure, wavelength_departure}) {
        list.push_back(departure(spectrum, light.wavelength * (1.0 + share), light.angle,
                                 normal || s, !normal && p));
    }
    constexpr double tilt = angle_departure * core::pi / 180.0;
    if (!normal) {
        list.push_back(departure(spectrum, light.wavelength, std::abs(light.angle - tilt), s, p));
    }
    if (light.angle + tilt < core::pi / 2.0) {
        list.push_back(departure(spectrum, light.wavelength, light.angle + tilt, s, p));
    }
    return list;
}

}  // namespace

Neighbourhood neighbourhood(const stack::Design& design, const materials::Library& library,
                            const stack::Mirror& mirror) {
    Neighbourhood result{};
    Spectrum spectrum(design, library, mirror, design.temperature);
    std::optional<Spectrum> earlier;
    const double reference = design.coating.reference_temperature;
    if (design.temperature != reference) earlier.emplace(design, library, mirror, reference);
    const bool normal = design.light.angle == 0.0;
    using stack::PolarisationChoice;
    for (const Polarisation polarisation : {Polarisation::s, Polarisation::p}) {
        const bool s = polarisation == Polarisation::s;
        const bool asked = normal ? s
                                  : design.light.polarisation !=
                                        (s ? PolarisationChoice::p : PolarisationChoice::s);
        if (!asked) continue;
        const optics::Illumination light{design.light.wavelength, design.light.angle, polarisation};
        const FoundBand found = search(spectrum, light);
        result.top_reflectance = std::max(result.top_reflectance, found.band.top_reflectance);
        if (found.band.top_reflectance < least_band_reflectance) continue;
        ReflectionBand band = band_of(found);
        if (earlier) add_shifts(*earlier, mirror, light, band);
        (s ? result.s_band : result.p_band) = std::move(band);
    }
    result.departures = departures(design, spectrum);
    return result;
}

}  // namespace stillcoat::assess
