#include "mesh/ring.hpp"

#include <algorithm>
#include <cassert>
#include <cmath>
#include <limits>
#include <numbers>

namespace panelwright::mesh {
namespace {

using Eigen::Vector2d;
using Triangle = std::array<int, 3>;

constexpr double no_way = std::numeric_limits<double>::infinity();

/// Sum of the squared sides over the area: least for an equilateral triangle. No way for one turned over.
double badness(const Vector2d& a, const Vector2d& b, const Vector2d& c) {
    const Vector2d u = b - a;
    const Vector2d v = c - a;
    const double twice_area = u.x() * v.y() - u.y() * v.x();
    const double squares = u.squaredNorm() + v.squaredNorm() + (c - b).squaredNorm();
    return twice_area > 1e-12 * squares ? squares / twice_area : no_way;
}

/// Least sums of badness up to every pair of points (dynamic programming), and the step that led there.
class BandSearch {
  public:
    BandSearch(std::span<const Vector2d> inner, std::span<const Vector2d> outer)
        : inner_(inner),
          outer_(outer),
          cost_(inner.size() * outer.size(), no_way),
          along_inner_(cost_.size(), 0) {
        for (std::size_t i = 0; i < inner.size(); ++i) {
            for (std::size_t o = 0; o < outer.size(); ++o) reach(i, o);
        }
    }

    double cost() const { return cost_.back(); }

    std::vector<Triangle> triangles() const {
        std::vector<Triangle> found;
        if (cost() == no_way) return found;
        std::size_t i = inner_.size() - 1;
        std::size_t o = outer_.size() - 1;
        const auto number = [](std::size_t n) { return static_cast<int>(n); };
        while (i + o > 0) {
            if (along_inner_[place(i, o)] != 0) {
                found.push_back({number(i), number(i - 1), number(inner_.size() + o)});
                --i;
            } else {
                found.push_back({number(inner_.size() + o - 1), number(inner_.size() + o), number(i)});
                --o;
            }
        }
        std::reverse(found.begin(), found.end());
        return found;
    }

  private:
    std::size_t place(std::size_t i, std::size_t o) const { return i * outer_.size() + o; }

    void reach(std::size_t i, std::size_t o) {
        double& cost = cost_[place(i, o)];
        if (i + o == 0) cost = 0.0;
        if (o > 0) cost = cost_[place(i, o - 1)] + badness(outer_[o - 1], outer_[o], inner_[i]);
        if (i == 0) return;
        const double other = cost_[place(i - 1, o)] + badness(inner_[i], inner_[i - 1], outer_[o]);
        if (o > 0 && cost <= other) return;
        cost = other;
        along_inner_[place(i, o)] = 1;
    }

