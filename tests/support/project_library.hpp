#pragma once
/// The materials library of the source tree.

#include "stillcoat/materials/library.hpp"

namespace stillcoat::test {

inline const materials::Library& project_library() {
    static const materials::Library loaded = [] {
        materials::Library list;
        core::Problems problems;
        materials::add_folder(list, STILLCOAT_MATERIALS, problems);
        materials::check_links(list, problems);
        problems.throw_if_any();
        return list;
    }();
    return loaded;
}

}  // namespace stillcoat::test
