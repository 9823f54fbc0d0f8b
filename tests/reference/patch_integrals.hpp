/// Slow twins of solver/aperture/closed_formulas.hpp: directivities by integrating patterns over the
/// half-space.
#pragma once

#include <boost/math/quadrature/gauss.hpp>
#include <cmath>

#include "solver/constants.hpp"

namespace panelwright::test {

/// Integral of f(theta, phi) sin(theta) over theta = 0..pi/2, phi = 0..pi/2.
template <typename Function>
double quarter_sphere(Function f) {
    using Rule = boost::math::quadrature::gauss<double, 40>;
    const auto over_phi = [&](double theta) {
        return std::sin(theta) *
               Rule::integrate([&](double phi) { return f(theta, phi); }, 0.0, solver::pi / 2.0);
    };
    return Rule::integrate(over_phi, 0.0, solver::pi / 2.0);
}

/// sin(x) / x.
inline double sinc(double x) {
    return std::abs(x) < 1e-8 ? 1.0 : std::sin(x) / x;
}

/// Two uniform slots of length `width`, `length` apart, in an infinite plane: (2 pi W / lambda)^2 pi / I2
/// with the double integral I2 as printed. C. A. Balanis, Antenna Theory, 4th ed., eqs. (14-55), (14-55a);
/// theta from the slots' axis.
inline double two_slot_directivity_reference(double wavenumber, double width, double length) {
    const double half = 0.5 * wavenumber * width;
    const double i2 = 4.0 * quarter_sphere([=](double theta, double phi) {
                          const double sine = std::sin(theta);
                          const double slot = half * sinc(half * std::cos(theta));
                          const double pair = std::cos(0.5 * wavenumber * length * sine * std::sin(phi));
                          return slot * slot * sine * sine * pair * pair;
                      });
    return std::pow(wavenumber * width, 2) * solver::pi / i2;
}

/// Broadside directivity of the current cos(pi x / L) over a width W, very close over a ground plane on a
/// very thin substrate: transverse magnetic part 1 - sin^2(theta)/er, transverse electric part cos(theta).
inline double thin_patch_directivity_reference(double k_length, double k_width, double permittivity) {
    const double mean = quarter_sphere([=](double theta, double phi) {
                            const double sine = std::sin(theta);
                            const double u = 0.5 * k_length * sine * std::cos(phi);
                            const double cosine_current =
                                0.25 * solver::pi * (sinc(u + solver::pi / 2.0) + sinc(u - solver::pi / 2.0));
                            const double array = cosine_current * sinc(0.5 * k_width * sine * std::sin(phi));
                            const double magnetic = std::cos(phi) * (1.0 - sine * sine / permittivity);
                            const double electric = std::sin(phi) * std::cos(theta);
                            return array * array * (magnetic * magnetic + electric * electric);
                        }) *
                        4.0 / (4.0 * solver::pi);
    return 1.0 / mean;
}

}  // namespace panelwright::test
