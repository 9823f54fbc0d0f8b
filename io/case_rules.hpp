/// The rules that tie several keys of a case together, and what follows from the keys.
#pragma once

#include <vector>

#include "io/case.hpp"
#include "io/case_reading.hpp"

namespace panelwright::io {

/// Spacer height over the wavelength in the spacer at the band's centre. Below, the loss in the metal
/// outweighs radiation; above, the room under the patch holds more than the patch's fundamental mode, and no
/// method of this program has been checked there.
inline constexpr double thinnest_spacer = 0.002;
inline constexpr double thickest_spacer = 0.15;

/// Longest side of the reflector in wavelengths at the band's upper end. A full solution takes some 350
/// unknowns a square wavelength and 16 bytes times their square: 25 wavelengths square are 220,000 unknowns
/// and 770 gigabytes. Long before that the plate's size no longer matters to the beam.
inline constexpr double largest_reflector = 25.0;

/// Steps of the band [Hz], so that frequencies differ in every file as they do in memory.
inline constexpr double smallest_step = 1.0;

/// How far the estimated resonance may lie outside the band, as a factor: the estimate leaves out feed, notch
/// and sheet thickness, which shift the resonance by less. Posts can turn the patch into a quarter-wave one,
/// whose resonance lies an octave below the estimate.
inline constexpr double resonance_margin = 2.0;
inline constexpr double margin_with_posts = 4.0;

/// Resonance that a patch of `length` and `width` [m] is expected to have, within a few percent to a tenth
/// [Hz]: half a wavelength in the line of that width, lengthened by the fringing field at both ends. E. O.
/// Hammerstad, 5th European Microwave Conf., 1975; C. A. Balanis, Antenna Theory, 4th ed., eqs (14-1) to
/// (14-4).
double estimated_resonance(double length, double width, double height, double permittivity);

/// `reading` with the defaults that follow from other keys: band.points, band.pattern_at and
/// solve.methods.
Reading with_derived_defaults(Reading reading);

/// Every broken rule among keys that are good on their own. `reading` must come from `with_derived_defaults`.
std::vector<CaseProblem> broken_rules(const Reading& reading);

/// The panel; NaN stands for every number that is not in `reading`.
mesh::Panel panel(const Reading& reading);

/// The task; every key that it needs must be in `reading`.
solver::Task task(const Reading& reading);

/// The methods, in the order of the file.
std::vector<solver::Method> methods(const Reading& reading);

}  // namespace panelwright::io
