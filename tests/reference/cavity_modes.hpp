/// Slow twin of solver/aperture/cavity.hpp: the double sum over the modes of a cavity with magnetic side
/// walls.
#pragma once

#include <cmath>
#include <vector>

#include "solver/aperture/cavity.hpp"
#include "solver/constants.hpp"

namespace panelwright::test {

/// Voltage averaged over pillar `at` for 1 A through pillar `source` [ohm], by modes TM_mn with m < `along`,
/// n < `across`: j omega mu h times the sum of psi(source) psi(at) / (k_mn^2 - k^2). Y. T. Lo, D. Solomon &
/// W. F. Richards, IEEE Trans. Antennas Propag. 27(2), 137-145, 1979. Errors fall as 1/along where both
/// pillars stand at the same x.
inline solver::Complex transfer_impedance_by_modes(const solver::Cavity& cavity, const solver::Wave& wave,
                                                   double loss, const solver::Pillar& source,
                                                   const solver::Pillar& at, int along, int across) {
    using solver::Complex;
    using solver::pi;
    const auto factor_y = [&](const solver::Pillar& pillar, int n) {
        const double q = n * pi / cavity.width;
        const double half = 0.5 * q * pillar.width;
        return std::cos(q * (pillar.y + 0.5 * cavity.width)) * (n == 0 ? 1.0 : std::sin(half) / half);
    };
    const auto factor_x = [&](const solver::Pillar& pillar, int m) {
        const double q = m * pi / cavity.length;
        return (1.0 - pillar.second_share) * std::cos(q * (pillar.x + 0.5 * cavity.length)) +
               pillar.second_share * std::cos(q * (pillar.second_x + 0.5 * cavity.length));
    };
    std::vector<double> weight_x;
    for (int m = 0; m < along; ++m)
        weight_x.push_back((m == 0 ? 1.0 : 2.0) * factor_x(source, m) * factor_x(at, m));
    const Complex inside = wave.wavenumber * wave.wavenumber * cavity.permittivity * Complex(1.0, -loss);
    Complex sum = 0.0;
    for (int n = 0; n < across; ++n) {
        const double weight_y = (n == 0 ? 1.0 : 2.0) * factor_y(source, n) * factor_y(at, n);
        Complex row = 0.0;
        for (int m = 0; m < along; ++m) {
            const double square = std::pow(m * pi / cavity.length, 2) + std::pow(n * pi / cavity.width, 2);
            row += weight_x[static_cast<std::size_t>(m)] / (square - inside);
        }
        sum += weight_y * row;
    }
    return Complex(0.0, wave.omega * solver::vacuum_permeability * cavity.height) /
           (cavity.length * cavity.width) * sum;
}

}  // namespace panelwright::test
