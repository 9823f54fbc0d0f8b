/// Triangulated metal sheets of a panel.
#pragma once

#include <Eigen/Core>
#include <Eigen/Geometry>
#include <array>
#include <cstdint>
#include <vector>

namespace panelwright::mesh {

/// Which part of the antenna a triangle belongs to; the numbers are those of the result files.
enum class Part : std::uint8_t { reflector = 0, patch = 1, feed = 2, post = 3 };

/// Infinitely thin sheets as flat triangles. Sheets that touch share the vertices of the common edge, so an
/// edge may border three triangles (foot of a pin or post, bend of a tab).
struct SheetMesh {
    std::vector<Eigen::Vector3d> points;         ///< (n) vertices [m]
    std::vector<std::array<int, 3>> triangles;   ///< (m) vertex numbers, counter-clockwise about the normal
    std::vector<Part> part;                      ///< (m) owner of each triangle
    std::vector<std::array<int, 2>> port_edges;  ///< (p) edges where the feed meets the reflector
};

/// Centroid of triangle `t` [m].
inline Eigen::Vector3d centroid(const SheetMesh& mesh, std::size_t t) {
    const auto& [a, b, c] = mesh.triangles[t];
    return (mesh.points[static_cast<std::size_t>(a)] + mesh.points[static_cast<std::size_t>(b)] +
            mesh.points[static_cast<std::size_t>(c)]) /
           3.0;
}

/// Area vector of triangle `t`: unit normal times area [m^2].
inline Eigen::Vector3d area_vector(const SheetMesh& mesh, std::size_t t) {
    const auto& [a, b, c] = mesh.triangles[t];
    const Eigen::Vector3d& origin = mesh.points[static_cast<std::size_t>(a)];
    return 0.5 * (mesh.points[static_cast<std::size_t>(b)] - origin)
                     .cross(mesh.points[static_cast<std::size_t>(c)] - origin);
}

}  // namespace panelwright::mesh
