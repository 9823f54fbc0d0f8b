#include "mesh/graded_lines.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <random>

#include "tests/near.hpp"

namespace panelwright::mesh {
namespace {

/// Cell sizes are differences of coordinates of order 1, so they carry rounding of 1e-16 over a cell of 1e-6
/// at least; the lines themselves forgive 1e-9.
constexpr double rounding = 1.0 + 1e-8;

void expect_graded(const std::vector<double>& lines, const std::vector<KeyLine>& keys,
                   const Grading& grading) {
    std::vector<double> cell;
    for (std::size_t n = 0; n + 1 < lines.size(); ++n) cell.push_back(lines[n + 1] - lines[n]);
    for (std::size_t n = 0; n < cell.size(); ++n) {
        ASSERT_GT(cell[n], 0.0);
        EXPECT_LE(cell[n], grading.largest * rounding);
        if (n == 0) continue;
        EXPECT_LE(std::max(cell[n], cell[n - 1]), std::min(cell[n], cell[n - 1]) * grading.growth * rounding);
    }
    for (const KeyLine& key : keys) {
        const auto at = std::find(lines.begin(), lines.end(), key.at);
        ASSERT_NE(at, lines.end()) << "key line " << key.at << " is missing";
        if (!key.free_edge) continue;
        const auto n = static_cast<std::size_t>(at - lines.begin());
        EXPECT_LE(n > 0 ? cell[n - 1] : 0.0, grading.edge * rounding);
        EXPECT_LE(n < cell.size() ? cell[n] : 0.0, grading.edge * rounding);
    }
}

TEST(GradedLines, GrowGeometricallyFromOneEdge) {
    // 1 + 2 + 4 + … + 64 = 127 cells of the edge's size, and nothing to keep to at the other end.
    const std::vector<KeyLine> keys = {{0.0, true}, {127.0, false}};
    const auto lines = graded_lines(keys, {.largest = 1000.0, .edge = 1.0, .growth = 2.0});
    ASSERT_EQ(lines.size(), 8U);
    for (std::size_t n = 0; n < lines.size(); ++n) {
        // A dozen operations on numbers of order 100.
        EXPECT_TRUE(test::near(lines[n], std::exp2(static_cast<double>(n)) - 1.0, 1e-13, 1e-13)) << lines[n];
    }
}

TEST(GradedLines, AreEvenWhereNothingIsFine) {
    const std::vector<KeyLine> keys = {{-1.0, false}, {1.0, false}};
    const auto lines = graded_lines(keys, {.largest = 0.5, .edge = 0.5, .growth = 1.5});
    ASSERT_EQ(lines.size(), 5U);
    for (std::size_t n = 0; n < lines.size(); ++n) {
        EXPECT_TRUE(test::near(lines[n], -1.0 + 0.5 * static_cast<double>(n), 0.0, 1e-14)) << lines[n];
    }
}

TEST(GradedLines, KeepASingleCellBetweenCloseKeys) {
    const std::vector<KeyLine> keys = {{0.0, true}, {1.0, false}, {1.01, true}, {2.0, true}};
    const Grading grading = {.largest = 0.5, .edge = 0.1, .growth = 1.8};
    const auto lines = graded_lines(keys, grading);
    expect_graded(lines, keys, grading);
    const auto at = std::find(lines.begin(), lines.end(), 1.0);
    EXPECT_EQ(*(at + 1), 1.01);
}

TEST(GradedLines, FewerThanTwoKeysAreLeftAlone) {
    EXPECT_TRUE(graded_lines({}, {.largest = 1.0, .edge = 1.0, .growth = 2.0}).empty());
    const std::vector<KeyLine> one = {{3.0, true}};
    EXPECT_EQ(graded_lines(one, {.largest = 1.0, .edge = 1.0, .growth = 2.0}), std::vector<double>{3.0});
}

TEST(GradedLines, KeepTheirLimitsForAnyKeys) {
    std::mt19937 random(20240611);
    const auto uniform = [&](double from, double to) {
        return std::uniform_real_distribution(from, to)(random);
    };
    for (int trial = 0; trial < 400; ++trial) {
        std::vector<KeyLine> keys = {{0.0, uniform(0.0, 1.0) < 0.5}};
        const int count = std::uniform_int_distribution(1, 12)(random);
        for (int n = 0; n < count; ++n) {
            // From a millionth of the axis to all of it.
            keys.push_back({keys.back().at + std::pow(10.0, uniform(-6.0, 0.0)), uniform(0.0, 1.0) < 0.5});
        }
        const double largest = std::pow(10.0, uniform(-1.5, 0.5));
        const Grading grading = {largest, largest * uniform(0.05, 1.0), uniform(1.1, 3.0)};
        const auto lines = graded_lines(keys, grading);
        expect_graded(lines, keys, grading);
        if (HasFailure()) FAIL() << "trial " << trial;
    }
}

TEST(KeyLines, MergeWithinTheirToleranceAndRememberEdges) {
    KeyLines keys(1e-6);
    keys.add({1.0, false});
    keys.add({0.0, true});
    keys.add({1.0 + 5e-7, true});
    ASSERT_EQ(keys.lines().size(), 2U);
    EXPECT_EQ(keys.lines()[0].at, 0.0);
    EXPECT_EQ(keys.lines()[1].at, 1.0);
    EXPECT_TRUE(keys.lines()[1].free_edge);
}

TEST(KeyLines, SettleOnAnExistingLineOrMakeOne) {
    KeyLines keys(1e-6);
    keys.add({0.0, true});
    EXPECT_EQ(keys.settle(0.3, -0.1, 0.4), 0.0);
    EXPECT_EQ(keys.lines().size(), 1U);
    EXPECT_EQ(keys.settle(0.3, 0.1, 0.4), 0.3);
    EXPECT_EQ(keys.lines().size(), 2U);
    EXPECT_EQ(keys.settle(0.2, -0.1, 0.4), 0.3) << "the nearer of two";
}

TEST(NearestLine, TakesTheNearerNeighbour) {
    const std::vector<double> lines = {0.0, 1.0, 3.0};
    EXPECT_EQ(nearest_line(lines, -5.0), 0);
    EXPECT_EQ(nearest_line(lines, 0.4), 0);
    EXPECT_EQ(nearest_line(lines, 1.9), 1);
    EXPECT_EQ(nearest_line(lines, 2.1), 2);
    EXPECT_EQ(nearest_line(lines, 9.0), 2);
}

}  // namespace
}  // namespace panelwright::mesh
