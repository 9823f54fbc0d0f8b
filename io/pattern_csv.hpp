/// Patterns as CSV.
#pragma once

#include <filesystem>
#include <vector>

#include "io/result_file.hpp"
#include "solver/far_field.hpp"

namespace panelwright::io {

/// Writes every direction of every pattern: frequency_hz, theta_deg, phi_deg, e_theta_re_v, e_theta_im_v, e_phi_re_v,
/// e_phi_im_v, gain_dbi; the frame and the definitions stand in `#` lines above the header. Throws FileError.
void write_pattern_csv(const std::filesystem::path& path, const std::vector<solver::FarField>& patterns,
                       const std::vector<solver::Powers>& powers, const std::string& title);

/// Reads a file made by `write_pattern_csv`. Throws FileError with the line.
std::vector<solver::FarField> read_pattern_csv(const std::filesystem::path& path);

}  // namespace panelwright::io
