#include <gtest/gtest.h>

#include <boost/math/special_functions/bessel.hpp>
#include <cmath>
#include <stdexcept>

#include "solver/aperture/rim.hpp"
#include "solver/constants.hpp"
#include "tests/near.hpp"
#include "tests/reference/rim_radiation.hpp"

namespace panelwright::solver {
namespace {

using test::near;

constexpr double k = 2.0 * pi / 0.123;
const Rim rim = rectangle_rim(0.064, 0.074, 0.01, 0.007);

/// Two sets of rim voltages without any symmetry.
Eigen::MatrixXcd voltages(const Rim& of) {
    Eigen::MatrixXcd out(static_cast<Eigen::Index>(of.points.size()), 2);
    for (std::size_t i = 0; i < of.points.size(); ++i) {
        const Eigen::Vector2d& p = of.points[i];
        const auto row = static_cast<Eigen::Index>(i);
        out(row, 0) = Complex(std::sin(50.0 * p.x()), 0.3 * p.y() / 0.03);
        out(row, 1) = Complex(0.4 + std::cos(70.0 * p.y()), -std::sin(20.0 * p.x()));
    }
    return out;
}

TEST(Rim, RunsOnceRoundTheRectangle) {
    double turn = 0.0;
    double length = 0.0;
    for (std::size_t i = 0; i < rim.points.size(); ++i) {
        const Eigen::Vector2d& p = rim.points[i];
        const Eigen::Vector2d& t = rim.elements[i];
        turn += p.x() * t.y() - p.y() * t.x();  // twice the area, counter-clockwise
        length += t.norm();
        EXPECT_TRUE(near(std::fabs(p.x()), 0.032, 1e-14) || near(std::fabs(p.y()), 0.037, 1e-14));
    }
    EXPECT_TRUE(near(turn, 2.0 * 0.064 * 0.074, 1e-13));
    EXPECT_TRUE(near(length, 2.0 * (0.064 + 0.074), 1e-13));
    EXPECT_EQ(rim.height, 0.01);
    for (std::size_t i = 0; i + 1 < rim.points.size(); ++i)
        EXPECT_LE((rim.points[i + 1] - rim.points[i]).norm(), 0.007 * 1.01);
}

TEST(Rim, RefusesWhatIsNoRim) {
    EXPECT_THROW(rectangle_rim(0.0, 1.0, 1.0, 1.0), std::invalid_argument);
    EXPECT_THROW(rectangle_rim(1.0, 1.0, 0.0, 1.0), std::invalid_argument);
    EXPECT_THROW(rectangle_rim(1.0, 1.0, 1.0, 0.0), std::invalid_argument);
    EXPECT_THROW(PlateField(rim, Eigen::MatrixXcd::Zero(3, 1), k), std::invalid_argument);
}

TEST(PlateField, SumsTheDipolesOfRimAndImage) {
    const Eigen::MatrixXcd voltage = voltages(rim);
    const PlateField field(rim, voltage, k);
    // Under the middle, under a side, under a corner, near and far outside.
    for (const Eigen::Vector2d& at :
         {Eigen::Vector2d{0.0, 0.0}, Eigen::Vector2d{0.032, 0.01}, Eigen::Vector2d{-0.032, -0.037},
          Eigen::Vector2d{0.05, 0.02}, Eigen::Vector2d{0.3, -0.7}, Eigen::Vector2d{-9.0, 4.0}}) {
        const auto h = field.at(at);
        const auto j = field.current(at);
        for (Eigen::Index s = 0; s < 2; ++s) {
            const Eigen::Vector3cd exact = test::rim_field(rim, voltage.col(s), k, {at.x(), at.y(), 0.0});
            const double size = exact.norm();
            // Sine and cosine of up to 500 rad, by the vector library to 4 units in the last place.
            EXPECT_TRUE(near(h(0, s), exact.x(), 0.0, 1e-11 * size)) << at.transpose();
            EXPECT_TRUE(near(h(1, s), exact.y(), 0.0, 1e-11 * size)) << at.transpose();
            EXPECT_LT(std::abs(exact.z()), 1e-12 * size);  // none through the metal
            EXPECT_EQ(j(0, s), -h(1, s));
            EXPECT_EQ(j(1, s), h(0, s));
        }
    }
}

TEST(PlateField, OfALongSideIsThatOfAMagneticLine) {
    // One side 60 wavelengths long, its voltage fading out as a Gaussian of 8 wavelengths. In two dimensions
    // a magnetic line current M gives H = -k/(4 eta) M H0(2)(k rho) along itself; the image doubles it. R. F.
    // Harrington, Time-Harmonic Electromagnetic Fields, sec. 5-6, by duality.
    const double wavelength = 2.0 * pi / k;
    const double spread = 8.0 * wavelength;
    const Rim wide = rectangle_rim(0.064, 60.0 * wavelength, 0.01, 0.002);
    Eigen::MatrixXcd voltage = Eigen::MatrixXcd::Zero(static_cast<Eigen::Index>(wide.points.size()), 1);
    for (std::size_t i = 0; i < wide.points.size(); ++i)
        if (wide.points[i].x() > 0.0319 && wide.elements[i].x() == 0.0)
            voltage(static_cast<Eigen::Index>(i), 0) = std::exp(-std::pow(wide.points[i].y() / spread, 2));
    const PlateField field(wide, voltage, k);
    for (const double x : {0.032, 0.04, 0.1, 0.3}) {
        const double rho = std::hypot(x - 0.032, 0.01);
        const Complex hankel(boost::math::cyl_bessel_j(0, k * rho), -boost::math::cyl_neumann(0, k * rho));
        const Complex expected =
            2.0 * k / (4.0 * vacuum_impedance) * hankel;  // the current is minus the voltage
        // The Gaussian is no endless line: a share of about (2/k + rho) / (k spread^2) is missing, 6e-3 at
        // the farthest.
        EXPECT_TRUE(near(field.at({x, 0.0})(1, 0), expected, (2.0 / k + rho) / (k * spread * spread))) << x;
        EXPECT_LT(std::abs(field.at({x, 0.0})(0, 0)), 1e-12 * std::abs(expected));
    }
}

TEST(PlateField, ShowsTheRimsPointsOnlyFaintly) {
    // Just under a side, three quarters of the height from point to point, against a rim five times as fine.
    const Rim fine = rectangle_rim(0.064, 0.074, 0.01, 0.0014);
    const Rim usual = rectangle_rim(0.064, 0.074, 0.01, 0.0075);
    const PlateField exact(fine, voltages(fine), k);
    const PlateField field(usual, voltages(usual), k);
    for (double y = -0.03; y < 0.031; y += 0.0013) {
        const auto a = exact.at({0.032, y});
        const auto b = field.at({0.032, y});
        // Ripples of up to 4 %, which change sign from point to point and do not reach the far field.
        EXPECT_LT((a - b).norm(), 0.05 * a.norm()) << y;
    }
}

}  // namespace
}  // namespace panelwright::solver
