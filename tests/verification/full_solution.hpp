/// An air patch over square reflectors of eight sizes: an independent full solution, and what this program
/// says.
#pragma once

#include <span>
#include <vector>

#include "mesh/panel.hpp"
#include "solver/result.hpp"
#include "solver/solution.hpp"

namespace panelwright::test {

/// Figures at 2.44 GHz over one reflector.
struct ReflectorRow {
    double side_mm;
    double resistance_ohm;
    double reactance_ohm;
    double boresight_gain_dbi;
    double peak_gain_dbi;
    double hpbw_e_deg;
    double hpbw_h_deg;
    double front_to_back_db;  ///< boresight over 180 deg
    double front_to_rear_db;  ///< peak over theta >= 150 deg
};

/// Figures over frequency, reflector side 150 mm.
struct FrequencyRow {
    double frequency_ghz;
    double resistance_ohm;
    double reactance_ohm;
    double peak_gain_dbi;
    double hpbw_e_deg;
    double hpbw_h_deg;
    double front_to_back_db;
};

/// Computed outside this project with a dense method of moments (RWG functions, electric-field integral
/// equation), which gives a sphere's echo within 0.1 dB of the Mie series and a power balance within 0.4 %.
/// From mesh to finer mesh its figures move by 0.02 dB in gain, 0.2 deg, 0.1 dB in front-to-back ratio, 2 ohm
/// in resistance and 3 ohm in reactance, which falls as the mesh gets finer. The pin is a flat strip of 1.6
/// mm, a round one of 0.8 mm. Its input resistance is greatest at 2.365 GHz.
std::span<const ReflectorRow> full_solution_by_reflector();
std::span<const FrequencyRow> full_solution_by_frequency();
inline constexpr double full_solution_resonance_ghz = 2.365;
inline constexpr double full_solution_frequency = 2.44e9;

/// The same panel.
mesh::Panel air_panel(double reflector_side);

/// This method over one reflector; the boresight's front-to-back ratio, as the table has it.
ReflectorRow aperture_by_reflector(double side_mm);

/// This method over frequency, the table's frequencies.
std::vector<FrequencyRow> aperture_by_frequency();

/// Resonance of this method over the reflector of 150 mm [GHz].
double aperture_resonance_ghz();

/// Place and value of the maximum of a curve through samples (cubic splines that do not overshoot, Akima's).
struct Maximum {
    double at;
    double value;
};
Maximum maximum(const std::vector<double>& x, const std::vector<double>& y);

/// Peak gain [dBi] of this method as the side of the reflector grows from 0.6 to 2.5 wavelengths.
struct GainCurve {
    std::vector<double> side_mm;
    std::vector<double> peak_gain_dbi;
};
/// `steps`: to a wavelength.
GainCurve aperture_gain_curve(int steps);

}  // namespace panelwright::test
