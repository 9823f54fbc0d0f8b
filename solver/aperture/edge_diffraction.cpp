#include "solver/aperture/edge_diffraction.hpp"

#include <cmath>
#include <numbers>
#include <optional>
#include <stdexcept>

#include "solver/aperture/fresnel.hpp"
#include "solver/aperture/gauss.hpp"
#include "solver/constants.hpp"

namespace panelwright::solver {
namespace {

using std::numbers::sqrt2;

/// One straight edge of the plate.
struct Edge {
    Eigen::Vector2d outward;
    Eigen::Vector2d along;
    double distance;  ///< from the origin along `outward` [m]
    double from;      ///< ends along `along` [m]
    double to;
};

std::array<Edge, 4> edges_of(const Plate& plate) {
    const Eigen::Vector2d x = Eigen::Vector2d::UnitX();
    const Eigen::Vector2d y = Eigen::Vector2d::UnitY();
    return {Edge{x, y, plate.x_to, plate.y_from, plate.y_to},
            Edge{-x, y, -plate.x_from, plate.y_from, plate.y_to},
            Edge{y, x, plate.y_to, plate.x_from, plate.x_to},
            Edge{-y, x, -plate.y_from, plate.x_from, plate.x_to}};
}

/// Normalised Fresnel integral K(a) = exp(j pi/4)/sqrt(pi) times the integral of exp(-j t^2) from a to
/// infinity, without its factor exp(-j a^2).
Complex smooth_k(double a) {
    static const Complex scale = std::polar(1.0 / std::sqrt(pi), 0.25 * pi);
    return scale * scaled_fresnel_tail(a);
}

/// How far a ray runs over the plate from `place` along `ray` until it meets an edge [m].
double reach(const std::array<Edge, 4>& edges, const Eigen::Vector2d& place, const Eigen::Vector2d& ray) {
    double shortest = std::numeric_limits<double>::infinity();
    for (const Edge& edge : edges) {
        const double rate = ray.dot(edge.outward);
        const double left = edge.distance - place.dot(edge.outward);
        if (rate > 1e-9 && left > 1e-12) shortest = std::min(shortest, left / rate);
    }
    return shortest;
}

/// A ray from the origin over a point of `first` to `place` on another edge: mirror the origin in `first`.
struct DoubleRay {
    Eigen::Vector2d bend;       ///< on the first edge [m]
    Eigen::Vector2d direction;  ///< after the bend
    double before;              ///< length to the bend [m]
    double after;               ///< length from there [m]
    double sine;                ///< of the angle to the first edge
};
std::optional<DoubleRay> double_ray(const Edge& first, const Eigen::Vector2d& place) {
    const Eigen::Vector2d image = 2.0 * first.distance * first.outward;
    const Eigen::Vector2d path = place - image;
    const double rate = -path.dot(first.outward);
    if (!(rate > 1e-12)) return std::nullopt;
    const double share = first.distance / rate;
    if (!(share > 0.0 && share < 1.0)) return std::nullopt;
    const Eigen::Vector2d bend = image + share * path;
    const double at = bend.dot(first.along);
    if (at < first.from || at > first.to) return std::nullopt;
    const double whole = path.norm();
    return DoubleRay{bend, path / whole, share * whole, (1.0 - share) * whole, rate / whole};
}

/// The waves as they are gathered, before they are packed into matrices.
struct Gathered {
    std::vector<EdgePiece> pieces;
    std::vector<Eigen::RowVectorXcd> hard;
    std::vector<Eigen::RowVectorXcd> slope;
};

/// The wave that meets `piece` of edge `at` after diffraction at `first`, if a ray leads there.
void add_second_order(Gathered& out, const std::array<Edge, 4>& edges, std::size_t first, std::size_t at,
                      const EdgePiece& piece, const PlateField& field, double k) {
    const auto ray = double_ray(edges[first], piece.place);
    if (!ray || !(ray->direction.dot(edges[at].outward) > 1e-6)) return;
    const Eigen::Vector2d incident = ray->bend.normalized();
    const double sine = incident.dot(edges[first].outward);
    const Eigen::RowVectorXcd current =
        edges[first].outward.cast<Complex>().transpose() * field.current(ray->bend) / sine;
    Complex factor = 2.0 * smooth_k(std::sqrt(2.0 * k * ray->after) * ray->sine) *
                     std::polar(std::sqrt(ray->before / (ray->before + ray->after)), -k * ray->after);
    const bool opposite = edges[first].outward.dot(edges[at].outward) < -0.5;
    if (opposite) {
        const double across = edges[first].distance + edges[at].distance;
        const double whole = ray->before + ray->after;
        const Complex bounce = 2.0 * smooth_k(std::sqrt(2.0 * k * across)) *
                               std::polar(std::sqrt(whole / (whole + across)), -k * across);
        factor /= 1.0 - bounce;
    }
    EdgePiece bent = piece;
    bent.sine = ray->direction.dot(edges[at].outward);
    bent.cosine = ray->direction.dot(edges[at].along);
    bent.span = reach(edges, piece.place, bent.cosine * bent.along - bent.sine * bent.outward);
    bent.run = ray->after;
    out.pieces.push_back(bent);
    out.hard.emplace_back(factor * current);
    out.slope.emplace_back(Eigen::RowVectorXcd::Zero(current.size()));
}

}  // namespace

EdgeWaves edge_waves(const Plate& plate, const PlateField& field, double wavenumber, DiffractionOrder order) {
    if (!(plate.x_from < 0.0 && plate.x_to > 0.0 && plate.y_from < 0.0 && plate.y_to > 0.0))
        throw std::invalid_argument("the patch centre must lie inside the plate");
    const auto edges = edges_of(plate);
    const double longest = 0.5 * 2.0 * pi / wavenumber;
    Gathered out;
    for (std::size_t e = 0; e < edges.size(); ++e) {
        const Edge& edge = edges[e];
        const std::array<double, 3> breaks{edge.from, 0.0, edge.to};
        const GaussRule rule = composite_rule(breaks, longest, 4);
        for (std::size_t i = 0; i < rule.nodes.size(); ++i) {
            EdgePiece piece;
            piece.place = edge.distance * edge.outward + rule.nodes[i] * edge.along;
            piece.outward = edge.outward;
            piece.along = edge.along;
            piece.weight = rule.weights[i];
            const Eigen::Vector2d ray = piece.place.normalized();
            piece.sine = ray.dot(edge.outward);
            piece.cosine = ray.dot(edge.along);
            piece.span = reach(edges, piece.place, piece.cosine * piece.along - piece.sine * piece.outward);
            const auto current = field.current(piece.place);
            const Eigen::RowVectorXcd hard = edge.outward.cast<Complex>().transpose() * current / piece.sine;
            out.pieces.push_back(piece);
            out.hard.push_back(hard);
            out.slope.emplace_back(edge.along.cast<Complex>().transpose() * current - piece.cosine * hard);
            if (order == DiffractionOrder::first) continue;
            for (std::size_t first = 0; first < edges.size(); ++first)
                if (first != e) add_second_order(out, edges, first, e, piece, field, wavenumber);
        }
    }
    EdgeWaves waves{std::move(out.pieces), {}, {}};
    const auto count = static_cast<Eigen::Index>(waves.pieces.size());
    const Eigen::Index sources = out.hard.front().size();
    waves.hard.resize(count, sources);
    waves.slope.resize(count, sources);
    for (Eigen::Index i = 0; i < count; ++i) {
        waves.hard.row(i) = out.hard[static_cast<std::size_t>(i)];
        waves.slope.row(i) = out.slope[static_cast<std::size_t>(i)];
    }
    return waves;
}

EdgeFactors edge_factors(const EdgePiece& piece, double wavenumber, const Eigen::Vector2d& direction) {
    const double outward = direction.dot(piece.outward);
    const double along = direction.dot(piece.along);
    const double sine = piece.sine;
    // The plate ends: the ray is no longer than its span, which bounds the one infinite direction.
    const double bound = 1.0 / (wavenumber * piece.span);
    const double apart = 1.0 + outward * sine - along * piece.cosine;
    const double r = std::sqrt(std::sqrt(apart * apart + bound * bound));
    const double sum = r + sqrt2 * sine;
    // All factors carry 1/(jk); it is applied at the end.
    Complex across = -sine / (r * sum);
    Complex hard = (sqrt2 - sine / sum) / r;
    const double slope = 1.0 / (sqrt2 * sum);
    if (piece.run > 0.0) {
        const double ahead = std::max(1.0 - outward * sine - along * piece.cosine, 1e-9);
        const Complex tail = sine / ahead * transition(wavenumber * piece.run * ahead);
        across -= tail;
        hard -= tail;
    }
    const Complex phase =
        std::polar(piece.weight / wavenumber, wavenumber * direction.dot(piece.place)) * Complex(0.0, -1.0);
    return {phase * sine * across, phase * piece.cosine * hard, phase * slope};
}

}  // namespace panelwright::solver
