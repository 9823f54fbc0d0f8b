#include "mesh/layout.hpp"
#include "mesh/triangulate.hpp"

namespace panelwright::mesh {
namespace {

/// Counts of one sheet; signed, as cut-outs are taken off.
struct Count {
    long long points = 0;
    long long triangles = 0;

    Count& operator+=(const Count& other) {
        points += other.points;
        triangles += other.triangles;
        return *this;
    }
};

Count grid(long long along, long long across) {
    return {(along + 1) * (across + 1), 2 * along * across};
}

/// What a block and its ring change on a sheet.
Count ring_in_block(const Tube& tube) {
    const long long along = tube.block_x.cells();
    const long long across = tube.block_y.cells();
    return {tube.sides - (along - 1) * (across - 1), tube.sides + tube.block_points() - 2 * along * across};
}

/// What a slit takes off the patch: its sides and its end stay.
Count slit(long long along, long long across) {
    if (along == 0 || across == 0) return {};
    return {-along * (across - 1), -2 * along * across};
}

Count tab_beyond_edge(const TabLines& tab, long long levels) {
    const long long strip = tab.strip.cells();
    const long long along = tab.edge - tab.foot;
    // Points on the patch's edge and on the reflector are counted there.
    return {(strip + 1) * (along + levels - 1), 2 * strip * (along + levels)};
}

}  // namespace

MeshSize size(const Layout& plan) {
    const long long levels = static_cast<long long>(plan.z.size()) - 1;
    Count all = grid(plan.patch_x.cells(), plan.patch_y.cells());
    all += grid(plan.reflector_x.cells(), plan.reflector_y.cells());
    // Euler characteristic: two discs; a foot makes a hole in the reflector, and a tube between the sheets
    // adds 0 and shares circles, which have 0; the upright part of a tab is a disc that shares two lines, 1
    // - 2.
    long long euler = 2 - static_cast<long long>(plan.tubes.size());
    if (plan.tab) {
        const long long depth = plan.tab->notch_end - plan.tab->edge;
        all += slit(depth, plan.tab->lower_slit.cells());
        all += slit(depth, plan.tab->upper_slit.cells());
        all += tab_beyond_edge(*plan.tab, levels);
        euler -= 1;
    }
    for (const Tube& tube : plan.tubes) {
        all += ring_in_block(tube);
        all += ring_in_block(tube);
        all += {1, tube.sides};  // the disc in its head
        all += {tube.sides * (levels - 1), 2 * tube.sides * levels};
    }
    const long long edges = all.points + all.triangles - euler;
    return {static_cast<std::size_t>(all.points), static_cast<std::size_t>(all.triangles),
            static_cast<std::size_t>(3 * all.triangles - edges)};
}

MeshSize predicted_size(const Panel& panel, const MeshOptions& options) {
    return size(layout(panel, options));
}

}  // namespace panelwright::mesh
