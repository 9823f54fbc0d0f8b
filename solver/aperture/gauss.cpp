#include "solver/aperture/gauss.hpp"

#include <boost/math/special_functions/legendre.hpp>
#include <cmath>
#include <stdexcept>

namespace panelwright::solver {

GaussRule gauss_rule(int count) {
    if (count < 1 || count > 64) throw std::invalid_argument("a Gauss rule has 1 to 64 points");
    GaussRule rule;
    const auto add = [&](double node) {
        const double slope = boost::math::legendre_p_prime(count, node);
        rule.nodes.push_back(node);
        rule.weights.push_back(2.0 / ((1.0 - node * node) * slope * slope));
    };
    const std::vector<double> zeros =
        boost::math::legendre_p_zeros<double>(count);  // those not below 0, ascending
    for (auto zero = zeros.rbegin(); zero != zeros.rend(); ++zero)
        if (*zero > 0.0) add(-*zero);
    for (const double zero : zeros) add(zero);
    return rule;
}

GaussRule composite_rule(std::span<const double> breaks, double longest, int count) {
    if (!(longest > 0.0)) throw std::invalid_argument("the longest panel must be positive");
    const GaussRule base = gauss_rule(count);
    GaussRule rule;
    for (std::size_t b = 0; b + 1 < breaks.size(); ++b) {
        const double stretch = breaks[b + 1] - breaks[b];
        if (!(stretch > 0.0)) continue;
        const int panels = static_cast<int>(std::ceil(stretch / longest));
        const double half = 0.5 * stretch / panels;
        for (int p = 0; p < panels; ++p)
            for (std::size_t i = 0; i < base.nodes.size(); ++i) {
                rule.nodes.push_back(breaks[b] + half * (2.0 * p + 1.0 + base.nodes[i]));
                rule.weights.push_back(half * base.weights[i]);
            }
    }
    return rule;
}

}  // namespace panelwright::solver
