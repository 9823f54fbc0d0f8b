/// Touchstone 1.x one-port files (IBIS Open Forum; Touchstone is a registered trademark of Keysight Technologies).
#pragma once

#include <filesystem>

#include "io/result_file.hpp"

namespace panelwright::io {

/// One-port network data.
struct OnePort {
    std::vector<double> frequency;     ///< (F) [Hz], ascending
    std::vector<solver::Complex> s11;  ///< (F)
    double reference = 50.0;           ///< [ohm]
};

/// Writes `# Hz S RI R <reference>`, one frequency a line. Throws FileError.
void write_touchstone(const std::filesystem::path& path, const OnePort& data, const std::string& comment);

/// Reads a one-port file of version 1.x: any unit, RI, MA or DB, comments anywhere. Throws FileError with the line.
OnePort read_touchstone(const std::filesystem::path& path);

}  // namespace panelwright::io
