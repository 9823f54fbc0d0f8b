/// Surface currents of the aperture method on a mesh.
#pragma once

#include "mesh/panel.hpp"
#include "mesh/sheet_mesh.hpp"
#include "solver/aperture/drive.hpp"
#include "solver/solution.hpp"

namespace panelwright::solver {

/// Current at every triangle's centroid [A/m] for `feed_current` [A] through the feed: under the patch that
/// of the cavity's field, equal and opposite on patch and reflector; on the open plate that of the rim's
/// field, shaped near each edge by the exact half-plane current; pins, posts and tab carry their total
/// current evenly. Towards its walls the cavity's field is squeezed under the true patch, so that the current
/// across the patch's edges vanishes there, all currents keep their total, and pins stay in their place.
SurfaceCurrent aperture_currents(const mesh::Panel& panel, const ApertureModel& model, const Wave& wave,
                                 const DrivenCavity& state, Complex feed_current,
                                 const Eigen::VectorXcd& rim_voltage, const mesh::SheetMesh& mesh);

}  // namespace panelwright::solver
