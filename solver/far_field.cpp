#include "solver/far_field.hpp"

#include <cmath>
#include <cstddef>
#include <stdexcept>

#include "solver/constants.hpp"

namespace panelwright::solver {

namespace {

constexpr double gain_floor_dbi = -200.0;

void require_shape(const FarField& field) {
    const auto rows = static_cast<Eigen::Index>(field.theta.size());
    const auto columns = static_cast<Eigen::Index>(field.phi.size());
    for (const ComplexGrid* grid : {&field.e_theta, &field.e_phi}) {
        if (grid->rows() != rows || grid->cols() != columns) {
            throw std::invalid_argument("the far field's arrays do not have one value a direction");
        }
    }
}

/// Weights w_j such that sum w_j f(j pi / n) is the integral of f(theta) sin(theta) over 0..pi, exact for
/// every polynomial in cos(theta) of degree n. Even n. C. W. Clenshaw and A. R. Curtis, Numer. Math. 2,
/// 197-205, 1960.
std::vector<double> clenshaw_curtis(std::size_t n) {
    std::vector<double> weights(n + 1);
    for (std::size_t j = 0; j <= n; ++j) {
        const double theta = pi * static_cast<double>(j) / static_cast<double>(n);
        double sum = 1.0;
        for (std::size_t m = 1; 2 * m <= n; ++m) {
            const double order = static_cast<double>(2 * m);
            const double share = 2 * m == n ? 1.0 : 2.0;
            sum -= share * std::cos(order * theta) / (order * order - 1.0);
        }
        const double ends = (j == 0 || j == n) ? 1.0 : 2.0;
        weights[j] = ends * sum / static_cast<double>(n);
    }
    return weights;
}

}  // namespace

FarField whole_sphere(double frequency, double step) {
    // A hair of slack lets a step that divides pi/2 except for rounding pass unchanged.
    constexpr double slack = 1e-9;
    if (!(step > 0.0) || step > pi / 6.0 * (1.0 + slack)) {
        throw std::invalid_argument("the step between directions must lie in (0, pi/6]");
    }
    const auto quarter = static_cast<std::size_t>(std::ceil(pi / 2.0 / step - slack));
    const double true_step = pi / 2.0 / static_cast<double>(quarter);
    FarField field;
    field.frequency = frequency;
    for (std::size_t t = 0; t <= 2 * quarter; ++t) field.theta.push_back(true_step * static_cast<double>(t));
    for (std::size_t q = 0; q < 4 * quarter; ++q) field.phi.push_back(true_step * static_cast<double>(q));
    field.theta.back() = pi;
    const auto rows = static_cast<Eigen::Index>(field.theta.size());
    const auto columns = static_cast<Eigen::Index>(field.phi.size());
    field.e_theta = ComplexGrid::Zero(rows, columns);
    field.e_phi = ComplexGrid::Zero(rows, columns);
    return field;
}

bool covers_whole_sphere(const FarField& field) {
    const std::size_t columns = field.phi.size();
    if (columns < 12 || columns % 4 != 0 || field.theta.size() != columns / 2 + 1) return false;
    const double step = 2.0 * pi / static_cast<double>(columns);
    // Angles that went through a file in degrees come back with rounding; a misplaced grid is off by far
    // more.
    constexpr double tolerance = 1e-9;
    const auto even = [&](const std::vector<double>& angles) {
        for (std::size_t i = 0; i < angles.size(); ++i) {
            if (!(std::abs(angles[i] - step * static_cast<double>(i)) <= tolerance)) return false;
        }
        return true;
    };
    return even(field.theta) && even(field.phi);
}

RealGrid intensity(const FarField& field) {
    require_shape(field);
    return (field.e_theta.abs2() + field.e_phi.abs2()) / (2.0 * vacuum_impedance);
}

double radiated_power(const FarField& field) {
    if (!covers_whole_sphere(field)) {
        throw std::invalid_argument("radiated power needs a far field over the whole sphere at equal steps");
    }
    const RealGrid power = intensity(field);
    const std::vector<double> weights = clenshaw_curtis(field.theta.size() - 1);
    const double phi_step = 2.0 * pi / static_cast<double>(field.phi.size());
    double sum = 0.0;
    for (Eigen::Index t = 0; t < power.rows(); ++t) {
        sum += weights[static_cast<std::size_t>(t)] * power.row(t).sum() * phi_step;
    }
    return sum;
}

RealGrid gain_dbi(const FarField& field, double accepted_power) {
    if (!(accepted_power > 0.0)) throw std::invalid_argument("the accepted power must be positive");
    const double floor = std::pow(10.0, gain_floor_dbi / 10.0);
    return 10.0 * (intensity(field) * (4.0 * pi / accepted_power)).max(floor).log10();
}

LudwigThird ludwig_third(const FarField& field) {
    require_shape(field);
    LudwigThird parts{field.e_theta, field.e_theta};
    for (Eigen::Index q = 0; q < field.e_theta.cols(); ++q) {
        const double phi = field.phi[static_cast<std::size_t>(q)];
        const double cosine = std::cos(phi);
        const double sine = std::sin(phi);
        parts.co.col(q) = cosine * field.e_theta.col(q) - sine * field.e_phi.col(q);
        parts.cross.col(q) = sine * field.e_theta.col(q) + cosine * field.e_phi.col(q);
    }
    return parts;
}

}  // namespace panelwright::solver
