/// The radiating rim of the patch and the plate that it radiates over.
#pragma once

#include <Eigen/Core>
#include <vector>

#include "solver/far_field.hpp"

namespace panelwright::solver {

/// The cavity's side walls as magnetic line currents at the patch's height: four straight sides, each a
/// composite Gauss-Legendre rule. The current at a point is minus the voltage there along `element`
/// (equivalence principle, M = E x n).
struct Rim {
    std::vector<Eigen::Vector2d> points;    ///< (n) [m]
    std::vector<Eigen::Vector2d> elements;  ///< (n) tangent, counter-clockwise, times weight [m]
    double height = 0.0;                    ///< above the plate [m]
    double length = 0.0;                    ///< between the sides along x [m]
    double width = 0.0;                     ///< between the sides along y [m]
};

/// The rim of a rectangle of `length` by `width` centred on the origin, its points no further apart than
/// `spacing` on a side. The plate sees single points of the rim as lumps once they stand further apart than
/// about three quarters of the height.
Rim rectangle_rim(double length, double width, double height, double spacing);

/// The reflector as a perfectly conducting rectangle at z = 0.
struct Plate {
    double x_from = 0.0;  ///< [m]
    double x_to = 0.0;
    double y_from = 0.0;
    double y_to = 0.0;
};

/// Tangential magnetic field on an unbroken plate below `rim`: twice that of the rim alone, its image being
/// of equal sense. Exact near field of magnetic current elements (C. A. Balanis, Advanced Engineering
/// Electromagnetics, sec. 6.7). Holds the rim in the order that the vector loops like; made once for many
/// places.
class PlateField {
  public:
    /// `voltage` (n, s): rim voltage at each rim point for each of s sources [V].
    PlateField(const Rim& rim, const Eigen::MatrixXcd& voltage, double wavenumber);

    /// Magnetic field (x, y; a column a source) at (x, y, 0) [A/m].
    Eigen::Matrix<Complex, 2, Eigen::Dynamic> at(const Eigen::Vector2d& place) const;

    /// Surface current that goes with it, z x H (x, y; a column a source) [A/m].
    Eigen::Matrix<Complex, 2, Eigen::Dynamic> current(const Eigen::Vector2d& place) const;

  private:
    double wavenumber_;
    double height_;
    Eigen::ArrayXd x_, y_;                     ///< (n) rim points [m]
    Eigen::ArrayXd element_x_, element_y_;     ///< (n) rim elements [m]
    Eigen::ArrayXXd voltage_re_, voltage_im_;  ///< (n, s) [V]
};

}  // namespace panelwright::solver
