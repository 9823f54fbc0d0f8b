#include "tests/reference/air_patch_rooftop.hpp"

#include <Eigen/LU>
#include <algorithm>
#include <array>
#include <cmath>
#include <cstdlib>

#include "solver/constants.hpp"

namespace panelwright::test {
namespace {

using Complex = std::complex<double>;
using solver::pi;

/// Fourfold antiderivative of 1/R, twice by x and twice by y. P. S. Excell et al. give it for the capacitance
/// of plates; it is easily checked by differentiation.
double antiderivative(double x, double y, double z) {
    const double r = std::sqrt(x * x + y * y + z * z);
    const double log_x = x + r > 0.0 ? std::log(x + r) : 0.0;
    const double log_y = y + r > 0.0 ? std::log(y + r) : 0.0;
    const double angle = z == 0.0 ? 0.0 : x * y * z * std::atan2(x * y, z * r);
    return 0.5 * x * (y * y - z * z) * log_x + 0.5 * y * (x * x - z * z) * log_y -
           r * (x * x + y * y - 2.0 * z * z) / 6.0 - angle;
}

/// Mean of 1/R between two cells (x, y) apart in planes z apart.
double mean_inverse_distance(double x, double y, double z, double dx, double dy) {
    constexpr std::array<double, 3> second_difference{1.0, -2.0, 1.0};
    double sum = 0.0;
    for (int i = -1; i <= 1; ++i)
        for (int j = -1; j <= 1; ++j)
            sum += second_difference[static_cast<std::size_t>(i + 1)] *
                   second_difference[static_cast<std::size_t>(j + 1)] *
                   antiderivative(x + i * dx, y + j * dy, z);
    return sum / (dx * dx * dy * dy);
}

/// Reaction of an upright current sheet of `width` and `height` on the plane with itself, its image included,
/// for unit current: the integral over z in (0, h) and z' in (-h, h) of exp(-jkR)/(4 pi R), averaged over
/// both places across. 1/R is integrated along z exactly, the rest of the exponential taken as its first term
/// -jk.
Complex upright_reaction(double wavenumber, double width, double height) {
    constexpr int strips = 400;  // midpoint rule across, the logarithm at no distance included: 0.1 %
    const double bar = 2.0 * height;
    double sum = 0.0;
    for (int s = 0; s < strips; ++s) {
        const double apart = width * (s + 0.5) / strips;
        const double share =
            2.0 * (1.0 - apart / width) / strips;  // how often two places stand that far apart
        sum += share * (bar * std::asinh(bar / apart) - std::sqrt(bar * bar + apart * apart) + apart);
    }
    return Complex(sum, -wavenumber * height * bar) / (4.0 * pi);
}

/// Resonance on one grid: the peak of a parabola through three samples of 1/R, sought three times.
RooftopResonance resonance_on_grid(double length, double width, double height, double guess, int across) {
    const RooftopSheet sheet = rectangle_sheet(length, width, height, across);
    const RooftopFeed feed{across / 5, static_cast<int>((sheet.metal.cols() - 1) / 2)};
    const Rooftop patch(sheet);
    RooftopResonance found{guess, 0.0};
    for (const double step : {0.04, 0.02, 0.01}) {
        std::array<double, 3> inverse{};
        for (int i = -1; i <= 1; ++i) {
            const double k = 2.0 * pi * found.frequency * (1.0 + i * step) / solver::speed_of_light;
            inverse[static_cast<std::size_t>(i + 1)] = 1.0 / patch.impedance(k, feed).real();
        }
        const double curvature = (inverse[0] - 2.0 * inverse[1] + inverse[2]) / (2.0 * step * step);
        const double slope = (inverse[2] - inverse[0]) / (2.0 * step);
        const double least = inverse[1] - slope * slope / (4.0 * curvature);
        // 1/R = (1 + (2 Q detuning)^2) / R0.
        found = {found.frequency * (1.0 - slope / (2.0 * curvature)), 0.5 * std::sqrt(curvature / least)};
    }
    return found;
}

}  // namespace

RooftopSheet rectangle_sheet(double length, double width, double height, int across) {
    const int rows = std::max(4, static_cast<int>(std::lround(across * width / length)));
    return {length / across, width / rows, height, Eigen::ArrayXX<bool>::Constant(across, rows, true)};
}

Rooftop::Rooftop(RooftopSheet sheet) : sheet_(std::move(sheet)) {
    const int nx = static_cast<int>(sheet_.metal.rows());
    const int ny = static_cast<int>(sheet_.metal.cols());
    static_part_.resize(nx, ny);
    for (int i = 0; i < nx; ++i)
        for (int j = 0; j < ny; ++j)
            static_part_(i, j) =
                mean_inverse_distance(i * sheet_.dx, j * sheet_.dy, 0.0, sheet_.dx, sheet_.dy) -
                mean_inverse_distance(i * sheet_.dx, j * sheet_.dy, 2.0 * sheet_.height, sheet_.dx,
                                      sheet_.dy);
    // One of each mirrored pair is enough; a current across the mirror plane itself cannot flow.
    for (int i = 0; i < nx; ++i)
        for (int j = 0; j < ny; ++j) {
            if (!sheet_.metal(i, j)) continue;
            if (i + 1 < nx && sheet_.metal(i + 1, j) && 2 * j <= ny - 1)
                bases_.push_back({i, j, true, 2 * j != ny - 1});
            if (j + 1 < ny && sheet_.metal(i, j + 1) && 2 * (j + 1) < ny)
                bases_.push_back({i, j, false, true});
        }
}

Eigen::ArrayXXcd Rooftop::kernel(double wavenumber) const {
    Eigen::ArrayXXcd g(static_part_.rows(), static_part_.cols());
    for (Eigen::Index i = 0; i < g.rows(); ++i)
        for (Eigen::Index j = 0; j < g.cols(); ++j) {
            const double apart =
                std::hypot(static_cast<double>(i) * sheet_.dx, static_cast<double>(j) * sheet_.dy);
            const auto rest = [&](double r) {
                return r > 0.0 ? (std::polar(1.0, -wavenumber * r) - 1.0) / r : Complex(0.0, -wavenumber);
            };
            g(i, j) = (static_part_(i, j) + rest(apart) - rest(std::hypot(apart, 2.0 * sheet_.height))) /
                      (4.0 * pi);
        }
    return g;
}

Rooftop::Basis Rooftop::mirror(const Basis& basis) const {
    const int last = static_cast<int>(sheet_.metal.cols()) - 1;
    return {basis.i, basis.along_x ? last - basis.j : last - 1 - basis.j, basis.along_x, basis.mirrored};
}

Complex Rooftop::reaction(const Basis& a, const Basis& b, const Eigen::ArrayXXcd& g,
                          double wavenumber) const {
    const auto between = [&](int i, int j) { return g(std::abs(i), std::abs(j)); };
    // Charge of a rooftop: plus on its first cell, minus on its second, as much as its width.
    const double charges = (a.along_x ? sheet_.dy : sheet_.dx) * (b.along_x ? sheet_.dy : sheet_.dx);
    Complex charge_part = 0.0;
    for (const int end_a : {0, 1})
        for (const int end_b : {0, 1}) {
            const int i = (a.i + (a.along_x ? end_a : 0)) - (b.i + (b.along_x ? end_b : 0));
            const int j = (a.j + (a.along_x ? 0 : end_a)) - (b.j + (b.along_x ? 0 : end_b));
            charge_part += (end_a == end_b ? 1.0 : -1.0) * between(i, j);
        }
    const double area = sheet_.dx * sheet_.dy;
    const Complex current_part = a.along_x == b.along_x ? area * area * between(a.i - b.i, a.j - b.j) : 0.0;
    return Complex(0.0, wavenumber * solver::vacuum_impedance) *
           (current_part - charges * charge_part / (wavenumber * wavenumber));
}

Complex Rooftop::impedance(double wavenumber, const RooftopFeed& feed) const {
    const Eigen::ArrayXXcd g = kernel(wavenumber);
    const auto n = static_cast<Eigen::Index>(bases_.size());
    const int last = static_cast<int>(sheet_.metal.cols()) - 1;
    const int fed = last + 1 - 2 * feed.from;
    const Complex per_charge =
        solver::vacuum_impedance / Complex(0.0, wavenumber);  // potential of unit current's charge
    const auto potential = [&](int i, int j) {                // of the feed's charge, mean over a cell
        Complex sum = 0.0;
        for (int c = feed.from; c <= last - feed.from; ++c) sum += g(std::abs(i - feed.i), std::abs(j - c));
        return per_charge * sum / static_cast<double>(fed);
    };
    Eigen::MatrixXcd matrix(n, n);
    Eigen::VectorXcd driven(n);
#pragma omp parallel for schedule(dynamic, 16)
    for (Eigen::Index b = 0; b < n; ++b) {
        const Basis& source = bases_[static_cast<std::size_t>(b)];
        const double parity = source.along_x ? 1.0 : -1.0;
        for (Eigen::Index a = 0; a < n; ++a) {
            const Basis& test = bases_[static_cast<std::size_t>(a)];
            matrix(a, b) = reaction(test, source, g, wavenumber);
            if (source.mirrored) matrix(a, b) += parity * reaction(test, mirror(source), g, wavenumber);
        }
        const double width = source.along_x ? sheet_.dy : sheet_.dx;
        driven(b) = width * (potential(source.i, source.j) - potential(source.i + (source.along_x ? 1 : 0),
                                                                       source.j + (source.along_x ? 0 : 1)));
    }
    const Eigen::VectorXcd currents = matrix.partialPivLu().solve(driven);
    Complex voltage = 0.0;
    for (Eigen::Index a = 0; a < n; ++a)
        voltage -= (bases_[static_cast<std::size_t>(a)].mirrored ? 2.0 : 1.0) * driven(a) * currents(a);
    for (int c = feed.from; c <= last - feed.from; ++c)
        voltage += potential(feed.i, c) / static_cast<double>(fed);
    return voltage + Complex(0.0, wavenumber * solver::vacuum_impedance) *
                         upright_reaction(wavenumber, fed * sheet_.dy, sheet_.height);
}

RooftopResonance rooftop_resonance(double length, double width, double height, double guess) {
    const RooftopResonance coarse = resonance_on_grid(length, width, height, guess, 16);
    const RooftopResonance fine = resonance_on_grid(length, width, height, coarse.frequency, 24);
    // Error in proportion to the cell: 1/16 and 1/24 extrapolate to 0 with weights -2 and 3.
    return {3.0 * fine.frequency - 2.0 * coarse.frequency, 3.0 * fine.quality - 2.0 * coarse.quality};
}

}  // namespace panelwright::test
