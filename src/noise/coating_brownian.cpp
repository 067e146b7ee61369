#include "stillcoat/noise/coating_brownian.hpp"

#include <algorithm>
#include <cmath>

#include "noise/footprint_averages.hpp"
#include "noise/limits.hpp"
#include "stillcoat/core/constants.hpp"
#include "stillcoat/core/errors.hpp"

namespace stillcoat::noise {
namespace {

constexpr char hong[] = "Hong et al., Phys. Rev. D 87, 082001 (2013)";
constexpr char harry[] = "Harry et al., Class. Quantum Grav. 19, 897 (2002)";
constexpr char nakagawa[] = "Nakagawa et al., Phys. Rev. D 65, 102001 (2002)";
constexpr char levin[] = "Levin, Phys. Rev. D 57, 659 (1998)";

/// Energies of one layer per squared pressure and area of the face.
StrainEnergy energy_per_area(double face_strain, const ElasticLayer& layer) {
    // Notation: η in-plane dilatation of the face per unit pressure; λ, μ, K, M moduli; θ
    // dilatation; ε_zz = (−g + λη)/M, so θ = ε_zz − η = −(g + 2μη)/M.
    const double eta = face_strain;
    const double mu = shear_modulus(layer.elastic);
    const double big_m = p_wave_modulus(layer.elastic);
    const double d = layer.readout.thickness;
    const optics::ReadoutIntegrals g = optics::readout_integrals(layer.readout);
    const double shift = 2.0 * mu * eta;
    const double theta_squared =
        (g.strain_squared + 2.0 * shift * g.strain + shift * shift * d) / (big_m * big_m);
    // The shear energy is (2/3)(θ + 3η/2)² + η²/2 with θ + 3η/2 = (cη − g)/M, c = 3λ/2 + μ.
    const double c_eta = (1.5 * lame_lambda(layer.elastic) + mu) * eta;
    const double deviation =
        (g.strain_squared - 2.0 * c_eta * g.strain + c_eta * c_eta * d) / (big_m * big_m);
    return {0.5 * bulk_modulus(layer.elastic) * theta_squared,
            mu * (2.0 / 3.0 * deviation + 0.5 * eta * eta * d)};
}

}  // namespace

std::vector<StrainEnergy> thin_film_energies(const Elastic& substrate,
                                             const std::vector<ElasticLayer>& layers,
                                             const Footprint& spot) {
    validate(substrate);
    require_spot(spot, hong);
    const double eta = face_dilatation(substrate);
    const double inverse_area = squared_pressure(spot);
    std::vector<StrainEnergy> energies;
    energies.reserve(layers.size());
    for (const ElasticLayer& layer : layers) {
        validate(layer.elastic);
        require_not_negative(layer.readout.thickness, "thickness of a layer", "m", hong);
        const StrainEnergy density = energy_per_area(eta, layer);
        if (!std::isfinite(density.bulk) || !std::isfinite(density.shear)) {
            throw core::DomainError("strain energy of a layer", density.bulk + density.shear,
                                    "J/N^2", "finite: check the weights of its readout", hong);
        }
        // Both are sums of squares; rounding can take one that vanishes below zero.
        energies.push_back({inverse_area * std::max(0.0, density.bulk),
                            inverse_area * std::max(0.0, density.shear)});
    }
    return energies;
}

double brownian_psd(const StrainEnergy& energy, const Loss& loss, double temperature,
                    double frequency) {
    require_not_negative(energy.bulk, "strain energy in bulk", "J/N^2", levin);
    require_not_negative(energy.shear, "strain energy in shear", "J/N^2", levin);
    require_not_negative(loss.bulk, "loss angle in bulk", "rad", levin);
    require_not_negative(loss.shear, "loss angle in shear", "rad", levin);
    require_positive(temperature, "temperature", "K", levin);
    require_positive(frequency, "frequency", "Hz", levin);
    const double omega = 2.0 * core::pi * frequency;
    const double lost = loss.bulk * energy.bulk + loss.shear * energy.shear;
    return finite_psd(8.0 * core::boltzmann_constant * temperature / omega * lost,
                      "Brownian spectrum", levin);
}

double parallel_perpendicular_psd(const Elastic& substrate, const Elastic& film, double thickness,
                                  double loss_parallel, double loss_perpendicular,
                                  const Footprint& spot, double temperature, double frequency) {
    validate(substrate);
    validate(film);
    require_conditions(spot, temperature, frequency, harry);
    require_not_negative(thickness, "thickness of the film", "m", harry);
    require_not_negative(loss_parallel, "loss angle in the plane", "rad", harry);
    require_not_negative(loss_perpendicular, "loss angle across the plane", "rad", harry);
    // Notation: primed quantities belong to the film. Prefactor 2k_BT/(π²wxwyf)·d, the bracket as
    // energies of stress in the plane (φ∥) and across it (φ⊥).
    const double young = film.youngs_modulus, nu = film.poisson_ratio;
    const double eta = face_dilatation(substrate);
    const double across = (1.0 + nu) * (1.0 - 2.0 * nu) / (young * (1.0 - nu));
    const double along = young * eta * eta / (1.0 - nu * nu);
    const double mixed = nu * eta / (1.0 - nu);
    const double lost = along * loss_parallel + mixed * (loss_parallel - loss_perpendicular) +
                        across * loss_perpendicular;
    return finite_psd(2.0 * core::boltzmann_constant * temperature * thickness /
                          (core::pi * frequency) * squared_pressure(spot) * lost,
                      "Brownian spectrum", harry);
}

double equal_elastic_psd(const Elastic& material, double thickness, double loss,
                         const Footprint& spot, double temperature, double frequency) {
    validate(material);
    require_conditions(spot, temperature, frequency, nakagawa);
    require_not_negative(thickness, "thickness of the film", "m", nakagawa);
    require_not_negative(loss, "loss angle of the film", "rad", nakagawa);
    const double nu = material.poisson_ratio;
    return finite_psd(4.0 * core::boltzmann_constant * temperature * thickness * loss /
                          (core::pi * frequency) * squared_pressure(spot) * (1.0 + nu) *
                          (1.0 - 2.0 * nu) / material.youngs_modulus,
                      "Brownian spectrum", nakagawa);
}

}  // namespace stillcoat::noise
