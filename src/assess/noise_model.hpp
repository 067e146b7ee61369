#pragma once
/// One mirror made ready for its noise terms: what does not depend on frequency is computed once; a
/// term whose input is unknown carries the reason instead.

#include <map>
#include <optional>
#include <string>
#include <vector>

#include "assess/noise_inputs.hpp"
#include "stillcoat/noise/footprint.hpp"
#include "stillcoat/noise/substrate.hpp"
#include "stillcoat/optics/readout.hpp"

namespace stillcoat::assess {

class NoiseModel {
  public:
    NoiseModel(const stack::Design& design, const materials::Library& library,
               const stack::Mirror& mirror, optics::Polarisation polarisation,
               stack::Ledger& ledger);

    /// The spectra that can be computed, by the keys of terms() and comparisons() [m²/Hz].
    std::map<std::string, double> spectra_at(double frequency);
    std::vector<LayerNoise> layer_noise(double frequency);
    /// What the total is made of, and what is shown beside it; without numbers yet.
    std::vector<NoiseTerm> terms() const;
    std::vector<NoiseTerm> comparisons() const;
    const Wanted<noise::Elastic>& substrate_elastic() const { return substrate_elastic_; }
    const Wanted<noise::ThermalMaterial>& substrate_thermal() const { return substrate_thermal_; }
    const std::vector<noise::ElasticLayer>& elastic_layers() const { return elastic_layers_; }

  private:
    void read_weights();
    void prepare_brownian();
    void prepare_thermal();
    void prepare_substrate();
    /// Those of the band and the spots.
    std::vector<double> every_frequency() const;
    /// Losses of all layers at a frequency; the reason in brownian_missing_ when one is unknown.
    std::vector<noise::Loss> layer_losses(double frequency);
    void add_coating_brownian(double frequency, std::map<std::string, double>& spectra);
    void add_thermal(double frequency, std::map<std::string, double>& spectra) const;
    void add_substrate(double frequency, std::map<std::string, double>& spectra);
    double coating_psd(const std::vector<noise::StrainEnergy>& energies,
                       const std::vector<noise::Loss>& losses, double frequency, bool bulk,
                       bool shear) const;

    const stack::Design& design_;
    const stack::Mirror& mirror_;
    optics::Polarisation polarisation_;
    noise::Footprint footprint_;
    NoiseInputs inputs_;
    std::vector<optics::ReadoutLayer> weights_, face_weights_;
    std::string weights_missing_;
    Wanted<noise::Elastic> substrate_elastic_;
    std::vector<noise::ElasticLayer> elastic_layers_;
    std::vector<noise::StrainEnergy> energies_, face_energies_;
    std::string brownian_missing_;
    Wanted<noise::ThermalMaterial> substrate_thermal_;
    std::vector<noise::ThermalLayer> thermal_layers_;
    std::string expansion_missing_;   // coating thermo-elastic impossible
    std::string refraction_missing_;  // coating thermo-refractive impossible
    Wanted<noise::StrainEnergy> substrate_energy_;
    std::string substrate_brownian_missing_;
    Wanted<double> mass_;  // of a finite mirror [kg]
    std::optional<noise::TransmittedPath> path_;
    std::string path_missing_;
};

}  // namespace stillcoat::assess
