#include "mesh/triangulate.hpp"

#include <fmt/format.h>

#include <array>
#include <cassert>
#include <cstddef>
#include <stdexcept>
#include <utility>
#include <vector>

#include "mesh/layout.hpp"
#include "mesh/ring.hpp"

namespace panelwright::mesh {
namespace {

std::size_t index(int n) {
    return static_cast<std::size_t>(n);
}

/// The mesh under construction: grows sheet by sheet, each sharing the points of those before it.
class Triangulation {
  public:
    Triangulation(const Layout& plan, const MeshSize& size)
        : plan_(plan), reflector_(grid_points(), -1), patch_(grid_points(), -1), blocked_(grid_points(), 0) {
        mesh_.points.reserve(size.points);
        mesh_.triangles.reserve(size.triangles);
        mesh_.part.reserve(size.triangles);
        for (const Tube& tube : plan.tubes) {
            for (int i = tube.block_x.from; i < tube.block_x.to; ++i) {
                for (int j = tube.block_y.from; j < tube.block_y.to; ++j) blocked_[place(i, j)] = 1;
            }
        }
    }

    SheetMesh build() && {
        add_reflector();
        add_patch();
        if (plan_.tab) add_tab(*plan_.tab);
        for (const Tube& tube : plan_.tubes) add_tube(tube);
        return std::move(mesh_);
    }

  private:
    /// Numbers of a sheet's points by grid place; -1 where none is made yet.
    using SheetPoints = std::vector<int>;

    std::size_t grid_points() const { return plan_.x.size() * plan_.y.size(); }
    std::size_t place(int i, int j) const { return index(i) * plan_.y.size() + index(j); }

    int add_point(double x, double y, double z) {
        mesh_.points.emplace_back(x, y, z);
        return static_cast<int>(mesh_.points.size()) - 1;
    }

    int point(SheetPoints& sheet, int i, int j) {
        int& number = sheet[place(i, j)];
        if (number < 0) number = add_point(plan_.x[index(i)], plan_.y[index(j)], height(sheet));
        return number;
    }

    double height(const SheetPoints& sheet) const {
        return &sheet == &patch_ ? plan_.z.back() : plan_.z.front();
    }

    void add_triangle(int a, int b, int c, Part part) {
        mesh_.triangles.push_back({a, b, c});
        mesh_.part.push_back(part);
    }

    /// Corners counter-clockwise; the diagonal runs from the first to the third.
    void add_split(const std::array<int, 4>& corner, Part part) {
        add_triangle(corner[0], corner[1], corner[2], part);
        add_triangle(corner[0], corner[2], corner[3], part);
    }

    /// A cell of a sheet, with the diagonal towards the corner of its quadrant: at the corners of the sheets
    /// no triangle then has two free edges, which would leave its current a single degree of freedom.
    void add_cell(SheetPoints& sheet, int i, int j, Part part) {
        const int a = point(sheet, i, j);
        const int b = point(sheet, i + 1, j);
        const int c = point(sheet, i + 1, j + 1);
        const int d = point(sheet, i, j + 1);
        const bool right = plan_.x[index(i)] + plan_.x[index(i + 1)] >= 0.0;
        const bool upper = plan_.y[index(j)] + plan_.y[index(j + 1)] >= 0.0;
        if (right == upper) {
            add_split({a, b, c, d}, part);
        } else {
            add_split({b, c, d, a}, part);
        }
    }

    void add_reflector() {
        for (int i = plan_.reflector_x.from; i < plan_.reflector_x.to; ++i) {
            for (int j = plan_.reflector_y.from; j < plan_.reflector_y.to; ++j) {
                if (blocked_[place(i, j)] == 0) add_cell(reflector_, i, j, Part::reflector);
            }
        }
    }

    bool in_slit(int i, int j) const {
        if (!plan_.tab || i >= plan_.tab->notch_end) return false;
        return plan_.tab->lower_slit.holds(j) || plan_.tab->upper_slit.holds(j);
    }

    void add_patch() {
        for (int i = plan_.patch_x.from; i < plan_.patch_x.to; ++i) {
            for (int j = plan_.patch_y.from; j < plan_.patch_y.to; ++j) {
                if (blocked_[place(i, j)] == 0 && !in_slit(i, j)) add_cell(patch_, i, j, Part::patch);
            }
        }
    }

