#include "app/study_report.hpp"

#include <fmt/format.h>

#include <nlohmann/json.hpp>

#include <algorithm>
#include <cmath>
#include <optional>
#include <string>
#include <unordered_map>
#include <vector>

#include "app/report.hpp"

namespace panelwright::app {
namespace {

constexpr std::size_t most_failures_shown = 10;
constexpr std::size_t most_remarks_shown = 10;

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

/// A remark and the designs that it belongs to.
struct SharedRemark {
    std::string text;
    std::size_t designs;  ///< how many
    std::size_t first_design;
};

/// Every remark of a design's solution, in the order in which they first come up.
std::vector<SharedRemark> shared_remarks(const StudyOutcome& outcome) {
    std::vector<SharedRemark> all;
    std::unordered_map<std::string, std::size_t> place;
    for (const DesignRow& row : outcome.rows) {
        for (const std::string& remark : row.remarks) {
            const auto [found, added] = place.try_emplace(remark, all.size());
            if (added) all.push_back({remark, 0, row.number});
            ++all[found->second].designs;
        }
    }
    return all;
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
    const solver::BandFigureEntry balance{"power_balance", "power balance", "1", {}, nullptr};
    keep(range(outcome, method, balance, [](const MethodFigures& f) { return f.power_balance; }));
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
    const std::vector<SharedRemark> remarks = shared_remarks(outcome);
    for (std::size_t n = 0; n < std::min(remarks.size(), most_remarks_shown); ++n) {
        text += fmt::format("{}  note on {} design{}, design {} first: {}\n", n == 0 ? "\n" : "",
                            remarks[n].designs, remarks[n].designs == 1 ? "" : "s", remarks[n].first_design,
                            remarks[n].text);
    }
    if (remarks.size() > most_remarks_shown) {
        text +=
            fmt::format("  and {} more notes, listed in designs.csv\n", remarks.size() - most_remarks_shown);
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
    Json remarks = Json::array();
    for (const SharedRemark& remark : shared_remarks(outcome)) {
        remarks.push_back(
            {{"remark", remark.text}, {"designs", remark.designs}, {"first_design", remark.first_design}});
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
            {"remarks", std::move(remarks)},
            {"methods", std::move(methods)}};
}

}  // namespace panelwright::app
