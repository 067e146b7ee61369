#include "assess/optical_view.hpp"

namespace stillcoat::assess {
namespace {

numerics::Jet<optics::Complex> complex_index(const stack::OpticalConstants& constants) {
    const numerics::Jet<double>& n = constants.index;
    const numerics::Jet<double>& k = constants.extinction;
    return {{n.value, k.value}, {n.first, k.first}, {n.second, k.second}};
}

}  // namespace

optics::OpticalStack optical_stack(const stack::Mirror& mirror) {
    optics::OpticalStack stack{
        mirror.incident_index.value, {}, complex_index(mirror.substrate_optical).value};
    for (const stack::MirrorLayer& layer : mirror.layers) {
        stack.layers.push_back({complex_index(layer.optical).value, layer.thickness});
    }
    return stack;
}

optics::DispersiveStack dispersive_stack(const stack::Mirror& mirror) {
    optics::DispersiveStack stack{
        mirror.incident_index, {}, {}, complex_index(mirror.substrate_optical)};
    for (const stack::MirrorLayer& layer : mirror.layers) {
        stack.layer_index.push_back(complex_index(layer.optical));
        stack.thickness.push_back(layer.thickness);
    }
    return stack;
}

}  // namespace stillcoat::assess
