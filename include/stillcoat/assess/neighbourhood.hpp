#pragma once
/// How far a mirror stays what it is around its operating point: the band in which it reflects, a
/// little off the wavelength and the angle, and how the band moved on the way from the reference
/// temperature.
///
/// Thicknesses stay what they are at the operating temperature; indices and extinction are looked
/// up anew at every wavelength. A wavelength at which a material has no data ends the search of
/// the band there. Where the extinction is not stated it counts as 0, as at the operating point.
///
/// A shift is the difference of the band's centres or edges found with the layers of the two
/// temperatures. Since indices disperse it differs from the change of the optical thickness (at
/// one wavelength) times the wavelength.
///
/// Leaves out: the width of the beam's own angles; stress and heating by the light.
/// Source: own definition, see optics/stop_band.hpp.

#include <optional>
#include <string>
#include <vector>

#include "stillcoat/materials/library.hpp"
#include "stillcoat/optics/stop_band.hpp"
#include "stillcoat/stack/design.hpp"
#include "stillcoat/stack/mirror.hpp"

namespace stillcoat::assess {

inline constexpr double wavelength_departure = 0.01;  ///< of the operating wavelength
inline constexpr double angle_departure = 5.0;        ///< [degrees]
/// Below this highest reflectance there is no band of a reflector to speak of.
inline constexpr double least_band_reflectance = 0.5;

struct BandEdge {
    double wavelength;        ///< in vacuum [m]; where the search ended unless found
    optics::EdgeState state;  ///< found, beyond the material data, beyond the search
    std::string material;     ///< whose data end there; empty otherwise
    /// From the reference to the operating temperature [m]; absent when they are equal or the edge
    /// was not found at both.
    std::optional<double> shift;
};

/// The stop band of one polarisation around the operating wavelength.
struct ReflectionBand {
    BandEdge short_edge, long_edge;
    std::optional<double> centre;               ///< [m], middle in frequency; needs both edges
    std::optional<double> relative_half_width;  ///< of frequency; needs both edges
    double top_reflectance;
    bool operating_wavelength_inside;
    /// Of the centre, from the reference to the operating temperature [m]; absent when they are
    /// equal or one of the two centres is not known.
    std::optional<double> centre_shift;
};

/// Power reflected and transmitted, as members of optics::Response.
struct Reflected {
    double reflectance, loss, transmittance, log_transmittance, absorptance;
};

/// Light of another wavelength or angle on the same mirror.
struct Departure {
    double wavelength;              ///< vacuum [m]
    double angle;                   ///< in the incident medium [rad]
    std::string missing;            ///< why it could not be computed; empty otherwise
    bool absorption_known = false;  ///< of every layer at this wavelength
    std::optional<Reflected> s, p;  ///< of the polarisations asked for, s alone at normal incidence
    std::optional<Reflected> mean;  ///< over s and p where both are there, else the one
};

struct Neighbourhood {
    /// One for each polarisation, s alone at normal incidence; empty when the coating is no
    /// reflector (see least_band_reflectance).
    std::optional<ReflectionBand> s_band, p_band;
    double top_reflectance;  ///< largest met in the search of a band
    /// Shorter and longer by wavelength_departure, less and more by angle_departure. An angle that
    /// crosses the normal counts on its other side; one of 90° or more is left out. At normal
    /// incidence a single tilt, of s and p unless the design states one of them.
    std::vector<Departure> departures;
};

/// @param mirror at the operating point of `design`
/// @throws core::DomainError as optics::response() does
Neighbourhood neighbourhood(const stack::Design& design, const materials::Library& library,
                            const stack::Mirror& mirror);

}  // namespace stillcoat::assess
