#include "solver/aperture/fresnel.hpp"

#include <array>
#include <cmath>
#include <cstddef>

#include "solver/constants.hpp"

namespace panelwright::solver {

namespace {

/// For a >= 0, (3 + a) scaled_fresnel_tail(a) is a polynomial in s = (3 - a) / (3 + a), which maps
/// 0..infinity to 1..-1. Coefficients of s^0, s^1, ...: the Chebyshev series of that function from 50-digit
/// arithmetic, cut after degree 31 where the rest sums to 7e-13, and written out in powers. The method is
/// that of J. L. Schonfelder, Math. Comput. 32(144), 1232-1240, 1978, for the real error function.
constexpr double map_scale = 3.0;
constexpr std::array<Complex, 32> tail_coefficients{{
    {5.33495005443559364e-02, -9.91536668862268100e-01},
    {2.51330420417915257e-01, -9.29045350711164342e-01},
    {5.68833384974272049e-01, -7.14029187383905528e-01},
    {8.16248859697893403e-01, -2.65046334065300149e-01},
    {7.36891582854149463e-01, 3.28457607716276467e-01},
    {2.20262819254823355e-01, 7.28902274262775762e-01},
    {-4.48280244825874863e-01, 5.66329840618781111e-01},
    {-6.80603601353312437e-01, -1.03768585696373997e-01},
    {-1.88259079785538519e-01, -6.31686234957303028e-01},
    {4.99293350188792451e-01, -3.89912847849132937e-01},
    {5.06096302629127637e-01, 3.42010179754321242e-01},
    {-1.93582051622875645e-01, 5.58018547517786789e-01},
    {-5.67571361442875344e-01, -6.94688689678325533e-02},
    {-2.65302274282905211e-02, -5.54397518510633347e-01},
    {5.27535578262613103e-01, -9.50271062172101527e-02},
    {1.41369191672419903e-01, 5.01227455249755205e-01},
    {-4.65296807022549386e-01, 1.66273299447408984e-01},
    {-1.79229840345388497e-01, -4.43711685953420976e-01},
    {3.96492833263638600e-01, -1.73790594658117248e-01},
    {1.67324337497153586e-01, 3.80435769177113914e-01},
    {-3.11476074763480160e-01, 1.41810580052258661e-01},
    {-1.26957621706322410e-01, -2.97640662929908262e-01},
    {2.09237948381912092e-01, -9.23823780834101965e-02},
    {7.78190546553556572e-02, 1.96945619675674699e-01},
    {-1.10765435860572845e-01, 4.63291730372278401e-02},
    {-3.69036657020508085e-02, -1.01963144551353135e-01},
    {4.21716029590106511e-02, -1.66571547823881026e-02},
    {1.25927591687645425e-02, 3.78363734798472864e-02},
    {-1.01102818466114307e-02, 3.78855484156911861e-03},
    {-2.72812534344264159e-03, -8.83226157633144882e-03},
    {1.13615466537303673e-03, -4.06644542111515622e-04},
    {2.79943935211739050e-04, 9.66749494178123807e-04},
}};

/// The scaled tail for a >= 0. Even and odd powers run side by side: half the length of one chain of
/// products.
Complex scaled_tail_right(double a) {
    const double s = (map_scale - a) / (map_scale + a);
    const double s2 = s * s;
    Complex even{};
    Complex odd{};
    for (std::size_t n = tail_coefficients.size(); n > 0; n -= 2) {
        even = even * s2 + tail_coefficients[n - 2];
        odd = odd * s2 + tail_coefficients[n - 1];
    }
    return (even + s * odd) / (map_scale + a);
}

/// The integral of exp(-j t^2) over the whole line: sqrt(pi) exp(-j pi/4).
Complex whole_line() {
    const double half = std::sqrt(pi / 2.0);
    return {half, -half};
}

Complex unit_phasor(double phase) {
    return {std::cos(phase), std::sin(phase)};
}

}  // namespace

Complex scaled_fresnel_tail(double a) {
    if (a >= 0.0) return scaled_tail_right(a);
    return unit_phasor(a * a) * whole_line() - scaled_tail_right(-a);
}

Complex fresnel_tail(double a) {
    if (a >= 0.0) return unit_phasor(-a * a) * scaled_tail_right(a);
    return whole_line() - unit_phasor(-a * a) * scaled_tail_right(-a);
}

Complex transition(double x) {
    const double root = std::sqrt(std::abs(x));
    const Complex tail = scaled_tail_right(root);
    const Complex value(-2.0 * root * tail.imag(), 2.0 * root * tail.real());
    return x < 0.0 ? std::conj(value) : value;
}

Complex transition_deficit(double x) {
    // Below, 1 - F keeps ten digits; above, the 14th term of the asymptotic series is 1e-11 of the first.
    constexpr double asymptotic_from = 40.0;
    constexpr int terms = 14;
    if (x < asymptotic_from) return 1.0 - transition(x);
    // F ~ 1 + sum over n of (-1)^n (2n - 1)!! / (2 j x)^n, and -1/(2 j x) = j / (2 x).
    const Complex ratio(0.0, 0.5 / x);
    Complex term = ratio;
    Complex sum{};
    for (int n = 1; n <= terms; ++n) {
        sum += term;
        term *= static_cast<double>(2 * n + 1) * ratio;
    }
    return -sum;
}

}  // namespace panelwright::solver
