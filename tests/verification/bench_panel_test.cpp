#include "tests/verification/bench_panel.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "tests/near.hpp"

namespace panelwright::test {
namespace {

constexpr double middle = 2.45e9;

TEST(BenchPanel, HasTheUsualFormulasSize) {
    const FormulaPatch patch = formula_patch();
    EXPECT_NEAR(patch.width_mm, practice_width_mm, 0.006);  // the last digit, rounded
    EXPECT_NEAR(patch.length_mm, practice_length_mm, 0.006);
}

TEST(BenchPanel, IsMatchedNearWherePracticeFindsTheDip) {
    for (const double side : {0.075, 0.078, 0.080}) {
        const BenchFigures f = bench_figures(bench_panel(side, side), middle);
        // 3 % for a rule of thumb, the model of the tab, and a solder joint that neither knows.
        EXPECT_GT(f.dip_ghz, 0.97 * practice_dip_from_ghz) << side;
        EXPECT_LT(f.dip_ghz, 1.03 * practice_dip_to_ghz) << side;
        EXPECT_LT(f.dip_db, -10.0) << side;  // a dip that one would call one
    }
}

TEST(BenchPanel, GainsALittleFromALargerReflector) {
    const double small = bench_figures(bench_panel(0.078, 0.078), middle).peak_gain_dbi;
    const double large = bench_figures(bench_panel(0.100, 0.095), middle).peak_gain_dbi;
    EXPECT_GT(large, small + 0.1);
    EXPECT_LT(large, small + 1.5);
}

TEST(BenchPanel, ForgivesHalfAMillimetreAtTwoGigahertzButNotAtSix) {
    const double scale = 2.45 / 5.8;
    const BenchFigures exact = bench_figures(bench_panel(0.078, 0.078), middle);
    const BenchFigures small =
        bench_figures(bench_panel(0.078 * scale, 0.078 * scale, scale), middle / scale);
    for (const double error : {-0.0005, 0.0005}) {
        const BenchFigures cut = bench_figures(bench_panel(0.078, 0.078, 1.0, error), middle);
        // Little: the dip moves by less than 1 %, a third of what the panel covers at VSWR 2, and the VSWR at
        // the middle by less than 0.5.
        EXPECT_NEAR(cut.dip_ghz / exact.dip_ghz, 1.0, 0.01) << error;
        EXPECT_NEAR(cut.vswr, exact.vswr, 0.5) << error;
        const BenchFigures small_cut =
            bench_figures(bench_panel(0.078 * scale, 0.078 * scale, scale, error), middle / scale);
        const double moved = std::fabs(small_cut.dip_ghz / small.dip_ghz - 1.0);
        EXPECT_NEAR(moved, 0.02, 0.006) << error;
        EXPECT_GT(std::fabs(small_cut.vswr - small.vswr), 1.2 * std::fabs(cut.vswr - exact.vswr)) << error;
    }
}

}  // namespace
}  // namespace panelwright::test
