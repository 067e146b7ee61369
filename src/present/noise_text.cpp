#include "present/noise_text.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <map>

namespace stillcoat::present {

using assess::NoiseTerm;

std::vector<double> brownian_shares(const assess::Noise& noise) {
    double total = 0.0;
    for (const assess::LayerNoise& layer : noise.layers) total += layer.psd;
    std::vector<double> shares;
    for (const assess::LayerNoise& layer : noise.layers)
        shares.push_back(total > 0.0 ? layer.psd / total : 0.0);
    return shares;
}

namespace {

/// Which material carries most of the coating's Brownian noise: where a change pays first.
std::string loudest_material(const stack::Mirror& mirror, const assess::Noise& noise) {
    const std::vector<double> shares = brownian_shares(noise);
    std::map<std::string, double> by_material;
    for (std::size_t j = 0; j < shares.size(); ++j)
        by_material[mirror.layers[j].material] += shares[j];
    const auto most =
        std::max_element(by_material.begin(), by_material.end(),
                         [](const auto& a, const auto& b) { return a.second < b.second; });
    if (most == by_material.end()) return "";
    return fmt::format("{} carries {:.0f} % of the coating's Brownian noise power at {}",
                       most->first, most->second * 100.0, frequency_text(noise.layer_frequency));
}

std::vector<std::string> noise_row(const NoiseTerm& term, std::size_t columns) {
    std::vector<std::string> row{term.title};
    for (std::size_t i = 0; i < columns; ++i) {
        row.push_back(term.missing.empty() ? amplitude_text(term.spot_psd[i]) : "–");
    }
    return row;
}

}  // namespace

std::string movement_text(const assess::Noise& noise) {
    const auto at = std::find(noise.spot.begin(), noise.spot.end(), noise.layer_frequency);
    if (at == noise.spot.end() || noise.spot_total.empty()) return "";
    const auto i = static_cast<std::size_t>(at - noise.spot.begin());
    const NoiseTerm* largest = nullptr;
    std::string missing;
    for (const NoiseTerm& term : noise.terms) {
        if (!term.missing.empty()) {
            missing += (missing.empty() ? "" : ", ") + term.title;
        } else if (largest == nullptr || term.spot_psd[i] > largest->spot_psd[i]) {
            largest = &term;
        }
    }
    if (largest == nullptr) return "";
    return fmt::format("moves by {} m/√Hz at {}{}, {:.0f} % of the power from {}",
                       amplitude_text(noise.spot_total[i]), frequency_text(*at),
                       missing.empty() ? "" : " without " + missing,
                       largest->spot_psd[i] / noise.spot_total[i] * 100.0, largest->title);
}

void noise_section(Page& page, const stack::Mirror& mirror, const assess::Noise& noise,
                   const std::string& light) {
    page.heading(fmt::format(
        "Noise{}: apparent displacement of the mirror, amplitude spectral density in m/√Hz",
        light));
    std::vector<std::string> head{"term"};
    for (const double f : noise.spot) head.push_back(frequency_text(f));
    std::vector<std::vector<std::string>> rows;
    for (const NoiseTerm& term : noise.terms) rows.push_back(noise_row(term, noise.spot.size()));
    std::vector<std::string> total{noise.complete ? "sum (as power)" : "sum of the terms computed"};
    for (const double psd : noise.spot_total) total.push_back(amplitude_text(psd));
    total.resize(head.size(), "–");
    rows.push_back(total);
    page.table(head, rows);
    for (const NoiseTerm& term : noise.terms) {
        if (!term.missing.empty())
            page.item(fmt::format("{} not computed: {}", term.title, term.missing), true);
    }
    for (const assess::Dominance& stretch : noise.dominance) {
        const std::string where = stretch.from == stretch.to
                                      ? "at " + frequency_text(stretch.from)
                                      : fmt::format("from {} to {}", frequency_text(stretch.from),
                                                    frequency_text(stretch.to));
        page.item(fmt::format("{} is the largest term {}", stretch.title, where));
    }
    const std::string loudest = loudest_material(mirror, noise);
    if (!loudest.empty()) page.item(loudest);
    page.heading("Parts of these terms and other models, for comparison; not in the sum");
    rows.clear();
    std::map<std::string, std::string> reasons;
    for (const NoiseTerm& term : noise.comparisons) {
        if (term.missing.empty()) {
            rows.push_back(noise_row(term, noise.spot.size()));
        } else {
            std::string& titles = reasons[term.missing];
            titles += (titles.empty() ? "" : ", ") + term.title;
        }
    }
    page.table(head, rows);
    for (const auto& [reason, titles] : reasons) page.item(titles + ": not computed: " + reason);
}

}  // namespace stillcoat::present
