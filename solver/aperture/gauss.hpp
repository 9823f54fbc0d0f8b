/// Gauss-Legendre rules.
#pragma once

#include <span>
#include <vector>

namespace panelwright::solver {

/// Nodes in (-1, 1) and weights.
struct GaussRule {
    std::vector<double> nodes;
    std::vector<double> weights;
};

/// The rule of `count` points (1 to 64), to machine precision. Throws std::invalid_argument.
GaussRule gauss_rule(int count);

/// A composite rule: every stretch between neighbouring `breaks` (ascending) is cut into equal panels no
/// longer than `longest`, each with `count` points.
GaussRule composite_rule(std::span<const double> breaks, double longest, int count);

}  // namespace panelwright::solver
