#include "mesh/edges.hpp"

#include <algorithm>
#include <tuple>

namespace panelwright::mesh {
namespace {

struct HalfEdge {
    std::array<int, 2> ends;
    EdgeSide side;
};

std::vector<HalfEdge> half_edges(const SheetMesh& mesh) {
    std::vector<HalfEdge> halves;
    halves.reserve(3 * mesh.triangles.size());
    for (std::size_t t = 0; t < mesh.triangles.size(); ++t) {
        const auto& corner = mesh.triangles[t];
        for (std::size_t k = 0; k < 3; ++k) {
            const int from = corner[k];
            const int to = corner[(k + 1) % 3];
            halves.push_back({{std::min(from, to), std::max(from, to)}, {t, corner[(k + 2) % 3], from < to}});
        }
    }
    std::sort(halves.begin(), halves.end(), [](const HalfEdge& a, const HalfEdge& b) {
        return std::tie(a.ends, a.side.triangle) < std::tie(b.ends, b.side.triangle);
    });
    return halves;
}

}  // namespace

std::vector<MeshEdge> edges(const SheetMesh& mesh) {
    std::vector<MeshEdge> list;
    list.reserve(mesh.triangles.size() * 3 / 2);
    for (const HalfEdge& half : half_edges(mesh)) {
        if (list.empty() || list.back().ends != half.ends) list.push_back({half.ends, {}});
        list.back().sides.push_back(half.side);
    }
    return list;
}

}  // namespace panelwright::mesh
