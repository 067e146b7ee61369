#include "present/appraisal_csv.hpp"

#include <fmt/format.h>

#include <stdexcept>

#include "present/wording.hpp"

namespace stillcoat::present {
namespace {

using assess::Appraisal;

std::string layers_csv(const Appraisal& appraisal) {
    std::string text =
        "polarisation,number,material,reference_thickness_m,thickness_m,quarter_waves,refractive_"
        "index,"
        "extinction_coefficient,absorptance,stored_energy_J_per_W,peak_intensity_ratio,"
        "brownian_psd_m2_per_Hz\n";
    for (const assess::Face& face : appraisal.faces) {
        for (std::size_t j = 0; j < appraisal.mirror.layers.size(); ++j) {
            const stack::MirrorLayer& layer = appraisal.mirror.layers[j];
            const bool known = layer.optical.extinction_known;
            text += fmt::format(
                "{},{},{},{},{},{},{},{},{},{},{},{}\n", polarisation_text(face.polarisation),
                j + 1, layer.material, layer.reference_thickness, layer.thickness,
                layer.quarter_waves, layer.optical.index.value,
                known ? fmt::format("{}", layer.optical.extinction.value) : "",
                known ? fmt::format("{}", face.response.layer_absorptance[j]) : "",
                face.stored_energy[j], face.peak_intensity[j],
                face.noise.layers.empty() ? "" : fmt::format("{}", face.noise.layers[j].psd));
        }
    }
    return text;
}

std::string field_csv(const Appraisal& appraisal) {
    std::string text = "polarisation,depth_m,layer,material,refractive_index,intensity_ratio\n";
    for (const assess::Face& face : appraisal.faces) {
        for (const assess::FieldSample& sample : face.field) {
            text += fmt::format("{},{},{},{},{},{}\n", polarisation_text(face.polarisation),
                                sample.depth, sample.layer + 1,
                                appraisal.mirror.layers[sample.layer].material, sample.index,
                                sample.intensity);
        }
    }
    return text;
}

/// One more cell; empty when the column was not computed.
std::string cell(const std::vector<double>& column, std::size_t row) {
    return column.empty() ? "," : fmt::format(",{}", column[row]);
}

std::string noise_csv(const Appraisal& appraisal) {
    const assess::Noise& first = appraisal.faces.front().noise;
    // A term that could not be computed keeps its column, empty; a total that lacks it says so in
    // its name.
    std::string text = first.complete
                           ? "polarisation,frequency_Hz,total_psd_m2_per_Hz"
                           : "polarisation,frequency_Hz,total_of_terms_computed_psd_m2_per_Hz";
    for (const auto* group : {&first.terms, &first.comparisons}) {
        for (const assess::NoiseTerm& item : *group) text += "," + item.key + "_psd_m2_per_Hz";
    }
    text += "\n";
    for (const assess::Face& face : appraisal.faces) {
        const assess::Noise& noise = face.noise;
        for (std::size_t i = 0; i < noise.frequencies.size(); ++i) {
            text +=
                fmt::format("{},{}", polarisation_text(face.polarisation), noise.frequencies[i]) +
                cell(noise.total, i);
            for (const auto* group : {&noise.terms, &noise.comparisons}) {
                for (const assess::NoiseTerm& item : *group) text += cell(item.psd, i);
            }
            text += "\n";
        }
    }
    return text;
}

}  // namespace

std::string appraisal_csv(const Appraisal& appraisal, CsvTable table) {
    switch (table) {
        case CsvTable::noise:
            return noise_csv(appraisal);
        case CsvTable::layers:
            return layers_csv(appraisal);
        case CsvTable::field:
            return field_csv(appraisal);
    }
    throw std::logic_error("no such table");
}

}  // namespace stillcoat::present
