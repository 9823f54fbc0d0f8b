#include "mesh/layout.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cassert>
#include <cmath>
#include <limits>
#include <numbers>
#include <stdexcept>
#include <utility>

#include "mesh/graded_lines.hpp"

namespace panelwright::mesh {
namespace {

/// Lines closer together than this part of the panel's size count as one: less than any length that
/// `problems` accepts.
constexpr double line_tolerance = 1e-9;

/// More lines than this along an axis are a slip of the pen, not a mesh.
constexpr double most_cells_along_axis = 1e5;

/// Half the side of a tube's block over the tube's radius: leaves the ring between them well-shaped
/// triangles. Where another line lies between the two limits, that one is taken instead of making a sliver
/// beside it.
constexpr double usual_block = 2.0;
constexpr double largest_block = 3.0;

void check(const Panel& panel, const MeshOptions& options) {
    std::string faults;
    for (const PanelProblem& problem : problems(panel)) faults += problem.message + "; ";
    if (!faults.empty()) throw std::invalid_argument("no mesh of a faulty panel: " + faults);

    const auto refuse = [](const char* what) { throw std::invalid_argument(what); };
    const bool sized = std::isfinite(options.cell_size) && options.cell_size > 0.0;
    if (!sized) refuse("MeshOptions::cell_size must be positive");
    const bool edged = options.edge_cell == 0.0 || (options.edge_cell >= 1e-3 * options.cell_size &&
                                                    options.edge_cell <= options.cell_size);
    if (!edged) refuse("MeshOptions::edge_cell must be 0 or between a thousandth of cell_size and cell_size");
    const bool growing = std::isfinite(options.growth) && options.growth >= 1.1;
    if (!growing) refuse("MeshOptions::growth must be at least 1.1");
    const bool sided = options.tube_sides >= 4 && options.tube_sides <= 360 && options.tube_sides % 2 == 0;
    if (!sided) refuse("MeshOptions::tube_sides must be even, 4 to 360");
    const double widest = std::max({panel.patch.length, panel.patch.width, panel.reflector.length,
                                    panel.reflector.width, panel.spacer.height});
    if (widest / options.cell_size > most_cells_along_axis)
        refuse("MeshOptions::cell_size is too small for the panel");
}

using Pair = std::array<double, 2>;

/// A tube before the lines are numbered; [0] along x, [1] along y.
struct PlannedTube {
    Pair at;
    double radius;  ///< of the round part [m]
    Part part;
    Pair low, high;  ///< first what the block must not pass, then the block itself [m]
};

std::vector<PlannedTube> planned_tubes(const Panel& panel) {
    std::vector<PlannedTube> tubes;
    if (const auto* pin = std::get_if<Probe>(&panel.feed)) {
        tubes.push_back({{pin->x, pin->y}, 0.5 * pin->diameter, Part::feed, {}, {}});
    }
    for (const Post& post : panel.posts)
        tubes.push_back({{post.x, post.y}, 0.5 * post.diameter, Part::post, {}, {}});
    return tubes;
}

/// Blocks stay within both sheets.
void keep_on_sheets(PlannedTube& tube, const Panel& panel) {
    const Pair patch = {0.5 * panel.patch.length, 0.5 * panel.patch.width};
    const Pair reflector = {0.5 * panel.reflector.length, 0.5 * panel.reflector.width};
    const Pair offset = {panel.reflector.offset_x, panel.reflector.offset_y};
    for (std::size_t axis = 0; axis < 2; ++axis) {
        tube.low[axis] = std::max(-patch[axis], offset[axis] - reflector[axis]);
        tube.high[axis] = std::min(patch[axis], offset[axis] + reflector[axis]);
    }
}

/// Blocks stay off the notch, on the side where there is more room.
void keep_off_notch(PlannedTube& tube, const Panel& panel, const Tab& tab) {
    if (tab.notch_depth <= 0.0) return;
    const double end = -0.5 * panel.patch.length + tab.notch_depth;
    const double side = 0.5 * tab.width + tab.notch_gap;
    if (tube.at[0] - end >= std::fabs(tube.at[1]) - side) {
        tube.low[0] = std::max(tube.low[0], end);
    } else if (tube.at[1] > 0.0) {
        tube.low[1] = std::max(tube.low[1], side);
    } else {
        tube.high[1] = std::min(tube.high[1], -side);
    }
}

/// Blocks of two tubes meet at most in a line between them, across the axis along which they are further
/// apart.
void keep_apart(PlannedTube& one, PlannedTube& two) {
    const std::size_t axis = std::fabs(one.at[0] - two.at[0]) >= std::fabs(one.at[1] - two.at[1]) ? 0 : 1;
    PlannedTube& lower = one.at[axis] < two.at[axis] ? one : two;
    PlannedTube& upper = one.at[axis] < two.at[axis] ? two : one;
    const double share = lower.radius / (lower.radius + upper.radius);
    const double between = lower.at[axis] + share * (upper.at[axis] - lower.at[axis]);
    lower.high[axis] = std::min(lower.high[axis], between);
    upper.low[axis] = std::max(upper.low[axis], between);
}

double settled_low(const PlannedTube& tube, std::size_t axis, KeyLines& keys) {
    const double at = tube.at[axis];
    const double r = tube.radius;
    return keys.settle(std::max(tube.low[axis], at - usual_block * r),
                       std::max(tube.low[axis], at - largest_block * r), at - tube_rim * r);
}

double settled_high(const PlannedTube& tube, std::size_t axis, KeyLines& keys) {
    const double at = tube.at[axis];
    const double r = tube.radius;
    return keys.settle(std::min(tube.high[axis], at + usual_block * r), at + tube_rim * r,
                       std::min(tube.high[axis], at + largest_block * r));
}

KeyLines sheet_keys_x(const Panel& panel) {
    const double half = 0.5 * panel.patch.length;
    KeyLines keys(line_tolerance * std::max(panel.patch.length, panel.reflector.length));
    keys.add({-half, true});
    keys.add({half, true});
    if (const auto* tab = std::get_if<Tab>(&panel.feed)) {
        if (tab->notch_depth > 0.0) keys.add({-half + tab->notch_depth, true});
        keys.add({-half - tab->reach, false});
    }
    keys.add({panel.reflector.offset_x - 0.5 * panel.reflector.length, true});
    keys.add({panel.reflector.offset_x + 0.5 * panel.reflector.length, true});
    return keys;
}

/// For a symmetric panel only the lines with y >= 0.
KeyLines sheet_keys_y(const Panel& panel) {
    const bool symmetric = mirror_symmetric(panel);
    KeyLines keys(line_tolerance * std::max(panel.patch.width, panel.reflector.width));
    const auto add = [&](double at, bool free_edge) {
        keys.add({symmetric ? std::fabs(at) : at, free_edge});
    };
    const auto add_both = [&](double at, bool free_edge) {
        add(-at, free_edge);
        add(at, free_edge);
    };
    add_both(0.5 * panel.patch.width, true);
    if (const auto* tab = std::get_if<Tab>(&panel.feed)) {
        add_both(0.5 * tab->width, true);
        if (tab->notch_depth > 0.0) add_both(0.5 * tab->width + tab->notch_gap, true);
    }
    add(panel.reflector.offset_y - 0.5 * panel.reflector.width, true);
    add(panel.reflector.offset_y + 0.5 * panel.reflector.width, true);
    if (symmetric) keys.add({0.0, false});
    return keys;
}

/// Gives the mirror images of the tubes with y > 0 the mirrored blocks.
void mirror_blocks(std::vector<PlannedTube>& tubes) {
    for (PlannedTube& tube : tubes) {
        if (tube.at[1] >= 0.0) continue;
        const auto twin = std::find_if(tubes.begin(), tubes.end(), [&](const PlannedTube& other) {
            return other.at[0] == tube.at[0] && other.at[1] == -tube.at[1] && other.radius == tube.radius;
        });
        assert(twin != tubes.end());
        tube.low = {twin->low[0], -twin->high[1]};
        tube.high = {twin->high[0], -twin->low[1]};
    }
}

/// Settles the sides of all blocks and adds their lines to the keys.
void settle_blocks(std::vector<PlannedTube>& tubes, KeyLines& x, KeyLines& y, bool symmetric) {
    for (PlannedTube& tube : tubes) {
        if (symmetric && tube.at[1] < 0.0) continue;
        tube.low[0] = settled_low(tube, 0, x);
        tube.high[0] = settled_high(tube, 0, x);
        const bool in_the_middle = symmetric && tube.at[1] == 0.0;
        if (!in_the_middle) tube.low[1] = settled_low(tube, 1, y);
        tube.high[1] = settled_high(tube, 1, y);
        if (in_the_middle) tube.low[1] = -tube.high[1];
    }
    if (symmetric) mirror_blocks(tubes);
}

std::vector<double> mirrored(const std::vector<double>& upper) {
    std::vector<double> lines;
    lines.reserve(2 * upper.size());
    for (auto line = upper.rbegin(); line != upper.rend(); ++line) {
        if (*line != 0.0) lines.push_back(-*line);
    }
    lines.insert(lines.end(), upper.begin(), upper.end());
    return lines;
}

LineRange range(const std::vector<double>& lines, double from, double to) {
    return {nearest_line(lines, from), nearest_line(lines, to)};
}

std::vector<double> levels(double height, double cell_size) {
    // Two at least: the current at foot and head of a pin differs from that between them.
    const int cells = std::max(2, static_cast<int>(std::ceil(height / cell_size)));
    std::vector<double> z(static_cast<std::size_t>(cells) + 1);
    for (int n = 0; n <= cells; ++n) z[static_cast<std::size_t>(n)] = height * n / cells;
    return z;
}

TabLines tab_lines(const Layout& plan, const Panel& panel, const Tab& tab) {
    const double half = 0.5 * panel.patch.length;
    TabLines lines;
    lines.foot = nearest_line(plan.x, -half - tab.reach);
    lines.edge = plan.patch_x.from;
    lines.notch_end = lines.edge;
    lines.strip = range(plan.y, -0.5 * tab.width, 0.5 * tab.width);
    if (tab.notch_depth > 0.0) {
        const double side = 0.5 * tab.width + tab.notch_gap;
        lines.notch_end = nearest_line(plan.x, -half + tab.notch_depth);
        lines.lower_slit = {nearest_line(plan.y, -side), lines.strip.from};
        lines.upper_slit = {lines.strip.to, nearest_line(plan.y, side)};
    }
    return lines;
}

/// Sides of a tube's polygon: more than asked for where they would be longer than a cell.
int sides(const PlannedTube& tube, const MeshOptions& options) {
    const double half_round = std::numbers::pi * tube.radius / options.cell_size;
    return std::max(options.tube_sides, 2 * static_cast<int>(std::ceil(half_round)));
}

}  // namespace

double equal_corner_radius(double radius, int sides) {
    const double n = sides;
    const double side = radius * std::pow(2.0, 1.0 + 2.0 / n) * std::sqrt(std::numbers::pi) *
                        std::tgamma(0.5 + 1.0 / n) / std::tgamma(1.0 / n);
    return 0.5 * side / std::sin(std::numbers::pi / n);
}

Layout layout(const Panel& panel, const MeshOptions& options) {
    check(panel, options);
    Layout plan;
    plan.mirror_symmetric = mirror_symmetric(panel);

    std::vector<PlannedTube> tubes = planned_tubes(panel);
    for (PlannedTube& tube : tubes) {
        keep_on_sheets(tube, panel);
        if (const auto* tab = std::get_if<Tab>(&panel.feed)) keep_off_notch(tube, panel, *tab);
    }
    for (std::size_t two = 1; two < tubes.size(); ++two) {
        for (std::size_t one = 0; one < two; ++one) keep_apart(tubes[one], tubes[two]);
    }
    KeyLines x = sheet_keys_x(panel);
    KeyLines y = sheet_keys_y(panel);
    settle_blocks(tubes, x, y, plan.mirror_symmetric);

    const Grading grading = {options.cell_size,
                             options.edge_cell > 0.0 ? options.edge_cell : 0.25 * options.cell_size,
                             options.growth};
    plan.x = graded_lines(x.lines(), grading);
    plan.y = graded_lines(y.lines(), grading);
    if (plan.mirror_symmetric) plan.y = mirrored(plan.y);
    plan.z = levels(panel.spacer.height, options.cell_size);

    const Patch& patch = panel.patch;
    const Reflector& reflector = panel.reflector;
    plan.patch_x = range(plan.x, -0.5 * patch.length, 0.5 * patch.length);
    plan.patch_y = range(plan.y, -0.5 * patch.width, 0.5 * patch.width);
    plan.reflector_x = range(plan.x, reflector.offset_x - 0.5 * reflector.length,
                             reflector.offset_x + 0.5 * reflector.length);
    plan.reflector_y =
        range(plan.y, reflector.offset_y - 0.5 * reflector.width, reflector.offset_y + 0.5 * reflector.width);
    if (const auto* tab = std::get_if<Tab>(&panel.feed)) plan.tab = tab_lines(plan, panel, *tab);
    for (const PlannedTube& tube : tubes) {
        const int n = sides(tube, options);
        plan.tubes.push_back({tube.at[0], tube.at[1], equal_corner_radius(tube.radius, n), n, tube.part,
                              range(plan.x, tube.low[0], tube.high[0]),
                              range(plan.y, tube.low[1], tube.high[1])});
    }
    return plan;
}

}  // namespace panelwright::mesh
