/// Running all designs of a study.
#pragma once

#include <vector>

#include "app/designs_table.hpp"
#include "app/results_folder.hpp"
#include "app/stop_signals.hpp"
#include "io/case.hpp"

namespace panelwright::app {

/// What a study came to.
struct StudyOutcome {
    std::vector<DesignRow> rows;  ///< all designs in the order of the grid
    bool stopped = false;         ///< a signal came before the last design
};

/// Solves the designs of `study`, `threads` of them at a time with one thread each, and writes
/// designs/NNNN.h5 and designs.csv. A design whose file is there, from the same case and the same program, is
/// not solved again. A design that fails is recorded and the others go on; a fault of the whole run (disk
/// full, folder gone) stops it and is thrown as io::FileError. Memory does not grow with the number of
/// designs, but for a row of figures each.
StudyOutcome run_study(const io::Case& study, const ResultsFolder& folder, int threads, StopSignals& signals);

}  // namespace panelwright::app
