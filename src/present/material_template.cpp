#include "present/material_template.hpp"

namespace stillcoat::present {

std::string material_template() {
    return R"(# A material of your own. Every number here is an example: put your own in its place.
#
# 1. Save this file under the name of the material, here my-film.toml, in a folder of its own.
# 2. Beside it goes references.toml, which says what the sources are that the tables name:
#
#        [bench-note]
#        citation = "own bench, note 12 of March"
#        seen = "text"
#
# 3. Check it:    stillcoat materials --check FOLDER/my-film.toml
# 4. Use it:      stillcoat appraise design.toml --materials FOLDER
#
# Lines that begin with "#" and no blank are tables that may be left out: take away their "#" to
# fill them in. Units are those shown, or any other of the same kind.
#
# A table has one datum, in one of these forms; the first three are for every property:
#     value = 2.10                                    one value; at_temperature_K = 295
#     temperature_K = [77, 295]  values = [1.0, 1.4]  a table in temperature, not for the index
#     same_as = "tantala-ibs"  factor = 1.02          as another material; no unit
#     wavelength_nm = [600, 1100]  values = [2.1, 2.0]   index and extinction: a table
#     wavelength_csv = "n.csv"                        the same from a file beside this one, columns
#                                                     wavelength_nm, refractive_index
#     sellmeier_strength = [1.1]  sellmeier_resonance_um = [0.09]   index: n² = 1 + Σ S L²/(L² − R²)
#     cauchy = [2.05, 0.015, 0.0]                     index: A + B/L² + C/L⁴, L in µm
#     value_at_1_Hz = 3.0e-4  exponent = 0.05         loss angles: a power law in frequency
# Its width in one of these, in the unit of the value:
#     uncertainty = 0.02   relative_uncertainty = 0.01   geometric_sd = 1.3   uniform = [2.0, 2.2]
#     uncertainty = "not stated"
# nature: "measured", "fit", "estimate", "derived" or "by analogy".
# status: "seen" in the source, "from memory" or "derived".
# Outside its range nothing is known, but for a rule:
#     [density.beyond]
#     rule = "constant"     or "debye" with debye_temperature_K, "follows" with material,
#                           "heat-capacity"
#     temperature_K = [4, 283]   geometric_sd = 1.2   source = ["bench-note"]   place = "guess"
# Another value beside the first, to be chosen by name:  [[density.alternative]] with name, reason.

name = "my-film"
title = "My film, ion-beam sputtered"
form = "film"    # or "bulk", "metal"
composition = "Ta2O5"
#remark = "Annealed at 500 °C for 10 h."

# A mixture of two materials: what no table below states follows from theirs, so far as there is a
# rule. With it [refractive_index] may be left out too.
#[mixture]
#of = ["silica-ibs", "titania-ibs"]
#volume_fraction = 0.25    # of the second
#uncertainty = 0.02
#source = ["bench-note"]

# Refractive index. medium says what it is relative to: "vacuum", "air" or "unstated".
[refractive_index]
wavelength_nm = [600, 800, 1064, 1550]
values = [2.12, 2.09, 2.07, 2.06]
medium = "vacuum"
at_temperature_K = 295
uncertainty = 0.01
source = ["bench-note"]
place = "table 1"
measured_at = "room temperature, after annealing"
range = { temperature_K = [283, 313], wavelength_nm = [600, 1550] }
nature = "measured"
status = "seen"

# Extinction coefficient k, pure number; or absorption_coefficient below, not both.
#[extinction_coefficient]
#value = 1.0e-7
#uncertainty = "not stated"
#source = ["bench-note"]
#place = "table 1"
#measured_at = "room temperature"
#range = { temperature_K = [283, 313], wavelength_nm = [1060, 1070] }
#nature = "measured"
#status = "seen"

# Absorption of light power, k = absorption × wavelength / 4π; not with extinction_coefficient.
#[absorption_coefficient]
#value = 0.1
#unit = "1/m"
#geometric_sd = 2
#source = ["bench-note"]
#place = "table 1"
#measured_at = "room temperature"
#range = { temperature_K = [283, 313], wavelength_nm = [1060, 1070] }
#nature = "measured"
#status = "seen"

# dn/dT at zero stress. It also carries the index to other temperatures.
#[thermo_optic_coefficient]
#value = 1.0e-5
#unit = "1/K"
#at_temperature_K = 295
#uniform = [-1.0e-5, 3.0e-5]
#source = ["bench-note"]
#place = "table 1"
#measured_at = "room temperature"
#range = { temperature_K = [283, 313] }
#nature = "measured"
#status = "seen"

# Photoelastic constants, pure numbers.
#[photoelastic_p11]
#value = 0.1
#uncertainty = 0.1
#source = ["bench-note"]
#place = "table 1"
#measured_at = "room temperature"
#range = { temperature_K = [283, 313] }
#nature = "measured"
#status = "seen"

#[photoelastic_p12]
#value = 0.2
#uncertainty = 0.1
#source = ["bench-note"]
#place = "table 1"
#measured_at = "room temperature"
#range = { temperature_K = [283, 313] }
#nature = "measured"
#status = "seen"

# Elasticity of the film itself, amorphous as it is, not of the crystal.
#[youngs_modulus]
#value = 118
#unit = "GPa"
#at_temperature_K = 295
#relative_uncertainty = 0.05
#source = ["bench-note"]
#place = "table 1"
#measured_at = "room temperature"
#range = { temperature_K = [283, 313] }
#nature = "measured"
#status = "seen"

#[poisson_ratio]
#value = 0.25
#at_temperature_K = 295
#uncertainty = 0.03
#source = ["bench-note"]
#place = "table 1"
#measured_at = "room temperature"
#range = { temperature_K = [283, 313] }
#nature = "measured"
#status = "seen"

#[density]
#value = 7000
#unit = "kg/m3"
#at_temperature_K = 295
#uncertainty = 200
#source = ["bench-note"]
#place = "table 1"
#measured_at = "room temperature"
#range = { temperature_K = [283, 313] }
#nature = "measured"
#status = "seen"

# Loss angle for bulk and shear alike; or the two below together instead.
#[loss_angle]
#value = 3.0e-4
#at_temperature_K = 295
#at_frequency_Hz = 1000
#geometric_sd = 1.2
#source = ["bench-note"]
#place = "table 1"
#measured_at = "room temperature"
#range = { temperature_K = [283, 313] }
#nature = "measured"
#status = "seen"

# Loss angles of the bulk and of the shear modulus: both, and no loss_angle.
#[loss_angle_bulk]
#value = 3.0e-4
#at_temperature_K = 295
#at_frequency_Hz = 1000
#geometric_sd = 1.3
#source = ["bench-note"]
#place = "table 1"
#measured_at = "room temperature"
#range = { temperature_K = [283, 313] }
#nature = "measured"
#status = "seen"

#[loss_angle_shear]
#value = 3.0e-4
#at_temperature_K = 295
#at_frequency_Hz = 1000
#geometric_sd = 1.3
#source = ["bench-note"]
#place = "table 1"
#measured_at = "room temperature"
#range = { temperature_K = [283, 313] }
#nature = "measured"
#status = "seen"

# Heat.
#[thermal_conductivity]
#value = 0.6
#unit = "W/m/K"
#at_temperature_K = 295
#geometric_sd = 1.5
#source = ["bench-note"]
#place = "table 1"
#measured_at = "room temperature"
#range = { temperature_K = [283, 313] }
#nature = "measured"
#status = "seen"

#[specific_heat]
#value = 300
#unit = "J/kg/K"
#at_temperature_K = 295
#relative_uncertainty = 0.1
#source = ["bench-note"]
#place = "table 1"
#measured_at = "room temperature"
#range = { temperature_K = [283, 313] }
#nature = "measured"
#status = "seen"

# Linear expansion coefficient.
#[thermal_expansion]
#value = 2.0e-6
#unit = "1/K"
#at_temperature_K = 295
#uncertainty = 1.0e-6
#source = ["bench-note"]
#place = "table 1"
#measured_at = "room temperature"
#range = { temperature_K = [283, 313] }
#nature = "measured"
#status = "seen"

# What nobody knows, with the reason, as it will be said where it is missed.
#[unknown]
#photoelastic_p11 = "not measured"    # any property that no table states
)";
}

}  // namespace stillcoat::present
