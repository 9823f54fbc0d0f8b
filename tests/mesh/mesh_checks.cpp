#include "tests/mesh/mesh_checks.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <map>
#include <numbers>
#include <set>
#include <tuple>

#include "mesh/edges.hpp"
#include "mesh/layout.hpp"
#include "mesh/quality.hpp"
#include "tests/near.hpp"

namespace panelwright::test {
namespace {

using mesh::Panel;
using mesh::Part;
using mesh::SheetMesh;

std::size_t index(int n) {
    return static_cast<std::size_t>(n);
}

/// Areas in the order of the part numbers.
std::array<double, 4> expected_areas(const Panel& panel, const mesh::Layout& plan) {
    std::array<double, 4> area = {panel.reflector.length * panel.reflector.width,
                                  panel.patch.length * panel.patch.width, 0.0, 0.0};
    if (const auto* tab = std::get_if<mesh::Tab>(&panel.feed)) {
        if (tab->notch_depth > 0.0) area[1] -= 2.0 * tab->notch_depth * tab->notch_gap;
        area[2] += tab->width * (tab->reach + panel.spacer.height);
    }
    for (const mesh::Tube& tube : plan.tubes) {
        const double angle = 2.0 * std::numbers::pi / tube.sides;
        area[0] -= 0.5 * tube.sides * tube.radius * tube.radius * std::sin(angle);
        area[tube.part == Part::feed ? 2 : 3] +=
            tube.sides * 2.0 * tube.radius * std::sin(0.5 * angle) * panel.spacer.height;
    }
    return area;
}

void check_areas(std::vector<std::string>& list, const Panel& panel, const mesh::Layout& plan,
                 const SheetMesh& made) {
    std::array<double, 4> area = {0.0, 0.0, 0.0, 0.0};
    for (std::size_t t = 0; t < made.triangles.size(); ++t) {
        const Eigen::Vector3d vector = area_vector(made, t);
        area[static_cast<std::size_t>(made.part[t])] += vector.norm();
        const bool level = made.part[t] == Part::reflector || made.part[t] == Part::patch;
        if (level && vector.z() < 0.999 * vector.norm())
            list.push_back(fmt::format("triangle {} is not level", t));
    }
    const std::array<double, 4> expected = expected_areas(panel, plan);
    const double whole = expected[0] + expected[1];
    for (std::size_t part = 0; part < 4; ++part) {
        // Lines within 1e-9 of the panel's size are merged, which may move an area by that much of the whole.
        if (near(area[part], expected[part], 1e-11, 1e-8 * whole)) continue;
        list.push_back(fmt::format("area of part {} is {} instead of {}", part, area[part], expected[part]));
    }
}

/// Tubes point away from their axis, the tab's upright part towards -x.
void check_normals(std::vector<std::string>& list, const mesh::Layout& plan, const SheetMesh& made) {
    for (std::size_t t = 0; t < made.triangles.size(); ++t) {
        if (made.part[t] != Part::feed && made.part[t] != Part::post) continue;
        const Eigen::Vector3d normal = area_vector(made, t).normalized();
        const Eigen::Vector3d at = centroid(made, t);
        bool right = plan.tab && made.part[t] == Part::feed && (normal.z() > 0.999 || normal.x() < -0.999);
        for (const mesh::Tube& tube : plan.tubes) {
            const Eigen::Vector3d from_axis = at - Eigen::Vector3d(tube.x, tube.y, at.z());
            right = right || (tube.part == made.part[t] && from_axis.norm() < tube.radius &&
                              normal.dot(from_axis) > 0.0);
        }
        if (!right) list.push_back(fmt::format("triangle {} points the wrong way", t));
    }
}

int count_parts(const SheetMesh& made, const mesh::MeshEdge& edge, Part part) {
    return static_cast<int>(
        std::count_if(edge.sides.begin(), edge.sides.end(),
                      [&](const mesh::EdgeSide& side) { return made.part[side.triangle] == part; }));
}

/// Junctions are the heads of all tubes, and the foot of a tab that is not at the reflector's own edge.
void check_junctions(std::vector<std::string>& list, const mesh::Layout& plan, const SheetMesh& made) {
    std::size_t expected = 0;
    for (const mesh::Tube& tube : plan.tubes) expected += index(tube.sides);
    const bool tab_inside = plan.tab && plan.tab->foot > plan.reflector_x.from;
    if (tab_inside) expected += index(plan.tab->strip.cells());

    std::set<std::array<int, 2>> port;
    for (const auto& [a, b] : made.port_edges) port.insert({std::min(a, b), std::max(a, b)});
    std::size_t junctions = 0;
    for (const mesh::MeshEdge& edge : edges(made)) {
        if (edge.sides.size() > 3) list.push_back("more than three triangles at an edge");
        if (edge.sides.size() == 3) ++junctions;
        if (!port.contains(edge.ends)) continue;
        const bool sound = count_parts(made, edge, Part::feed) == 1 &&
                           count_parts(made, edge, Part::reflector) == (tab_inside ? 2 : 1);
        if (!sound) list.push_back("a port edge does not join feed and reflector");
    }
    if (junctions != expected)
        list.push_back(fmt::format("{} junction edges instead of {}", junctions, expected));
}

void check_port(std::vector<std::string>& list, const Panel& panel, const mesh::Layout& plan,
                const SheetMesh& made) {
    if (made.port_edges.empty()) return list.push_back("no port edges");
    for (std::size_t p = 1; p < made.port_edges.size(); ++p) {
        if (made.port_edges[p][0] != made.port_edges[p - 1][1])
            list.push_back("the port's edges are no chain");
    }
    const bool closed = made.port_edges.front()[0] == made.port_edges.back()[1];
    double turned = 0.0;  // round the pin's axis
    double width = 0.0;
    for (const auto& [a, b] : made.port_edges) {
        const Eigen::Vector3d& from = made.points[index(a)];
        const Eigen::Vector3d& to = made.points[index(b)];
        if (from.z() != 0.0) list.push_back("a port edge is not on the reflector");
        width += to.y() - from.y();
        if (plan.tab) continue;
        const double dx = plan.tubes[0].x;
        const double dy = plan.tubes[0].y;
        turned +=
            std::remainder(std::atan2(to.y() - dy, to.x() - dx) - std::atan2(from.y() - dy, from.x() - dx),
                           2.0 * std::numbers::pi);
    }
    if (const auto* tab = std::get_if<mesh::Tab>(&panel.feed)) {
        const double foot = -0.5 * panel.patch.length - tab->reach;
        // As for the areas: merged lines.
        const double merged = 1e-8 * (panel.reflector.length + panel.reflector.width);
        if (closed || !near(width, tab->width, 0.0, merged))
            list.push_back("the port is not as wide as the tab");
        for (const auto& [a, b] : made.port_edges) {
            const bool on_line = near(made.points[index(a)].x(), foot, 0.0, merged) &&
                                 near(made.points[index(b)].x(), foot, 0.0, merged);
            if (!on_line) list.push_back("a port edge is not on the tab's foot line");
        }
    } else if (!closed || !near(turned, 2.0 * std::numbers::pi, 1e-12)) {
        list.push_back("the port does not run once round the pin");
    }
}

void check_size(std::vector<std::string>& list, const Panel& panel, const mesh::MeshOptions& options,
                const SheetMesh& made) {
    const mesh::MeshSize size = predicted_size(panel, options);
    std::size_t inner = 0;
    for (const mesh::MeshEdge& edge : edges(made)) inner += edge.sides.size() - 1;
    if (size.points == made.points.size() && size.triangles == made.triangles.size() &&
        size.inner_edges == inner)
        return;
    list.push_back(fmt::format("predicted {} points, {} triangles, {} inner edges; made {}, {}, {}",
                               size.points, size.triangles, size.inner_edges, made.points.size(),
                               made.triangles.size(), inner));
}

}  // namespace

std::vector<std::string> misfits(const Panel& panel, const mesh::MeshOptions& options,
                                 const SheetMesh& made) {
    std::vector<std::string> list = defects(made);
    if (!list.empty()) return list;
    const mesh::Layout plan = layout(panel, options);
    check_areas(list, panel, plan, made);
    check_normals(list, plan, made);
    check_junctions(list, plan, made);
    check_port(list, panel, plan, made);
    check_size(list, panel, options, made);
    if (quality(made).components != 1) list.push_back("the mesh is not in one piece");
    return list;
}

bool own_mirror_image(const SheetMesh& made) {
    std::map<std::tuple<double, double, double>, int> number;
    for (std::size_t n = 0; n < made.points.size(); ++n) {
        const Eigen::Vector3d& p = made.points[n];
        number[{p.x(), p.y() + 0.0, p.z()}] = static_cast<int>(n);
    }
    // Corners in cyclic order from the lowest number: equal for equal triangles of equal orientation.
    const auto canonical = [](std::array<int, 3> corner) {
        std::rotate(corner.begin(), std::min_element(corner.begin(), corner.end()), corner.end());
        return corner;
    };
    std::set<std::pair<std::array<int, 3>, Part>> triangles;
    for (std::size_t t = 0; t < made.triangles.size(); ++t)
        triangles.insert({canonical(made.triangles[t]), made.part[t]});
    for (std::size_t t = 0; t < made.triangles.size(); ++t) {
        std::array<int, 3> image{};
        for (std::size_t k = 0; k < 3; ++k) {
            const Eigen::Vector3d& p = made.points[index(made.triangles[t][k])];
            const auto found = number.find({p.x(), -p.y() + 0.0, p.z()});
            if (found == number.end()) return false;
            image[2 - k] = found->second;
        }
        if (!triangles.contains({canonical(image), made.part[t]})) return false;
    }
    return true;
}

int triangles_without_partner(const Panel& panel, const SheetMesh& made) {
    using Corner = std::pair<double, double>;
    const auto seen_from_above = [&](std::size_t t) {
        std::array<Corner, 3> corner;
        for (std::size_t k = 0; k < 3; ++k) {
            const Eigen::Vector3d& p = made.points[index(made.triangles[t][k])];
            corner[k] = {p.x(), p.y()};
        }
        std::sort(corner.begin(), corner.end());
        return corner;
    };
    std::set<Corner> axes;
    if (const auto* pin = std::get_if<mesh::Probe>(&panel.feed)) axes.insert({pin->x, pin->y});
    for (const mesh::Post& post : panel.posts) axes.insert({post.x, post.y});
    const mesh::Reflector& plate = panel.reflector;
    const double slack = 1e-8 * (plate.length + plate.width);
    std::set<std::array<Corner, 3>> below;
    for (std::size_t t = 0; t < made.triangles.size(); ++t) {
        if (made.part[t] == Part::reflector) below.insert(seen_from_above(t));
    }
    int alone = 0;
    for (std::size_t t = 0; t < made.triangles.size(); ++t) {
        if (made.part[t] != Part::patch) continue;
        const auto corner = seen_from_above(t);
        const bool in_head =
            std::any_of(corner.begin(), corner.end(), [&](const Corner& c) { return axes.contains(c); });
        const bool over_plate = std::all_of(corner.begin(), corner.end(), [&](const Corner& c) {
            return std::fabs(c.first - plate.offset_x) <= 0.5 * plate.length + slack &&
                   std::fabs(c.second - plate.offset_y) <= 0.5 * plate.width + slack;
        });
        if (over_plate && !in_head && !below.contains(corner)) ++alone;
    }
    return alone;
}

}  // namespace panelwright::test
