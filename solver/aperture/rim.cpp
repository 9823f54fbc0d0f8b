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

Eigen::Matrix<Complex, 2, Eigen::Dynamic> plate_magnetic_field(const Rim& rim, const Eigen::MatrixXcd& voltage,
                                                               double wavenumber, const Eigen::Vector2d& place) {
    Eigen::Matrix<Complex, 2, Eigen::Dynamic> field =
        Eigen::Matrix<Complex, 2, Eigen::Dynamic>::Zero(2, voltage.cols());
    const double z = rim.height;
    for (std::size_t i = 0; i < rim.points.size(); ++i) {
        const Eigen::Vector2d apart = place - rim.points[i];
        const double distance = std::sqrt(apart.squaredNorm() + z * z);
        const double kr = wavenumber * distance;
        const double inverse = 1.0 / kr;
        const Complex transverse(1.0 - inverse * inverse, -inverse);
        const Complex radial(-1.0 + 3.0 * inverse * inverse, 3.0 * inverse);
        // Minus j k / eta times the free-space Green's function, doubled by the image, times M = -voltage * element.
        const Complex wave = Complex(std::cos(kr), -std::sin(kr)) / (4.0 * pi * distance);
        const Complex scale = Complex(0.0, 2.0 * wavenumber / vacuum_impedance) * wave;
        const double along = rim.elements[i].dot(apart) / (distance * distance);
        const Eigen::Vector2cd element =
            scale * (transverse * rim.elements[i].cast<Complex>() + (radial * along) * apart.cast<Complex>());
        field.noalias() += element * voltage.row(static_cast<Eigen::Index>(i));
    }
    return field;
}

}  // namespace panelwright::solver
