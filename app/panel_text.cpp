#include "app/panel_text.hpp"

#include <fmt/format.h>

#include <nlohmann/json.hpp>

#include <cmath>

#include "io/quantity.hpp"

namespace panelwright::app {
namespace {

using Json = nlohmann::ordered_json;

std::string mm(double length) {
    return io::rounded(1e3 * length) + " mm";
}

std::string metal(double conductivity) {
    return std::isinf(conductivity) ? std::string("perfect metal")
                                    : fmt::format("metal of {:g} S/m", conductivity);
}

std::string text(const mesh::Probe& probe) {
    return fmt::format("probe at x = {}, y = {}, diameter {}", mm(probe.x), mm(probe.y), mm(probe.diameter));
}

std::string text(const mesh::Tab& tab) {
    std::string words = fmt::format("tab {} wide, bent down {} past the edge", mm(tab.width), mm(tab.reach));
    if (tab.notch_depth > 0.0)
        words += fmt::format(", notch {} deep, gap {}", mm(tab.notch_depth), mm(tab.notch_gap));
    return words;
}

Json json(const mesh::Probe& probe) {
    return {{"kind", "probe"}, {"x_m", probe.x}, {"y_m", probe.y}, {"diameter_m", probe.diameter}};
}

Json json(const mesh::Tab& tab) {
    return {{"kind", "tab"},
            {"width_m", tab.width},
            {"notch_depth_m", tab.notch_depth},
            {"notch_gap_m", tab.notch_gap},
            {"reach_m", tab.reach}};
}

Json json_metal(double conductivity) {
    return std::isinf(conductivity) ? Json("perfect") : Json(conductivity);
}

}  // namespace

std::string panel_text(const mesh::Panel& panel) {
    const auto line = [](std::string_view part, const std::string& words) {
        return fmt::format("  {:<12}{}\n", part, words);
    };
    std::string patch = fmt::format("{} x {}, {}", mm(panel.patch.length), mm(panel.patch.width),
                                    metal(panel.patch.conductivity));
    if (panel.patch.thickness > 0.0) patch += fmt::format(", {} thick", mm(panel.patch.thickness));
    std::string spacer = mm(panel.spacer.height);
    if (panel.spacer.permittivity > 1.0 || panel.spacer.loss_tangent > 0.0) {
        spacer += fmt::format(", permittivity {:g}, loss tangent {:g}", panel.spacer.permittivity,
                              panel.spacer.loss_tangent);
    } else {
        spacer += " of air";
    }
    std::string reflector = fmt::format("{} x {}, {}", mm(panel.reflector.length), mm(panel.reflector.width),
                                        metal(panel.reflector.conductivity));
    if (panel.reflector.offset_x != 0.0 || panel.reflector.offset_y != 0.0) {
        reflector += fmt::format(", centre at x = {}, y = {}", mm(panel.reflector.offset_x),
                                 mm(panel.reflector.offset_y));
    }
    std::string all = line("patch", patch) + line("spacer", spacer) +
                      line("feed", std::visit([](const auto& feed) { return text(feed); }, panel.feed)) +
                      line("reflector", reflector);
    for (const mesh::Post& post : panel.posts) {
        all += line("post",
                    fmt::format("at x = {}, y = {}, diameter {}", mm(post.x), mm(post.y), mm(post.diameter)));
    }
    return all;
}

Json panel_json(const mesh::Panel& panel) {
    Json posts = Json::array();
    for (const mesh::Post& post : panel.posts) {
        posts.push_back({{"x_m", post.x}, {"y_m", post.y}, {"diameter_m", post.diameter}});
    }
    return {{"patch",
             {{"length_m", panel.patch.length},
              {"width_m", panel.patch.width},
              {"thickness_m", panel.patch.thickness},
              {"conductivity_s_per_m", json_metal(panel.patch.conductivity)}}},
            {"spacer",
             {{"height_m", panel.spacer.height},
              {"permittivity", panel.spacer.permittivity},
              {"loss_tangent", panel.spacer.loss_tangent}}},
            {"feed", std::visit([](const auto& feed) { return json(feed); }, panel.feed)},
            {"reflector",
             {{"length_m", panel.reflector.length},
              {"width_m", panel.reflector.width},
              {"offset_x_m", panel.reflector.offset_x},
              {"offset_y_m", panel.reflector.offset_y},
              {"conductivity_s_per_m", json_metal(panel.reflector.conductivity)}}},
            {"posts", std::move(posts)}};
}

}  // namespace panelwright::app
