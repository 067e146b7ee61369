#pragma once
/// A value with its first two derivatives with respect to one variable (a truncated Taylor series),
/// over real or complex numbers: derivatives come out exact, without differences.
/// Source: A. Griewank & A. Walther, Evaluating Derivatives (SIAM, 2008), ch. 13.

#include <cmath>
#include <complex>

namespace stillcoat::numerics {

template <typename T>
struct Jet {
    T value{};
    T first{};   ///< d/dx
    T second{};  ///< d²/dx²

    constexpr Jet() = default;
    constexpr Jet(T v) : value(v) {}  // NOLINT(google-explicit-constructor): numbers are constants
    constexpr Jet(T v, T d, T dd) : value(v), first(d), second(dd) {}
};

template <typename T>
constexpr Jet<T> operator+(const Jet<T>& a, const Jet<T>& b) {
    return {a.value + b.value, a.first + b.first, a.second + b.second};
}

template <typename T>
constexpr Jet<T> operator-(const Jet<T>& a, const Jet<T>& b) {
    return {a.value - b.value, a.first - b.first, a.second - b.second};
}

template <typename T>
constexpr Jet<T> operator-(const Jet<T>& a) {
    return {-a.value, -a.first, -a.second};
}

template <typename T>
constexpr Jet<T> operator*(const Jet<T>& a, const Jet<T>& b) {
    return {a.value * b.value, a.first * b.value + a.value * b.first,
            a.second * b.value + T(2.0) * a.first * b.first + a.value * b.second};
}

/// f(a) from f, f', f'' at a.value (chain rule).
template <typename T>
constexpr Jet<T> chain(const Jet<T>& a, T f, T f1, T f2) {
    return {f, f1 * a.first, f2 * a.first * a.first + f1 * a.second};
}

template <typename T>
constexpr Jet<T> operator/(const Jet<T>& a, const Jet<T>& b) {
    const T inverse = T(1.0) / b.value;
    return a * chain(b, inverse, -inverse * inverse, T(2.0) * inverse * inverse * inverse);
}

template <typename T>
Jet<T> sqrt(const Jet<T>& a) {
    using std::sqrt;
    const T root = sqrt(a.value);
    return chain(a, root, T(0.5) / root, T(-0.25) / (root * a.value));
}

template <typename T>
Jet<T> exp(const Jet<T>& a) {
    using std::exp;
    const T e = exp(a.value);
    return chain(a, e, e, e);
}

template <typename T>
Jet<T> log(const Jet<T>& a) {
    using std::log;
    const T inverse = T(1.0) / a.value;
    return chain(a, T(log(a.value)), inverse, -inverse * inverse);
}

/// A real series as a complex one.
inline Jet<std::complex<double>> to_complex(const Jet<double>& a) {
    return {{a.value, 0.0}, {a.first, 0.0}, {a.second, 0.0}};
}

}  // namespace stillcoat::numerics
