#pragma once
/// Centre and edges of the band of high reflectance around the operating wavelength.
///
/// Definition for a finite stack: `top_reflectance` is the largest reflectance met from the
/// operating wavelength outwards, on each side up to where R has fallen below half of the largest
/// value met on that side. From the top outwards, an edge is where R first falls to half of the
/// top. For a long quarter-wave stack it lies just outside the edge of the infinite stack and
/// approaches it as the inverse square of the number of pairs.
///
/// Search: outwards in panels of three samples, at most 2 % of the frequency wide, cut in half
/// until the middle r is within 0.03 of the mean of the outer two and ln[(1 − R)/R] (both not below
/// 1e-5) within 0.7; twice the last part before the edge again with samples in between; then a
/// bracketed root search to a relative 1e-10. Up to a factor 3 in wavelength on each side, at most
/// 397 evaluations in all. The result depends on nothing but the arguments.
///
/// Leaves out: a dip narrower than the steps may be passed over, such as the line of a resonator
/// built into the coating; the edge is then that of the next dip. A dip that is seen counts as an
/// edge.
/// Source: own definition; closed form of the periodic stack: M. Born & E. Wolf, Principles of
/// Optics, §1.6.5 (from memory).

#include <functional>
#include <limits>

#include "stillcoat/optics/response.hpp"

namespace stillcoat::optics {

enum class EdgeState {
    found,
    beyond_data,   ///< still above half at the end of the material data: edge_beyond_data
    beyond_search  ///< still above half where the search ends (a metal has no edge) or gives up
};

struct StopBandEdge {
    double wavelength;  ///< in vacuum [m]; where the search ended unless the edge was found
    EdgeState state;
};

struct StopBand {
    StopBandEdge short_edge;     ///< shorter wavelength, higher frequency
    StopBandEdge long_edge;      ///< longer wavelength, lower frequency
    double centre_wavelength;    ///< [m], middle of the edges in frequency
    double relative_half_width;  ///< half of the band's width in frequency over its middle
    double top_reflectance;      ///< largest R among the samples
    double operating_reflectance;
    /// False when the operating wavelength lies outside the band that the edges describe, such as
    /// on the far side of its flank.
    bool operating_wavelength_inside;
    int evaluations;  ///< of the response
};

/// Vacuum wavelengths for which every material of the stack has data.
struct WavelengthRange {
    double shortest = 0.0;                                     ///< [m]
    double longest = std::numeric_limits<double>::infinity();  ///< [m]
};

/// The band from a response as function of the vacuum wavelength [m]. `response_at` is asked inside
/// `data` only. Centre and half width mean something only when both edges were found.
/// @param operating_wavelength [m], inside `data`
/// @throws core::DomainError when it is not; whatever `response_at` throws.
StopBand stop_band(const std::function<Response(double)>& response_at, double operating_wavelength,
                   const WavelengthRange& data = {});

/// The same from a stack as function of the vacuum wavelength, since indices disperse. `light`
/// gives the operating wavelength, the angle (kept at all wavelengths) and the polarisation.
StopBand stop_band(const std::function<OpticalStack(double)>& stack_at, const Illumination& light,
                   const WavelengthRange& data = {});

/// Relative half width of the stop band of an unlimited stack of quarter waves at normal
/// incidence, (2/π) asin(|n_a − n_b|/(n_a + n_b)): the band reaches from 1 − this to 1 + this times
/// the frequency for which the layers are quarter waves. Lossless, without dispersion.
/// @throws core::DomainError unless both indices are positive and finite.
double quarter_wave_half_width(double one_index, double other_index);

}  // namespace stillcoat::optics
