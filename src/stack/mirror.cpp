#include "stillcoat/stack/mirror.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <functional>

namespace stillcoat::stack {
namespace {

using core::Problems;
using materials::IndexValue;
using materials::Library;
using materials::PropertyId;
using materials::Value;

/// Where a name stands, asked for only when something is wrong with it.
using Where = std::function<core::Place()>;

/// Where a value of a table of the document stands, also one that is a default.
Where value_place(const Design& design, const std::string& table, const std::string& key) {
    return [&design, table, key] {
        const core::Node* node = design.document.root.find(table);
        if (node != nullptr && node->find(key) != nullptr) node = node->find(key);
        return node != nullptr ? node->place() : core::Place{design.document.name, 0, 0, 1, ""};
    };
}

/// Optical constants of every material of the design, each looked up once.
class OpticalLookup {
  public:
    OpticalLookup(const Library& library, double wavelength, double temperature, Ledger& ledger)
        : library_(library), wavelength_(wavelength), temperature_(temperature), ledger_(ledger) {}

    /// Adds a problem at `place` (once per material) when the index is unknown.
    OpticalConstants get(const std::string& material, const Where& where, Problems& problems) {
        const auto found = known_.find(material);
        if (found != known_.end()) return found->second;
        OpticalConstants constants{numerics::Jet<double>(1.0), numerics::Jet<double>(0.0), false};
        const IndexValue index = materials::index_at(library_, material, wavelength_, temperature_);
        if (index.index) {
            ledger_.use_index(material, index);
            constants.index = *index.index;
        } else {
            problems.add(where(), index.missing, hint(material, PropertyId::refractive_index));
        }
        const Value k = materials::evaluate(library_, material, PropertyId::extinction_coefficient,
                                            {temperature_, wavelength_, 1.0});
        const auto used_as =
            library_.at(material).properties.count(PropertyId::extinction_coefficient) != 0
                ? PropertyId::extinction_coefficient
                : PropertyId::absorption_coefficient;
        if (ledger_.use(material, used_as, k)) {
            const bool per_length = used_as == PropertyId::absorption_coefficient;
            constants.extinction = materials::with_dispersion(k, per_length, wavelength_);
            constants.extinction_known = true;
        } else if (library_.at(material).form == "metal") {
            // A transparent metal is no approximation of one.
            problems.add(where(), k.missing, hint(material, used_as));
        }
        known_[material] = constants;
        return constants;
    }

  private:
    /// What to do about an unknown optical constant: an alternative that reaches there, if there is
    /// one.
    std::string hint(const std::string& material, PropertyId property) const {
        const std::vector<std::string> names = materials::alternatives_that_hold(
            library_, material, property, {temperature_, wavelength_, 1.0});
        const std::string& key = materials::info(property).key;
        if (!names.empty()) {
            return fmt::format(
                "its alternative reaches there: [material.\"{}\"] {} = {{ alternative = \"{}\" }}",
                material, key, names.front());
        }
        return fmt::format("choose another material, or state {} in [material.\"{}\"]", key,
                           material);
    }

    const Library& library_;
    double wavelength_, temperature_;
    Ledger& ledger_;
    std::map<std::string, OpticalConstants> known_;
};

/// Thickness strain of a clamped film from the reference to the operating temperature; 0 with a
/// note when an input is unknown.
class ThicknessStrain {
  public:
    ThicknessStrain(const Design& design, const Library& library, Ledger& ledger)
        : design_(design), library_(library), ledger_(ledger) {}

    double of(const std::string& material) {
        if (design_.temperature == design_.coating.reference_temperature) return 0.0;
        const auto found = known_.find(material);
        if (found != known_.end()) return found->second;
        const double from = design_.coating.reference_temperature;
        const double to = design_.temperature;
        const Value film = materials::expansion_between(library_, material, from, to);
        const Value base =
            materials::expansion_between(library_, design_.mirror.substrate, from, to);
        const Value poisson = materials::evaluate(library_, material, PropertyId::poisson_ratio,
                                                  {to, design_.light.wavelength, 1.0});
        double strain = 0.0;
        if (film.number && base.number && poisson.number) {
            ledger_.use(material, PropertyId::thermal_expansion, film);
            ledger_.use(design_.mirror.substrate, PropertyId::thermal_expansion, base);
            ledger_.use(material, PropertyId::poisson_ratio, poisson);
            const double nu = *poisson.number;
            strain = ((1.0 + nu) * *film.number - 2.0 * nu * *base.number) / (1.0 - nu);
        } else {
            const Value& culprit = !film.number ? film : !base.number ? base : poisson;
            ledger_.note(fmt::format("thickness change of {} from {:g} K to {:g} K left out: {}",
                                     material, from, to, culprit.missing));
        }
        known_[material] = strain;
        return strain;
    }

