#include "assess/noise_assembly.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <optional>

#include "assess/noise_model.hpp"
#include "assess/noise_validity.hpp"

namespace stillcoat::assess {
namespace {

/// Computes every term at each of `list` into the member of NoiseTerm that `target` names.
void fill(NoiseModel& model, Noise& noise, const std::vector<double>& list,
          std::vector<double> NoiseTerm::*target, std::vector<double> Noise::*total) {
    for (const double frequency : list) {
        const std::map<std::string, double> spectra = model.spectra_at(frequency);
        std::optional<double> sum;  // absent when no term of the total is known
        for (std::vector<NoiseTerm>* group : {&noise.terms, &noise.comparisons}) {
            for (NoiseTerm& term : *group) {
                if (!term.missing.empty()) continue;
                const double value = spectra.at(term.key);
                (term.*target).push_back(value);
                if (term.in_total) sum = sum.value_or(0.0) + value;
            }
        }
        if (sum) (noise.*total).push_back(*sum);
    }
}

/// Stretches of the band over which one term of the total is the largest.
std::vector<Dominance> dominance(const Noise& noise) {
    std::vector<Dominance> list;
    for (std::size_t i = 0; i < noise.frequencies.size(); ++i) {
        const NoiseTerm* largest = nullptr;
        for (const NoiseTerm& term : noise.terms) {
            if (term.psd.empty()) continue;
            if (largest == nullptr || term.psd[i] > largest->psd[i]) largest = &term;
        }
        if (largest == nullptr) return {};
        if (list.empty() || list.back().title != largest->title) {
            list.push_back({noise.frequencies[i], noise.frequencies[i], largest->title});
        }
        list.back().to = noise.frequencies[i];
    }
    return list;
}

}  // namespace

Noise assemble_noise(const stack::Design& design, const materials::Library& library,
                     const stack::Mirror& mirror, optics::Polarisation polarisation,
                     stack::Ledger& ledger, std::vector<std::string>& warnings) {
    Noise noise;
    NoiseModel model(design, library, mirror, polarisation, ledger);
    noise.frequencies = stack::frequencies(design.band);
    noise.spot = design.band.spot;
    noise.terms = model.terms();
    noise.comparisons = model.comparisons();
    noise.complete = std::all_of(noise.terms.begin(), noise.terms.end(),
                                 [](const NoiseTerm& term) { return term.missing.empty(); });
    fill(model, noise, noise.frequencies, &NoiseTerm::psd, &Noise::total);
    fill(model, noise, noise.spot, &NoiseTerm::spot_psd, &Noise::spot_total);
    noise.layer_frequency =
        noise.spot.empty() ? std::sqrt(design.band.from * design.band.to) : noise.spot[0];
    for (const double f : noise.spot) {
        if (std::abs(std::log(f / 100.0)) < std::abs(std::log(noise.layer_frequency / 100.0))) {
            noise.layer_frequency = f;
        }
    }
    noise.layers = model.layer_noise(noise.layer_frequency);
    noise.dominance = dominance(noise);
    if (design.coating.excess_loss_stated) {
        ledger.note(fmt::format("the films' loss angles are multiplied by excess_loss = {:g}",
                                design.coating.excess_loss));
    }
    if (design.light.angle > 0.0) {
        ledger.note(
            "at an angle the noise is displacement along the normal, read as a phase of 2 n0 k0 "
            "cosθ per metre under a footprint w × w/cosθ; left out: strain in the plane of the "
            "layers, and light that comes back on the same path (fringes across the face)");
    }
    warn_of_validity(design, mirror, model, warnings);
    return noise;
}

}  // namespace stillcoat::assess
