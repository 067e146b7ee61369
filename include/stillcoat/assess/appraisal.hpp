#pragma once
/// Everything that is said of one mirror: its optics, where light and energy sit, its noise term by
/// term, and what the numbers rest on.

#include <optional>
#include <string>
#include <vector>

#include "stillcoat/assess/neighbourhood.hpp"
#include "stillcoat/assess/part_view.hpp"
#include "stillcoat/materials/library.hpp"
#include "stillcoat/optics/response.hpp"
#include "stillcoat/stack/design.hpp"
#include "stillcoat/stack/mirror.hpp"

namespace stillcoat::assess {

/// The field through the stack, for tables and figures.
struct FieldSample {
    double depth;       ///< below the face [m]
    std::size_t layer;  ///< from 0
    double index;
    double intensity;  ///< |E|² over the incident one
};

struct NoiseTerm {
    std::string key;    ///< as in JSON: "coating_brownian"
    std::string title;  ///< as in the text
    bool in_total = false;
    std::vector<double> psd;       ///< over the band [m²/Hz]; empty when not computed
    std::vector<double> spot_psd;  ///< at the spot frequencies [m²/Hz]
    std::string missing;           ///< why not computed
    std::string source;            ///< formula and what it leaves out
};

/// Share of a layer in the coating's Brownian noise power at one frequency.
struct LayerNoise {
    double bulk_energy, shear_energy;  ///< [J/N²]
    double psd;                        ///< [m²/Hz]
};

/// Over these frequencies one term is the largest.
struct Dominance {
    double from, to;  ///< [Hz]
    std::string title;
};

struct Noise {
    std::vector<double> frequencies, spot;  ///< [Hz]
    std::vector<NoiseTerm> terms;           ///< what the total is made of
    std::vector<NoiseTerm> comparisons;     ///< parts, named models, light crossing the substrate
    std::vector<double> total, spot_total;  ///< sum of the terms computed [m²/Hz]; empty: none was
    bool complete = false;                  ///< every term of the total was computed
    double layer_frequency = 0.0;           ///< [Hz]
    std::vector<LayerNoise> layers;         ///< empty when coating Brownian is not computed
    std::vector<Dominance> dominance;
};

/// The coated face in one polarisation.
struct Face {
    optics::Polarisation polarisation;
    optics::Response response;
    std::optional<optics::PhaseResponse> phase;  ///< absent where it is not defined
    std::vector<double> stored_energy;           ///< per layer [J/W]
    double energy_penetration_depth;             ///< [m]
    double face_intensity;                       ///< |E|² at the face over the incident one
    std::vector<double> peak_intensity;          ///< per layer, over the incident one
    std::vector<double> peak_depth;              ///< per layer, below its top [m]
    std::vector<FieldSample> field;
    FaceLosses losses;
    Noise noise;
};

/// What the stated power does to the coating.
struct LightLoad {
    double power;              ///< incident [W]
    double absorbed;           ///< in the coating [W]
    double centre_intensity;   ///< of the incident beam, across it [W/m²]
    double largest_intensity;  ///< at the field's maximum in the coating, of s and p the larger
};

struct Appraisal {
    stack::Mirror mirror;
    std::vector<Face> faces;              ///< one, or s and p for unpolarised light
    std::vector<PartView> part;           ///< one per face; empty without a rear face
    std::optional<LightLoad> light_load;  ///< absent when the design states no power
    std::optional<Neighbourhood> around;  ///< absent when not asked for
    std::vector<std::string> warnings;    ///< what the designer should act on
    std::vector<std::string> notes;       ///< what was left out or assumed
    std::vector<std::string> analogies;   ///< values by analogy
    std::vector<std::string> fixed;       ///< inputs without stated uncertainty
    std::vector<stack::Ledger::Use> uses;
};

/// What is computed; what is not asked for stays empty.
struct Scope {
    bool field = true;          ///< Face::field
    bool noise = true;          ///< Face::noise, and what is said about it
    bool neighbourhood = true;  ///< Appraisal::around
};

/// @throws core::InputError when the design cannot be evaluated at all
Appraisal appraise(const stack::Design& design, const materials::Library& library,
                   const Scope& scope = {});

/// Reflectance, transmittance … of unpolarised light: the mean over the faces.
double mean_over_faces(const Appraisal& appraisal, double optics::Response::*member);

}  // namespace stillcoat::assess
