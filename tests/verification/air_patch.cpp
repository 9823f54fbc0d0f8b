#include "tests/verification/air_patch.hpp"

#include <array>
#include <cmath>

#include "solver/aperture/aperture.hpp"
#include "solver/aperture/closed_formulas.hpp"
#include "solver/aperture/fringing.hpp"
#include "solver/constants.hpp"
#include "tests/reference/air_patch_rooftop.hpp"

namespace panelwright::test {
namespace {

constexpr double length = 0.054;

struct AirPatch {
    double width_over_length;
    double height_mm;
};
constexpr std::array<AirPatch, 8> patches{
    {{0.6, 2.5}, {0.6, 7.5}, {1.0, 1.0}, {1.0, 5.0}, {1.185, 5.0}, {1.185, 7.5}, {1.6, 2.5}, {1.6, 5.0}}};

/// Quality factor of the loaded cavity at its resonance.
double aperture_quality(double width, double height, double resonance) {
    const double side = 3.0 * solver::speed_of_light / resonance;
    mesh::Panel panel;
    panel.patch = {length, width, 0.0, mesh::perfect_conductivity};
    panel.spacer = {height, 1.0, 0.0};
    panel.feed = mesh::Probe{-0.3 * length, 0.0, 0.001};
    panel.reflector = {side, side, 0.0, 0.0, mesh::perfect_conductivity};
    solver::Task task;
    task.band = {resonance};
    task.pattern_at = {resonance};
    task.pattern_step = solver::pi / 18.0;
    task.accuracy = solver::Accuracy::quick;
    for (const solver::HealthEntry& entry : solver::solve_aperture(panel, task).health)
        if (entry.name == "cavity_quality_factor") return entry.values.at(0);
    return std::nan("");
}

}  // namespace

std::vector<AirPatchRow> air_patches() {
    std::vector<AirPatchRow> rows;
    for (const AirPatch& patch : patches) {
        const double width = patch.width_over_length * length;
        const double height = patch.height_mm * 1e-3;
        const double line_model = solver::line_model_resonance(length, width, height, 1.0);
        const double resonance =
            solver::fringing({length, width, 0.0, mesh::perfect_conductivity}, {height, 1.0, 0.0}).resonance;
        const RooftopResonance full = rooftop_resonance(length, width, height, line_model);
        rows.push_back({patch.width_over_length, patch.height_mm, full.frequency * 1e-9, full.quality,
                        line_model * 1e-9, resonance * 1e-9, aperture_quality(width, height, resonance)});
    }
    return rows;
}

std::vector<TabRow> tab_impedances() {
    constexpr int along = 41;  // cells of the patch
    constexpr int across = 76;
    constexpr int past = 2;  // cells of the tab past the edge, the current entering the outer one
    constexpr int set_in = 6;
    constexpr int half_tab = 3;
    RooftopSheet sheet = rectangle_sheet(0.053, 0.0612, 0.006, along);
    sheet.dy = 0.0612 / across;
    sheet.metal = Eigen::ArrayXX<bool>::Constant(along + past, across, true);
    for (int i = 0; i < past + set_in; ++i)
        for (int j = 0; j < across / 2; ++j) {
            const int from_middle = across / 2 - 1 - j;
            const bool slit = from_middle == half_tab;
            const bool beside = from_middle > half_tab;
            if (slit || (beside && i < past)) sheet.metal(i, j) = sheet.metal(i, across - 1 - j) = false;
        }
    mesh::Panel panel;
    panel.patch = {0.053, 0.0612, 0.0, mesh::perfect_conductivity};
    panel.spacer = {0.006, 1.0, 0.0};
    panel.feed = mesh::Tab{2 * half_tab * sheet.dy, set_in * sheet.dx, sheet.dy, (past - 0.5) * sheet.dx};
    panel.reflector = {0.37, 0.37, 0.0, 0.0, mesh::perfect_conductivity};
    solver::Task task;
    task.band = {2.45e9, 2.5e9, 2.55e9};
    const solver::Solution ours = solver::solve_aperture(panel, task);
    const Rooftop full(sheet);
    std::vector<TabRow> rows;
    for (std::size_t i = 0; i < task.band.size(); ++i) {
        const double k = 2.0 * solver::pi * task.band[i] / solver::speed_of_light;
        rows.push_back(
            {task.band[i] * 1e-9, full.impedance(k, {0, across / 2 - half_tab}), ours.port.impedance[i]});
    }
    return rows;
}

}  // namespace panelwright::test
