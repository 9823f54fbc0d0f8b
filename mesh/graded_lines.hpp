/// Grid lines along one axis, graded towards the places where the current is singular.
#pragma once

#include <optional>
#include <span>
#include <vector>

namespace panelwright::mesh {

/// A line that the grid must have.
struct KeyLine {
    double at = 0.0;         ///< [m]
    bool free_edge = false;  ///< some sheet ends here, so the cells on both sides are edge cells
};

/// Limits of cell sizes along one axis.
struct Grading {
    double largest = 0.0;  ///< of any cell [m]
    double edge = 0.0;     ///< of the two cells at a free edge [m], at most `largest`
    double growth = 0.0;   ///< largest ratio of neighbouring cells, > 1
};

/// All lines: the key lines and those between them, ascending [m].
///
/// No cell is larger than `grading.largest`, none at a free edge larger than `grading.edge`, and neighbours
/// differ by no more than a factor `grading.growth` (up to rounding). `keys` ascend strictly; fewer than two
/// come back as they are.
///
/// Between two key lines the cells follow h(x) = ln(g) (t / (g - 1) + x), x from the line and t the cell
/// wanted there: lines at equal steps of the integral of dx/h then make a geometric sequence t, t g, t g^2, …
/// exactly. The smaller of both ends' h and of the largest cell is taken.
std::vector<double> graded_lines(std::span<const KeyLine> keys, const Grading& grading);

/// Key lines as they are collected: in order, none closer to another than a tolerance.
class KeyLines {
  public:
    /// Lines closer together than `tolerance` [m] count as one.
    explicit KeyLines(double tolerance) : tolerance_(tolerance) {}

    /// Adds a line; one that is there already stays where it is and becomes a free edge if either is one.
    void add(KeyLine line);

    /// The line nearest to `wish` between `from` and `to`; where there is none, `wish` itself, which is
    /// added.
    double settle(double wish, double from, double to);

    std::span<const KeyLine> lines() const { return lines_; }

  private:
    std::vector<KeyLine> lines_;
    double tolerance_;
};

/// Number of the line of `lines` (ascending, not empty) that lies nearest to `at`.
int nearest_line(std::span<const double> lines, double at);

}  // namespace panelwright::mesh
