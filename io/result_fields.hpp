/// Which dataset holds which number of a result; the writer and the reader walk the same lists.
#pragma once

#include <array>
#include <string_view>

#include "mesh/panel.hpp"
#include "solver/figures.hpp"

namespace panelwright::io {

/// Calls `visit(path, number)` for every number of patch, spacer and reflector. `Panel` may be const.
template <typename Panel, typename Visit>
void visit_sheets(Panel& panel, Visit visit) {
    visit("/panel/patch/length_m", panel.patch.length);
    visit("/panel/patch/width_m", panel.patch.width);
    visit("/panel/patch/thickness_m", panel.patch.thickness);
    visit("/panel/patch/conductivity_s_per_m", panel.patch.conductivity);
    visit("/panel/spacer/height_m", panel.spacer.height);
    visit("/panel/spacer/permittivity", panel.spacer.permittivity);
    visit("/panel/spacer/loss_tangent", panel.spacer.loss_tangent);
    visit("/panel/reflector/length_m", panel.reflector.length);
    visit("/panel/reflector/width_m", panel.reflector.width);
    visit("/panel/reflector/offset_x_m", panel.reflector.offset_x);
    visit("/panel/reflector/offset_y_m", panel.reflector.offset_y);
    visit("/panel/reflector/conductivity_s_per_m", panel.reflector.conductivity);
}

/// Name of a feed in the file.
constexpr std::string_view feed_kind(const mesh::Probe& /*feed*/) {
    return "probe";
}
constexpr std::string_view feed_kind(const mesh::Tab& /*feed*/) {
    return "tab";
}

/// One number of every element of a list.
template <typename Owner>
struct Column {
    std::string_view path;
    double Owner::*value;
};

inline constexpr std::array<Column<mesh::Probe>, 3> probe_numbers{
    {{"/panel/feed/x_m", &mesh::Probe::x},
     {"/panel/feed/y_m", &mesh::Probe::y},
     {"/panel/feed/diameter_m", &mesh::Probe::diameter}}};

inline constexpr std::array<Column<mesh::Tab>, 4> tab_numbers{
    {{"/panel/feed/width_m", &mesh::Tab::width},
     {"/panel/feed/notch_depth_m", &mesh::Tab::notch_depth},
     {"/panel/feed/notch_gap_m", &mesh::Tab::notch_gap},
     {"/panel/feed/reach_m", &mesh::Tab::reach}}};

inline constexpr std::array<Column<mesh::Post>, 3> post_columns{
    {{"/panel/post/x_m", &mesh::Post::x},
     {"/panel/post/y_m", &mesh::Post::y},
     {"/panel/post/diameter_m", &mesh::Post::diameter}}};

inline constexpr std::array<Column<solver::Powers>, 5> power_columns{
    {{"/METHOD/power/accepted_w", &solver::Powers::accepted},
     {"/METHOD/power/radiated_w", &solver::Powers::radiated},
     {"/METHOD/power/conductor_w", &solver::Powers::conductor},
     {"/METHOD/power/dielectric_w", &solver::Powers::dielectric},
     {"/METHOD/power/surface_wave_w", &solver::Powers::surface_wave}}};

/// The numbers of a feed, by its kind.
constexpr const auto& numbers(const mesh::Probe& /*feed*/) {
    return probe_numbers;
}
constexpr const auto& numbers(const mesh::Tab& /*feed*/) {
    return tab_numbers;
}

}  // namespace panelwright::io
