/// Slow twins of the rim's field and of the whole far field: plain sums, one element after the other.
#pragma once

#include <Eigen/Core>
#include <Eigen/Geometry>
#include <cmath>
#include <vector>

#include "solver/aperture/edge_diffraction.hpp"
#include "solver/aperture/gauss.hpp"
#include "solver/aperture/rim.hpp"
#include "solver/constants.hpp"

namespace panelwright::test {

/// Magnetic field at `from_source` from a magnetic current element of `moment` [V m] in free space. C. A.
/// Balanis, Advanced Engineering Electromagnetics, sec. 6.7: H = -j omega e0 (1 + grad div / k^2) of moment
/// exp(-jkr)/(4 pi r).
inline Eigen::Vector3cd magnetic_dipole_field(const Eigen::Vector3d& from_source,
                                              const Eigen::Vector3cd& moment, double k) {
    using solver::Complex;
    const double r = from_source.norm();
    const Eigen::Vector3cd unit = (from_source / r).cast<Complex>();
    const Complex kr(k * r, 0.0);
    const Complex j(0.0, 1.0);
    const Complex green = std::exp(-j * kr) / (4.0 * solver::pi * r);
    const Complex across = 1.0 - j / kr - 1.0 / (kr * kr);
    const Complex along = -1.0 + 3.0 * j / kr + 3.0 / (kr * kr);
    const Complex radial = unit.transpose() * moment;
    return -j * k / solver::vacuum_impedance * green * (across * moment + along * radial * unit);
}

/// Magnetic field of the rim and of its image at any place.
inline Eigen::Vector3cd rim_field(const solver::Rim& rim, const Eigen::VectorXcd& voltage, double k,
                                  const Eigen::Vector3d& place) {
    Eigen::Vector3cd sum = Eigen::Vector3cd::Zero();
    for (std::size_t i = 0; i < rim.points.size(); ++i) {
        const solver::Complex v = voltage(static_cast<Eigen::Index>(i));
        const Eigen::Vector3cd moment(-v * rim.elements[i].x(), -v * rim.elements[i].y(), 0.0);
        for (const double level : {rim.height, -rim.height}) {
            const Eigen::Vector3d source(rim.points[i].x(), rim.points[i].y(), level);
            sum += magnetic_dipole_field(place - source, moment, k);
        }
    }
    return sum;
}

/// Nodes along one axis of the plate, far finer than needed: panels of a twelfth of a wavelength, and of 0.4
/// heights of the rim near its sides.
inline solver::GaussRule fine_rule(double from, double to, double side, double height, double wavelength) {
    std::vector<double> breaks{from, to};
    for (const double at : {-side, side})
        for (int step = -8; step <= 8; ++step) {
            const double place = at + 0.4 * step * height;
            if (place > from && place < to) breaks.push_back(place);
        }
    std::sort(breaks.begin(), breaks.end());
    return solver::composite_rule(breaks, wavelength / 12.0, 3);
}

/// Far field r exp(jkr) E (theta, phi) of the rim over the plate in one direction, as sums over everything.
class PlainPanel {
  public:
    PlainPanel(solver::Rim rim, solver::Plate plate, Eigen::VectorXcd voltage, double k,
               solver::DiffractionOrder order)
        : rim_(std::move(rim)), voltage_(std::move(voltage)), k_(k) {
        const double wavelength = 2.0 * solver::pi / k;
        const auto x = fine_rule(plate.x_from, plate.x_to, 0.5 * rim_.length, rim_.height, wavelength);
        const auto y = fine_rule(plate.y_from, plate.y_to, 0.5 * rim_.width, rim_.height, wavelength);
        for (std::size_t i = 0; i < x.nodes.size(); ++i)
            for (std::size_t j = 0; j < y.nodes.size(); ++j) {
                const Eigen::Vector3d place(x.nodes[i], y.nodes[j], 0.0);
                const Eigen::Vector3cd h = rim_field(rim_, voltage_, k, place);
                const double weight = x.weights[i] * y.weights[j];
                places_.push_back(place);
                moments_.emplace_back(Eigen::Vector2cd(-weight * h.y(), weight * h.x()));  // z x H
            }
        const Eigen::MatrixXcd column = voltage_;
        waves_ = solver::edge_waves(plate, solver::PlateField(rim_, column, k), k, order);
    }

    Eigen::Vector2cd field(double theta, double phi) const {
        using solver::Complex;
        const Eigen::Vector3d r(std::sin(theta) * std::cos(phi), std::sin(theta) * std::sin(phi),
                                std::cos(theta));
        Eigen::Vector2cd electric = Eigen::Vector2cd::Zero();
        Eigen::Vector2cd magnetic = Eigen::Vector2cd::Zero();
        for (std::size_t i = 0; i < places_.size(); ++i)
            electric += moments_[i] * std::polar(1.0, k_ * r.dot(places_[i]));
        for (std::size_t i = 0; i < rim_.points.size(); ++i) {
            const Eigen::Vector3d place(rim_.points[i].x(), rim_.points[i].y(), rim_.height);
            magnetic -= voltage_(static_cast<Eigen::Index>(i)) * std::polar(1.0, k_ * r.dot(place)) *
                        rim_.elements[i].cast<Complex>();
        }
        for (std::size_t e = 0; e < waves_.pieces.size(); ++e) {
            const solver::EdgePiece& piece = waves_.pieces[e];
            const solver::EdgeFactors f = solver::edge_factors(piece, k_, r.head<2>());
            const auto row = static_cast<Eigen::Index>(e);
            electric += waves_.hard(row, 0) * f.hard_outward * piece.outward.cast<Complex>();
            electric += (waves_.hard(row, 0) * f.hard_along + waves_.slope(row, 0) * f.slope_along) *
                        piece.along.cast<Complex>();
        }
        // E = -jk/(4 pi) (eta N + L x r), across the direction.
        const Eigen::Vector3cd n(electric.x(), electric.y(), 0.0);
        // Written out: Eigen's cross product conjugates.
        const Eigen::Vector3cd l_cross_r(magnetic.y() * r.z(), -magnetic.x() * r.z(),
                                         magnetic.x() * r.y() - magnetic.y() * r.x());
        const Eigen::Vector3cd e =
            Complex(0.0, -k_ / (4.0 * solver::pi)) * (solver::vacuum_impedance * n + l_cross_r);
        const Eigen::Vector3d theta_unit(std::cos(theta) * std::cos(phi), std::cos(theta) * std::sin(phi),
                                         -std::sin(theta));
        const Eigen::Vector3d phi_unit(-std::sin(phi), std::cos(phi), 0.0);
        return {theta_unit.cast<Complex>().transpose() * e, phi_unit.cast<Complex>().transpose() * e};
    }

  private:
    solver::Rim rim_;
    Eigen::VectorXcd voltage_;
    double k_;
    std::vector<Eigen::Vector3d> places_;
    std::vector<Eigen::Vector2cd> moments_;
    solver::EdgeWaves waves_;
};

}  // namespace panelwright::test
