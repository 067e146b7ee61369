#pragma once
/// Natural cubic spline through points with any spacing: value, slope and curvature are continuous,
/// so that dispersion derived from a table has no steps. Source: C. de Boor, A Practical Guide to
/// Splines (Springer, 1978), ch. IV.

#include <vector>

#include "stillcoat/numerics/jet.hpp"

namespace stillcoat::numerics {

class CubicSpline {
  public:
    /// @param x strictly increasing, at least two, @param y as many
    /// @throws std::logic_error otherwise
    CubicSpline(std::vector<double> x, std::vector<double> y);

    /// Value with derivatives; the end pieces are continued beyond the ends (callers check ranges).
    Jet<double> operator()(const Jet<double>& x) const;

  private:
    std::vector<double> x_, y_, curvature_;
};

}  // namespace stillcoat::numerics
