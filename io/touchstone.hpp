/// Touchstone 1.x one-port files (IBIS Open Forum; Touchstone is a registered trademark of Keysight
/// Technologies).
#pragma once

#include <filesystem>
#include <string>
#include <vector>

#include "io/file.hpp"
#include "solver/far_field.hpp"

namespace panelwright::io {

/// One-port network data.
struct OnePort {
    std::vector<double> frequency;     ///< (F) [Hz], ascending
    std::vector<solver::Complex> s11;  ///< (F)
    double reference = 50.0;           ///< [ohm]
};

/// Writes `# Hz S RI R <reference>`, one frequency a line, each number with the digits that bring it back
/// exactly. The lines of `comment` stand above the option line, in ASCII (other characters become '?');
/// nothing but numbers stands below it. Throws FileError, and std::invalid_argument where the data are not
/// those of a one-port: counts that differ, frequencies that do not rise, a number that is not finite, a
/// reference that is not positive.
void write_touchstone(const std::filesystem::path& path, const OnePort& data, const std::string& comment);

/// Reads a one-port file of version 1.x: any unit, RI, MA or DB, in any letter case and order, comments
/// anywhere. What an option line leaves out is, as the specification says, GHz, S, MA and R 50; further
/// option lines are ignored. Throws FileError with the line for anything else: no option line, another
/// parameter than S, other than three numbers in a line, frequencies that do not rise.
OnePort read_touchstone(const std::filesystem::path& path);

}  // namespace panelwright::io
