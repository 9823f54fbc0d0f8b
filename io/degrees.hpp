/// Angles as people read them.
#pragma once

#include <cmath>

#include "solver/constants.hpp"

namespace panelwright::io {

/// `angle` [rad] in degrees, rounded to 1e-10 degree: whole degrees come out whole, so that a reader may look
/// for "theta_deg == 90". Exact for angles below 900,000 degrees.
inline double degrees(double angle) {
    constexpr double per_degree = 1e10;
    return std::round(angle * (180.0 / solver::pi) * per_degree) / per_degree;
}

}  // namespace panelwright::io
