/// A flat sheet of metal in air over an unbounded plane, solved in full on a uniform grid: the slow and plain
/// arbiter for resonance, quality factor and input impedance of the aperture method. It shares no formula
/// with that method.
///
/// Mixed-potential electric-field integral equation with the plane's image. Currents are piecewise linear
/// along their own direction between neighbouring cells (rooftops), charges constant over cells. The static
/// 1/R between two cells is integrated exactly over both, the rest of exp(-jkR)/R taken at the centres. Each
/// rooftop's vector potential is that of the uniform current over the cell shifted by half a side. Errors
/// fall in proportion to the cell, so that two or three grids extrapolate. R. F. Harrington, Field
/// Computation by Moment Methods, 1968; A. W. Glisson & D. R. Wilton, IEEE Trans. Antennas Propag. 28(5),
/// 593-603, 1980.
#pragma once

#include <Eigen/Core>
#include <complex>
#include <vector>

namespace panelwright::test {

/// The sheet: cells of dx by dy, numbered (i, j) from one corner, symmetric under j -> ny - 1 - j.
struct RooftopSheet {
    double dx = 0.0;             ///< [m]
    double dy = 0.0;             ///< [m]
    double height = 0.0;         ///< above the plane [m]
    Eigen::ArrayXX<bool> metal;  ///< (nx, ny) which cells there are
};

/// A rectangle of `length` (along i) by `width`, `across` cells along its length and cells as square as may
/// be.
RooftopSheet rectangle_sheet(double length, double width, double height, int across);

/// A vertical current from the plane to the sheet, shared evenly by the cells (i, from..ny-1-from).
struct RooftopFeed {
    int i = 0;
    int from = 0;
};

/// Solves one sheet at any wavenumber.
class Rooftop {
  public:
    explicit Rooftop(RooftopSheet sheet);

    /// Number of unknowns, the mirror plane used.
    int unknowns() const { return static_cast<int>(bases_.size()); }

    /// Voltage along the feed over its current [ohm]: the mean over its cells, with the inductance of the
    /// upright current itself.
    std::complex<double> impedance(double wavenumber, const RooftopFeed& feed) const;

  private:
    /// A rooftop between cell (i, j) and the next one along x or y; `mirrored`: it has an image that is not
    /// itself.
    struct Basis {
        int i;
        int j;
        bool along_x;
        bool mirrored;
    };

    Eigen::ArrayXXcd kernel(double wavenumber) const;
    std::complex<double> reaction(const Basis& a, const Basis& b, const Eigen::ArrayXXcd& g,
                                  double wavenumber) const;
    Basis mirror(const Basis& basis) const;

    RooftopSheet sheet_;
    std::vector<Basis> bases_;
    Eigen::ArrayXXd
        static_part_;  ///< (nx, ny) mean over both cells of 1/R less that of the image, by distance in cells
};

/// Resonance of a patch: frequency of greatest input resistance, and quality factor from its curvature.
struct RooftopResonance {
    double frequency = 0.0;  ///< [Hz]
    double quality = 0.0;
};

/// Resonance of a rectangle near `guess` [Hz], extrapolated from grids of 16 and 24 cells along its length to
/// cells of no size.
RooftopResonance rooftop_resonance(double length, double width, double height, double guess);

}  // namespace panelwright::test
