/// Running a case with one design.
#pragma once

#include <filesystem>
#include <optional>
#include <vector>

#include "app/results_folder.hpp"
#include "app/stop_signals.hpp"
#include "io/case.hpp"
#include "io/result_file.hpp"
#include "solver/result.hpp"

namespace panelwright::app {

/// Solves every method of `problem`; nothing when a signal came in between. Throws SolveError.
std::optional<solver::Result> solve_all(const io::Case& problem, StopSignals& signals);

/// Writes all files of a single design and says which; result.h5 comes last. Stops between two files when a
/// signal has come; the files that are then missing are not in the list. Throws io::FileError.
std::vector<std::filesystem::path> write_files(const ResultsFolder& folder, const solver::Result& result,
                                               const io::Provenance& made, StopSignals& signals);

}  // namespace panelwright::app
