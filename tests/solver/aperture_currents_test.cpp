#include <gtest/gtest.h>

#include <array>
#include <cmath>
#include <vector>

#include "solver/aperture/aperture.hpp"
#include "solver/aperture/currents.hpp"
#include "solver/aperture/half_plane.hpp"
#include "solver/constants.hpp"
#include "tests/near.hpp"
#include "tests/solver/aperture_panels.hpp"

namespace panelwright::solver {
namespace {

using mesh::Part;
using test::near;

/// A place on a sheet to look at.
struct Place {
    Eigen::Vector3d at;
    Part part;
};

/// Currents at `places` for 1 A through the feed, by way of one tiny triangle about each.
SurfaceCurrent currents_at(const mesh::Panel& panel, const Wave& wave, const std::vector<Place>& places) {
    const ApertureModel model = aperture_model(panel);
    const DrivenCavity state = driven(panel, model, wave, 0.07);
    const RimVoltages voltages = rim_voltages(model, wave, state);
    const Eigen::VectorXcd rim = voltages.columns * column_factors(state, voltages);
    mesh::SheetMesh mesh;
    for (const Place& place : places) {
        const int first = static_cast<int>(mesh.points.size());
        for (const Eigen::Vector3d& corner :
             {Eigen::Vector3d{1e-9, 0.0, 0.0}, Eigen::Vector3d{-0.5e-9, 0.8e-9, 0.0},
              Eigen::Vector3d{-0.5e-9, -0.8e-9, 0.0}})
            mesh.points.emplace_back(place.at + corner);
        mesh.triangles.push_back({first, first + 1, first + 2});
        mesh.part.push_back(place.part);
    }
    return aperture_currents(panel, model, wave, state, 1.0, rim, mesh);
}

const Wave wave(2.44e9);
const mesh::Panel panel = test::probe_panel(0.15);
constexpr double height = 0.005;

TEST(ApertureCurrents, AreOppositeOnPatchAndReflector) {
    std::vector<Place> places;
    for (const double x : {-0.02, 0.0, 0.015, 0.026})
        for (const double y : {-0.03, 0.0, 0.021}) {
            places.push_back({{x, y, height}, Part::patch});
            places.push_back({{x, y, 0.0}, Part::reflector});
        }
    const SurfaceCurrent current = currents_at(panel, wave, places);
    for (std::size_t i = 0; i < places.size(); i += 2) {
        EXPECT_GT(current[i].norm(), 0.0);
        EXPECT_LT((current[i] + current[i + 1]).norm(), 1e-14 * current[i].norm()) << i;
    }
}

TEST(ApertureCurrents, EndAtThePatchsEdges) {
    const SurfaceCurrent current = currents_at(panel, wave,
                                               {{{0.0, 0.0, height}, Part::patch},
                                                {{0.027 - 1e-8, 0.01, height}, Part::patch},
                                                {{-0.027 + 1e-8, -0.02, height}, Part::patch},
                                                {{0.01, 0.032 - 1e-8, height}, Part::patch},
                                                {{-0.01, -0.032 + 1e-8, height}, Part::patch}});
    const double size = current[0].norm();
    // Proportional to the distance from the edge, a millionth of the side.
    EXPECT_LT(std::abs(current[1].x()), 1e-5 * size);
    EXPECT_LT(std::abs(current[2].x()), 1e-5 * size);
    EXPECT_LT(std::abs(current[3].y()), 1e-5 * size);
    EXPECT_LT(std::abs(current[4].y()), 1e-5 * size);
}

/// Current that flows out of the rectangle x0..x1, y0..y1 of the patch [A].
Complex outflow(double x0, double x1, double y0, double y1) {
    constexpr int steps = 200;
    std::vector<Place> places;
    std::vector<Eigen::Vector2d> normals;
    for (int i = 0; i < steps; ++i) {
        const double x = x0 + (x1 - x0) * (i + 0.5) / steps;
        const double y = y0 + (y1 - y0) * (i + 0.5) / steps;
        places.push_back({{x0, y, height}, Part::patch});
        normals.emplace_back(-(y1 - y0) / steps, 0.0);
        places.push_back({{x1, y, height}, Part::patch});
        normals.emplace_back((y1 - y0) / steps, 0.0);
        places.push_back({{x, y0, height}, Part::patch});
        normals.emplace_back(0.0, -(x1 - x0) / steps);
        places.push_back({{x, y1, height}, Part::patch});
        normals.emplace_back(0.0, (x1 - x0) / steps);
    }
    const SurfaceCurrent current = currents_at(panel, wave, places);
    Complex sum = 0.0;
    for (std::size_t i = 0; i < places.size(); ++i)
        sum += current[i].x() * normals[i].x() + current[i].y() * normals[i].y();
    return sum;
}

TEST(ApertureCurrents, CarryThePinsCurrentAway) {
    // From a rectangle round the pin flows its current less what charges the metal inside: j omega e0 / h
    // times the mean voltage there times the area (the sheet's lower face; the loss tangent of 0.07 stands
    // for the rest).
    const double x0 = -0.017, x1 = -0.009, y0 = -0.004, y1 = 0.004;
    const ApertureModel model = aperture_model(panel);
    const DrivenCavity state = driven(panel, model, wave, 0.07);
    std::vector<Eigen::Vector2d> inside;
    for (int i = 0; i < 20; ++i)
        for (int j = 0; j < 20; ++j)
            inside.emplace_back(x0 + (x1 - x0) * (i + 0.5) / 20, y0 + (y1 - y0) * (j + 0.5) / 20);
    Complex voltage = 0.0;
    for (const CavityField& f :
         cavity_field(model.cavity, wave, state.loss, model.pillars, state.currents, inside))
        voltage += f.voltage / 400.0;
    const Complex charging = Complex(0.0, wave.omega * vacuum_permittivity) * Complex(1.0, -state.loss) *
                             voltage * (x1 - x0) * (y1 - y0) / height;
    // The squeeze towards the edges moves the rectangle's sides by up to 3 %, and with them the charge
    // inside.
    EXPECT_TRUE(near(outflow(x0, x1, y0, y1), 1.0 - charging, 0.012));
    // From a rectangle without the pin, only the charge flows.
    EXPECT_LT(std::abs(outflow(0.0, 0.008, -0.004, 0.004)), 0.05);
}

TEST(ApertureCurrents, RunUpThePinAndThePosts) {
    mesh::Panel with_post = panel;
    with_post.posts.push_back({0.01, 0.02, 0.003});
    with_post.posts.push_back({0.01, -0.02, 0.003});
    const SurfaceCurrent current = currents_at(with_post, wave,
                                               {{{-0.0126, 0.0, 0.002}, Part::feed},
                                                {{0.0115, 0.02, 0.002}, Part::post},
                                                {{0.0115, -0.02, 0.002}, Part::post}});
    EXPECT_TRUE(near(current[0].z(), Complex(1.0 / (pi * 0.0008)), 1e-12));
    EXPECT_EQ(current[0].x(), Complex(0.0));
    const ApertureModel model = aperture_model(with_post);
    const Eigen::VectorXcd through = driven(with_post, model, wave, 0.07).currents;
    EXPECT_TRUE(near(current[1].z(), through(1) / (pi * 0.003), 1e-12));
    EXPECT_TRUE(near(current[2].z(), through(2) / (pi * 0.003), 1e-12));
    EXPECT_TRUE(near(through(1), through(2), 1e-9));  // they stand in each other's mirror image
}

TEST(ApertureCurrents, RunAlongTheTab) {
    const mesh::Panel tab = test::tab_panel(0.15);
    const SurfaceCurrent current = currents_at(tab, wave,
                                               {{{-0.029, 0.001, 0.002}, Part::feed},
                                                {{-0.028, 0.0, height}, Part::feed},
                                                {{-0.025, 0.0, height}, Part::patch}});
    const Complex density(1.0 / 0.005);
    EXPECT_TRUE(near(current[0].z(), density, 1e-12));
    EXPECT_TRUE(near(current[1].x(), density, 1e-12));
    EXPECT_TRUE(near(current[2].x(), density, 1e-12));
}

TEST(ApertureCurrents, HaveTheHalfPlanesShapeAtTheReflectorsEdges) {
    // The current across an edge vanishes as the square root of the distance, that along it grows as its
    // inverse.
    const double edge = 0.075;
    const SurfaceCurrent current = currents_at(panel, wave,
                                               {{{edge - 1e-5, 0.01, 0.0}, Part::reflector},
                                                {{edge - 4e-5, 0.01, 0.0}, Part::reflector},
                                                {{0.02, edge - 1e-5, 0.0}, Part::reflector},
                                                {{0.02, edge - 4e-5, 0.0}, Part::reflector}});
    EXPECT_TRUE(near(std::abs(current[1].x() / current[0].x()), 2.0, 0.01));
    EXPECT_TRUE(near(std::abs(current[1].y() / current[0].y()), 0.5, 0.01));
    EXPECT_TRUE(near(std::abs(current[3].y() / current[2].y()), 2.0, 0.01));
    EXPECT_TRUE(near(std::abs(current[3].x() / current[2].x()), 0.5, 0.01));
}

TEST(ApertureCurrents, BelongToOneWatt) {
    const Solution solution = solve_aperture(panel, test::task_at(2.44e9));
    ASSERT_EQ(solution.currents.size(), 1u);
    ASSERT_EQ(solution.currents[0].size(), solution.mesh.triangles.size());
    // Half the resistance times the pin's current squared is the accepted power.
    const double resistance = solution.port.impedance[1].real();
    for (std::size_t t = 0; t < solution.mesh.triangles.size(); ++t) {
        EXPECT_TRUE(solution.currents[0][t].allFinite()) << t;
        if (solution.mesh.part[t] != Part::feed) continue;
        const double pin = std::abs(solution.currents[0][t].z()) * pi * 0.0008;
        // The band's own loss is interpolated, the pattern's settled on a finer sphere: a thousandth.
        EXPECT_TRUE(near(0.5 * resistance * pin * pin, 1.0, 5e-3)) << t;
    }
}

}  // namespace
}  // namespace panelwright::solver