    void add_tab(const TabLines& tab) {
        for (int i = tab.foot; i < tab.edge; ++i) {
            for (int j = tab.strip.from; j < tab.strip.to; ++j) add_cell(patch_, i, j, Part::feed);
        }
        const std::size_t top = plan_.z.size() - 1;
        std::vector<std::vector<int>> rows(top + 1);
        for (int j = tab.strip.from; j <= tab.strip.to; ++j) {
            for (std::size_t n = 0; n <= top; ++n) {
                const bool on_sheet = n == 0 || n == top;
                rows[n].push_back(on_sheet
                                      ? point(n == 0 ? reflector_ : patch_, tab.foot, j)
                                      : add_point(plan_.x[index(tab.foot)], plan_.y[index(j)], plan_.z[n]));
            }
        }
        for (std::size_t n = 0; n < top; ++n) {
            for (std::size_t m = 0; m + 1 < rows[n].size(); ++m) {
                const int j = tab.strip.from + static_cast<int>(m);
                add_upright({rows[n][m], rows[n + 1][m], rows[n + 1][m + 1], rows[n][m + 1]}, j);
            }
        }
        for (std::size_t m = 0; m + 1 < rows[0].size(); ++m)
            mesh_.port_edges.push_back({rows[0][m], rows[0][m + 1]});
    }

    /// A cell of the tab's upright part between the y lines j and j + 1.
    void add_upright(const std::array<int, 4>& corner, int j) {
        const bool upper = plan_.y[index(j)] + plan_.y[index(j + 1)] >= 0.0;
        if (upper) {
            add_split(corner, Part::feed);
        } else {
            add_split({corner[3], corner[0], corner[1], corner[2]}, Part::feed);
        }
    }

    void add_ring(SheetPoints& sheet, const Ring& ring, const std::vector<int>& polygon, Part part) {
        const int sides = static_cast<int>(polygon.size());
        const auto number = [&](int n) {
            if (n < sides) return polygon[index(n)];
            const auto [i, j] = ring.outer[index(n - sides)];
            return point(sheet, i, j);
        };
        for (const auto& [a, b, c] : ring.triangles) add_triangle(number(a), number(b), number(c), part);
    }

    void add_tube(const Tube& tube) {
        const auto polygon = corners(tube);
        std::vector<std::vector<int>> rows;
        for (const double z : plan_.z) {
            rows.emplace_back();
            for (const Eigen::Vector2d& corner : polygon)
                rows.back().push_back(add_point(corner.x(), corner.y(), z));
        }
        const Ring around = ring(plan_, tube);
        add_ring(reflector_, around, rows.front(), Part::reflector);
        add_ring(patch_, around, rows.back(), Part::patch);
        add_head(tube, rows.back());
        for (std::size_t n = 0; n + 1 < rows.size(); ++n) add_belt(rows[n], rows[n + 1], tube.part);
        if (tube.part != Part::feed) return;
        for (std::size_t k = 0; k < polygon.size(); ++k) {
            mesh_.port_edges.push_back({rows.front()[k], rows.front()[(k + 1) % polygon.size()]});
        }
    }

    /// The disc of patch metal over the end of a tube.
    void add_head(const Tube& tube, const std::vector<int>& polygon) {
        const int centre = add_point(tube.x, tube.y, plan_.z.back());
        for (std::size_t k = 0; k < polygon.size(); ++k) {
            add_triangle(polygon[k], polygon[(k + 1) % polygon.size()], centre, Part::patch);
        }
    }

    /// The faces of a tube between two levels; those below its axis are mirror images of those above.
    void add_belt(const std::vector<int>& low, const std::vector<int>& high, Part part) {
        const std::size_t sides = low.size();
        for (std::size_t k = 0; k < sides; ++k) {
            const std::size_t next = (k + 1) % sides;
            if (2 * k < sides) {
                add_split({low[k], low[next], high[next], high[k]}, part);
            } else {
                add_split({low[next], high[next], high[k], low[k]}, part);
            }
        }
    }

    const Layout& plan_;
    SheetPoints reflector_;
    SheetPoints patch_;
    std::vector<char> blocked_;  ///< cells that belong to the block of a tube
    SheetMesh mesh_;
};

}  // namespace

SheetMesh triangulate(const Panel& panel, const MeshOptions& options) {
    const Layout plan = layout(panel, options);
    const MeshSize predicted = size(plan);
    if (predicted.triangles > most_triangles) {
        throw std::invalid_argument(
            fmt::format("MeshOptions::cell_size: {} triangles are more than the largest mesh, {}",
                        predicted.triangles, most_triangles));
    }
    SheetMesh mesh = Triangulation(plan, predicted).build();
    assert(mesh.points.size() == predicted.points && mesh.triangles.size() == predicted.triangles);
    return mesh;
}

}  // namespace panelwright::mesh
