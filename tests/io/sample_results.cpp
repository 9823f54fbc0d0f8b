#include "tests/io/sample_results.hpp"

#include <cmath>
#include <limits>

#include "solver/constants.hpp"

namespace panelwright::test {
namespace {

using solver::Complex;

mesh::Panel hill_top_panel() {
    mesh::Panel panel;
    panel.patch = {.length = 0.147, .width = 0.165, .thickness = 0.0005, .conductivity = 2.6e7 / 3.0};
    panel.spacer = {.height = 0.015, .permittivity = 1.07, .loss_tangent = 1.0 / 3000.0};
    panel.feed = mesh::Probe{.x = -0.038, .y = 0.0, .diameter = 0.002};
    panel.reflector = {.length = 0.22,
                       .width = 0.26,
                       .offset_x = 0.01,
                       .offset_y = -0.02,
                       .conductivity = mesh::perfect_conductivity};
    panel.posts = {{.x = 0.0, .y = -0.0, .diameter = 0.003},
                   {.x = 0.01, .y = 1.0 / 300.0, .diameter = 0.004}};
    return panel;
}

solver::PortResponse sample_port(double offset) {
    solver::PortResponse port;
    for (int f = 0; f < 5; ++f) {
        port.frequency.push_back(840e6 + 15e6 * f);
        port.impedance.emplace_back(50.0 + offset + f / 3.0, 10.0 * f - 20.0);
    }
    return port;
}

/// Pattern p: e_theta = (t + 1) / (q + 3) + j (p - 0.25), e_phi = t / 7 - j (q + p).
solver::FarField sample_pattern(int p, double step) {
    solver::FarField field = solver::whole_sphere(869.5e6 + 10e6 * p, step);
    for (Eigen::Index t = 0; t < field.e_theta.rows(); ++t) {
        for (Eigen::Index q = 0; q < field.e_theta.cols(); ++q) {
            const auto row = static_cast<double>(t);
            const auto column = static_cast<double>(q);
            field.e_theta(t, q) = {(row + 1.0) / (column + 3.0), p - 0.25};
            field.e_phi(t, q) = {row / 7.0, -(column + p)};
        }
    }
    return field;
}

/// Figure i of pattern p is i / 3 + p; the last one does not exist.
solver::Figures sample_figures(int p) {
    solver::Figures figures{};
    int i = 0;
    for (const solver::FigureEntry& entry : solver::figure_table()) figures.*entry.value = i++ / 3.0 + p;
    figures.*solver::figure_table().back().value = std::numeric_limits<double>::quiet_NaN();
    return figures;
}

/// A strip of `cells` squares along x, each cut into two triangles.
mesh::SheetMesh ribbon(int cells) {
    mesh::SheetMesh mesh;
    for (int i = 0; i <= cells; ++i) {
        mesh.points.emplace_back(i / 3.0, 0.0, 0.015);
        mesh.points.emplace_back(i / 3.0, 1.0 / 7.0, 0.015);
    }
    for (int i = 0; i < cells; ++i) {
        mesh.triangles.push_back({2 * i, 2 * i + 2, 2 * i + 1});
        mesh.triangles.push_back({2 * i + 1, 2 * i + 2, 2 * i + 3});
        mesh.part.push_back(static_cast<mesh::Part>(i % 4));
        mesh.part.push_back(static_cast<mesh::Part>(i % 4));
    }
    mesh.port_edges = {{0, 1}, {1, 3}};
    return mesh;
}

/// Current at triangle m for pattern p: (m / 3, j p, -1).
solver::SurfaceCurrent sample_current(std::size_t triangles, int p) {
    solver::SurfaceCurrent current;
    for (std::size_t m = 0; m < triangles; ++m) {
        current.emplace_back(Complex(static_cast<double>(m) / 3.0, 0.0), Complex(0.0, p), Complex(-1.0, 0.0));
    }
    return current;
}

void add_patterns(solver::MethodResult& method, double step, int count) {
    for (int p = 0; p < count; ++p) {
        method.solution.patterns.push_back(sample_pattern(p, step));
        method.solution.powers.push_back({.accepted = 1.0,
                                          .radiated = 0.9 - p / 30.0,
                                          .conductor = 0.01,
                                          .dielectric = 1.0 / 300.0,
                                          .surface_wave = 0.0});
        method.figures.push_back(sample_figures(p));
    }
}

solver::BandFigures sample_band() {
    return {.resonance_hz = 868.25e6,
            .best_match_hz = 870e6,
            .best_match_db = -100.0 / 3.0,
            .vswr2_from_hz = 850e6,
            .vswr2_to_hz = 890e6,
            .bandwidth_percent = std::numeric_limits<double>::quiet_NaN()};
}

solver::Result empty_result() {
    solver::Result result;
    result.title = "river gauge, hill-top panel – 869.5 MHz";
    result.case_text = "title = \"river gauge, hill-top panel – 869.5 MHz\"\n# verbatim\r\n";
    result.case_resolved = result.case_text + "[solve]\naccuracy = \"normal\"\n";
    result.panel = hill_top_panel();
    result.reference_impedance = 50.0;
    return result;
}

}  // namespace

solver::Result sample_result() {
    solver::Result result = empty_result();
    solver::MethodResult surface;
    surface.solution.method = solver::Method::surface;
    surface.solution.port = sample_port(2.0);
    surface.band = sample_band();
    add_patterns(surface, solver::pi / 6.0, 2);
    surface.solution.mesh = ribbon(4);
    for (int p = 0; p < 2; ++p) {
        surface.solution.currents.push_back(sample_current(surface.solution.mesh.triangles.size(), p));
    }
    surface.solution.health = {
        {"power_balance", "1", "radiated and lost over accepted power", {1.001, 0.998}, true},
        {"unknowns", "1", "unknowns of the matrix", {12.0}, false},
        {"condition", "1", "estimated condition of the matrix", {1e6 / 3.0}, false}};
    surface.solution.remarks = {"The spacer is 0.04 wavelengths high – near the limit.", "A second remark."};

    solver::MethodResult aperture;
    aperture.solution.method = solver::Method::aperture;
    aperture.solution.port = sample_port(0.0);
    aperture.band = sample_band();
    add_patterns(aperture, solver::pi / 8.0, 1);
    // Not in the order of speed, nor health by the alphabet: the file has to keep the order.
    result.methods = {surface, aperture};
    return result;
}

solver::Result port_only_result() {
    solver::Result result = empty_result();
    result.panel.feed = mesh::Tab{.width = 0.005, .notch_depth = 0.008, .notch_gap = 0.001, .reach = 0.008};
    result.panel.posts.clear();
    result.reference_impedance = 75.0;
    solver::MethodResult method;
    method.solution.port = sample_port(1.0);
    method.band = sample_band();
    result.methods = {method};
    return result;
}

solver::Result everyday_result(int triangles) {
    solver::Result result = empty_result();
    solver::MethodResult method;
    method.solution.method = solver::Method::surface;
    method.solution.port.frequency.clear();
    for (int f = 0; f < 61; ++f) {
        method.solution.port.frequency.push_back(840e6 + 1e6 * f);
        method.solution.port.impedance.emplace_back(50.0 + f, 30.0 - f);
    }
    method.band = sample_band();
    add_patterns(method, solver::pi / 90.0, 1);
    method.solution.mesh = ribbon((triangles + 1) / 2);
    method.solution.currents = {sample_current(method.solution.mesh.triangles.size(), 0)};
    method.solution.health = {{"power_balance", "1", "radiated and lost over accepted power", {1.001}, true},
                              {"unknowns", "1", "unknowns of the matrix", {3000.0}, false},
                              {"seconds", "s", "wall time", {7.5}, false}};
    result.methods = {method};
    return result;
}

io::Provenance sample_provenance() {
    return {.version = "0.1.0",
            .commit = "0123456789abcdef-dirty",
            .created_utc = "2026-03-01T06:30:00Z",
            .host = "deichwache-süd",
            .threads = 2};
}

}  // namespace panelwright::test
