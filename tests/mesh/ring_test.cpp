#include "mesh/ring.hpp"

#include <gtest/gtest.h>

#include <Eigen/Dense>
#include <cmath>
#include <numbers>

#include "tests/near.hpp"

namespace panelwright::mesh {
namespace {

using Eigen::Vector2d;
constexpr double pi = std::numbers::pi;

/// Mean over a straight piece from `a` to `b` of ln of the distance to `at`, in closed form.
double mean_log_distance(const Vector2d& at, const Vector2d& a, const Vector2d& b) {
    const double length = (b - a).norm();
    const Vector2d along = (b - a) / length;
    const double from = (a - at).dot(along);
    const double to = from + length;
    const double off = std::fabs((a - at).x() * along.y() - (a - at).y() * along.x());
    const auto primitive = [off](double t) {
        const double square = t * t + off * off;
        return (square > 0.0 ? 0.5 * t * std::log(square) : 0.0) - t +
               (off > 0.0 ? off * std::atan2(t, off) : 0.0);
    };
    return (primitive(to) - primitive(from)) / length;
}

/// Logarithmic capacity of a regular polygon by collocation: charges on `pieces` pieces a side, refined
/// towards the corners, that hold the boundary at one potential.
double capacity_by_collocation(int sides, double corner_radius, int pieces) {
    std::vector<Vector2d> points;
    for (int side = 0; side < sides; ++side) {
        const double angle = 2.0 * pi * side / sides;
        const double next = 2.0 * pi * (side + 1) / sides;
        const Vector2d a = corner_radius * Vector2d(std::cos(angle), std::sin(angle));
        const Vector2d b = corner_radius * Vector2d(std::cos(next), std::sin(next));
        for (int n = 0; n < pieces; ++n)
            points.emplace_back(a + (b - a) * 0.5 * (1.0 - std::cos(pi * n / pieces)));
    }
    const Eigen::Index count = static_cast<Eigen::Index>(points.size());
    Eigen::MatrixXd system = Eigen::MatrixXd::Zero(count + 1, count + 1);
    const auto end = [&](Eigen::Index n) { return points[static_cast<std::size_t>(n % count)]; };
    for (Eigen::Index row = 0; row < count; ++row) {
        const Vector2d at = 0.5 * (end(row) + end(row + 1));
        for (Eigen::Index n = 0; n < count; ++n) system(row, n) = mean_log_distance(at, end(n), end(n + 1));
        system(row, count) = -1.0;  // unknown potential
        system(count, row) = 1.0;   // unit charge
    }
    Eigen::VectorXd right = Eigen::VectorXd::Zero(count + 1);
    right(count) = 1.0;
    return std::exp(system.partialPivLu().solve(right)(count));
}

TEST(EqualCornerRadius, GivesTheCapacityOfTheCircle) {
    for (const int sides : {4, 6, 8, 12}) {
        const double capacity = capacity_by_collocation(sides, equal_corner_radius(0.7, sides), 24);
        // The charge at the corners is singular; doubling the pieces moves the result by less than 1e-4.
        EXPECT_TRUE(test::near(capacity, 0.7, 4e-4)) << sides << " sides: " << capacity;
    }
}

TEST(EqualCornerRadius, SquareAndManySides) {
    // Capacity of a square over its side: Gamma(1/4)^2 / (4 pi^(3/2)).
    const double square = std::pow(std::tgamma(0.25), 2.0) / (4.0 * std::pow(pi, 1.5));
    EXPECT_TRUE(test::near(equal_corner_radius(1.0, 4), std::sqrt(0.5) / square, 1e-13));
    // Between the inscribed and the circumscribed polygon, whose difference is pi^2 / (2 n^2) = 4e-5.
    EXPECT_GT(equal_corner_radius(1.0, 360), 1.0);
    EXPECT_LT(equal_corner_radius(1.0, 360), 1.0 + 4e-5);
}

TEST(EqualCornerRadius, StaysWithinTheRim) {
    for (int sides = 4; sides <= 360; sides += 2) EXPECT_LT(equal_corner_radius(1.0, sides), tube_rim);
}

double area(const std::vector<Vector2d>& points, const std::vector<std::array<int, 3>>& triangles) {
    double sum = 0.0;
    for (const auto& [a, b, c] : triangles) {
        const Vector2d u = points[static_cast<std::size_t>(b)] - points[static_cast<std::size_t>(a)];
        const Vector2d v = points[static_cast<std::size_t>(c)] - points[static_cast<std::size_t>(a)];
        const double twice = u.x() * v.y() - u.y() * v.x();
        EXPECT_GT(twice, 0.0);
        sum += 0.5 * twice;
    }
    return sum;
}

/// A tube at (0.1, y) in a block between the first and the last lines.
struct Example {
    Layout plan;
    Tube tube;
};

Example example(double y, std::vector<double> lines_x, std::vector<double> lines_y) {
    Example made;
    made.plan.x = std::move(lines_x);
    made.plan.y = std::move(lines_y);
    made.tube = {
        .x = 0.1, .y = y, .radius = 1.0, .sides = 8, .part = Part::post, .block_x = {}, .block_y = {}};
    made.tube.block_x = {0, static_cast<int>(made.plan.x.size()) - 1};
    made.tube.block_y = {0, static_cast<int>(made.plan.y.size()) - 1};
    return made;
}

TEST(Ring, FillsBlockAroundPolygonWithTrianglesOnly) {
    const std::vector<Example> examples = {
        example(0.0, {-2.0, 2.0}, {-2.0, 2.0}),
        // Close on one side, and lines right through the polygon at uneven places.
        example(0.3, {-0.95, 0.0, 0.1, 1.0, 2.5}, {-2.0, 0.3, 0.31, 1.31}),
        example(-5.0, {-0.905, 3.0}, {-6.5, -6.4, -4.9, -3.9}),
        example(7.0, {-4.0, -3.0, -2.0, -1.0, 0.0, 1.0, 2.0}, {5.0, 5.5, 6.0, 9.0})};
    for (const Example& made : examples) {
        const Ring found = ring(made.plan, made.tube);
        std::vector<Vector2d> points = corners(made.tube);
        for (const auto& [i, j] : found.outer) {
            points.emplace_back(made.plan.x[static_cast<std::size_t>(i)],
                                made.plan.y[static_cast<std::size_t>(j)]);
        }
        const double block =
            (made.plan.x.back() - made.plan.x.front()) * (made.plan.y.back() - made.plan.y.front());
        const double polygon = 4.0 * std::sin(pi / 4.0);  // n/2 R^2 sin(2 pi / n)
        EXPECT_EQ(found.outer.size(), static_cast<std::size_t>(made.tube.block_points()));
        EXPECT_EQ(found.triangles.size(), found.outer.size() + 8U);
        EXPECT_TRUE(test::near(area(points, found.triangles), block - polygon, 1e-13))
            << "tube at y = " << made.tube.y;
    }
}

TEST(Band, TakesTheShorterDiagonal) {
    const std::vector<Vector2d> inner = {{0.0, 1.0}, {1.0, 1.0}};
    const std::vector<Vector2d> outer = {{0.4, 0.0}, {1.4, 0.0}};
    const auto triangles = band(inner, outer);
    ASSERT_EQ(triangles.size(), 2U);
    // From inner 1 to outer 0 (numbered 2), not from inner 0 to outer 1.
    EXPECT_EQ(triangles[0], (std::array<int, 3>{1, 0, 2}));
    EXPECT_EQ(triangles[1], (std::array<int, 3>{2, 3, 1}));
}

TEST(Band, IsEmptyWhereTheChainsAreTheWrongWayRound) {
    const std::vector<Vector2d> inner = {{0.0, 0.0}, {1.0, 0.0}};
    const std::vector<Vector2d> outer = {{0.0, 1.0}, {1.0, 1.0}};
    EXPECT_TRUE(band(inner, outer).empty());
}

}  // namespace
}  // namespace panelwright::mesh
