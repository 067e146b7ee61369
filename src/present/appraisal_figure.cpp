#include "present/appraisal_figure.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "present/figure.hpp"
#include "present/wording.hpp"

namespace stillcoat::present {
namespace {

std::string ending(const assess::Appraisal& appraisal, const assess::Face& face) {
    return appraisal.faces.size() == 1 ? "" : ", " + polarisation_text(face.polarisation);
}

Curve amplitude_curve(const std::string& name, const std::vector<double>& frequencies,
                      const std::vector<double>& psd) {
    Curve curve;
    curve.name = name;
    curve.x = frequencies;
    for (const double value : psd) curve.y.push_back(std::sqrt(value));
    return curve;
}

Figure noise_figure(const stack::Design& design, const assess::Appraisal& appraisal) {
    Figure figure;
    figure.title = design.title;
    figure.x = Axis{"frequency [Hz]", true, {}, {}};
    figure.y = Axis{"displacement [m/√Hz]", true, {}, {}};
    double lowest_total = 0.0;
    for (const assess::Face& face : appraisal.faces) {
        const assess::Noise& noise = face.noise;
        for (const assess::NoiseTerm& term : noise.terms) {
            if (!term.missing.empty()) continue;
            figure.curves.push_back(
                amplitude_curve(term.title + ending(appraisal, face), noise.frequencies, term.psd));
        }
        if (noise.total.empty()) continue;
        Curve total = amplitude_curve(
            (noise.complete ? "sum" : "sum of the terms computed") + ending(appraisal, face),
            noise.frequencies, noise.total);
        total.emphasised = appraisal.faces.size() == 1;
        lowest_total = *std::min_element(total.y.begin(), total.y.end());
        figure.curves.push_back(std::move(total));
    }
    if (figure.curves.empty()) {
        throw core::InputError("there is no noise to draw: no term of the sum is known", "");
    }
    // A term far below the sum all over the band must not squeeze the others.
    constexpr double shown_below = 1e-3;
    figure.y.lower = lowest_total * shown_below;
    for (const Curve& curve : figure.curves) {
        const double low = *std::min_element(curve.y.begin(), curve.y.end());
        if (low < *figure.y.lower) return figure;
    }
    figure.y.lower.reset();
    return figure;
}

Figure field_figure(const stack::Design& design, const assess::Appraisal& appraisal) {
    Figure figure;
    figure.title = design.title;
    figure.x = Axis{"depth below the face [µm]", false, {}, {}};
    figure.y = Axis{"|E|² relative to the incident light", false, 0.0, {}};
    constexpr double micrometres = 1e6;
    for (const assess::Face& face : appraisal.faces) {
        Curve curve;
        curve.name = "|E|²" + ending(appraisal, face);
        for (const assess::FieldSample& sample : face.field) {
            curve.x.push_back(sample.depth * micrometres);
            curve.y.push_back(sample.intensity);
        }
        figure.curves.push_back(std::move(curve));
    }
    Curve index;
    index.name = "refractive index";
    index.shape = Shape::steps;
    double depth = 0.0;
    for (const stack::MirrorLayer& layer : appraisal.mirror.layers) {
        index.x.push_back(depth * micrometres);
        index.y.push_back(layer.optical.index.value);
        depth += layer.thickness;
    }
    index.x.push_back(depth * micrometres);
    index.y.push_back(appraisal.mirror.substrate_optical.index.value);
    figure.second.emplace();
    figure.second->axis = Axis{"refractive index", false, {}, {}};
    figure.second->curves.push_back(std::move(index));
    return figure;
}

}  // namespace

void draw_appraisal(const stack::Design& design, const assess::Appraisal& appraisal,
                    Picture picture, const std::string& path, core::Existing existing) {
    draw(picture == Picture::noise ? noise_figure(design, appraisal)
                                   : field_figure(design, appraisal),
         path, existing);
}

}  // namespace stillcoat::present
