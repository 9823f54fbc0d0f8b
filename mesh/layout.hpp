/// The plan of a panel's mesh: grid lines, and what lies between which lines. Shared by the triangulation and
/// by the prediction of its size.
#pragma once

#include <optional>
#include <vector>

#include "mesh/sheet_mesh.hpp"
#include "mesh/triangulate.hpp"

namespace panelwright::mesh {

/// From one grid line to another, by number.
struct LineRange {
    int from = 0;
    int to = 0;

    int cells() const { return to - from; }
    bool holds(int cell) const { return cell >= from && cell < to; }
};

/// A round pin or post: a polygonal tube in the middle of a block of cells that is cut out of both sheets.
struct Tube {
    double x = 0.0;       ///< axis [m]
    double y = 0.0;       ///< axis [m]
    double radius = 0.0;  ///< from the axis to the corners of the polygon [m]
    int sides = 0;        ///< even, so that the first and the middle corner lie at the height of the axis
    Part part = Part::post;
    LineRange block_x;
    LineRange block_y;

    /// Grid points round the block.
    int block_points() const { return 2 * (block_x.cells() + block_y.cells()); }
};

/// A tab feed: x lines by number, and y ranges.
struct TabLines {
    int foot = 0;       ///< where it is bent down
    int edge = 0;       ///< the patch's edge
    int notch_end = 0;  ///< where the slits end; `edge` where there are none
    LineRange strip;
    LineRange lower_slit;  ///< empty where there is none
    LineRange upper_slit;
};

/// The plan.
struct Layout {
    std::vector<double> x;  ///< grid lines of both sheets, ascending [m]
    std::vector<double> y;  ///< grid lines of both sheets, ascending [m]
    std::vector<double> z;  ///< levels of the upright parts, from the reflector (0) to the patch [m]
    LineRange patch_x, patch_y;
    LineRange reflector_x, reflector_y;
    std::optional<TabLines> tab;
    std::vector<Tube> tubes;        ///< the feed's pin first, if there is one, then the posts
    bool mirror_symmetric = false;  ///< lines and tubes are exact mirror images about y = 0, which is a line
};

/// Plans the mesh. Throws std::invalid_argument when `problems(panel)` is not empty or an option is out of
/// range.
Layout layout(const Panel& panel, const MeshOptions& options);

/// Size of the mesh that this plan describes.
MeshSize size(const Layout& plan);

/// Corner radius of the regular polygon with `sides` sides that a long thin cylinder can have as its
/// cross-section and be the electrical equal of a round one of `radius`: same logarithmic capacity.
///
/// The outside of the unit circle is mapped onto the outside of a regular n-gon by dw/dzeta = c (1 -
/// zeta^-n)^(2/n) (Schwarz and Christoffel), where c is the capacity. The length of a side is the integral of
/// |dw| over one n-th of the circle, s = c 2^(1 + 2/n) sqrt(pi) Gamma(1/2 + 1/n) / Gamma(1/n), and c of a
/// circle is its radius.
double equal_corner_radius(double radius, int sides);

}  // namespace panelwright::mesh
