#include "io/case_rules.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <limits>

#include "solver/constants.hpp"
#include "solver/methods.hpp"

namespace panelwright::io {

namespace {

std::string megahertz(double hertz) {
    return fmt::format("{:.5g} MHz", hertz / 1e6);
}
std::string millimetres(double metres) {
    return fmt::format("{:.5g} mm", metres * 1e3);
}

// Collects the problems of one reading, each at the place of the key at fault.
class RuleCheck {
  public:
    explicit RuleCheck(const Reading& reading) : reading_(reading) {}

    std::vector<CaseProblem> problems() {
        band();
        spacer();
        resonance();
        reflector("reflector.length");
        reflector("reflector.width");
        shape();
        return list_.sorted();
    }

  private:
    bool good(std::initializer_list<std::string_view> paths) const {
        return std::ranges::all_of(paths,
                                   [&](std::string_view path) { return reading_.find(path) != nullptr; });
    }
    double number(std::string_view path) const { return reading_.number(path); }
    std::string says(std::string_view path) const { return named(reading_, path); }
    void fault(std::string_view path, const std::string& message) {
        const Checked* value = reading_.find(path);
        list_.add(value == nullptr ? Position{} : value->at, message);
    }

    void band() {
        if (!good({"band.from", "band.to"})) return;
        const double from = number("band.from");
        const double to = number("band.to");
        if (from > to) {
            fault("band.to", fmt::format("{} is below {}; allowed: band.from or above", says("band.to"),
                                         says("band.from")));
            return;
        }
        points(from == to);
        if (const Checked* patterns = reading_.find("band.pattern_at")) {
            for (const Checked& at : patterns->items) {
                if (at.number >= from && at.number <= to) continue;
                list_.add(at.at,
                          fmt::format("band.pattern_at: \"{}\" lies outside the band; allowed: {} to {}",
                                      at.text, says("band.from"), says("band.to")));
            }
        }
    }

    void points(bool single) {
        if (!good({"band.points"})) return;
        const double count = number("band.points");
        if (single && count != 1.0) {
            fault("band.points", fmt::format("{} but {} and {} are one frequency; allowed: 1",
                                             says("band.points"), says("band.from"), says("band.to")));
        }
        if (!single && count < 2.0) {
            fault("band.points", fmt::format("{} but {} and {} differ; allowed: 2 and more",
                                             says("band.points"), says("band.from"), says("band.to")));
        }
        if (!single && count > 1.0 &&
            number("band.to") - number("band.from") < smallest_step * (count - 1.0)) {
            fault("band.points",
                  fmt::format("{} lie less than {} Hz apart between {} and {}; allowed: fewer points",
                              says("band.points"), smallest_step, says("band.from"), says("band.to")));
        }
    }

    bool band_is_good() const {
        return good({"band.from", "band.to"}) && number("band.from") <= number("band.to");
    }

    void spacer() {
        if (!band_is_good() || !good({"spacer.height", "spacer.permittivity"})) return;
        const double centre = 0.5 * (number("band.from") + number("band.to"));
        const double wavelength =
            solver::speed_of_light / (centre * std::sqrt(number("spacer.permittivity")));
        const double part = number("spacer.height") / wavelength;
        if (part >= thinnest_spacer && part <= thickest_spacer) return;
        fault("spacer.height", fmt::format("{} is {:.3g} wavelengths in the spacer ({}) at the band's "
                                           "centre, {} ({}); allowed: {} to {} "
                                           "wavelengths, here {} to {}",
                                           says("spacer.height"), part, says("spacer.permittivity"),
                                           megahertz(centre), says("band.from"), thinnest_spacer,
                                           thickest_spacer, millimetres(thinnest_spacer * wavelength),
                                           millimetres(thickest_spacer * wavelength)));
    }

    void resonance() {
        if (!band_is_good()) return;
        if (!good({"patch.length", "patch.width", "spacer.height", "spacer.permittivity"})) return;
        const double expected = estimated_resonance(number("patch.length"), number("patch.width"),
                                                    number("spacer.height"), number("spacer.permittivity"));
        const double above = reading_.posts > 0 ? margin_with_posts : resonance_margin;
        if (expected >= number("band.from") / resonance_margin && expected <= number("band.to") * above)
            return;
        fault(
            "patch.length",
            fmt::format(
                "{} resonates near {} (half a wavelength over the spacer, {}), far from the band, {} to {}; "
                "allowed: an estimate from {} to {}",
                says("patch.length"), megahertz(expected), says("spacer.permittivity"), says("band.from"),
                says("band.to"), megahertz(number("band.from") / resonance_margin),
                megahertz(number("band.to") * above)));
    }

    void reflector(std::string_view side) {
        if (!band_is_good() || !good({side})) return;
        const double wavelength = solver::speed_of_light / number("band.to");
        if (number(side) <= largest_reflector * wavelength) return;
        fault(
            side,
            fmt::format(
                "{} is {:.4g} wavelengths at {}; allowed: at most {} wavelengths, here {}, because a larger "
                "plate changes the beam no more and the memory of a full solution grows with its area "
                "squared",
                says(side), number(side) / wavelength, says("band.to"), largest_reflector,
                millimetres(largest_reflector * wavelength)));
    }

    // Numbers that are absent or bad are NaN in the panel; what `mesh` says of those has been said before.
    void shape() {
        for (const mesh::PanelProblem& clash : mesh::problems(panel(reading_))) {
            if (!good({clash.key})) continue;
            if (clash.other_key.empty()) {
                fault(clash.key, clash.message);
            } else if (good({clash.other_key})) {
                fault(clash.key, fmt::format("{} ({})", clash.message, says(clash.other_key)));
            }
        }
    }

