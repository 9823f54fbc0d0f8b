#include "mesh/panel.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <initializer_list>
#include <set>
#include <string_view>
#include <utility>

namespace panelwright::mesh {
namespace {

/// Rounding of unit conversion that is forgiven, over the side concerned.
constexpr double rounding = 1e-10;

/// Adding zero turns -0 into 0.
std::string mm(double metres) {
    return fmt::format("{:.5g} mm", 1e3 * metres + 0.0);
}

/// The problems so far, and the fields that are wrong by themselves.
class Findings {
  public:
    /// A field that is wrong by itself.
    void unusable(std::string key, std::string message) {
        unusable_.insert(key);
        list_.push_back({std::move(key), {}, std::move(message)});
    }

    /// Two fields that do not go together.
    void clash(std::string_view key, std::string_view other_key, std::string message) {
        list_.push_back({std::string(key), std::string(other_key), std::move(message)});
    }

    /// Can all of these fields be compared with others?
    bool usable(std::initializer_list<std::string_view> keys) const {
        return std::none_of(keys.begin(), keys.end(),
                            [this](std::string_view key) { return unusable_.contains(key); });
    }

    std::vector<PanelProblem> list() && { return std::move(list_); }

  private:
    std::vector<PanelProblem> list_;
    std::set<std::string, std::less<>> unusable_;
};

void finite(Findings& found, const std::string& key, double value) {
    if (!std::isfinite(value)) found.unusable(key, fmt::format("{} is not a finite number", key));
}

void positive_length(Findings& found, const std::string& key, double value) {
    if (std::isfinite(value) && value < smallest_length) {
        found.unusable(key, fmt::format("{} is {}; it must be positive, at least {}", key, mm(value),
                                        mm(smallest_length)));
    } else {
        finite(found, key, value);
    }
}

void length_or_zero(Findings& found, const std::string& key, double value) {
    if (std::isfinite(value) && value < 0.0) {
        found.unusable(key, fmt::format("{} is {}; it must not be negative", key, mm(value)));
    } else {
        finite(found, key, value);
    }
}

void number_within(Findings& found, const std::string& key, double value, std::pair<double, double> limits) {
    if (std::isfinite(value) && (value < limits.first || value > limits.second)) {
        found.unusable(key, fmt::format("{} is {:.5g}; it must lie between {:g} and {:g}", key, value,
                                        limits.first, limits.second));
    } else {
        finite(found, key, value);
    }
}

void conductivity(Findings& found, const std::string& key, double value) {
    if (!(value > 0.0)) {
        found.unusable(
            key, fmt::format("{} is {:.5g} S/m; it must be positive (a perfect metal has an infinite one)",
                             key, value));
    }
}

/// A pin or post under its names.
struct RoundPart {
    std::string name;                ///< "the pin", "post 1"
    std::array<std::string, 2> key;  ///< of x and y
    std::string diameter_key;
    std::array<double, 2> at;  ///< axis [m]
    double diameter;           ///< [m]

    double rim() const { return tube_rim * 0.5 * diameter; }
};

/// What the panel measures along x (0) or y (1).
struct Direction {
    std::size_t axis;
    std::string_view patch_key, reflector_key, offset_key;
    double patch, reflector, offset;  ///< [m]

