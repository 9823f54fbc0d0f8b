#include "solver/result.hpp"

#include <algorithm>
#include <cmath>
#include <cstddef>
#include <limits>
#include <stdexcept>
#include <utility>

namespace panelwright::solver {

namespace {

/// S11 at `frequency` from the band's points by the cubic (or what the band has points for) through the
/// nearest four; S11 is smooth where the impedance of a resonance is steep. NaN outside the band.
Complex reflection_at(const PortResponse& port, double frequency, double reference) {
    const std::vector<double>& f = port.frequency;
    const double slack = 1e-9 * frequency;
    if (f.empty() || frequency < f.front() - slack || frequency > f.back() + slack) {
        return {std::numeric_limits<double>::quiet_NaN(), std::numeric_limits<double>::quiet_NaN()};
    }
    const std::size_t points = std::min<std::size_t>(4, f.size());
    const auto above = static_cast<std::size_t>(std::lower_bound(f.begin(), f.end(), frequency) - f.begin());
    const std::size_t first = std::min(above - std::min(above, points / 2), f.size() - points);
    Complex sum{};
    for (std::size_t i = first; i < first + points; ++i) {
        double weight = 1.0;
        for (std::size_t other = first; other < first + points; ++other) {
            if (other != i) weight *= (frequency - f[other]) / (f[i] - f[other]);
        }
        sum += weight * reflection(port.impedance[i], reference);
    }
    return sum;
}

}  // namespace

MethodResult with_figures(Solution solution, double reference) {
    if (solution.patterns.size() != solution.powers.size()) {
        throw std::invalid_argument("a solution needs the powers of every pattern");
    }
    MethodResult result;
    result.band = band_figures(solution.port, reference);
    for (std::size_t p = 0; p < solution.patterns.size(); ++p) {
        const FarField& field = solution.patterns[p];
        const Complex s11 = reflection_at(solution.port, field.frequency, reference);
        result.figures.push_back(figures(field, solution.powers[p], s11));
    }
    result.solution = std::move(solution);
    return result;
}

}  // namespace panelwright::solver
