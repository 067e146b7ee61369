#pragma once
/// First designs: the quarter-wave stack that reaches a transmittance, the two layers that reflect
/// nothing, each as the text of a design file with comments.

#include <optional>
#include <string>
#include <vector>

#include "stillcoat/materials/library.hpp"

namespace stillcoat::assess {

enum class Cap { none, quarter_wave, half_wave };

/// What the designer knows before there is a design. Texts go into the file as they are.
struct DraftRequest {
    std::string high, low, substrate;  ///< names of materials
    std::string wavelength;            ///< "1397 nm", in vacuum
    std::string beam_radius;           ///< "2 cm"
    std::string temperature;           ///< "295 K"
    Cap cap = Cap::none;               ///< of the low index, on the light's side
    std::string schema;                ///< path for editors; empty: no such line
    /// Alternatives of the library to take, "silicon.refractive_index=visible".
    std::vector<std::string> alternatives{};
};

/// What a number of pairs reaches.
struct PairCount {
    int pairs;             ///< of low and high below the outermost high layer
    double transmittance;  ///< into the substrate, at normal incidence
};

/// A design that does what was asked for, or the reason why there is none.
struct Draft {
    std::string text;        ///< the design file; empty when there is no answer
    std::string impossible;  ///< the reason
    std::optional<PairCount> fewer, chosen, more;  ///< of a reflecting draft
    double reflectance = 0.0;                      ///< of an antireflecting draft
};

inline constexpr int most_draft_pairs = 300;

/// [cap] (high low)^N high on the substrate with the fewest pairs N whose transmittance at the
/// operating temperature is at or below `transmittance`, 0 < T < 1. Quarter waves are counted at
/// 295 K and normal incidence.
/// @throws core::InputError for an unknown material or index, a quantity that cannot be read, or a
///         high index that is not above the low one
Draft reflecting_draft(const materials::Library& library, const DraftRequest& request,
                       double transmittance);

/// Two layers, low outside and high on the substrate, that reflect nothing at the wavelength:
/// H. A. Macleod, Thin-Film Optical Filters, chapter on antireflection coatings (from memory). Of
/// the solutions the thinnest. Absorption is neglected in the thicknesses, not in the reflectance.
/// @throws core::InputError as above
Draft antireflecting_draft(const materials::Library& library, const DraftRequest& request);

/// The smallest complete design with a comment on every line.
std::string smallest_design(const std::string& schema);

}  // namespace stillcoat::assess
