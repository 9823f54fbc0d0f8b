#include "mesh/quality.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <limits>
#include <numbers>
#include <stdexcept>

#include "mesh/edges.hpp"
#include "tests/near.hpp"

namespace panelwright::mesh {
namespace {

/// The square 0..3 by 0..4 in two triangles, diagonal from the origin.
SheetMesh rectangle() {
    SheetMesh mesh;
    mesh.points = {{0, 0, 0}, {3, 0, 0}, {3, 4, 0}, {0, 4, 0}};
    mesh.triangles = {{0, 1, 2}, {0, 2, 3}};
    mesh.part = {Part::patch, Part::patch};
    return mesh;
}

/// Adds a triangle of `part`.
SheetMesh with(SheetMesh mesh, std::array<int, 3> triangle, Part part) {
    mesh.triangles.push_back(triangle);
    mesh.part.push_back(part);
    return mesh;
}

void expect_defect(const SheetMesh& mesh, const std::string& words) {
    const std::vector<std::string> found = defects(mesh);
    ASSERT_FALSE(found.empty()) << "nothing found where expected: " << words;
    bool named = false;
    for (const std::string& sentence : found) named = named || sentence.find(words) != std::string::npos;
    EXPECT_TRUE(named) << words << " is not in: " << found.front();
}

TEST(Quality, MeasuresARectangle) {
    const MeshQuality facts = quality(rectangle());
    constexpr double rounding = 1e-14;  // a few operations on small whole numbers
    EXPECT_TRUE(test::near(facts.area, 12.0, rounding));
    EXPECT_TRUE(test::near(facts.shortest_edge, 3.0, rounding));
    EXPECT_TRUE(test::near(facts.longest_edge, 5.0, rounding));
    EXPECT_TRUE(test::near(facts.smallest_angle, std::atan2(3.0, 4.0), rounding));
    EXPECT_EQ(facts.free_edges, 4);
    EXPECT_EQ(facts.inner_edges, 1);
    EXPECT_EQ(facts.junction_edges, 0);
    EXPECT_EQ(facts.components, 1);
}

TEST(Quality, CountsJunctionsAndComponents) {
    SheetMesh mesh = rectangle();
    mesh.points.emplace_back(1, 1, 1);
    mesh = with(mesh, {0, 2, 4}, Part::feed);
    for (const double x : {10.0, 11.0, 12.0}) mesh.points.emplace_back(x, x * x, 0.0);
    mesh = with(mesh, {5, 6, 7}, Part::post);
    const MeshQuality facts = quality(mesh);
    EXPECT_EQ(facts.junction_edges, 1);
    EXPECT_EQ(facts.components, 2);
    EXPECT_EQ(facts.inner_edges, 0);
    EXPECT_EQ(facts.free_edges, 4 + 2 + 3);
}

TEST(Quality, OfNothingIsZero) {
    const MeshQuality facts = quality(SheetMesh{});
    EXPECT_EQ(facts.components, 0);
    EXPECT_EQ(facts.longest_edge, 0.0);
    EXPECT_EQ(facts.smallest_angle, 0.0);
}

TEST(Quality, RefusesWrongVertexNumbers) {
    EXPECT_THROW(quality(with(rectangle(), {0, 1, 4}, Part::patch)), std::invalid_argument);
    EXPECT_THROW(quality(with(rectangle(), {-1, 1, 2}, Part::patch)), std::invalid_argument);
}

TEST(Edges, TellTheSideAndTheSense) {
    const std::vector<MeshEdge> list = edges(rectangle());
    ASSERT_EQ(list.size(), 5U);
    const MeshEdge& diagonal = list[1];  // ascending: 0-1, 0-2, …
    ASSERT_EQ(diagonal.ends, (std::array<int, 2>{0, 2}));
    ASSERT_EQ(diagonal.sides.size(), 2U);
    EXPECT_EQ(diagonal.sides[0].opposite, 1);
    EXPECT_FALSE(diagonal.sides[0].forward);
    EXPECT_EQ(diagonal.sides[1].opposite, 3);
    EXPECT_TRUE(diagonal.sides[1].forward);
}

TEST(Defects, SoundMeshHasNone) {
    EXPECT_TRUE(defects(rectangle()).empty());
}

TEST(Defects, WrongNumbersAndTags) {
    expect_defect(with(rectangle(), {0, 1, 9}, Part::patch), "out of range");
    SheetMesh mesh = rectangle();
    mesh.part.pop_back();
    expect_defect(mesh, "1 part tags for 2 triangles");
}

TEST(Defects, VerticesThatAreNotFinite) {
    SheetMesh mesh = rectangle();
    mesh.points[3].z() = std::numeric_limits<double>::quiet_NaN();
    expect_defect(mesh, "not finite");
}

TEST(Defects, TrianglesWithoutArea) {
    expect_defect(with(rectangle(), {1, 2, 2}, Part::patch), "without area");
    SheetMesh mesh = rectangle();
    mesh.points.emplace_back(3, 2, 0);
    expect_defect(with(mesh, {1, 4, 2}, Part::patch), "without area");
}

TEST(Defects, UnusedVertices) {
    SheetMesh mesh = rectangle();
    mesh.points.emplace_back(7, 7, 7);
    expect_defect(mesh, "used by no triangle: 1, the first at vertex 4");
}

TEST(Defects, CoincidentVertices) {
    SheetMesh mesh = rectangle();
    mesh.points.emplace_back(0, 4, 0);
    mesh.points.emplace_back(-1, 5, 0);
    expect_defect(with(mesh, {0, 4, 5}, Part::patch), "coincide");
}

TEST(Defects, HangingVertices) {
    SheetMesh mesh = rectangle();
    mesh.points.emplace_back(3, 1, 0);
    mesh.points.emplace_back(5, 1, 0);
    expect_defect(with(mesh, {1, 5, 4}, Part::patch), "hanging");
}

TEST(Defects, OverlapsAlongAnEdge) {
    SheetMesh mesh = rectangle();
    mesh.points.emplace_back(2, 1, 0);
    expect_defect(with(mesh, {1, 2, 4}, Part::feed), "overlap");
    expect_defect(with(rectangle(), {0, 2, 3}, Part::post), "overlap");
}

TEST(Defects, UprightTriangleAtASheetsEdgeIsNoOverlap) {
    SheetMesh mesh = rectangle();
    mesh.points.emplace_back(3, 2, 1);
    EXPECT_TRUE(defects(with(mesh, {1, 2, 4}, Part::feed)).empty());
}

TEST(Defects, OpposedNeighbours) {
    SheetMesh mesh = rectangle();
    std::swap(mesh.triangles[1][1], mesh.triangles[1][2]);
    expect_defect(mesh, "oriented against each other");
    mesh.part[1] = Part::feed;  // two parts that meet may have any orientation
    EXPECT_TRUE(defects(mesh).empty());
}

TEST(Defects, StrayPortEdges) {
    SheetMesh mesh = rectangle();
    mesh.port_edges = {{0, 1}};
    expect_defect(mesh, "port edges");
    mesh.part[0] = Part::feed;
    EXPECT_TRUE(defects(mesh).empty());
    mesh.port_edges = {{1, 3}};
    expect_defect(mesh, "port edges");
}

}  // namespace
}  // namespace panelwright::mesh
