#include "app/estimate.hpp"

#include <algorithm>
#include <cmath>
#include <stdexcept>

#include "mesh/triangulate.hpp"
#include "solver/aperture/aperture.hpp"
#include "solver/aperture/cavity.hpp"
#include "solver/wave.hpp"

namespace panelwright::app {
namespace {

/// Time for the currents in the posts: a series for every pair of feed and posts, at every point of the band
/// and some six times at each of about ten frequencies to which the losses are fitted. A term was measured to
/// take 0.12 us of all this with 20 and with 45 posts.
double post_seconds(const mesh::Panel& panel, const solver::Task& task) {
    if (panel.posts.empty()) return 0.0;
    double diameter = panel.posts.front().diameter;
    for (const mesh::Post& post : panel.posts) diameter = std::min(diameter, post.diameter);
    const double terms =
        std::clamp(8.0 * panel.patch.width / solver::equivalent_strip(diameter), 40.0, 4000.0);
    const double pairs = std::pow(1.0 + static_cast<double>(panel.posts.size()), 2.0);
    constexpr double loss_frequencies = 10.0;
    constexpr double rounds = 6.0;
    return 0.12e-6 * pairs * terms * (static_cast<double>(task.band.size()) + loss_frequencies * rounds);
}

/// Measured on cases of 0.6 to 12 wavelengths: a share for the mesh and the port, one for each pattern with
/// its files, the walk round the reflector's edges, which grows with the plate's area in squared
/// wavelengths, and the posts.
Estimate aperture(const io::Case& design) {
    const mesh::Panel& panel = design.panel;
    const solver::Task& task = design.task;
    const auto patterns = static_cast<double>(task.pattern_at.size());
    const double directions = 2.0 * std::pow(solver::pi / task.pattern_step, 2.0);
    constexpr double usual_directions = 16200.0;  // at a step of 2 degrees
    const double half_diagonal = 0.5 * std::hypot(panel.reflector.length, panel.reflector.width);
    const double area = std::pow(half_diagonal / solver::Wave(task.band.back()).wavelength, 2.0);

    Estimate cost;
    cost.unknowns = 1 + panel.posts.size();
    cost.triangles = mesh::predicted_size(panel, solver::aperture_mesh_options(panel, task)).triangles;
    cost.memory = 10e6 + 150.0 * directions * patterns;
    cost.seconds = 0.02 + 0.03 * area + patterns * (0.04 + 0.018 * area) * directions / usual_directions +
                   post_seconds(panel, task);
    return cost;
}

}  // namespace

Estimate estimate(const io::Case& design, solver::Method method) {
    if (method != solver::Method::aperture)
        throw std::invalid_argument("this version does not contain the method");
    return aperture(design);
}

}  // namespace panelwright::app
