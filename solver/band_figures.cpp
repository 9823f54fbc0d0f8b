#include <algorithm>
#include <array>
#include <cmath>
#include <cstddef>
#include <functional>
#include <limits>
#include <stdexcept>

#include "solver/result.hpp"

namespace panelwright::solver {

namespace {

constexpr double nan = std::numeric_limits<double>::quiet_NaN();
constexpr double vswr2_reflection = 1.0 / 3.0;  // |S11| of VSWR = 2
constexpr double floor_db = -200.0;

/// The quadratic through three unequally spaced points, at `x`.
template <typename T>
T quadratic(const std::array<double, 3>& xs, const std::array<T, 3>& ys, double x) {
    const auto [a, b, c] = xs;
    return ys[0] * ((x - b) * (x - c) / ((a - b) * (a - c))) +
           ys[1] * ((x - a) * (x - c) / ((b - a) * (b - c))) +
           ys[2] * ((x - a) * (x - b) / ((c - a) * (c - b)));
}

/// Where that quadratic has its extreme, kept within the three points; the middle point when it is a straight
/// line.
double vertex(const std::array<double, 3>& xs, const std::array<double, 3>& ys) {
    const double left = (ys[1] - ys[0]) / (xs[1] - xs[0]);
    const double right = (ys[2] - ys[1]) / (xs[2] - xs[1]);
    const double curvature = (right - left) / (xs[2] - xs[0]);
    if (curvature == 0.0 || !std::isfinite(curvature)) return xs[1];
    return std::clamp(0.5 * (xs[0] + xs[1]) - 0.5 * left / curvature, xs[0], xs[2]);
}

template <typename T>
std::array<T, 3> around(const std::vector<T>& values, std::size_t middle) {
    return {values[middle - 1], values[middle], values[middle + 1]};
}

/// Number of the first value that is best by `better`; NaN is never best.
template <typename Better>
std::size_t best(const std::vector<double>& values, Better better) {
    std::size_t found = 0;
    for (std::size_t i = 1; i < values.size(); ++i) {
        if (std::isnan(values[found]) || better(values[i], values[found])) found = i;
    }
    return found;
}

/// The frequency of greatest input resistance of the fundamental mode: the lowest maximum inside the band
/// that reaches a fiftieth of the greatest resistance, so that higher modes further up do not count; NaN
/// where there is none.
double resonance(const PortResponse& port) {
    std::vector<double> resistance;
    for (const Complex& z : port.impedance) resistance.push_back(z.real());
    if (resistance.empty()) return nan;
    const double greatest = resistance[best(resistance, std::greater<>{})];
    for (std::size_t i = 1; i + 1 < resistance.size(); ++i)
        if (resistance[i] > resistance[i - 1] && resistance[i] >= resistance[i + 1] &&
            resistance[i] >= 0.02 * greatest)
            return vertex(around(port.frequency, i), around(resistance, i));
    return nan;
}

/// A frequency and |S11| there.
struct Match {
    double frequency;
    double magnitude;
};

/// The least |S11|, at sample `least` or refined beside it.
Match best_match(const std::vector<double>& frequency, const std::vector<Complex>& s11, std::size_t least) {
    const Match sampled{frequency[least], std::abs(s11[least])};
    if (least == 0 || least + 1 >= frequency.size()) return sampled;
    // |S11| has a kink where it touches zero and its square has none, so the square shows where the least
    // lies; how deep it is follows from S11 itself, which is smooth.
    const std::array<double, 3> f = around(frequency, least);
    const std::array<Complex, 3> s = around(s11, least);
    const double lowest = vertex(f, {std::norm(s[0]), std::norm(s[1]), std::norm(s[2])});
    const Match refined{lowest, std::abs(quadratic(f, s, lowest))};
    return refined.magnitude < sampled.magnitude ? refined : sampled;
}

/// Where |S11| rises through VSWR = 2 on the way from `inside` to `outside`.
double crossing(Match inside, Match outside) {
    const double share = (vswr2_reflection - inside.magnitude) / (outside.magnitude - inside.magnitude);
    return inside.frequency + share * (outside.frequency - inside.frequency);
}

/// First crossing of VSWR = 2 on the way from `start` through `path`; NaN where the band ends before.
double band_edge(Match start, std::span<const Match> path) {
    Match inside = start;
    for (const Match& here : path) {
        if (std::isnan(here.magnitude)) return nan;
        if (here.magnitude > vswr2_reflection) return crossing(inside, here);
        inside = here;
    }
    return nan;
}

void require_ascending(const PortResponse& port) {
    if (port.frequency.size() != port.impedance.size()) {
        throw std::invalid_argument("a port response needs one impedance a frequency");
    }
    for (std::size_t i = 1; i < port.frequency.size(); ++i) {
        if (!(port.frequency[i] > port.frequency[i - 1])) {
            throw std::invalid_argument("the frequencies of a port response must ascend");
        }
    }
}

}  // namespace

BandFigures band_figures(const PortResponse& port, double reference) {
    require_ascending(port);
    BandFigures result{nan, nan, nan, nan, nan, nan};
    if (port.frequency.empty()) return result;

    std::vector<Complex> s11;
    std::vector<double> magnitude;
    for (const Complex& z : port.impedance) {
        s11.push_back(reflection(z, reference));
        magnitude.push_back(std::abs(s11.back()));
    }
    result.resonance_hz = resonance(port);
    const std::size_t least = best(magnitude, std::less<>{});
    if (std::isnan(magnitude[least])) return result;
    const Match match = best_match(port.frequency, s11, least);
    result.best_match_hz = match.frequency;
    result.best_match_db = std::max(floor_db, 20.0 * std::log10(match.magnitude));
    if (match.magnitude > vswr2_reflection) return result;

    std::vector<Match> below;
    std::vector<Match> above;
    for (std::size_t i = 0; i < magnitude.size(); ++i) {
        const Match sample{port.frequency[i], magnitude[i]};
        if (sample.frequency < match.frequency) below.push_back(sample);
        if (sample.frequency > match.frequency) above.push_back(sample);
    }
    std::reverse(below.begin(), below.end());
    result.vswr2_from_hz = band_edge(match, below);
    result.vswr2_to_hz = band_edge(match, above);
    result.bandwidth_percent =
        200.0 * (result.vswr2_to_hz - result.vswr2_from_hz) / (result.vswr2_to_hz + result.vswr2_from_hz);
    return result;
}

std::span<const BandFigureEntry> band_figure_table() {
    static constexpr std::array<BandFigureEntry, 6> table{{
        {"resonance_hz", "resonance", "Hz",
         "Frequency of greatest input resistance of the fundamental mode; none where it is not inside the "
         "band.",
         &BandFigures::resonance_hz},
        {"best_match_hz", "best match at", "Hz",
         "Frequency of the least reflection against the feed's reference impedance within the band.",
         &BandFigures::best_match_hz},
        {"best_match_db", "reflection at best match", "dB", "Magnitude of S11 at the best match.",
         &BandFigures::best_match_db},
        {"vswr2_from_hz", "VSWR 2 from", "Hz",
         "Lower edge of the band of VSWR <= 2 around the best match; none where it is not inside the band.",
         &BandFigures::vswr2_from_hz},
        {"vswr2_to_hz", "VSWR 2 to", "Hz",
         "Upper edge of the band of VSWR <= 2 around the best match; none where it is not inside the band.",
         &BandFigures::vswr2_to_hz},
        {"bandwidth_percent", "impedance bandwidth", "%",
         "Width of the band of VSWR <= 2 around the best match over the centre of that band.",
         &BandFigures::bandwidth_percent},
    }};
    return table;
}

}  // namespace panelwright::solver
