#pragma once
/// The heat equation of coating and substrate solved by collocation at Chebyshev points, with 34
/// digits: knows no exponential, no recursion and no closed integral.
///
/// In units of iωT: −κϑ'' + (κk² + iωC)ϑ = q in each layer, ϑ and κϑ' continuous, no flux at the
/// face; in the substrate the decaying solution is known.

#include <boost/multiprecision/cpp_complex.hpp>
#include <vector>

#include "noise/mirrors.hpp"

namespace stillcoat::noise::collocation {

using Real = boost::multiprecision::cpp_bin_float_quad;
using Number = boost::multiprecision::cpp_complex_quad;
using Matrix = std::vector<std::vector<Number>>;

/// Solves A X = B by elimination with row pivoting; B holds one column per right-hand side. A has
/// no element farther than `reach` from its diagonal, and rows are exchanged within that reach
/// only.
inline Matrix solve(Matrix a, Matrix b, std::size_t reach) {
    const std::size_t n = a.size();
    for (std::size_t c = 0; c < n; ++c) {
        const std::size_t last_row = std::min(n, c + reach + 1);
        const std::size_t last_column = std::min(n, c + 2 * reach + 1);
        std::size_t best = c;
        for (std::size_t r = c + 1; r < last_row; ++r) {
            if (norm(a[r][c]) > norm(a[best][c])) best = r;
        }
        std::swap(a[c], a[best]);
        std::swap(b[c], b[best]);
        for (std::size_t r = c + 1; r < last_row; ++r) {
            const Number factor = a[r][c] / a[c][c];
            if (factor == Number(0)) continue;
            for (std::size_t k = c; k < last_column; ++k) a[r][k] -= factor * a[c][k];
            for (std::size_t k = 0; k < b[r].size(); ++k) b[r][k] -= factor * b[c][k];
        }
    }
    for (std::size_t c = n; c-- > 0;) {
        for (std::size_t k = 0; k < b[c].size(); ++k) {
            for (std::size_t j = c + 1; j < n; ++j) b[c][k] -= a[c][j] * b[j][k];
            b[c][k] /= a[c][c];
        }
    }
    return b;
}

/// Chebyshev points on [0, 1], their differentiation matrix and their integration weights.
struct Grid {
    std::vector<Real> point, weight;
    std::vector<std::vector<Real>> slope;
};

inline Grid chebyshev_grid(int n) {
    const Real pi = acos(Real(-1));
    Grid grid;
    for (int j = 0; j <= n; ++j) grid.point.push_back(pow(sin(pi * j / (2 * n)), 2));
    const auto c = [&](int j) { return (j == 0 || j == n ? Real(2) : Real(1)) * (j % 2 ? -1 : 1); };
    grid.slope.assign(n + 1, std::vector<Real>(n + 1, 0));
    for (int i = 0; i <= n; ++i) {
        for (int j = 0; j <= n; ++j) {
            if (i == j) continue;
            // sin² a − sin² b = sin(a+b) sin(a−b): no cancellation between neighbours.
            const Real gap = sin(pi * (i + j) / (2 * n)) * sin(pi * (i - j) / (2 * n));
            grid.slope[i][j] = c(i) / c(j) / gap;
            grid.slope[i][i] -= grid.slope[i][j];
        }
        Real sum = 1;
        for (int k = 1; k <= n / 2; ++k) {
            const Real b = 2 * k == n ? 1 : 2;
            sum -= b / (4 * k * k - 1) * cos(2 * k * pi * i / n);
        }
        grid.weight.push_back(sum * ((i == 0 || i == n) ? Real(0.5) : Real(1)) / n);
    }
    return grid;
}

/// Source of a layer at a depth: 0 expansion with g = 1, 1 what refraction adds to it.
inline Real source(const Mirror& mirror, std::size_t layer, Real depth, int which) {
    const ThermalLayer& l = mirror.layers[layer];
    const Elastic& film = l.material.elastic;
    const Elastic& base = mirror.substrate.elastic;
    const Real nu = film.poisson_ratio, nu_s = base.poisson_ratio;
    const Real lambda = lame_lambda(film), modulus = p_wave_modulus(film);
    const Real eta = (1 + nu_s) * (1 - 2 * nu_s) / base.youngs_modulus;
    const Real stress = Real(l.material.expansion) * film.youngs_modulus / (1 - 2 * nu);
    const Real flat = stress * (eta + (1 - lambda * eta) / modulus);
    if (which == 0) return flat;
    const double z = double(depth);
    const Real g = optics::strain_weight(l.readout, z), h = optics::index_weight(l.readout, z);
    return stress * (eta + (g - lambda * eta) / modulus) - flat + h * l.index_slope;
}

/// The system of one mirror at one wavenumber and frequency: values at the points of all layers.
struct System {
    Grid grid;
    Matrix a, b;
    Number gamma;  // of the substrate
    Number still;  // ϑ of the substrate's source without conduction, at its top
    Real q0;       // the substrate's source at its top
};

/// Equations inside a layer, scaled by h²/κ so that all rows are of one size.
inline void add_layer(const Mirror& mirror, std::size_t l, Real k, Real omega, System& s) {
    const int n = int(s.grid.point.size()) - 1;
    const ThermalMaterial& material = mirror.layers[l].material;
    const Real h = mirror.layers[l].readout.thickness, kappa = material.conductivity;
    const std::size_t top = l * (n + 1);
    const Number reaction = h * h * Number(k * k, Real(omega * material.heat_capacity / kappa));
    for (int row = 1; row < n; ++row) {
        for (int col = 0; col <= n; ++col) {
            Real second = 0;
            for (int j = 0; j <= n; ++j) second += s.grid.slope[row][j] * s.grid.slope[j][col];
            s.a[top + row][top + col] = -second;
        }
        s.a[top + row][top + row] += reaction;
        for (int w = 0; w < 2; ++w) {
            s.b[top + row][w] = h * h / kappa * source(mirror, l, s.grid.point[row] * h, w);
        }
    }
}

/// First row of a layer: its flux is that of the layer above, none at the face. Last row: its
/// temperature is that of the layer below; at the substrate −κϑ' = κ_sγϑ + κ_s(k − γ)·still.
inline void add_interfaces(const Mirror& mirror, std::size_t l, Real k, System& s) {
    const int n = int(s.grid.point.size()) - 1;
    const std::size_t m = n + 1, top = l * m, last = top + n;
    const Real h = mirror.layers[l].readout.thickness;
    const Real kappa = mirror.layers[l].material.conductivity;
    for (int col = 0; col <= n; ++col) s.a[top][top + col] = s.grid.slope[0][col];
    if (l > 0) {
        const Real above = mirror.layers[l - 1].material.conductivity * h /
                           (kappa * Real(mirror.layers[l - 1].readout.thickness));
        for (int col = 0; col <= n; ++col) s.a[top][top - m + col] = -above * s.grid.slope[n][col];
    }
    if (l + 1 < mirror.layers.size()) {
        s.a[last][last] = 1;
        s.a[last][last + 1] = -1;
        return;
    }
    const Real ratio = h / kappa * mirror.substrate.conductivity;
    for (int col = 0; col <= n; ++col) s.a[last][top + col] = s.grid.slope[n][col];
    s.a[last][last] += ratio * s.gamma;
    s.b[last][2] = -ratio * (k - s.gamma) * s.still;
}

/// The matrix ∫q_a ϑ_b dz for a = e, r, s and b = e, r, s, from three solved right-hand sides.
/// The constant real part of ss, which is no noise, is left out.
inline std::vector<std::vector<Number>> products(const Mirror& mirror, Real k, Real omega, int n) {
    const ThermalMaterial& base = mirror.substrate;
    const std::size_t m = n + 1, size = mirror.layers.size() * m;
    System s{chebyshev_grid(n),
             Matrix(size, std::vector<Number>(size, 0)),
             Matrix(size, std::vector<Number>(3, 0)),
             0,
             0,
             0};
    s.gamma = sqrt(Number(k * k, Real(omega * base.heat_capacity / base.conductivity)));
    s.q0 = 2 * (1 + Real(base.elastic.poisson_ratio)) * base.expansion;
    s.still = s.q0 / Number(0, Real(omega * base.heat_capacity));
    for (std::size_t l = 0; l < mirror.layers.size(); ++l) {
        add_layer(mirror, l, k, omega, s);
        add_interfaces(mirror, l, k, s);
    }
    const Matrix x = solve(s.a, s.b, m);
    std::vector<std::vector<Number>> result(3, std::vector<Number>(3, 0));
    for (int w = 0; w < 3; ++w) {
        for (std::size_t row = 0; row < size; ++row) {
            const std::size_t l = row / m, j = row % m;
            const Real h = mirror.layers[l].readout.thickness;
            for (int v = 0; v < 2; ++v) {
                result[v][w] +=
                    s.grid.weight[j] * h * source(mirror, l, s.grid.point[j] * h, v) * x[row][w];
            }
        }
        const Number deviation = w == 2 ? x[size - 1][w] - s.still : x[size - 1][w];
        result[2][w] = s.q0 * deviation / (k + s.gamma);
    }
    return result;
}

}  // namespace stillcoat::noise::collocation
