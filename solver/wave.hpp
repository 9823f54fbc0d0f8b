/// One frequency and what follows from it.
#pragma once

#include "solver/constants.hpp"

namespace panelwright::solver {

/// A time-harmonic wave in free space; time factor exp(+j omega t), peak phasors. Made once per frequency.
struct Wave {
    double frequency;   ///< [Hz]
    double omega;       ///< angular frequency [rad/s]
    double wavenumber;  ///< k [rad/m]
    double wavelength;  ///< [m]
    double impedance;   ///< of free space [ohm]

    /// `frequency_hz` must be positive and finite.
    explicit Wave(double frequency_hz)
        : frequency(frequency_hz),
          omega(2.0 * pi * frequency_hz),
          wavenumber(2.0 * pi * frequency_hz / speed_of_light),
          wavelength(speed_of_light / frequency_hz),
          impedance(vacuum_impedance) {}
};

}  // namespace panelwright::solver
