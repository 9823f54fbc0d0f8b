#include "app/estimate.hpp"

#include <cmath>
#include <stdexcept>

#include "mesh/triangulate.hpp"
#include "solver/aperture/aperture.hpp"
#include "solver/wave.hpp"

namespace panelwright::app {
namespace {

/// Measured on cases of 0.6 to 12 wavelengths: a share for the mesh and the port, one for each pattern with
/// its files, and the walk round the reflector's edges, which grows with the plate's area in squared
/// wavelengths.
Estimate aperture(const io::Case& design) {
    const mesh::Panel& panel = design.panel;
    const solver::Task& task = design.task;
    const auto patterns = static_cast<double>(task.pattern_at.size());
    const double directions = 2.0 * std::pow(solver::pi / task.pattern_step, 2.0);
    constexpr double usual_directions = 16200.0;  // at a step of 2 degrees
    const double half_diagonal = 0.5 * std::hypot(panel.reflector.length, panel.reflector.width);
    const double area = std::pow(half_diagonal / solver::Wave(task.band.back()).wavelength, 2.0);

    Estimate cost;
    cost.triangles = mesh::predicted_size(panel, solver::aperture_mesh_options(panel, task)).triangles;
    cost.memory = 10e6 + 150.0 * directions * patterns;
    cost.seconds = 0.02 + 0.03 * area + patterns * (0.04 + 0.018 * area) * directions / usual_directions;
    return cost;
}

}  // namespace

Estimate estimate(const io::Case& design, solver::Method method) {
    if (method != solver::Method::aperture)
        throw std::invalid_argument("this version does not contain the method");
    return aperture(design);
}

}  // namespace panelwright::app
