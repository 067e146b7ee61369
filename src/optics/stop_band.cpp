#include "stillcoat/optics/stop_band.hpp"

#include <algorithm>
#include <boost/math/tools/toms748_solve.hpp>
#include <cmath>
#include <vector>

#include "stillcoat/core/constants.hpp"
#include "stillcoat/core/errors.hpp"

namespace stillcoat::optics {

namespace {

// Panels are measured in the logarithm of the frequency.
constexpr double largest_panel = 0.02;
constexpr double smallest_panel = 1e-7;
constexpr double first_panel = 2e-3;
constexpr double reflection_bend = 0.03;
constexpr double odds_bend = 0.7;
constexpr double smallest_odds = 1e-5;
constexpr double search_reach = 1.0986122886681098;  // ln 3
// Evaluations on each side: 1 + 2·(184 + 14) < 400 in all.
constexpr int most_of_walk = 170;
constexpr int most_of_a_side = 184;
constexpr int passes = 2;
constexpr std::size_t first_repeated = 17;
constexpr int most_of_crossing = 14;
constexpr double edge_precision = 1e-10;

/// Frequency over operating frequency as a logarithm, and what is reflected there.
struct Sample {
    double shift;
    double reflectance;
    double loss;
    Complex reflection;
};

class Sampler {
  public:
    Sampler(const std::function<Response(double)>& response_at, double operating_wavelength,
            const WavelengthRange& data)
        : response_at_(response_at), operating_wavelength_(operating_wavelength), data_(data) {}

    /// Rounding of exp must not lead out of the data.
    double wavelength(double shift) const {
        return std::clamp(operating_wavelength_ * std::exp(-shift), data_.shortest, data_.longest);
    }
    Sample at(double shift) {
        ++evaluations_;
        const Response found = response_at_(wavelength(shift));
        return {shift, found.reflectance, found.loss, found.reflection};
    }
    int evaluations() const { return evaluations_; }

