#include <gtest/gtest.h>
#include <omp.h>

#include <cmath>
#include <stdexcept>
#include <vector>

#include "solver/aperture/aperture.hpp"
#include "solver/aperture/drive.hpp"
#include "solver/constants.hpp"
#include "tests/near.hpp"
#include "tests/solver/aperture_panels.hpp"

namespace panelwright::solver {
namespace {

using test::health;
using test::near;
using test::probe_panel;
using test::tab_panel;
using test::task_at;

/// Panels of every kind the method takes.
std::vector<std::pair<const char*, mesh::Panel>> assorted_panels() {
    std::vector<std::pair<const char*, mesh::Panel>> panels;
    panels.emplace_back("probe", probe_panel(0.12));
    panels.emplace_back("tab", tab_panel(0.12));
    mesh::Panel offset = probe_panel(0.15);
    offset.reflector.offset_x = 0.02;
    offset.reflector.offset_y = -0.015;
    offset.feed = mesh::Probe{-0.013, 0.006, 0.0008};
    panels.emplace_back("offset", offset);
    mesh::Panel posts = probe_panel(0.12);
    posts.posts = {{0.0, 0.0, 0.003}, {0.01, 0.02, 0.002}};
    panels.emplace_back("posts", posts);
    mesh::Panel laminate = probe_panel(0.12);
    laminate.patch = {0.039, 0.047, 0.00002, 5.8e7};
    laminate.spacer = {0.0016, 2.2, 0.0009};
    laminate.feed = mesh::Probe{-0.008, 0.0, 0.0013};
    panels.emplace_back("laminate", laminate);
    mesh::Panel lossy = tab_panel(0.1);
    lossy.patch.conductivity = 1.1e6;
    lossy.patch.thickness = 0.0005;
    lossy.reflector.conductivity = 1.1e6;
    lossy.spacer.permittivity = 1.07;
    lossy.spacer.loss_tangent = 0.01;
    panels.emplace_back("lossy", lossy);
    mesh::Panel square = probe_panel(0.12);  // two modes at once
    square.patch.width = square.patch.length;
    square.feed = mesh::Probe{-0.013, 0.009, 0.0008};
    panels.emplace_back("square", square);
    return panels;
}

TEST(SolveAperture, BalancesItsPower) {
    for (const auto& [name, panel] : assorted_panels()) {
        const Solution solution = solve_aperture(panel, task_at(2.4e9));
        const Powers& p = solution.powers[0];
        // The radiated power is the far field's integral; the losses are shares of the cavity's. What does
        // not close is the loss iteration's last step.
        EXPECT_TRUE(near(health(solution, "power_balance"), 1.0, 0.01)) << name;
        EXPECT_TRUE(near(p.radiated + p.conductor + p.dielectric + p.surface_wave, p.accepted, 0.01)) << name;
        EXPECT_TRUE(near(radiated_power(solution.patterns[0]), p.radiated, 1e-12)) << name;
        EXPECT_GT(solution.port.impedance[1].real(), 0.0) << name;
        EXPECT_EQ(solution.method, Method::aperture);
    }
}

TEST(SolveAperture, PutsLossesWhereTheyArise) {
    mesh::Panel panel = probe_panel(0.12);
    const auto powers = [&] { return solve_aperture(panel, task_at(2.4e9)).powers[0]; };
    const Powers perfect = powers();
    EXPECT_EQ(perfect.conductor, 0.0);
    EXPECT_EQ(perfect.dielectric, 0.0);
    EXPECT_EQ(perfect.surface_wave, 0.0);
    EXPECT_TRUE(near(perfect.radiated, 1.0, 1e-3));
    panel.patch.conductivity = panel.reflector.conductivity = 5.8e7;
    const Powers copper = powers();
    // Loss tangent of the two skin depths, 1.33 um each over 5 mm, against a Q of about 13: a third of a
    // percent.
    EXPECT_TRUE(near(copper.conductor, 1.33e-6 / 0.005 * 13.0, 0.1));
    EXPECT_TRUE(near(copper.radiated + copper.conductor, 1.0, 1e-3));
    panel.patch.conductivity = 5.8e5;
    // A hundred times worse a metal has ten times the skin depth; only the patch is of it.
    EXPECT_TRUE(near(powers().conductor, 5.5 * copper.conductor, 0.06));
    panel.patch.conductivity = panel.reflector.conductivity = mesh::perfect_conductivity;
    panel.spacer.loss_tangent = 0.01;
    // The whole room under the patch loses: 0.01 times Q.
    EXPECT_TRUE(near(powers().dielectric, 0.01 / (0.01 + 1.0 / 13.0), 0.1));
    panel.spacer = {0.005, 2.2, 0.0};
    EXPECT_GT(powers().surface_wave, 0.01);
}

TEST(SolveAperture, DoesNotDependOnTheNumberOfThreads) {
    const int before = omp_get_max_threads();
    for (const auto& [name, panel] : assorted_panels()) {
        if (name == std::string_view("probe") || name == std::string_view("posts"))
            continue;  // much like the others
        omp_set_num_threads(1);
        const Solution one = solve_aperture(panel, task_at(2.4e9));
        omp_set_num_threads(2);
        const Solution two = solve_aperture(panel, task_at(2.4e9));
        EXPECT_EQ(one.port.impedance, two.port.impedance) << name;
        EXPECT_TRUE((one.patterns[0].e_theta == two.patterns[0].e_theta).all()) << name;
        EXPECT_TRUE((one.patterns[0].e_phi == two.patterns[0].e_phi).all()) << name;
        EXPECT_EQ(one.powers[0].radiated, two.powers[0].radiated) << name;
        EXPECT_EQ(one.currents[0], two.currents[0]) << name;
    }
    omp_set_num_threads(before);
}

TEST(SolveAperture, MirrorsWithThePanel) {
    mesh::Panel panel = probe_panel(0.12);
    panel.reflector.offset_x = 0.02;
    panel.reflector.offset_y = 0.015;
    panel.feed = mesh::Probe{-0.013, 0.004, 0.0008};
    mesh::Panel across = panel;
    across.reflector.offset_y = -0.015;
    across.feed = mesh::Probe{-0.013, -0.004, 0.0008};
    mesh::Panel along = panel;
    along.reflector.offset_x = -0.02;
    along.feed = mesh::Probe{0.013, 0.004, 0.0008};
    const FarField field = solve_aperture(panel, task_at(2.4e9)).patterns[0];
    const FarField mirrored_y = solve_aperture(across, task_at(2.4e9)).patterns[0];
    const FarField mirrored_x = solve_aperture(along, task_at(2.4e9)).patterns[0];
    const double size = field.e_theta.abs().maxCoeff();
    const Eigen::Index n = field.e_theta.cols();
    for (Eigen::Index t = 0; t < field.e_theta.rows(); ++t)
        for (Eigen::Index q = 0; q < n; ++q) {
            const Eigen::Index y = (n - q) % n;          // phi -> -phi
            const Eigen::Index x = (n + n / 2 - q) % n;  // phi -> pi - phi
            EXPECT_LT(std::abs(mirrored_y.e_theta(t, y) - field.e_theta(t, q)), 1e-9 * size);
            EXPECT_LT(std::abs(mirrored_y.e_phi(t, y) + field.e_phi(t, q)), 1e-9 * size);
            EXPECT_LT(std::abs(mirrored_x.e_theta(t, x) - field.e_theta(t, q)), 1e-9 * size);
            EXPECT_LT(std::abs(mirrored_x.e_phi(t, x) + field.e_phi(t, q)), 1e-9 * size);
        }
}

TEST(SolveAperture, HasNoCrossPolarPartInTheMirrorPlane) {
    for (const mesh::Panel& panel : {probe_panel(0.12), tab_panel(0.12)}) {
        const FarField field = solve_aperture(panel, task_at(2.4e9)).patterns[0];
        const LudwigThird parts = ludwig_third(field);
        const double size = parts.co.abs().maxCoeff();
        for (const Eigen::Index q : {Eigen::Index{0}, field.e_theta.cols() / 2})
            EXPECT_LT(parts.cross.col(q).abs().maxCoeff(), 1e-10 * size);
    }
}

TEST(SolveAperture, ScalesWithTheWavelength) {
    // Lossless Maxwell's equations know no length: half the size at twice the frequency.
    constexpr double scale = 0.5;
    const mesh::Panel panel = probe_panel(0.15);
    mesh::Panel small = panel;
    small.patch.length *= scale;
    small.patch.width *= scale;
    small.spacer.height *= scale;
    small.feed = mesh::Probe{-0.013 * scale, 0.0, 0.0008 * scale};
    small.reflector.length *= scale;
    small.reflector.width *= scale;
    const Solution a = solve_aperture(panel, task_at(2.44e9));
    const Solution b = solve_aperture(small, task_at(2.44e9 / scale));
    for (std::size_t i = 0; i < a.port.impedance.size(); ++i)
        EXPECT_TRUE(near(a.port.impedance[i], b.port.impedance[i], 1e-8)) << i;
    const double size = a.patterns[0].e_theta.abs().maxCoeff();
    EXPECT_LT((a.patterns[0].e_theta - b.patterns[0].e_theta).abs().maxCoeff(), 1e-8 * size);
    EXPECT_LT((a.patterns[0].e_phi - b.patterns[0].e_phi).abs().maxCoeff(), 1e-8 * size);
    // A power of two scales without rounding, but for the clock of the solver's own tolerances: 1e-6 of the
    // loss.
    EXPECT_TRUE(near(health(a, "cavity_quality_factor"), health(b, "cavity_quality_factor"), 1e-8));
    EXPECT_TRUE(near(health(a, "cavity_resonance_hz") / scale, health(b, "cavity_resonance_hz"), 1e-8));
}

TEST(SolveAperture, FollowsADenseBandBetweenItsOwnFrequencies) {
    // The radiation loss is settled at a few frequencies and interpolated: a band of one frequency settles it
    // right there.
    Task band = task_at(2.44e9, 9);
    band.pattern_at.clear();
    const Solution whole = solve_aperture(probe_panel(0.25), band);
    for (std::size_t i = 0; i < band.band.size(); i += 2) {
        Task single;
        single.band = {band.band[i]};
        const Complex alone = solve_aperture(probe_panel(0.25), single).port.impedance[0];
        EXPECT_TRUE(near(whole.port.impedance[i], alone, 5e-3)) << band.band[i];
    }
}

TEST(SolveAperture, RefusesWhatItCannotSolve) {
    EXPECT_THROW(solve_aperture(mesh::Panel{}, task_at(2.4e9)), std::invalid_argument);
    Task empty;
    EXPECT_THROW(solve_aperture(probe_panel(0.12), empty), std::invalid_argument);
    Task falling;
    falling.band = {2.5e9, 2.4e9};
    EXPECT_THROW(solve_aperture(probe_panel(0.12), falling), std::invalid_argument);
    EXPECT_THROW(fringing({0.0, 0.06, 0.0}, {0.005, 1.0, 0.0}), std::invalid_argument);
    EXPECT_THROW(fringing({0.05, 0.06, 0.0}, {0.005, 0.9, 0.0}), std::invalid_argument);
}

TEST(SolveAperture, SaysWhichOfItsLimitsAPanelTouches) {
    const auto count = [](const mesh::Panel& panel) {
        return aperture_remarks(panel, task_at(2.44e9)).size();
    };
    EXPECT_EQ(count(probe_panel(0.15)), 0u);
    EXPECT_EQ(count(probe_panel(0.072)), 1u);  // a reflector of 0.59 wavelengths
    EXPECT_EQ(count(tab_panel(0.15)), 1u);
    mesh::Panel thick = probe_panel(0.15);
    thick.spacer.height = 0.009;
    EXPECT_EQ(count(thick), 1u);
    mesh::Panel dense = probe_panel(0.15);
    dense.spacer.permittivity = 2.2;
    EXPECT_EQ(count(dense), 1u);
    mesh::Panel hanging = probe_panel(0.1);
    hanging.reflector.offset_x = 0.03;
    EXPECT_EQ(count(hanging), 1u);
}

}  // namespace
}  // namespace panelwright::solver
