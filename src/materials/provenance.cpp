#include "stillcoat/materials/provenance.hpp"

#include <algorithm>

namespace stillcoat::materials {

const std::vector<std::string>& sources_of(const Basis& basis) {
    switch (basis.part) {
        case Part::cold_table:
            return basis.entry->cold->sources;
        case Part::rule:
            return basis.entry->beyond->sources;
        case Part::datum:
            break;
    }
    return basis.entry->sources;
}

std::string status_of(const Basis& basis) {
    if (basis.part == Part::rule) return "not stated";
    return basis.part == Part::cold_table ? basis.entry->cold->status : basis.entry->status;
}

std::string nature_of(const Basis& basis) {
    if (basis.part == Part::rule) return "by analogy";
    return basis.part == Part::cold_table ? basis.entry->cold->nature : basis.entry->nature;
}

std::string place_of(const Basis& basis) {
    if (basis.part == Part::rule) return basis.entry->beyond->place;
    return basis.part == Part::cold_table ? basis.entry->cold->place : basis.entry->place;
}

std::optional<Interval> frequencies_of(const Basis& basis) {
    if (basis.part == Part::rule) return std::nullopt;
    return basis.part == Part::cold_table ? basis.entry->cold->frequency : basis.entry->frequency;
}

void add_basis(std::vector<Basis>& list, Basis basis) {
    const bool known = std::any_of(list.begin(), list.end(), [&basis](const Basis& other) {
        return other.entry == basis.entry && other.part == basis.part;
    });
    if (!known) list.push_back(std::move(basis));
}

void add_bases(std::vector<Basis>& list, const std::vector<Basis>& more) {
    for (const Basis& basis : more) add_basis(list, basis);
}

}  // namespace stillcoat::materials
