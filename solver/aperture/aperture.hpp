/// The method `aperture`: cavity model, aperture radiation, reflector edge diffraction.
#pragma once

#include <string>
#include <vector>

#include "mesh/panel.hpp"
#include "mesh/triangulate.hpp"
#include "solver/solution.hpp"

namespace panelwright::solver {

/// Solves `panel` with the cavity model and edge diffraction; see docs/theory/aperture.md for the
/// formulation, its sources and its limits. Throws std::invalid_argument when `mesh::problems(panel)` is not
/// empty or `task` has an empty band.
Solution solve_aperture(const mesh::Panel& panel, const Task& task);

/// How `solve_aperture` cuts the sheets for the currents: cells of a share of the shortest wavelength, larger
/// where there would be too many.
mesh::MeshOptions aperture_mesh_options(const mesh::Panel& panel, const Task& task);

/// Limits of validity of the method that `panel` touches, one sentence each; told without solving.
std::vector<std::string> aperture_remarks(const mesh::Panel& panel, const Task& task);

}  // namespace panelwright::solver
