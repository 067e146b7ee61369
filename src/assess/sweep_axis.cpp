#include <fmt/format.h>

#include <algorithm>
#include <charconv>
#include <cmath>

#include "assess/sweep_axis.hpp"
#include "stillcoat/core/constants.hpp"

/// The quantities that a sweep can vary, and how a value is put into a design.

namespace stillcoat::assess {
namespace {

using materials::PropertyId;

/// A quantity of the design itself.
struct Plain {
    const char* name;
    const char* title;
    const core::QuantityKind* kind;
    double lower, upper;  ///< admissible, SI
    void (*put)(stack::Design& design, double value);
};
const Plain plain_quantities[] = {
    {"wavelength", "wavelength in vacuum", &core::kind::length, 1e-9, 1.0,
     [](stack::Design& d, double v) { d.light.wavelength = v; }},
    {"angle", "angle of incidence", &core::kind::angle, 0.0, core::pi / 2.0 * 0.99999,
     [](stack::Design& d, double v) { d.light.angle = v; }},
    {"temperature", "temperature", &core::kind::temperature, 1e-3, 1e5,
     [](stack::Design& d, double v) { d.temperature = v; }},
    {"beam_radius", "beam radius", &core::kind::length, 1e-9, 1e3,
     [](stack::Design& d, double v) { d.beam_radius = v; }},
    {"frequency", "frequency", &core::kind::frequency, 1e-12, 1e15,
     [](stack::Design& d, double v) {
         d.band.from = d.band.to = v;
         d.band.spot = {v};
     }},
};

/// What an axis name means.
struct Target {
    std::string title;
    const core::QuantityKind* kind;
    core::Limits limits;
    const Plain* plain = nullptr;
    std::size_t layer = 0;   ///< from 1
    std::string material{};  ///< of a thickness factor or a property
    std::optional<PropertyId> property{};
};

[[noreturn]] void unknown_axis(const std::string& name, const materials::Library& library) {
    std::vector<std::string> names;
    for (const Plain& quantity : plain_quantities) names.push_back(quantity.name);
    const std::size_t dot = name.find('.');
    const auto near = core::nearest_spelling(name.substr(0, dot),
                                             dot == std::string::npos ? names : library.names());
    throw core::InputError(
        fmt::format("--over: unknown quantity \"{}\"", name),
        (near ? fmt::format("did you mean {}? ", *near) : std::string()) +
            fmt::format("known: {}, layer.N, MATERIAL.thickness, MATERIAL.PROPERTY",
                        fmt::join(names, ", ")));
}

Target layer_target(const std::string& number, const stack::Design& design) {
    std::size_t layer = 0;
    const char* const end = number.data() + number.size();
    const auto [after, error] = std::from_chars(number.data(), end, layer);
    if (error != std::errc() || after != end || layer < 1 || layer > design.coating.layers.size()) {
        throw core::InputError(
            fmt::format("--over: there is no layer \"{}\"", number),
            fmt::format("layers count from 1, the outermost, to {}", design.coating.layers.size()));
    }
    Target target{fmt::format("thickness of layer {}", layer), &core::kind::length,
                  core::between(1e-15, 1.0, "m")};
    target.layer = layer;
    return target;
}

/// A material that the mirror does not hold would vary without any effect.
void require_in_mirror(const std::string& material, const stack::Design& design) {
    std::vector<std::string> held{design.mirror.substrate};
    if (design.light.medium != "vacuum" && design.light.medium != "air") {
        held.push_back(design.light.medium);
    }
    std::vector<stack::LayerInput> layers = design.coating.layers;
    if (design.rear_face) {
        layers.insert(layers.end(), design.rear_face->layers.begin(),
                      design.rear_face->layers.end());
    }
    for (const stack::LayerInput& layer : layers) {
        if (std::find(held.begin(), held.end(), layer.material) == held.end()) {
            held.push_back(layer.material);
        }
    }
    if (std::find(held.begin(), held.end(), material) != held.end()) return;
    throw core::InputError(fmt::format("--over: the mirror holds no {}", material),
                           fmt::format("it holds {}", fmt::join(held, ", ")));
}

Target target_of(const std::string& name, const stack::Design& design,
                 const materials::Library& library) {
    for (const Plain& quantity : plain_quantities) {
        if (name != quantity.name) continue;
        Target target{quantity.title, quantity.kind,
                      core::between(quantity.lower, quantity.upper, quantity.kind->si_unit)};
        if (quantity.kind == &core::kind::angle) {
            target.limits.words = "from 0 deg to less than 90 deg";
        }
        target.plain = &quantity;
        return target;
    }
    const std::size_t dot = name.rfind('.');
    if (dot == std::string::npos) unknown_axis(name, library);
    const std::string owner = name.substr(0, dot);
    const std::string what = name.substr(dot + 1);
    if (owner == "layer") return layer_target(what, design);
    if (library.materials.count(owner) == 0) unknown_axis(name, library);
    require_in_mirror(owner, design);
    if (what == "thickness") {
        Target target{fmt::format("factor on the thickness of {}", owner), &core::kind::number,
                      core::between(1e-3, 1e3, "")};
        target.material = owner;
        return target;
    }
    const auto property = materials::property_by_key(what);
    if (!property) {
        std::vector<std::string> keys{"thickness"};
        for (const auto& about : materials::property_table()) keys.push_back(about.key);
        const auto near = core::nearest_spelling(what, keys);
        throw core::InputError(fmt::format("--over: unknown property \"{}\"", what),
                               near ? fmt::format("did you mean {}?", *near)
                                    : fmt::format("known: {}", fmt::join(keys, ", ")));
    }
    const bool apart = library.at(owner).properties.count(PropertyId::loss_angle) == 0;
    if (materials::is_loss(*property) && *property != PropertyId::loss_angle && !apart) {
        throw core::InputError(
            fmt::format("--over: {} has one loss angle for bulk and shear", owner),
            fmt::format("vary {}.loss_angle", owner));
    }
    const materials::PropertyInfo& about = materials::info(*property);
    Target target{fmt::format("{} of {}", about.title, owner), about.kind, about.limits};
    target.material = owner;
    target.property = property;
    return target;
}

double quantity_of(const std::string& text, const Target& target, const std::string& axis) {
    const core::QuantityReading reading = core::read_quantity(text, *target.kind);
    if (!reading.ok) {
        const bool factor = !target.material.empty() && !target.property;
        throw core::InputError(fmt::format("--over {}: {}", axis, reading.failure.message),
                               factor ? "it is a factor on the thickness, such as 0.98; for a "
                                        "thickness in nm vary layer.N"
                                      : reading.failure.hint);
    }
    if (target.limits.admit(reading.value)) return reading.value;
    throw core::InputError(fmt::format("--over {}: \"{}\" is out of range", axis, text),
                           "it must be " + target.limits.words);
}

std::string trimmed(std::string text) {
    text.erase(0, text.find_first_not_of(' '));
    text.erase(text.find_last_not_of(' ') + 1);
    return text;
}

std::vector<std::string> split(const std::string& text, char mark) {
    std::vector<std::string> parts;
    std::size_t begin = 0;
    for (std::size_t end; (end = text.find(mark, begin)) != std::string::npos; begin = end + 1) {
        parts.push_back(trimmed(text.substr(begin, end - begin)));
    }
    parts.push_back(trimmed(text.substr(begin)));
    return parts;
}

std::size_t count_of(const std::string& text, const std::string& axis) {
    std::size_t count = 0;
    const char* const end = text.data() + text.size();
    const auto [after, error] = std::from_chars(text.data(), end, count);
    if (error == std::errc() && after == end && count >= 2 && count <= most_sweep_points) {
        return count;
    }
    throw core::InputError(fmt::format("--over {}: \"{}\" is no number of points", axis, text),
                           fmt::format("a whole number from 2 to {}", most_sweep_points));
}

void multiply_thickness(std::vector<stack::LayerInput>& layers, const std::string& material,
                        double factor) {
    for (stack::LayerInput& layer : layers) {
        if (layer.material != material) continue;
        if (layer.quarter_waves) *layer.quarter_waves *= factor;
        if (layer.thickness) *layer.thickness *= factor;
    }
}

}  // namespace

SweepAxis read_axis(const std::string& text, const stack::Design& design,
                    const materials::Library& library) {
    const std::size_t equal = text.find('=');
    const std::vector<std::string> parts = equal == std::string::npos
                                               ? std::vector<std::string>{}
                                               : split(text.substr(equal + 1), ':');
    const bool logarithmic = parts.size() == 4 && parts[3] == "log";
    if (parts.size() != 3 && !logarithmic) {
        throw core::InputError(
            fmt::format("--over: \"{}\" is no NAME=FROM:TO:COUNT", text),
            "for example wavelength=900nm:1300nm:401, or frequency=1Hz:10kHz:81:log");
    }
    SweepAxis axis;
    axis.name = trimmed(text.substr(0, equal));
    const Target target = target_of(axis.name, design, library);
    if (axis.name == "angle" && !design.light.polarisation_stated) {
        throw core::InputError("--over angle: the design states no polarisation",
                               "add polarisation = \"s\", \"p\" or \"unpolarised\" to [light]");
    }
    axis.title = target.title;
    axis.unit = target.kind->si_unit;
    const double from = quantity_of(parts[0], target, axis.name);
    const double to = quantity_of(parts[1], target, axis.name);
    const std::size_t count = count_of(parts[2], axis.name);
    // 1 µm and 1000 nm differ by a rounding.
    if (std::abs(to - from) <= 1e-12 * std::abs(from)) {
        throw core::InputError(
            fmt::format("--over {}: it begins and ends at the same value", axis.name),
            "give two different ends");
    }
    if (logarithmic && !(from > 0.0 && to > 0.0)) {
        throw core::InputError(fmt::format("--over {}: a logarithm needs ends above 0", axis.name),
                               "leave :log out");
    }
    for (std::size_t i = 0; i < count; ++i) {
        const double share = static_cast<double>(i) / static_cast<double>(count - 1);
        const double value =
            logarithmic ? from * std::pow(to / from, share) : from + (to - from) * share;
        // Fifteen digits, so that 1201 nm is not printed as 1201.0000000000002 nm.
        axis.values.push_back(std::stod(fmt::format("{:.15g}", i + 1 == count ? to : value)));
    }
    return axis;
}

void put_value(const SweepAxis& axis, double value, const materials::Library& library,
               stack::Design& design, std::optional<materials::Library>& own) {
    const Target target = target_of(axis.name, design, library);
    if (target.plain != nullptr) {
        target.plain->put(design, value);
    } else if (target.layer != 0) {
        stack::LayerInput& layer = design.coating.layers[target.layer - 1];
        layer.quarter_waves.reset();
        layer.thickness = value;
    } else if (target.property) {
        if (!own) own = library;
        materials::replace_value(*own, target.material, *target.property, value,
                                 "varied by the sweep");
    } else {
        multiply_thickness(design.coating.layers, target.material, value);
        if (design.rear_face) multiply_thickness(design.rear_face->layers, target.material, value);
    }
}

}  // namespace stillcoat::assess
