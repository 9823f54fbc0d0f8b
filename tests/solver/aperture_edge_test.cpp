#include <gtest/gtest.h>

#include <cmath>
#include <functional>
#include <stdexcept>
#include <vector>

#include "solver/aperture/edge_diffraction.hpp"
#include "solver/aperture/gauss.hpp"
#include "solver/aperture/half_plane.hpp"
#include "solver/constants.hpp"
#include "tests/near.hpp"

namespace panelwright::solver {
namespace {

using test::near;

constexpr double k = 2.0 * pi / 0.123;
constexpr double degree = pi / 180.0;

/// A piece of a half-plane's edge that a wave meets head-on, unit length.
EdgePiece straight_piece() {
    EdgePiece piece;
    piece.place = Eigen::Vector2d::Zero();
    piece.outward = Eigen::Vector2d::UnitX();
    piece.along = Eigen::Vector2d::UnitY();
    piece.weight = 1.0;
    piece.span = 1e12;  // the half-plane has no other end
    return piece;
}

/// Direction at angle phi round the edge from the lit face, in the plane across the edge.
Eigen::Vector2d round_edge(double phi) {
    return {-std::cos(phi), 0.0};
}

/// What a current that ends at the edge, exp(-jkx) for x < 0, radiates by its end: the end point of its
/// integral.
Complex optics_end(double phi) {
    return 1.0 / Complex(0.0, k * (-std::cos(phi) - 1.0));
}

/// Far field sqrt(rho) exp(jk rho) H of a line of transverse current of 1 A m a metre, by the sine of the
/// angle to it.
Complex line_radiation() {
    return 0.25 * k * std::sqrt(2.0 / (pi * k)) * std::polar(1.0, 0.25 * pi);
}

TEST(EdgeFactors, AddUpToTheExactHardCoefficient) {
    const EdgePiece piece = straight_piece();
    for (double phi = 1.0 * degree; phi < 359.5 * degree; phi += 2.0 * degree) {
        if (std::fabs(phi - pi) < 0.01) continue;  // the shadow boundary, where both parts are infinite
        // Total field 1 over the plate, incident and reflected wave together: half the coefficient at grazing
        // incidence.
        const Complex exact = 0.5 * edge_coefficients({k, 1e12, phi, 0.0, 1.0}).hard;
        const Complex current = optics_end(phi) + edge_factors(piece, k, round_edge(phi)).hard_outward;
        EXPECT_TRUE(near(line_radiation() * std::sin(phi) * current, exact, 1e-9)) << phi / degree;
    }
}

TEST(EdgeFactors, AddUpToTheExactSoftSlopeCoefficient) {
    const EdgePiece piece = straight_piece();
    for (double phi = 1.0 * degree; phi < 359.5 * degree; phi += 2.0 * degree) {
        if (std::fabs(phi - pi) < 0.01) continue;
        // A current of 1 A/m along the edge goes with the slope jk eta of the electric field; half of it is
        // incident.
        const Complex slope(0.0, k * vacuum_impedance);
        const Complex exact =
            0.5 * edge_slope_coefficients({k, 1e12, phi, 0.0, 1.0}).soft / Complex(0.0, k) * slope;
        const Complex current = optics_end(phi) + edge_factors(piece, k, round_edge(phi)).slope_along;
        EXPECT_TRUE(near(-vacuum_impedance * line_radiation() * current, exact, 1e-9)) << phi / degree;
    }
}

/// Integral over d = 0..infinity of excess(kd) exp(jkd(1 + cos phi)): quadrature in sqrt(d) to k d = 1500,
/// beyond it the first two terms by parts of what then falls as a power times exp(-jkd(1 - cos phi)).
Complex integrated(const std::function<Complex(double)>& excess, double phi) {
    const double turn = 1.0 + std::cos(phi);
    constexpr double end = 1500.0;
    const std::array<double, 2> breaks{0.0, std::sqrt(end)};
    const GaussRule rule = composite_rule(breaks, 0.02, 6);
    Complex sum = 0.0;
    for (std::size_t i = 0; i < rule.nodes.size(); ++i) {
        const double kd = rule.nodes[i] * rule.nodes[i];
        sum += 2.0 * rule.nodes[i] * rule.weights[i] * excess(kd) * std::polar(1.0, kd * turn);
    }
    const auto slow = [&](double kd) { return excess(kd) * std::polar(1.0, 2.0 * kd); };
    const Complex rate(0.0, std::cos(phi) - 1.0);
    const Complex slope = (slow(end * 1.001) - slow(end * 0.999)) / (0.002 * end);
    sum -= std::polar(1.0, end * (turn - 2.0)) * (slow(end) / rate - slope / (rate * rate));
    return sum / k;
}

TEST(EdgeFactors, AreTheIntegratedFringeCurrents) {
    const EdgePiece piece = straight_piece();
    const auto hard = [](double kd) { return hard_edge_current(kd) - 1.0; };
    const auto soft = [](double kd) { return soft_edge_current(kd) - 1.0; };
    for (const double phi : {40.0, 75.0, 90.0, 120.0, 160.0, 180.0, 215.0, 300.0}) {
        const EdgeFactors factors = edge_factors(piece, k, round_edge(phi * degree));
        // Third term by parts: (kd)^-2.5 / (1 - cos phi)^3, at most 1e-6.
        EXPECT_TRUE(near(integrated(hard, phi * degree), factors.hard_outward, 1e-5)) << phi;
        EXPECT_TRUE(near(integrated(soft, phi * degree), factors.slope_along, 1e-5)) << phi;
    }
}

TEST(EdgeFactors, CarryPlaceAndLength) {
    EdgePiece piece = straight_piece();
    const Eigen::Vector2d direction(0.3, -0.5);
    const EdgeFactors at_origin = edge_factors(piece, k, direction);
    piece.place = {0.07, 0.02};
    piece.weight = 0.013;
    const EdgeFactors moved = edge_factors(piece, k, direction);
    const Complex factor = std::polar(0.013, k * direction.dot(piece.place));
    EXPECT_TRUE(near(moved.hard_outward, factor * at_origin.hard_outward, 1e-13));
    EXPECT_TRUE(near(moved.slope_along, factor * at_origin.slope_along, 1e-13));
    EXPECT_EQ(std::abs(moved.hard_along), 0.0);  // head-on, nothing hard runs along the edge
}

/// Waves of a rim that fits under a patch of half a wavelength, over a plate from -a to b.
EdgeWaves waves_over(const Plate& plate, DiffractionOrder order) {
    const Rim rim = rectangle_rim(0.064, 0.074, 0.01, 0.0075);
    Eigen::MatrixXcd voltage(static_cast<Eigen::Index>(rim.points.size()), 1);
    for (std::size_t i = 0; i < rim.points.size(); ++i)
        voltage(static_cast<Eigen::Index>(i), 0) = std::sin(pi / 0.064 * rim.points[i].x());
    return edge_waves(plate, PlateField(rim, voltage, k), k, order);
}

TEST(EdgeWaves, CoverAllFourEdgesOnce) {
    const EdgeWaves waves = waves_over({-0.06, 0.09, -0.07, 0.075}, DiffractionOrder::first);
    double length = 0.0;
    Eigen::Vector2d outward = Eigen::Vector2d::Zero();
    for (const EdgePiece& piece : waves.pieces) {
        length += piece.weight;
        outward += piece.weight * piece.outward;
        EXPECT_EQ(piece.run, 0.0);
        EXPECT_TRUE(near(piece.sine * piece.sine + piece.cosine * piece.cosine, 1.0, 1e-12));
    }
    EXPECT_TRUE(near(length, 2.0 * (0.15 + 0.145), 1e-12));
    EXPECT_LT(outward.norm(), 1e-12);
}

TEST(EdgeWaves, SplitTheCurrentOfTheUnbrokenPlate) {
    const Plate plate{-0.06, 0.09, -0.07, 0.075};
    const EdgeWaves waves = waves_over(plate, DiffractionOrder::first);
    const Rim rim = rectangle_rim(0.064, 0.074, 0.01, 0.0075);
    Eigen::MatrixXcd voltage(static_cast<Eigen::Index>(rim.points.size()), 1);
    for (std::size_t i = 0; i < rim.points.size(); ++i)
        voltage(static_cast<Eigen::Index>(i), 0) = std::sin(pi / 0.064 * rim.points[i].x());
    const PlateField field(rim, voltage, k);
    for (std::size_t e = 0; e < waves.pieces.size(); ++e) {
        const EdgePiece& piece = waves.pieces[e];
        const auto row = static_cast<Eigen::Index>(e);
        const Eigen::Vector2cd whole = field.current(piece.place).col(0);
        const Eigen::Vector2cd parts =
            waves.hard(row, 0) * (piece.sine * piece.outward + piece.cosine * piece.along).cast<Complex>() +
            waves.slope(row, 0) * piece.along.cast<Complex>();
        EXPECT_LT((whole - parts).norm(), 1e-12 * whole.norm()) << e;
    }
}

TEST(EdgeWaves, SecondOrderFadesWithTheSize) {
    // The wave from the opposite edge has run across the whole plate: about 1/sqrt(pi k d) of the direct one,
    // less the spreading, and a third of that again at ten times the size.
    const auto share = [](double half) {
        const EdgeWaves waves = waves_over({-half, half, -half, half}, DiffractionOrder::second);
        double direct = 0.0;
        double second = 0.0;
        for (std::size_t e = 0; e < waves.pieces.size(); ++e) {
            const double power =
                std::norm(waves.hard(static_cast<Eigen::Index>(e), 0)) * waves.pieces[e].weight;
            (waves.pieces[e].run > 0.0 ? second : direct) += power;
        }
        return std::sqrt(second / direct);
    };
    const double small = share(0.06);
    const double large = share(0.6);
    EXPECT_LT(small, 0.4);
    EXPECT_GT(small, 0.05);
    EXPECT_LT(large, 0.5 * small);
}

TEST(EdgeWaves, NeedTheCentreInsideThePlate) {
    EXPECT_THROW(waves_over({0.01, 0.2, -0.1, 0.1}, DiffractionOrder::first), std::invalid_argument);
}

}  // namespace
}  // namespace panelwright::solver
