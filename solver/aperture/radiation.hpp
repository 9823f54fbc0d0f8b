/// Far field of the rim over the finite plate.
#pragma once

#include <vector>

#include "solver/aperture/edge_diffraction.hpp"
#include "solver/aperture/rim.hpp"
#include "solver/far_field.hpp"
#include "solver/wave.hpp"

namespace panelwright::solver {

/// Far fields, one for each column of `voltage` (n, s), over the whole sphere at about `step` [rad]: rim in
/// free space, plus the physical-optics current of the plate by quadrature over its whole area, plus its
/// fringe currents. All parts are continuous in every direction, front and back, shadow boundaries and the
/// rear axis included.
///
/// They are evaluated on a coarser sphere that resolves every harmonic a source of the plate's size can
/// radiate, and interpolated trigonometrically, which is exact for those harmonics.
std::vector<FarField> panel_far_fields(const Wave& wave, const Rim& rim, const Plate& plate,
                                       const Eigen::MatrixXcd& voltage, DiffractionOrder order, double step);

/// Radiated powers of fields driven together: half the integral over the sphere of E_a conj(E_b) / eta for
/// each pair, an (s, s) Hermitian matrix [W].
Eigen::MatrixXcd mutual_powers(const std::vector<FarField>& fields);

/// Far fields like `panel_far_fields`, on a sphere just fine enough for `mutual_powers`.
std::vector<FarField> power_fields(const Wave& wave, const Rim& rim, const Plate& plate,
                                   const Eigen::MatrixXcd& voltage, DiffractionOrder order);

/// Trigonometric interpolation of a whole-sphere far field to another step. Exact for fields whose harmonics
/// the given grid resolves. Throws std::invalid_argument on a grid not made by `whole_sphere`.
FarField interpolate_sphere(const FarField& field, double step);

}  // namespace panelwright::solver
