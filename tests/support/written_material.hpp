#pragma once
/// Materials as a user would write them, in texts instead of files.

#include <gtest/gtest.h>

#include <string>
#include <vector>

#include "stillcoat/materials/evaluation.hpp"
#include "stillcoat/materials/library.hpp"

namespace stillcoat::test {

/// Everything after the datum except the range.
inline const std::string provenance =
    "uncertainty = \"not stated\"\nsource = [\"here\"]\nplace = \"p\"\nmeasured_at = \"m\"\n"
    "nature = \"measured\"\nstatus = \"seen\"\n";
inline const std::string warm = "range = { temperature_K = [283, 313] }\n";

inline void add_written(materials::Library& library, const std::string& name,
                        const std::string& properties, core::Problems& problems) {
    library.references["here"] = {"a test", "", "text"};
    library.references["rule"] = {"a rule", "", "text"};
    library.references["cold"] = {"a cold table", "", "text"};
    const std::string text =
        "name = \"" + name + "\"\ntitle = \"test\"\nform = \"film\"\n" + properties;
    auto material =
        materials::read_material(core::parse_document(text, name + ".toml"), library, problems);
    if (material) library.materials[name] = *material;
}

/// Adds a material that must be without fault.
inline void add(materials::Library& library, const std::string& name,
                const std::string& properties) {
    core::Problems problems;
    add_written(library, name, properties, problems);
    problems.throw_if_any();
}

inline materials::Library written(const std::string& properties) {
    materials::Library library;
    add(library, "film", properties);
    return library;
}

/// What `act` finds wrong, "message | hint" for each problem; it may give up early.
template <typename Action>
std::vector<std::string> messages(Action&& act) {
    std::vector<std::string> list;
    try {
        core::Problems problems;
        act(problems);
        problems.throw_if_any();
    } catch (const core::InputError& error) {
        for (const core::Problem& problem : error.problems())
            list.push_back(problem.message + " | " + problem.hint);
    }
    return list;
}

inline std::vector<std::string> problems_of(const std::string& properties) {
    return messages([&](core::Problems& problems) {
        materials::Library library;
        add_written(library, "film", properties, problems);
    });
}

/// What is wrong with a table [material."film"] of a design file.
inline std::vector<std::string> problems_of_override(materials::Library& library,
                                                     const std::string& table) {
    const core::Document document = core::parse_document(table, "design.toml");
    return messages([&](core::Problems& problems) {
        materials::override_properties(library, "film", document.root, problems);
    });
}

inline bool mentions(const std::vector<std::string>& list, const std::string& words) {
    for (const std::string& text : list) {
        if (text.find(words) != std::string::npos) return true;
    }
    ADD_FAILURE() << "nobody says \"" << words << "\"; said: " << testing::PrintToString(list);
    return false;
}

}  // namespace stillcoat::test
