/// All spectra against reference numbers that were solved from the field equations with many digits
/// (tests/generators/noise_reference.py).

#include <gtest/gtest.h>

#include <fstream>
#include <nlohmann/json.hpp>

#include "noise/mirrors.hpp"
#include "stillcoat/noise/classic_thermo_optic.hpp"
#include "stillcoat/noise/substrate.hpp"

namespace stillcoat::noise {
namespace {

using nlohmann::json;

const json& reference() {
    static const json document = [] {
        std::ifstream file(std::string(STILLCOAT_TEST_DATA) + "/noise_reference.json");
        return json::parse(file);
    }();
    return document;
}

ThermalMaterial substrate_of(const json& c) {
    const json& s = c.at("substrate");
    return {{s.at("youngs_modulus_Pa"), s.at("poisson_ratio")},
            s.at("expansion_per_K"),
            s.at("conductivity_W_per_mK"),
            s.at("heat_capacity_J_per_m3K")};
}

double spot_of(const json& c) { return c.at("beam_radius_m"); }

/// The mirror of a case; without penetration its light stays at the face.
Mirror mirror_of(const json& c, bool penetrating = true) {
    const std::vector<std::string> columns = reference().at("layer_columns");
    const std::vector<std::string> expected{"index",
                                            "extinction",
                                            "thickness_m",
                                            "youngs_modulus_Pa",
                                            "poisson_ratio",
                                            "expansion_per_K",
                                            "index_slope_per_K",
                                            "conductivity_W_per_mK",
                                            "heat_capacity_J_per_m3K",
                                            "p11",
                                            "p12"};
    if (columns != expected) throw std::runtime_error("the reference has other layer columns");
    optics::OpticalStack stack{
        c.at("incident_index"), {}, c.at("substrate").at("index").get<double>()};
    Mirror mirror{substrate_of(c), {}};
    std::vector<optics::Photoelasticity> photoelasticity;
    for (const json& row : c.at("layers")) {
        const std::vector<double> v = row;
        stack.layers.push_back({{v[0], v[1]}, v[2]});
        mirror.layers.push_back({{{v[3], v[4]}, v[5], v[7], v[8]},
                                 free_index_slope(v[0], v[6], v[9], v[10], v[5]),
                                 {}});
        photoelasticity.push_back({v[9], v[10]});
    }
    if (stack.layers.empty()) return mirror;
    const optics::StandingWave wave =
        optics::standing_wave(stack, {c.at("wavelength_m"), 0.0, optics::Polarisation::s});
    const std::vector<optics::ReadoutLayer> weights =
        penetrating ? optics::readout_weights(wave, photoelasticity)
                    : optics::surface_readout(stack);
    for (std::size_t j = 0; j < weights.size(); ++j) mirror.layers[j].readout = weights[j];
    return mirror;
}

std::string place(const json& c, double f) {
    return c.at("name").get<std::string>() +
           ", w = " + std::to_string(c.value("beam_radius_m", 0.0)) +
           " m, f = " + std::to_string(f) + " Hz";
}

/// Prints the worst error and holds it against `limit`.
void report(const WorstError& worst, const std::string& quantity, double limit) {
    worst.print(quantity);
    EXPECT_LT(worst.error(), limit) << quantity;
}

TEST(NoiseReference, ThermalNoise) {
    const std::vector<std::string> keys{"coating_thermo_elastic", "coating_thermo_refractive",
                                        "coating_coherent",       "thermo_elastic_with_substrate",
                                        "everything_coherent",    "substrate_thermo_elastic"};
    std::vector<WorstError> worst(keys.size());
    for (const json& c : reference().at("thermal")) {
        const Mirror mirror = mirror_of(c);
        const std::vector<double> frequencies = c.at("frequencies_Hz");
        for (std::size_t i = 0; i < frequencies.size(); ++i) {
            const std::vector<double> here =
                listed(mirror.noise(spot_of(c), c.at("temperature_K"), frequencies[i]));
            for (std::size_t k = 0; k < keys.size(); ++k) {
                worst[k].see(relative_error(here[k], c.at("psd_m2_per_Hz").at(keys[k]).at(i)),
                             place(c, frequencies[i]));
            }
        }
    }
    // Where expansion and refraction cancel, the coherent sum loses digits.
    const double limits[] = {8e-15, 4e-13, 4e-12, 8e-14, 2e-13, 4e-15};
    for (std::size_t k = 0; k < keys.size(); ++k) report(worst[k], keys[k], limits[k]);
}

TEST(NoiseReference, FreeIndexSlope) {
    for (const json& c : reference().at("thermal")) {
        const Mirror mirror = mirror_of(c);
        for (std::size_t j = 0; j < mirror.layers.size(); ++j) {
            const double expected = c.at("clamped_index_slope_per_K").at(j);
            EXPECT_NEAR(mirror.layers[j].index_slope, expected, 1e-15 * std::abs(expected));
        }
    }
}

TEST(NoiseReference, CoatingBrownianEnergiesAndSpectra) {
    WorstError energy, spectrum, integral;
    for (const json& c : reference().at("coating_brownian")) {
        for (const bool penetrating : {false, true}) {
            const Mirror mirror = mirror_of(c, penetrating);
            const std::string kind = penetrating ? "penetrating" : "at_the_face";
            const std::vector<StrainEnergy> energies =
                thin_film_energies(mirror.substrate.elastic, mirror.elastic_layers(), spot_of(c));
            const json& expected = c.at("energy_" + kind + "_J_per_N2");
            for (std::size_t j = 0; j < energies.size(); ++j) {
                energy.see(relative_error(energies[j].bulk, expected.at("bulk").at(j)),
                           place(c, double(j)));
                energy.see(relative_error(energies[j].shear, expected.at("shear").at(j)),
                           place(c, double(j)));
                if (!penetrating) continue;
                // Weights that cancel within a layer are measured against its thickness.
                const optics::ReadoutIntegrals found =
                    optics::readout_integrals(mirror.layers[j].readout);
                const json& integrals = c.at("readout_integrals");
                const double d = mirror.layers[j].readout.thickness;
                const auto gap = [&](double value, const char* key) {
                    const double exact = integrals.at(key).at(j);
                    integral.see(std::abs(value - exact) / std::max(d, std::abs(exact)),
                                 place(c, double(j)));
                };
                gap(found.strain, "strain_m");
                gap(found.strain_squared, "strain_squared_m");
                gap(found.index, "index_m");
            }
            const std::vector<double> frequencies = c.at("frequencies_Hz");
            for (std::size_t i = 0; i < frequencies.size(); ++i) {
                double sum = 0.0;
                for (std::size_t j = 0; j < energies.size(); ++j) {
                    const Loss loss{c.at("loss_bulk").at(j), c.at("loss_shear").at(j)};
                    sum += brownian_psd(energies[j], loss, c.at("temperature_K"), frequencies[i]);
                }
                spectrum.see(relative_error(sum, c.at("psd_" + kind + "_m2_per_Hz").at(i)),
                             place(c, frequencies[i]));
            }
        }
    }
    report(integral, "readout integrals", 8e-14);
    report(energy, "energies of the layers", 2e-13);
    report(spectrum, "coating Brownian spectra", 7e-14);
}

TEST(NoiseReference, SubstrateBrownian) {
    WorstError worst;
    for (const json& c : reference().at("substrate_brownian")) {
        const StrainEnergy energy = half_space_energy(substrate_of(c).elastic, spot_of(c));
        worst.see(relative_error(energy.bulk, c.at("energy_bulk_J_per_N2")), place(c, 0.0));
        worst.see(relative_error(energy.shear, c.at("energy_shear_J_per_N2")), place(c, 0.0));
        const double psd = brownian_psd(energy, {c.at("loss_bulk"), c.at("loss_shear")},
                                        c.at("temperature_K"), c.at("frequency_Hz"));
        worst.see(relative_error(psd, c.at("psd_m2_per_Hz")), place(c, c.at("frequency_Hz")));
    }
    report(worst, "substrate Brownian", 2e-14);
}

TEST(NoiseReference, CerdonioIntegral) {
    const json& c = reference().at("cerdonio");
    WorstError worst;
    for (std::size_t i = 0; i < c.at("parameter").size(); ++i) {
        // S = (8/√(2π)) α²(1+ν)² (k_BT²r0/κ) J(Ω), Ω = ωCr0²/κ.
        const double scaled = c.at("parameter").at(i), w = 0.01, r0 = w / std::sqrt(2.0);
        const double f =
            scaled * silica.conductivity / (silica.heat_capacity * r0 * r0) / (2.0 * core::pi);
        const double expansion = silica.expansion * 1.17;
        const double scale = 8.0 / std::sqrt(2.0 * core::pi) * expansion * expansion *
                             core::boltzmann_constant * 9e4 * r0 / silica.conductivity;
        worst.see(relative_error(substrate_thermo_elastic_psd(silica, w, 300.0, f),
                                 scale * c.at("integral").at(i).get<double>()),
                  "Omega = " + std::to_string(scaled));
    }
    report(worst, "integral of Cerdonio", 4e-15);
}

TEST(NoiseReference, LightThroughTheSubstrate) {
    WorstError single, standing;
    for (const json& c : reference().at("transmission")) {
        const ThermalMaterial substrate = substrate_of(c);
        const TransmittedPath path{c.at("substrate").at("index"), c.at("index_slope_per_K"),
                                   c.at("length_m"), c.at("wavelength_m")};
        const double w = c.at("beam_radius_m"), temperature = c.at("temperature_K");
        const std::vector<double> frequencies = c.at("frequencies_Hz");
        for (std::size_t i = 0; i < frequencies.size(); ++i) {
            const double f = frequencies[i];
            single.see(relative_error(thermo_refractive_psd(substrate, path, w, temperature, f),
                                      c.at("psd_m2_per_Hz").at("single_pass").at(i)),
                       place(c, f));
            const double wave =
                standing_wave_thermo_refractive_psd(substrate, path, w, temperature, f);
            standing.see(relative_error(wave, c.at("psd_m2_per_Hz").at("standing_wave").at(i)),
                         place(c, f));
            // With the transverse wavenumber kept beside that of the light: (4/(w k_L)²) lower.
            const double k_l = 4.0 * core::pi * path.index / path.wavelength;
            EXPECT_NEAR(wave / c.at("psd_m2_per_Hz").at("standing_wave_full").at(i).get<double>(),
                        1.0, 8.0 / (w * w * k_l * k_l));
        }
    }
    report(single, "thermo-refractive, single pass", 3e-15);
    report(standing, "thermo-refractive, standing wave", 1e-15);
}

TEST(NoiseReference, ThickCoatingFactor) {
    WorstError worst;
    for (const json& c : reference().at("thickness_factor")) {
        worst.see(
            relative_error(thick_coating_factor(c.at("xi"), c.at("ratio"), c.at("elastic_share")),
                           c.at("factor")),
            "xi = " + c.at("xi").dump());
    }
    report(worst, "thick-coating factor", 4e-15);
}

TEST(NoiseReference, ClassicThermoOptic) {
    WorstError length, factor, face, spectrum;
    for (const json& c : reference().at("classic_thermo_optic")) {
        const Mirror mirror = mirror_of(c);
        const double w = c.at("beam_radius_m"), temperature = c.at("temperature_K");
        const std::vector<double> frequencies = c.at("frequencies_Hz");
        for (std::size_t i = 0; i < frequencies.size(); ++i) {
            const double f = frequencies[i];
            for (const LayerStrain strain :
                 {LayerStrain::own_thickness, LayerStrain::with_substrate}) {
                const json& e =
                    c.at(strain == LayerStrain::own_thickness ? "own_thickness" : "with_substrate");
                const ClassicThermoOptic found = classic_thermo_optic(
                    mirror.substrate, mirror.layers, w, temperature, f, strain);
                length.see(relative_error(found.thermo_elastic_length,
                                          c.at("thermo_elastic_length_m_per_K")),
                           place(c, f));
                length.see(relative_error(found.thermo_refractive_length,
                                          e.at("thermo_refractive_length_m_per_K")),
                           place(c, f));
                factor.see(relative_error(found.thickness_factor, e.at("thickness_factor").at(i)),
                           place(c, f));
                face.see(relative_error(found.temperature_psd,
                                        c.at("face_temperature_psd_K2_per_Hz").at(i)),
                         place(c, f));
                spectrum.see(relative_error(found.psd, e.at("psd_m2_per_Hz").at(i)), place(c, f));
            }
            face.see(relative_error(face_temperature_psd_one_dimensional(
                                        mirror.substrate.conductivity,
                                        mirror.substrate.heat_capacity, w, temperature, f),
                                    c.at("face_temperature_psd_one_dimensional_K2_per_Hz").at(i)),
                     place(c, f));
        }
    }
    report(length, "thermo-optic lengths", 2e-13);
    report(factor, "thickness factors of stacks", 2e-13);
    report(face, "temperature of the face", 3e-15);
    report(spectrum, "classic thermo-optic spectra", 3e-13);
}

}  // namespace
}  // namespace stillcoat::noise
