#include "app/study_report.hpp"

#include <fmt/format.h>

#include <nlohmann/json.hpp>

#include <algorithm>
#include <cmath>
#include <optional>

#include "app/report.hpp"

namespace panelwright::app {
namespace {

constexpr std::size_t most_failures_shown = 10;

/// A figure's extremes over the designs of a study.
struct Range {
    std::string_view name;
    std::string_view label;
    std::string_view unit;
    double least;
    double greatest;
    std::size_t least_design;  ///< number of the first design with that value
    std::size_t greatest_design;
};

std::size_t number_of(const StudyOutcome& outcome, DesignStatus status) {
    return static_cast<std::size_t>(
        std::count_if(outcome.rows.begin(), outcome.rows.end(),
                      [&](const DesignRow& row) { return row.status == status; }));
}

/// Extremes of what `value` reads from a design's figures; nothing when no design has the figure.
template <typename Entry, typename Value>
std::optional<Range> range(const StudyOutcome& outcome, solver::Method method, const Entry& entry,
                           Value&& value) {
    std::optional<Range> found;
    for (const DesignRow& row : outcome.rows) {
        for (const MethodFigures& figures : row.methods) {
            const double now = value(figures);
            if (figures.method != method || std::isnan(now)) continue;
            if (!found) found = {entry.name, entry.label, entry.unit, now, now, row.number, row.number};
            if (now < found->least) {
                found->least = now;
                found->least_design = row.number;
            }
            if (now > found->greatest) {
                found->greatest = now;
                found->greatest_design = row.number;
            }
        }
    }
    return found;
}

std::vector<Range> ranges(const StudyOutcome& outcome, solver::Method method) {
    std::vector<Range> all;
    const auto keep = [&](const std::optional<Range>& one) {
        if (one) all.push_back(*one);
    };
    for (const auto& entry : solver::band_figure_table()) {
        keep(range(outcome, method, entry, [&](const MethodFigures& f) { return f.band.*entry.value; }));
    }
    for (const auto& entry : solver::figure_table()) {
        keep(range(outcome, method, entry, [&](const MethodFigures& f) { return f.figures.*entry.value; }));
    }
    return all;
}

}  // namespace

std::string study_table(const io::Case& study, const StudyOutcome& outcome) {
    std::string text = study.title.empty() ? std::string() : study.title + "\n\n";
    text += fmt::format("{} designs: {} done, {} failed, {} not reached\n", outcome.rows.size(),
                        number_of(outcome, DesignStatus::done), number_of(outcome, DesignStatus::failed),
                        number_of(outcome, DesignStatus::not_reached));
    std::size_t shown = 0;
    for (const DesignRow& row : outcome.rows) {
        if (row.status != DesignStatus::failed || shown++ >= most_failures_shown) continue;
        text += fmt::format("  design {} failed: {}\n", row.number, row.reason);
    }
    if (shown > most_failures_shown) {
        text += fmt::format("  and {} more, listed in designs.csv\n", shown - most_failures_shown);
    }
    for (const solver::Method method : study.methods) {
        const std::vector<Range> all = ranges(outcome, method);
        if (all.empty()) continue;
        text += fmt::format("\n  {:<30}{:>16}  design{:>16}  design\n", solver::name(method), "least",
                            "greatest");
        for (const Range& one : all) {
            text +=
                fmt::format("  {:<30}{:>16}{:>8}{:>16}{:>8}\n", one.label, shown_value(one.least, one.unit),
                            one.least_design, shown_value(one.greatest, one.unit), one.greatest_design);
        }
    }
    return text;
}

nlohmann::ordered_json study_json(const io::Case& study, const StudyOutcome& outcome) {
    using Json = nlohmann::ordered_json;
    Json failures = Json::array();
    for (const DesignRow& row : outcome.rows) {
        if (row.status == DesignStatus::failed)
            failures.push_back({{"design", row.number}, {"reason", row.reason}});
    }
    Json methods = Json::object();
    for (const solver::Method method : study.methods) {
        Json figures = Json::object();
        for (const Range& one : ranges(outcome, method)) {
            figures[std::string(one.name)] = {{"least", one.least},
                                              {"least_design", one.least_design},
                                              {"greatest", one.greatest},
                                              {"greatest_design", one.greatest_design}};
        }
        methods[std::string(solver::name(method))] = std::move(figures);
    }
    return {{"title", study.title},
            {"designs", outcome.rows.size()},
            {"done", number_of(outcome, DesignStatus::done)},
            {"failed", number_of(outcome, DesignStatus::failed)},
            {"not_reached", number_of(outcome, DesignStatus::not_reached)},
            {"failures", std::move(failures)},
            {"methods", std::move(methods)}};
}

}  // namespace panelwright::app
