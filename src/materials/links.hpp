#pragma once
/// References from a property of one material to other properties and materials.

#include <functional>
#include <map>
#include <string>
#include <utility>
#include <vector>

#include "stillcoat/materials/library.hpp"

namespace stillcoat::materials {

/// A property of a material, which need not exist.
using Link = std::pair<std::string, PropertyId>;

/// What an entry of a material refers to by same_as and by its rule beyond the data.
std::vector<Link> links_of(const std::string& material, PropertyId property, const Entry& entry);

/// Reports each link to a material that does not exist, with a hint. @param suggestions counts the
/// hints of a run, which cost a comparison with every name
void check_targets(
    const Library& library, const std::vector<Link>& links, int& suggestions,
    const std::function<void(const std::string& target, const std::string& hint)>& report);

/// Finds references that run in a circle or through too many properties. Each property is visited
/// once for all questions together, without recursion.
class LinkCheck {
  public:
    explicit LinkCheck(const Library& library) : library_(library) {}

    /// What is wrong with the references of a property, as the end of a sentence; empty when
    /// nothing is.
    std::string fault(const std::string& material, PropertyId property);

  private:
    struct State {
        bool on_path = true;
        bool circle = false;
        int depth = 0;  ///< references on the longest way from here
    };
    struct Step {
        Link at;
        std::vector<Link> links;
        std::size_t next = 0;
    };
    void visit(const Link& start);
    Step step_to(const Link& link) const;

    const Library& library_;
    std::map<Link, State> states_;
};

}  // namespace stillcoat::materials
