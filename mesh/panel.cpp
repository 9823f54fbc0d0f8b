#include "mesh/panel.hpp"

namespace panelwright::mesh {

std::vector<PanelProblem> problems(const Panel& /*panel*/) { return {}; }

}  // namespace panelwright::mesh
