/// Every row of tests/published/noise.csv is asked of the program and held against its printed
/// digits.

#include <gtest/gtest.h>

#include <functional>
#include <map>
#include <numeric>

#include "noise/mirrors.hpp"
#include "stillcoat/noise/classic_thermo_optic.hpp"
#include "stillcoat/noise/quantum_limit.hpp"
#include "stillcoat/noise/substrate.hpp"
#include "support/published_rows.hpp"

namespace stillcoat::noise {
namespace {

using test::PublishedRow;

/// Numbers that a row leaves out stand in as 1: what it asks for does not depend on them.
double given(const PublishedRow& row, const std::string& name) {
    return row.inputs.count(name) == 0 ? 1.0 : row.input(name);
}

Elastic elastic_of(const PublishedRow& row, const std::string& prefix) {
    const bool bare = row.inputs.count(prefix + "poisson_ratio") == 0;
    const double poisson = bare ? 0.17 : row.input(prefix + "poisson_ratio");
    return {given(row, prefix + "youngs_modulus"), poisson};
}

ThermalMaterial material_of(const PublishedRow& row, const std::string& prefix) {
    return {elastic_of(row, prefix), given(row, prefix + "expansion"),
            given(row, prefix + "conductivity"), given(row, prefix + "heat_capacity")};
}

/// The quarter-wave mirror that a row describes; high index outermost when the order does not
/// matter.
Mirror mirror_of(const PublishedRow& row) {
    const bool high_outermost =
        row.inputs.count("outermost") == 0 || row.text("outermost") == "high";
    const bool at_the_face = row.inputs.count("light") != 0 && row.text("light") == "at_the_face";
    const double wavelength = row.input("wavelength");
    optics::OpticalStack stack{1.0, {}, given(row, "substrate_index")};
    Mirror mirror{material_of(row, "substrate_"), {}};
    for (int j = 0; j < 2 * static_cast<int>(row.input("pairs")); ++j) {
        const std::string which = (j % 2 == 0) == high_outermost ? "high_" : "low_";
        const double n = row.input(which + "index");
        stack.layers.push_back({n, wavelength / (4.0 * n)});
        mirror.layers.push_back({material_of(row, which), given(row, which + "index_slope"), {}});
    }
    const std::vector<optics::ReadoutLayer> weights =
        at_the_face ? optics::surface_readout(stack)
                    : optics::readout_weights(
                          optics::standing_wave(stack, {wavelength, 0.0, optics::Polarisation::s}),
                          std::vector<optics::Photoelasticity>(stack.layers.size()));
    for (std::size_t j = 0; j < weights.size(); ++j) mirror.layers[j].readout = weights[j];
    return mirror;
}

double thickness_of(const Mirror& mirror) {
    return std::accumulate(
        mirror.layers.begin(), mirror.layers.end(), 0.0,
        [](double sum, const ThermalLayer& l) { return sum + l.readout.thickness; });
}

ClassicThermoOptic classic_of(const PublishedRow& row, const Mirror& mirror) {
    const bool own =
        row.inputs.count("layer_strain") == 0 || row.text("layer_strain") == "own_thickness";
    return classic_thermo_optic(mirror.substrate, mirror.layers, given(row, "beam_radius"),
                                row.input("temperature"), given(row, "frequency"),
                                own ? LayerStrain::own_thickness : LayerStrain::with_substrate);
}

TransmittedPath path_of(const PublishedRow& row) {
    return {given(row, "index"), given(row, "index_slope"), given(row, "length"),
            given(row, "wavelength")};
}

double substrate_brownian(const PublishedRow& row) {
    const double loss = row.input("loss");
    return brownian_psd(half_space_energy(elastic_of(row, ""), row.input("beam_radius")),
                        {loss, loss}, row.input("temperature"), row.input("frequency"));
}

double coating_brownian(const PublishedRow& row) {
    const Mirror mirror = mirror_of(row);
    const std::vector<StrainEnergy> energies = thin_film_energies(
        mirror.substrate.elastic, mirror.elastic_layers(), row.input("beam_radius"));
    const bool high_outermost = row.text("outermost") == "high";
    double sum = 0.0;
    for (std::size_t j = 0; j < energies.size(); ++j) {
        const double loss = row.input((j % 2 == 0) == high_outermost ? "high_loss" : "low_loss");
        sum += brownian_psd(energies[j], {loss, loss}, row.input("temperature"),
                            row.input("frequency"));
    }
    return sum;
}

double equal_elastic(const PublishedRow& row, double temperature, double frequency) {
    return equal_elastic_psd(elastic_of(row, ""), row.input("thickness"), row.input("loss"),
                             row.input("beam_radius"), temperature, frequency);
}

double coating_over_substrate(const PublishedRow& row) {
    const double loss = row.input("substrate_loss");
    return equal_elastic(row, 300.0, 100.0) /
           brownian_psd(half_space_energy(elastic_of(row, ""), row.input("beam_radius")),
                        {loss, loss}, 300.0, 100.0);
}

/// Without the substrate's expansion the length is the coating's alone.
double mean_effective_expansion(const PublishedRow& row) {
    Mirror mirror = mirror_of(row);
    mirror.substrate.expansion = 0.0;
    return classic_of(row, mirror).thermo_elastic_length / thickness_of(mirror);
}

/// ξ and R of the film as a whole; that the program uses these is checked on its thickness factor.
struct FilmNumbers {
    double scaled_thickness, effusivity_ratio;
};

FilmNumbers film_numbers(const PublishedRow& row) {
    const Mirror mirror = mirror_of(row);
    double capacity = 0.0, resistance = 0.0;
    for (const ThermalLayer& layer : mirror.layers) {
        capacity += layer.readout.thickness * layer.material.heat_capacity;
        resistance += layer.readout.thickness / layer.material.conductivity;
    }
    const ThermalMaterial& base = mirror.substrate;
    const FilmNumbers film{
        std::sqrt(2.0 * 2.0 * pi * given(row, "frequency") * capacity * resistance),
        std::sqrt(capacity / resistance / (base.conductivity * base.heat_capacity))};
    const ClassicThermoOptic classic = classic_of(row, mirror);
    const double share = classic.thermo_elastic_length /
                         (classic.thermo_elastic_length - classic.thermo_refractive_length);
    EXPECT_NEAR(thick_coating_factor(film.scaled_thickness, film.effusivity_ratio, share) /
                    classic.thickness_factor,
                1.0, 1e-15);
    return film;
}

/// Ω of M. Cerdonio et al. out of the adiabatic spectrum, S = (8/√(2π)) α²(1+ν)²(k_BT²r0/κ)/Ω².
double adiabaticity(const PublishedRow& row) {
    const ThermalMaterial material = material_of(row, "");
    const double w = row.input("beam_radius"), temperature = row.input("temperature");
    const double expansion =
        material.expansion * (1.0 + material.elastic.poisson_ratio) * temperature;
    const double scale = 8.0 / std::sqrt(2.0 * pi) * expansion * expansion *
                         core::boltzmann_constant * w / std::sqrt(2.0) / material.conductivity;
    return std::sqrt(
        scale / adiabatic_thermo_elastic_psd(material, w, temperature, row.input("frequency")));
}

/// Where a quantity that falls with frequency passes through 1, by bisection of the logarithm [Hz].
double frequency_of_unity(const std::function<double(double)>& quantity) {
    double low = std::log(1e-6), high = std::log(1e15);
    for (int i = 0; i < 80; ++i) {
        const double middle = 0.5 * (low + high);
        (quantity(std::exp(middle)) > 1.0 ? low : high) = middle;
    }
    return std::exp(low);
}

double standing_wave(const PublishedRow& row, double f) {
    return standing_wave_thermo_refractive_psd(material_of(row, ""), path_of(row),
                                               given(row, "beam_radius"), given(row, "temperature"),
                                               f);
}

double single_pass(const PublishedRow& row, double f) {
    return thermo_refractive_psd(material_of(row, ""), path_of(row), row.input("beam_radius"),
                                 given(row, "temperature"), f);
}

/// Where the plateau of the standing wave has fallen to one half.
double upper_corner(const PublishedRow& row) {
    const double plateau = standing_wave(row, 1.0);
    return frequency_of_unity([&](double f) { return 2.0 * standing_wave(row, f) / plateau; });
}

/// Where the plateau of the standing wave meets the noise of the travelling wave.
double lower_corner(const PublishedRow& row) {
    return frequency_of_unity(
        [&](double f) { return single_pass(row, f) / standing_wave(row, f); });
}

/// dn/dε_zz out of the readout: photoelastic part of the strain weight over the index weight.
double photoelastic_index_slope(const PublishedRow& row) {
    const optics::OpticalStack stack{1.0, {{row.input("index"), 2e-7}}, 2.0};
    const optics::ReadoutLayer weights = optics::readout_weights(
        optics::standing_wave(stack, {1064e-9, 0.0, optics::Polarisation::s}),
        std::vector<optics::Photoelasticity>{{0.0, row.input("photoelastic_constant")}})[0];
    return std::real(weights.terms.front().strain / weights.terms.front().index);
}

/// I of S = (4k_BT/f)(1−ν²)/(π³Er0)·I·φ.
double half_space_integral(const PublishedRow&) {
    const double w = 0.03, nu = 0.2, young = 7e10;
    const StrainEnergy energy = half_space_energy({young, nu}, w);
    return (energy.bulk + energy.shear) * pi * pi * young * w / std::sqrt(2.0) / (1.0 - nu * nu);
}

double parallel_perpendicular(const PublishedRow& row) {
    return parallel_perpendicular_psd(elastic_of(row, "substrate_"), elastic_of(row, "film_"),
                                      row.input("thickness"), row.input("loss_parallel"),
                                      row.input("loss_perpendicular"), row.input("beam_radius"),
                                      row.input("temperature"), row.input("frequency"));
}

double face_temperature(const PublishedRow& row, bool one_dimensional) {
    const auto psd = one_dimensional ? face_temperature_psd_one_dimensional : face_temperature_psd;
    return psd(row.input("conductivity"), row.input("heat_capacity"), row.input("beam_radius"),
               row.input("temperature"), row.input("frequency"));
}

double index_slope_of_stack(const PublishedRow& row) {
    return quarter_wave_index_slope(row.input("high_index"), row.input("low_index"),
                                    row.input("high_index_slope"), row.input("low_index_slope"),
                                    row.text("outermost") == "high");
}

double thermo_elastic(const PublishedRow& row, bool adiabatic) {
    const auto psd = adiabatic ? adiabatic_thermo_elastic_psd : substrate_thermo_elastic_psd;
    return psd(material_of(row, ""), row.input("beam_radius"), row.input("temperature"),
               row.input("frequency"));
}

double everything_coherent(const PublishedRow& row) {
    return mirror_of(row)
        .noise(row.input("beam_radius"), row.input("temperature"), row.input("frequency"))
        .everything_coherent;
}

using Computation = std::function<double(const PublishedRow&)>;

Computation root(const Computation& psd) {
    return [psd](const PublishedRow& row) { return std::sqrt(psd(row)); };
}

/// By quantity and unit of a row.
const std::map<std::string, Computation>& computations() {
    static const std::map<std::string, Computation> list{
        {"substrate_brownian_psd [m^2/Hz]", substrate_brownian},
        {"substrate_brownian_asd [m/sqrt(Hz)]", root(substrate_brownian)},
        {"coating_thickness [m]",
         [](const PublishedRow& row) { return thickness_of(mirror_of(row)); }},
        {"coating_brownian_asd [m/sqrt(Hz)]", root(coating_brownian)},
        {"parallel_perpendicular_asd [m/sqrt(Hz)]", root(parallel_perpendicular)},
        {"mean_effective_expansion [1/K]", mean_effective_expansion},
        {"thermo_elastic_length [m/K]",
         [](const PublishedRow& row) {
             return classic_of(row, mirror_of(row)).thermo_elastic_length;
         }},
        {"thermo_refractive_length [m/K]",
         [](const PublishedRow& row) {
             return classic_of(row, mirror_of(row)).thermo_refractive_length;
         }},
        {"thickness_factor [1]",
         [](const PublishedRow& row) { return classic_of(row, mirror_of(row)).thickness_factor; }},
        {"classic_thermo_optic_asd [m/sqrt(Hz)]",
         root([](const PublishedRow& row) { return classic_of(row, mirror_of(row)).psd; })},
        {"thickness_over_diffusion_length [1]",
         [](const PublishedRow& row) { return film_numbers(row).scaled_thickness; }},
        {"effusivity_ratio [1]",
         [](const PublishedRow& row) { return film_numbers(row).effusivity_ratio; }},
        {"face_temperature_psd [K^2/Hz]",
         [](const PublishedRow& row) { return face_temperature(row, false); }},
        {"face_temperature_psd_one_dimensional [K^2/Hz]",
         [](const PublishedRow& row) { return face_temperature(row, true); }},
        {"adiabatic_thermo_elastic_psd [m^2/Hz]",
         [](const PublishedRow& row) { return thermo_elastic(row, true); }},
        {"adiabatic_thermo_elastic_asd [m/sqrt(Hz)]",
         root([](const PublishedRow& row) { return thermo_elastic(row, true); })},
        {"substrate_thermo_elastic_psd [m^2/Hz]",
         [](const PublishedRow& row) { return thermo_elastic(row, false); }},
        {"adiabaticity [1]", adiabaticity},
        {"thermo_refractive_asd [m/sqrt(Hz)]",
         root([](const PublishedRow& row) { return single_pass(row, row.input("frequency")); })},
        {"equal_elastic_coating_psd [m^2/Hz]",
         [](const PublishedRow& row) {
             return equal_elastic(row, row.input("temperature"), row.input("frequency"));
         }},
        {"equal_elastic_coating_over_substrate_psd [1]", coating_over_substrate},
        {"everything_coherent_asd [m/sqrt(Hz)]", root(everything_coherent)},
        {"standing_wave_upper_corner [Hz]", upper_corner},
        {"standing_wave_lower_corner [Hz]", lower_corner},
        {"standing_wave_strain_asd [1/sqrt(Hz)]",
         [](const PublishedRow& row) {
             return std::sqrt(standing_wave(row, row.input("frequency"))) / row.input("arm_length");
         }},
        {"photoelastic_index_slope [1]", photoelastic_index_slope},
        {"half_space_brownian_integral [1]", half_space_integral},
        {"quarter_wave_index_slope [1/K]", index_slope_of_stack},
        {"standard_quantum_limit_displacement_asd [m/sqrt(Hz)]", root([](const PublishedRow& row) {
             return free_mass_quantum_limit_psd(row.input("mass"), row.input("frequency"));
         })}};
    return list;
}

TEST(PublishedNoise, EveryRowIsReproducedToItsPrintedDigits) {
    const std::string path = std::string(STILLCOAT_PUBLISHED) + "/noise.csv";
    const std::vector<PublishedRow> rows = test::published_rows(path);
    const std::vector<test::Row> cells = test::read_csv(path);
    ASSERT_EQ(rows.size(), cells.size());
    EXPECT_GE(rows.size(), 50u);
    for (std::size_t i = 0; i < rows.size(); ++i) {
        const std::string kind = rows[i].quantity + " [" + rows[i].unit + "]";
        const auto found = computations().find(kind);
        ASSERT_NE(found, computations().end()) << rows[i].row << " asks for an unknown " << kind;
        const double value = found->second(rows[i]);
        const double error = test::relative_error(value, rows[i].value);
        if (cells[i].at("remark").rfind("misfit", 0) == 0) {
            EXPECT_GT(error, rows[i].relative_tolerance)
                << rows[i].row << " is no misfit: " << value;
        } else {
            EXPECT_LE(error, rows[i].relative_tolerance) << rows[i].row << ": " << value;
        }
    }
}

}  // namespace
}  // namespace stillcoat::noise
