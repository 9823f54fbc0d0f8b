#include <gtest/gtest.h>

#include <array>
#include <boost/math/quadrature/gauss.hpp>
#include <cmath>
#include <numeric>
#include <stdexcept>

#include "solver/aperture/gauss.hpp"
#include "tests/near.hpp"

namespace panelwright::solver {
namespace {

using test::near;

/// Integral by `rule` of the power x^degree.
double moment(const GaussRule& rule, int degree) {
    double sum = 0.0;
    for (std::size_t i = 0; i < rule.nodes.size(); ++i)
        sum += rule.weights[i] * std::pow(rule.nodes[i], degree);
    return sum;
}

TEST(GaussRule, IsExactForEveryPowerThatItMustHold) {
    for (int count = 1; count <= 64; ++count) {
        const GaussRule rule = gauss_rule(count);
        ASSERT_EQ(rule.nodes.size(), static_cast<std::size_t>(count));
        for (int degree = 0; degree < 2 * count; ++degree) {
            const double exact = degree % 2 == 0 ? 2.0 / (degree + 1) : 0.0;
            // Rounding of some hundred operations.
            EXPECT_TRUE(near(moment(rule, degree), exact, 0.0, 2e-14))
                << count << " points, degree " << degree;
        }
    }
}

TEST(GaussRule, MissesTheFirstPowerBeyond) {
    // The error for x^(2n) is the squared norm of the monic Legendre polynomial, 8/45 for n = 2.
    EXPECT_TRUE(near(2.0 / 5.0 - moment(gauss_rule(2), 4), 8.0 / 45.0, 1e-14));
}

TEST(GaussRule, AgreesWithBoost) {
    using Twin = boost::math::quadrature::gauss<double, 20>;
    const GaussRule rule = gauss_rule(20);
    for (std::size_t i = 0; i < 10; ++i) {
        EXPECT_TRUE(near(rule.nodes[10 + i], Twin::abscissa()[i], 1e-14)) << i;
        EXPECT_TRUE(near(rule.weights[10 + i], Twin::weights()[i], 1e-13)) << i;
        EXPECT_EQ(rule.nodes[9 - i], -rule.nodes[10 + i]) << i;
        EXPECT_TRUE(near(rule.weights[9 - i], rule.weights[10 + i], 1e-14)) << i;
    }
}

TEST(GaussRule, RefusesCountsOutOfRange) {
    EXPECT_THROW(gauss_rule(0), std::invalid_argument);
    EXPECT_THROW(gauss_rule(65), std::invalid_argument);
}

TEST(CompositeRule, IntegratesAcrossBreaksOfSlope) {
    // |x - 0.3| has its corner at a break, so that the rule is exact; from -1 to 2: (1.3^2 + 1.7^2) / 2.
    const std::array<double, 3> breaks{-1.0, 0.3, 2.0};
    const GaussRule rule = composite_rule(breaks, 0.4, 2);
    double sum = 0.0;
    for (std::size_t i = 0; i < rule.nodes.size(); ++i)
        sum += rule.weights[i] * std::fabs(rule.nodes[i] - 0.3);
    EXPECT_TRUE(near(sum, 0.5 * (1.3 * 1.3 + 1.7 * 1.7), 1e-14));
    // ceil(1.3 / 0.4) + ceil(1.7 / 0.4) panels.
    EXPECT_EQ(rule.nodes.size(), 2u * (4u + 5u));
    EXPECT_TRUE(std::is_sorted(rule.nodes.begin(), rule.nodes.end()));
}

TEST(CompositeRule, ResolvesAWaveAtFourPointsOnHalfAWavelength) {
    // exp(j 2 pi x) over 3.2 wavelengths, as the edges of a plate are cut: four points on half a wavelength
    // miss the integral by the eighth derivative's term, 2e-6 of a panel.
    const std::array<double, 2> breaks{0.0, 3.2};
    const GaussRule rule = composite_rule(breaks, 0.5, 4);
    double real = 0.0;
    double imaginary = 0.0;
    const double k = 2.0 * std::acos(-1.0);
    for (std::size_t i = 0; i < rule.nodes.size(); ++i) {
        real += rule.weights[i] * std::cos(k * rule.nodes[i]);
        imaginary += rule.weights[i] * std::sin(k * rule.nodes[i]);
    }
    EXPECT_TRUE(near(real, std::sin(k * 3.2) / k, 0.0, 1e-5));
    EXPECT_TRUE(near(imaginary, (1.0 - std::cos(k * 3.2)) / k, 0.0, 1e-5));
}

TEST(CompositeRule, PassesOverEmptyStretchesAndRefusesNoLength) {
    const std::array<double, 3> breaks{0.0, 0.0, 1.0};
    const GaussRule rule = composite_rule(breaks, 2.0, 3);
    EXPECT_EQ(rule.nodes.size(), 3u);
    EXPECT_TRUE(near(std::accumulate(rule.weights.begin(), rule.weights.end(), 0.0), 1.0, 1e-14));
    EXPECT_THROW(composite_rule(breaks, 0.0, 3), std::invalid_argument);
}

}  // namespace
}  // namespace panelwright::solver
