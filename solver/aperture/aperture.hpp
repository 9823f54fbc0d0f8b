/// The method `aperture`: cavity model, aperture radiation, reflector edge diffraction.
#pragma once

#include "mesh/panel.hpp"
#include "solver/solution.hpp"

namespace panelwright::solver {

/// Solves `panel` with the cavity model and edge diffraction; see docs/theory/aperture.md for the formulation, its
/// sources and its limits. Throws std::invalid_argument when `mesh::problems(panel)` is not empty or `task` has an
/// empty band.
Solution solve_aperture(const mesh::Panel& panel, const Task& task);

}  // namespace panelwright::solver
