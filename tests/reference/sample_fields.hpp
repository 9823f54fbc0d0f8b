/// Far fields known in closed form, for tests of what is read off a far field.
#pragma once

#include <Eigen/Core>
#include <Eigen/Geometry>
#include <cmath>
#include <functional>

#include "solver/constants.hpp"
#include "solver/far_field.hpp"

namespace panelwright::test {

/// Far field [V] in a direction given as a unit vector; only its part across the direction counts.
using VectorPattern = std::function<Eigen::Vector3cd(const Eigen::Vector3d&)>;

/// `pattern` on a whole-sphere grid of `step_deg`.
inline solver::FarField sampled(const VectorPattern& pattern, double step_deg = 2.0) {
    solver::FarField field = solver::whole_sphere(1e9, step_deg * solver::pi / 180.0);
    for (Eigen::Index t = 0; t < field.e_theta.rows(); ++t) {
        for (Eigen::Index q = 0; q < field.e_theta.cols(); ++q) {
            const double theta = field.theta[static_cast<std::size_t>(t)];
            const double phi = field.phi[static_cast<std::size_t>(q)];
            const double ct = std::cos(theta), st = std::sin(theta), cp = std::cos(phi), sp = std::sin(phi);
            const Eigen::Vector3cd e = pattern(Eigen::Vector3d(st * cp, st * sp, ct));
            field.e_theta(t, q) = e(0) * (ct * cp) + e(1) * (ct * sp) - e(2) * st;
            field.e_phi(t, q) = -e(0) * sp + e(1) * cp;
        }
    }
    return field;
}

/// Thin dipole along the unit vector `axis`, sinusoidal current, `length` in wavelengths; 0 = a short dipole.
/// C. A. Balanis, Antenna Theory, 4th ed., eq. (4-62a).
inline VectorPattern dipole(const Eigen::Vector3d& axis, double length) {
    return [=](const Eigen::Vector3d& r) -> Eigen::Vector3cd {
        const double cosine = axis.dot(r);
        const double sine_squared = 1.0 - cosine * cosine;
        if (sine_squared < 1e-20) return Eigen::Vector3cd::Zero();
        const double half = solver::pi * length;
        const double shape = length == 0.0 ? 1.0 : (std::cos(half * cosine) - std::cos(half)) / sine_squared;
        return ((axis - cosine * r) * shape).cast<solver::Complex>();
    };
}

/// Crossed electric and magnetic dipoles: a cardioid towards `boresight`, electric field there along
/// `polarisation`.
inline VectorPattern huygens(const Eigen::Vector3d& boresight, const Eigen::Vector3d& polarisation) {
    return [=](const Eigen::Vector3d& r) -> Eigen::Vector3cd {
        const Eigen::Vector3d electric = polarisation - polarisation.dot(r) * r;
        return (electric + boresight.cross(polarisation).cross(r)).cast<solver::Complex>();
    };
}

/// A beam of field shape exp(-b (1 - cos)) about `boresight`, linear polarisation as a Huygens source's.
inline VectorPattern beam(const Eigen::Vector3d& boresight, const Eigen::Vector3d& polarisation, double b) {
    return [=, source = huygens(boresight, polarisation)](const Eigen::Vector3d& r) -> Eigen::Vector3cd {
        return source(r) * std::exp(-b * (1.0 - boresight.dot(r)));
    };
}

/// Unit vector of a direction given in degrees.
inline Eigen::Vector3d direction(double theta_deg, double phi_deg) {
    const double theta = theta_deg * solver::pi / 180.0, phi = phi_deg * solver::pi / 180.0;
    return {std::sin(theta) * std::cos(phi), std::sin(theta) * std::sin(phi), std::cos(theta)};
}

}  // namespace panelwright::test
