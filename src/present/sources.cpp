#include "present/sources.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <map>

namespace stillcoat::present {

std::vector<SourceUse> data_sources(const materials::Library& library,
                                    const assess::Appraisal& appraisal) {
    std::map<std::string, SourceUse> by_key;
    const auto add = [&](const std::string& key, const std::string& use) {
        SourceUse& source = by_key[key];
        const auto reference = library.references.find(key);
        const bool known = reference != library.references.end();
        source.key = known ? key : "";
        source.citation = known ? reference->second.citation : key;
        if (std::find(source.used_for.begin(), source.used_for.end(), use) ==
            source.used_for.end()) {
            source.used_for.push_back(use);
        }
    };
    for (const stack::Ledger::Use& use : appraisal.uses) {
        for (const materials::Basis& basis : use.bases) {
            // A rule has no status: what it says is by analogy.
            const std::string how = basis.part == materials::Part::rule
                                        ? materials::nature_of(basis)
                                        : materials::status_of(basis);
            const std::string what = fmt::format(
                "{} of {} ({})", materials::info(basis.property).title, basis.material, how);
            for (const std::string& key : materials::sources_of(basis)) add(key, what);
        }
    }
    std::vector<SourceUse> list;
    for (auto& [key, source] : by_key) list.push_back(std::move(source));
    return list;
}

std::vector<std::string> formula_sources(const assess::Appraisal& appraisal) {
    std::vector<std::string> list{
        "optics: characteristic vector of a layered medium, Abelès, Ann. Phys. (Paris) 12, 596 "
        "(1950); Born & Wolf, "
        "Principles of Optics, §1.6; stored energy in its non-dispersive form"};
    // Terms that rest on the same formula share a line.
    std::vector<std::pair<std::string, std::string>> by_source;
    const assess::Noise& noise = appraisal.faces.front().noise;
    for (const auto* group : {&noise.terms, &noise.comparisons}) {
        for (const assess::NoiseTerm& term : *group) {
            if (term.source.empty() || !term.missing.empty()) continue;
            const auto known =
                std::find_if(by_source.begin(), by_source.end(),
                             [&term](const auto& item) { return item.first == term.source; });
            if (known == by_source.end()) {
                by_source.emplace_back(term.source, term.title);
            } else {
                known->second += "; " + term.title;
            }
        }
    }
    for (const auto& [source, titles] : by_source) list.push_back(titles + ": " + source);
    return list;
}

void sources_section(Page& page, const materials::Library& library,
                     const assess::Appraisal& appraisal) {
    page.heading("Formulas");
    for (const std::string& text : formula_sources(appraisal)) page.item(text);
    page.heading("Sources of the values used");
    for (const SourceUse& source : data_sources(library, appraisal)) {
        page.item(fmt::format("{}{}: {}", source.key.empty() ? "design file: " : "",
                              source.citation, fmt::join(source.used_for, "; ")));
    }
}

}  // namespace stillcoat::present
