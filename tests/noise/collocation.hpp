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

/// The matrix ∫q_a ϑ_b dz for a = e, r, s and b = e, r, s, from three solved right-hand sides.
/// The constant real part of ss, which is no noise, is left out.
inline std::vector<std::vector<Number>> products(const Mirror& mirror, double k, double omega,
                                                 int n = 32) {
    const Grid grid = chebyshev_grid(n);
    const std::size_t count = mirror.layers.size(), m = n + 1, size = count * m;
    const Real kappa_s = mirror.substrate.conductivity, c_s = mirror.substrate.heat_capacity;
    const Number i(0, 1);
    const Number gamma = sqrt(Number(Real(k) * k, Real(omega * c_s / kappa_s)));
    const Real q0 =
        2 * (1 + Real(mirror.substrate.elastic.poisson_ratio)) * mirror.substrate.expansion;
    const Number still = q0 / (i * Real(omega) * c_s);  // substrate without conduction, at its top
    Matrix a(size, std::vector<Number>(size, 0)), b(size, std::vector<Number>(3, 0));
    const auto source = [&](std::size_t layer, int j, int which) -> Real {
        const ThermalLayer& l = mirror.layers[layer];
        const Real nu = l.material.elastic.poisson_ratio, alpha = l.material.expansion;
        const Real nu_s = mirror.substrate.elastic.poisson_ratio;
        const Real lambda = lame_lambda(l.material.elastic),
                   modulus = p_wave_modulus(l.material.elastic);
        const Real eta = (1 + nu_s) * (1 - 2 * nu_s) / mirror.substrate.elastic.youngs_modulus;
        const Real stress = alpha * l.material.elastic.youngs_modulus / (1 - 2 * nu);
        const double z = double(grid.point[j] * l.readout.thickness);
        const Real flat = stress * (eta + (1 - lambda * eta) / modulus);
        if (which == 0) return flat;
        const Real g = optics::strain_weight(l.readout, z), h = optics::index_weight(l.readout, z);
        return stress * (eta + (g - lambda * eta) / modulus) - flat + h * l.index_slope;
    };
    for (std::size_t l = 0; l < count; ++l) {
        const ThermalMaterial& material = mirror.layers[l].material;
        const Real h = mirror.layers[l].readout.thickness, kappa = material.conductivity;
        const std::size_t top = l * m, last = top + n;
        // Scaled by h²/κ so that all rows are of one size.
        const Number reaction =
            h * h * Number(Real(k) * k, Real(omega * material.heat_capacity / kappa));
        for (int row = 1; row < n; ++row) {
            for (int col = 0; col <= n; ++col) {
                Real second = 0;
                for (int j = 0; j <= n; ++j) second += grid.slope[row][j] * grid.slope[j][col];
                a[top + row][top + col] = -second;
            }
            a[top + row][top + row] += reaction;
            for (int w = 0; w < 2; ++w) b[top + row][w] = h * h / kappa * source(l, row, w);
        }
        for (int col = 0; col <= n; ++col) a[top][top + col] = grid.slope[0][col];
        for (int col = 0; col <= n; ++col) a[last][top + col] = grid.slope[n][col];
        if (l > 0) {  // first row: flux continuous with the layer above
            const Real above = mirror.layers[l - 1].material.conductivity * h /
                               (kappa * Real(mirror.layers[l - 1].readout.thickness));
            for (int col = 0; col <= n; ++col) a[top][top - m + col] = -above * grid.slope[n][col];
        }
        if (l + 1 < count) {  // last row: temperature continuous with the layer below
            for (int col = 0; col <= n; ++col) a[last][top + col] = 0;
            a[last][last] = 1;
            a[last][last + 1] = -1;
        } else {  // −κϑ' = κ_sγϑ + κ_s(k − γ)·still
            a[last][last] += h / kappa * kappa_s * gamma;
            b[last][2] = -h / kappa * kappa_s * (Real(k) - gamma) * still;
        }
    }
    const Matrix x = solve(a, b, m);
    std::vector<std::vector<Number>> result(3, std::vector<Number>(3, 0));
    for (int w = 0; w < 3; ++w) {
        for (std::size_t l = 0; l < count; ++l) {
            for (int j = 0; j <= n; ++j) {
                const Real weight = grid.weight[j] * mirror.layers[l].readout.thickness;
                for (int v = 0; v < 2; ++v)
                    result[v][w] += weight * source(l, j, v) * x[l * m + j][w];
            }
        }
        const Number base = x[size - 1][w];
        const Number deviation = w == 2 ? base - still : base;
        result[2][w] = q0 * deviation / (Real(k) + gamma);
    }
    return result;
}

}  // namespace stillcoat::noise::collocation
