/// Patterns as CSV.
#pragma once

#include <filesystem>
#include <string>
#include <vector>

#include "io/file.hpp"
#include "solver/far_field.hpp"
#include "solver/figures.hpp"

namespace panelwright::io {

/// Writes every direction of every pattern: frequency_hz, theta_deg, phi_deg, e_theta_re_v, e_theta_im_v,
/// e_phi_re_v, e_phi_im_v, gain_dbi; theta outer, phi inner; 13 significant digits. The frame and the
/// definitions stand in `#` lines above the header. Throws FileError, and std::invalid_argument without
/// powers for every pattern.
void write_pattern_csv(const std::filesystem::path& path, const std::vector<solver::FarField>& patterns,
                       const std::vector<solver::Powers>& powers, const std::string& title);

/// Reads a file made by `write_pattern_csv`: fields to 13 digits, angles to 1e-10 degree. Throws FileError
/// with the line where the header is another, a row has not eight numbers, or the rows of a frequency do not
/// make a full grid.
std::vector<solver::FarField> read_pattern_csv(const std::filesystem::path& path);

}  // namespace panelwright::io
