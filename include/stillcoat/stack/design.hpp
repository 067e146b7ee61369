#pragma once
/// The design file: what the user writes about one mirror. Format: README, "The design file".

#include <optional>
#include <string>
#include <vector>

#include "stillcoat/core/document.hpp"
#include "stillcoat/materials/library.hpp"

namespace stillcoat::stack {

inline constexpr std::size_t most_layers = 20'000;
inline constexpr std::size_t most_frequencies = 20'000;
inline constexpr std::size_t most_layer_frequencies = 2'000'000;  ///< their product

enum class PolarisationChoice { s, p, unpolarised };

struct Light {
    double wavelength;                ///< in vacuum [m]
    double angle;                     ///< in the incident medium [rad]
    PolarisationChoice polarisation;  ///< s where none is stated
    bool polarisation_stated;
    std::string medium;           ///< "vacuum", "air" or a material
    std::optional<double> power;  ///< incident [W]
    bool from_rear;               ///< the whole part is lit from behind, along the same ray
};

/// Relief of the coated face. An rms height holds for its band of spatial frequencies only.
struct Roughness {
    double rms;       ///< [m]
    double from, to;  ///< spatial frequencies [1/m]
};

/// Total integrated scatter of the coated face as the design states it.
struct StatedScatter {
    double value;  ///< per incident power, 0 to 1
    std::string source;
};

struct MirrorBody {
    std::string substrate;
    std::optional<double> diameter, thickness;  ///< [m]; both or neither, neither: a half-space
    std::optional<Roughness> roughness;         ///< at most one of roughness and scatter
    std::optional<StatedScatter> scatter;
};

struct Band {
    double from, to;  ///< [Hz]
    int points_per_decade;
    std::vector<double> spot;  ///< frequencies quoted in the text [Hz]
};

struct LayerInput {
    std::string material;
    std::optional<double> quarter_waves;  ///< counted at the design wavelength, normal incidence
    std::optional<double> thickness;      ///< [m]
    const core::Node* node;               ///< in the design file; null in a table file
    core::Place cell;                     ///< of the material in a table file

    /// Where its material stands.
    core::Place place() const;
};

struct Coating {
    double design_wavelength;      ///< [m]
    double reference_temperature;  ///< thicknesses hold at this temperature [K]
    double excess_loss;            ///< factor on the films' loss angles; 1 unless stated
    bool excess_loss_stated;
    std::string table;               ///< file of layers; empty when the design file holds them
    std::vector<LayerInput> layers;  ///< from the light side to the substrate, repeats written out
};

/// How the passes of light through the plate are added up.
enum class Passes { intensities, amplitudes };

struct RearFace {
    std::string medium;  ///< "vacuum", "air" or a material
    Passes passes;
    std::vector<LayerInput> layers;  ///< from the substrate outwards; empty: a bare face
};

/// Values of one material that the design file replaces.
struct ReplacedValue {
    std::string key;          ///< "loss_angle"
    std::string alternative;  ///< name of the library's alternative; empty: a value of its own
};
struct Override {
    std::string material;
    std::vector<ReplacedValue> values;
};

struct Design {
    core::Document document;
    std::string title;
    Light light;
    double beam_radius;  ///< 1/e² intensity [m]
    MirrorBody mirror;
    double temperature;  ///< [K]
    Band band;
    Coating coating;
    std::optional<RearFace> rear_face;  ///< absent: only the coated face is considered
    std::vector<Override> overrides;
};

/// Reads a design; values of [material] tables replace those of `library`.
/// @throws core::InputError with every problem of the file
Design read_design(core::Document document, materials::Library& library);

/// The table of layers and the curves that a design names, as paths.
std::vector<std::string> files_beside(const Design& design);

/// Frequencies of the band, evenly spaced in logarithm, ends included [Hz]; one when the ends meet.
std::vector<double> frequencies(const Band& band);

}  // namespace stillcoat::stack
