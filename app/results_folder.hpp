/// The folder that `run` writes into: what lies where, and whose results it holds.
#pragma once

#include <filesystem>
#include <string>
#include <vector>

#include "solver/solution.hpp"

namespace panelwright::app {

/// What to do with results that are already there.
enum class Existing {
    keep,     ///< go on with those of the same case, refuse those of another
    replace,  ///< start over
};

/// Names inside a result folder.
struct ResultsFolder {
    std::filesystem::path folder;

    std::filesystem::path case_record() const { return folder / "case.toml"; }
    std::filesystem::path result() const { return folder / "result.h5"; }
    std::filesystem::path designs() const { return folder / "designs"; }
    std::filesystem::path designs_table() const { return folder / "designs.csv"; }
    /// `number` from 1: designs/0001.h5
    std::filesystem::path design(std::size_t number) const;
    std::filesystem::path s11(solver::Method method) const;
    std::filesystem::path pattern_table(solver::Method method) const;
    /// "currents_aperture": the stem of the scenes of `kind` ("currents" or "pattern").
    static std::string scene_stem(std::string_view kind, solver::Method method);
};

/// "gauge-869-results" in the working directory, for "anywhere/gauge-869.toml".
std::filesystem::path default_folder(const std::filesystem::path& case_file);

/// Refuses a folder that must not or cannot be written to; leaves nothing behind itself. `resolved` is the
/// case about to be run. Throws UsageError when the folder holds another case (naming the keys that differ)
/// or results whose case is not known, and io::FileError when `folder` is not a folder or cannot be read.
void check_folder(const ResultsFolder& folder, const std::string& resolved, Existing existing);

/// Makes the folder ready: creates it, removes earlier results (only files that this program writes) when
/// starting over, and records the case in case.toml. Throws io::FileError.
void claim_folder(const ResultsFolder& folder, const std::string& resolved, Existing existing);

}  // namespace panelwright::app