  private:
    const Design& design_;
    const Library& library_;
    Ledger& ledger_;
    std::map<std::string, double> known_;
};

/// The layer at the operating point; only its material when a problem is known already.
/// @param reference where the layer's quarter waves are counted
MirrorLayer operating_layer(const LayerInput& input, const Design& design, OpticalLookup& operating,
                            OpticalLookup& reference, ThicknessStrain& strain, Problems& problems) {
    const Where where = [&input] { return input.place(); };
    MirrorLayer layer{};
    layer.material = input.material;
    layer.optical = operating.get(input.material, where, problems);
    if (!problems.empty()) return layer;
    layer.reference_thickness = input.thickness.value_or(0.0);
    if (input.quarter_waves) {
        const double n = reference.get(input.material, where, problems).index.value;
        layer.reference_thickness =
            *input.quarter_waves * design.coating.design_wavelength / (4.0 * n);
    }
    layer.thickness = layer.reference_thickness * (1.0 + strain.of(input.material));
    layer.quarter_waves =
        4.0 * layer.optical.index.value * layer.thickness / design.light.wavelength;
    return layer;
}

/// The index of a medium outside the mirror.
/// @param table of the design file that names it
/// @param role what the medium is, for the message
numerics::Jet<double> medium_index(const Design& design, const std::string& table,
                                   const std::string& medium, const std::string& role,
                                   OpticalLookup& lookup, Problems& problems) {
    if (medium == "vacuum") return numerics::Jet<double>(1.0);
    if (medium == "air") return numerics::Jet<double>(materials::index_of_air);
    const Where where = value_place(design, table, "medium");
    const OpticalConstants constants = lookup.get(medium, where, problems);
    // Bulk absorption over the width of a wave is nothing; a real extinction makes R and T ill
    // defined.
    if (constants.extinction.value > 1e-6) {
        problems.add(where(),
                     fmt::format("{} absorbs (k = {:.3g}): an absorbing {} medium is refused",
                                 medium, constants.extinction.value, role),
                     "reflectance and transmittance are not defined in it");
    }
    return constants.index;
}

}  // namespace

std::optional<double> Ledger::use(const std::string& material, PropertyId property,
                                  const Value& value) {
    if (value.number) {
        add({material, property, value.width, value.bases, value.frequency_extrapolated},
            value.analogy);
    }
    return value.number;
}

void Ledger::use_index(const std::string& material, const IndexValue& value) {
    add({material, PropertyId::refractive_index, value.width, value.bases, false}, value.analogy);
    if (!value.note.empty()) note(value.note);
}

void Ledger::note(const std::string& text) {
    if (std::find(notes_.begin(), notes_.end(), text) == notes_.end()) notes_.push_back(text);
}

void Ledger::add(Use use, const std::string& analogy) {
    if (!analogy.empty() &&
        std::find(analogies_.begin(), analogies_.end(), analogy) == analogies_.end()) {
        analogies_.push_back(analogy);
    }
    for (Use& known : uses_) {
        if (known.material != use.material || known.property != use.property) continue;
        materials::add_bases(known.bases, use.bases);
        known.frequency_extrapolated = known.frequency_extrapolated || use.frequency_extrapolated;
        return;
    }
    uses_.push_back(std::move(use));
}

Mirror at_operating_point(const Design& design, const Library& library, Ledger& ledger) {
    Problems problems;
    const Coating& coating = design.coating;
    Ledger unused;  // indices at the reference point count quarter waves; the operating ones are
                    // the result
    OpticalLookup reference(library, coating.design_wavelength, coating.reference_temperature,
                            unused);
    OpticalLookup operating(library, design.light.wavelength, design.temperature, ledger);
    OpticalLookup reference_colour(library, design.light.wavelength, coating.reference_temperature,
                                   unused);
    ThicknessStrain strain(design, library, ledger);
    Mirror mirror{};
    mirror.substrate = design.mirror.substrate;
    mirror.incident_index =
        medium_index(design, "light", design.light.medium, "incident", operating, problems);
    mirror.substrate_optical =
        operating.get(mirror.substrate, value_place(design, "mirror", "substrate"), problems);
    double path = 0.0;
    double reference_path = 0.0;
    for (const LayerInput& input : coating.layers) {
        const Where where = [&input] { return input.place(); };
        MirrorLayer layer = operating_layer(input, design, operating, reference, strain, problems);
        if (!problems.empty()) continue;
        path += layer.optical.index.value * layer.thickness;
        reference_path += reference_colour.get(input.material, where, problems).index.value *
                          layer.reference_thickness;
        mirror.coating_thickness += layer.thickness;
        mirror.layers.push_back(std::move(layer));
    }
    if (design.rear_face) {
        const RearFace& face = *design.rear_face;
        mirror.rear =
            MirrorRear{medium_index(design, "rear_face", face.medium, "rear", operating, problems),
                       design.mirror.thickness.value_or(0.0),
                       {}};
        for (const LayerInput& input : face.layers) {
            mirror.rear->layers.push_back(
                operating_layer(input, design, operating, reference, strain, problems));
        }
    }
    problems.throw_if_any();
    mirror.optical_path_ratio = path / reference_path;
    return mirror;
}

}  // namespace stillcoat::stack
