/// Panels of all kinds that the mesh tests share.
#pragma once

#include <ostream>
#include <string>
#include <vector>

#include "mesh/panel.hpp"

namespace panelwright::test {

/// A panel under a name that may stand in a test's name.
struct NamedPanel {
    std::string name;
    mesh::Panel panel;
};

inline std::ostream& operator<<(std::ostream& out, const NamedPanel& named) {
    return out << named.name;
}

/// River gauge at 869.5 MHz, fed by a pin on the middle line.
inline mesh::Panel gauge_panel() {
    mesh::Panel panel;
    panel.patch = {.length = 0.147, .width = 0.165, .thickness = 0.0005};
    panel.spacer.height = 0.015;
    panel.feed = mesh::Probe{.x = -0.038, .y = 0.0, .diameter = 0.002};
    panel.reflector = {.length = 0.22, .width = 0.26};
    return panel;
}

/// Hill top at 869.5 MHz: tab feed and a post in the middle.
inline mesh::Panel hill_top_panel() {
    mesh::Panel panel = gauge_panel();
    panel.feed = mesh::Tab{.width = 0.005, .notch_depth = 0.008, .notch_gap = 0.001, .reach = 0.008};
    panel.posts = {{.x = 0.0, .y = 0.0, .diameter = 0.003}};
    return panel;
}

/// Dike watch at 3.4 GHz: pin off the middle line.
inline mesh::Panel dike_panel() {
    mesh::Panel panel;
    panel.patch = {.length = 0.038, .width = 0.044};
    panel.spacer.height = 0.004;
    panel.feed = mesh::Probe{.x = -0.009, .y = 0.0031, .diameter = 0.0013};
    panel.reflector = {.length = 0.09, .width = 0.09};
    return panel;
}

/// A probe panel with the given pin and posts.
inline mesh::Panel with_tubes(mesh::Probe pin, std::vector<mesh::Post> posts) {
    mesh::Panel panel = gauge_panel();
    panel.feed = pin;
    panel.posts = std::move(posts);
    return panel;
}

/// A tab panel with the given tab.
inline mesh::Panel with_tab(mesh::Tab tab) {
    mesh::Panel panel = hill_top_panel();
    panel.feed = tab;
    return panel;
}

/// A dozen panels, each with something awkward about it; all of them can be built.
inline std::vector<NamedPanel> assorted_panels() {
    std::vector<NamedPanel> list = {
        {"gauge", gauge_panel()}, {"hill_top", hill_top_panel()}, {"dike", dike_panel()}};

    mesh::Panel overhanging = dike_panel();
    overhanging.reflector = {.length = 0.034, .width = 0.036, .offset_x = 0.001, .offset_y = -0.002};
    list.push_back({"patch_overhanging", overhanging});

    mesh::Panel offset = hill_top_panel();
    offset.reflector = {.length = 0.21, .width = 0.2, .offset_x = -0.012, .offset_y = 0.017};
    list.push_back({"reflector_offset", offset});

    // The rim, 1.25 mm, just reaches the patch's edge at x = -73.5 mm and the reflector's at y = 60 mm.
    mesh::Panel at_the_edge = with_tubes({.x = -0.07225, .y = 0.05875, .diameter = 0.002}, {});
    at_the_edge.reflector = {.length = 0.22, .width = 0.16, .offset_y = -0.02};
    list.push_back({"pin_at_both_edges", at_the_edge});

    list.push_back({"posts_close_to_pin", with_tubes({.x = -0.03, .y = 0.0, .diameter = 0.002},
                                                     {{.x = -0.0275, .y = 0.0015, .diameter = 0.002},
                                                      {.x = -0.031, .y = -0.0045, .diameter = 0.003}})});
    list.push_back({"posts_in_pairs", with_tubes({.x = -0.03, .y = 0.0, .diameter = 0.002},
                                                 {{.x = 0.02, .y = 0.003, .diameter = 0.004},
                                                  {.x = -0.026, .y = -0.04, .diameter = 0.003},
                                                  {.x = 0.02, .y = -0.003, .diameter = 0.004},
                                                  {.x = -0.026, .y = 0.04, .diameter = 0.003}})});
    list.push_back({"fat_post", with_tubes({.x = -0.06, .y = 0.0, .diameter = 0.002},
                                           {{.x = 0.01, .y = 0.0, .diameter = 0.06}})});
    list.push_back(
        {"tab_without_reach", with_tab({.width = 0.005, .notch_depth = 0.02, .notch_gap = 0.002})});
    list.push_back({"tab_without_notch", with_tab({.width = 0.012, .reach = 0.004})});
    list.push_back({"bare_tab", with_tab({.width = 0.012})});

    mesh::Panel foot_at_edge =
        with_tab({.width = 0.006, .notch_depth = 0.01, .notch_gap = 0.001, .reach = 0.0365});
    foot_at_edge.posts = {{.x = -0.07, .y = 0.0065, .diameter = 0.003},
                          {.x = -0.0615, .y = 0.0, .diameter = 0.003}};
    list.push_back({"tab_foot_at_reflector_edge", foot_at_edge});
    return list;
}

}  // namespace panelwright::test
