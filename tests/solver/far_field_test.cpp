#include "solver/far_field.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <stdexcept>

#include "solver/constants.hpp"
#include "tests/near.hpp"
#include "tests/reference/sample_fields.hpp"

namespace panelwright::solver {
namespace {

using test::near;
using test::sampled;

constexpr double rounding = 1e-13;  // a few hundred additions of numbers of order one

/// A field whose intensity is cos(theta)^power W/sr.
FarField cosine_power(int power, double step_deg) {
    FarField field = whole_sphere(1e9, step_deg * pi / 180.0);
    for (Eigen::Index t = 0; t < field.e_theta.rows(); ++t) {
        const double cosine = std::cos(field.theta[static_cast<std::size_t>(t)]);
        field.e_theta.row(t) = std::sqrt(2.0 * vacuum_impedance * std::pow(cosine, power));
    }
    return field;
}

TEST(WholeSphere, HasBothPolesAndNoDoubledSeam) {
    const FarField field = whole_sphere(2.44e9, 2.0 * pi / 180.0);
    EXPECT_EQ(field.theta.size(), 91U);
    EXPECT_EQ(field.phi.size(), 180U);
    EXPECT_EQ(field.theta.front(), 0.0);
    EXPECT_EQ(field.theta.back(), pi);
    EXPECT_TRUE(near(field.phi.back(), 2.0 * pi - 2.0 * pi / 180.0, rounding));
    EXPECT_EQ(field.e_theta.rows(), 91);
    EXPECT_EQ(field.e_phi.cols(), 180);
    EXPECT_EQ(field.e_theta.abs().maxCoeff(), 0.0);
    EXPECT_EQ(field.frequency, 2.44e9);
}

TEST(WholeSphere, ShortensAStepThatDoesNotDivideARightAngle) {
    const FarField field = whole_sphere(1e9, 7.0 * pi / 180.0);  // 90 / 13 deg
    EXPECT_EQ(field.theta.size(), 27U);
    EXPECT_EQ(field.phi.size(), 52U);
    EXPECT_TRUE(near(field.phi[13], pi / 2.0, rounding));
}

TEST(WholeSphere, RefusesStepsOutOfRange) {
    EXPECT_THROW(whole_sphere(1e9, 0.0), std::invalid_argument);
    EXPECT_THROW(whole_sphere(1e9, -0.1), std::invalid_argument);
    EXPECT_THROW(whole_sphere(1e9, 31.0 * pi / 180.0), std::invalid_argument);
    EXPECT_THROW(whole_sphere(1e9, std::nan("")), std::invalid_argument);
    EXPECT_EQ(whole_sphere(1e9, pi / 6.0).theta.size(), 7U);
}

TEST(WholeSphere, IsRecognisedAfterATripThroughDegrees) {
    FarField field = whole_sphere(1e9, 3.0 * pi / 180.0);
    for (double& angle : field.theta) angle = angle * 180.0 / pi * (pi / 180.0);
    EXPECT_TRUE(covers_whole_sphere(field));
    field.theta[4] += 1e-6;
    EXPECT_FALSE(covers_whole_sphere(field));
}

TEST(RadiatedPower, IsExactForPolynomialsInCosTheta) {
    // 7 x 12 directions: the theta sum is exact up to degree 6. Integral of cos^n over the sphere: 4 pi / (n
    // + 1).
    for (const int power : {0, 2, 4, 6}) {
        EXPECT_TRUE(near(radiated_power(cosine_power(power, 30.0)), 4.0 * pi / (power + 1), rounding))
            << power;
    }
    EXPECT_FALSE(near(radiated_power(cosine_power(8, 30.0)), 4.0 * pi / 9.0, 1e-4));
}

TEST(RadiatedPower, DoesNotDependOnWhereABeamPoints) {
    const Eigen::Vector3d x = Eigen::Vector3d::UnitX();
    const auto power = [](const Eigen::Vector3d& boresight, const Eigen::Vector3d& polarisation) {
        return radiated_power(sampled(test::beam(boresight, polarisation, 4.0), 3.0));
    };
    const double upright = power(Eigen::Vector3d::UnitZ(), x);
    for (const double theta_deg : {7.3, 133.0, 180.0}) {
        for (const double phi_deg : {41.0, 359.0}) {
            const Eigen::Vector3d boresight = test::direction(theta_deg, phi_deg);
            const Eigen::Vector3d across = boresight.cross(test::direction(theta_deg + 90.0, phi_deg));
            // The beam has angular harmonics to about the 20th; 2 deg resolves the 45th and all below
            // exactly.
            EXPECT_TRUE(near(power(boresight, across), upright, 1e-12)) << theta_deg << ' ' << phi_deg;
        }
    }
}

TEST(RadiatedPower, RefusesAnotherGrid) {
    FarField cut = whole_sphere(1e9, pi / 18.0);
    cut.phi.resize(4);
    cut.e_theta = ComplexGrid::Ones(19, 4);
    cut.e_phi = cut.e_theta;
    EXPECT_THROW(radiated_power(cut), std::invalid_argument);
    FarField misshapen = whole_sphere(1e9, pi / 18.0);
    misshapen.e_phi.resize(3, 3);
    EXPECT_THROW(radiated_power(misshapen), std::invalid_argument);
}

TEST(Gain, OfAnIsotropicRadiatorIsZeroDbiAndAZeroFieldStopsAtTheFloor) {
    const FarField even = cosine_power(0, 10.0);
    EXPECT_TRUE(near(gain_dbi(even, 4.0 * pi)(5, 7), 0.0, 0.0, 1e-12));
    EXPECT_TRUE(near(gain_dbi(even, 2.0 * pi)(0, 0), 10.0 * std::log10(2.0), rounding));
    EXPECT_EQ(gain_dbi(whole_sphere(1e9, 0.1))(3, 4), -200.0);
    EXPECT_THROW(gain_dbi(even, 0.0), std::invalid_argument);
}

TEST(LudwigThird, AHuygensSourceAlongXHasNoCrossPolarisationAnywhere) {
    const LudwigThird parts =
        ludwig_third(sampled(test::huygens(Eigen::Vector3d::UnitZ(), Eigen::Vector3d::UnitX()), 10.0));
    EXPECT_LT(parts.cross.abs().maxCoeff(), rounding);
    EXPECT_TRUE(near(parts.co(0, 0).real(), 2.0, rounding));
}

TEST(LudwigThird, AHuygensSourceAlongYIsAllCrossPolarised) {
    const LudwigThird parts =
        ludwig_third(sampled(test::huygens(Eigen::Vector3d::UnitZ(), Eigen::Vector3d::UnitY()), 10.0));
    EXPECT_LT(parts.co.abs().maxCoeff(), rounding);
    // The sign is that of the y axis at boresight, whatever phi the pole is looked up at.
    EXPECT_TRUE(near(parts.cross(0, 0).real(), 2.0, rounding));
    EXPECT_TRUE(near(parts.cross(0, 5).real(), 2.0, rounding));
}

TEST(LudwigThird, KeepsThePowerOfEveryDirection) {
    const FarField field = sampled(test::dipole(test::direction(31.0, 17.0), 0.7), 10.0);
    const LudwigThird parts = ludwig_third(field);
    for (Eigen::Index i = 0; i < parts.co.size(); ++i) {
        const double before = std::norm(field.e_theta.data()[i]) + std::norm(field.e_phi.data()[i]);
        const double after = std::norm(parts.co.data()[i]) + std::norm(parts.cross.data()[i]);
        EXPECT_TRUE(near(before, after, rounding, rounding)) << i;
    }
}

}  // namespace
}  // namespace panelwright::solver
