/// The table of a study: one row a design.
#pragma once

#include <cstddef>
#include <filesystem>
#include <limits>
#include <string>
#include <string_view>
#include <vector>

#include "io/case.hpp"
#include "solver/result.hpp"

namespace panelwright::app {

/// What became of a design.
enum class DesignStatus { not_reached, done, failed };

/// "not reached", "done" or "failed".
std::string_view name(DesignStatus status);

/// Figures of one method; those of the far field belong to the first pattern frequency.
struct MethodFigures {
    solver::Method method = solver::Method::aperture;
    solver::BandFigures band{};
    solver::Figures figures{};
    double power_balance = std::numeric_limits<double>::quiet_NaN();  ///< radiated plus lost over accepted
};

/// One design of a study.
struct DesignRow {
    std::size_t number = 0;           ///< from 1, in the order of the grid
    std::vector<std::string> values;  ///< (K) of the varied keys, as the columns take them
    DesignStatus status = DesignStatus::not_reached;
    std::string reason;                                                   ///< why it failed
    double pattern_frequency = std::numeric_limits<double>::quiet_NaN();  ///< of the far-field figures [Hz]
    std::vector<MethodFigures> methods;
    std::vector<std::string> remarks;  ///< of all methods, each once
};

/// The figures of a solved design, as they stand in its row.
void set_result(DesignRow& row, const solver::Result& result);

/// A name and a unit for each varied key, e.g. "reflector.length_mm"; the key alone where it has no unit. (K)
std::vector<std::string> varied_columns(const io::Case& study);

/// Rows of all designs, none of them reached yet.
std::vector<DesignRow> design_rows(const io::Case& study);

/// The table as CSV (RFC 4180): design, the varied keys, status, reason, pattern_frequency_hz, then for each
/// method METHOD.NAME for every band figure and figure and METHOD.power_balance, at last remarks, joined with
/// "; ". A figure that does not exist is "nan"; cells of a design without result are empty.
std::string designs_csv(const io::Case& study, const std::vector<DesignRow>& rows);

}  // namespace panelwright::app
