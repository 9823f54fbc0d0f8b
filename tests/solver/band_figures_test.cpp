#include <gtest/gtest.h>

#include <cmath>
#include <limits>
#include <stdexcept>
#include <string>
#include <vector>

#include "solver/constants.hpp"
#include "solver/result.hpp"
#include "tests/near.hpp"
#include "tests/reference/sample_fields.hpp"

namespace panelwright::solver {
namespace {

using test::near;

/// A parallel resonance of quality `q` and resistance `r` at `resonance`, behind a series reactance.
struct Resonator {
    double r = 50.0;  ///< [ohm]
    double q = 25.0;
    double resonance = 2.4e9;  ///< [Hz]
    double series = 0.0;       ///< [ohm]

    Complex impedance(double f) const {
        return r / Complex(1.0, q * (f / resonance - resonance / f)) + Complex(0.0, series);
    }
};

PortResponse swept(const Resonator& resonator, double from, double to, int points) {
    PortResponse port;
    for (int i = 0; i < points; ++i) {
        const double f = points == 1 ? from : from + (to - from) * i / (points - 1);
        port.frequency.push_back(f);
        port.impedance.push_back(resonator.impedance(f));
    }
    return port;
}

TEST(BandFigures, OfAMatchedResonatorBetweenSamples) {
    // Matched at resonance, VSWR <= 2 over 1/(sqrt(2) Q) of the centre (D. R. Jackson and N. G. Alexopoulos,
    // IEEE Trans. Antennas Propag. 39(3), 407-410, 1991, from memory, high); to first order in 1/Q, next
    // order 1/(8 Q^2).
    for (const double resonance : {2.4e9, 2.4013e9, 2.39871e9}) {
        const Resonator resonator{.resonance = resonance};
        const BandFigures b = band_figures(swept(resonator, 2.28e9, 2.52e9, 61), 50.0);
        // Samples 4 MHz apart on a resonance 96 MHz wide: parabola off by less than a hundredth of a step.
        EXPECT_TRUE(near(b.resonance_hz, resonance, 0.0, 0.04e6)) << b.resonance_hz - resonance;
        EXPECT_TRUE(near(b.best_match_hz, resonance, 0.0, 0.04e6)) << b.best_match_hz - resonance;
        EXPECT_LT(b.best_match_db, -60.0);
        const double exact = 100.0 / (std::sqrt(2.0) * resonator.q);
        EXPECT_TRUE(near(b.bandwidth_percent, exact, 0.0, 0.005)) << b.bandwidth_percent - exact;
        EXPECT_TRUE(near(std::sqrt(b.vswr2_from_hz * b.vswr2_to_hz), resonance, 0.0, 0.1e6));
    }
}

TEST(BandFigures, ASeriesReactanceMovesTheMatchAndNotTheResonance) {
    const Resonator resonator{.r = 90.0, .series = 25.0};
    const BandFigures b = band_figures(swept(resonator, 2.2e9, 2.6e9, 101), 50.0);
    EXPECT_TRUE(near(b.resonance_hz, 2.4e9, 0.0, 0.1e6));
    EXPECT_GT(b.best_match_hz, 2.41e9);  // capacitive side, where the resonator cancels the reactance
    EXPECT_GT(b.vswr2_to_hz, b.best_match_hz);
    EXPECT_LT(b.vswr2_from_hz, b.best_match_hz);
    // Both edges against the closed form: |S11| = 1/3 there, to the linear interpolation's 1/8 (step /
    // width)^2.
    for (const double edge : {b.vswr2_from_hz, b.vswr2_to_hz}) {
        EXPECT_TRUE(near(std::abs(reflection(resonator.impedance(edge), 50.0)), 1.0 / 3.0, 0.002));
    }
}

TEST(BandFigures, WorkOnUnevenSteps) {
    const Resonator resonator{};
    PortResponse port;
    for (const double mhz :
         {2200.0, 2300.0, 2350.0, 2370.0, 2392.0, 2403.0, 2407.0, 2420.0, 2450.0, 2500.0, 2600.0}) {
        port.frequency.push_back(mhz * 1e6);
        port.impedance.push_back(resonator.impedance(mhz * 1e6));
    }
    const BandFigures b = band_figures(port, 50.0);
    EXPECT_TRUE(near(b.resonance_hz, 2.4e9, 0.0, 1e6));  // a tenth of the steps there
    EXPECT_TRUE(near(b.best_match_hz, 2.4e9, 0.0, 1e6));
}

TEST(BandFigures, WhatLiesAtTheEdgeOfTheBandDoesNotExist) {
    const Resonator resonator{};
    const BandFigures rising = band_figures(swept(resonator, 2.3e9, 2.395e9, 20), 50.0);
    EXPECT_TRUE(std::isnan(rising.resonance_hz));
    EXPECT_EQ(rising.best_match_hz, 2.395e9);
    EXPECT_TRUE(near(rising.best_match_db,
                     20.0 * std::log10(std::abs(reflection(resonator.impedance(2.395e9), 50.0))), 1e-12));
    EXPECT_FALSE(std::isnan(rising.vswr2_from_hz));
    EXPECT_TRUE(std::isnan(rising.vswr2_to_hz));
    EXPECT_TRUE(std::isnan(rising.bandwidth_percent));
    const BandFigures falling = band_figures(swept(resonator, 2.405e9, 2.5e9, 20), 50.0);
    EXPECT_TRUE(std::isnan(falling.resonance_hz));
    EXPECT_EQ(falling.best_match_hz, 2.405e9);
    EXPECT_TRUE(std::isnan(falling.vswr2_from_hz));
    EXPECT_FALSE(std::isnan(falling.vswr2_to_hz));
}

TEST(BandFigures, APoorMatchHasNoBand) {
    const BandFigures b = band_figures(swept(Resonator{.r = 120.0}, 2.2e9, 2.6e9, 81), 50.0);
    EXPECT_TRUE(near(b.best_match_db, 20.0 * std::log10(70.0 / 170.0), 1e-6));
    EXPECT_TRUE(std::isnan(b.vswr2_from_hz));
    EXPECT_TRUE(std::isnan(b.vswr2_to_hz));
    EXPECT_TRUE(std::isnan(b.bandwidth_percent));
    EXPECT_TRUE(near(b.resonance_hz, 2.4e9, 0.0, 0.1e6));
}

TEST(BandFigures, OfOnePointAndOfNone) {
    const BandFigures one = band_figures(swept(Resonator{}, 2.4e9, 2.4e9, 1), 50.0);
    EXPECT_EQ(one.best_match_hz, 2.4e9);
    EXPECT_EQ(one.best_match_db, -200.0);
    EXPECT_TRUE(std::isnan(one.resonance_hz));
    EXPECT_TRUE(std::isnan(one.bandwidth_percent));
    EXPECT_TRUE(std::isnan(band_figures(PortResponse{}, 50.0).best_match_hz));
}

TEST(BandFigures, PassOverPointsThatAreNotNumbers) {
    PortResponse port = swept(Resonator{}, 2.28e9, 2.52e9, 61);
    port.impedance[3] = {std::numeric_limits<double>::quiet_NaN(), 0.0};
    EXPECT_TRUE(near(band_figures(port, 50.0).best_match_hz, 2.4e9, 0.0, 0.04e6));
    port.impedance.front() = port.impedance[3];
    EXPECT_TRUE(near(band_figures(port, 50.0).resonance_hz, 2.4e9, 0.0, 0.04e6));
}

TEST(BandFigures, RefuseABrokenResponse) {
    PortResponse port = swept(Resonator{}, 2.3e9, 2.5e9, 5);
    EXPECT_THROW(band_figures(port, 0.0), std::invalid_argument);
    port.frequency[2] = port.frequency[1];
    EXPECT_THROW(band_figures(port, 50.0), std::invalid_argument);
    port.frequency.pop_back();
    EXPECT_THROW(band_figures(port, 50.0), std::invalid_argument);
}

TEST(BandFigureTable, NamesEveryFigureOnce) {
    const std::vector<std::string> expected = {"resonance_hz",  "best_match_hz", "best_match_db",
                                               "vswr2_from_hz", "vswr2_to_hz",   "bandwidth_percent"};
    ASSERT_EQ(band_figure_table().size(), expected.size());
    ASSERT_EQ(sizeof(BandFigures), expected.size() * sizeof(double));
    BandFigures values{};
    for (std::size_t i = 0; i < expected.size(); ++i) {
        const BandFigureEntry& entry = band_figure_table()[i];
        EXPECT_EQ(entry.name, expected[i]);
        EXPECT_EQ(values.*entry.value, 0.0) << "two rows share a figure";
        values.*entry.value = 1.0;
        EXPECT_TRUE(entry.definition.ends_with(".")) << entry.name;
    }
}

Solution solved(double pattern_hz) {
    Solution solution;
    solution.port = swept(Resonator{.r = 80.0}, 2.28e9, 2.52e9, 61);
    solution.patterns = {
        test::sampled(test::huygens(Eigen::Vector3d::UnitZ(), Eigen::Vector3d::UnitX()), 10.0)};
    solution.patterns.front().frequency = pattern_hz;
    solution.powers = {Powers{.radiated = radiated_power(solution.patterns.front())}};
    return solution;
}

TEST(WithFigures, TakesTheMismatchFromBetweenBandPoints) {
    for (const double pattern_hz : {2.28e9, 2.2813e9, 2.4013e9, 2.5187e9, 2.52e9}) {
        const MethodResult result = with_figures(solved(pattern_hz), 50.0);
        ASSERT_EQ(result.figures.size(), 1U);
        const Complex s11 = reflection(Resonator{.r = 80.0}.impedance(pattern_hz), 50.0);
        const Figures& f = result.figures.front();
        const double mismatch_db = f.peak_gain_dbi - f.realized_gain_dbi;
        // Cubic between points a twenty-fourth of the resonance's width apart.
        EXPECT_TRUE(near(mismatch_db, -10.0 * std::log10(1.0 - std::norm(s11)), 0.0, 1e-4)) << pattern_hz;
        EXPECT_TRUE(near(result.band.resonance_hz, 2.4e9, 0.0, 0.04e6));
    }
    EXPECT_TRUE(std::isnan(with_figures(solved(2.6e9), 50.0).figures.front().realized_gain_dbi));
}

TEST(WithFigures, RefusesPatternsWithoutPowers) {
    Solution solution = solved(2.4e9);
    solution.powers.clear();
    EXPECT_THROW(with_figures(solution, 50.0), std::invalid_argument);
}

}  // namespace
}  // namespace panelwright::solver
