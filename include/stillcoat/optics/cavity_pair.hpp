#pragma once
/// Two mirrors that face each other: what is lost in a round trip, and the finesse.
///
/// With the amplitude kept in a round trip ρ = √(R1 R2), the transmission of the pair follows
/// Airy's formula 1/[1 + 4ρ/(1 − ρ)² sin²(δ/2)], δ the round-trip phase. Free spectral range over
/// full width at half maximum:
///     F = π / {2 asin[(1 − ρ)/(2√ρ)]},   and where ρ is near 1   F = π√ρ/(1 − ρ).
/// Both follow from the losses 1 − R of the mirrors, never from a difference of reflectances.
/// Leaves out: mode matching, diffraction, mirrors whose phase changes within a line.
/// Valid when: plane waves or one mode; losses independent of the wavelength within a line.
/// Source: M. Born & E. Wolf, Principles of Optics, §7.6 (from memory); the loss forms and the
/// exact half width are derived here.

namespace stillcoat::optics {

struct RoundTrip {
    double amplitude;       ///< ρ, the factor of the amplitude in one round trip
    double amplitude_loss;  ///< 1 − ρ without cancellation
    double loss;            ///< 1 − ρ² = 1 − R1 R2: power lost in one round trip
};

/// @param first_loss, second_loss 1 − R of the mirrors seen from between them, 0 to 1, such as
///        Response::loss or MirrorLoss::total
/// @param loss_between power lost between the mirrors in one round trip (both ways), 0 to 1
/// @throws core::DomainError for a loss outside 0 to 1.
RoundTrip round_trip(double first_loss, double second_loss, double loss_between = 0.0);

/// F = π√ρ/(1 − ρ), the usual form.
/// @throws core::DomainError when nothing is lost (F would be infinite).
double finesse(const RoundTrip& trip);

/// F = π/{2 asin[(1 − ρ)/(2√ρ)]}: free spectral range over full width at half maximum, exact.
/// Smaller than finesse() by the factor 1 − (1 − ρ)²/(24 ρ) + …
/// @throws core::DomainError when nothing is lost, and for 1 − ρ > 2√ρ, i.e. ρ < 3 − 2√2: the
///         transmission then never falls to half of its maximum.
double finesse_from_half_width(const RoundTrip& trip);

}  // namespace stillcoat::optics
