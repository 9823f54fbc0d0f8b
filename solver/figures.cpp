#include "solver/figures.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <cstddef>
#include <limits>
#include <optional>
#include <stdexcept>
#include <utility>
#include <vector>

#include "solver/constants.hpp"

namespace panelwright::solver {

namespace {

constexpr double nan = std::numeric_limits<double>::quiet_NaN();
constexpr double widest_ratio_db = 200.0;  // ratios to a zero end here, so that they stay numbers
constexpr double largest_axial_ratio_db = 60.0;
constexpr double linear_axial_ratio_db = 40.0;
constexpr double flat = 1e-9;  // relative; two directions closer than this share the peak

double degrees(double radians) {
    return radians * 180.0 / pi;
}

/// 10 log10(a / b) kept within +-200 dB; NaN for 0 / 0.
double ratio_db(double a, double b) {
    if (!(a > 0.0) && !(b > 0.0)) return nan;
    if (!(b > 0.0)) return widest_ratio_db;
    if (!(a > 0.0)) return -widest_ratio_db;
    return std::clamp(10.0 * std::log10(a / b), -widest_ratio_db, widest_ratio_db);
}

/// Vertex of the parabola in dB through a peak sample and its neighbours.
struct Vertex {
    double offset;  ///< from the middle sample [steps], within +-1/2
    double rise;    ///< above the middle sample [dB], >= 0
};

/// A peak refined between equally spaced samples of intensity. No refinement (0, 0) on a flat top, and none
/// where a neighbour lies more than 3 dB down: there three samples do not resolve the beam.
Vertex refined_peak(double before, double peak, double after) {
    const double left = ratio_db(before, peak);
    const double right = ratio_db(after, peak);
    const double curvature = left + right;
    if (!(std::min(left, right) > -3.0) || !(curvature < -10.0 * flat)) return {0.0, 0.0};
    const double offset = std::clamp((left - right) / (2.0 * curvature), -0.5, 0.5);
    return {offset, std::max(0.0, offset * (right - left) / 2.0 + offset * offset * curvature / 2.0)};
}

/// Number of the peak of a closed cut; among equals the one nearest to the cut's start.
std::size_t cut_peak(std::span<const double> cut) {
    const double greatest = *std::max_element(cut.begin(), cut.end());
    const std::size_t n = cut.size();
    for (std::size_t step = 0; step <= n / 2; ++step) {
        for (const std::size_t i : {step, (n - step) % n}) {
            if (cut[i] >= greatest * (1.0 - flat)) return i;
        }
    }
    return 0;
}

/// Intensity round the closed cut of phi column `q` and the column opposite: theta 0..pi, then back. (2 T -
/// 2)
std::vector<double> closed_cut(const RealGrid& power, Eigen::Index q) {
    const Eigen::Index opposite = (q + power.cols() / 2) % power.cols();
    std::vector<double> cut;
    for (Eigen::Index t = 0; t < power.rows(); ++t) cut.push_back(power(t, q));
    for (Eigen::Index t = power.rows() - 2; t > 0; --t) cut.push_back(power(t, opposite));
    return cut;
}

/// A direction of the grid.
struct Direction {
    Eigen::Index t;
    Eigen::Index q;
};

/// The direction of greatest intensity; among equals the one nearest boresight.
Direction peak_direction(const RealGrid& power) {
    const double greatest = power.maxCoeff();
    for (Eigen::Index t = 0; t < power.rows(); ++t) {
        Eigen::Index q = 0;
        if (power.row(t).maxCoeff(&q) >= greatest * (1.0 - flat)) return {t, q};
    }
    return {0, 0};
}

/// Angle between peak and boresight [rad], the peak refined by parabolas in dB.
double squint(const RealGrid& power, Direction peak, double step) {
    const auto offset = [&power](Eigen::Index q, Eigen::Index t) {
        const std::vector<double> cut = closed_cut(power, q);
        const std::size_t n = cut.size();
        const auto i = static_cast<std::size_t>(t);
        return refined_peak(cut[(i + n - 1) % n], cut[i], cut[(i + 1) % n]).offset;
    };
    if (peak.t > 0 && peak.t + 1 < power.rows()) {
        return step * (static_cast<double>(peak.t) + offset(peak.q, peak.t));
    }
    const double from_pole = step * std::hypot(offset(0, peak.t), offset(power.cols() / 4, peak.t));
    return peak.t == 0 ? from_pole : pi - from_pole;
}

/// The directions joined to `peak` without passing through one below `level`. The rows at the poles are one
/// point.
std::vector<Direction> main_beam(const RealGrid& power, Direction peak, double level) {
    Eigen::Array<bool, Eigen::Dynamic, Eigen::Dynamic, Eigen::RowMajor> seen(power.rows(), power.cols());
    seen.setConstant(false);
    std::vector<Direction> beam;
    const auto visit = [&](Eigen::Index t, Eigen::Index q) {
        if (t < 0 || t >= power.rows() || seen(t, q) || !(power(t, q) >= level)) return;
        seen(t, q) = true;
        beam.push_back({t, q});
    };
    visit(peak.t, peak.q);
    for (std::size_t next = 0; next < beam.size(); ++next) {
        const auto [t, q] = beam[next];
        if (t == 0 || t + 1 == power.rows()) {
            for (Eigen::Index other = 0; other < power.cols(); ++other) visit(t, other);
        }
        visit(t - 1, q);
        visit(t + 1, q);
        visit(t, (q + 1) % power.cols());
        visit(t, (q + power.cols() - 1) % power.cols());
    }
    return beam;
}

/// Greatest cross-polar level within the -10 dB contour of the main beam over the co-polar peak there [dB].
double cross_polar_db(const FarField& field, const RealGrid& power, Direction peak) {
    const LudwigThird parts = ludwig_third(field);
    double co = 0.0;
    double cross = 0.0;
    for (const auto& [t, q] : main_beam(power, peak, 0.1 * power(peak.t, peak.q))) {
        co = std::max(co, std::norm(parts.co(t, q)));
        cross = std::max(cross, std::norm(parts.cross(t, q)));
    }
    return ratio_db(cross, co);
}

/// The two circular parts of the field at boresight [V]. exp(+j omega t), so that a right-hand wave is x - j
/// y.
struct CircularParts {
    double right;
    double left;
};

CircularParts circular_parts(const FarField& field) {
    const Complex x = field.e_theta(0, 0);
    const Complex y = field.e_phi(0, 0);
    const Complex j(0.0, 1.0);
    return {std::abs(x + j * y) / std::sqrt(2.0), std::abs(x - j * y) / std::sqrt(2.0)};
}

/// Axial ratio at boresight [dB], at most 60; NaN without a field there.
double axial_ratio_db(const FarField& field) {
    const auto [right, left] = circular_parts(field);
    if (!(right + left > 0.0)) return nan;
    const double short_axis = std::abs(right - left);
    return std::min(largest_axial_ratio_db, 2.0 * ratio_db(right + left, short_axis));
}

/// Greatest intensity with theta >= 150 deg.
double greatest_rear_intensity(const FarField& field, const RealGrid& power) {
    double greatest = 0.0;
    for (Eigen::Index t = 0; t < power.rows(); ++t) {
        if (field.theta[static_cast<std::size_t>(t)] < pi * 150.0 / 180.0 - 1e-9) continue;
        greatest = std::max(greatest, power.row(t).maxCoeff());
    }
    return greatest;
}

}  // namespace

double half_power_beamwidth(std::span<const double> intensity) {
    const std::size_t n = intensity.size();
    if (n < 3) throw std::invalid_argument("a closed cut needs at least three directions");
    const std::size_t peak = cut_peak(intensity);
    if (!(intensity[peak] > 0.0)) return nan;
    const auto level = [&](std::size_t i) { return ratio_db(intensity[i % n], intensity[peak]); };
    const double half =
        refined_peak(intensity[(peak + n - 1) % n], intensity[peak], intensity[(peak + 1) % n]).rise +
        10.0 * std::log10(0.5);
    // Steps from the peak to the half-power point when walking `stride` samples (mod n) at a time.
    const auto steps = [&](std::size_t stride) -> std::optional<double> {
        double inside = level(peak);
        for (std::size_t step = 1; step < n; ++step) {
            const double here = level(peak + step * stride);
            if (here < half) return static_cast<double>(step - 1) + (inside - half) / (inside - here);
            inside = here;
        }
        return std::nullopt;
    };
    const std::optional<double> after = steps(1);
    const std::optional<double> before = steps(n - 1);
    if (!after || !before) return nan;
    return (*after + *before) * 2.0 * pi / static_cast<double>(n);
}

Figures figures(const FarField& field, const Powers& powers, std::complex<double> s11) {
    if (!covers_whole_sphere(field)) {
        throw std::invalid_argument("figures need a far field over the whole sphere at equal steps");
    }
    if (!(powers.accepted > 0.0)) throw std::invalid_argument("the accepted power must be positive");
    const RealGrid power = intensity(field);
    const Direction peak = peak_direction(power);
    const double greatest = power(peak.t, peak.q);
    const Eigen::Index back = power.rows() - 1;
    const RealGrid gain = gain_dbi(field, powers.accepted);

    Figures result{};
    result.peak_gain_dbi = gain(peak.t, peak.q);
    result.boresight_gain_dbi = gain(0, 0);
    result.realized_gain_dbi = result.peak_gain_dbi + ratio_db(1.0 - std::norm(s11), 1.0);
    if (std::isnan(std::norm(s11))) result.realized_gain_dbi = nan;
    result.directivity_dbi = powers.radiated > 0.0 ? ratio_db(4.0 * pi * greatest, powers.radiated) : nan;
    result.radiation_efficiency = powers.radiated / powers.accepted;
    result.hpbw_e_deg = degrees(half_power_beamwidth(closed_cut(power, 0)));
    result.hpbw_h_deg = degrees(half_power_beamwidth(closed_cut(power, power.cols() / 4)));
    result.front_to_back_db = ratio_db(greatest, power(back, 0));
    result.front_to_rear_db = ratio_db(greatest, greatest_rear_intensity(field, power));
    result.squint_deg = greatest > 0.0 ? degrees(squint(power, peak, field.theta[1])) : nan;
    result.cross_polar_db = cross_polar_db(field, power, peak);
    result.axial_ratio_db = axial_ratio_db(field);
    return result;
}

std::string_view polarisation_sense(const FarField& field) {
    if (field.theta.empty() || field.theta.front() != 0.0 || field.e_theta.size() == 0 ||
        field.e_phi.size() == 0) {
        throw std::invalid_argument("the sense of rotation needs a far field that starts at theta = 0");
    }
    const double ratio = axial_ratio_db(field);
    if (std::isnan(ratio)) return "none: no field at boresight";
    if (ratio > linear_axial_ratio_db) return "linear";
    const auto [right, left] = circular_parts(field);
    return right > left
               ? "right-hand, clockwise seen from behind the antenna with the wave going away (IEEE)"
               : "left-hand, anticlockwise seen from behind the antenna with the wave going away (IEEE)";
}

std::span<const FigureEntry> figure_table() {
    static constexpr std::array<FigureEntry, 12> table{{
        {"peak_gain_dbi", "peak gain", "dBi",
         "Greatest gain over all directions: radiation intensity over the intensity that the accepted power "
         "would "
         "give if radiated equally in all directions; mismatch is not included (IEEE Std 145).",
         &Figures::peak_gain_dbi},
        {"boresight_gain_dbi", "boresight gain", "dBi",
         "Gain along the outward normal of the patch, theta = 0.", &Figures::boresight_gain_dbi},
        {"realized_gain_dbi", "realized gain", "dBi",
         "Peak gain less the mismatch loss against the feed's reference impedance (IEEE Std 145).",
         &Figures::realized_gain_dbi},
        {"directivity_dbi", "directivity", "dBi",
         "Greatest radiation intensity over the intensity averaged over all directions (IEEE Std 145).",
         &Figures::directivity_dbi},
        {"radiation_efficiency", "radiation efficiency", "1",
         "Radiated power over the power accepted at the port (IEEE Std 145).",
         &Figures::radiation_efficiency},
        {"hpbw_e_deg", "half-power beamwidth, E-plane", "deg",
         "Angle between the two directions at half the peak intensity on either side of the peak in the cut "
         "through "
         "phi = 0 and 180 deg, about that cut's own peak; none where the cut has no half-power points.",
         &Figures::hpbw_e_deg},
        {"hpbw_h_deg", "half-power beamwidth, H-plane", "deg",
         "Angle between the two directions at half the peak intensity on either side of the peak in the cut "
         "through "
         "phi = 90 and 270 deg, about that cut's own peak; none where the cut has no half-power points.",
         &Figures::hpbw_h_deg},
        {"front_to_back_db", "front-to-back ratio", "dB",
         "Greatest radiation intensity over the intensity at theta = 180 deg, both polarisations summed; at "
         "most "
         "200.",
         &Figures::front_to_back_db},
        {"front_to_rear_db", "front-to-rear ratio", "dB",
         "Greatest radiation intensity over the greatest intensity within 30 deg of theta = 180 deg, both "
         "polarisations summed; at most 200.",
         &Figures::front_to_rear_db},
        {"squint_deg", "squint", "deg", "Angle between the direction of peak gain and boresight.",
         &Figures::squint_deg},
        {"cross_polar_db", "cross-polar level", "dB",
         "Greatest cross-polar level within the -10 dB contour of the main beam over the co-polar peak, by "
         "Ludwig's "
         "third definition with the x axis as reference; at least -200.",
         &Figures::cross_polar_db},
        {"axial_ratio_db", "axial ratio", "dB",
         "Long over short axis of the polarisation ellipse at boresight; at most 60, which stands for "
         "linear.",
         &Figures::axial_ratio_db},
    }};
    return table;
}

}  // namespace panelwright::solver
