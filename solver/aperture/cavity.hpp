/// The cavity between patch and reflector: modes between magnetic side walls, fed by vertical currents.
///
/// Y. T. Lo, D. Solomon & W. F. Richards, IEEE Trans. Antennas Propag. 27(2), 137-145, 1979; the double sum
/// over modes is carried out in closed form along x, so that the series over n alone remains and converges
/// like 1/n^3.
#pragma once

#include <Eigen/Core>
#include <span>
#include <vector>

#include "solver/far_field.hpp"
#include "solver/wave.hpp"

namespace panelwright::solver {

/// The equivalent cavity: |x| <= length/2, |y| <= width/2, 0 <= z <= height, magnetic walls at the sides.
struct Cavity {
    double length = 0.0;        ///< along x [m]
    double width = 0.0;         ///< along y [m]
    double height = 0.0;        ///< [m]
    double permittivity = 1.0;  ///< relative
};

/// A vertical current through the cavity, spread evenly over `width` along y and centred at (x, y).
///
/// A round pin of radius r acts like a flat strip of uniform current of width r exp(3/2): both have the
/// geometric mean distance r (J. C. Maxwell's; F. W. Grover, Inductance Calculations, 1946, ch. 3).
struct Pillar {
    double x = 0.0;             ///< [m]
    double y = 0.0;             ///< [m]
    double width = 0.0;         ///< [m], positive
    double second_x = 0.0;      ///< where the rest of the current runs [m]
    double second_share = 0.0;  ///< share of the current that runs at `second_x` instead of `x`, 0..1
};

/// The flat strip that equals a round pin of `diameter` [m].
double equivalent_strip(double diameter);

/// Voltage from reflector to patch averaged over pillar `at`, for 1 A upwards through pillar `source` [ohm].
/// `loss` is the effective loss tangent of the whole cavity, positive.
Complex transfer_impedance(const Cavity& cavity, const Wave& wave, double loss, const Pillar& source,
                           const Pillar& at);

/// Voltage and its gradient at one place.
struct CavityField {
    Complex voltage;            ///< patch against reflector [V]
    Eigen::Vector2cd gradient;  ///< along x and y [V/m]
};

/// Field at `points` (inside the cavity or on its walls) for `currents` [A] upwards through `pillars`. Within
/// about the width of a pillar the field is smoothed.
std::vector<CavityField> cavity_field(const Cavity& cavity, const Wave& wave, double loss,
                                      std::span<const Pillar> pillars, const Eigen::VectorXcd& currents,
                                      std::span<const Eigen::Vector2d> points);

/// Currents [A] through all pillars for 1 A through the first, the others being joined to patch and reflector
/// (no voltage across them).
Eigen::VectorXcd pillar_currents(const Cavity& cavity, const Wave& wave, double loss,
                                 std::span<const Pillar> pillars);

/// Impedance at the first pillar [ohm] when `currents`, those of `pillar_currents`, run through the pillars.
Complex driving_impedance(const Cavity& cavity, const Wave& wave, double loss,
                          std::span<const Pillar> pillars, const Eigen::VectorXcd& currents);

/// Impedance at the first pillar [ohm], the others being joined to patch and reflector.
Complex driving_impedance(const Cavity& cavity, const Wave& wave, double loss,
                          std::span<const Pillar> pillars);

}  // namespace panelwright::solver
