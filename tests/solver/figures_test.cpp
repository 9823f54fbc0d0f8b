#include "solver/figures.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <set>
#include <stdexcept>
#include <string>
#include <vector>

#include "solver/constants.hpp"
#include "tests/near.hpp"
#include "tests/reference/sample_fields.hpp"

namespace panelwright::solver {
namespace {

using Eigen::Vector3cd;
using Eigen::Vector3d;
using test::near;
using test::sampled;

const Vector3d x = Vector3d::UnitX();
const Vector3d y = Vector3d::UnitY();
const Vector3d z = Vector3d::UnitZ();

// A half-power point interpolated linearly in dB between samples 2 deg apart, where the beams used here curve
// by less than 0.01 dB/deg^2 and fall by more than 0.1 dB/deg, is off by less than 2^2 / 8 * 0.01 / 0.1 =
// 0.05 deg a side; the two sides err alike.
constexpr double beamwidth_deg = 0.1;

Figures lossless(const FarField& field) {
    const double radiated = radiated_power(field);
    return figures(field, Powers{.accepted = radiated, .radiated = radiated}, 0.0);
}

Figures lossless(const test::VectorPattern& pattern) {
    return lossless(sampled(pattern));
}

TEST(Figures, OfAShortDipoleAlongX) {
    // Directivity 1.5 = 1.76091 dBi, beamwidth 90 deg: Balanis, Antenna Theory, ch. 4 [read as quoted].
    const Figures f = lossless(test::dipole(x, 0.0));
    EXPECT_TRUE(near(f.directivity_dbi, 1.76091, 0.0, 1e-5));
    EXPECT_TRUE(near(f.peak_gain_dbi, 1.76091, 0.0, 1e-5));
    EXPECT_TRUE(near(f.boresight_gain_dbi, 1.76091, 0.0, 1e-5));
    EXPECT_TRUE(near(f.hpbw_e_deg, 90.0, 0.0, beamwidth_deg));
    EXPECT_TRUE(std::isnan(f.hpbw_h_deg));  // the same all round
    EXPECT_TRUE(near(f.front_to_back_db, 0.0, 0.0, 1e-9));
    EXPECT_TRUE(near(f.front_to_rear_db, 0.0, 0.0, 1e-9));
    EXPECT_EQ(f.squint_deg, 0.0);
    EXPECT_EQ(f.axial_ratio_db, 60.0);
    EXPECT_TRUE(near(f.radiation_efficiency, 1.0, 1e-15));
}

TEST(Figures, OfAShortDipoleAlongZPeakAtTheHorizon) {
    const Figures f = lossless(test::dipole(z, 0.0));
    EXPECT_TRUE(near(f.directivity_dbi, 1.76091, 0.0, 1e-5));
    EXPECT_TRUE(near(f.hpbw_e_deg, 90.0, 0.0, beamwidth_deg));
    EXPECT_TRUE(near(f.hpbw_h_deg, 90.0, 0.0, beamwidth_deg));
    EXPECT_TRUE(near(f.squint_deg, 90.0, 0.0, 1e-6));
    EXPECT_EQ(f.boresight_gain_dbi, -200.0);
    EXPECT_EQ(f.front_to_back_db, 200.0);
    EXPECT_TRUE(near(f.front_to_rear_db, 10.0 * std::log10(4.0), 0.0, 1e-9));  // sin^2(150 deg) = 1/4
    EXPECT_TRUE(std::isnan(f.axial_ratio_db));
}

struct DipoleCase {
    double length;       ///< in wavelengths
    double directivity;  ///< [1]
};

TEST(Figures, DirectivityOfLongerDipolesWhateverTheirAxis) {
    // [computed] from the closed form of Balanis, Antenna Theory, 4th ed., sec. 4.5-4.6.
    const std::vector<DipoleCase> cases = {
        {0.25, 1.53184}, {0.5, 1.6409224}, {0.75, 1.88207}, {1.0, 2.41100}, {1.25, 3.28248}};
    for (const DipoleCase& c : cases) {
        const double expected = 10.0 * std::log10(c.directivity);
        // Last printed digit of the table, 1e-5 in 1.5, is 3e-5 dB.
        EXPECT_TRUE(near(lossless(test::dipole(z, c.length)).directivity_dbi, expected, 0.0, 3e-5))
            << c.length;
        EXPECT_TRUE(near(lossless(test::dipole(x, c.length)).directivity_dbi, expected, 0.0, 3e-5))
            << c.length;
    }
    // Along a slanting axis no sample falls on the peak: at most 1 deg off, 0.01 dB for this beam.
    const double slanting = lossless(test::dipole(test::direction(33.3, 12.1), 1.25)).directivity_dbi;
    EXPECT_TRUE(near(slanting, 10.0 * std::log10(3.28248), 0.0, 0.01));
}

TEST(Figures, BeamwidthOfAHalfWaveDipole) {
    // 2.15088 dBi and 78.0777 deg: [computed] from Balanis, Antenna Theory, 4th ed., eq. (4-84).
    const Figures along_z = lossless(test::dipole(z, 0.5));
    EXPECT_TRUE(near(along_z.directivity_dbi, 2.15088, 0.0, 1e-5));
    EXPECT_TRUE(near(along_z.hpbw_e_deg, 78.0777, 0.0, beamwidth_deg));
    const Figures along_x = lossless(test::dipole(x, 0.5));  // the beam lies over the start of the cut
    EXPECT_TRUE(near(along_x.hpbw_e_deg, 78.0777, 0.0, beamwidth_deg));
    const Figures along_y = lossless(test::dipole(y, 0.5));
    EXPECT_TRUE(near(along_y.hpbw_h_deg, 78.0777, 0.0, beamwidth_deg));
    EXPECT_TRUE(std::isnan(along_y.hpbw_e_deg));
}

TEST(Figures, OfAHuygensSource) {
    // Intensity (1 + cos)^2: directivity 3, half power at cos = sqrt(2) - 1.
    const Figures f = lossless(test::huygens(z, x));
    EXPECT_TRUE(near(f.directivity_dbi, 10.0 * std::log10(3.0), 0.0, 1e-9));
    const double exact = 2.0 * std::acos(std::sqrt(2.0) - 1.0) * 180.0 / pi;
    EXPECT_TRUE(near(f.hpbw_e_deg, exact, 0.0, beamwidth_deg));
    EXPECT_TRUE(near(f.hpbw_h_deg, exact, 0.0, beamwidth_deg));
    EXPECT_GT(f.front_to_back_db, 190.0);
    // At theta = 150 deg: (2 / (1 - cos 30 deg))^2.
    EXPECT_TRUE(near(f.front_to_rear_db, 20.0 * std::log10(2.0 / (1.0 - std::sqrt(0.75))), 0.0, 1e-9));
    EXPECT_LT(f.cross_polar_db, -190.0);
    EXPECT_EQ(f.axial_ratio_db, 60.0);
}

TEST(Figures, AnEvenRadiatorHasNoBeam) {
    FarField field = whole_sphere(1e9, pi / 90.0);
    field.e_theta.setConstant(1.0);
    const Figures f = lossless(field);
    EXPECT_TRUE(near(f.directivity_dbi, 0.0, 0.0, 1e-12));
    EXPECT_TRUE(std::isnan(f.hpbw_e_deg));
    EXPECT_TRUE(std::isnan(f.hpbw_h_deg));
    EXPECT_EQ(f.squint_deg, 0.0);
    EXPECT_TRUE(near(f.front_to_rear_db, 0.0, 0.0, 1e-12));
}

TEST(Figures, WithoutAnyField) {
    const Figures f = figures(whole_sphere(1e9, pi / 90.0), Powers{}, 0.0);
    EXPECT_EQ(f.peak_gain_dbi, -200.0);
    EXPECT_EQ(f.radiation_efficiency, 0.0);
    for (const double absent : {f.directivity_dbi, f.hpbw_e_deg, f.hpbw_h_deg, f.front_to_back_db,
                                f.front_to_rear_db, f.squint_deg, f.cross_polar_db, f.axial_ratio_db}) {
        EXPECT_TRUE(std::isnan(absent));
    }
}

TEST(Figures, SquintOfATiltedBeamBetweenSamples) {
    for (const double tilt_deg : {0.0, 0.3, 0.9, 7.3, 121.1, 179.6}) {
        for (const double phi_deg : {0.0, 137.0}) {
            const Vector3d boresight = test::direction(tilt_deg, phi_deg);
            const Vector3d polarisation = test::direction(tilt_deg + 90.0, phi_deg);
            const Figures f = lossless(test::beam(boresight, polarisation, 5.0));
            // The beam is a parabola in dB but for terms of fourth order: 0.02 deg at 2 deg between samples.
            EXPECT_TRUE(near(f.squint_deg, tilt_deg, 0.0, 0.02))
                << tilt_deg << ' ' << phi_deg << ' ' << f.squint_deg;
        }
    }
}

TEST(Figures, BeamwidthDoesNotDependOnWhereTheBeamPoints) {
    // Half power of (1 + c)^2 exp(-2 b (1 - c)), b = 5: 2 ln((1 + c)/2) - 10 (1 - c) = -ln 2 at c = 0.937078.
    const double exact = 2.0 * std::acos(0.937078) * 180.0 / pi;
    for (const double tilt_deg : {0.0, 45.5, 181.0, 359.0}) {
        const Figures e =
            lossless(test::beam(test::direction(tilt_deg, 0.0), test::direction(tilt_deg + 90.0, 0.0), 5.0));
        EXPECT_TRUE(near(e.hpbw_e_deg, exact, 0.0, beamwidth_deg)) << tilt_deg << ' ' << e.hpbw_e_deg;
        const Figures h = lossless(test::beam(test::direction(tilt_deg, 90.0), x, 5.0));
        EXPECT_TRUE(near(h.hpbw_h_deg, exact, 0.0, beamwidth_deg)) << tilt_deg << ' ' << h.hpbw_h_deg;
    }
}

TEST(Figures, RealizedGainAndEfficiency) {
    const FarField field = sampled(test::huygens(z, x), 5.0);
    const double radiated = radiated_power(field);
    const Powers powers{.accepted = 2.0 * radiated, .radiated = radiated};
    const Figures f = figures(field, powers, Complex(0.3, 0.4));
    EXPECT_TRUE(near(f.radiation_efficiency, 0.5, 1e-14));
    EXPECT_TRUE(near(f.directivity_dbi - f.peak_gain_dbi, 10.0 * std::log10(2.0), 0.0, 1e-12));
    EXPECT_TRUE(near(f.peak_gain_dbi - f.realized_gain_dbi, -10.0 * std::log10(0.75), 0.0, 1e-12));
    EXPECT_TRUE(std::isnan(figures(field, powers, std::nan("")).realized_gain_dbi));
    EXPECT_FALSE(std::isnan(figures(field, powers, std::nan("")).peak_gain_dbi));
    EXPECT_LE(figures(field, powers, 1.0).realized_gain_dbi, -190.0);
}

test::VectorPattern turnstile(Complex y_over_x) {
    return [=](const Vector3d& r) -> Vector3cd {
        const Vector3cd current(1.0, y_over_x, 0.0);
        return current - r.cast<Complex>() * (r.cast<Complex>().transpose() * current)(0);
    };
}

TEST(Polarisation, OfACrossedDipole) {
    const Complex j(0.0, 1.0);
    // exp(+j omega t): y lagging by a quarter period turns x towards y, right-hand along +z (IEEE Std 145).
    const FarField right = sampled(turnstile(-j));
    EXPECT_TRUE(near(lossless(right).axial_ratio_db, 0.0, 0.0, 1e-9));
    EXPECT_TRUE(polarisation_sense(right).starts_with("right-hand, clockwise seen from behind"));
    const FarField left = sampled(turnstile(j));
    EXPECT_TRUE(near(lossless(left).axial_ratio_db, 0.0, 0.0, 1e-9));
    EXPECT_TRUE(polarisation_sense(left).starts_with("left-hand, anticlockwise seen from behind"));
    // Directivity of two crossed short dipoles in quadrature: 1.5, at boresight (intensity 1 + cos^2).
    EXPECT_TRUE(near(lossless(right).boresight_gain_dbi, 10.0 * std::log10(1.5), 0.0, 1e-9));
    EXPECT_TRUE(near(lossless(right).cross_polar_db, 0.0, 0.0, 1e-9));
}

TEST(Polarisation, OfAnEllipseItsAxesRatio) {
    EXPECT_TRUE(near(lossless(turnstile({0.0, -0.5})).axial_ratio_db, 20.0 * std::log10(2.0), 0.0, 1e-9));
    EXPECT_TRUE(near(lossless(turnstile({0.0, 0.02})).axial_ratio_db, 20.0 * std::log10(50.0), 0.0, 1e-9));
    EXPECT_TRUE(polarisation_sense(sampled(turnstile({0.0, 0.02}))).starts_with("left-hand"));  // 34 dB
    EXPECT_EQ(polarisation_sense(sampled(turnstile({0.0, 0.005}))), "linear");                  // 46 dB
    EXPECT_EQ(lossless(turnstile({1.0, 0.0})).axial_ratio_db, 60.0);  // slanting, linear
    EXPECT_TRUE(polarisation_sense(whole_sphere(1e9, 0.1)).starts_with("none"));
    EXPECT_THROW(polarisation_sense(FarField{}), std::invalid_argument);
}

/// A lobe of co-polar level 1 at phi 10 deg and small cross-polar spots of given amplitude.
FarField spotted(double phi_deg_of_spot, double spot) {
    FarField field = sampled(test::beam(test::direction(60.0, 10.0), test::direction(150.0, 10.0), 12.0));
    const LudwigThird parts = ludwig_third(field);
    const auto q = static_cast<Eigen::Index>(std::lround(phi_deg_of_spot / 2.0));
    const Eigen::Index t = 30;
    const double phi = field.phi[static_cast<std::size_t>(q)];
    const double co = std::abs(parts.co(t, q));
    field.e_theta(t, q) = std::cos(phi) * co + std::sin(phi) * spot;
    field.e_phi(t, q) = -std::sin(phi) * co + std::cos(phi) * spot;
    return field;
}

TEST(CrossPolar, IsSeenAcrossTheSeamOfPhi) {
    const double inside = lossless(spotted(352.0, 1.0)).cross_polar_db;  // 18 deg from the peak, -5 dB there
    const double outside =
        lossless(spotted(310.0, 1.0)).cross_polar_db;  // 60 deg from the peak, below -10 dB
    EXPECT_GT(inside, outside + 1.0);
}

TEST(CrossPolar, CountsOnlyTheMainBeam) {
    // A co-polar main beam at boresight and a strong, wholly cross-polar lobe at theta = 120 deg.
    const auto main = test::beam(z, x, 8.0);
    const auto lobe = test::beam(test::direction(120.0, 90.0), test::direction(210.0, 90.0), 20.0);
    const auto both = [=](const Vector3d& r) -> Vector3cd { return main(r) + 0.7 * lobe(r); };
    EXPECT_LT(lossless(both).cross_polar_db, -40.0);
    const auto slanting = [=](const Vector3d& r) -> Vector3cd {
        return main(r) + 0.1 * test::beam(z, y, 8.0)(r);
    };
    EXPECT_TRUE(near(lossless(slanting).cross_polar_db, -20.0, 0.0, 1e-9));
}

TEST(HalfPowerBeamwidth, IsTheSameWhereverTheBeamLiesOnTheCircle) {
    constexpr std::size_t n = 90;
    for (std::size_t shift = 0; shift < n; ++shift) {
        std::vector<double> cut(n);
        for (std::size_t i = 0; i < n; ++i) {
            const double angle = 2.0 * pi * static_cast<double>(i) / n;
            cut[(i + shift) % n] = std::exp(-3.0 * (1.0 - std::cos(angle)));
        }
        const double exact = 2.0 * std::acos(1.0 - std::log(2.0) / 3.0);
        EXPECT_TRUE(near(half_power_beamwidth(cut), exact, 0.0, 0.002)) << shift;  // 4 deg steps: 0.1 deg
    }
}

TEST(HalfPowerBeamwidth, FindsThePeakBetweenSamples) {
    // Samples of a narrow beam astride its top: without refinement the level would be 0.19 dB too low.
    constexpr std::size_t n = 72;
    std::vector<double> cut(n);
    for (std::size_t i = 0; i < n; ++i) {
        const double angle = 2.0 * pi * (static_cast<double>(i) + 0.5) / n;
        cut[i] = std::exp(-23.0 * (1.0 - std::cos(angle)));
    }
    const double exact = 2.0 * std::acos(1.0 - std::log(2.0) / 23.0);
    // Interpolation in dB on a curve of 0.03 dB/deg^2 and slope 0.3 dB/deg: 0.3 deg a side at most.
    EXPECT_TRUE(near(half_power_beamwidth(cut), exact, 0.0, 0.6 * pi / 180.0));
}

TEST(HalfPowerBeamwidth, HandlesNullsAndFlatTops) {
    std::vector<double> cut(36, 1.0);
    EXPECT_TRUE(std::isnan(half_power_beamwidth(cut)));
    cut[20] = 0.0;  // one null: the half-power points lie just beside it
    const double width = half_power_beamwidth(cut);
    EXPECT_GT(width, 2.0 * pi * 34.0 / 36.0);
    EXPECT_LT(width, 2.0 * pi);
    cut[20] = 0.51;
    EXPECT_TRUE(std::isnan(half_power_beamwidth(cut)));
    EXPECT_TRUE(std::isnan(half_power_beamwidth(std::vector<double>(36, 0.0))));
    EXPECT_THROW(half_power_beamwidth(std::vector<double>{1.0, 0.0}), std::invalid_argument);
}

TEST(Figures, RefuseAnotherGridAndPowerless) {
    FarField cut = whole_sphere(1e9, pi / 18.0);
    cut.phi.resize(4);
    cut.e_theta = ComplexGrid::Ones(19, 4);
    cut.e_phi = cut.e_theta;
    EXPECT_THROW(figures(cut, Powers{}, 0.0), std::invalid_argument);
    EXPECT_THROW(figures(whole_sphere(1e9, 0.1), Powers{.accepted = 0.0}, 0.0), std::invalid_argument);
}

TEST(FigureTable, NamesEveryFigureOnce) {
    const std::vector<std::string> expected = {"peak_gain_dbi",   "boresight_gain_dbi",   "realized_gain_dbi",
                                               "directivity_dbi", "radiation_efficiency", "hpbw_e_deg",
                                               "hpbw_h_deg",      "front_to_back_db",     "front_to_rear_db",
                                               "squint_deg",      "cross_polar_db",       "axial_ratio_db"};
    ASSERT_EQ(figure_table().size(), expected.size());
    ASSERT_EQ(sizeof(Figures), expected.size() * sizeof(double));
    Figures values{};
    double next = 1.0;
    for (std::size_t i = 0; i < expected.size(); ++i) {
        const FigureEntry& entry = figure_table()[i];
        EXPECT_EQ(entry.name, expected[i]);
        EXPECT_EQ(values.*entry.value, 0.0) << "two rows share a figure";
        values.*entry.value = next++;
        const bool decibels = entry.name.ends_with("_db") || entry.name.ends_with("_dbi");
        EXPECT_EQ(decibels, entry.unit.starts_with("dB")) << entry.name;
        EXPECT_EQ(entry.name.ends_with("_deg"), entry.unit == "deg") << entry.name;
        EXPECT_TRUE(entry.definition.ends_with(".")) << entry.name;
        EXPECT_FALSE(entry.label.empty());
    }
}

}  // namespace
}  // namespace panelwright::solver
