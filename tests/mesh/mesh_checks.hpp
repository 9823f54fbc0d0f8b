/// What must hold for the mesh of any panel.
#pragma once

#include <string>
#include <vector>

#include "mesh/triangulate.hpp"

namespace panelwright::test {

/// Everything about the mesh that does not fit the panel, in words: defects, areas of the parts, orientation,
/// junctions, port, number of components, predicted size. Empty when all is well.
std::vector<std::string> misfits(const mesh::Panel& panel, const mesh::MeshOptions& options,
                                 const mesh::SheetMesh& made);

/// Is the mesh its own mirror image under y -> -y, to the last bit, with mirrored orientation?
bool own_mirror_image(const mesh::SheetMesh& made);

/// Triangles of the patch (other than the discs in tube heads) that lie over the reflector but face no
/// triangle of it.
int triangles_without_partner(const mesh::Panel& panel, const mesh::SheetMesh& made);

}  // namespace panelwright::test
