#include "solver/aperture/fresnel.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <vector>

#include "solver/constants.hpp"
#include "tests/near.hpp"
#include "tests/reference/fresnel_reference.hpp"

namespace panelwright::solver {
namespace {

using test::near;

struct TransitionValue {
    double x;
    double real;
    double imaginary;
};

TEST(Transition, AgreesWithTheTable) {
    // x = 0.3..5.5 [read]; the others [computed]: R. G. Kouyoumjian and P. H. Pathak, Proc. IEEE 62(11),
    // 1974; D. A. McNamara, C. W. I. Pistorius and J. A. G. Malherbe, Introduction to the Uniform Geometrical
    // Theory of Diffraction, Artech House 1990, App. B.
    const std::vector<TransitionValue> table = {
        {0.001, 0.03959495, 0.03767289}, {0.01, 0.12420519, 0.10657897}, {0.03, 0.21167114, 0.16350853},
        {0.1, 0.36810357, 0.23445296},   {0.2, 0.49106239, 0.26493628},  {0.3, 0.57171324, 0.27299155},
        {0.5, 0.67676271, 0.26823295},   {0.7, 0.74395036, 0.25485662},  {1.0, 0.80952548, 0.23219939},
        {1.5, 0.87298908, 0.19820824},   {2.0, 0.90920350, 0.17108658},  {2.3, 0.92400385, 0.15765107},
        {3.0, 0.94724226, 0.13257826},   {4.0, 0.96578828, 0.10728867},  {5.5, 0.97968559, 0.08278728},
        {10.0, 0.99304113, 0.04835150}};
    constexpr double half_a_digit = 0.51e-8;  // the table's rounding
    for (const TransitionValue& row : table) {
        EXPECT_TRUE(near(transition(row.x).real(), row.real, 0.0, half_a_digit)) << row.x;
        EXPECT_TRUE(near(transition(row.x).imag(), row.imaginary, 0.0, half_a_digit)) << row.x;
    }
}

// The polynomial's own error; the quadrature is good to 1e-13.
constexpr double polynomial = 1e-11;

TEST(Transition, AgreesWithQuadratureOverTenDecades) {
    for (double x = 1e-6; x < 1.1e4; x *= 1.3) {
        EXPECT_TRUE(near(transition(x), test::transition_reference(x), polynomial)) << x;
    }
    EXPECT_EQ(transition(0.0), Complex(0.0, 0.0));
    EXPECT_TRUE(near(transition(1e12), Complex(1.0, 0.0), 1e-11));
}

TEST(Transition, OfANegativeArgumentIsTheConjugate) {
    EXPECT_EQ(transition(-0.7), std::conj(transition(0.7)));
}

TEST(Transition, DeficitKeepsItsDigitsWhereFIsNearlyOne) {
    for (double x = 1e-6; x < 35.0; x *= 1.7) {
        EXPECT_TRUE(near(transition_deficit(x), 1.0 - test::transition_reference(x), 1e-9)) << x;
    }
    // The two ways of computing meet at 40; far out the first two terms of the series -j/(2x) + 3/(4x^2)
    // remain, the next being 15/(8x^3).
    const Complex below = transition_deficit(std::nextafter(40.0, 0.0));
    EXPECT_TRUE(near(below, transition_deficit(40.0), 1e-8));
    for (const double x : {1e3, 1e5, 1e8}) {
        const Complex expected(0.75 / (x * x), -0.5 / x);
        EXPECT_TRUE(near(transition_deficit(x), expected, 4.0 / (x * x) + 1e-15)) << x;
    }
}

TEST(FresnelTail, AgreesWithQuadratureOnBothSidesOfZero) {
    for (double a = -1.0; a < 60.0; a += 0.173) {
        EXPECT_TRUE(near(scaled_fresnel_tail(a), test::scaled_fresnel_tail_reference(a), polynomial, 1e-12))
            << a;
    }
    EXPECT_TRUE(near(fresnel_tail(0.0), 0.5 * std::sqrt(pi) * std::polar(1.0, -pi / 4.0), polynomial));
}

TEST(FresnelTail, BothSidesAddUpToTheWholeLine) {
    const Complex whole = std::sqrt(pi) * std::polar(1.0, -pi / 4.0);
    for (const double a : {0.0, 1e-8, 0.3, 1.7, 12.0, 250.0}) {
        EXPECT_TRUE(near(fresnel_tail(a) + fresnel_tail(-a), whole, polynomial))
            << a;  // at 0, twice the polynomial
        EXPECT_TRUE(near(std::polar(1.0, a * a) * fresnel_tail(-a), scaled_fresnel_tail(-a), 1e-12)) << a;
    }
}

TEST(FresnelTail, ItsSlopeIsTheIntegrand) {
    constexpr double step = 1e-4;
    for (double a = -3.0; a < 4.0; a += 0.31) {
        const Complex slope = (fresnel_tail(a + step) - fresnel_tail(a - step)) / (2.0 * step);
        // Central difference: step^2 / 6 times the third derivative, which stays below 4 a^2 + 2; and 1e-11 /
        // step.
        EXPECT_TRUE(
            near(slope, -std::polar(1.0, -a * a), 0.0, step * step / 6.0 * (4.0 * a * a + 2.0) + 2e-7))
            << a;
    }
}

}  // namespace
}  // namespace panelwright::solver
