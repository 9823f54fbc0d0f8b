#include "tests/verification/measured_patches.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "solver/aperture/closed_formulas.hpp"
#include "tests/near.hpp"

namespace panelwright::test {
namespace {

TEST(MeasuredPatches, ResonateWhereTheyWereMeasured) {
    int asserted = 0;
    for (const MeasuredPatch& patch : measured_patches()) {
        const auto allowed = allowed_error_percent(patch);
        if (!allowed) continue;
        ++asserted;
        const double error = 100.0 * (resonances(patch).fringing_mhz / patch.resonance_mhz - 1.0);
        EXPECT_LT(std::fabs(error), *allowed) << "row " << patch.row;
    }
    EXPECT_EQ(asserted, 18);
}

TEST(MeasuredPatches, ResonateWhereAFullSolutionSays) {
    int compared = 0;
    for (const MeasuredPatch& patch : measured_patches()) {
        const auto full = full_solution_mhz(patch);
        if (!full) continue;
        ++compared;
        // The claim of the method, and what a full solution of three digits and a finite ground can tell.
        EXPECT_TRUE(near(resonances(patch).fringing_mhz, *full, 0.02)) << "row " << patch.row;
    }
    EXPECT_EQ(compared, 5);
}

TEST(MeasuredPatches, ThickOnesAreMetBetterThanByTheTextbookFormula) {
    // Rows 1-9, where a full solution confirms the measurement.
    for (const MeasuredPatch& patch : measured_patches().first(9)) {
        const PatchResonances f = resonances(patch);
        EXPECT_LT(std::fabs(f.fringing_mhz - patch.resonance_mhz),
                  0.7 * std::fabs(f.line_model_mhz - patch.resonance_mhz))
            << patch.row;
    }
}

TEST(MeasuredPatches, HaveTheElectricalHeightsThatTheSourceNames) {
    // The abstract of Chang, Long & Richards gives 0.03 to 0.23 wavelengths in the dielectric.
    EXPECT_TRUE(near(electrical_height(measured_patches()[0]), 0.0373, 2e-3));
    EXPECT_TRUE(near(electrical_height(measured_patches()[8]), 0.2294, 2e-3));
}

TEST(MeasuredPatches, BandwidthIsThatOfTheClosedFormula) {
    // The tabled bandwidths are about twice what any formula for VSWR <= 2 gives, this method's included, and
    // test nothing. D. R. Jackson & N. G. Alexopoulos, IEEE Trans. Antennas Propag. 39(3), 1991, for row 12,
    // thin: space wave, surface wave, copper and dielectric. The formula's edges are not extended and the
    // pattern factor is a series: 15 %.
    const MeasuredPatch& patch = measured_patches()[11];
    const double k = 2.0 * std::acos(-1.0) * patch.resonance_mhz * 1e6 / 299792458.0;
    const solver::ThinPatch thin{k, patch.length_mm * 1e-3, patch.width_mm * 1e-3, patch.height_mm * 1e-3,
                                 patch.permittivity};
    const double skin = 0.0661 / std::sqrt(patch.resonance_mhz * 1e6);  // of copper [m]
    const double loss = 1.0 / (solver::space_wave_quality(thin) * solver::surface_wave_efficiency(thin)) +
                        skin / (patch.height_mm * 1e-3) + 0.001;
    EXPECT_TRUE(near(bandwidth_percent(patch), 100.0 * solver::vswr2_bandwidth(1.0 / loss), 0.15));
}

}  // namespace
}  // namespace panelwright::test
