#include "mesh/edges.hpp"

#include <algorithm>
#include <cstdint>

namespace panelwright::mesh {
namespace {

struct HalfEdge {
    std::uint64_t ends;  ///< the lower number above the higher one: one comparison instead of two
    EdgeSide side;
};

std::uint64_t packed(int from, int to) {
    const auto low = static_cast<std::uint32_t>(std::min(from, to));
    const auto high = static_cast<std::uint32_t>(std::max(from, to));
    return (std::uint64_t{low} << 32U) | high;
}

std::vector<HalfEdge> half_edges(const SheetMesh& mesh) {
    std::vector<HalfEdge> halves;
    halves.reserve(3 * mesh.triangles.size());
    for (std::size_t t = 0; t < mesh.triangles.size(); ++t) {
        const auto& [a, b, c] = mesh.triangles[t];
        halves.push_back({packed(a, b), {t, c, a < b}});
        halves.push_back({packed(b, c), {t, a, b < c}});
        halves.push_back({packed(c, a), {t, b, c < a}});
    }
    std::sort(halves.begin(), halves.end(), [](const HalfEdge& a, const HalfEdge& b) {
        return a.ends != b.ends ? a.ends < b.ends : a.side.triangle < b.side.triangle;
    });
    return halves;
}

}  // namespace

std::vector<MeshEdge> edges(const SheetMesh& mesh) {
    std::vector<MeshEdge> list;
    list.reserve(mesh.triangles.size() * 3 / 2);
    std::uint64_t current = 0;
    for (const HalfEdge& half : half_edges(mesh)) {
        if (list.empty() || current != half.ends) {
            current = half.ends;
            list.push_back({{static_cast<int>(current >> 32U), static_cast<int>(current & 0xffffffffU)}, {}});
        }
        list.back().sides.push_back(half.side);
    }
    return list;
}

}  // namespace panelwright::mesh
