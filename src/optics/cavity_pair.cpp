#include "stillcoat/optics/cavity_pair.hpp"

#include <cmath>

#include "stillcoat/core/constants.hpp"
#include "stillcoat/core/errors.hpp"

namespace stillcoat::optics {

namespace {

constexpr const char* source = "M. Born & E. Wolf, Principles of Optics, §7.6";

void require_loss(double loss, const char* quantity) {
    if (!(loss >= 0.0 && loss <= 1.0)) {
        throw core::DomainError(quantity, loss, "", "0 to 1", source);
    }
}

void require_some_loss(const RoundTrip& trip) {
    if (!(trip.amplitude_loss > 0.0)) {
        throw core::DomainError("loss of a round trip", trip.loss, "",
                                "above 0, since the finesse is infinite without loss", source);
    }
}

}  // namespace

RoundTrip round_trip(double first_loss, double second_loss, double loss_between) {
    require_loss(first_loss, "loss of the first mirror");
    require_loss(second_loss, "loss of the second mirror");
    require_loss(loss_between, "loss between the mirrors");
    // 1 − (1 − a)(1 − b)(1 − c) as a sum of positive terms
    const double rest = second_loss + (1.0 - second_loss) * loss_between;
    const double loss = first_loss + (1.0 - first_loss) * rest;
    const double amplitude =
        std::sqrt((1.0 - first_loss) * (1.0 - second_loss) * (1.0 - loss_between));
    return {amplitude, loss / (1.0 + amplitude), loss};
}

double finesse(const RoundTrip& trip) {
    require_some_loss(trip);
    return core::pi * std::sqrt(trip.amplitude) / trip.amplitude_loss;
}

double finesse_from_half_width(const RoundTrip& trip) {
    require_some_loss(trip);
    const double sine = trip.amplitude_loss / (2.0 * std::sqrt(trip.amplitude));
    if (!(sine <= 1.0)) {
        throw core::DomainError("amplitude kept in a round trip", trip.amplitude, "",
                                "3 - 2 sqrt(2) = 0.1716 or more; below, the transmission never "
                                "falls to half of its maximum",
                                source);
    }
    return core::pi / (2.0 * std::asin(sine));
}

}  // namespace stillcoat::optics
