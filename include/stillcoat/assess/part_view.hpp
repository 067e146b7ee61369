#pragma once
/// The whole part as the designer meets it, and where the light goes that a coated face does not
/// send on in the mirror direction.
///
/// Source: optics/part.hpp, optics/scatter.hpp, optics/cavity_pair.hpp.

#include <optional>
#include <string>
#include <vector>

#include "stillcoat/optics/part.hpp"
#include "stillcoat/stack/design.hpp"
#include "stillcoat/stack/mirror.hpp"

namespace stillcoat::assess {

/// The whole part in one polarisation, lit from the side that the design states.
struct PartView {
    optics::Polarisation polarisation;
    /// Its front_… fields are the coated face's and its rear_… fields the rear face's, also for
    /// light from the rear; layers in the order of the design. Absent with a reason in `missing`.
    std::optional<optics::PartResponse> response;
    std::string missing;
    /// Why the absorptances of the plate and of the part are not known; R and T are then those of
    /// a clear plate. Empty when they are known.
    std::string absorptance_missing;
};

/// Two equal mirrors that face each other at normal incidence.
struct MirrorPair {
    double round_trip_loss;         ///< power lost in one round trip, per power
    std::optional<double> finesse;  ///< free spectral range over full width at half maximum;
                                    ///< absent where the transmission never falls to half
};

/// Per incident power, for light on the coated face of a mirror without a rear face.
struct FaceLosses {
    std::optional<double> scatter;            ///< S; absent with a reason, never 0 for unknown
    std::string scatter_missing;              ///< "not stated", or why it cannot be computed
    bool scatter_is_lower_limit = false;      ///< the band of the roughness ends too early
    bool absorptance_is_lower_limit = false;  ///< the absorption of a layer is not stated
    std::optional<double> total;              ///< T + A + S; absent without S
    std::optional<MirrorPair> pair;           ///< absent without S and off normal incidence
    std::optional<MirrorPair> pair_without_scatter;  ///< from T + A; absent off normal incidence
};

/// The part as the optics room sees it. An extinction that is not known is 0 here.
/// @throws std::logic_error when the mirror has no rear face
optics::Part optical_part(const stack::Mirror& mirror);

/// @param mirror with a rear face
/// @throws std::logic_error when it has none; what optics refuses is a reason in the result
PartView part_view(const stack::Design& design, const stack::Mirror& mirror,
                   optics::Polarisation polarisation);

/// @param face response of the coated face, light from the front, in any polarisation
FaceLosses face_losses(const stack::Design& design, const stack::Mirror& mirror,
                       const optics::Response& face);

/// What the designer should act on: absorption that nobody stated, a part that cannot be computed.
std::vector<std::string> part_warnings(const stack::Design& design, const stack::Mirror& mirror,
                                       const std::vector<PartView>& part);

/// What the designer should act on: a band of the roughness that ends early, a scatter that cannot
/// be or that exceeds what is reflected.
std::vector<std::string> loss_warnings(const stack::Design& design, const stack::Mirror& mirror,
                                       const FaceLosses& losses);

/// What the part and the losses rest on, leave out or assume.
std::vector<std::string> part_notes(const stack::Design& design);

}  // namespace stillcoat::assess
