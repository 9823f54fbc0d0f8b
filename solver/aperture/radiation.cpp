#include "solver/aperture/radiation.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <map>
#include <stdexcept>
#include <utility>

#include "solver/aperture/gauss.hpp"
#include "solver/constants.hpp"

namespace panelwright::solver {
namespace {

/// Nodes along one axis of the plate: panels of at most 0.4 wavelength, and short ones under the rim, where
/// the field rises within the rim's height.
GaussRule plate_rule(double from, double to, double wall, double height, double wavelength) {
    std::vector<double> breaks{from, 0.0, to};
    for (const double side : {-wall, wall})
        for (const double off : {-3.0, -1.0, 0.0, 1.0, 3.0}) {
            const double at = side + off * height;
            if (at > from && at < to) breaks.push_back(at);
        }
    std::sort(breaks.begin(), breaks.end());
    std::vector<double> kept{breaks.front()};
    for (std::size_t i = 1; i < breaks.size(); ++i)
        if (breaks[i] - kept.back() > 0.2 * height || i + 1 == breaks.size()) kept.push_back(breaks[i]);
    return composite_rule(kept, wavelength / 2.5, 4);
}

/// Physical-optics current of the plate times quadrature weight, on a tensor grid.
struct PlateCurrent {
    std::vector<double> x;
    std::vector<double> y;
    std::vector<Eigen::MatrixXcd> along_x;  ///< a source: (x, y) [A m]
    std::vector<Eigen::MatrixXcd> along_y;
};

PlateCurrent plate_current_grid(const Wave& wave, const Rim& rim, const Plate& plate, const PlateField& field,
                                std::size_t sources) {
    const GaussRule x = plate_rule(plate.x_from, plate.x_to, 0.5 * rim.length, rim.height, wave.wavelength);
    const GaussRule y = plate_rule(plate.y_from, plate.y_to, 0.5 * rim.width, rim.height, wave.wavelength);
    const auto rows = static_cast<Eigen::Index>(x.nodes.size());
    const auto columns = static_cast<Eigen::Index>(y.nodes.size());
    PlateCurrent current{x.nodes, y.nodes,
                         std::vector<Eigen::MatrixXcd>(sources, Eigen::MatrixXcd(rows, columns)),
                         std::vector<Eigen::MatrixXcd>(sources, Eigen::MatrixXcd(rows, columns))};
#pragma omp parallel for schedule(static)
    for (Eigen::Index j = 0; j < columns; ++j)
        for (Eigen::Index i = 0; i < rows; ++i) {
            const auto xi = static_cast<std::size_t>(i);
            const auto yj = static_cast<std::size_t>(j);
            const auto density = field.current({x.nodes[xi], y.nodes[yj]});
            const double weight = x.weights[xi] * y.weights[yj];
            for (std::size_t s = 0; s < sources; ++s) {
                const auto column = static_cast<Eigen::Index>(s);
                current.along_x[s](i, j) = weight * density(0, column);
                current.along_y[s](i, j) = weight * density(1, column);
            }
        }
    return current;
}

/// exp(j k u x) for every u and x: (u, x).
Eigen::MatrixXcd phases(const Eigen::VectorXd& u, const std::vector<double>& x, double k) {
    Eigen::MatrixXcd out(u.size(), static_cast<Eigen::Index>(x.size()));
    for (Eigen::Index j = 0; j < out.cols(); ++j)
        for (Eigen::Index i = 0; i < out.rows(); ++i)
            out(i, j) = std::polar(1.0, k * u(i) * x[static_cast<std::size_t>(j)]);
    return out;
}

/// Radiation vectors of one source along a row of directions: electric N (x, y) and magnetic L (x, y).
struct RadiationVectors {
    Eigen::ArrayXcd electric_x;
    Eigen::ArrayXcd electric_y;
    Eigen::ArrayXcd magnetic_x;
    Eigen::ArrayXcd magnetic_y;
};

/// E_theta and E_phi of one row (one theta) from its radiation vectors; C. A. Balanis, Antenna Theory, 4th
/// ed., (12-10).
void set_row(FarField& field, Eigen::Index row, double k, const RadiationVectors& v) {
    const double cosine = std::cos(field.theta[static_cast<std::size_t>(row)]);
    const Complex scale(0.0, -k / (4.0 * pi));
    for (Eigen::Index q = 0; q < v.electric_x.size(); ++q) {
        const double phi = field.phi[static_cast<std::size_t>(q)];
        const double c = std::cos(phi);
        const double s = std::sin(phi);
        const Complex n_theta = cosine * (c * v.electric_x(q) + s * v.electric_y(q));
        const Complex n_phi = -s * v.electric_x(q) + c * v.electric_y(q);
        const Complex l_theta = cosine * (c * v.magnetic_x(q) + s * v.magnetic_y(q));
        const Complex l_phi = -s * v.magnetic_x(q) + c * v.magnetic_y(q);
        field.e_theta(row, q) = scale * (vacuum_impedance * n_theta + l_phi);
        field.e_phi(row, q) = scale * (vacuum_impedance * n_phi - l_theta);
    }
}

/// Whether plate and voltages are their own mirror images in the plane y = 0.
bool mirror_symmetric(const Rim& rim, const Plate& plate, const Eigen::MatrixXcd& voltage) {
    if (plate.y_from != -plate.y_to) return false;
    // The rim's sides run round it: the one from +y to -y at either end is mirrored in itself, the other two
    // in each other.
    const double largest = voltage.cwiseAbs().maxCoeff();
    std::map<std::pair<double, double>, Eigen::Index> places;
    const auto key = [](double x, double y) { return std::pair(std::round(x * 1e9), std::round(y * 1e9)); };
    for (std::size_t i = 0; i < rim.points.size(); ++i)
        places[key(rim.points[i].x(), rim.points[i].y())] = static_cast<Eigen::Index>(i);
    for (std::size_t i = 0; i < rim.points.size(); ++i) {
        const auto twin = places.find(key(rim.points[i].x(), -rim.points[i].y()));
        if (twin == places.end()) return false;
        const auto row = static_cast<Eigen::Index>(i);
        if ((voltage.row(row) - voltage.row(twin->second)).cwiseAbs().maxCoeff() > 1e-10 * largest)
            return false;
    }
    return true;
}

/// Fills the half of a mirror-symmetric field with phi > pi: E_theta is even, E_phi odd in phi.
void mirror(FarField& field) {
    const Eigen::Index columns = field.e_theta.cols();
    for (Eigen::Index q = columns / 2 + 1; q < columns; ++q) {
        field.e_theta.col(q) = field.e_theta.col(columns - q);
        field.e_phi.col(q) = -field.e_phi.col(columns - q);
    }
}

/// All sources' fields at the directions of `grid`.
std::vector<FarField> direct_fields(const Wave& wave, const Rim& rim, const Plate& plate,
                                    const Eigen::MatrixXcd& voltage, DiffractionOrder order,
                                    const FarField& grid) {
    const double k = wave.wavenumber;
    const auto sources = static_cast<std::size_t>(voltage.cols());
    const PlateField field(rim, voltage, k);
    const PlateCurrent current = plate_current_grid(wave, rim, plate, field, sources);
    const EdgeWaves waves = edge_waves(plate, field, k, order);
    std::vector<FarField> fields(sources, grid);
    std::vector<double> rim_x;
    std::vector<double> rim_y;
    for (const Eigen::Vector2d& point : rim.points) {
        rim_x.push_back(point.x());
        rim_y.push_back(point.y());
    }
    const auto rows = static_cast<Eigen::Index>(grid.theta.size());
    const bool symmetric = mirror_symmetric(rim, plate, voltage);
    const auto columns = static_cast<Eigen::Index>(symmetric ? grid.phi.size() / 2 + 1 : grid.phi.size());
#pragma omp parallel for schedule(dynamic)
    for (Eigen::Index t = 0; t < rows; ++t) {
        const double theta = grid.theta[static_cast<std::size_t>(t)];
        // At the poles every phi is the same direction; sin(pi) must not leave a residue there.
        const double sine = (t == 0 || t == rows - 1) ? 0.0 : std::sin(theta);
        Eigen::VectorXd u(columns);
        Eigen::VectorXd v(columns);
        for (Eigen::Index q = 0; q < columns; ++q) {
            u(q) = sine * std::cos(grid.phi[static_cast<std::size_t>(q)]);
            v(q) = sine * std::sin(grid.phi[static_cast<std::size_t>(q)]);
        }
        const Eigen::MatrixXcd phase_x = phases(u, current.x, k);
        const Eigen::MatrixXcd phase_y = phases(v, current.y, k);
        const Eigen::MatrixXcd rim_phase = phases(u, rim_x, k).cwiseProduct(phases(v, rim_y, k)) *
                                           std::polar(1.0, k * std::cos(theta) * rim.height);
        std::vector<RadiationVectors> vectors(sources);
        for (std::size_t s = 0; s < sources; ++s) {
            const auto column = static_cast<Eigen::Index>(s);
            RadiationVectors& out = vectors[s];
            out.electric_x = (phase_x * current.along_x[s]).cwiseProduct(phase_y).rowwise().sum().array();
            out.electric_y = (phase_x * current.along_y[s]).cwiseProduct(phase_y).rowwise().sum().array();
            Eigen::MatrixXcd magnetic(rim_phase.cols(), 2);
            for (Eigen::Index i = 0; i < magnetic.rows(); ++i)
                magnetic.row(i) = -voltage(i, column) *
                                  rim.elements[static_cast<std::size_t>(i)].cast<Complex>().transpose();
            const Eigen::MatrixXcd sum = rim_phase * magnetic;
            out.magnetic_x = sum.col(0).array();
            out.magnetic_y = sum.col(1).array();
        }
        for (Eigen::Index q = 0; q < columns; ++q) {
            const Eigen::Vector2d direction(u(q), v(q));
            for (std::size_t e = 0; e < waves.pieces.size(); ++e) {
                const EdgePiece& piece = waves.pieces[e];
                const EdgeFactors factors = edge_factors(piece, k, direction);
                const auto row = static_cast<Eigen::Index>(e);
                for (std::size_t s = 0; s < sources; ++s) {
                    const auto column = static_cast<Eigen::Index>(s);
                    const Complex outward = waves.hard(row, column) * factors.hard_outward;
                    const Complex along = waves.hard(row, column) * factors.hard_along +
                                          waves.slope(row, column) * factors.slope_along;
                    vectors[s].electric_x(q) += outward * piece.outward.x() + along * piece.along.x();
                    vectors[s].electric_y(q) += outward * piece.outward.y() + along * piece.along.y();
                }
            }
        }
        for (std::size_t s = 0; s < sources; ++s) set_row(fields[s], t, k, vectors[s]);
    }
    if (symmetric)
        for (FarField& one : fields) mirror(one);
    return fields;
}

/// Harmonics kept beyond k times the radius of the sources, where they end: ten more for four digits of the
/// field (J. E. Hansen, Spherical Near-field Antenna Measurements, 1988, sec. 2.2), six for three digits of
/// the power.
constexpr double field_margin = 10.0;
constexpr double power_margin = 6.0;

/// Intervals of a quarter circle that resolve the harmonics of a plate's field.
int quarter_intervals(const Wave& wave, const Plate& plate, double margin) {
    const double radius =
        std::hypot(std::max(-plate.x_from, plate.x_to), std::max(-plate.y_from, plate.y_to));
    return static_cast<int>(std::ceil(0.5 * (wave.wavenumber * radius + margin)));
}

/// Values of the interpolating trigonometric polynomial through `count` (even) equal steps round the circle,
/// at `angles`: a real matrix (angles, count).
Eigen::MatrixXd circle_interpolation(std::size_t count, const std::vector<double>& angles) {
    const double n = static_cast<double>(count);
    Eigen::MatrixXd out(static_cast<Eigen::Index>(angles.size()), static_cast<Eigen::Index>(count));
    for (Eigen::Index i = 0; i < out.rows(); ++i)
        for (Eigen::Index j = 0; j < out.cols(); ++j) {
            const double apart = angles[static_cast<std::size_t>(i)] - 2.0 * pi * static_cast<double>(j) / n;
            const double half = std::sin(0.5 * apart);
            out(i, j) = std::fabs(half) < 1e-12
                            ? 1.0
                            : std::sin(0.5 * n * apart) * std::cos(0.5 * apart) / (n * half);
        }
    return out;
}

/// One component interpolated: round phi first, then along full great circles through the poles, on whose far
/// half both unit vectors point the other way.
ComplexGrid interpolate_component(const ComplexGrid& values, const Eigen::MatrixXd& round_phi,
                                  const Eigen::MatrixXd& round_theta) {
    const Eigen::MatrixXcd wide = values.matrix() * round_phi.transpose().cast<Complex>();
    const Eigen::Index rows = wide.rows();
    const Eigen::Index columns = wide.cols();
    Eigen::MatrixXcd circles(2 * (rows - 1), columns);
    for (Eigen::Index q = 0; q < columns; ++q) {
        const Eigen::Index other = (q + columns / 2) % columns;
        circles.col(q).head(rows) = wide.col(q);
        circles.col(q).tail(rows - 2) = -wide.col(other).segment(1, rows - 2).reverse();
    }
    return (round_theta.cast<Complex>() * circles).array();
}

/// One field interpolated; see `interpolate_sphere`.
FarField interpolated(const FarField& field, double step) {
    FarField out = whole_sphere(field.frequency, step);
    const Eigen::MatrixXd round_phi = circle_interpolation(field.phi.size(), out.phi);
    const Eigen::MatrixXd round_theta = circle_interpolation(field.phi.size(), out.theta);
    out.e_theta = interpolate_component(field.e_theta, round_phi, round_theta);
    out.e_phi = interpolate_component(field.e_phi, round_phi, round_theta);
    return out;
}

/// Fields evaluated at steps of `coarse` and interpolated to `step`; evaluated there at once where `step` is
/// no finer.
std::vector<FarField> interpolated_fields(const Wave& wave, const Rim& rim, const Plate& plate,
                                          const Eigen::MatrixXcd& voltage, DiffractionOrder order,
                                          double coarse, double step) {
    if (coarse <= step)
        return direct_fields(wave, rim, plate, voltage, order, whole_sphere(wave.frequency, step));
    std::vector<FarField> fields =
        direct_fields(wave, rim, plate, voltage, order, whole_sphere(wave.frequency, coarse));
    for (FarField& field : fields) field = interpolated(field, step);
    return fields;
}

}  // namespace

FarField interpolate_sphere(const FarField& field, double step) {
    if (!covers_whole_sphere(field))
        throw std::invalid_argument("interpolation needs a far field over the whole sphere at equal steps");
    return interpolated(field, step);
}

std::vector<FarField> panel_far_fields(const Wave& wave, const Rim& rim, const Plate& plate,
                                       const Eigen::MatrixXcd& voltage, DiffractionOrder order, double step) {
    return interpolated_fields(wave, rim, plate, voltage, order,
                               0.5 * pi / quarter_intervals(wave, plate, field_margin), step);
}

Eigen::MatrixXcd mutual_powers(const std::vector<FarField>& fields) {
    const auto power_of = [&](std::size_t a, Complex factor, std::size_t b) {
        FarField sum = fields[a];
        sum.e_theta += factor * fields[b].e_theta;
        sum.e_phi += factor * fields[b].e_phi;
        return radiated_power(sum);
    };
    const auto count = static_cast<Eigen::Index>(fields.size());
    Eigen::MatrixXcd powers(count, count);
    for (Eigen::Index a = 0; a < count; ++a)
        powers(a, a) = radiated_power(fields[static_cast<std::size_t>(a)]);
    for (Eigen::Index a = 0; a < count; ++a)
        for (Eigen::Index b = a + 1; b < count; ++b) {
            const auto i = static_cast<std::size_t>(a);
            const auto j = static_cast<std::size_t>(b);
            const double both = powers(a, a).real() + powers(b, b).real();
            // |A + B|^2 and |A + jB|^2 hold the real and the imaginary part of A conj(B).
            powers(a, b) =
                Complex(0.5 * (power_of(i, 1.0, j) - both), 0.5 * (power_of(i, Complex(0.0, 1.0), j) - both));
            powers(b, a) = std::conj(powers(a, b));
        }
    return powers;
}

std::vector<FarField> power_fields(const Wave& wave, const Rim& rim, const Plate& plate,
                                   const Eigen::MatrixXcd& voltage, DiffractionOrder order) {
    // Products of two fields hold twice the harmonics of one.
    const double coarse = 0.5 * pi / quarter_intervals(wave, plate, power_margin);
    return interpolated_fields(wave, rim, plate, voltage, order, coarse, 0.5 * coarse);
}

}  // namespace panelwright::solver
