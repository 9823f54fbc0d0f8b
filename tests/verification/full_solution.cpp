#include "tests/verification/full_solution.hpp"

#include <array>
#include <boost/math/interpolators/makima.hpp>
#include <cmath>

#include "solver/aperture/aperture.hpp"
#include "solver/constants.hpp"

namespace panelwright::test {
namespace {

constexpr std::array<ReflectorRow, 8> by_reflector{{{72, 58, 15, 8.96, 8.96, 62.9, 71.5, 12.04, 11.92},
                                                    {84, 53, 24, 9.15, 9.15, 61.8, 68.5, 15.06, 14.73},
                                                    {100, 53, 27, 9.35, 9.37, 59.9, 65.3, 17.34, 16.63},
                                                    {124, 53, 28, 9.82, 9.90, 55.0, 64.1, 18.32, 18.14},
                                                    {150, 54, 29, 10.45, 10.48, 49.6, 61.3, 19.27, 19.19},
                                                    {200, 55, 28, 10.16, 10.24, 54.6, 69.1, 23.85, 23.27},
                                                    {250, 54, 28, 9.53, 9.55, 64.6, 72.4, 24.61, 22.90},
                                                    {310, 54, 28, 9.43, 9.43, 65.1, 70.3, 26.90, 24.44}}};

constexpr std::array<FrequencyRow, 7> by_frequency{{{2.32, 70.7, 95.2, 10.13, 53.2, 64.0, 20.06},
                                                    {2.36, 86.4, 66.5, 10.31, 51.9, 62.8, 19.81},
                                                    {2.40, 74.5, 36.8, 10.42, 50.6, 61.9, 19.53},
                                                    {2.44, 52.8, 26.9, 10.48, 49.5, 61.3, 19.25},
                                                    {2.48, 36.7, 28.8, 10.48, 48.4, 60.9, 18.97},
                                                    {2.52, 26.9, 34.1, 10.42, 47.4, 60.9, 18.70},
                                                    {2.56, 20.9, 39.7, 10.32, 46.5, 61.2, 18.44}}};

/// Boresight over 180 deg: the peak's ratio less what boresight is below the peak.
double boresight_ratio(const solver::Figures& f) {
    return f.front_to_back_db - (f.peak_gain_dbi - f.boresight_gain_dbi);
}

}  // namespace

std::span<const ReflectorRow> full_solution_by_reflector() {
    return by_reflector;
}
std::span<const FrequencyRow> full_solution_by_frequency() {
    return by_frequency;
}

mesh::Panel air_panel(double reflector_side) {
    mesh::Panel panel;
    panel.patch = {0.054, 0.064, 0.0, mesh::perfect_conductivity};
    panel.spacer = {0.005, 1.0, 0.0};
    panel.feed = mesh::Probe{-0.013, 0.0, 0.0008};
    panel.reflector = {reflector_side, reflector_side, 0.0, 0.0, mesh::perfect_conductivity};
    return panel;
}

ReflectorRow aperture_by_reflector(double side_mm) {
    solver::Task task;
    task.band = {full_solution_frequency};
    task.pattern_at = {full_solution_frequency};
    const solver::MethodResult result =
        with_figures(solver::solve_aperture(air_panel(side_mm * 1e-3), task), 50.0);
    const solver::Complex z = result.solution.port.impedance[0];
    const solver::Figures& f = result.figures[0];
    return {side_mm,      z.real(),     z.imag(),           f.boresight_gain_dbi, f.peak_gain_dbi,
            f.hpbw_e_deg, f.hpbw_h_deg, boresight_ratio(f), f.front_to_rear_db};
}

std::vector<FrequencyRow> aperture_by_frequency() {
    solver::Task task;
    for (const FrequencyRow& row : by_frequency) task.band.push_back(row.frequency_ghz * 1e9);
    task.pattern_at = task.band;
    const solver::MethodResult result = with_figures(solver::solve_aperture(air_panel(0.15), task), 50.0);
    std::vector<FrequencyRow> rows;
    for (std::size_t i = 0; i < task.band.size(); ++i) {
        const solver::Complex z = result.solution.port.impedance[i];
        const solver::Figures& f = result.figures[i];
        rows.push_back({by_frequency[i].frequency_ghz, z.real(), z.imag(), f.peak_gain_dbi, f.hpbw_e_deg,
                        f.hpbw_h_deg, boresight_ratio(f)});
    }
    return rows;
}

double aperture_resonance_ghz() {
    solver::Task task;
    for (int i = 0; i <= 60; ++i) task.band.push_back(2.2e9 + i * 0.4e9 / 60);
    return with_figures(solver::solve_aperture(air_panel(0.15), task), 50.0).band.resonance_hz * 1e-9;
}

Maximum maximum(const std::vector<double>& x, const std::vector<double>& y) {
    std::vector<double> places = x;
    std::vector<double> values = y;
    const boost::math::interpolators::makima<std::vector<double>> spline(std::move(places),
                                                                         std::move(values));
    Maximum found{x.front(), y.front()};
    constexpr int steps = 5000;
    for (int i = 0; i <= steps; ++i) {
        const double at = x.front() + (x.back() - x.front()) * i / steps;
        if (const double value = spline(at); value > found.value) found = {at, value};
    }
    return found;
}

GainCurve aperture_gain_curve(int steps) {
    const double wavelength_mm = 1e3 * solver::speed_of_light / full_solution_frequency;
    GainCurve curve;
    for (int i = (6 * steps + 9) / 10; 2 * i <= 5 * steps; ++i) {
        const double side = i * wavelength_mm / steps;
        solver::Task task;
        task.band = {full_solution_frequency};
        task.pattern_at = {full_solution_frequency};
        task.accuracy = solver::Accuracy::quick;
        task.pattern_step = solver::pi / 60.0;
        const auto result = with_figures(solver::solve_aperture(air_panel(side * 1e-3), task), 50.0);
        curve.side_mm.push_back(side);
        curve.peak_gain_dbi.push_back(result.figures[0].peak_gain_dbi);
    }
    return curve;
}

}  // namespace panelwright::test
