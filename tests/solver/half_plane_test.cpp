#include "solver/aperture/half_plane.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cmath>
#include <stdexcept>
#include <vector>

#include "solver/constants.hpp"
#include "tests/near.hpp"

namespace panelwright::solver {
namespace {

using test::near;

constexpr auto soft = EdgeCondition::soft;
constexpr auto hard = EdgeCondition::hard;
constexpr double degree = pi / 180.0;
constexpr double polynomial = 2e-11;  // of the Fresnel tail, twice

struct HalfPlaneRow {
    double phi_deg;
    std::array<double, 6> magnitude;  ///< soft, hard at rho = 0.5, 1 and 3 wavelengths
};

TEST(HalfPlane, AgreesWithTheTable) {
    // |u| for incidence from 60 deg [computed]: C. A. Balanis, Advanced Engineering Electromagnetics, ch. 13;
    // M. Born and E. Wolf, Principles of Optics, ch. 11.
    const std::vector<HalfPlaneRow> table = {
        {0, {0, 1.848807, 0, 2.139080, 0, 2.077583}},
        {30, {1.993025, 0.382127, 0.823344, 1.642258, 1.897006, 0.510637}},
        {60, {1.501822, 1.396775, 2.063589, 0.231717, 2.035099, 0.137197}},
        {90, {0.877911, 1.469390, 1.560809, 1.063450, 1.225447, 1.806777}},
        {120, {1.096652, 1.003193, 1.568983, 0.571074, 1.538579, 0.539397}},
        {150, {1.417300, 0.840899, 0.718641, 1.139077, 0.829609, 1.090038}},
        {180, {1.265152, 1.000000, 1.256569, 1.000000, 1.142148, 1.000000}},
        {210, {0.799055, 0.867261, 1.001281, 0.949858, 1.231935, 1.103505}},
        {240, {0.409922, 0.603560, 0.436514, 0.571074, 0.463326, 0.539397}},
        {270, {0.197382, 0.413378, 0.173021, 0.330859, 0.120836, 0.214851}},
        {300, {0.094087, 0.312980, 0.074138, 0.231717, 0.045438, 0.137197}},
        {330, {0.038604, 0.267328, 0.029173, 0.193039, 0.017335, 0.112402}},
        {360, {0, 0.254245, 0, 0.182590, 0, 0.106021}}};
    constexpr std::array<double, 3> rho{0.5, 1.0, 3.0};
    for (const HalfPlaneRow& row : table) {
        for (std::size_t i = 0; i < 6; ++i) {
            const double k_rho = 2.0 * pi * rho[i / 2];
            const Complex u =
                half_plane_field(i % 2 == 0 ? soft : hard, k_rho, row.phi_deg * degree, 60.0 * degree);
            // Half the table's last digit.
            EXPECT_TRUE(near(std::abs(u), row.magnitude[i], 0.0, 0.51e-6)) << row.phi_deg << ' ' << i;
        }
    }
}

TEST(HalfPlane, HardFieldInThePlanesContinuationIsTheIncidentOne) {
    for (const double k_rho : {0.0, 0.01, 1.0, 17.0, 400.0}) {
        for (const double from : {0.0, 0.3, 1.0, 2.0, 3.0, 4.5}) {
            const Complex u = half_plane_field(hard, k_rho, pi, from);
            const double phase = k_rho * std::cos(pi - from);
            EXPECT_TRUE(near(u, Complex(std::cos(phase), std::sin(phase)), 1e-10)) << k_rho << ' ' << from;
        }
    }
}

TEST(HalfPlane, KeepsItsConditionsOnBothFaces) {
    constexpr double step = 1e-5;
    for (const double k_rho : {0.2, 2.0, 30.0}) {
        for (const double face : {0.0, 2.0 * pi}) {
            EXPECT_LT(std::abs(half_plane_field(soft, k_rho, face, 0.8)), polynomial);
            const double inward = face == 0.0 ? step : face - step;
            const Complex change =
                half_plane_field(hard, k_rho, inward, 0.8) - half_plane_field(hard, k_rho, face, 0.8);
            // Second order in the step, its derivative by phi at most (k rho)^2; and the polynomial's noise.
            EXPECT_LT(std::abs(change), k_rho * (1.0 + k_rho) * step * step + 4.0 * polynomial);
        }
    }
}

TEST(HalfPlane, ReciprocalInItsTwoDirections) {
    EXPECT_TRUE(near(half_plane_field(soft, 5.0, 1.1, 4.2), half_plane_field(soft, 5.0, 4.2, 1.1), 1e-12));
    EXPECT_TRUE(near(half_plane_field(hard, 5.0, 0.4, 2.2), half_plane_field(hard, 5.0, 2.2, 0.4), 1e-12));
}

TEST(HalfPlane, RefusesPointsThatAreNowhere) {
    EXPECT_THROW(half_plane_field(soft, -1.0, 0.0, 0.0), std::invalid_argument);
    EXPECT_THROW(half_plane_field(soft, 1.0, -0.1, 0.0), std::invalid_argument);
    EXPECT_THROW(half_plane_optics(hard, 1.0, 0.1, 6.3), std::invalid_argument);
}

TEST(KnifeEdge, AgreesWithTheTable) {
    // [computed] from Fresnel integrals for the screen of Rec. ITU-R P.526, sec. 4.1.
    const std::vector<std::array<double, 2>> table = {
        {-1.0, -1.0010}, {-0.5, 1.8586}, {0.0, 6.0206},  {0.5, 10.2338}, {1.0, 13.8641},
        {1.5, 16.7773},  {2.0, 19.0910}, {2.4, 20.6182}, {3.0, 22.5218}, {5.0, 26.9362}};
    for (const auto& [v, loss_db] : table)
        EXPECT_TRUE(near(knife_edge_loss_db(v), loss_db, 0.0, 0.51e-4)) << v;
}

TEST(KnifeEdge, IsNearTheFormulaOfTheRecommendation) {
    for (double v = -0.7; v < 5.0; v += 0.1) {
        // J(v), Rec. ITU-R P.526, sec. 4.1 [read]; it is an approximation, good to 0.15 dB over this range.
        const double j = 6.9 + 20.0 * std::log10(std::hypot(v - 0.1, 1.0) + v - 0.1);
        EXPECT_TRUE(near(knife_edge_loss_db(v), j, 0.0, 0.15)) << v;
    }
}

/// Optics plus diffracted field for a plane wave, k = 1.
Complex uniform_field(EdgeCondition condition, double k_rho, double phi, double phi_incident) {
    const EdgeCoefficients d = edge_coefficients(
        {.wavenumber = 1.0, .distance_parameter = k_rho, .phi = phi, .phi_incident = phi_incident});
    const Complex spread = std::polar(1.0 / std::sqrt(k_rho), -k_rho);
    return half_plane_optics(condition, k_rho, phi, phi_incident) +
           (condition == soft ? d.soft : d.hard) * spread;
}

TEST(EdgeCoefficients, WithOpticsAreExactForPlaneWavesAcrossBothBoundaries) {
    for (const double k_rho : {0.05, 1.0, 20.0}) {
        for (const double from_deg : {0.0, 10.0, 60.0, 90.0, 135.0, 200.0, 330.0}) {
            for (double phi_deg = 0.0; phi_deg <= 360.0; phi_deg += 3.0) {  // meets every boundary
                for (const EdgeCondition condition : {soft, hard}) {
                    const Complex exact =
                        half_plane_field(condition, k_rho, phi_deg * degree, from_deg * degree);
                    const Complex uniform =
                        uniform_field(condition, k_rho, phi_deg * degree, from_deg * degree);
                    EXPECT_TRUE(near(uniform, exact, 0.0, 5.0 * polynomial))
                        << k_rho << ' ' << from_deg << ' ' << phi_deg;
                }
            }
        }
    }
}

TEST(EdgeCoefficients, AreReciprocal) {
    for (const double a : {0.1, 1.3, 3.0, 5.9}) {
        for (const double b : {0.0, 0.7, 2.9, 4.4}) {
            const EdgeRay there{.wavenumber = 51.0, .distance_parameter = 0.3, .phi = a, .phi_incident = b};
            const EdgeRay back{.wavenumber = 51.0, .distance_parameter = 0.3, .phi = b, .phi_incident = a};
            EXPECT_TRUE(near(edge_coefficients(there).soft, edge_coefficients(back).soft, 1e-13, 1e-13));
            EXPECT_TRUE(near(edge_coefficients(there).hard, edge_coefficients(back).hard, 1e-13, 1e-13));
        }
    }
}

TEST(EdgeCoefficients, FarFromTheBoundariesAreKellers) {
    // J. B. Keller, J. Opt. Soc. Am. 52, 116-130, 1962: F = 1 in both terms.
    const double k = 51.0, phi = 0.5, from = 1.1, sin_beta = 0.8;
    const EdgeCoefficients d = edge_coefficients(
        {.wavenumber = k, .distance_parameter = 1e6, .phi = phi, .phi_incident = from, .sin_beta = sin_beta});
    const Complex factor = -std::polar(1.0, -pi / 4.0) / (2.0 * std::sqrt(2.0 * pi * k) * sin_beta);
    const double incident = 1.0 / std::cos(0.5 * (phi - from));
    const double reflected = 1.0 / std::cos(0.5 * (phi + from));
    EXPECT_TRUE(near(d.soft, factor * (incident - reflected), 1e-7));  // F - 1 is 1 / (2 k L a)
    EXPECT_TRUE(near(d.hard, factor * (incident + reflected), 1e-7));
}

TEST(EdgeCoefficients, AtGrazingIncidenceTheSoftOneVanishesAndHalfTheHardOneServesTheTotalField) {
    const EdgeCoefficients d =
        edge_coefficients({.wavenumber = 1.0, .distance_parameter = 7.0, .phi = 3.6, .phi_incident = 0.0});
    EXPECT_EQ(d.soft, Complex(0.0, 0.0));
    // Total field of amplitude one along the plate; the point lies in its shadow.
    const Complex expected = 0.5 * half_plane_field(hard, 7.0, 3.6, 0.0);
    EXPECT_TRUE(near(0.5 * d.hard * std::polar(1.0 / std::sqrt(7.0), -7.0), expected, 5.0 * polynomial));
}

TEST(EdgeCoefficients, RefuseRaysOutOfRange) {
    const EdgeRay good{.wavenumber = 50.0, .distance_parameter = 0.1, .phi = 1.0, .phi_incident = 0.5};
    EXPECT_NO_THROW(edge_coefficients(good));
    std::vector<EdgeRay> bad(5, good);
    bad[0].wavenumber = 0.0;
    bad[1].distance_parameter = -1.0;
    bad[2].phi = 7.0;
    bad[3].phi_incident = -0.1;
    bad[4].sin_beta = 0.0;
    for (const EdgeRay& ray : bad) {
        EXPECT_THROW(edge_coefficients(ray), std::invalid_argument);
        EXPECT_THROW(edge_slope_coefficients(ray), std::invalid_argument);
    }
}

TEST(EdgeSlope, IsTheDerivativeOfTheCoefficient) {
    constexpr double step = 1e-4;
    for (const double from : {0.2, 1.0, 2.5}) {
        for (const double phi : {0.3, 1.9, 3.0, 4.6, 6.1}) {
            EdgeRay ray{.wavenumber = 51.0, .distance_parameter = 0.2, .phi = phi, .phi_incident = from};
            const EdgeCoefficients slope = edge_slope_coefficients(ray);
            ray.phi_incident = from + step;
            const EdgeCoefficients after = edge_coefficients(ray);
            ray.phi_incident = from - step;
            const EdgeCoefficients before = edge_coefficients(ray);
            // Central difference with k L = 10: step^2 times a third derivative of some (k L)^1.5; noise
            // 1e-11 / step.
            EXPECT_TRUE(near(slope.soft, (after.soft - before.soft) / (2.0 * step), 1e-6, 1e-6))
                << from << ' ' << phi;
            EXPECT_TRUE(near(slope.hard, (after.hard - before.hard) / (2.0 * step), 1e-6, 1e-6))
                << from << ' ' << phi;
        }
    }
}

TEST(EdgeSlope, GivesTheExactFieldOfAWaveThatVanishesOnThePlate) {
    // The unbroken plate carries u = y exp(j k x), du/dn = 1 at the edge. Exact: d/d(phi_incident) of
    // Sommerfeld's solution at 0, over 2 j k; here by a one-sided difference, the field being odd in
    // phi_incident.
    constexpr double step = 1e-4;
    for (const double k_rho : {0.5, 4.0, 60.0}) {
        for (const double phi : {3.5, 4.6, 6.0}) {  // shadow: no optics
            const Complex exact = half_plane_field(soft, k_rho, phi, step) / (step * Complex(0.0, 2.0));
            const EdgeCoefficients slope = edge_slope_coefficients(
                {.wavenumber = 1.0, .distance_parameter = k_rho, .phi = phi, .phi_incident = 0.0});
            const Complex field =
                0.5 * slope.soft / Complex(0.0, 1.0) * std::polar(1.0 / std::sqrt(k_rho), -k_rho);
            EXPECT_TRUE(near(field, exact, 1e-5, 1e-6))
                << k_rho << ' ' << phi;  // step^2 (k rho); noise 1e-11 / step
        }
    }
}

TEST(EdgeCurrent, HardFollowsFromTheExactFieldAtGrazingIncidence) {
    constexpr double from = 1e-5;
    for (const double kd : {0.0, 1e-3, 0.1, 1.0, 7.0, 80.0}) {
        const Complex both_faces =
            half_plane_field(hard, kd, 0.0, from) - half_plane_field(hard, kd, 2.0 * pi, from);
        const Complex unbroken = 2.0 * std::polar(1.0, kd);
        // The incidence angle enters as its square times k d.
        EXPECT_TRUE(near(hard_edge_current(kd), both_faces / unbroken, 0.0, 1e-8)) << kd;
    }
}

TEST(EdgeCurrent, SoftFollowsFromTheExactFieldAtGrazingIncidence) {
    constexpr double from = 1e-3;
    constexpr double step = 1e-3;
    for (const double kd : {0.02, 0.1, 1.0, 5.0, 12.0}) {
        // Normal derivatives from both faces, where the field is zero; du/dn of the unbroken plate's total
        // field exp(j k x cos) 2 j sin(k y sin) at y = 0.
        const Complex upper = half_plane_field(soft, kd, step, from) / (kd * step);
        const Complex lower = -half_plane_field(soft, kd, 2.0 * pi - step, from) / (kd * step);
        const Complex unbroken = Complex(0.0, 2.0 * std::sin(from)) * std::polar(1.0, kd * std::cos(from));
        // Incidence angle and step enter as their squares times k d (a third of it, by the series of the
        // sine); noise of the Fresnel tail, some 1e-12, over k d, step and incidence angle.
        const double tolerance = 1e-6 * kd + 1e-6 / kd;
        EXPECT_TRUE(near(soft_edge_current(kd), (upper - lower) / unbroken, 0.0, tolerance))
            << kd << " " << soft_edge_current(kd) - (upper - lower) / unbroken;
    }
}

TEST(EdgeCurrent, AtTheEdge) {
    EXPECT_LT(std::abs(hard_edge_current(0.0)), 1e-11);
    for (const double kd : {1e-8, 1e-6}) {
        const double b = std::sqrt(2.0 * kd);
        // First terms of the series; the next is smaller by b^2.
        EXPECT_TRUE(
            near(hard_edge_current(kd), 2.0 / std::sqrt(pi) * b * std::polar(1.0, pi / 4.0), kd + 1e-7));
        EXPECT_TRUE(near(soft_edge_current(kd), std::polar(1.0, -pi / 4.0) / (std::sqrt(pi) * b), 10.0 * kd));
    }
    EXPECT_THROW(hard_edge_current(-0.1), std::invalid_argument);
    EXPECT_THROW(soft_edge_current(0.0), std::invalid_argument);
}

TEST(EdgeCurrent, FarAwayIsThatOfTheUnbrokenPlate) {
    for (const double kd : {1e2, 1e4, 1e6}) {
        // The edge sends back a cylindrical wave: 1 / sqrt(2 pi k d) for the hard, 1 / (2 b^3 sqrt(pi)) for
        // the soft.
        const double b = std::sqrt(2.0 * kd);
        EXPECT_TRUE(near(std::abs(hard_edge_current(kd) - 1.0), 1.0 / (std::sqrt(pi) * b), 1.0 / kd, 1e-10))
            << kd;
        EXPECT_TRUE(
            near(std::abs(soft_edge_current(kd) - 1.0), 0.5 / (std::sqrt(pi) * b * b * b), 1.0 / kd, 1e-15));
    }
}

}  // namespace
}  // namespace panelwright::solver
