/// From a panel to triangles.
#pragma once

#include "mesh/panel.hpp"
#include "mesh/sheet_mesh.hpp"

namespace panelwright::mesh {

/// How finely to cut the sheets.
struct MeshOptions {
    double cell_size = 0.0;  ///< largest cell side [m]; positive, at least 1e-5 of the panel's longest side
    double edge_cell = 0.0;  ///< side of the cells along a free edge, across it [m]; 0 = a quarter of
                             ///< cell_size, else between a thousandth of cell_size and cell_size
    double growth = 1.8;     ///< largest ratio of neighbouring cells across a graded line, at least 1.1
    int tube_sides = 8;  ///< sides of the polygonal tube that stands for a round pin or post: even, 4 to 360;
                         ///< more are taken where a side would be longer than cell_size
};

/// Triangles on patch (with notch, tab and bend), pin, posts and reflector.
///
/// *Sheets.* Patch and reflector share one tensor grid of lines, graded towards every free edge (sides of
/// patch, tab, slits and reflector), so that every cell of the patch that lies over the reflector faces a
/// cell of the reflector, triangle over triangle. Normals point along +z. `Part::patch` is the patch with the
/// strip between the slits.
///
/// *Tab.* The strip goes on past the patch's edge and turns down to the reflector; from the edge on it is
/// `Part::feed`. Its normal is continuous with the patch's round the bend (-x on the upright part). Its foot
/// lies on edges of reflector triangles: three triangles share a foot edge, two where the foot is the
/// reflector's own edge.
///
/// *Pins and posts* are polygonal tubes with outward normals, the electrical equals of round ones: polygons
/// of the same logarithmic capacity (`equal_corner_radius`). Each stands in a block of grid cells that is cut
/// out of both sheets and filled by a ring of triangles between polygon and block. On the patch the polygon
/// is closed by a disc, as the metal of a soldered or screwed head goes on over it: three triangles share a
/// head edge. On the reflector it is left open: the inside of a tube closed above is screened from everything
/// in front of the reflector, and from the rear it is far below cut-off. So two triangles share a foot edge,
/// and the port current of a pin is the sum of one basis function an edge. A tube fatter than a few cells has
/// triangles larger than a cell in the corners of its block.
///
/// *Port edges* run round the pin's foot as a closed polygon, counter-clockwise seen from +z, or along the
/// tab's foot towards +y.
///
/// *Symmetry.* Where `mirror_symmetric(panel)` holds, the mesh is its own mirror image under y -> -y to the
/// last bit of every coordinate: y = 0 is a line, the other y lines are made for y > 0 and copied, and the
/// diagonal of a cell runs towards the corner of its quadrant of the (x, y) plane, so that mirrored cells
/// have mirrored diagonals; likewise on tubes, tab and rings.
///
/// Throws std::invalid_argument when `problems(panel)` is not empty, an option is out of range, or the mesh
/// would have more than `most_triangles`.
SheetMesh triangulate(const Panel& panel, const MeshOptions& options);

/// Largest mesh that is made.
inline constexpr std::size_t most_triangles = 50'000'000;

/// Numbers of the cells that `triangulate` would make, without making them.
struct MeshSize {
    std::size_t points = 0;
    std::size_t triangles = 0;
    std::size_t inner_edges =
        0;  ///< basis functions of a method of moments: sum over edges of (triangles - 1)
};

/// Size of the mesh that `triangulate(panel, options)` gives: exact, and as cheap as the grid lines alone.
/// Throws std::invalid_argument like it, but for large meshes.
MeshSize predicted_size(const Panel& panel, const MeshOptions& options);

}  // namespace panelwright::mesh
