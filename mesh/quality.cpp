#include "mesh/quality.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>
#include <numeric>
#include <stdexcept>

#include "mesh/edges.hpp"

namespace panelwright::mesh {
namespace {

std::size_t index(int n) {
    return static_cast<std::size_t>(n);
}

bool numbers_in_range(const SheetMesh& mesh) {
    const int count = static_cast<int>(mesh.points.size());
    return std::all_of(mesh.triangles.begin(), mesh.triangles.end(),
                       [count](const std::array<int, 3>& triangle) {
                           return std::all_of(triangle.begin(), triangle.end(),
                                              [count](int n) { return n >= 0 && n < count; });
                       });
}

double smallest_angle(const SheetMesh& mesh, std::size_t t) {
    double least = std::numbers::pi;
    for (std::size_t k = 0; k < 3; ++k) {
        const Eigen::Vector3d& corner = mesh.points[index(mesh.triangles[t][k])];
        const Eigen::Vector3d u = mesh.points[index(mesh.triangles[t][(k + 1) % 3])] - corner;
        const Eigen::Vector3d v = mesh.points[index(mesh.triangles[t][(k + 2) % 3])] - corner;
        least = std::min(least, std::atan2(u.cross(v).norm(), u.dot(v)));
    }
    return least;
}

/// Sets of triangles that are joined step by step.
class Groups {
  public:
    explicit Groups(std::size_t count) : parent_(count), count_(static_cast<int>(count)) {
        std::iota(parent_.begin(), parent_.end(), std::size_t{0});
    }

    void join(std::size_t a, std::size_t b) {
        const std::size_t one = root(a);
        const std::size_t two = root(b);
        if (one == two) return;
        parent_[std::max(one, two)] = std::min(one, two);
        --count_;
    }

    int count() const { return count_; }

  private:
    std::size_t root(std::size_t n) {
        while (parent_[n] != n) {
            parent_[n] = parent_[parent_[n]];
            n = parent_[n];
        }
        return n;
    }

    std::vector<std::size_t> parent_;
    int count_;
};

}  // namespace

MeshQuality quality(const SheetMesh& mesh) {
    if (!numbers_in_range(mesh))
        throw std::invalid_argument("quality: a triangle names a vertex that does not exist");
    MeshQuality facts;
    if (mesh.triangles.empty()) return facts;
    facts.smallest_angle = std::numbers::pi;
    for (std::size_t t = 0; t < mesh.triangles.size(); ++t) {
        facts.smallest_angle = std::min(facts.smallest_angle, smallest_angle(mesh, t));
        facts.area += area_vector(mesh, t).norm();
    }
    facts.shortest_edge = std::numeric_limits<double>::infinity();
    Groups groups(mesh.triangles.size());
    for (const MeshEdge& edge : edges(mesh)) {
        const double length = (mesh.points[index(edge.ends[1])] - mesh.points[index(edge.ends[0])]).norm();
        facts.longest_edge = std::max(facts.longest_edge, length);
        facts.shortest_edge = std::min(facts.shortest_edge, length);
        facts.free_edges += edge.sides.size() == 1 ? 1 : 0;
        facts.inner_edges += edge.sides.size() == 2 ? 1 : 0;
        facts.junction_edges += edge.sides.size() > 2 ? 1 : 0;
        for (const EdgeSide& side : edge.sides) groups.join(edge.sides.front().triangle, side.triangle);
    }
    facts.components = groups.count();
    return facts;
}

}  // namespace panelwright::mesh
