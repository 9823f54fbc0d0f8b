/// The edges of a mesh with the triangles along them.
#pragma once

#include <array>
#include <cstddef>
#include <vector>

#include "mesh/sheet_mesh.hpp"

namespace panelwright::mesh {

/// A triangle at an edge.
struct EdgeSide {
    std::size_t triangle = 0;
    int opposite = 0;      ///< the corner of the triangle that is not on the edge
    bool forward = false;  ///< the triangle's own sense runs along the edge from its first end to its second
};

/// An edge; its ends in ascending order.
struct MeshEdge {
    std::array<int, 2> ends{};
    std::vector<EdgeSide> sides;  ///< triangles along it, in ascending order; one at a free edge
};

/// All edges, ascending by their ends. Takes time n log n. Vertex numbers must not be negative.
std::vector<MeshEdge> edges(const SheetMesh& mesh);

}  // namespace panelwright::mesh
