#pragma once
/// Value of a property by its data within their range, by the explicit rules of its entry beyond
/// it, following references to other properties and materials.

#include <array>
#include <string>

#include "stillcoat/materials/library.hpp"
#include "stillcoat/materials/value.hpp"

namespace stillcoat::materials {

/// The way from property to property that one evaluation takes: none is entered while it is being
/// evaluated, and the number of steps is bounded whatever the files say.
class Walk {
  public:
    explicit Walk(const Library& library) : library_(library) {}

    /// The property of a material, entered until leave(); null with the reason when there is none.
    const Property* enter(const std::string& material, PropertyId id, std::string& reason);
    void leave() { --depth_; }
    const Library& library() const { return library_; }

  private:
    static constexpr int most_lookups = 10'000;
    const Library& library_;
    std::array<const Property*, deepest_reference> path_;
    int depth_ = 0;
    int lookups_ = 0;
};

class Evaluator {
  public:
    Evaluator(Walk& walk, const Conditions& conditions) : walk_(walk), conditions_(conditions) {}

    Value property(const std::string& material, PropertyId id) const;
    /// The extinction coefficient, from the absorption coefficient when only that is given.
    Value extinction(const std::string& material) const;

    Walk& walk() const { return walk_; }
    const Conditions& conditions() const { return conditions_; }

  private:
    /// An entry and whose it is, for messages and bases.
    struct Subject {
        const Entry& datum;
        const std::string& material;
        PropertyId id;
    };
    Value entry(const Subject& subject) const;
    Value plain(const Subject& subject, double temperature) const;
    Value same(const Subject& subject, const SameAs& other, double temperature) const;
    Value cold(const Subject& subject) const;
    Value beyond(const Subject& subject) const;
    double rule_factor(const Subject& subject, double reference, Value& value,
                       std::string& how) const;
    Evaluator at(double temperature) const;

    Walk& walk_;
    Conditions conditions_;
};

/// Where an entry with a range of temperature holds, with its rule.
std::string holds_words(const Entry& entry);

/// Whether the temperature lies in the short stretch over which the entry's table is continued.
bool is_continued(const Entry& entry, double temperature);

Value missing_value(std::string reason);

/// Whether a number is finite and within the limits of its property.
bool is_admissible(PropertyId id, double number);

/// Whether the extinction of a material follows from its absorption coefficient.
bool is_per_length(const Library& library, const std::string& material);

Width scaled(const Width& width, double factor);

}  // namespace stillcoat::materials
