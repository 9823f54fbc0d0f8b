#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numeric>
#include <optional>
#include <set>
#include <string_view>

#include "mesh/edges.hpp"
#include "mesh/quality.hpp"

namespace panelwright::mesh {
namespace {

using Eigen::Vector3d;

std::size_t index(int n) {
    return static_cast<std::size_t>(n);
}

/// Twice the area over the squared longest side below which a triangle has no area.
constexpr double flat = 1e-9;

/// Distance over the mesh's extent below which two vertices coincide.
constexpr double touching = 1e-9;

/// How often a defect of one kind was found, and where first.
class Tally {
  public:
    explicit Tally(std::string_view kind) : kind_(kind) {}

    void note(std::string_view thing, std::size_t number) {
        if (count_++ == 0) first_ = fmt::format("{} {}", thing, number);
    }

    /// Nothing where nothing was found.
    std::optional<std::string> sentence() const {
        if (count_ == 0) return std::nullopt;
        return fmt::format("{}: {}, the first at {}", kind_, count_, first_);
    }

  private:
    std::string kind_;
    std::string first_;
    int count_ = 0;
};

Tally numbers_out_of_range(const SheetMesh& mesh) {
    Tally tally("triangles with vertex numbers out of range");
    const int count = static_cast<int>(mesh.points.size());
    for (std::size_t t = 0; t < mesh.triangles.size(); ++t) {
        const auto& corner = mesh.triangles[t];
        if (std::any_of(corner.begin(), corner.end(), [count](int n) { return n < 0 || n >= count; })) {
            tally.note("triangle", t);
        }
    }
    return tally;
}

Tally points_not_finite(const SheetMesh& mesh) {
    Tally tally("vertices that are not finite");
    for (std::size_t n = 0; n < mesh.points.size(); ++n) {
        if (!mesh.points[n].allFinite()) tally.note("vertex", n);
    }
    return tally;
}

Tally triangles_without_area(const SheetMesh& mesh) {
    Tally tally("triangles without area");
    for (std::size_t t = 0; t < mesh.triangles.size(); ++t) {
        const auto& [a, b, c] = mesh.triangles[t];
        const double longest = std::max({(mesh.points[index(a)] - mesh.points[index(b)]).squaredNorm(),
                                         (mesh.points[index(b)] - mesh.points[index(c)]).squaredNorm(),
                                         (mesh.points[index(c)] - mesh.points[index(a)]).squaredNorm()});
        if (!(2.0 * area_vector(mesh, t).norm() > flat * longest)) tally.note("triangle", t);
    }
    return tally;
}

Tally unused_points(const SheetMesh& mesh) {
    std::vector<char> used(mesh.points.size(), 0);
    for (const auto& triangle : mesh.triangles) {
        for (const int n : triangle) used[index(n)] = 1;
    }
    Tally tally("vertices used by no triangle");
    for (std::size_t n = 0; n < used.size(); ++n) {
        if (used[n] == 0) tally.note("vertex", n);
    }
    return tally;
}

/// Vertices in the order of their projection on a slanting direction, so that near ones are near in that
/// order and few of a regular grid fall together; with a second projection that tells most of those apart.
class SortedPoints {
  public:
    explicit SortedPoints(const SheetMesh& mesh) : views_(mesh.points.size()), order_(mesh.points.size()) {
        const Vector3d one = Vector3d(1.0, std::sqrt(2.0) - 1.0, std::sqrt(0.37)).normalized();
        const Vector3d two = Vector3d(1.0 - std::sqrt(3.0), 1.0, std::sqrt(0.83)).normalized();
        for (std::size_t n = 0; n < views_.size(); ++n)
            views_[n] = {mesh.points[n].dot(one), mesh.points[n].dot(two)};
        std::iota(order_.begin(), order_.end(), std::size_t{0});
        std::sort(order_.begin(), order_.end(),
                  [this](std::size_t a, std::size_t b) { return views_[a] < views_[b]; });
        Vector3d low = mesh.points.empty() ? Vector3d::Zero().eval() : mesh.points.front();
        Vector3d high = low;
        for (const Vector3d& point : mesh.points) {
            low = low.cwiseMin(point);
            high = high.cwiseMax(point);
        }
        tolerance_ = touching * (high - low).norm();
    }

    double tolerance() const { return tolerance_; }

    /// Calls `visit` for every vertex that both projections show between `a` and `b`, up to the tolerance.
    template <typename Visit>
    void between(std::size_t a, std::size_t b, const Visit& visit) const {
        const auto [from, to] = std::minmax({views_[a][0], views_[b][0]});
        const auto [low, high] = std::minmax({views_[a][1], views_[b][1]});
        const auto first =
            std::lower_bound(order_.begin(), order_.end(), from - tolerance_,
                             [this](std::size_t n, double limit) { return views_[n][0] < limit; });
        for (auto n = first; n != order_.end() && views_[*n][0] <= to + tolerance_; ++n) {
            const double second = views_[*n][1];
            if (second >= low - tolerance_ && second <= high + tolerance_) visit(*n);
        }
    }

