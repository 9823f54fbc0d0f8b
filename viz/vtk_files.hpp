/// Results as VTK XML files, for any VTK viewer.
#pragma once

#include <cstddef>
#include <filesystem>
#include <stdexcept>
#include <string>
#include <vector>

#include "solver/result.hpp"

namespace panelwright::viz {

/// A VTK file that cannot be written; the message names the file.
class VtkError : public std::runtime_error {
    using std::runtime_error::runtime_error;
};

/// True where the program was built with VTK; without it the writers throw VtkError.
bool vtk_available();

/// The far field as a closed surface: radius grows with gain in dB above a stated floor.
struct PatternSurface {
    double floor_dbi = -30.0;  ///< gain drawn at radius 0, relative to the peak [dB]
    double radius = 1.0;       ///< radius of the peak [m]
};

/// Meshed panel with the surface current of pattern `p`: cell arrays surface_current_re_A_per_m, …_im_…, …_magnitude_…,
/// part. Throws VtkError.
void write_currents(const std::filesystem::path& path, const solver::Solution& solution, std::size_t p);

/// Far field `p` as a surface: point arrays gain_dbi, e_theta_re_V, e_theta_im_V, e_phi_re_V, e_phi_im_V; the floor and
/// the scale stand in the field data. Throws VtkError.
void write_pattern(const std::filesystem::path& path, const solver::Solution& solution, std::size_t p,
                   const PatternSurface& surface);

/// One file of a series over frequency.
struct SeriesEntry {
    double frequency;  ///< [Hz]
    std::string file;  ///< name relative to the collection
};

/// A `.pvd` collection over frequency. Throws VtkError. Needs no VTK.
void write_collection(const std::filesystem::path& path, const std::vector<SeriesEntry>& entries);

}  // namespace panelwright::viz
