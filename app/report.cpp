#include "app/report.hpp"

#include <fmt/format.h>

#include <nlohmann/json.hpp>

#include <algorithm>
#include <cmath>
#include <functional>
#include <vector>

namespace panelwright::app {
namespace {

constexpr std::size_t label_width = 30;
constexpr std::size_t value_width = 16;

/// A line of the table: a label and one cell a method.
std::string row(std::string_view label, const std::vector<std::string>& cells) {
    std::string line = fmt::format("  {:<{}}", label, label_width);
    for (const std::string& cell : cells) line += fmt::format("{:>{}}", cell, value_width);
    return line + '\n';
}

using Cell = std::function<std::string(const solver::MethodResult&)>;

std::string row(const solver::Result& result, std::string_view label, const Cell& cell) {
    std::vector<std::string> cells;
    for (const solver::MethodResult& method : result.methods) cells.push_back(cell(method));
    return row(label, cells);
}

std::string port_rows(const solver::Result& result) {
    const auto& frequency = result.methods.front().solution.port.frequency;
    std::string text =
        frequency.empty()
            ? std::string("Port\n")
            : fmt::format("Port, {} to {}, against {:g} ohm\n", shown_value(frequency.front(), "Hz"),
                          shown_value(frequency.back(), "Hz"), result.reference_impedance);
    for (const solver::BandFigureEntry& entry : solver::band_figure_table()) {
        text += row(result, entry.label,
                    [&](const auto& method) { return shown_value(method.band.*entry.value, entry.unit); });
    }
    return text;
}

std::string pattern_rows(const solver::Result& result, std::size_t p) {
    const auto frequency = result.methods.front().solution.patterns[p].frequency;
    std::string text = fmt::format("Far field at {}\n", shown_value(frequency, "Hz"));
    for (const solver::FigureEntry& entry : solver::figure_table()) {
        text += row(result, entry.label, [&](const auto& method) {
            return p < method.figures.size() ? shown_value(method.figures[p].*entry.value, entry.unit)
                                             : "none";
        });
    }
    for (const solver::MethodResult& method : result.methods) {
        if (p >= method.solution.patterns.size()) continue;
        text += fmt::format("  polarisation at boresight ({}): {}\n", solver::name(method.solution.method),
                            solver::polarisation_sense(method.solution.patterns[p]));
    }
    return text;
}

std::string health_rows(const solver::MethodResult& method) {
    const solver::Solution& solution = method.solution;
    std::string text = fmt::format("How far to trust {}\n", solver::name(solution.method));
    for (const solver::HealthEntry& entry : solution.health) {
        std::string values;
        for (const double value : entry.values) {
            if (!values.empty()) values += ", ";
            values += entry.unit == "Hz" ? shown_value(value, "Hz") : fmt::format("{:.4g}", value);
        }
        if (entry.unit != "1" && entry.unit != "Hz") values += ' ' + entry.unit;
        text += fmt::format("  {:<{}}{:>{}}\n", entry.name, label_width, values, value_width);
    }
    for (const std::string& remark : solution.remarks) text += fmt::format("  note: {}\n", remark);
    return text;
}

}  // namespace

std::string shown_value(double value, std::string_view unit) {
    if (std::isnan(value)) return "none";
    if (unit == "Hz") return fmt::format("{:.3f} MHz", value / 1e6);
    if (unit == "1") return fmt::format("{:.3f}", value);
    if (unit == "deg") return fmt::format("{:.1f} deg", value);
    return fmt::format("{:.2f} {}", value, unit);
}

std::string result_table(const solver::Result& result) {
    std::string text = result.title.empty() ? std::string() : result.title + "\n\n";
    if (result.methods.empty()) return text;
    std::vector<std::string> names;
    std::size_t patterns = 0;
    for (const solver::MethodResult& method : result.methods) {
        names.emplace_back(solver::name(method.solution.method));
        patterns = std::max(patterns, method.solution.patterns.size());
    }
    text += row("", names) + port_rows(result);
    for (std::size_t p = 0; p < patterns; ++p) text += pattern_rows(result, p);
    for (const solver::MethodResult& method : result.methods) text += health_rows(method);
    return text;
}

nlohmann::ordered_json result_json(const solver::Result& result) {
    using Json = nlohmann::ordered_json;
    Json methods = Json::object();
    for (const solver::MethodResult& method : result.methods) {
        Json band = Json::object();
        for (const auto& entry : solver::band_figure_table())
            band[std::string(entry.name)] = method.band.*entry.value;
        Json patterns = Json::array();
        for (std::size_t p = 0; p < method.figures.size(); ++p) {
            Json pattern = {{"frequency_hz", method.solution.patterns[p].frequency}};
            for (const auto& entry : solver::figure_table()) {
                pattern[std::string(entry.name)] = method.figures[p].*entry.value;
            }
            pattern["polarisation"] = solver::polarisation_sense(method.solution.patterns[p]);
            patterns.push_back(std::move(pattern));
        }
        Json health = Json::object();
        for (const solver::HealthEntry& entry : method.solution.health) {
            health[entry.name] = entry.per_pattern || entry.values.size() != 1 ? Json(entry.values)
                                                                               : Json(entry.values.front());
        }
        methods[std::string(solver::name(method.solution.method))] = {{"band", std::move(band)},
                                                                      {"patterns", std::move(patterns)},
                                                                      {"health", std::move(health)},
                                                                      {"remarks", method.solution.remarks}};
    }
    return {{"title", result.title},
            {"reference_impedance_ohm", result.reference_impedance},
            {"methods", std::move(methods)}};
}

std::string json_text(const nlohmann::ordered_json& document) {
    return document.dump(2, ' ', false, nlohmann::ordered_json::error_handler_t::replace) + '\n';
}

}  // namespace panelwright::app
