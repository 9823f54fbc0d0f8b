/// The triangles between the polygon of a tube and the block of grid cells that was cut out for it.
#pragma once

#include <Eigen/Core>
#include <array>
#include <span>
#include <vector>

#include "mesh/layout.hpp"

namespace panelwright::mesh {

/// Corners of a tube's polygon, counter-clockwise from +x [m]; (sides). Mirror images of each other about the
/// axis are so to the last bit.
std::vector<Eigen::Vector2d> corners(const Tube& tube);

/// The ring.
struct Ring {
    std::vector<std::array<int, 2>> outer;      ///< (p) x and y line of the grid points round the block
    std::vector<std::array<int, 3>> triangles;  ///< (sides + p) counter-clockwise; below `sides` a corner of
                                                ///< the polygon, from there on a point of `outer`
};

/// The ring of `tube`. In a mirror-symmetric plan the rings of twin tubes are mirror images, and so are the
/// halves of the ring of a tube on y = 0.
Ring ring(const Layout& plan, const Tube& tube);

/// The triangles between two chains of points that run side by side, `outer` to the right of `inner`: numbers
/// below inner.size() are points of `inner`, from there on points of `outer`; counter-clockwise. Of all ways
/// to go along both, the one with the least sum of (squared sides over area); triangles turned over are never
/// taken. Empty where there is no way.
std::vector<std::array<int, 3>> band(std::span<const Eigen::Vector2d> inner,
                                     std::span<const Eigen::Vector2d> outer);

}  // namespace panelwright::mesh
