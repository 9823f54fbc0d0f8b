#include "mesh/graded_lines.hpp"

#include <algorithm>
#include <cassert>
#include <cmath>
#include <iterator>
#include <limits>

namespace panelwright::mesh {
namespace {

/// Comparisons of computed cell sizes forgive this much rounding.
constexpr double rounding = 1e-9;

/// The h at a key line for which the first `cell` of length has a count of one, h growing at ln(growth) up to
/// the largest cell.
double size_at_end(double cell, const Grading& grading) {
    const double slope = std::log(grading.growth);
    const double growing = cell * slope / (grading.growth - 1.0);
    if (growing + slope * cell <= grading.largest) return growing;
    // Within the first cell h becomes flat. With u = h over the largest cell at the line, the count of one
    // reads u - 1 - ln u = slope (1 - cell / largest), whose left side falls from infinity to 0 as u rises
    // to 1.
    const double right = slope * (1.0 - std::min(1.0, cell / grading.largest));
    double low = 0.0;
    double high = 1.0;
    for (int halving = 0; halving < 50; ++halving) {
        const double u = 0.5 * (low + high);
        (u - 1.0 - std::log(u) > right ? low : high) = u;
    }
    return high * grading.largest;
}

/// Wanted cell size h(x) between two key lines: rising from the first, flat, falling to the last; and its
/// integral count(x) of dx/h, with the inverse.
class CellSize {
  public:
    /// `first`, `last`: cells wanted at the two ends [m].
    CellSize(double length, double first, double last, const Grading& grading)
        : length_(length),
          slope_(std::log(grading.growth)),
          start_(size_at_end(first, grading)),
          end_(size_at_end(last, grading)),
          flat_(grading.largest) {
        rise_ = std::clamp((flat_ - start_) / slope_, 0.0, length);
        fall_ = length - std::clamp((flat_ - end_) / slope_, 0.0, length);
        if (rise_ > fall_) {
            rise_ = std::clamp(0.5 * (length + (end_ - start_) / slope_), 0.0, length);
            fall_ = rise_;
        }
        rise_count_ = std::log1p(slope_ * rise_ / start_) / slope_;
        flat_count_ = (fall_ - rise_) / flat_;
        count_ = rise_count_ + flat_count_ + std::log1p(slope_ * (length - fall_) / end_) / slope_;
    }

    double count() const { return count_; }

    double position(double count) const {
        if (count < rise_count_) return start_ * std::expm1(slope_ * count) / slope_;
        if (count < rise_count_ + flat_count_) return rise_ + (count - rise_count_) * flat_;
        return length_ - end_ * std::expm1(slope_ * (count_ - count)) / slope_;
    }

