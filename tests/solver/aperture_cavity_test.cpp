#include <gtest/gtest.h>

#include <array>
#include <cmath>
#include <stdexcept>
#include <vector>

#include "solver/aperture/cavity.hpp"
#include "solver/constants.hpp"
#include "tests/near.hpp"
#include "tests/reference/cavity_modes.hpp"

namespace panelwright::solver {
namespace {

using test::near;

const Cavity cavity{0.063, 0.073, 0.005, 1.2};
const Wave wave(2.4e9);
constexpr double loss = 0.07;

TEST(Cavity, SumsTheModesOfTheDoubleSeries) {
    const Pillar pin{-0.013, 0.004, 0.004, 0.0, 0.0};
    const Pillar other{0.02, -0.03, 0.003, 0.0, 0.0};
    const Pillar tab{-0.018, 0.0, 0.005, -0.0265, 0.7};
    const auto by_modes = [&](const Pillar& a, const Pillar& b) {
        return test::transfer_impedance_by_modes(cavity, wave, loss, a, b, 40000, 700);
    };
    // The rest of the twin's series along x is 2e-4 of the reactance, that of the sum across 1e-3 as it says.
    EXPECT_TRUE(near(transfer_impedance(cavity, wave, loss, pin, pin), by_modes(pin, pin), 2e-3));
    EXPECT_TRUE(near(transfer_impedance(cavity, wave, loss, tab, tab), by_modes(tab, tab), 2e-3));
    // Pillars that stand apart converge exponentially in the fast sum, as 1/along^2 in the twin.
    EXPECT_TRUE(near(transfer_impedance(cavity, wave, loss, pin, other), by_modes(pin, other), 1e-6));
    EXPECT_TRUE(near(transfer_impedance(cavity, wave, loss, tab, other), by_modes(tab, other), 1e-6));
}

TEST(Cavity, IsACapacitorAtLowFrequency) {
    const Wave slow(1e4);
    const Pillar pin{0.01, -0.02, 0.002, 0.0, 0.0};
    const double capacitance =
        vacuum_permittivity * cavity.permittivity * cavity.length * cavity.width / cavity.height;
    const Complex exact = 1.0 / (Complex(0.0, slow.omega * capacitance) * Complex(1.0, -loss));
    // The inductance of the pin is (k L)^2 of it, 2e-10.
    EXPECT_TRUE(near(transfer_impedance(cavity, slow, loss, pin, pin), exact, 1e-8));
}

TEST(Cavity, IsReciprocal) {
    const std::array<Pillar, 3> pillars{Pillar{-0.013, 0.004, 0.001, 0.0, 0.0},
                                        Pillar{0.02, -0.03, 0.004, 0.0, 0.0},
                                        Pillar{-0.018, 0.0, 0.005, -0.0265, 0.7}};
    for (const Pillar& a : pillars)
        for (const Pillar& b : pillars)
            EXPECT_TRUE(near(transfer_impedance(cavity, wave, loss, a, b),
                             transfer_impedance(cavity, wave, loss, b, a), 1e-12));
}

TEST(Cavity, HasNoVoltageAcrossAPost) {
    const std::array<Pillar, 3> pillars{Pillar{-0.013, 0.0, 0.001, 0.0, 0.0},
                                        Pillar{0.0, 0.0, 0.003, 0.0, 0.0},
                                        Pillar{0.021, 0.011, 0.002, 0.0, 0.0}};
    const Eigen::VectorXcd currents = pillar_currents(cavity, wave, loss, pillars);
    EXPECT_EQ(currents(0), Complex(1.0));
    const auto voltage_at = [&](std::size_t p) {
        Complex sum = 0.0;
        for (std::size_t q = 0; q < 3; ++q)
            sum += currents(static_cast<Eigen::Index>(q)) *
                   transfer_impedance(cavity, wave, loss, pillars[q], pillars[p]);
        return sum;
    };
    const Complex driving = driving_impedance(cavity, wave, loss, pillars);
    EXPECT_TRUE(near(voltage_at(0), driving, 1e-12));
    EXPECT_LT(std::abs(voltage_at(1)), 1e-11 * std::abs(driving));
    EXPECT_LT(std::abs(voltage_at(2)), 1e-11 * std::abs(driving));
    EXPECT_GT(driving.real(), 0.0);
}

TEST(Cavity, APostInTheMiddleLeavesTheFundamentalModeAlone) {
    // The mode's voltage is zero along x = 0: only the weak others see a post there.
    const std::array<Pillar, 1> alone{Pillar{-0.013, 0.0, 0.001, 0.0, 0.0}};
    const std::array<Pillar, 2> with_post{alone[0], Pillar{0.0, 0.0, 0.003, 0.0, 0.0}};
    const Wave resonance(speed_of_light / (2.0 * cavity.length * std::sqrt(cavity.permittivity)));
    const Complex before = driving_impedance(cavity, resonance, 0.02, alone);
    const Complex after = driving_impedance(cavity, resonance, 0.02, with_post);
    EXPECT_TRUE(near(after.real(), before.real(), 0.02));
    // One near the radiating end shorts it.
    const std::array<Pillar, 2> shorted{alone[0], Pillar{0.031, 0.0, 0.003, 0.0, 0.0}};
    EXPECT_LT(driving_impedance(cavity, resonance, 0.02, shorted).real(), 0.1 * before.real());
}

TEST(Cavity, FieldIsTheTransferImpedanceAwayFromThePillar) {
    const std::array<Pillar, 2> pillars{Pillar{-0.013, 0.002, 0.002, 0.0, 0.0},
                                        Pillar{-0.018, 0.0, 0.005, -0.0265, 0.7}};
    Eigen::VectorXcd currents(2);
    currents << Complex(0.7, 0.2), Complex(-0.3, 0.5);
    const std::vector<Eigen::Vector2d> places{
        {0.0, 0.0}, {0.0315, 0.0365}, {0.02, -0.03}, {0.0, 0.0365}, {0.0315, -0.01}};
    const std::vector<CavityField> field = cavity_field(cavity, wave, loss, pillars, currents, places);
    for (std::size_t i = 0; i < places.size(); ++i) {
        const Pillar probe{places[i].x(), places[i].y(), 1e-6, 0.0, 0.0};
        Complex expected = 0.0;
        for (std::size_t p = 0; p < 2; ++p)
            expected += currents(static_cast<Eigen::Index>(p)) *
                        transfer_impedance(cavity, wave, loss, pillars[p], probe);
        // 64 terms leave exp(-64 pi 13 mm / 73 mm) of the nearest pillar's.
        EXPECT_TRUE(near(field[i].voltage, expected, 1e-9)) << i;
    }
}

TEST(Cavity, GradientIsThatOfTheVoltage) {
    const std::array<Pillar, 1> pin{Pillar{-0.013, 0.002, 0.002, 0.0, 0.0}};
    const Eigen::VectorXcd one = Eigen::VectorXcd::Ones(1);
    constexpr double step = 1e-5;
    for (const Eigen::Vector2d& at :
         {Eigen::Vector2d{0.004, 0.01}, Eigen::Vector2d{0.03, -0.03}, Eigen::Vector2d{-0.02, -0.01}}) {
        const std::vector<Eigen::Vector2d> places{
            at, at + Eigen::Vector2d{step, 0.0}, at - Eigen::Vector2d{step, 0.0},
            at + Eigen::Vector2d{0.0, step}, at - Eigen::Vector2d{0.0, step}};
        const std::vector<CavityField> f = cavity_field(cavity, wave, loss, pin, one, places);
        const double size = f[0].gradient.norm();
        // Second order in the step over the distance from the pin, 1e-5; rounding 1e-10.
        EXPECT_TRUE(near(f[0].gradient.x(), (f[1].voltage - f[2].voltage) / (2.0 * step), 0.0, 2e-5 * size));
        EXPECT_TRUE(near(f[0].gradient.y(), (f[3].voltage - f[4].voltage) / (2.0 * step), 0.0, 2e-5 * size));
    }
}

TEST(Cavity, NoCurrentCrossesItsWalls) {
    const std::array<Pillar, 1> pin{Pillar{-0.013, 0.002, 0.002, 0.0, 0.0}};
    const std::vector<Eigen::Vector2d> walls{{0.0315, 0.01}, {-0.0315, 0.0}, {0.01, 0.0365}, {0.0, -0.0365}};
    const std::vector<CavityField> field =
        cavity_field(cavity, wave, loss, pin, Eigen::VectorXcd::Ones(1), walls);
    for (std::size_t i = 0; i < walls.size(); ++i) {
        const Eigen::Index normal = i < 2 ? 0 : 1;
        EXPECT_LT(std::abs(field[i].gradient(normal)), 1e-9 * field[i].gradient.norm()) << i;
    }
}

TEST(Cavity, ResonatesWhereTheModesSay) {
    // At its resonance a mode's resistance is omega mu h psi^2 / (k^2 loss); with so little loss the others
    // add nothing.
    constexpr double little = 1e-5;
    const Pillar pin{-0.02, 0.02, 0.002, 0.0, 0.0};
    struct Mode {
        int m;
        int n;
    };
    for (const auto& [m, n] : {Mode{1, 0}, Mode{0, 1}, Mode{1, 1}, Mode{2, 0}}) {
        const double along = m * pi / cavity.length;
        const double across = n * pi / cavity.width;
        const double k = std::hypot(along, across) / std::sqrt(cavity.permittivity);
        const Wave at(k * speed_of_light / (2.0 * pi));
        const double half = 0.5 * across * pin.width;
        const double psi_x = std::cos(along * (pin.x + 0.5 * cavity.length));
        const double psi_y =
            std::cos(across * (pin.y + 0.5 * cavity.width)) * (n == 0 ? 1.0 : std::sin(half) / half);
        const double norm = (m == 0 ? 1.0 : 2.0) * (n == 0 ? 1.0 : 2.0) / (cavity.length * cavity.width);
        const double resistance = at.omega * vacuum_permeability * cavity.height * norm * psi_x * psi_x *
                                  psi_y * psi_y / (k * k * cavity.permittivity * little);
        EXPECT_TRUE(near(transfer_impedance(cavity, at, little, pin, pin).real(), resistance, 1e-6))
            << m << n;
    }
}

TEST(Cavity, AFlatStripEqualsARoundPinOfTheSameMeanDistance) {
    // ln of the geometric mean distance of a line of width w is ln w - 3/2; of a circle of radius r, ln r.
    EXPECT_TRUE(near(std::log(equivalent_strip(0.002)) - 1.5, std::log(0.001), 1e-14));
}

TEST(Cavity, RefusesWhatIsNoCavity) {
    const Pillar pin{0.0, 0.0, 0.001, 0.0, 0.0};
    EXPECT_THROW(transfer_impedance({0.0, 0.07, 0.005, 1.0}, wave, loss, pin, pin), std::invalid_argument);
    EXPECT_THROW(transfer_impedance({0.06, 0.07, 0.005, 0.9}, wave, loss, pin, pin), std::invalid_argument);
    EXPECT_THROW(transfer_impedance(cavity, wave, 0.0, pin, pin), std::invalid_argument);
    EXPECT_THROW(pillar_currents(cavity, wave, loss, {}), std::invalid_argument);
    const std::array<Pillar, 1> one{pin};
    EXPECT_THROW(cavity_field(cavity, wave, loss, one, Eigen::VectorXcd::Ones(2), {}), std::invalid_argument);
}

}  // namespace
}  // namespace panelwright::solver
