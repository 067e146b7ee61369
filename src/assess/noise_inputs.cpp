#include "assess/noise_inputs.hpp"

#include <fmt/format.h>

namespace stillcoat::assess {

using materials::PropertyId;

namespace {

/// Two reasons as one; either may be empty.
std::string joined(const std::string& first, const std::string& second) {
    return first.empty() || second.empty() ? first + second : first + "; " + second;
}

}  // namespace

NoiseInputs::NoiseInputs(const stack::Design& design, const materials::Library& library,
                         stack::Ledger& ledger)
    : design_(design), library_(library), ledger_(ledger) {}

Wanted<double> NoiseInputs::property_at(const std::string& material, PropertyId id,
                                        double frequency) {
    const materials::Value value = materials::evaluate(
        library_, material, id, {design_.temperature, design_.light.wavelength, frequency});
    if (value.number) return {ledger_.use(material, id, value), ""};
    return {std::nullopt, fmt::format("{}; give it in [material.\"{}\"]", value.missing, material)};
}

Wanted<double> NoiseInputs::property(const std::string& material, PropertyId id) {
    return property_at(material, id, 1.0);
}

Wanted<noise::Elastic> NoiseInputs::elastic(const std::string& material) {
    const Wanted<double> modulus = property(material, PropertyId::youngs_modulus);
    const Wanted<double> poisson = property(material, PropertyId::poisson_ratio);
    if (!modulus.value || !poisson.value)
        return {std::nullopt, joined(modulus.missing, poisson.missing)};
    return {noise::Elastic{*modulus.value, *poisson.value}, ""};
}

Wanted<noise::ThermalMaterial> NoiseInputs::thermal(const std::string& material) {
    const Wanted<noise::Elastic> constants = elastic(material);
    std::string missing = constants.missing;
    const PropertyId ids[] = {PropertyId::thermal_expansion, PropertyId::thermal_conductivity,
                              PropertyId::specific_heat, PropertyId::density};
    double numbers[4] = {};
    for (int i = 0; i < 4; ++i) {
        const Wanted<double> number = property(material, ids[i]);
        missing = joined(missing, number.missing);
        numbers[i] = number.value.value_or(0.0);
    }
    if (!missing.empty()) return {std::nullopt, missing};
    return {
        noise::ThermalMaterial{*constants.value, numbers[0], numbers[1], numbers[2] * numbers[3]},
        ""};
}

Wanted<noise::Loss> NoiseInputs::loss(const std::string& material, double frequency) {
    const auto& properties = library_.at(material).properties;
    if (properties.count(PropertyId::loss_angle_bulk) == 0) {
        const Wanted<double> both = property_at(material, PropertyId::loss_angle, frequency);
        if (!both.value) return {std::nullopt, both.missing};
        return {noise::Loss{*both.value, *both.value}, ""};
    }
    const Wanted<double> bulk = property_at(material, PropertyId::loss_angle_bulk, frequency);
    const Wanted<double> shear = property_at(material, PropertyId::loss_angle_shear, frequency);
    if (!bulk.value) return {std::nullopt, bulk.missing};
    if (!shear.value) return {std::nullopt, shear.missing};
    return {noise::Loss{*bulk.value, *shear.value}, ""};
}

double NoiseInputs::photoelastic(const std::string& material, PropertyId id) {
    const Wanted<double> constant = property(material, id);
    if (constant.value) return *constant.value;
    ledger_.note(
        fmt::format("{} of {} is unknown and counts as 0", materials::info(id).title, material));
    return 0.0;
}

Wanted<double> NoiseInputs::free_index_slope(const std::string& material, double index) {
    const Wanted<double> slope = property(material, PropertyId::thermo_optic_coefficient);
    if (!slope.value) return slope;
    const Wanted<double> expansion = property(material, PropertyId::thermal_expansion);
    if (!expansion.value) return expansion;
    return {noise::free_index_slope(
                index, *slope.value, photoelastic(material, PropertyId::photoelastic_p11),
                photoelastic(material, PropertyId::photoelastic_p12), *expansion.value),
            ""};
}

}  // namespace stillcoat::assess