    std::span<const Vector2d> inner_;
    std::span<const Vector2d> outer_;
    std::vector<double> cost_;
    std::vector<char> along_inner_;
};

/// Grid points round the block, counter-clockwise from its lower right corner.
std::vector<std::array<int, 2>> block_points(const Tube& tube) {
    std::vector<std::array<int, 2>> points;
    const auto [left, right] = tube.block_x;
    const auto [bottom, top] = tube.block_y;
    for (int j = bottom; j < top; ++j) points.push_back({right, j});
    for (int i = right; i > left; --i) points.push_back({i, top});
    for (int j = top; j > bottom; --j) points.push_back({left, j});
    for (int i = left; i < right; ++i) points.push_back({i, bottom});
    return points;
}

/// Both loops of one ring as the search sees them: seen in a mirror for tubes below y = 0, so that twins see
/// the same.
struct Loops {
    std::vector<Vector2d> inner;  ///< corners
    std::vector<Vector2d> outer;  ///< points round the block
    std::vector<int> corner;      ///< their numbers in the tube
    std::vector<int> point;       ///< their numbers in Ring::outer
};

Loops loops(const Layout& plan, const Tube& tube, const std::vector<std::array<int, 2>>& points) {
    const bool seen_in_mirror = tube.y < 0.0;
    const int sides = tube.sides;
    const int count = static_cast<int>(points.size());
    // In the mirror the walk runs the other way, and its lower right corner is the block's upper right one.
    const int first = seen_in_mirror ? tube.block_y.cells() : 0;
    const int step = seen_in_mirror ? -1 : 1;
    const double sign = step;
    const std::vector<Vector2d> polygon = corners(tube);
    Loops seen;
    for (int k = 0; k < sides; ++k) {
        seen.corner.push_back((step * k + sides) % sides);
        const Vector2d& at = polygon[static_cast<std::size_t>(seen.corner.back())];
        seen.inner.emplace_back(at.x(), sign * at.y());
    }
    for (int k = 0; k < count; ++k) {
        seen.point.push_back((first + step * k + count) % count);
        const auto [i, j] = points[static_cast<std::size_t>(seen.point.back())];
        seen.outer.emplace_back(plan.x[static_cast<std::size_t>(i)],
                                sign * plan.y[static_cast<std::size_t>(j)]);
    }
    return seen;
}

template <typename T>
std::vector<T> closed_from(const std::vector<T>& loop, std::size_t start) {
    std::vector<T> chain;
    chain.reserve(loop.size() + 1);
    for (std::size_t n = 0; n <= loop.size(); ++n) chain.push_back(loop[(start + n) % loop.size()]);
    return chain;
}

/// Numbers of a band between chains as numbers of loops that the chains run along from `start`.
std::vector<Triangle> in_loops(std::vector<Triangle> triangles, std::size_t inner_chain, const Loops& seen,
                               std::size_t start) {
    const int inner = static_cast<int>(inner_chain);
    const int sides = static_cast<int>(seen.inner.size());
    const int points = static_cast<int>(seen.outer.size());
    for (Triangle& triangle : triangles) {
        for (int& corner : triangle) {
            corner =
                corner < inner ? corner % sides : sides + (corner - inner + static_cast<int>(start)) % points;
        }
    }
    return triangles;
}

/// The whole ring. The corner at +x can always be joined to some point of the block's right side: going round
/// both loops in the order of their normals gives triangles none of which is turned over.
std::vector<Triangle> closed_band(const Loops& seen, std::size_t right_points) {
    const std::vector<Vector2d> inner = closed_from(seen.inner, 0);
    std::vector<Triangle> best;
    double least = no_way;
    for (std::size_t start = 0; start < right_points; ++start) {
        const std::vector<Vector2d> outer = closed_from(seen.outer, start);
        const BandSearch search(inner, outer);
        if (search.cost() >= least) continue;
        least = search.cost();
        best = in_loops(search.triangles(), inner.size(), seen, start);
    }
    return best;
}

/// The upper half, from the right end of the line through the axis to its left end, and its mirror image.
std::vector<Triangle> mirrored_band(const Loops& seen, std::size_t half_height) {
    const std::size_t half_sides = seen.inner.size() / 2;
    const std::size_t half_points = seen.outer.size() / 2;
    const std::span<const Vector2d> inner(seen.inner.data(), half_sides + 1);
    const std::span<const Vector2d> outer(seen.outer.data() + half_height, half_points + 1);
    std::vector<Triangle> triangles = in_loops(band(inner, outer), half_sides + 1, seen, half_height);
    const int sides = static_cast<int>(seen.inner.size());
    const int points = static_cast<int>(seen.outer.size());
    const int twice_middle = 2 * static_cast<int>(half_height);
    const auto image = [&](int n) {
        return n < sides ? (sides - n) % sides : sides + (twice_middle - (n - sides) + points) % points;
    };
    const std::size_t half = triangles.size();
    for (std::size_t t = 0; t < half; ++t) {
        const auto [a, b, c] = triangles[t];
        triangles.push_back({image(a), image(c), image(b)});
    }
    return triangles;
}

}  // namespace

std::vector<Vector2d> corners(const Tube& tube) {
    std::vector<Vector2d> polygon(static_cast<std::size_t>(tube.sides));
    const int half = tube.sides / 2;
    for (int k = 0; k <= half; ++k) {
        const double angle = 2.0 * std::numbers::pi * k / tube.sides;
        const bool on_axis = k == 0 || k == half;
        const double across = tube.radius * std::cos(angle);
        const double up = on_axis ? 0.0 : tube.radius * std::sin(angle);
        polygon[static_cast<std::size_t>(k)] = {tube.x + across, tube.y + up};
        if (!on_axis) polygon[static_cast<std::size_t>(tube.sides - k)] = {tube.x + across, tube.y - up};
    }
    return polygon;
}

std::vector<Triangle> band(std::span<const Vector2d> inner, std::span<const Vector2d> outer) {
    return BandSearch(inner, outer).triangles();
}

Ring ring(const Layout& plan, const Tube& tube) {
    Ring result;
    result.outer = block_points(tube);
    const Loops seen = loops(plan, tube, result.outer);
    const int height = tube.block_y.cells();
    const bool in_the_middle = plan.mirror_symmetric && tube.y == 0.0;
    std::vector<Triangle> triangles = in_the_middle
                                          ? mirrored_band(seen, static_cast<std::size_t>(height / 2))
                                          : closed_band(seen, static_cast<std::size_t>(height) + 1);
    assert(triangles.size() == seen.inner.size() + seen.outer.size());
    for (Triangle& triangle : triangles) {
        for (int& corner : triangle) {
            corner = corner < tube.sides
                         ? seen.corner[static_cast<std::size_t>(corner)]
                         : tube.sides + seen.point[static_cast<std::size_t>(corner - tube.sides)];
        }
        if (tube.y < 0.0) std::swap(triangle[1], triangle[2]);
    }
    result.triangles = std::move(triangles);
    return result;
}

}  // namespace panelwright::mesh
