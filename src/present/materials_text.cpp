#include "present/materials_text.hpp"

#include <fmt/format.h>

#include "stillcoat/core/constants.hpp"

namespace stillcoat::present {
namespace {

using materials::Entry;
using materials::Interval;
using materials::PropertyInfo;

std::string in_unit(double value, const core::QuantityKind& kind) {
    return fmt::format("{:.6g}{}{}", value, kind.si_unit == "1" ? "" : " ",
                       kind.si_unit == "1" ? "" : kind.si_unit);
}

std::string mixture_text(const materials::Mixed& mixture) {
    const double percent = 100.0 * mixture.fraction;
    return fmt::format("{:.6g} % {} and {:.6g} % {} by volume", 100.0 - percent, mixture.first,
                       percent, mixture.second);
}

std::string table_text(const std::vector<double>& x, const std::vector<double>& y, double scale,
                       const std::string& axis_unit, const core::QuantityKind& kind) {
    std::string text;
    for (std::size_t i = 0; i < x.size(); ++i) {
        text += fmt::format("{}{:g} {}: {:.4g}", i == 0 ? "" : ", ", x[i] * scale, axis_unit, y[i]);
    }
    return text + (kind.si_unit == "1" ? "" : " (" + kind.si_unit + ")");
}

struct CurveText {
    const core::QuantityKind& kind;
    std::string operator()(const materials::Scalar& c) const { return in_unit(c.value, kind); }
    std::string operator()(const materials::TemperatureTable& c) const {
        return table_text(c.temperature, c.value, 1.0, "K", kind);
    }
    std::string operator()(const materials::WavelengthTable& c) const {
        return table_text(c.wavelength, c.value, 1e9, "nm", kind);
    }
    std::string operator()(const materials::PowerLaw& c) const {
        return fmt::format("{:.4g} · (f / 1 Hz)^{:g}", c.at_1_hz, c.exponent);
    }
    std::string operator()(const materials::Sellmeier& c) const {
        return fmt::format("Sellmeier formula with {} resonances{}", c.strength.size(),
                           c.depends_on_temperature ? ", each a polynomial in temperature" : "");
    }
    std::string operator()(const materials::Cauchy& c) const {
        return fmt::format("Cauchy formula {:g} + {:g}/λ² + {:g}/λ⁴, λ in µm", c.a, c.b, c.c);
    }
    std::string operator()(const materials::SameAs& c) const {
        return fmt::format("as {}{}", c.material,
                           c.factor == 1.0 ? "" : fmt::format(", times {:g}", c.factor));
    }
    std::string operator()(const materials::Mixed& c) const { return "from " + mixture_text(c); }
};

std::string limits_text(const Entry& entry) {
    std::string text;
    const auto add = [&text](const std::optional<Interval>& range, double scale, const char* unit) {
        if (!range) return;
        text += fmt::format("{}{:g}–{:g} {}", text.empty() ? "" : ", ", range->lower * scale,
                            range->upper * scale, unit);
    };
    add(entry.temperature, 1.0, "K");
    add(entry.wavelength, 1e9, "nm");
    add(entry.frequency, 1.0, "Hz");
    if (entry.continued_to) text += fmt::format("; continued to {:g} K", *entry.continued_to);
    if (text.empty() && std::holds_alternative<materials::Mixed>(entry.curve))
        return "what the data of both hold for";
    return text.empty() ? "no limit stated" : text;
}

std::string beyond_text(const materials::Beyond& beyond) {
    std::string how;
    switch (beyond.rule) {
        case materials::Beyond::Rule::constant:
            how = "held constant";
            break;
        case materials::Beyond::Rule::debye:
            how = fmt::format("scaled as a Debye solid of {:g} K", beyond.debye_temperature);
            break;
        case materials::Beyond::Rule::follows:
            how = "scaled like that of " + beyond.material;
            break;
        case materials::Beyond::Rule::heat_capacity:
            how = "scaled with its heat capacity";
            break;
    }
    std::string where;
    if (beyond.temperature)
        where += fmt::format(" {:g}–{:g} K", beyond.temperature->lower, beyond.temperature->upper);
    if (beyond.wavelength) {
        where += fmt::format(" {:g}–{:g} nm", beyond.wavelength->lower * 1e9,
                             beyond.wavelength->upper * 1e9);
    }
    return fmt::format("beyond its data, for{}: {}{}", where, how,
                       beyond.note.empty() ? "" : "; " + beyond.note);
}

std::string citations(const std::vector<std::string>& keys, const materials::Library& library) {
    std::string text;
    for (const std::string& key : keys) {
        const auto found = library.references.find(key);
        text += (text.empty() ? "" : "; ") +
                (found == library.references.end() ? key : found->second.citation);
    }
    return text;
}

std::string sources_text(const Entry& entry, const materials::Library& library) {
    return fmt::format("{} [{}] ({}, {})", citations(entry.sources, library), entry.place,
                       entry.nature, entry.status);
}

/// What else an index datum says: its medium, its level, its offset.
std::string index_text(const Entry& entry) {
    std::string text = entry.medium == materials::Medium::air      ? "relative to air"
                       : entry.medium == materials::Medium::vacuum ? "in vacuum"
                                                                   : "air or vacuum not stated";
    if (entry.offset != 0.0) text += fmt::format("; plus {:g}", entry.offset);
    if (entry.rescaled_to) {
        text += fmt::format("; the whole rescaled to {:g} at {:g} nm", entry.rescaled_to->second,
                            entry.rescaled_to->first * 1e9);
    }
    return text;
}

void entry_rows(Page& page, const std::string& label, const Entry& entry, const PropertyInfo& about,
                const materials::Library& library) {
    page.row(label, std::visit(CurveText{*about.kind}, entry.curve));
    if (about.id == materials::PropertyId::refractive_index) page.row("", index_text(entry));
    page.row(
        "", width_text(entry.width, *about.kind) +
                (entry.between_laboratories ? fmt::format("; between laboratories {:.3g} to {:.3g}",
                                                          entry.between_laboratories->lower,
                                                          entry.between_laboratories->upper)
                                            : ""));
    page.row("", "holds for " + limits_text(entry) +
                     (entry.measured_at.empty() ? "" : "; " + entry.measured_at));
    if (entry.cold) {
        page.row("", fmt::format("cold: {} ({})", CurveText{*about.kind}(entry.cold->table),
                                 entry.cold->status));
    }
    if (entry.beyond) page.row("", beyond_text(*entry.beyond));
    page.row("", sources_text(entry, library));
    if (!entry.note.empty()) page.row("", "note: " + entry.note);
}

/// Every piece of data behind a value, with where it holds and where it comes from.
void basis_rows(Page& page, const std::vector<materials::Basis>& bases,
                const materials::Library& library) {
    for (const materials::Basis& basis : bases) {
        const PropertyInfo& about = materials::info(basis.property);
        std::string what = fmt::format("{} of {}", about.title, basis.material);
        if (basis.part == materials::Part::cold_table) {
            what += fmt::format(
                ", cold table: as printed up to {:g} K, joined to the "
                "room-temperature value at {:g} K",
                basis.entry->cold->join.lower, basis.entry->cold->join.upper);
        } else if (basis.part == materials::Part::rule) {
            what += ", " + beyond_text(*basis.entry->beyond);
        } else {
            what += ", holds for " + limits_text(*basis.entry);
        }
        page.row("rests on", what);
        const std::string status = materials::status_of(basis);
        page.row("", fmt::format("{} [{}] ({}{})", citations(materials::sources_of(basis), library),
                                 materials::place_of(basis), materials::nature_of(basis),
                                 status == "not stated" ? "" : ", " + status));
    }
}

}  // namespace

std::string materials_list(const materials::Library& library, bool colour) {
    Page page(colour);
    for (const char* form : {"bulk", "film", "metal"}) {
        std::vector<std::vector<std::string>> rows;
        for (const auto& [name, material] : library.materials) {
            if (material.form == form) rows.push_back({name, material.title});
        }
        if (rows.empty()) continue;
        page.heading(form == std::string("bulk")   ? "Substrates"
                     : form == std::string("film") ? "Films"
                                                   : "Metals");
        page.table({"name", "what it is"}, rows, 2);
    }
    page.line("");
    page.line("  stillcoat materials NAME shows what is known of one, with sources and validity.");
    return page.text();
}

std::string material_page(const materials::Library& library, const std::string& name, bool colour) {
    const materials::Material& material = library.at(name);
    Page page(colour);
    page.heading(fmt::format("{}: {}", name, material.title));
    page.row("file", material.file);
    if (!material.composition.empty()) page.row("composition", material.composition);
    if (!material.remark.empty()) page.row("remark", material.remark);
    if (material.mixture) page.row("mixture", mixture_text(*material.mixture));
    for (const auto& [id, property] : material.properties) {
        const PropertyInfo& about = materials::info(id);
        page.heading(about.title + "  (" + about.key + ")");
        entry_rows(page, "default", property.entry, about, library);
        for (const materials::Alternative& alternative : property.alternatives) {
            entry_rows(page, alternative.name, alternative.entry, about, library);
            page.row("", "why not the default: " + alternative.reason);
        }
    }
    if (!material.unknown.empty()) page.heading("Not known");
    for (const auto& [id, reason] : material.unknown) page.row(materials::info(id).key, reason);
    return page.text();
}

std::string property_page(const materials::Library& library, const std::string& name,
                          materials::PropertyId property, const materials::Conditions& conditions,
                          bool colour) {
    const PropertyInfo& about = materials::info(property);
    Page page(colour);
    page.heading(fmt::format("{} of {}", about.title, name));
    page.row("at", fmt::format("{:g} K, {:g} nm, {:g} Hz", conditions.temperature,
                               conditions.wavelength * 1e9, conditions.frequency));
    if (property == materials::PropertyId::refractive_index) {
        const auto value =
            materials::index_at(library, name, conditions.wavelength, conditions.temperature);
        if (!value.index) throw core::InputError(value.missing, "");
        const double group = value.index->value + 2.0 * core::pi * core::speed_of_light /
                                                      conditions.wavelength * value.index->first;
        page.row("value",
                 fmt::format("{:.6f} in vacuum; group index {:.6f}", value.index->value, group));
        page.row("", width_text(value.width, *about.kind));
        page.row("note", value.note);
        page.row("by analogy", value.analogy);
        basis_rows(page, value.bases, library);
        return page.text();
    }
    const materials::Value value = materials::evaluate(library, name, property, conditions);
    if (!value.number) throw core::InputError(value.missing, "");
    page.row("value", in_unit(*value.number, *about.kind));
    page.row("", width_text(value.width, *about.kind));
    if (value.frequency_extrapolated) page.row("", "outside the frequencies of the measurement");
    page.row("by analogy", value.analogy);
    basis_rows(page, value.bases, library);
    return page.text();
}

std::string units_page(bool colour) {
    Page page(colour);
    page.heading("Units in design files: a number, a blank, a unit, in quotes: \"1397 nm\"");
    std::vector<std::vector<std::string>> rows;
    for (const core::UsualUnits& usual : core::usual_units()) {
        rows.push_back(
            {usual.kind.name, fmt::format("{}", fmt::join(usual.units, ", ")), usual.used_for});
    }
    page.table({"kind", "usual units", "used for"}, rows, 3);
    page.line("");
    page.line("  Any other unit of the right kind that UDUNITS-2 knows is accepted too.");
    return page.text();
}

}  // namespace stillcoat::present
