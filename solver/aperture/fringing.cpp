#include "solver/aperture/fringing.hpp"

#include <Eigen/Core>
#include <cmath>
#include <stdexcept>
#include <vector>

#include "solver/aperture/closed_formulas.hpp"
#include "solver/constants.hpp"

namespace panelwright::solver {
namespace {

/// Where the equivalent line current runs outside the edge, in heights.
constexpr double line_offset = 0.5;
/// Extra edge capacitance of a dielectric spacer, per unit of (permittivity - 1) and vacuum permittivity.
constexpr double dielectric_edge = 1.41 / pi;
/// Straight pieces along each side of the rim, shorter towards the corners.
constexpr int pieces = 16;

/// The rim as straight pieces, counter-clockwise, with the static part of their interaction.
struct Loop {
    Eigen::ArrayXd x;             ///< (n) centres [m]
    Eigen::ArrayXd x_from;        ///< (n) ends [m]
    Eigen::ArrayXd x_to;          ///< (n)
    Eigen::ArrayXd length;        ///< (n) [m]
    Eigen::ArrayXXd along;        ///< (n, n) cosine between pieces
    Eigen::ArrayXXd distance;     ///< (n, n) between centres, never below the line's radius [m]
    Eigen::ArrayXXd static_part;  ///< (n, n) integral of 1/R over the source piece
};

Loop make_loop(double length, double width, double radius) {
    const std::array<Eigen::Vector2d, 5> corner{
        Eigen::Vector2d{-0.5 * length, 0.5 * width}, Eigen::Vector2d{-0.5 * length, -0.5 * width},
        Eigen::Vector2d{0.5 * length, -0.5 * width}, Eigen::Vector2d{0.5 * length, 0.5 * width},
        Eigen::Vector2d{-0.5 * length, 0.5 * width}};
    std::vector<Eigen::Vector2d> from;
    std::vector<Eigen::Vector2d> to;
    for (std::size_t side = 0; side < 4; ++side) {
        const auto at = [&](int i) -> Eigen::Vector2d {
            const double t = 0.5 - 0.5 * std::cos(pi * i / pieces);
            return corner[side] + t * (corner[side + 1] - corner[side]);
        };
        for (int i = 0; i < pieces; ++i) {
            from.push_back(at(i));
            to.push_back(at(i + 1));
        }
    }
    const auto n = static_cast<Eigen::Index>(from.size());
    Loop loop{Eigen::ArrayXd(n),     Eigen::ArrayXd(n),     Eigen::ArrayXd(n),    Eigen::ArrayXd(n),
              Eigen::ArrayXXd(n, n), Eigen::ArrayXXd(n, n), Eigen::ArrayXXd(n, n)};
    for (Eigen::Index j = 0; j < n; ++j) {
        const Eigen::Vector2d a = from[static_cast<std::size_t>(j)];
        const Eigen::Vector2d b = to[static_cast<std::size_t>(j)];
        const Eigen::Vector2d centre = 0.5 * (a + b);
        const double piece = (b - a).norm();
        const Eigen::Vector2d tangent = (b - a) / piece;
        loop.x(j) = centre.x();
        loop.x_from(j) = a.x();
        loop.x_to(j) = b.x();
        loop.length(j) = piece;
        for (Eigen::Index i = 0; i < n; ++i) {
            const Eigen::Vector2d p = from[static_cast<std::size_t>(i)];
            const Eigen::Vector2d q = to[static_cast<std::size_t>(i)];
            const Eigen::Vector2d apart = 0.5 * (p + q) - centre;
            const double u = apart.dot(tangent);
            const double off = std::sqrt(std::max(apart.squaredNorm() - u * u, 0.0) + radius * radius);
            loop.along(i, j) = (q - p).normalized().dot(tangent);
            loop.distance(i, j) = std::sqrt(apart.squaredNorm() + radius * radius);
            loop.static_part(i, j) =
                std::asinh((0.5 * piece - u) / off) + std::asinh((0.5 * piece + u) / off);
        }
    }
    return loop;
}

/// Susceptance [S] with which the rim loads the patch, for the edge voltage sin(q x): the reactive part of
/// the line current's reaction with itself, current and charge, over the reflector (factor 2).
double rim_susceptance(const Loop& loop, double k, double q) {
    const Eigen::ArrayXd voltage = (q * loop.x).sin();
    const Eigen::ArrayXd charge = ((q * loop.x_to).sin() - (q * loop.x_from).sin()) / loop.length;
    const Eigen::ArrayXXd kernel =
        (loop.static_part +
         (((k * loop.distance).cos() - 1.0) / loop.distance).rowwise() * loop.length.transpose()) /
        (4.0 * pi);
    const Eigen::ArrayXd voltage_piece = voltage * loop.length;
    const Eigen::ArrayXd charge_piece = charge * loop.length;
    const double current_part = voltage_piece.matrix().dot((kernel * loop.along).matrix() * voltage.matrix());
    const double charge_part = charge_piece.matrix().dot(kernel.matrix() * charge.matrix());
    return 2.0 * k / vacuum_impedance * (current_part - charge_part / (k * k));
}

/// By how much a sheet's thickness widens it at each edge [m]: H. A. Wheeler, IEEE Trans. Microwave Theory
/// Tech. 25(8), 631-647, 1977, as used by I. J. Bahl & R. Garg, Proc. IEEE 65(11), 1977 (from memory).
double thickness_widening(double thickness, double height) {
    return thickness > 0.0 ? thickness / (2.0 * pi) * (1.0 + std::log(2.0 * height / thickness)) : 0.0;
}

}  // namespace

Fringing fringing(const mesh::Patch& patch, const mesh::Spacer& spacer) {
    const double h = spacer.height;
    const double er = spacer.permittivity;
    if (!(patch.length > 0.0 && patch.width > 0.0 && h > 0.0 && er >= 1.0 && patch.thickness >= 0.0))
        throw std::invalid_argument(
            "a patch needs positive sides, a positive height and a permittivity of 1 or more");

    const double widening = thickness_widening(patch.thickness, h);
    const double length = patch.length + 2.0 * widening;
    const double width = patch.width + 2.0 * widening;
    const double slowness = std::sqrt(effective_permittivity(er, h, width));
    const double edge = dielectric_edge * (er - 1.0);
    const Loop loop =
        make_loop(length + 2.0 * line_offset * h, width + 2.0 * line_offset * h, h / (pi * std::numbers::e));

    // Total susceptance for the voltage sin(q x): of the line under the patch, of the rim, of the
    // dielectric's edges.
    const auto susceptance = [&](double k) {
        const double q = k * slowness;
        const double sine = 0.5 * length - std::sin(q * length) / (2.0 * q);    // integral of sin^2(q x)
        const double cosine = 0.5 * length + std::sin(q * length) / (2.0 * q);  // integral of cos^2(q x)
        const double end = std::sin(0.5 * q * length);
        return width / (h * k * vacuum_impedance) * (er * k * k * sine - q * q * cosine) +
               rim_susceptance(loop, k, q) + k / vacuum_impedance * edge * 2.0 * (width * end * end + sine);
    };
    // The susceptance rises through zero between a quarter-wave patch and one a little longer than half a
    // wave.
    double low = 0.25 * pi / (length * slowness);
    double high = 1.1 * pi / (length * slowness);
    for (int step = 0; step < 60 && high - low > 1e-9 * high; ++step) {
        const double middle = 0.5 * (low + high);
        (susceptance(middle) > 0.0 ? high : low) = middle;
    }
    const double k = 0.5 * (low + high);
    return {k * speed_of_light / (2.0 * pi), 0.5 * (pi / (k * slowness) - patch.length), slowness * slowness};
}

}  // namespace panelwright::solver
