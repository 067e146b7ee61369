#pragma once
/// What a mirror does while one or two of its quantities vary.

#include <cstddef>
#include <functional>
#include <optional>
#include <string>
#include <vector>

#include "stillcoat/assess/appraisal.hpp"

namespace stillcoat::assess {

inline constexpr std::size_t most_sweep_points = 1'000'000;

/// A quantity that varies. Names: wavelength, angle, temperature, beam_radius, frequency;
/// layer.N (thickness of layer N, 1 the outermost); MATERIAL.thickness (factor on every layer of
/// that material); MATERIAL.PROPERTY (takes the place of the library's value).
struct SweepAxis {
    std::string name;
    std::string title;           ///< "wavelength in vacuum"
    std::string unit;            ///< SI; "1" for a pure number
    std::vector<double> values;  ///< [unit], in the order of the sweep
};

/// Reads NAME=FROM:TO:COUNT, evenly spaced, or NAME=FROM:TO:COUNT:log, evenly in the logarithm.
/// Quantities carry their units: "wavelength=900nm:1300nm:401".
/// @throws core::InputError saying what is wrong and what is allowed
SweepAxis read_axis(const std::string& text, const stack::Design& design,
                    const materials::Library& library);

/// A result that a sweep can show.
struct Outcome {
    std::string key;    ///< ends with its unit: "group_delay_s"
    std::string title;  ///< "group delay"
    std::string unit;   ///< "s"; "1" for a ratio
    bool of_noise = false;
};

/// All results for a design; for unpolarised light with the endings _s and _p, and the means.
std::vector<Outcome> outcomes(const stack::Design& design);

/// Those of `keys`, in that order; with none, what suits the axes.
/// @throws core::InputError for an unknown key
std::vector<Outcome> chosen_outcomes(const stack::Design& design,
                                     const std::vector<std::string>& keys,
                                     const std::vector<SweepAxis>& axes);

struct SweepPlan {
    std::vector<SweepAxis> axes;  ///< one or two; the last varies fastest
    std::vector<Outcome> outcomes;
    double frequency;  ///< of the noise, where it is no axis [Hz]

    std::size_t size() const;
    /// Value of an axis at a point.
    double value(std::size_t axis, std::size_t point) const;
};

/// One point: a value for each outcome, absent where it is not defined or not known.
struct SweepRow {
    std::vector<std::optional<double>> values;
    std::string lack;  ///< why values are absent; empty when none is
};

/// The row of one point.
SweepRow sweep_row(const stack::Design& design, const materials::Library& library,
                   const SweepPlan& plan, std::size_t point);

/// Fills the rows that are absent, on all cores; the result does not depend on their number.
/// @param rows one for each point; those present stay as they are
/// @param report called now and then by the calling thread with the number of rows present;
///        returns whether to go on
/// @returns whether every row is there
bool run_sweep(const stack::Design& design, const materials::Library& library,
               const SweepPlan& plan, std::vector<std::optional<SweepRow>>& rows,
               const std::function<bool(std::size_t)>& report);

/// What an appraisal warns of, and which values are by analogy, at the corners of a sweep.
struct SweepRemarks {
    std::vector<std::string> warnings, analogies;
};
SweepRemarks sweep_remarks(const stack::Design& design, const materials::Library& library,
                           const SweepPlan& plan);

}  // namespace stillcoat::assess
