#include "materials/width_reader.hpp"

#include <fmt/format.h>

#include <cmath>
#include <limits>

#include "materials/range_reader.hpp"

namespace stillcoat::materials {
namespace {

using core::Node;
using core::TableReader;

const double infinity = std::numeric_limits<double>::infinity();

}  // namespace

std::optional<Width> read_width(TableReader& reader, double unit_scale) {
    std::optional<Width> width;
    int stated = 0;
    if (const Node* node = reader.find("uncertainty"); node != nullptr) {
        ++stated;
        if (node->type == Node::Type::text && node->text == "not stated") {
            width = Width{};
        } else if (node->is_number() && std::isfinite(node->number) && node->number >= 0.0) {
            width = Width{Width::Form::absolute, node->number * unit_scale, 0.0, 0.0};
        } else {
            reader.problem_at("uncertainty", "uncertainty in " + reader.name() + " cannot be used",
                              "a number in the unit of the value, 0 or greater, or \"not stated\"");
        }
    }
    const core::Limits not_negative{0.0, infinity, true, false, "0 or greater"};
    if (const auto relative = reader.number("relative_uncertainty", not_negative)) {
        ++stated;
        width = Width{Width::Form::relative, *relative, 0.0, 0.0};
    }
    const core::Limits at_least_one{1.0, infinity, true, false, "1 or greater"};
    if (const auto geometric = reader.number("geometric_sd", at_least_one)) {
        ++stated;
        width = Width{Width::Form::geometric, *geometric, 0.0, 0.0};
    }
    if (const auto ends = reader.numbers("uniform")) {
        ++stated;
        if (ends->size() == 2 && (*ends)[0] < (*ends)[1]) {
            width =
                Width{Width::Form::uniform, 0.0, (*ends)[0] * unit_scale, (*ends)[1] * unit_scale};
        } else {
            reader.problem_at("uniform", "uniform in " + reader.name() + " must be [lower, upper]");
        }
    }
    if (stated > 1) {
        reader.problem_at("uncertainty", reader.name() + " states its width more than once",
                          "keep one of uncertainty, relative_uncertainty, geometric_sd, uniform");
    }
    return width;
}

std::vector<WidthSpan> read_width_spans(TableReader& reader, double unit_scale) {
    std::vector<WidthSpan> spans;
    for (const Node* node : reader.tables("uncertainty_below")) {
        TableReader span(*node, "uncertainty_below of " + reader.name(), reader.problems());
        const auto limit = span.number("temperature_K", core::positive("K"));
        if (!limit) span.missing("temperature_K", "20");
        if (const auto width = read_width(span, unit_scale); width && limit) {
            spans.push_back({0.0, *limit, *width});
        }
        span.finish();
    }
    for (const Node* node : reader.tables("uncertainty_between")) {
        TableReader span(*node, "uncertainty_between of " + reader.name(), reader.problems());
        const auto limits = read_interval(span, "temperature_K", 1.0);
        if (const auto width = read_width(span, unit_scale); width && limits) {
            spans.push_back({limits->lower, limits->upper, *width});
        }
        span.finish();
    }
    return spans;
}

Width read_design_width(TableReader& reader, const core::QuantityKind& kind, double value) {
    const Node* node = reader.find("uncertainty");
    if (node == nullptr) return {};
    if (node->type == Node::Type::text && node->text == "not stated") return {};
    double width = std::numeric_limits<double>::quiet_NaN();
    if (node->is_number() && kind.si_unit == "1") width = node->number;
    if (node->type == Node::Type::text) {
        if (const auto fraction = core::read_quantity(node->text, core::kind::number);
            fraction.ok && kind.si_unit != "1") {
            width = fraction.value * std::abs(value);
        } else if (const auto absolute = core::read_quantity(node->text, kind); absolute.ok) {
            const bool percent = kind.si_unit == "1" && node->text.find('%') != std::string::npos;
            width = percent ? absolute.value * std::abs(value) : absolute.value;
        }
    }
    if (std::isfinite(width) && width >= 0.0) return {Width::Form::absolute, width, 0.0, 0.0};
    reader.problem_at(
        "uncertainty", "uncertainty in " + reader.name() + " cannot be used",
        fmt::format("for example \"5 %\", or a {} as in \"{}\"", kind.name, kind.example));
    return {};
}

}  // namespace stillcoat::materials
