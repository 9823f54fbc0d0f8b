/// The figures of merit: pure functions of a far field and the powers at the port.
#pragma once

#include <complex>
#include <span>
#include <string_view>

#include "solver/far_field.hpp"

namespace panelwright::solver {

/// Figures for one pattern frequency; the definitions stand in `figure_table()`. NaN = does not exist.
struct Figures {
    double peak_gain_dbi;
    double boresight_gain_dbi;
    double realized_gain_dbi;
    double directivity_dbi;
    double radiation_efficiency;
    double hpbw_e_deg;
    double hpbw_h_deg;
    double front_to_back_db;
    double front_to_rear_db;
    double squint_deg;
    double cross_polar_db;
    double axial_ratio_db;
};

/// One row of the figure table, used by the files, the screen and the docs alike.
struct FigureEntry {
    std::string_view name;        ///< the same in CSV, HDF5 and JSON: "peak_gain_dbi"
    std::string_view label;       ///< the trade's words, for a table on screen: "peak gain"
    std::string_view unit;        ///< "dBi", "dB", "deg" or "1"
    std::string_view definition;  ///< one sentence
    double Figures::*value;
};

/// All figures in the order they are shown.
std::span<const FigureEntry> figure_table();

/// Powers at the port and in the far field [W].
struct Powers {
    double accepted = 1.0;
    double radiated = 0.0;      ///< integral of the far field
    double conductor = 0.0;     ///< lost in metal
    double dielectric = 0.0;    ///< lost in the spacer
    double surface_wave = 0.0;  ///< carried off in the spacer
};

/// Figures of a whole-sphere far field. `s11` against the feed's reference impedance at the same frequency;
/// NaN there leaves only the realized gain NaN. Gains are those of the grid's own directions (at a step of 2
/// deg and a beamwidth of 50 deg at most 0.005 dB below the beam's true top); squint and beamwidths refine
/// the peak by a parabola in dB. Among directions within 1e-9 of the greatest intensity the one nearest
/// boresight counts as the peak. Ratios to a direction without field stop at 200 dB, gains at -200 dBi.
/// Without any field, gains are -200 dBi and every figure that needs a peak is NaN. Throws
/// std::invalid_argument when the grid is not one made by `whole_sphere` or no power is accepted.
Figures figures(const FarField& field, const Powers& powers, std::complex<double> s11);

/// Half-power beamwidth [rad] of a closed cut about its own peak: `intensity` (n) at equal steps round the
/// whole circle. The peak's level is refined by a parabola in dB where both neighbours lie within 3 dB of it;
/// half-power points are found by linear interpolation of the intensity in dB; NaN where the cut has none.
/// Among equal peaks the one nearest to the first sample counts.
double half_power_beamwidth(std::span<const double> intensity);

/// Sense of rotation at boresight by IEEE Std 145, in words: "linear" above 40 dB axial ratio, else
/// "right-hand, …" or "left-hand, …"; "none: …" without a field there. Throws std::invalid_argument when the
/// grid does not start at theta = 0.
std::string_view polarisation_sense(const FarField& field);

}  // namespace panelwright::solver
