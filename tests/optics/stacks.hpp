#pragma once
/// Stacks that several tests of the optics share.

#include <boost/math/quadrature/gauss.hpp>
#include <cmath>
#include <cstdint>
#include <iostream>
#include <random>

#include "stillcoat/optics/response.hpp"

namespace stillcoat::optics {

inline constexpr double wavelength_1064 = 1064e-9;

inline Illumination normal_light(double wavelength = wavelength_1064) {
    return {wavelength, 0.0, Polarisation::s};
}

/// `layers` quarter waves at normal incidence that alternate between two real indices.
inline OpticalStack quarter_wave_stack(double outermost, double next, int layers, Complex substrate,
                                       double wavelength = wavelength_1064, double incident = 1.0) {
    OpticalStack stack{incident, {}, substrate};
    for (int j = 0; j < layers; ++j) {
        const double n = j % 2 == 0 ? outermost : next;
        stack.layers.push_back({n, wavelength / (4.0 * n)});
    }
    return stack;
}

/// Tantala and silica; many quarter waves of them are an infinite stack, (low/high)^120 is 3e-19.
inline constexpr double n_high = 2.07, n_low = 1.45, index_ratio = n_low / n_high;
inline constexpr int many_layers = 120;

inline OpticalStack many_quarter_waves(bool high_outermost, double incident = 1.0) {
    return quarter_wave_stack(high_outermost ? n_high : n_low, high_outermost ? n_low : n_high,
                              many_layers, n_low, wavelength_1064, incident);
}

/// Gauss–Legendre quadrature in panels far shorter than any wave in the layer.
template <typename Function>
double quadrature(const Function& f, double length) {
    constexpr int panels = 40;
    double sum = 0.0;
    for (int m = 0; m < panels; ++m) {
        sum += boost::math::quadrature::gauss<double, 20>::integrate(f, length * m / panels,
                                                                     length * (m + 1) / panels);
    }
    return sum;
}

/// Layers of arbitrary index and thickness. Prints its seed.
class RandomStacks {
  public:
    explicit RandomStacks(std::uint32_t seed) : engine_(seed) {
        std::cout << "  random stacks, seed " << seed << "\n";
    }

    double between(double low, double high) {
        return std::uniform_real_distribution<double>(low, high)(engine_);
    }
    int count_between(int low, int high) {
        return std::uniform_int_distribution<int>(low, high)(engine_);
    }
    /// Extinction is 0 or spread evenly in its logarithm from 1e-9 to `largest_extinction`.
    Complex index(double largest_extinction) {
        const double n = between(1.3, 2.6);
        if (largest_extinction == 0.0 || between(0.0, 1.0) < 0.3) return n;
        return {n, std::exp(between(std::log(1e-9), std::log(largest_extinction)))};
    }
    OpticalStack stack(double largest_extinction, bool lossless_substrate) {
        OpticalStack stack{between(1.0, 1.6), {}, {}};
        const int layers = count_between(0, 30);
        for (int j = 0; j < layers; ++j) {
            stack.layers.push_back({index(largest_extinction), between(0.0, 500e-9)});
        }
        stack.substrate_index = lossless_substrate ? Complex(between(1.3, 3.5))
                                                   : Complex(between(0.2, 3.5), between(0.0, 6.0));
        return stack;
    }
    Illumination light() {
        const Polarisation polarisation =
            count_between(0, 1) == 0 ? Polarisation::s : Polarisation::p;
        return {between(400e-9, 2000e-9), between(0.0, 1.45), polarisation};
    }

  private:
    std::mt19937 engine_;
};

}  // namespace stillcoat::optics
