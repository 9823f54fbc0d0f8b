/// A brass panel with a tab for 2.45 GHz as they are cut by hand: common practice, and what this program
/// says.
#pragma once

#include <string>
#include <vector>

#include "mesh/panel.hpp"

namespace panelwright::test {

/// What practice knows. No printed source: rules of thumb handed on among those who cut such panels, tested
/// loosely.
///
/// A patch of 0.5 mm brass, 61.2 mm wide and 53 mm long, 6 mm over a reflector 75 to 80 mm square, its tab 5
/// mm wide, set in 7.8 mm by two saw cuts and 15.6 mm long in all, so that it reaches 1.8 mm past the edge
/// before it bends down 6 mm, shows its dip of the return loss at 2.44 to 2.48 GHz. A reflector of about 100
/// by 95 mm gives a little more forward gain. Half a millimetre of cutting error hardly matters there; above
/// 5 GHz hand cutting becomes difficult. The usual formula gives the patch as 61.18 by 52.94 mm.
inline constexpr double practice_dip_from_ghz = 2.44;
inline constexpr double practice_dip_to_ghz = 2.48;
inline constexpr double practice_width_mm = 61.18;
inline constexpr double practice_length_mm = 52.94;

/// That panel, `scale` times as large, its patch longer by `longer` [m].
mesh::Panel bench_panel(double reflector_length, double reflector_width, double scale = 1.0,
                        double longer = 0.0);

/// What the network analyser would show.
struct BenchFigures {
    double dip_ghz;  ///< frequency of the best match to 50 ohm
    double dip_db;
    double vswr;              ///< at the middle frequency, 2.45 GHz divided by the scale
    double peak_gain_dbi;     ///< there
    double front_to_back_db;  ///< there
};
BenchFigures bench_figures(const mesh::Panel& panel, double middle_hz);

/// The usual formula's patch for 2.45 GHz, 6 mm over the reflector in air [mm].
struct FormulaPatch {
    double width_mm;
    double length_mm;
};
FormulaPatch formula_patch();

}  // namespace panelwright::test
