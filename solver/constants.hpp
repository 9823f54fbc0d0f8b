/// Physical constants. CODATA 2018 (E. Tiesinga et al., Rev. Mod. Phys. 93, 025010, 2021).
#pragma once

#include <numbers>

namespace panelwright::solver {

inline constexpr double pi = std::numbers::pi;
inline constexpr double speed_of_light = 299792458.0;                             ///< [m/s], exact
inline constexpr double vacuum_permeability = 1.25663706212e-6;                   ///< [H/m]
inline constexpr double vacuum_impedance = vacuum_permeability * speed_of_light;  ///< [ohm]
inline constexpr double vacuum_permittivity =
    1.0 / (vacuum_permeability * speed_of_light * speed_of_light);  ///< [F/m]

}  // namespace panelwright::solver
