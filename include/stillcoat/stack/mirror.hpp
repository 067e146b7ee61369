#pragma once
/// The mirror at its operating point: every layer with its thickness and index at the operating
/// temperature and wavelength.
///
/// A clamped film grows in thickness by [(1+ν)∫α_f dT − 2ν∫α_s dT]/(1−ν) between the reference and
/// the operating temperature (plane stress across, strain of the substrate in the plane; S.
/// Timoshenko & J. N. Goodier, Theory of Elasticity, §13.4).

#include <map>
#include <optional>
#include <string>
#include <vector>

#include "stillcoat/materials/evaluation.hpp"
#include "stillcoat/numerics/jet.hpp"
#include "stillcoat/stack/design.hpp"

namespace stillcoat::stack {

/// A material's optical constants at the operating point.
struct OpticalConstants {
    numerics::Jet<double> index;       ///< in vacuum, with d/dω [s] and d²/dω² [s²]
    numerics::Jet<double> extinction;  ///< k with its derivatives; 0 when not known
    bool extinction_known;
};

struct MirrorLayer {
    std::string material;
    double reference_thickness;  ///< at the reference temperature [m]
    double thickness;            ///< at the operating temperature [m]
    OpticalConstants optical;
    double quarter_waves;  ///< n d / (λ/4) at the operating point and wavelength of the light
};

/// The rear face, with the plate between it and the coated face.
struct MirrorRear {
    numerics::Jet<double> medium_index;
    double plate_thickness;           ///< as stated [m]
    std::vector<MirrorLayer> layers;  ///< from the substrate outwards; empty: a bare face
};

struct Mirror {
    numerics::Jet<double> incident_index;
    std::vector<MirrorLayer> layers;
    std::string substrate;
    OpticalConstants substrate_optical;
    double coating_thickness;  ///< at the operating temperature [m]
    double
        optical_path_ratio;  ///< Σ n d at the operating temperature over that at the reference one
    std::optional<MirrorRear> rear;  ///< absent when the design states no rear face
};

/// What was looked up on the way, for the reader of the result.
class Ledger {
  public:
    /// The number of a lookup, recorded as used; absent with its reason noted nowhere else.
    std::optional<double> use(const std::string& material, materials::PropertyId property,
                              const materials::Value& value);
    void use_index(const std::string& material, const materials::IndexValue& value);
    void note(const std::string& text);

    /// A lookup that gave a number.
    struct Use {
        std::string material;
        materials::PropertyId property;
        materials::Width width;               ///< of the value
        std::vector<materials::Basis> bases;  ///< the data that it rests on
        bool frequency_extrapolated;          ///< outside the frequencies that its data state
    };
    const std::vector<Use>& uses() const { return uses_; }
    const std::vector<std::string>& analogies() const { return analogies_; }
    const std::vector<std::string>& notes() const { return notes_; }

  private:
    void add(Use use, const std::string& analogy);
    std::vector<Use> uses_;
    std::vector<std::string> analogies_;
    std::vector<std::string> notes_;
};

/// @throws core::InputError when an index is unknown at the wavelength or temperature, an absorbing
///         medium outside the mirror is asked for, or a layer would vanish on cooling
Mirror at_operating_point(const Design& design, const materials::Library& library, Ledger& ledger);

}  // namespace stillcoat::stack