    const Reading& reading_;
    ProblemList list_;
};

double number_or_nan(const Reading& reading, std::string_view path) {
    const Checked* value = reading.find(path);
    return value == nullptr ? std::numeric_limits<double>::quiet_NaN() : value->number;
}

double conductivity(const Reading& reading, const std::string& table) {
    const Checked* number = reading.find(table + ".conductivity");
    return number != nullptr ? number->number : number_or_nan(reading, table + ".metal");
}

Checked derived_default(Position at, double number, std::string text) {
    return {at, false, number, std::move(text), {}};
}

// In the unit of band.from, so that what is computed is what a person reads in the resolved case.
Checked band_centre(const Checked& from, const Checked& to) {
    const auto start = std::get<Quantity>(parse_quantity(from.text, Dimension::frequency));
    const double centre = 0.5 * (from.number + to.number) * start.unit.over / start.unit.times;
    const std::string text = fmt::format("{} {}", rounded(centre), start.unit.name);
    const auto quantity = std::get<Quantity>(parse_quantity(text, Dimension::frequency));
    // Rounding may leave a band that is no wider than it.
    if (quantity.si < from.number || quantity.si > to.number)
        return derived_default(from.at, from.number, from.text);
    return derived_default(from.at, quantity.si, quantity.text);
}

}  // namespace

double estimated_resonance(double length, double width, double height, double permittivity) {
    const double slender = height / width;
    const double effective =
        0.5 * (permittivity + 1.0) + 0.5 * (permittivity - 1.0) / std::sqrt(1.0 + 12.0 * slender);
    const double wide = width / height;
    const double extension =
        0.412 * height * (effective + 0.3) * (wide + 0.264) / ((effective - 0.258) * (wide + 0.8));
    return solver::speed_of_light / (2.0 * (length + 2.0 * extension) * std::sqrt(effective));
}

Reading with_derived_defaults(Reading reading) {
    const auto missing = [&](std::string_view path) {
        return reading.find(path) == nullptr && !reading.failed.contains(path);
    };
    const Checked* from = reading.find("band.from");
    const Checked* to = reading.find("band.to");
    if (from != nullptr && to != nullptr) {
        if (missing("band.points")) {
            const bool single = from->number == to->number;
            reading.values.emplace("band.points",
                                   derived_default(from->at, single ? 1.0 : 61.0, single ? "1" : "61"));
        }
        if (missing("band.pattern_at")) {
            Checked list = derived_default(from->at, 0.0, {});
            list.items.push_back(band_centre(*from, *to));
            reading.values.emplace("band.pattern_at", std::move(list));
        }
    }
    if (missing("solve.methods")) {
        Checked list = derived_default({}, 0.0, {});
        for (const solver::Method method : solver::available_methods()) {
            if (!solver::is_default(method)) continue;
            list.items.push_back(derived_default({}, 0.0, std::string(solver::name(method))));
        }
        reading.values.emplace("solve.methods", std::move(list));
    }
    return reading;
}

std::vector<CaseProblem> broken_rules(const Reading& reading) {
    return RuleCheck(reading).problems();
}

mesh::Panel panel(const Reading& reading) {
    const auto number = [&](std::string_view path) { return number_or_nan(reading, path); };
    mesh::Panel panel;
    panel.patch = {number("patch.length"), number("patch.width"), number("patch.thickness"),
                   conductivity(reading, "patch")};
    panel.spacer = {number("spacer.height"), number("spacer.permittivity"), number("spacer.loss_tangent")};
    const Checked* kind = reading.find("feed.kind");
    if (kind != nullptr && kind->text == "tab") {
        panel.feed = mesh::Tab{number("feed.width"), number("feed.notch_depth"), number("feed.notch_gap"),
                               number("feed.reach")};
    } else {
        panel.feed = mesh::Probe{number("feed.x"), number("feed.y"), number("feed.diameter")};
    }
    panel.reflector = {number("reflector.length"), number("reflector.width"), number("reflector.offset_x"),
                       number("reflector.offset_y"), conductivity(reading, "reflector")};
    for (std::size_t i = 1; i <= reading.posts; ++i) {
        const std::string post = fmt::format("post[{}]", i);
        panel.posts.push_back({number(post + ".x"), number(post + ".y"), number(post + ".diameter")});
    }
    return panel;
}

solver::Task task(const Reading& reading) {
    solver::Task task;
    const double from = reading.number("band.from");
    const double to = reading.number("band.to");
    const auto points = static_cast<std::size_t>(reading.number("band.points"));
    for (std::size_t i = 0; i + 1 < points; ++i) {
        task.band.push_back(from + (to - from) * static_cast<double>(i) / static_cast<double>(points - 1));
    }
    task.band.push_back(to);
    for (const Checked& at : reading.find("band.pattern_at")->items) task.pattern_at.push_back(at.number);
    std::ranges::sort(task.pattern_at);
    task.reference_impedance = reading.number("feed.impedance");
    const std::string& accuracy = reading.find("solve.accuracy")->text;
    task.accuracy = accuracy == "quick"  ? solver::Accuracy::quick
                    : accuracy == "fine" ? solver::Accuracy::fine
                                         : solver::Accuracy::normal;
    return task;
}

std::vector<solver::Method> methods(const Reading& reading) {
    std::vector<solver::Method> list;
    for (const Checked& word : reading.find("solve.methods")->items) {
        for (const solver::Method method : solver::known_methods) {
            if (solver::name(method) == word.text) list.push_back(method);
        }
    }
    return list;
}

}  // namespace panelwright::io
