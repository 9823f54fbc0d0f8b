#include "solver/aperture/rim.hpp"

#include <array>
#include <cmath>
#include <stdexcept>

#include "solver/aperture/gauss.hpp"
#include "solver/constants.hpp"

namespace panelwright::solver {

Rim rectangle_rim(double length, double width, double height, double spacing) {
    if (!(length > 0.0 && width > 0.0 && height > 0.0 && spacing > 0.0))
        throw std::invalid_argument("a rim needs positive sides, height and spacing");
    // Eight-point panels: their widest gap, in the middle, is 0.183 of the panel.
    const std::array<double, 2> unit{-1.0, 1.0};
    const std::array<Eigen::Vector2d, 4> corner{
        Eigen::Vector2d{-0.5 * length, 0.5 * width}, Eigen::Vector2d{-0.5 * length, -0.5 * width},
        Eigen::Vector2d{0.5 * length, -0.5 * width}, Eigen::Vector2d{0.5 * length, 0.5 * width}};
    Rim rim;
    rim.height = height;
    rim.length = length;
    rim.width = width;
    for (std::size_t side = 0; side < 4; ++side) {
        const Eigen::Vector2d half = 0.5 * (corner[(side + 1) % 4] - corner[side]);
        const Eigen::Vector2d centre = corner[side] + half;
        const GaussRule rule = composite_rule(unit, spacing / 0.183 / half.norm(), 8);
        for (std::size_t i = 0; i < rule.nodes.size(); ++i) {
            rim.points.emplace_back(centre + rule.nodes[i] * half);
            rim.elements.emplace_back(rule.weights[i] * half);
        }
    }
    return rim;
}

PlateField::PlateField(const Rim& rim, const Eigen::MatrixXcd& voltage, double wavenumber)
    : wavenumber_(wavenumber),
      height_(rim.height),
      x_(static_cast<Eigen::Index>(rim.points.size())),
      y_(x_.size()),
      element_x_(x_.size()),
      element_y_(x_.size()),
      voltage_re_(voltage.real()),
      voltage_im_(voltage.imag()) {
    if (voltage.rows() != x_.size())
        throw std::invalid_argument("one voltage is needed for each point of the rim");
    for (Eigen::Index i = 0; i < x_.size(); ++i) {
        const auto point = static_cast<std::size_t>(i);
        x_(i) = rim.points[point].x();
        y_(i) = rim.points[point].y();
        element_x_(i) = rim.elements[point].x();
        element_y_(i) = rim.elements[point].y();
    }
}

Eigen::Matrix<Complex, 2, Eigen::Dynamic> PlateField::at(const Eigen::Vector2d& place) const {
    const Eigen::Index n = x_.size();
    Eigen::ArrayXd kr(n);
    Eigen::ArrayXd cosine(n);
    Eigen::ArrayXd sine(n);
    for (Eigen::Index i = 0; i < n; ++i) {
        const double dx = place.x() - x_(i);
        const double dy = place.y() - y_(i);
        kr(i) = wavenumber_ * std::sqrt(dx * dx + dy * dy + height_ * height_);
    }
    // Sine and cosine in loops of their own: together they would become one scalar call.
    for (Eigen::Index i = 0; i < n; ++i) cosine(i) = std::cos(kr(i));
    for (Eigen::Index i = 0; i < n; ++i) sine(i) = std::sin(kr(i));
    // H = 2 (-j k / eta) G [(1 - j/kr - 1/kr^2) M + (-1 + 3j/kr + 3/kr^2) (M.r) r], M = -voltage * element.
    const double scale = 2.0 * wavenumber_ * wavenumber_ / (vacuum_impedance * 4.0 * pi);
    Eigen::ArrayXd x_re(n);
    Eigen::ArrayXd x_im(n);
    Eigen::ArrayXd y_re(n);
    Eigen::ArrayXd y_im(n);
    for (Eigen::Index i = 0; i < n; ++i) {
        const double dx = wavenumber_ * (place.x() - x_(i));
        const double dy = wavenumber_ * (place.y() - y_(i));
        const double inverse = 1.0 / kr(i);
        const double inverse2 = inverse * inverse;
        // j exp(-j kr) = sin kr + j cos kr.
        const double wave_re = scale * inverse * sine(i);
        const double wave_im = scale * inverse * cosine(i);
        const double along = (element_x_(i) * dx + element_y_(i) * dy) * inverse2;
        const double flat = 1.0 - inverse2;
        const double steep = 3.0 * inverse2 - 1.0;
        const double across_re = wave_re * flat + wave_im * inverse;
        const double across_im = wave_im * flat - wave_re * inverse;
        const double radial_re = (wave_re * steep - 3.0 * wave_im * inverse) * along;
        const double radial_im = (wave_im * steep + 3.0 * wave_re * inverse) * along;
        x_re(i) = across_re * element_x_(i) + radial_re * dx;
        x_im(i) = across_im * element_x_(i) + radial_im * dx;
        y_re(i) = across_re * element_y_(i) + radial_re * dy;
        y_im(i) = across_im * element_y_(i) + radial_im * dy;
    }
    Eigen::Matrix<Complex, 2, Eigen::Dynamic> field(2, voltage_re_.cols());
    for (Eigen::Index s = 0; s < voltage_re_.cols(); ++s) {
        const auto re = voltage_re_.col(s);
        const auto im = voltage_im_.col(s);
        field(0, s) = Complex((x_re * re - x_im * im).sum(), (x_re * im + x_im * re).sum());
        field(1, s) = Complex((y_re * re - y_im * im).sum(), (y_re * im + y_im * re).sum());
    }
    return field;
}

Eigen::Matrix<Complex, 2, Eigen::Dynamic> PlateField::current(const Eigen::Vector2d& place) const {
    Eigen::Matrix<Complex, 2, Eigen::Dynamic> current = at(place);
    current.row(0).swap(current.row(1));
    current.row(0) *= -1.0;
    return current;
}

}  // namespace panelwright::solver
