#pragma once
/// Scales and their tic marks. gnuplot is given positions from 0 to 1 and finished labels, so that
/// neither extreme values nor its own choice of tics matter.

#include <string>
#include <vector>

#include "present/figure.hpp"

namespace stillcoat::present {

/// Smallest and largest of the values that an axis can show.
struct Extent {
    bool empty = true;
    double least = 0.0;
    double most = 0.0;
};

/// Takes in those of `values` that are not gaps on `axis`.
void extend(Extent& extent, const Axis& axis, const std::vector<double>& values);

struct Scale {
    bool logarithmic = false;
    // long double: the distance of two doubles may be too large for one.
    long double lower = 0.0L;  ///< value, or its decimal logarithm
    long double upper = 1.0L;

    /// Whether the value has a place on the scale at all: on a logarithmic one, whether it is > 0.
    bool has(double value) const { return !logarithmic || value > 0.0; }
    /// 0 at the lower end, 1 at the upper, beyond them for values outside.
    double position(double value) const;
};

/// @param margin what is left free at an end without a given limit, as a part of the length
Scale scale_of(const Axis& axis, const Extent& data, double margin);

struct Tic {
    double position = 0.0;
    std::string label;  ///< with "^{…}" around what stands raised; empty: a minor tic
};

/// @param room the length of the scale [font sizes]
/// @param along labels stand side by side, so that their widths count
std::vector<Tic> tics_of(const Scale& scale, double room, bool along);

/// Width of a tic's label [font sizes].
double label_width(const std::string& label);

}  // namespace stillcoat::present
