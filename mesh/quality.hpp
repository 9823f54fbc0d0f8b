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

/// Measures `mesh`.
MeshQuality quality(const SheetMesh& mesh);

/// What makes `mesh` unusable, in words; empty when sound: vertex numbers out of range, triangles without area,
/// vertices used by no triangle, coincident vertices, hanging vertices on an edge, overlapping triangles along an
/// edge, neighbours within a sheet oriented against each other.
std::vector<std::string> defects(const SheetMesh& mesh);

}  // namespace panelwright::mesh
