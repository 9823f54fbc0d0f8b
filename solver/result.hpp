/// A solved design: what `io` writes and `viz` draws, and the only thing both know.
#pragma once

#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "mesh/panel.hpp"
#include "solver/solution.hpp"

namespace panelwright::solver {

/// Figures of the port over the band; NaN = does not exist.
struct BandFigures {
    double resonance_hz;   ///< greatest input resistance of the fundamental mode
    double best_match_hz;  ///< least |S11|
    double best_match_db;  ///< |S11| there
    double vswr2_from_hz;  ///< band of VSWR <= 2 around the best match
    double vswr2_to_hz;
    double bandwidth_percent;  ///< of that band, over its centre
};

/// One row of the band-figure table.
struct BandFigureEntry {
    std::string_view name;
    std::string_view label;
    std::string_view unit;
    std::string_view definition;
    double BandFigures::*value;
};

/// All band figures in the order they are shown.
std::span<const BandFigureEntry> band_figure_table();

/// Band figures of a port response against the real `reference` [ohm]. Extremes between points are refined by
/// a parabola, band edges by linear interpolation of |S11|; a figure that would lie outside the band is NaN
/// (the best match is then the best band edge). Empty or single-point bands are allowed; points that are NaN
/// are passed over. Throws std::invalid_argument when the frequencies do not ascend, do not match the
/// impedances, or `reference` is not positive.
BandFigures band_figures(const PortResponse& port, double reference);

/// One method's answer with its figures.
struct MethodResult {
    Solution solution;
    BandFigures band;
    std::vector<Figures> figures;  ///< (P)
};

/// A solved design.
struct Result {
    std::string title;
    std::string case_text;      ///< the case file, verbatim
    std::string case_resolved;  ///< the case with all defaults filled in, as TOML
    mesh::Panel panel;
    double reference_impedance = 50.0;  ///< [ohm]
    std::vector<MethodResult> methods;
};

/// Attaches the figures to a solution. S11 at a pattern frequency between band points is interpolated by a
/// cubic; it is NaN, and so is the realized gain, outside the band. Throws std::invalid_argument when
/// patterns and powers differ in number, and as `figures` and `band_figures` do.
MethodResult with_figures(Solution solution, double reference);

}  // namespace panelwright::solver
