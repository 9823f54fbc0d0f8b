/// The one definition of "near" for all tests.
#pragma once

#include <cmath>
#include <complex>

namespace panelwright::test {

/// |a - b| <= relative * max(|a|, |b|) + absolute; NaN is near nothing.
template <typename T>
bool near(const T& a, const T& b, double relative, double absolute = 0.0) {
    const double largest = std::fmax(std::abs(a), std::abs(b));
    return std::abs(a - b) <= relative * largest + absolute;
}

/// Distance in dB between two positive powers.
inline double decibels_apart(double a, double b) {
    return std::fabs(10.0 * std::log10(a / b));
}

}  // namespace panelwright::test
