/// A panel in words and numbers, for a person and for a script.
#pragma once

#include <nlohmann/json_fwd.hpp>
#include <string>

#include "mesh/panel.hpp"

namespace panelwright::app {

/// One line a part: "  reflector   220 mm x 260 mm, perfect metal".
std::string panel_text(const mesh::Panel& panel);

/// The same content in metres; an infinite conductivity is the word "perfect".
nlohmann::ordered_json panel_json(const mesh::Panel& panel);

}  // namespace panelwright::app
