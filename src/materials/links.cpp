#include "materials/links.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "materials/mixture_value.hpp"

namespace stillcoat::materials {

std::vector<Link> links_of(const std::string& material, PropertyId property, const Entry& entry) {
    std::vector<Link> links;
    if (const auto* same = std::get_if<SameAs>(&entry.curve))
        links.emplace_back(same->material, property);
    if (const auto* mixture = std::get_if<Mixed>(&entry.curve)) {
        for (const PropertyId needed : needed_for_mixture(property)) {
            links.emplace_back(mixture->first, needed);
            links.emplace_back(mixture->second, needed);
        }
    }
    if (entry.beyond && entry.beyond->rule == Beyond::Rule::follows)
        links.emplace_back(entry.beyond->material, property);
    if (entry.beyond && entry.beyond->rule == Beyond::Rule::heat_capacity)
        links.emplace_back(material, PropertyId::specific_heat);
    return links;
}

void check_targets(
    const Library& library, const std::vector<Link>& links, int& suggestions,
    const std::function<void(const std::string& target, const std::string& hint)>& report) {
    constexpr int most_suggestions = 20;
    for (const auto& [target, property] : links) {
        if (library.find(target) != nullptr) continue;
        std::optional<std::string> near;
        if (suggestions++ < most_suggestions)
            near = core::nearest_spelling(target, library.names());
        report(target, near ? fmt::format("did you mean \"{}\"?", *near) : "");
    }
}

LinkCheck::Step LinkCheck::step_to(const Link& link) const {
    const Property* property = library_.property(link.first, link.second);
    if (property == nullptr) return {link, {}};
    return {link, links_of(link.first, link.second, property->entry)};
}

void LinkCheck::visit(const Link& start) {
    if (states_.count(start) != 0) return;
    states_[start] = {};
    std::vector<Step> path{step_to(start)};
    while (!path.empty()) {
        Step& step = path.back();
        State& state = states_.at(step.at);
        if (step.next == step.links.size()) {
            state.on_path = false;
            path.pop_back();
            continue;
        }
        const Link link = step.links[step.next];
        const auto known = states_.find(link);
        if (known == states_.end()) {
            states_[link] = {};
            path.push_back(step_to(link));
            continue;  // the link is looked at again once it is done
        }
        state.circle = state.circle || known->second.on_path || known->second.circle;
        state.depth = std::max(state.depth, known->second.depth + 1);
        ++step.next;
    }
}

std::string LinkCheck::fault(const std::string& material, PropertyId property) {
    const Link start{material, property};
    visit(start);
    const State& state = states_.at(start);
    if (state.circle) return "refers to other materials in a circle";
    if (state.depth >= deepest_reference) {
        return fmt::format("refers to other materials through more than {} steps",
                           deepest_reference - 1);
    }
    return "";
}

}  // namespace stillcoat::materials
