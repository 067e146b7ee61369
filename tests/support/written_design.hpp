#pragma once
/// Designs written in a test.

#include "stillcoat/stack/design.hpp"
#include "support/project_library.hpp"

namespace stillcoat::test {

/// A design with the library that goes with it (its own values applied).
struct ReadDesign {
    materials::Library library;
    stack::Design design;
};

inline ReadDesign read_design(const std::string& text) {
    ReadDesign result{project_library(), {}};
    result.design = stack::read_design(core::parse_document(text, "test.toml"), result.library);
    return result;
}

/// A small mirror; `light`, `coating` and `rest` are TOML text.
inline std::string mirror_text(const std::string& coating, const std::string& rest = "",
                               const std::string& light = "wavelength = \"1064 nm\"",
                               const std::string& substrate = "fused-silica",
                               const std::string& temperature = "295 K") {
    return "[light]\n" + light + "\n[beam]\nradius = \"6 cm\"\n[mirror]\nsubstrate = \"" +
           substrate + "\"\n[environment]\ntemperature = \"" + temperature + "\"\n" + coating +
           "\n" + rest;
}

inline const std::string quarter_wave_pairs =
    "[[coating.block]]\nrepeat = 10\nlayers = [ { material = \"tantala-ibs\", quarter_waves = 1 }, "
    "{ material = \"silica-ibs\", quarter_waves = 1 } ]\n";

}  // namespace stillcoat::test
