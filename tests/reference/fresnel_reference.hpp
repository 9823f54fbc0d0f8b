/// Slow twin of solver/aperture/fresnel.hpp: adaptive quadrature of a form of the integral that does not
/// oscillate.
#pragma once

#include <boost/math/quadrature/gauss_kronrod.hpp>
#include <cmath>
#include <complex>

namespace panelwright::test {

/// exp(j a^2) times the integral of exp(-j t^2) from `a` to infinity, a >= -1. Along t = a + u exp(-j pi/4)
/// it becomes exp(-j pi/4) times the integral of exp(-u^2 - sqrt(2) (1 + j) a u) over u from 0 to infinity.
inline std::complex<double> scaled_fresnel_tail_reference(double a) {
    const double rate = std::sqrt(2.0) * a;
    const auto integrand = [rate](double u) {
        return std::exp(-u * u - rate * u) * std::complex<double>(std::cos(rate * u), -std::sin(rate * u));
    };
    // Beyond, the integrand is below exp(-40); a = 100 needs only the first quarter of a unit.
    const double end = a > 5.0 ? 40.0 / rate : 8.0;
    using Rule = boost::math::quadrature::gauss_kronrod<double, 31>;
    const double real = Rule::integrate([&](double u) { return integrand(u).real(); }, 0.0, end, 15, 1e-14);
    const double imaginary =
        Rule::integrate([&](double u) { return integrand(u).imag(); }, 0.0, end, 15, 1e-14);
    const double turn = std::sqrt(0.5);
    return std::complex<double>(turn, -turn) * std::complex<double>(real, imaginary);
}

/// F(x) for x >= 0 from its definition.
inline std::complex<double> transition_reference(double x) {
    const double root = std::sqrt(x);
    return std::complex<double>(0.0, 2.0 * root) * scaled_fresnel_tail_reference(root);
}

}  // namespace panelwright::test
