#include "mesh/triangulate.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <limits>
#include <random>
#include <stdexcept>

#include "mesh/layout.hpp"
#include "mesh/quality.hpp"
#include "tests/mesh/mesh_checks.hpp"
#include "tests/mesh/panels.hpp"

namespace panelwright::mesh {
namespace {

/// About a fifteenth of a wavelength at the patch's resonance, where it is somewhat less than half a
/// wavelength long.
MeshOptions coarse(const Panel& panel) {
    return {.cell_size = panel.patch.length / 6.0};
}

std::string joined(const std::vector<std::string>& sentences) {
    std::string text;
    for (const std::string& sentence : sentences) text += sentence + "\n";
    return text;
}

class Meshes : public testing::TestWithParam<test::NamedPanel> {};

TEST_P(Meshes, FitThePanel) {
    const Panel& panel = GetParam().panel;
    for (const double refinement : {1.0, 1.7}) {
        MeshOptions options = coarse(panel);
        options.cell_size /= refinement;
        EXPECT_EQ(joined(test::misfits(panel, options, triangulate(panel, options))), "");
    }
}

TEST_P(Meshes, FitThePanelWithOtherTubesAndGrowth) {
    const Panel& panel = GetParam().panel;
    for (const int sides : {4, 16}) {
        const MeshOptions options = {.cell_size = panel.patch.length / 3.0,
                                     .edge_cell = panel.patch.length / 20.0,
                                     .growth = sides == 4 ? 1.4 : 2.5,
                                     .tube_sides = sides};
        EXPECT_EQ(joined(test::misfits(panel, options, triangulate(panel, options))), "");
    }
}

TEST_P(Meshes, PatchFacesReflectorTriangleOverTriangle) {
    const Panel& panel = GetParam().panel;
    EXPECT_EQ(test::triangles_without_partner(panel, triangulate(panel, coarse(panel))), 0);
}

TEST_P(Meshes, AreMirroredWhereThePanelIs) {
    const Panel& panel = GetParam().panel;
    EXPECT_EQ(test::own_mirror_image(triangulate(panel, coarse(panel))), mirror_symmetric(panel));
}

/// Largest cells on both sides of the line nearest to `at`.
double cell_beside(const std::vector<double>& lines, double at) {
    const auto line = std::min_element(lines.begin(), lines.end(), [at](double a, double b) {
        return std::fabs(a - at) < std::fabs(b - at);
    });
    double cell = 0.0;
    if (line != lines.begin()) cell = *line - *(line - 1);
    if (line + 1 != lines.end()) cell = std::max(cell, *(line + 1) - *line);
    return cell;
}

TEST_P(Meshes, LinesKeepCellSizeEdgeCellAndGrowth) {
    const Panel& panel = GetParam().panel;
    const MeshOptions options = {.cell_size = panel.patch.length / 8.0, .edge_cell = 0.0, .growth = 1.6};
    const Layout plan = layout(panel, options);
    constexpr double rounding =
        1.0 + 1e-8;  // differences of coordinates 1e6 times as large as the smallest cell
    for (const auto& lines : {plan.x, plan.y}) {
        for (std::size_t n = 0; n + 1 < lines.size(); ++n) {
            const double cell = lines[n + 1] - lines[n];
            EXPECT_LE(cell, options.cell_size * rounding);
            if (n == 0) continue;
            const double before = lines[n] - lines[n - 1];
            EXPECT_LE(std::max(cell, before), options.growth * std::min(cell, before) * rounding);
        }
    }
    const double edge_cell = 0.25 * options.cell_size * rounding;
    const Reflector& plate = panel.reflector;
    for (const double sign : {-1.0, 1.0}) {
        EXPECT_LE(cell_beside(plan.x, sign * 0.5 * panel.patch.length), edge_cell);
        EXPECT_LE(cell_beside(plan.y, sign * 0.5 * panel.patch.width), edge_cell);
        EXPECT_LE(cell_beside(plan.x, plate.offset_x + sign * 0.5 * plate.length), edge_cell);
        EXPECT_LE(cell_beside(plan.y, plate.offset_y + sign * 0.5 * plate.width), edge_cell);
        const auto* tab = std::get_if<Tab>(&panel.feed);
        if (tab == nullptr) continue;
        EXPECT_LE(cell_beside(plan.y, sign * 0.5 * tab->width), edge_cell);
        if (tab->notch_depth == 0.0) continue;
        EXPECT_LE(cell_beside(plan.y, sign * (0.5 * tab->width + tab->notch_gap)), edge_cell);
        EXPECT_LE(cell_beside(plan.x, -0.5 * panel.patch.length + tab->notch_depth), edge_cell);
    }
}

std::string panel_name(const testing::TestParamInfo<test::NamedPanel>& info) {
    return info.param.name;
}

INSTANTIATE_TEST_SUITE_P(Assorted, Meshes, testing::ValuesIn(test::assorted_panels()), panel_name);

TEST(Triangulate, AssortedPanelsAreOfBothKinds) {
    const auto panels = test::assorted_panels();
    const auto symmetric = std::count_if(panels.begin(), panels.end(),
                                         [](const auto& named) { return mirror_symmetric(named.panel); });
    EXPECT_GE(symmetric, 5);
    EXPECT_GE(static_cast<std::ptrdiff_t>(panels.size()) - symmetric, 4);
}

TEST(Triangulate, UsualTubesHaveWellShapedRings) {
    Panel panel = test::gauge_panel();
    std::get<Probe>(panel.feed).diameter = 0.01;  // its block: 20 mm
    const SheetMesh mesh = triangulate(panel, {.cell_size = 0.02, .edge_cell = 0.02});
    SheetMesh ring;
    ring.points = mesh.points;
    for (std::size_t t = 0; t < mesh.triangles.size(); ++t) {
        const Eigen::Vector3d off = centroid(mesh, t) - Eigen::Vector3d(-0.038, 0.0, 0.0);
        const bool in_block = std::max(std::fabs(off.x()), std::fabs(off.y())) < 0.01;
        if (mesh.part[t] == Part::reflector && in_block) ring.triangles.push_back(mesh.triangles[t]);
    }
    EXPECT_EQ(ring.triangles.size(), 8U + 6U);  // a side of the octagon or of the halved block each
    // From a corner of the block, over 2 radii, the corner of the octagon at +y is seen atan((2 - 1.049) / 2)
    // = 25.4 deg from the block's side, the one at 45 deg another 19.6 deg on.
    EXPECT_GT(quality(ring).smallest_angle, 0.34);
}

/// A random panel: anything from a bare patch to one crowded with posts, on lengths that seldom repeat.
Panel random_panel(std::mt19937& random) {
    const auto uniform = [&](double from, double to) {
        return std::uniform_real_distribution(from, to)(random);
    };
    const auto chance = [&](double share) { return uniform(0.0, 1.0) < share; };
    Panel panel;
    const double length = uniform(0.02, 0.2);
    panel.patch = {.length = length, .width = length * uniform(0.5, 1.6)};
    panel.spacer.height = length * uniform(0.02, 0.2);
    panel.reflector.length = length * uniform(0.7, 3.0);
    panel.reflector.width = panel.patch.width * uniform(0.7, 3.0);
    if (chance(0.5)) panel.reflector.offset_x = length * uniform(-0.3, 0.3);
    if (chance(0.4)) panel.reflector.offset_y = panel.patch.width * uniform(-0.3, 0.3);
    if (chance(0.1)) panel.reflector.width = panel.patch.width * (1.0 + 1e-7);
    const auto diameter = [&] { return length * std::pow(10.0, uniform(-3.0, -0.6)); };
    if (chance(0.5)) {
        panel.feed =
            Probe{length * uniform(-0.5, 0.5), chance(0.6) ? 0.0 : length * uniform(-0.5, 0.5), diameter()};
    } else {
        panel.feed =
            Tab{panel.patch.width * uniform(0.01, 0.5), chance(0.3) ? 0.0 : length * uniform(0.001, 0.7),
                panel.patch.width * uniform(0.001, 0.1), chance(0.3) ? 0.0 : length * uniform(0.0, 0.3)};
    }
    const int posts = std::uniform_int_distribution(0, 4)(random);
    for (int n = 0; n < posts; ++n) {
        const Post post = {length * uniform(-0.5, 0.5), chance(0.2) ? 0.0 : length * uniform(-0.5, 0.5),
                           diameter()};
        panel.posts.push_back(post);
        if (post.y != 0.0 && chance(0.7)) panel.posts.push_back({post.x, -post.y, post.diameter});
    }
    return panel;
}

TEST(Triangulate, RandomPanelsGiveSoundMeshes) {
    std::mt19937 random(8695);
    int meshed = 0;
    int symmetric = 0;
    for (int trial = 0; trial < 4000 && meshed < 150; ++trial) {
        const Panel panel = random_panel(random);
        if (!problems(panel).empty()) continue;
        ++meshed;
        const double cell = std::min(panel.patch.length, panel.patch.width);
        const MeshOptions options = {
            .cell_size = cell, .edge_cell = 0.5 * cell, .growth = 4.0, .tube_sides = 4};
        const SheetMesh mesh = triangulate(panel, options);
        ASSERT_EQ(joined(test::misfits(panel, options, mesh)), "") << "trial " << trial;
        ASSERT_EQ(test::triangles_without_partner(panel, mesh), 0) << "trial " << trial;
        if (!mirror_symmetric(panel)) continue;
        ++symmetric;
        ASSERT_TRUE(test::own_mirror_image(mesh)) << "trial " << trial;
    }
    EXPECT_EQ(meshed, 150);
    EXPECT_GE(symmetric, 30);
}

TEST(Triangulate, ScalesWithThePanel) {
    // Larger in everything by a power of two, which changes no rounding: the same triangles.
    Panel large = test::dike_panel();
    large.patch.length *= 1024.0;
    large.patch.width *= 1024.0;
    large.spacer.height *= 1024.0;
    large.reflector.length *= 1024.0;
    large.reflector.width *= 1024.0;
    Probe& pin = std::get<Probe>(large.feed);
    pin = {pin.x * 1024.0, pin.y * 1024.0, pin.diameter * 1024.0};
    const SheetMesh small_mesh = triangulate(test::dike_panel(), {.cell_size = 0.006});
    const SheetMesh large_mesh = triangulate(large, {.cell_size = 0.006 * 1024.0});
    EXPECT_EQ(small_mesh.triangles, large_mesh.triangles);
}

TEST(Triangulate, FatTubesGetMoreSides) {
    const Panel panel = test::with_tubes({.x = -0.06, .y = 0.0, .diameter = 0.002},
                                         {{.x = 0.01, .y = 0.0, .diameter = 0.06}});
    const Layout plan = layout(panel, {.cell_size = 0.01});
    ASSERT_EQ(plan.tubes.size(), 2U);
    EXPECT_EQ(plan.tubes[0].sides, 8);
    EXPECT_EQ(plan.tubes[1].sides, 20);  // circumference 188 mm, sides of at most 10 mm, even
}

TEST(Triangulate, RefusesFaultyPanelsAndOptions) {
    const Panel good = test::gauge_panel();
    const double not_a_number = std::nan("");
    const MeshOptions fine = {.cell_size = 0.02};
    EXPECT_NO_THROW(triangulate(good, fine));
    Panel bad = good;
    bad.patch.length = -1.0;
    EXPECT_THROW(triangulate(bad, fine), std::invalid_argument);
    EXPECT_THROW(predicted_size(bad, fine), std::invalid_argument);
    for (const MeshOptions& options :
         std::vector<MeshOptions>{{},
                                  {.cell_size = -0.01},
                                  {.cell_size = not_a_number},
                                  {.cell_size = std::numeric_limits<double>::infinity()},
                                  {.cell_size = 1e-6},
                                  {.cell_size = 0.02, .edge_cell = -0.001},
                                  {.cell_size = 0.02, .edge_cell = 0.03},
                                  {.cell_size = 0.02, .edge_cell = 1e-6},
                                  {.cell_size = 0.02, .edge_cell = not_a_number},
                                  {.cell_size = 0.02, .edge_cell = 0.0, .growth = 1.0},
                                  {.cell_size = 0.02, .edge_cell = 0.0, .growth = not_a_number},
                                  {.cell_size = 0.02, .edge_cell = 0.0, .growth = 1.8, .tube_sides = 7},
                                  {.cell_size = 0.02, .edge_cell = 0.0, .growth = 1.8, .tube_sides = 2}}) {
        EXPECT_THROW(triangulate(good, options), std::invalid_argument);
        EXPECT_THROW(predicted_size(good, options), std::invalid_argument);
    }
}

TEST(Triangulate, RefusesMeshesBeyondTheLargest) {
    const MeshOptions options = {.cell_size = 1e-5};
    EXPECT_GT(predicted_size(test::gauge_panel(), options).triangles, most_triangles);
    EXPECT_THROW(triangulate(test::gauge_panel(), options), std::invalid_argument);
}

}  // namespace
}  // namespace panelwright::mesh