  private:
    std::vector<std::array<double, 2>> views_;
    std::vector<std::size_t> order_;
    double tolerance_ = 0.0;
};

Tally coincident_points(const SheetMesh& mesh, const SortedPoints& sorted) {
    Tally tally("vertices that coincide with another");
    for (std::size_t n = 0; n < mesh.points.size(); ++n) {
        bool twin = false;
        sorted.between(n, n, [&](std::size_t other) {
            twin = twin || (other != n && (mesh.points[other] - mesh.points[n]).norm() <= sorted.tolerance());
        });
        if (twin) tally.note("vertex", n);
    }
    return tally;
}

/// Does `point` lie inside the edge from `a` to `b`, ends excluded?
bool hangs_on(const Vector3d& point, const Vector3d& a, const Vector3d& b, double tolerance) {
    const Vector3d along = b - a;
    const double share = (point - a).dot(along) / along.squaredNorm();
    const double shorter_part = std::min(share, 1.0 - share) * along.norm();
    if (shorter_part <= tolerance) return false;
    return (point - a - share * along).norm() <= std::min(tolerance, 1e-6 * shorter_part);
}

Tally hanging_points(const SheetMesh& mesh, const std::vector<MeshEdge>& edge_list,
                     const SortedPoints& sorted) {
    Tally tally("edges with a hanging vertex");
    for (const MeshEdge& edge : edge_list) {
        const std::size_t a = index(edge.ends[0]);
        const std::size_t b = index(edge.ends[1]);
        std::optional<std::size_t> hanging;
        sorted.between(a, b, [&](std::size_t n) {
            if (n == a || n == b) return;
            if (hangs_on(mesh.points[n], mesh.points[a], mesh.points[b], sorted.tolerance())) hanging = n;
        });
        if (hanging) tally.note("vertex", *hanging);
    }
    return tally;
}

/// Unit vector in the plane of a triangle, from its edge towards the opposite corner.
Vector3d inwards(const SheetMesh& mesh, const MeshEdge& edge, const EdgeSide& side) {
    const Vector3d& a = mesh.points[index(edge.ends[0])];
    const Vector3d along = (mesh.points[index(edge.ends[1])] - a).normalized();
    const Vector3d to_corner = mesh.points[index(side.opposite)] - a;
    return (to_corner - to_corner.dot(along) * along).normalized();
}

/// Calls `visit` for every two triangles that share an edge.
template <typename Visit>
void each_pair(const std::vector<MeshEdge>& edge_list, const Visit& visit) {
    for (const MeshEdge& edge : edge_list) {
        for (std::size_t two = 1; two < edge.sides.size(); ++two) {
            for (std::size_t one = 0; one < two; ++one) visit(edge, edge.sides[one], edge.sides[two]);
        }
    }
}

Tally overlapping_triangles(const SheetMesh& mesh, const std::vector<MeshEdge>& edge_list) {
    Tally tally("triangles that overlap along an edge");
    each_pair(edge_list, [&](const MeshEdge& edge, const EdgeSide& one, const EdgeSide& two) {
        // Parallel within a microradian: the difference of two unit vectors is exact where their dot product
        // is not.
        if ((inwards(mesh, edge, one) - inwards(mesh, edge, two)).norm() < 1e-6)
            tally.note("triangle", two.triangle);
    });
    return tally;
}

Tally opposed_neighbours(const SheetMesh& mesh, const std::vector<MeshEdge>& edge_list) {
    Tally tally("neighbours of one part oriented against each other");
    each_pair(edge_list, [&](const MeshEdge&, const EdgeSide& one, const EdgeSide& two) {
        const bool same_part = mesh.part[one.triangle] == mesh.part[two.triangle];
        if (same_part && one.forward == two.forward) tally.note("triangle", two.triangle);
    });
    return tally;
}

Tally stray_port_edges(const SheetMesh& mesh, const std::vector<MeshEdge>& edge_list) {
    std::set<std::array<int, 2>> feed_edges;
    for (const MeshEdge& edge : edge_list) {
        const bool at_feed = std::any_of(edge.sides.begin(), edge.sides.end(), [&](const EdgeSide& side) {
            return mesh.part[side.triangle] == Part::feed;
        });
        if (at_feed) feed_edges.insert(edge.ends);
    }
    Tally tally("port edges that are no edge of the feed");
    for (std::size_t p = 0; p < mesh.port_edges.size(); ++p) {
        const auto [low, high] = std::minmax({mesh.port_edges[p][0], mesh.port_edges[p][1]});
        if (!feed_edges.contains({low, high})) tally.note("port edge", p);
    }
    return tally;
}

}  // namespace

std::vector<std::string> defects(const SheetMesh& mesh) {
    std::vector<std::string> list;
    const auto add = [&list](const Tally& tally) {
        if (const auto sentence = tally.sentence()) list.push_back(*sentence);
    };
    if (mesh.part.size() != mesh.triangles.size()) {
        list.push_back(fmt::format("{} part tags for {} triangles", mesh.part.size(), mesh.triangles.size()));
    }
    add(numbers_out_of_range(mesh));
    add(points_not_finite(mesh));
    if (!list.empty()) return list;

    const SortedPoints sorted(mesh);
    const std::vector<MeshEdge> edge_list = edges(mesh);
    add(triangles_without_area(mesh));
    add(unused_points(mesh));
    add(coincident_points(mesh, sorted));
    add(hanging_points(mesh, edge_list, sorted));
    add(overlapping_triangles(mesh, edge_list));
    add(opposed_neighbours(mesh, edge_list));
    add(stray_port_edges(mesh, edge_list));
    return list;
}

}  // namespace panelwright::mesh
