/// Panels that the aperture method's tests share.
#pragma once

#include <string_view>

#include "mesh/panel.hpp"
#include "solver/result.hpp"
#include "solver/solution.hpp"

namespace panelwright::test {

/// A patch in air with a pin over a square reflector, all metal perfect: half a wavelength at 2.37 GHz.
inline mesh::Panel probe_panel(double reflector_side) {
    mesh::Panel panel;
    panel.patch = {0.054, 0.064, 0.0, mesh::perfect_conductivity};
    panel.spacer = {0.005, 1.0, 0.0};
    panel.feed = mesh::Probe{-0.013, 0.0, 0.0008};
    panel.reflector = {reflector_side, reflector_side, 0.0, 0.0, mesh::perfect_conductivity};
    return panel;
}

/// The same room with a tab.
inline mesh::Panel tab_panel(double reflector_side) {
    mesh::Panel panel = probe_panel(reflector_side);
    panel.feed = mesh::Tab{0.005, 0.006, 0.001, 0.002};
    return panel;
}

/// One pattern at `frequency` [Hz] in the middle of a band of `points` from 4 % below to 4 % above.
inline solver::Task task_at(double frequency, int points = 3) {
    solver::Task task;
    for (int i = 0; i < points; ++i) task.band.push_back(frequency * (0.96 + 0.08 * i / (points - 1)));
    task.pattern_at = {frequency};
    task.pattern_step = 5.0 * solver::pi / 180.0;
    return task;
}

/// First value of the health entry `name`.
inline double health(const solver::Solution& solution, std::string_view name) {
    for (const solver::HealthEntry& entry : solution.health)
        if (entry.name == name) return entry.values.at(0);
    throw std::out_of_range("no such health entry");
}

}  // namespace panelwright::test