  private:
    double length_, slope_, start_, end_, flat_;
    double rise_ = 0.0, fall_ = 0.0;
    double rise_count_ = 0.0, flat_count_ = 0.0, count_ = 0.0;
};

/// What the cells between two key lines must keep to.
struct Limits {
    double first, last;  ///< largest end cells [m]
};

bool keeps_to(std::span<const double> line, const Limits& limits, const Grading& grading) {
    const std::size_t cells = line.size() - 1;
    const double forgiven = 1.0 + rounding;
    if (line[1] - line[0] > limits.first * forgiven) return false;
    if (line[cells] - line[cells - 1] > limits.last * forgiven) return false;
    double before = line[1] - line[0];
    for (std::size_t n = 0; n < cells; ++n) {
        const double cell = line[n + 1] - line[n];
        if (cell > grading.largest * forgiven) return false;
        if (std::max(cell, before) > grading.growth * std::min(cell, before) * forgiven) return false;
        before = cell;
    }
    return true;
}

/// The fewest lines from `from` to `to`, both included, that keep to the limits.
std::vector<double> between(double from, double to, const Limits& limits, const Grading& grading) {
    const CellSize size(to - from, limits.first, limits.last, grading);
    // Cells with a count of one or less keep to all limits; one or two fewer may do where the slopes of both
    // ends meet.
    const int most = static_cast<int>(std::ceil(size.count() * (1.0 - rounding))) + 1;
    for (int cells = std::max(1, most - 3); cells < most; ++cells) {
        std::vector<double> line(static_cast<std::size_t>(cells) + 1);
        for (int n = 0; n <= cells; ++n) {
            line[static_cast<std::size_t>(n)] = from + size.position(n * size.count() / cells);
        }
        line.front() = from;
        line.back() = to;
        if (cells + 1 == most || keeps_to(line, limits, grading)) return line;
    }
    assert(false);
    return {};
}

/// Cells wanted at the key lines: bounded at free edges, and by what may stand beside a single cell that
/// fills the distance to the next key line.
std::vector<double> wanted_cells(std::span<const KeyLine> keys, const Grading& grading) {
    std::vector<double> wanted(keys.size());
    for (std::size_t k = 0; k < keys.size(); ++k) {
        wanted[k] = keys[k].free_edge ? grading.edge : grading.largest;
        if (k > 0) wanted[k] = std::min(wanted[k], grading.growth * (keys[k].at - keys[k - 1].at));
        if (k + 1 < keys.size())
            wanted[k] = std::min(wanted[k], grading.growth * (keys[k + 1].at - keys[k].at));
    }
    return wanted;
}

/// Less wherever that is larger than growth from another key line allows.
std::vector<double> smoothed(std::vector<double> wanted, std::span<const KeyLine> keys, double growth) {
    for (std::size_t k = 1; k < keys.size(); ++k) {
        wanted[k] = std::min(wanted[k], wanted[k - 1] + (growth - 1.0) * (keys[k].at - keys[k - 1].at));
    }
    for (std::size_t k = keys.size() - 1; k-- > 0;) {
        wanted[k] = std::min(wanted[k], wanted[k + 1] + (growth - 1.0) * (keys[k + 1].at - keys[k].at));
    }
    return wanted;
}

}  // namespace

std::vector<double> graded_lines(std::span<const KeyLine> keys, const Grading& grading) {
    std::vector<double> lines;
    if (keys.size() < 2) {
        for (const KeyLine& key : keys) lines.push_back(key.at);
        return lines;
    }
    // Whole numbers of cells make the cells of an interval smaller than wanted, so that two intervals may
    // meet in too large a step. The larger side is then asked for less. That ends: wishes only shrink, and
    // the more cells an interval has, the less rounding to a whole number changes them.
    std::vector<double> wanted = wanted_cells(keys, grading);
    for (bool steep = true; steep;) {
        steep = false;
        wanted = smoothed(std::move(wanted), keys, grading.growth);
        lines.assign(1, keys.front().at);
        for (std::size_t k = 0; k + 1 < keys.size(); ++k) {
            const double left = k == 0 ? 0.0 : lines.back() - lines[lines.size() - 2];
            const auto part = between(keys[k].at, keys[k + 1].at, {wanted[k], wanted[k + 1]}, grading);
            const double right = part[1] - part[0];
            if (k > 0 && std::max(left, right) > grading.growth * std::min(left, right) * (1.0 + rounding)) {
                wanted[k] = std::min(left, right) * std::sqrt(grading.growth);
                steep = true;
            }
            lines.insert(lines.end(), part.begin() + 1, part.end());
        }
    }
    return lines;
}

void KeyLines::add(KeyLine line) {
    const auto after = std::lower_bound(lines_.begin(), lines_.end(), line.at - tolerance_,
                                        [](const KeyLine& a, double b) { return a.at < b; });
    if (after != lines_.end() && after->at <= line.at + tolerance_) {
        after->free_edge = after->free_edge || line.free_edge;
    } else {
        lines_.insert(after, line);
    }
}

double KeyLines::settle(double wish, double from, double to) {
    double best = std::numeric_limits<double>::quiet_NaN();
    for (const KeyLine& line : lines_) {
        const bool within = line.at >= from - tolerance_ && line.at <= to + tolerance_;
        if (within && !(std::fabs(line.at - wish) >= std::fabs(best - wish))) best = line.at;
    }
    if (!std::isnan(best)) return best;
    add({.at = wish});
    return wish;
}

int nearest_line(std::span<const double> lines, double at) {
    assert(!lines.empty());
    const auto above = std::lower_bound(lines.begin(), lines.end(), at);
    if (above == lines.begin()) return 0;
    const auto below = std::prev(above);
    const bool take_above = above != lines.end() && *above - at < at - *below;
    return static_cast<int>(std::distance(lines.begin(), take_above ? above : below));
}

}  // namespace panelwright::mesh