    double reflector_from() const { return offset - 0.5 * reflector; }
    double reflector_to() const { return offset + 0.5 * reflector; }
    double forgiven() const { return rounding * std::max(patch, reflector); }
};

std::array<Direction, 2> directions(const Panel& panel) {
    const Patch& patch = panel.patch;
    const Reflector& reflector = panel.reflector;
    return {{{0, "patch.length", "reflector.length", "reflector.offset_x", patch.length, reflector.length,
              reflector.offset_x},
             {1, "patch.width", "reflector.width", "reflector.offset_y", patch.width, reflector.width,
              reflector.offset_y}}};
}

/// The pin, if there is one, then the posts.
std::vector<RoundPart> round_parts(const Panel& panel) {
    std::vector<RoundPart> parts;
    if (const auto* pin = std::get_if<Probe>(&panel.feed)) {
        parts.push_back({"the pin", {"feed.x", "feed.y"}, "feed.diameter", {pin->x, pin->y}, pin->diameter});
    }
    for (std::size_t n = 0; n < panel.posts.size(); ++n) {
        const Post& post = panel.posts[n];
        const std::string key = fmt::format("post[{}]", n + 1);
        parts.push_back({fmt::format("post {}", n + 1),
                         {key + ".x", key + ".y"},
                         key + ".diameter",
                         {post.x, post.y},
                         post.diameter});
    }
    return parts;
}

void check_fields(Findings& found, const Panel& panel, const std::vector<RoundPart>& parts) {
    positive_length(found, "patch.length", panel.patch.length);
    positive_length(found, "patch.width", panel.patch.width);
    length_or_zero(found, "patch.thickness", panel.patch.thickness);
    conductivity(found, "patch.conductivity", panel.patch.conductivity);
    positive_length(found, "spacer.height", panel.spacer.height);
    number_within(found, "spacer.permittivity", panel.spacer.permittivity, {1.0, 100.0});
    number_within(found, "spacer.loss_tangent", panel.spacer.loss_tangent, {0.0, 1.0});
    if (const auto* tab = std::get_if<Tab>(&panel.feed)) {
        positive_length(found, "feed.width", tab->width);
        length_or_zero(found, "feed.notch_depth", tab->notch_depth);
        length_or_zero(found, "feed.notch_gap", tab->notch_gap);
        length_or_zero(found, "feed.reach", tab->reach);
    }
    positive_length(found, "reflector.length", panel.reflector.length);
    positive_length(found, "reflector.width", panel.reflector.width);
    finite(found, "reflector.offset_x", panel.reflector.offset_x);
    finite(found, "reflector.offset_y", panel.reflector.offset_y);
    conductivity(found, "reflector.conductivity", panel.reflector.conductivity);
    for (const RoundPart& part : parts) {
        finite(found, part.key[0], part.at[0]);
        finite(found, part.key[1], part.at[1]);
        positive_length(found, part.diameter_key, part.diameter);
    }
}

void check_thickness(Findings& found, const Panel& panel) {
    if (!found.usable({"patch.thickness", "spacer.height"})) return;
    if (panel.patch.thickness < panel.spacer.height) return;
    found.clash("patch.thickness", "spacer.height",
                fmt::format("patch.thickness is {}; it must be less than spacer.height, {}",
                            mm(panel.patch.thickness), mm(panel.spacer.height)));
}

void check_overhang(Findings& found, const Direction& d) {
    if (!found.usable({d.patch_key, d.reflector_key, d.offset_key})) return;
    const double overhang = std::max(0.5 * d.patch - d.reflector_to(), d.reflector_from() + 0.5 * d.patch);
    const double allowed = largest_overhang * d.patch;
    if (overhang <= allowed + d.forgiven()) return;
    const std::string fault =
        fmt::format("the patch reaches {} past the reflector; at most {} is allowed, a quarter of {}",
                    mm(overhang), mm(allowed), d.patch_key);
    const bool fits_in_the_middle = 0.5 * (d.patch - d.reflector) <= allowed;
    if (fits_in_the_middle) {
        found.clash(d.offset_key, d.reflector_key,
                    fmt::format("{} is {} and {} is {}: {}", d.offset_key, mm(d.offset), d.reflector_key,
                                mm(d.reflector), fault));
    } else {
        found.clash(d.reflector_key, d.patch_key,
                    fmt::format("{} is {}: {}", d.reflector_key, mm(d.reflector), fault));
    }
}

void not_within(Findings& found, const RoundPart& part, std::size_t axis, std::string_view other_key,
                std::string_view sheet, std::pair<double, double> limits) {
    found.clash(part.key[axis], other_key,
                fmt::format("{} is {}: {} ({} {}) with its rim must lie on the {} ({}); allowed is {} to {}",
                            part.key[axis], mm(part.at[axis]), part.name, part.diameter_key,
                            mm(part.diameter), sheet, other_key, mm(limits.first), mm(limits.second)));
}

void too_fat(Findings& found, const RoundPart& part, std::string_view other_key, double side) {
    found.clash(part.diameter_key, other_key,
                fmt::format("{} is {}; with {} {} it must be less than {}", part.diameter_key,
                            mm(part.diameter), other_key, mm(side), mm(side / tube_rim)));
}

/// Pin or post against the patch's shorter side.
void check_diameter(Findings& found, const RoundPart& part, const Patch& patch) {
    if (!found.usable({"patch.length", "patch.width", part.diameter_key})) return;
    if (2.0 * part.rim() < std::min(patch.length, patch.width)) return;
    if (patch.length < patch.width) {
        too_fat(found, part, "patch.length", patch.length);
    } else {
        too_fat(found, part, "patch.width", patch.width);
    }
}

/// Pin or post on the patch and, where that holds, on the reflector.
void check_on_sheets(Findings& found, const RoundPart& part, const Direction& d) {
    if (!found.usable({d.patch_key, part.key[d.axis], part.diameter_key})) return;
    const double at = part.at[d.axis];
    const double half = 0.5 * d.patch - part.rim();
    if (half <= 0.0) return;  // said already
    if (std::fabs(at) > half + d.forgiven()) {
        return not_within(found, part, d.axis, d.patch_key, "patch", {-half, half});
    }
    if (!found.usable({d.reflector_key, d.offset_key})) return;
    const double from = d.reflector_from() + part.rim();
    const double to = d.reflector_to() - part.rim();
    if (from >= to) return too_fat(found, part, d.reflector_key, d.reflector);
    if (at < from - d.forgiven() || at > to + d.forgiven()) {
        not_within(found, part, d.axis, d.reflector_key, "reflector", {from, to});
    }
}

void check_apart(Findings& found, const RoundPart& one, const RoundPart& two) {
    if (!found.usable({one.key[0], one.key[1], one.diameter_key, two.key[0], two.key[1], two.diameter_key}))
        return;
    const double dx = std::fabs(one.at[0] - two.at[0]);
    const double dy = std::fabs(one.at[1] - two.at[1]);
    const double needed = one.rim() + two.rim();
    if (std::max(dx, dy) >= needed * (1.0 - rounding)) return;
    const std::size_t axis = dx >= dy ? 0 : 1;
    found.clash(
        two.key[axis], one.key[axis],
        fmt::format(
            "{} is {} and {} is {}: {} and {} are {} apart in x and {} in y; one of the two distances "
            "must be at least {}",
            two.key[axis], mm(two.at[axis]), one.key[axis], mm(one.at[axis]), two.name, one.name, mm(dx),
            mm(dy), mm(needed)));
}

void check_notch(Findings& found, const Panel& panel, const Tab& tab) {
    const Patch& patch = panel.patch;
    if (found.usable({"feed.notch_depth", "patch.length"}) &&
        tab.notch_depth > deepest_notch * patch.length * (1.0 + rounding)) {
        found.clash("feed.notch_depth", "patch.length",
                    fmt::format("feed.notch_depth is {}; with patch.length {} it may be at most {}",
                                mm(tab.notch_depth), mm(patch.length), mm(deepest_notch * patch.length)));
    }
    const bool notched = found.usable({"feed.notch_depth"}) && tab.notch_depth > 0.0;
    if (notched && tab.notch_depth < smallest_length) {
        found.unusable("feed.notch_depth", fmt::format("feed.notch_depth is {}; it must be 0 or at least {}",
                                                       mm(tab.notch_depth), mm(smallest_length)));
        return;
    }
    if (notched && found.usable({"feed.notch_gap"}) && tab.notch_gap < smallest_length) {
        found.unusable(
            "feed.notch_gap",
            fmt::format("feed.notch_gap is {}; with feed.notch_depth {} it must be positive, at least {}",
                        mm(tab.notch_gap), mm(tab.notch_depth), mm(smallest_length)));
    }
    if (!found.usable({"feed.width", "feed.notch_gap", "patch.width"})) return;
    const double across = tab.width + (notched ? 2.0 * tab.notch_gap : 0.0);
    if (across <= widest_notch * patch.width * (1.0 + rounding)) return;
    found.clash("feed.width", "patch.width",
                fmt::format("feed.width is {}: tab and slits are {} wide together; with patch.width {} they "
                            "may be at most {}",
                            mm(tab.width), mm(across), mm(patch.width), mm(widest_notch * patch.width)));
}

void check_tab_foot(Findings& found, const Panel& panel, const Tab& tab) {
    const auto [x, y] = directions(panel);
    if (found.usable({"feed.reach", x.patch_key, x.reflector_key, x.offset_key})) {
        const double foot = -0.5 * panel.patch.length - tab.reach;
        if (foot < x.reflector_from() - x.forgiven() || foot > x.reflector_to() + x.forgiven()) {
            found.clash(
                "feed.reach", x.reflector_key,
                fmt::format(
                    "feed.reach is {}: the tab's foot at x = {} must lie on the reflector ({}), which "
                    "goes from {} to {}",
                    mm(tab.reach), mm(foot), x.reflector_key, mm(x.reflector_from()), mm(x.reflector_to())));
        }
    }
    if (found.usable({"feed.width", y.reflector_key, y.offset_key})) {
        const double half = 0.5 * tab.width;
        if (-half < y.reflector_from() - y.forgiven() || half > y.reflector_to() + y.forgiven()) {
            found.clash(
                "feed.width", y.reflector_key,
                fmt::format(
                    "feed.width is {}: the tab's foot must lie on the reflector ({}), which goes from "
                    "y = {} to {}",
                    mm(tab.width), y.reflector_key, mm(y.reflector_from()), mm(y.reflector_to())));
        }
    }
}

void check_clear_of_notch(Findings& found, const Panel& panel, const Tab& tab, const RoundPart& post) {
    if (!found.usable({"feed.width", "feed.notch_depth", "feed.notch_gap", "patch.length", post.key[0],
                       post.key[1], post.diameter_key}) ||
        tab.notch_depth <= 0.0) {
        return;
    }
    if (tab.notch_depth > deepest_notch * panel.patch.length * (1.0 + rounding)) return;  // said already
    const double notch_end = -0.5 * panel.patch.length + tab.notch_depth;
    const double notch_side = 0.5 * tab.width + tab.notch_gap;
    const double clear =
        std::max(post.at[0] - post.rim() - notch_end, std::fabs(post.at[1]) - post.rim() - notch_side);
    if (clear >= -rounding * panel.patch.length) return;
    found.clash(
        post.key[0], "feed.notch_depth",
        fmt::format(
            "{} is {}: {} ({} {}) with its rim must be clear of the notch (feed.notch_depth {}), which "
            "takes up x below {} and y from {} to {}",
            post.key[0], mm(post.at[0]), post.name, post.diameter_key, mm(post.diameter), mm(tab.notch_depth),
            mm(notch_end), mm(-notch_side), mm(notch_side)));
}

}  // namespace

std::vector<PanelProblem> problems(const Panel& panel) {
    Findings found;
    const std::vector<RoundPart> parts = round_parts(panel);
    check_fields(found, panel, parts);
    check_thickness(found, panel);
    for (const RoundPart& part : parts) check_diameter(found, part, panel.patch);
    for (const Direction& d : directions(panel)) {
        check_overhang(found, d);
        for (const RoundPart& part : parts) check_on_sheets(found, part, d);
    }
    for (std::size_t two = 1; two < parts.size(); ++two) {
        for (std::size_t one = 0; one < two; ++one) check_apart(found, parts[one], parts[two]);
    }
    if (const auto* tab = std::get_if<Tab>(&panel.feed)) {
        check_notch(found, panel, *tab);
        check_tab_foot(found, panel, *tab);
        for (const RoundPart& post : parts) check_clear_of_notch(found, panel, *tab, post);
    }
    return std::move(found).list();
}

bool mirror_symmetric(const Panel& panel) {
    if (panel.reflector.offset_y != 0.0) return false;
    if (const auto* pin = std::get_if<Probe>(&panel.feed); pin != nullptr && pin->y != 0.0) return false;
    std::vector<Post> mirrored = panel.posts;
    for (Post& post : mirrored) post.y = -post.y;
    return std::is_permutation(panel.posts.begin(), panel.posts.end(), mirrored.begin());
}

}  // namespace panelwright::mesh
