/// Checks that a mesh is fit for computing on.
#pragma once

#include <string>
#include <vector>

#include "mesh/sheet_mesh.hpp"

namespace panelwright::mesh {

/// Facts about a mesh.
struct MeshQuality {
    double smallest_angle = 0.0;  ///< smallest inner angle of any triangle [rad]
    double longest_edge = 0.0;    ///< [m]
    double shortest_edge = 0.0;   ///< [m]
    double area = 0.0;            ///< sum of all triangle areas [m^2]
    int free_edges = 0;           ///< edges with one triangle
    int inner_edges = 0;          ///< edges with two triangles
    int junction_edges = 0;       ///< edges with three or more triangles
    int components = 0;           ///< parts not joined by an edge
};

/// Measures `mesh`; all zero for an empty one. Throws std::invalid_argument when a triangle names a vertex
/// that does not exist.
MeshQuality quality(const SheetMesh& mesh);

/// What makes `mesh` unusable, in words, one sentence a kind of defect with its number and first place; empty
/// when sound: vertex numbers out of range (then nothing else is looked at), tags not one a triangle,
/// vertices not finite, triangles without area, vertices used by no triangle, coincident vertices, hanging
/// vertices on an edge, overlapping triangles along an edge, neighbours of the same part oriented against
/// each other, port edges that are no edge of the feed. Two vertices coincide, and one lies on an edge, when
/// they are closer than 1e-9 of the mesh's extent (1e-6 of the shorter of the edge's two parts, if that is
/// less).
std::vector<std::string> defects(const SheetMesh& mesh);

}  // namespace panelwright::mesh
