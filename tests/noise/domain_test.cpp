/// Inputs that no formula of the noise is made for are refused by name; nothing becomes NaN.

#include <gtest/gtest.h>

#include <functional>
#include <limits>

#include "noise/mirrors.hpp"
#include "stillcoat/core/errors.hpp"
#include "stillcoat/noise/classic_thermo_optic.hpp"
#include "stillcoat/noise/substrate.hpp"

namespace stillcoat::noise {
namespace {

const double nan = std::numeric_limits<double>::quiet_NaN();
const double infinity = std::numeric_limits<double>::infinity();

/// Everything that takes beam radius, temperature and frequency.
using Spectrum = std::function<double(const Footprint& w, double temperature, double f)>;

std::vector<Spectrum> all_spectra() {
    static const Mirror mirror = quarter_wave_mirror(true, 2);
    static const TransmittedPath path{1.45, 8.6e-6, 0.1, 1064e-9};
    return {[](const Footprint& w, double t, double f) {
                return mirror.noise(w, t, f).everything_coherent;
            },
            [](const Footprint& w, double t, double f) {
                return substrate_thermo_elastic_psd(silica, w, t, f);
            },
            [](const Footprint& w, double t, double f) {
                return adiabatic_thermo_elastic_psd(silica, w, t, f);
            },
            [](const Footprint& w, double t, double f) {
                return thermo_refractive_psd(silica, path, w, t, f);
            },
            [](const Footprint& w, double t, double f) {
                return standing_wave_thermo_refractive_psd(silica, path, w, t, f);
            },
            [](const Footprint& w, double t, double f) {
                return face_temperature_psd(1.38, 1.64e6, w, t, f);
            },
            [](const Footprint& w, double t, double f) {
                return face_temperature_psd_one_dimensional(1.38, 1.64e6, w, t, f);
            },
            [](const Footprint& w, double t, double f) {
                return classic_thermo_optic(mirror.substrate, mirror.layers, w, t, f,
                                            LayerStrain::with_substrate)
                    .psd;
            },
            [](const Footprint& w, double t, double f) {
                return parallel_perpendicular_psd(silica_elastic, tantala_elastic, 1e-6, 1e-4, 2e-4,
                                                  w, t, f);
            },
            [](const Footprint& w, double t, double f) {
                return equal_elastic_psd(silica_elastic, 1e-6, 1e-4, w, t, f);
            },
            [](const Footprint& w, double t, double f) {
                return brownian_psd(half_space_energy(silica_elastic, w), {1e-6, 1e-6}, t, f);
            }};
}

TEST(NoiseDomain, BeamTemperatureAndFrequencyMustBePositiveAndFinite) {
    for (const Spectrum& spectrum : all_spectra()) {
        EXPECT_GT(spectrum(0.01, 300.0, 100.0), 0.0);
        for (const double bad : {0.0, -1.0, nan, infinity}) {
            EXPECT_THROW(spectrum(bad, 300.0, 100.0), core::DomainError);
            EXPECT_THROW(spectrum({0.01, bad}, 300.0, 100.0), core::DomainError);
            EXPECT_THROW(spectrum({bad, 0.01}, 300.0, 100.0), core::DomainError);
            EXPECT_THROW(spectrum(0.01, bad, 100.0), core::DomainError);
            EXPECT_THROW(spectrum(0.01, 300.0, bad), core::DomainError);
        }
    }
}

TEST(NoiseDomain, SpectraStayFiniteAtTheEndsOfTheirRange) {
    for (const Spectrum& spectrum : all_spectra()) {
        for (const Footprint& w : {Footprint(1e-6), Footprint(1.0), Footprint(1e-6, 1.0)}) {
            for (const double f : {1e-9, 1e10}) {
                const double psd = spectrum(w, 4.0, f);
                EXPECT_TRUE(std::isfinite(psd) && psd >= 0.0) << psd;
            }
        }
    }
}

TEST(NoiseDomain, ElasticConstantsOutOfRangeAreRefused) {
    for (const Elastic& bad :
         {Elastic{0.0, 0.2}, Elastic{-1e9, 0.2}, Elastic{nan, 0.2}, Elastic{infinity, 0.2},
          Elastic{1e9, 0.5}, Elastic{1e9, -1.0}, Elastic{1e9, nan}}) {
        EXPECT_THROW(validate(bad), core::DomainError);
        EXPECT_THROW(half_space_energy(bad, 0.01), core::DomainError);
        EXPECT_THROW(thin_film_energies(bad, {}, 0.01), core::DomainError);
        EXPECT_THROW(thin_film_energies(silica_elastic, {{bad, surface_weight(1e-6)}}, 0.01),
                     core::DomainError);
        EXPECT_THROW(equal_elastic_psd(bad, 1e-6, 1e-4, 0.01, 300.0, 100.0), core::DomainError);
        ThermalMaterial material = silica;
        material.elastic = bad;
        EXPECT_THROW(substrate_thermo_elastic_psd(material, 0.01, 300.0, 100.0), core::DomainError);
    }
}

TEST(NoiseDomain, LossesAndEnergiesMustNotBeNegative) {
    for (const double bad : {-1e-6, nan, infinity}) {
        EXPECT_THROW(brownian_psd({1e-11, 1e-11}, {bad, 1e-6}, 300.0, 100.0), core::DomainError);
        EXPECT_THROW(brownian_psd({1e-11, 1e-11}, {1e-6, bad}, 300.0, 100.0), core::DomainError);
        EXPECT_THROW(brownian_psd({bad, 1e-11}, {1e-6, 1e-6}, 300.0, 100.0), core::DomainError);
        EXPECT_THROW(equal_elastic_psd(silica_elastic, 1e-6, bad, 0.01, 300.0, 100.0),
                     core::DomainError);
        EXPECT_THROW(equal_elastic_psd(silica_elastic, bad, 1e-4, 0.01, 300.0, 100.0),
                     core::DomainError);
        EXPECT_THROW(
            thin_film_energies(silica_elastic, {{silica_elastic, surface_weight(bad)}}, 0.01),
            core::DomainError);
    }
}

TEST(NoiseDomain, ThermalPropertiesOutOfRangeAreRefused) {
    using Change = std::function<void(ThermalLayer&)>;
    const std::vector<Change> changes{[](ThermalLayer& l) { l.material.conductivity = 0.0; },
                                      [](ThermalLayer& l) { l.material.conductivity = nan; },
                                      [](ThermalLayer& l) { l.material.heat_capacity = -1.0; },
                                      [](ThermalLayer& l) { l.material.expansion = infinity; },
                                      [](ThermalLayer& l) { l.index_slope = nan; },
                                      [](ThermalLayer& l) { l.readout.thickness = -1e-9; },
                                      [](ThermalLayer& l) { l.readout.strain_constant = nan; },
                                      [](ThermalLayer& l) { l.readout.index_constant = nan; },
                                      [](ThermalLayer& l) { l.readout.in_plane_constant = nan; },
                                      [](ThermalLayer& l) {
                                          l.readout.terms[0].index = {0.0, nan};
                                      },
                                      [](ThermalLayer& l) { l.readout.terms[0].strain = infinity; },
                                      [](ThermalLayer& l) { l.readout.terms[0].in_plane = nan; },
                                      [](ThermalLayer& l) { l.readout.terms[0].rate = nan; },
                                      [](ThermalLayer& l) {
                                          l.readout.terms[0].rate = {1e3, 1e7};
                                      }};
    for (std::size_t i = 0; i < changes.size(); ++i) {
        Mirror mirror = quarter_wave_mirror(true, 2);
        changes[i](mirror.layers[1]);
        EXPECT_THROW(mirror.noise(0.01, 300.0, 100.0), core::DomainError) << "change " << i;
        EXPECT_THROW(classic_thermo_optic(mirror.substrate, mirror.layers, 0.01, 300.0, 100.0,
                                          LayerStrain::own_thickness),
                     core::DomainError)
            << "change " << i;
    }
}

TEST(NoiseDomain, PathAndStackFormulasRefuseWhatTheyAreNotMadeFor) {
    EXPECT_THROW(thermo_refractive_psd(silica, {1.45, nan, 0.1, 1e-6}, 0.01, 300.0, 1.0),
                 core::DomainError);
    EXPECT_THROW(thermo_refractive_psd(silica, {1.45, 1e-5, -0.1, 1e-6}, 0.01, 300.0, 1.0),
                 core::DomainError);
    EXPECT_THROW(
        standing_wave_thermo_refractive_psd(silica, {0.0, 1e-5, 0.1, 1e-6}, 0.01, 300.0, 1.0),
        core::DomainError);
    EXPECT_THROW(
        standing_wave_thermo_refractive_psd(silica, {1.45, 1e-5, 0.1, 0.0}, 0.01, 300.0, 1.0),
        core::DomainError);
    EXPECT_THROW(thick_coating_factor(-1.0, 1.0, 0.5), core::DomainError);
    EXPECT_THROW(thick_coating_factor(1.0, 0.0, 0.5), core::DomainError);
    EXPECT_THROW(thick_coating_factor(1.0, 1.0, nan), core::DomainError);
    EXPECT_THROW(quarter_wave_index_slope(1.45, 1.45, 1e-5, 1e-5, true), core::DomainError);
    EXPECT_THROW(quarter_wave_index_slope(2.0, -1.45, 1e-5, 1e-5, true), core::DomainError);
    EXPECT_THROW(face_temperature_psd(0.0, 1.64e6, 0.01, 300.0, 1.0), core::DomainError);
    EXPECT_THROW(face_temperature_psd_one_dimensional(1.38, nan, 0.01, 300.0, 1.0),
                 core::DomainError);
}

}  // namespace
}  // namespace stillcoat::noise
