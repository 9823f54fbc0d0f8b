#include "solver/aperture/currents.hpp"

#include <algorithm>
#include <cmath>

#include "solver/aperture/half_plane.hpp"

namespace panelwright::solver {
namespace {

/// Whether (x, y) lies under the patch.
bool under_patch(const mesh::Panel& panel, const Eigen::Vector3d& place) {
    return std::fabs(place.x()) <= 0.5 * panel.patch.length &&
           std::fabs(place.y()) <= 0.5 * panel.patch.width;
}

/// Whether (x, y) lies on the strip between the slits of a tab.
bool on_tab_strip(const mesh::Panel& panel, const Eigen::Vector3d& place) {
    const auto* tab = std::get_if<mesh::Tab>(&panel.feed);
    return tab != nullptr && std::fabs(place.y()) <= 0.5 * tab->width &&
           place.x() < -0.5 * panel.patch.length + tab->notch_depth;
}

/// A place in the cavity, and how fast it moves with the place on the patch.
struct Stretched {
    double place;  ///< [m]
    double rate;
};

/// Where in the cavity the field of `place` on the patch is found, along one axis: edge to wall, but the
/// middle, where pins and posts stand, nearly where it is.
Stretched stretched(double place, double patch_side, double cavity_side) {
    const double more = (cavity_side / patch_side - 1.0) * std::pow(2.0 * place / patch_side, 4);
    return {place * (1.0 + more), 1.0 + 5.0 * more};
}

/// Current of the open plate at `place` [A/m]: physical optics shaped by each edge.
Eigen::Vector3cd plate_current(const PlateField& field, const Plate& plate, const Wave& wave,
                               const Eigen::Vector3d& place) {
    const auto unbroken = field.current(Eigen::Vector2d(place.x(), place.y()));
    Complex along_x = unbroken(0, 0);
    Complex along_y = unbroken(1, 0);
    for (const double distance : {place.x() - plate.x_from, plate.x_to - place.x()}) {
        const double kd = wave.wavenumber * std::max(distance, 0.0) + 1e-9;
        along_x *= hard_edge_current(kd);
        along_y *= soft_edge_current(kd);
    }
    for (const double distance : {place.y() - plate.y_from, plate.y_to - place.y()}) {
        const double kd = wave.wavenumber * std::max(distance, 0.0) + 1e-9;
        along_x *= soft_edge_current(kd);
        along_y *= hard_edge_current(kd);
    }
    return {along_x, along_y, 0.0};
}

/// Current of the pillar whose part `part` stands nearest to `place` [A/m], upwards.
Eigen::Vector3cd upright_current(const mesh::Panel& panel, const ApertureModel& model,
                                 const Eigen::VectorXcd& currents, mesh::Part part,
                                 const Eigen::Vector3d& place) {
    if (part == mesh::Part::feed) {
        if (const auto* probe = std::get_if<mesh::Probe>(&panel.feed))
            return {0.0, 0.0, currents(0) / (pi * probe->diameter)};
        const auto& tab = std::get<mesh::Tab>(panel.feed);
        const bool level = place.z() > panel.spacer.height * (1.0 - 1e-9);
        const Complex density = currents(0) / tab.width;
        return level ? Eigen::Vector3cd(density, 0.0, 0.0) : Eigen::Vector3cd(0.0, 0.0, density);
    }
    std::size_t nearest = 1;
    double shortest = std::numeric_limits<double>::infinity();
    for (std::size_t p = 1; p < model.pillars.size(); ++p) {
        const double distance = std::hypot(place.x() - model.pillars[p].x, place.y() - model.pillars[p].y);
        if (distance < shortest) {
            shortest = distance;
            nearest = p;
        }
    }
    return {0.0, 0.0,
            currents(static_cast<Eigen::Index>(nearest)) / (pi * panel.posts[nearest - 1].diameter)};
}

}  // namespace

SurfaceCurrent aperture_currents(const mesh::Panel& panel, const ApertureModel& model, const Wave& wave,
                                 const DrivenCavity& state, Complex feed_current,
                                 const Eigen::VectorXcd& rim_voltage, const mesh::SheetMesh& mesh) {
    const Eigen::VectorXcd currents = feed_current * state.currents;
    const std::size_t count = mesh.triangles.size();
    SurfaceCurrent out(count, Eigen::Vector3cd::Zero());
    std::vector<Eigen::Vector2d> inside;   // places in the cavity
    std::vector<Eigen::Vector2d> squeeze;  // of the lines of current there, which keeps their total
    std::vector<std::size_t> inside_triangle;
    std::vector<std::size_t> open_triangle;
    for (std::size_t t = 0; t < count; ++t) {
        const Eigen::Vector3d place = centroid(mesh, t);
        const mesh::Part part = mesh.part[t];
        if (part == mesh::Part::feed || part == mesh::Part::post) {
            out[t] = upright_current(panel, model, currents, part, place);
        } else if (part == mesh::Part::patch && on_tab_strip(panel, place)) {
            out[t] = {currents(0) / std::get<mesh::Tab>(panel.feed).width, 0.0, 0.0};
        } else if (under_patch(panel, place)) {
            const Stretched x = stretched(place.x(), panel.patch.length, model.cavity.length);
            const Stretched y = stretched(place.y(), panel.patch.width, model.cavity.width);
            inside.emplace_back(x.place, y.place);
            squeeze.emplace_back(y.rate, x.rate);
            inside_triangle.push_back(t);
        } else if (part == mesh::Part::reflector) {
            open_triangle.push_back(t);
        }
    }
    const auto field = cavity_field(model.cavity, wave, state.loss, model.pillars, currents, inside);
    const Complex scale(0.0, 1.0 / (wave.omega * vacuum_permeability * model.cavity.height));
    for (std::size_t i = 0; i < inside.size(); ++i) {
        const std::size_t t = inside_triangle[i];
        const double sense = mesh.part[t] == mesh::Part::patch ? 1.0 : -1.0;
        out[t] = {sense * scale * squeeze[i].x() * field[i].gradient.x(),
                  sense * scale * squeeze[i].y() * field[i].gradient.y(), 0.0};
    }
    const PlateField rim_field(model.rim, rim_voltage, wave.wavenumber);
    const auto open = static_cast<std::ptrdiff_t>(open_triangle.size());
#pragma omp parallel for schedule(static)
    for (std::ptrdiff_t i = 0; i < open; ++i) {
        const std::size_t t = open_triangle[static_cast<std::size_t>(i)];
        out[t] = plate_current(rim_field, model.plate, wave, centroid(mesh, t));
    }
    return out;
}

}  // namespace panelwright::solver
