/// From a panel to triangles.
#pragma once

#include "mesh/panel.hpp"
#include "mesh/sheet_mesh.hpp"

namespace panelwright::mesh {

/// How finely to cut the sheets.
struct MeshOptions {
    double cell_size = 0.0;   ///< largest cell side [m]; must be positive
    double edge_cell = 0.0;   ///< side of the cells along a free edge, across it [m]; 0 = a quarter of cell_size
    double growth = 1.8;      ///< largest ratio of neighbouring cells across a graded line, > 1
    int tube_sides = 8;       ///< sides of the polygonal tube that stands for a round pin or post, >= 3
};

/// Triangles on patch (with notch, tab and bend), pin, posts and reflector.
///
/// Patch and reflector share one tensor grid of lines graded towards every free edge, so that cells of the
/// patch face cells of the reflector. Reflector and patch normals point along +z. Pins and posts are polygonal
/// tubes of the circle's circumference whose feet and heads share edges with the sheets.
/// Throws std::invalid_argument when `problems(panel)` is not empty or an option is out of range.
SheetMesh triangulate(const Panel& panel, const MeshOptions& options);

/// Numbers of the cells that `triangulate` would make, without making them.
struct MeshSize {
    std::size_t points = 0;
    std::size_t triangles = 0;
    std::size_t inner_edges = 0;  ///< basis functions of a method of moments: sum over edges of (triangles - 1)
};

/// Size of the mesh that `triangulate(panel, options)` gives.
MeshSize predicted_size(const Panel& panel, const MeshOptions& options);

}  // namespace panelwright::mesh