  private:
    const std::function<Response(double)>& response_at_;
    double operating_wavelength_;
    WavelengthRange data_;
    int evaluations_ = 0;
};

/// Where one side of the search has to stop.
struct End {
    double shift;
    EdgeState state;
};

End end_of_side(int direction, double operating_wavelength, const WavelengthRange& data) {
    const double last = direction > 0 ? data.shortest : data.longest;
    const double shift = std::log(operating_wavelength / last);  // ±infinity without a limit
    if (std::abs(shift) <= search_reach) return {shift, EdgeState::beyond_data};
    return {direction * search_reach, EdgeState::beyond_search};
}

double log_odds(const Sample& s) {
    return std::log(std::max(s.loss, smallest_odds) / std::max(s.reflectance, smallest_odds));
}

/// 1 when the three samples of a panel bend as much as they may. A dip so narrow that it hides
/// between two samples is a zero of r beside the frequency axis, at a distance w: r bends by about
/// w over the distance of the samples, although R at each of them does not show it.
double bend(const Sample& a, const Sample& middle, const Sample& b) {
    const double of_reflection = std::abs(middle.reflection - 0.5 * (a.reflection + b.reflection));
    const double of_odds = std::abs(log_odds(middle) - 0.5 * (log_odds(a) + log_odds(b)));
    return std::max(of_reflection / reflection_bend, of_odds / odds_bend);
}

struct Side {
    std::vector<Sample> samples;  ///< outwards; the first is at the operating wavelength
    EdgeState state;
};

/// Goes on outwards in panels of three samples until R is below half of the largest R met on the
/// way, or to the end. `ahead` (the nearest last) holds samples taken before the walk gets there:
/// the far ones of panels that bend too much.
void walk(Sampler& sampler, Side& side, std::vector<Sample>& ahead, const End& end,
          int most_evaluations) {
    side.state = EdgeState::beyond_search;
    const double direction = end.shift < 0.0 ? -1.0 : 1.0;
    double top = 0.0;
    for (const Sample& s : side.samples) top = std::max(top, s.reflectance);
    double width = first_panel;
    const int last_evaluation = sampler.evaluations() + most_evaluations - 2;
    while (sampler.evaluations() <= last_evaluation) {
        const Sample last = side.samples.back();
        if (last.shift == end.shift) {
            side.state = end.state;
            return;
        }
        if (ahead.empty()) {
            const double aim = last.shift + direction * width;
            const bool at_end = direction * (end.shift - aim) <= 0.0;
            ahead.push_back(sampler.at(at_end ? end.shift : aim));
        }
        const Sample far = ahead.back();
        const Sample middle = sampler.at(0.5 * (last.shift + far.shift));
        const double bent = bend(last, middle, far);
        const double stride = std::abs(far.shift - last.shift);
        if (bent > 1.0 && stride > smallest_panel) {
            ahead.push_back(middle);
            continue;
        }
        width = bent < 0.2 ? std::min(2.0 * stride, largest_panel) : stride;
        ahead.pop_back();
        for (const Sample& next : {middle, far}) {
            side.samples.push_back(next);
            top = std::max(top, next.reflectance);
            if (next.reflectance < 0.5 * top) {
                side.state = EdgeState::found;
                return;
            }
        }
    }
}

/// The walk, then its last part again and again with samples between those that it took: a first
/// dip that was stepped over lies there.
Side searched_side(Sampler& sampler, const Sample& start, const End& end) {
    Side side{{start}, EdgeState::beyond_search};
    std::vector<Sample> ahead;
    const int last_evaluation = sampler.evaluations() + most_of_a_side;
    walk(sampler, side, ahead, end, most_of_walk);
    if (side.state != EdgeState::found) return side;
    std::size_t repeated = first_repeated;
    for (int pass = 0; pass < passes; ++pass, repeated *= 2) {
        const std::size_t count = side.samples.size();
        const auto kept = static_cast<std::ptrdiff_t>(count > repeated ? count - repeated : 1);
        Side again{{side.samples.begin(), side.samples.begin() + kept}, EdgeState::found};
        ahead.assign(side.samples.rbegin(), side.samples.rend() - kept);
        walk(sampler, again, ahead, end, last_evaluation - sampler.evaluations());
        if (again.state != EdgeState::found) break;
        side = again;
    }
    return side;
}

/// Where R crosses the level between two samples.
double crossing(Sampler& sampler, const Sample& inner, const Sample& outer, double level) {
    boost::uintmax_t most = most_of_crossing;
    const auto [a, b] = boost::math::tools::toms748_solve(
        [&](double shift) { return sampler.at(shift).reflectance - level; },
        std::min(inner.shift, outer.shift), std::max(inner.shift, outer.shift),
        (inner.shift < outer.shift ? inner : outer).reflectance - level,
        (inner.shift < outer.shift ? outer : inner).reflectance - level,
        [](double low, double high) { return high - low < edge_precision; }, most);
    return 0.5 * (a + b);
}

/// From the top outwards in the direction of growing or falling index of the samples.
StopBandEdge edge(Sampler& sampler, const std::vector<Sample>& samples, std::size_t top,
                  int direction, EdgeState state_at_end) {
    const double level = 0.5 * samples[top].reflectance;
    std::size_t j = top;
    while (direction > 0 ? j + 1 < samples.size() : j > 0) {
        const std::size_t next = direction > 0 ? j + 1 : j - 1;
        if (samples[next].reflectance < level) {
            const double shift = crossing(sampler, samples[j], samples[next], level);
            return {sampler.wavelength(shift), EdgeState::found};
        }
        j = next;
    }
    return {sampler.wavelength(samples[j].shift), state_at_end};
}

}  // namespace

StopBand stop_band(const std::function<Response(double)>& response_at, double operating_wavelength,
                   const WavelengthRange& data) {
    if (!(operating_wavelength > 0.0 && operating_wavelength >= data.shortest &&
          operating_wavelength <= data.longest && std::isfinite(operating_wavelength))) {
        throw core::DomainError("operating wavelength", operating_wavelength, "m",
                                "positive and inside the range of the material data",
                                "definition of the stop band");
    }
    Sampler sampler(response_at, operating_wavelength, data);
    const Sample start = sampler.at(0.0);
    const Side high = searched_side(sampler, start, end_of_side(1, operating_wavelength, data));
    const Side low = searched_side(sampler, start, end_of_side(-1, operating_wavelength, data));
    std::vector<Sample> samples(low.samples.rbegin(), low.samples.rend());
    samples.insert(samples.end(), high.samples.begin() + 1, high.samples.end());
    const auto highest = std::max_element(
        samples.begin(), samples.end(),
        [](const Sample& a, const Sample& b) { return a.reflectance < b.reflectance; });
    const auto top = static_cast<std::size_t>(highest - samples.begin());

    StopBand band{};
    band.top_reflectance = highest->reflectance;
    band.short_edge = edge(sampler, samples, top, 1, high.state);
    band.long_edge = edge(sampler, samples, top, -1, low.state);
    // In its own digits, without exp and log.
    if (band.short_edge.state == EdgeState::beyond_data) {
        band.short_edge.wavelength = data.shortest;
    }
    if (band.long_edge.state == EdgeState::beyond_data) band.long_edge.wavelength = data.longest;
    // Middle in frequency: 1/λ is the mean of the edges' 1/λ.
    const double a = band.short_edge.wavelength, b = band.long_edge.wavelength;
    band.centre_wavelength = 2.0 / (1.0 / a + 1.0 / b);
    band.relative_half_width = (b - a) / (b + a);
    band.operating_reflectance = start.reflectance;
    band.operating_wavelength_inside = a <= operating_wavelength && operating_wavelength <= b;
    band.evaluations = sampler.evaluations();
    return band;
}

StopBand stop_band(const std::function<OpticalStack(double)>& stack_at, const Illumination& light,
                   const WavelengthRange& data) {
    const std::function<Response(double)> response_at = [&](double wavelength) {
        return response(stack_at(wavelength), {wavelength, light.angle, light.polarisation});
    };
    return stop_band(response_at, light.wavelength, data);
}

double quarter_wave_half_width(double one_index, double other_index) {
    for (const double n : {one_index, other_index}) {
        if (!(n > 0.0 && n < std::numeric_limits<double>::infinity())) {
            throw core::DomainError("refractive index", n, "", "positive and finite",
                                    "M. Born & E. Wolf, Principles of Optics, §1.6.5");
        }
    }
    return 2.0 / core::pi *
           std::asin(std::abs(one_index - other_index) / (one_index + other_index));
}

}  // namespace stillcoat::optics
