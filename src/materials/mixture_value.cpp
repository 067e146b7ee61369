#include "materials/mixture_value.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <functional>
#include <limits>
#include <stdexcept>

#include "stillcoat/core/errors.hpp"
#include "stillcoat/materials/mixture.hpp"

namespace stillcoat::materials {
namespace {

using numerics::Jet;

/// A number of a constituent with its width.
struct Input {
    double number;
    Width width;
};

/// A property of the mixture from the numbers of its constituents, those of the first first.
using Formula = std::function<double(const std::vector<double>&, double fraction)>;

double standard_deviation(const Input& input) {
    const double size = std::abs(input.number);
    switch (input.width.form) {
        case Width::Form::absolute:
            return input.width.value;
        case Width::Form::relative:
            return size * input.width.value;
        case Width::Form::geometric:
            return size * std::log(input.width.value);
        case Width::Form::uniform:
            return (input.width.upper - input.width.lower) / std::sqrt(12.0);
        case Width::Form::not_stated:
            break;
    }
    return 0.0;
}

/// Width of a formula's value, to first order; not stated when that of an input is not.
/// @throws core::DomainError when a neighbour of an input is no admissible number
Width first_order_width(const Formula& formula, const std::vector<Input>& inputs,
                        const Mixed& mixture) {
    constexpr double step = 1e-7;
    std::vector<double> at;
    bool geometric = false;
    for (const Input& input : inputs) {
        if (input.width.form == Width::Form::not_stated) return {};
        geometric = geometric || input.width.form == Width::Form::geometric;
        at.push_back(input.number);
    }
    const double value = formula(at, mixture.fraction);
    double variance = 0.0;
    for (std::size_t i = 0; i < inputs.size(); ++i) {
        // What is 0 may have no negative neighbour.
        const double up = at[i] == 0.0 ? 1e-9 : step * std::abs(at[i]);
        const double down = at[i] == 0.0 ? 0.0 : up;
        std::vector<double> other = at;
        other[i] = at[i] + up;
        const double higher = formula(other, mixture.fraction);
        other[i] = at[i] - down;
        const double slope = (higher - formula(other, mixture.fraction)) / (up + down);
        variance += std::pow(slope * standard_deviation(inputs[i]), 2);
    }
    if (mixture.fraction_uncertainty) {
        const double more = std::min(1.0, mixture.fraction + step);
        const double less = std::max(0.0, mixture.fraction - step);
        const double slope = (formula(at, more) - formula(at, less)) / (more - less);
        variance += std::pow(slope * *mixture.fraction_uncertainty, 2);
    }
    const double width = std::sqrt(variance);
    if (!std::isfinite(width)) return {};
    if (geometric && value != 0.0)
        return {Width::Form::geometric, std::exp(width / std::abs(value)), 0.0, 0.0};
    return {Width::Form::absolute, width, 0.0, 0.0};
}

Width propagated(const Formula& formula, const std::vector<Input>& inputs, const Mixed& mixture) {
    try {
        return first_order_width(formula, inputs, mixture);
    } catch (const core::DomainError&) {
        return {};
    }
}

Formula formula_of(PropertyId property) {
    switch (property) {
        case PropertyId::density:
            return [](const auto& x, double f) { return mixed_density(x[0], x[1], f); };
        case PropertyId::thermal_conductivity:
            return [](const auto& x, double f) { return bruggeman(x[0], x[1], f); };
        case PropertyId::specific_heat:
            return [](const auto& x, double f) {
                return mixed_specific_heat({x[0], x[1]}, {x[2], x[3]}, f);
            };
        case PropertyId::youngs_modulus:
            return [](const auto& x, double f) {
                return voigt_reuss_hill({x[0], x[1]}, {x[2], x[3]}, f).youngs_modulus;
            };
        case PropertyId::poisson_ratio:
            return [](const auto& x, double f) {
                return voigt_reuss_hill({x[0], x[1]}, {x[2], x[3]}, f).poisson_ratio;
            };
        case PropertyId::thermal_expansion:
            return [](const auto& x, double f) {
                return turner_expansion({x[0], {x[1], x[2]}}, {x[3], {x[4], x[5]}}, f);
            };
        default:
            throw std::logic_error("no rule of mixtures for " + info(property).key);
    }
}

void add_analogy(std::string& text, const std::string& more) {
    if (more.empty() || text.find(more) != std::string::npos) return;
    text += (text.empty() ? "" : "; ") + more;
}

std::string missing_words(const Basis& own, const std::string& reason) {
    return fmt::format("{} of {}, a mixture: {}", info(own.property).title, own.material, reason);
}

/// Index and extinction of a constituent.
struct Optical {
    IndexValue index;
    Value extinction;
    Jet<double> n, k;
};

Optical optical(const Evaluator& evaluator, const std::string& material) {
    Optical result;
    result.index = index_on_walk(evaluator, material);
    result.extinction = evaluator.extinction(material);
    if (result.index.index) result.n = *result.index.index;
    if (result.extinction.number) {
        result.k =
            with_dispersion(result.extinction, is_per_length(evaluator.walk().library(), material),
                            evaluator.conditions().wavelength);
    }
    return result;
}

ComplexJet complex_index(const Jet<double>& n, const Jet<double>& k) {
    return {{n.value, k.value}, {n.first, k.first}, {n.second, k.second}};
}

bool is_finite(const ComplexJet& x) {
    return std::isfinite(std::abs(x.value)) && std::isfinite(std::abs(x.first)) &&
           std::isfinite(std::abs(x.second));
}

/// Not a number when a permittivity is too large or too small for one.
ComplexJet mixed_complex_index(const ComplexJet& first, const ComplexJet& second, double fraction) {
    if (fraction == 0.0) return first;
    if (fraction == 1.0) return second;
    const ComplexJet one = first * first;
    const ComplexJet other = second * second;
    const bool usable =
        is_finite(one) && is_finite(other) && one.value != 0.0 && other.value != 0.0;
    if (!usable) return std::complex<double>(std::numeric_limits<double>::quiet_NaN());
    return sqrt(bruggeman(one, other, fraction));
}

std::complex<double> complex_index_of(double n1, double k1, double n2, double k2, double fraction) {
    return mixed_complex_index({{n1, k1}}, {{n2, k2}}, fraction).value;
}

Value mixed_extinction(const Evaluator& evaluator, const Mixed& mixture, const Basis& own) {
    const Optical first = optical(evaluator, mixture.first);
    const Optical second = optical(evaluator, mixture.second);
    for (const Optical* part : {&first, &second}) {
        if (!part->index.index) return missing_value(missing_words(own, part->index.missing));
        if (!part->extinction.number)
            return missing_value(missing_words(own, part->extinction.missing));
    }
    const ComplexJet index = mixed_complex_index(
        complex_index(first.n, first.k), complex_index(second.n, second.k), mixture.fraction);
    if (!is_finite(index)) return missing_value(missing_words(own, "its rule gives no number"));
    Value value;
    value.entry = own.entry;
    // The exact value is never negative; its rounding may be.
    value.number = std::max(0.0, index.value.imag());
    value.derivatives = {index.value.imag(), index.first.imag(), index.second.imag()};
    value.bases.push_back(own);
    for (const Optical* part : {&first, &second}) {
        add_bases(value.bases, part->index.bases);
        add_bases(value.bases, part->extinction.bases);
        add_analogy(value.analogy, part->index.analogy);
        add_analogy(value.analogy, part->extinction.analogy);
    }
    // The index of either constituent has no say in the width worth the name.
    const double n1 = first.n.value;
    const double n2 = second.n.value;
    value.width = propagated(
        [n1, n2](const auto& k, double f) {
            return complex_index_of(n1, k[0], n2, k[1], f).imag();
        },
        {{first.k.value, first.extinction.width}, {second.k.value, second.extinction.width}},
        mixture);
    return value;
}

}  // namespace

const std::vector<MixtureRule>& mixture_rules() {
    using Id = PropertyId;
    static const std::vector<Id> optics{Id::refractive_index, Id::extinction_coefficient,
                                        Id::absorption_coefficient};
    static const std::vector<Id> elastic{Id::youngs_modulus, Id::poisson_ratio};
    static const char* const medium = "effective medium of Bruggeman on the complex n²";
    static const char* const hill = "Voigt-Reuss-Hill mean of bulk and shear modulus";
    static const std::vector<MixtureRule> rules{
        {Id::refractive_index, medium, "Bruggeman1935", optics},
        {Id::extinction_coefficient, medium, "Bruggeman1935", optics},
        {Id::youngs_modulus, hill, "Hill1952", elastic},
        {Id::poisson_ratio, hill, "Hill1952", elastic},
        {Id::density, "exact, by volume", "", {Id::density}},
        {Id::thermal_conductivity,
         "effective medium of Bruggeman",
         "Bruggeman1935",
         {Id::thermal_conductivity}},
        {Id::specific_heat, "exact, by mass", "", {Id::density, Id::specific_heat}},
        {Id::thermal_expansion,
         "rule of Turner, weights volume × bulk modulus",
         "Turner1946",
         {Id::thermal_expansion, Id::youngs_modulus, Id::poisson_ratio}}};
    return rules;
}

const std::map<std::string, Reference>& mixture_references() {
    static const std::map<std::string, Reference> list{
        {"Bruggeman1935", {"D. A. G. Bruggeman, Ann. Phys. 416, 636 (1935)", "", "no"}},
        {"Hill1952", {"R. Hill, Proc. Phys. Soc. A 65, 349 (1952)", "", "no"}},
        {"Turner1946", {"P. S. Turner, J. Res. Natl. Bur. Stand. 37, 239 (1946)", "", "no"}}};
    return list;
}

std::vector<PropertyId> needed_for_mixture(PropertyId property) {
    for (const MixtureRule& rule : mixture_rules()) {
        if (rule.property == property) return rule.needed;
    }
    return {};
}

Value mixed_value(const Evaluator& evaluator, const Mixed& mixture, const Basis& own) {
    if (own.property == PropertyId::extinction_coefficient)
        return mixed_extinction(evaluator, mixture, own);
    const Formula formula = formula_of(own.property);
    Value value;
    value.entry = own.entry;
    value.bases.push_back(own);
    std::vector<double> numbers;
    std::vector<Input> inputs;
    for (const std::string& material : {mixture.first, mixture.second}) {
        for (const PropertyId needed : needed_for_mixture(own.property)) {
            const Value part = evaluator.property(material, needed);
            if (!part.number) return missing_value(missing_words(own, part.missing));
            numbers.push_back(*part.number);
            inputs.push_back({*part.number, part.width});
            add_bases(value.bases, part.bases);
            add_analogy(value.analogy, part.analogy);
        }
    }
    value.number = formula(numbers, mixture.fraction);
    value.width = propagated(formula, inputs, mixture);
    return value;
}

IndexValue mixed_index(const Evaluator& evaluator, const Mixed& mixture, const Basis& own) {
    const Optical first = optical(evaluator, mixture.first);
    const Optical second = optical(evaluator, mixture.second);
    IndexValue value;
    value.bases.push_back(own);
    for (const Optical* part : {&first, &second}) {
        if (!part->index.index) {
            value.missing = missing_words(own, part->index.missing);
            return value;
        }
        add_bases(value.bases, part->index.bases);
        add_analogy(value.analogy, part->index.analogy);
        add_analogy(value.note, part->index.note);
        if (part->extinction.number) {
            add_bases(value.bases, part->extinction.bases);
        } else {
            add_analogy(value.note,
                        fmt::format("in the index of {}, a mixture, {} counts as "
                                    "transparent: {}",
                                    own.material, part == &first ? mixture.first : mixture.second,
                                    part->extinction.missing));
        }
    }
    const ComplexJet index = mixed_complex_index(
        complex_index(first.n, first.k), complex_index(second.n, second.k), mixture.fraction);
    if (!is_finite(index)) {
        value.missing = missing_words(own, "its rule gives no number");
        return value;
    }
    value.index = Jet<double>{index.value.real(), index.first.real(), index.second.real()};
    const double k1 = first.k.value;
    const double k2 = second.k.value;
    value.width = propagated(
        [k1, k2](const auto& n, double f) {
            return complex_index_of(n[0], k1, n[1], k2, f).real();
        },
        {{first.n.value, first.index.width}, {second.n.value, second.index.width}}, mixture);
    return value;
}

}  // namespace stillcoat::materials
