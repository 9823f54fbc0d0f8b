/// Air patches over an unbounded plane: the plain full solution of tests/reference against this program.
/// Takes a minute.
#pragma once

#include <vector>

#include "solver/far_field.hpp"

namespace panelwright::test {

/// One patch, 54 mm long.
struct AirPatchRow {
    double width_over_length;
    double height_mm;
    double full_resonance_ghz;  ///< greatest input resistance, extrapolated to cells of no size
    double full_quality;
    double line_model_ghz;  ///< textbook formula
    double resonance_ghz;   ///< this method: solver::fringing
    double quality;         ///< this method: the loaded cavity over a reflector of 3 wavelengths
};
std::vector<AirPatchRow> air_patches();

/// Input impedance of a tab-fed patch at one frequency.
struct TabRow {
    double frequency_ghz;
    solver::Complex full;      ///< on a grid of 1.29 by 0.81 mm, unbounded plane
    solver::Complex aperture;  ///< this method over a reflector of 3 wavelengths
};

/// A patch of 53 by 61.2 mm at 6 mm, its tab 4.8 mm wide set in 7.8 mm by slits of 0.8 mm, bent down 1.9 mm
/// past the edge.
std::vector<TabRow> tab_impedances();

}  // namespace panelwright::test
