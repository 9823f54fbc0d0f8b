/// The far field on a grid of directions, and what can be read off it.
#pragma once

#include <Eigen/Core>
#include <complex>
#include <vector>

namespace panelwright::solver {

using Complex = std::complex<double>;
/// (T, Q) values, theta outer, phi inner.
using ComplexGrid = Eigen::Array<Complex, Eigen::Dynamic, Eigen::Dynamic, Eigen::RowMajor>;
using RealGrid = Eigen::Array<double, Eigen::Dynamic, Eigen::Dynamic, Eigen::RowMajor>;

/// Far field at one frequency: r exp(+jkr) E in volts, for 1 W accepted at the port.
struct FarField {
    double frequency = 0.0;     ///< [Hz]
    std::vector<double> theta;  ///< (T) from +z, ascending, 0..pi for the whole sphere [rad]
    std::vector<double> phi;    ///< (Q) from +x towards +y, ascending, 0..<2 pi for the whole sphere [rad]
    ComplexGrid e_theta;        ///< (T, Q) [V]
    ComplexGrid e_phi;          ///< (T, Q) [V]
};

/// An empty far field over the whole sphere at about `step` between directions: theta 0..pi inclusive, phi
/// 0..<2 pi. The true step divides pi/2. `step` in (0, pi/6] [rad].
FarField whole_sphere(double frequency, double step);

/// True when the directions of `field` are those of a `whole_sphere` grid (to 1e-9 rad).
bool covers_whole_sphere(const FarField& field);

/// Radiation intensity [W/sr] per direction: (|E_theta|^2 + |E_phi|^2) / (2 eta). (T, Q)
RealGrid intensity(const FarField& field);

/// Power through the whole sphere [W]: the integral of `intensity` over all directions. The grid must be one
/// made by `whole_sphere`; the phi sum is the trapezoidal rule (exact for the harmonics the grid resolves),
/// the theta sum uses weights exact for trigonometric polynomials (Clenshaw-Curtis). Throws
/// std::invalid_argument on another grid.
double radiated_power(const FarField& field);

/// Gain in dBi of every direction for `accepted_power` [W] at the port. (T, Q); floor -200 dBi.
RealGrid gain_dbi(const FarField& field, double accepted_power = 1.0);

/// Co- and cross-polar parts by Ludwig's third definition with the x axis as reference.
/// A. C. Ludwig, IEEE Trans. Antennas Propag. 21(1), 116-119, 1973.
struct LudwigThird {
    ComplexGrid co;     ///< (T, Q) [V]
    ComplexGrid cross;  ///< (T, Q) [V]
};
LudwigThird ludwig_third(const FarField& field);

}  // namespace panelwright::solver
