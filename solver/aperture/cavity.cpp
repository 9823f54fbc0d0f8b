#include "solver/aperture/cavity.hpp"

#include <Eigen/LU>
#include <algorithm>
#include <array>
#include <cmath>
#include <stdexcept>

namespace panelwright::solver {
namespace {

/// Terms of the series that resolve a pillar of `width`: the rest is below 0.1 % of the pillar's reactance.
int terms(const Cavity& cavity, double width) {
    return static_cast<int>(std::clamp(8.0 * cavity.width / width, 40.0, 4000.0));
}

/// sin(u)/u.
double sinc(double u) {
    return std::fabs(u) < 1e-6 ? 1.0 - u * u / 6.0 : std::sin(u) / u;
}

/// Green's function along x of one term, with Neumann walls at 0 and `length`, and its derivative by the
/// place `at`: cosh(g x<) cosh(g (length - x>)) / (g sinh(g length)), written without growing exponentials.
struct LineGreen {
    Complex value;
    Complex slope;
};
LineGreen line_green(Complex g, double length, double source, double at) {
    const double low = std::min(source, at);
    const double high = std::max(source, at);
    const Complex direct = std::exp(-g * (high - low));
    const Complex from_low = std::exp(-2.0 * g * low);
    const Complex from_high = std::exp(-2.0 * g * (length - high));
    const Complex scale = direct / (2.0 * (1.0 - std::exp(-2.0 * g * length)));
    const Complex value = scale * (1.0 + from_low) * (1.0 + from_high) / g;
    // d/dx of cosh at the near wall is +g sinh for a place left of the source, -g sinh for one right of it.
    const Complex slope = at < source ? scale * (1.0 - from_low) * (1.0 + from_high)
                                      : -scale * (1.0 + from_low) * (1.0 - from_high);
    return {value, slope};
}

/// One of the places where a pillar's current runs.
struct Branch {
    double x;      ///< from the cavity's end [m]
    double share;  ///< of the pillar's current
};

/// A pillar's places; the second share is 0 for most.
std::array<Branch, 2> branches(const Cavity& cavity, const Pillar& pillar) {
    return {Branch{pillar.x + 0.5 * cavity.length, 1.0 - pillar.second_share},
            Branch{pillar.second_x + 0.5 * cavity.length, pillar.second_share}};
}

/// Decay constant along x of term n.
Complex decay(const Cavity& cavity, const Wave& wave, double loss, int n) {
    const double across = n * pi / cavity.width;
    const Complex inside = wave.wavenumber * wave.wavenumber * cavity.permittivity * Complex(1.0, -loss);
    return std::sqrt(across * across - inside);
}

void require(const Cavity& cavity, double loss) {
    if (!(cavity.length > 0.0 && cavity.width > 0.0 && cavity.height > 0.0 && cavity.permittivity >= 1.0))
        throw std::invalid_argument("a cavity needs positive sides and a permittivity of 1 or more");
    if (!(loss > 0.0)) throw std::invalid_argument("the cavity's loss tangent must be positive");
}

}  // namespace

double equivalent_strip(double diameter) {
    return 0.5 * diameter * std::exp(1.5);
}

Complex transfer_impedance(const Cavity& cavity, const Wave& wave, double loss, const Pillar& source,
                           const Pillar& at) {
    require(cavity, loss);
    const int count = terms(cavity, std::max(source.width, at.width));
    Complex sum = 0.0;
    for (int n = 0; n < count; ++n) {
        const double across = n * pi / cavity.width;
        const double weight = (n == 0 ? 1.0 : 2.0) / cavity.width *
                              std::cos(across * (source.y + 0.5 * cavity.width)) *
                              sinc(0.5 * across * source.width) *
                              std::cos(across * (at.y + 0.5 * cavity.width)) * sinc(0.5 * across * at.width);
        const Complex g = decay(cavity, wave, loss, n);
        for (const Branch& from : branches(cavity, source))
            for (const Branch& to : branches(cavity, at))
                if (const double share = from.share * to.share; share != 0.0)
                    sum += weight * share * line_green(g, cavity.length, from.x, to.x).value;
    }
    return Complex(0.0, wave.omega * vacuum_permeability * cavity.height) * sum;
}

std::vector<CavityField> cavity_field(const Cavity& cavity, const Wave& wave, double loss,
                                      std::span<const Pillar> pillars, const Eigen::VectorXcd& currents,
                                      std::span<const Eigen::Vector2d> points) {
    require(cavity, loss);
    if (static_cast<std::size_t>(currents.size()) != pillars.size())
        throw std::invalid_argument("one current is needed for each pillar");
    const Complex scale(0.0, wave.omega * vacuum_permeability * cavity.height);
    const auto size = static_cast<std::ptrdiff_t>(points.size());
    std::vector<CavityField> field(points.size(), {0.0, Eigen::Vector2cd::Zero()});
    for (std::size_t p = 0; p < pillars.size(); ++p) {
        const int count = std::min(terms(cavity, pillars[p].width), 64);
        std::vector<Complex> decays;
        std::vector<double> weights;
        for (int n = 0; n < count; ++n) {
            const double across = n * pi / cavity.width;
            decays.push_back(decay(cavity, wave, loss, n));
            weights.push_back((n == 0 ? 1.0 : 2.0) / cavity.width *
                              std::cos(across * (pillars[p].y + 0.5 * cavity.width)) *
                              sinc(0.5 * across * pillars[p].width));
        }
        const Complex strength = scale * currents(static_cast<Eigen::Index>(p));
        const auto sources = branches(cavity, pillars[p]);
#pragma omp parallel for schedule(static)
        for (std::ptrdiff_t i = 0; i < size; ++i) {
            const Eigen::Vector2d& place = points[static_cast<std::size_t>(i)];
            const double x = std::clamp(place.x() + 0.5 * cavity.length, 0.0, cavity.length);
            const double y = std::clamp(place.y() + 0.5 * cavity.width, 0.0, cavity.width);
            CavityField sum{0.0, Eigen::Vector2cd::Zero()};
            for (const Branch& source : sources) {
                if (source.share == 0.0) continue;
                for (int n = 0; n < count; ++n) {
                    const auto term = static_cast<std::size_t>(n);
                    // Terms that have died out along x add nothing more.
                    if (n > 8 && decays[term].real() * std::fabs(x - source.x) > 25.0) break;
                    const LineGreen green = line_green(decays[term], cavity.length, source.x, x);
                    const double across = n * pi / cavity.width;
                    const double cosine = weights[term] * source.share * std::cos(across * y);
                    sum.voltage += cosine * green.value;
                    sum.gradient.x() += cosine * green.slope;
                    sum.gradient.y() -=
                        weights[term] * source.share * across * std::sin(across * y) * green.value;
                }
            }
            CavityField& total = field[static_cast<std::size_t>(i)];
            total.voltage += strength * sum.voltage;
            total.gradient += strength * sum.gradient;
        }
    }
    return field;
}

Eigen::VectorXcd pillar_currents(const Cavity& cavity, const Wave& wave, double loss,
                                 std::span<const Pillar> pillars) {
    if (pillars.empty()) throw std::invalid_argument("a cavity needs a feed");
    const auto n = static_cast<Eigen::Index>(pillars.size());
    Eigen::VectorXcd currents = Eigen::VectorXcd::Zero(n);
    currents(0) = 1.0;
    if (n == 1) return currents;
    Eigen::MatrixXcd posts(n - 1, n - 1);
    Eigen::VectorXcd driven(n - 1);
    for (Eigen::Index i = 1; i < n; ++i) {
        const Pillar& at = pillars[static_cast<std::size_t>(i)];
        driven(i - 1) = -transfer_impedance(cavity, wave, loss, pillars[0], at);
        for (Eigen::Index j = 1; j <= i; ++j)
            posts(i - 1, j - 1) = posts(j - 1, i - 1) =
                transfer_impedance(cavity, wave, loss, pillars[static_cast<std::size_t>(j)], at);
    }
    currents.tail(n - 1) = posts.partialPivLu().solve(driven);
    return currents;
}

Complex driving_impedance(const Cavity& cavity, const Wave& wave, double loss,
                          std::span<const Pillar> pillars, const Eigen::VectorXcd& currents) {
    if (static_cast<std::size_t>(currents.size()) != pillars.size())
        throw std::invalid_argument("one current is needed for each pillar");
    Complex voltage = 0.0;
    for (std::size_t p = 0; p < pillars.size(); ++p)
        voltage += currents(static_cast<Eigen::Index>(p)) *
                   transfer_impedance(cavity, wave, loss, pillars[p], pillars[0]);
    return voltage;
}

Complex driving_impedance(const Cavity& cavity, const Wave& wave, double loss,
                          std::span<const Pillar> pillars) {
    return driving_impedance(cavity, wave, loss, pillars, pillar_currents(cavity, wave, loss, pillars));
}

}  // namespace panelwright::solver
