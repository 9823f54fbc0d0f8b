/// Time of the aperture method: one design, by reflector size.
#include <benchmark/benchmark.h>

#include <cmath>

#include "solver/aperture/aperture.hpp"
#include "solver/aperture/fringing.hpp"
#include "solver/aperture/model.hpp"
#include "solver/aperture/radiation.hpp"

namespace {

using namespace panelwright;

mesh::Panel panel_over(double side) {
    mesh::Panel panel;
    panel.patch = {0.054, 0.064};
    panel.spacer = {0.005};
    panel.feed = mesh::Probe{-0.013, 0.0, 0.0008};
    panel.reflector = {side, side};
    return panel;
}

/// A design with 61 band points and one pattern at 2 degrees; the argument is the reflector's side in mm.
void design(benchmark::State& state) {
    const mesh::Panel panel = panel_over(1e-3 * static_cast<double>(state.range(0)));
    solver::Task task;
    for (int i = 0; i < 61; ++i) task.band.push_back(2.3e9 + 5e6 * i);
    task.pattern_at = {2.44e9};
    for (auto _ : state) benchmark::DoNotOptimize(solver::solve_aperture(panel, task));
}
BENCHMARK(design)->Arg(75)->Arg(150)->Arg(300)->Arg(1200)->Unit(benchmark::kMillisecond)->UseRealTime();

void fringing_of_a_patch(benchmark::State& state) {
    const mesh::Panel panel = panel_over(0.15);
    for (auto _ : state) benchmark::DoNotOptimize(solver::fringing(panel.patch, panel.spacer));
}
BENCHMARK(fringing_of_a_patch)->Unit(benchmark::kMillisecond);

/// Field of the rim at one place on the plate.
void plate_field(benchmark::State& state) {
    const solver::ApertureModel model = solver::aperture_model(panel_over(0.15));
    const Eigen::MatrixXcd voltage =
        Eigen::MatrixXcd::Ones(static_cast<Eigen::Index>(model.rim.points.size()), 2);
    const solver::PlateField field(model.rim, voltage, 51.1);
    for (auto _ : state) benchmark::DoNotOptimize(field.current({0.04, 0.03}));
    state.counters["rim_points"] = static_cast<double>(model.rim.points.size());
}
BENCHMARK(plate_field);

/// Radiation of one edge piece of second order in one direction.
void edge_piece(benchmark::State& state) {
    solver::EdgePiece piece;
    piece.place = {0.075, 0.02};
    piece.outward = Eigen::Vector2d::UnitX();
    piece.along = Eigen::Vector2d::UnitY();
    piece.sine = 0.96;
    piece.cosine = 0.28;
    piece.weight = 0.01;
    piece.span = 0.156;
    piece.run = 0.15;
    double turn = 0.0;
    for (auto _ : state) {
        turn += 1e-3;
        benchmark::DoNotOptimize(
            solver::edge_factors(piece, 51.1, {0.5 * std::cos(turn), 0.5 * std::sin(turn)}));
    }
}
BENCHMARK(edge_piece);

}  // namespace
