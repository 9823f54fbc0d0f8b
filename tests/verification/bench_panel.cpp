#include "tests/verification/bench_panel.hpp"

#include <cmath>

#include "solver/aperture/aperture.hpp"
#include "solver/aperture/closed_formulas.hpp"
#include "solver/constants.hpp"
#include "solver/result.hpp"

namespace panelwright::test {

mesh::Panel bench_panel(double reflector_length, double reflector_width, double scale, double longer) {
    constexpr double brass =
        2.564e7;  // D. M. Pozar, Microwave Engineering, app. F; alloys span 1.5e7 to 2.6e7
    mesh::Panel panel;
    panel.patch = {scale * 0.053 + longer, scale * 0.0612, scale * 0.0005, brass};
    panel.spacer = {scale * 0.006, 1.0, 0.0};
    panel.feed = mesh::Tab{scale * 0.005, scale * 0.0078, scale * 0.0008, scale * 0.0018};
    panel.reflector = {reflector_length, reflector_width, 0.0, 0.0, brass};
    return panel;
}

BenchFigures bench_figures(const mesh::Panel& panel, double middle_hz) {
    solver::Task task;
    for (int i = -40; i <= 40; ++i) task.band.push_back(middle_hz * (1.0 + 0.0025 * i));
    task.pattern_at = {middle_hz};
    const solver::MethodResult result = with_figures(solver::solve_aperture(panel, task), 50.0);
    const double mismatch = std::abs(solver::reflection(result.solution.port.impedance[40], 50.0));
    return {result.band.best_match_hz * 1e-9, result.band.best_match_db, (1.0 + mismatch) / (1.0 - mismatch),
            result.figures[0].peak_gain_dbi, result.figures[0].front_to_back_db};
}

FormulaPatch formula_patch() {
    constexpr double frequency = 2.45e9;
    constexpr double height = 0.006;
    const double width = solver::practical_width(frequency, 1.0);
    const double permittivity = solver::effective_permittivity(1.0, height, width);
    const double extension = solver::length_extension(permittivity, height, width);
    return {1e3 * width, 1e3 * solver::patch_length(frequency, permittivity, extension)};
}

}  // namespace panelwright::test
