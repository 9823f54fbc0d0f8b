/// Results as VTK XML files, for any VTK viewer.
#pragma once

#include <cstddef>
#include <filesystem>
#include <stdexcept>
#include <string>
#include <string_view>
#include <vector>

#include "solver/result.hpp"

namespace panelwright::viz {

/// A VTK file that cannot be written; the message names the file.
class VtkError : public std::runtime_error {
    using std::runtime_error::runtime_error;
};

/// True where the program was built with VTK; without it the writers throw VtkError.
bool vtk_available();

/// The far field as a closed surface: radius * max(0, 1 - (peak - gain) / -floor), gain and peak in dBi.
struct PatternSurface {
    double floor_db = -30.0;  ///< gain drawn at radius 0, relative to the peak [dB]; negative
    double radius = 1.0;      ///< radius of the peak [m]; positive
};

/// Meshed panel in metres with the surface current of pattern `p`: cell arrays surface_current_re_A_per_m and
/// surface_current_im_A_per_m (3 components, peak phasors for 1 W accepted),
/// surface_current_magnitude_A_per_m (root of the sum of the squared moduli of the three components) and part
/// (0 reflector, 1 patch, 2 feed, 3 post). Field data: title, method, frame, frequency_hz. Throws VtkError;
/// std::invalid_argument when the solution has no pattern `p` or not one current a triangle.
void write_currents(const std::filesystem::path& path, const solver::Solution& solution, std::size_t p,
                    std::string_view title = {});

/// Far field `p` as a surface closed at the poles and at phi = 0: point arrays gain_dbi, e_theta_re_V,
/// e_theta_im_V, e_theta_magnitude_V and the same of e_phi (r E, peak phasors for 1 W accepted). A pole is
/// one point; it carries the components of the first phi. Field data: title, method, frame, frequency_hz,
/// floor_db, radius_m, peak_gain_dbi and scale, the radius in words. Throws VtkError; std::invalid_argument
/// when the solution has no pattern `p`, the pattern is not a whole sphere or `surface` is out of range.
void write_pattern(const std::filesystem::path& path, const solver::Solution& solution, std::size_t p,
                   const PatternSurface& surface = {}, std::string_view title = {});

/// One file of a series over frequency.
struct SeriesEntry {
    double frequency;  ///< [Hz]
    std::string file;  ///< name relative to the collection
};

/// A `.pvd` collection over frequency; the time step of an entry is its frequency in hertz. Throws VtkError.
/// Needs no VTK.
void write_collection(const std::filesystem::path& path, const std::vector<SeriesEntry>& entries);

}  // namespace panelwright::viz
