#include "stillcoat/materials/property.hpp"

#include <limits>

namespace stillcoat::materials {

using core::Limits;
namespace kind = core::kind;

const std::array<PropertyInfo, property_count>& property_table() {
    static const double infinity = std::numeric_limits<double>::infinity();
    static const Limits any = core::any_value();
    static const Limits positive = core::positive("");
    static const Limits not_negative{0.0, infinity, true, false, "0 or greater"};
    static const Limits poisson{-1.0, 0.5, false, false,
                                "between -1 and 0.5 (stable isotropic solid)"};
    static const Limits loss{0.0, 1.0, true, false, "from 0 to less than 1"};
    static const std::array<PropertyInfo, property_count> table{{
        {PropertyId::refractive_index, "refractive_index", "refractive index", &kind::number,
         positive},
        {PropertyId::extinction_coefficient, "extinction_coefficient", "extinction coefficient",
         &kind::number, not_negative},
        {PropertyId::absorption_coefficient, "absorption_coefficient", "absorption coefficient",
         &kind::per_length, not_negative},
        {PropertyId::thermo_optic_coefficient, "thermo_optic_coefficient", "dn/dT",
         &kind::per_kelvin, any},
        {PropertyId::photoelastic_p11, "photoelastic_p11", "photoelastic constant p11",
         &kind::number, any},
        {PropertyId::photoelastic_p12, "photoelastic_p12", "photoelastic constant p12",
         &kind::number, any},
        {PropertyId::youngs_modulus, "youngs_modulus", "Young's modulus", &kind::pressure,
         positive},
        {PropertyId::poisson_ratio, "poisson_ratio", "Poisson ratio", &kind::number, poisson},
        {PropertyId::density, "density", "density", &kind::density, positive},
        {PropertyId::loss_angle, "loss_angle", "loss angle", &kind::number, loss},
        {PropertyId::loss_angle_bulk, "loss_angle_bulk", "loss angle in bulk", &kind::number, loss},
        {PropertyId::loss_angle_shear, "loss_angle_shear", "loss angle in shear", &kind::number,
         loss},
        {PropertyId::thermal_conductivity, "thermal_conductivity", "thermal conductivity",
         &kind::thermal_conductivity, positive},
        {PropertyId::specific_heat, "specific_heat", "specific heat", &kind::specific_heat,
         positive},
        {PropertyId::thermal_expansion, "thermal_expansion", "linear expansion", &kind::per_kelvin,
         any},
    }};
    return table;
}

const PropertyInfo& info(PropertyId id) {
    return property_table().at(static_cast<std::size_t>(id));
}

std::optional<PropertyId> property_by_key(const std::string& key) {
    for (const PropertyInfo& entry : property_table()) {
        if (entry.key == key) return entry.id;
    }
    return std::nullopt;
}

bool is_loss(PropertyId id) {
    return id == PropertyId::loss_angle || id == PropertyId::loss_angle_bulk ||
           id == PropertyId::loss_angle_shear;
}

Width width_at(const Width& own, const std::vector<WidthSpan>& spans, double temperature) {
    const WidthSpan* best = nullptr;
    for (const WidthSpan& span : spans) {
        if (temperature < span.from || temperature > span.to) continue;
        if (best == nullptr || span.to < best->to) best = &span;
    }
    return best != nullptr ? best->width : own;
}

}  // namespace stillcoat::materials
