/// What a design will cost, told without solving it.
#pragma once

#include <cstddef>

#include "io/case.hpp"

namespace panelwright::app {

/// Cost of one design with one method.
struct Estimate {
    std::size_t triangles = 0;  ///< of the mesh that carries the currents
    std::size_t unknowns = 0;   ///< numbers that a system of equations is solved for
    double memory = 0.0;        ///< held at once while the design is solved and written [bytes]
    double seconds = 0.0;       ///< with one thread, writing included [s]
};

/// Estimates the cost of `design` with `method`. The time is that of one core of a server processor of 2.5
/// GHz or so, and good to a factor of about three.
Estimate estimate(const io::Case& design, solver::Method method);

}  // namespace panelwright::app
