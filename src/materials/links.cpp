#include "materials/links.hpp"

#include <fmt/format.h>

#include <algorithm>

namespace stillcoat::materials {

std::vector<Link> links_of(const std::string& material, PropertyId property, const Entry& entry) {
    std::vector<Link> links;
    if (const auto* same = std::get_if<SameAs>(&entry.curve))
        links.emplace_back(same->material, property);
    if (entry.beyond && entry.beyond->rule == Beyond::Rule::follows)
        links.emplace_back(entry.beyond->material, property);
    if (entry.beyond && entry.beyond->rule == Beyond::Rule::heat_capacity)
        links.emplace_back(material, PropertyId::specific_heat);
    return links;
}

LinkCheck::Step LinkCheck::step_to(const Link& link) const {
    const auto material = library_.materials.find(link.first);
    if (material == library_.materials.end()) return {link, {}};
    const auto property = material->second.properties.find(link.second);
    if (property == material->second.properties.end()) return {link, {}};
    return {link, links_of(link.first, link.second, property->second.entry)};
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
