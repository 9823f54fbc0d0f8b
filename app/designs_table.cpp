#include "app/designs_table.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <optional>
#include <variant>

#include "io/case_document.hpp"
#include "io/case_keys.hpp"
#include "io/quantity.hpp"

namespace panelwright::app {
namespace {

/// What the case key at `path` measures, or nothing where it takes a word or a bare number.
std::optional<io::Dimension> dimension_of(const std::string& path) {
    const std::optional<io::KeyPath> place = io::parse_path(path);
    const io::Key* const key = place ? io::find_key(place->table, place->name) : nullptr;
    return key == nullptr ? std::nullopt : io::dimension(key->type);
}

/// "mm", "S_per_m": a unit fit for a column name.
std::string unit_suffix(const io::Unit& unit) {
    std::string text(unit.name);
    if (const std::size_t slash = text.find('/'); slash != std::string::npos) text.replace(slash, 1, "_per_");
    return text;
}

/// A varied value as its column takes it: the number in the column's unit, or the text as it stands in the
/// case.
std::string column_value(const std::string& key, const std::string& text) {
    const std::optional<io::Dimension> dimension = dimension_of(key);
    if (!dimension) return text;
    const auto quantity = io::parse_quantity(text, *dimension);
    if (!std::holds_alternative<io::Quantity>(quantity)) return text;
    const io::Unit& unit = io::usual_unit(*dimension);
    return io::rounded(std::get<io::Quantity>(quantity).si * unit.over / unit.times);
}

std::string csv_cell(const std::string& text) {
    if (text.find_first_of(",\"\r\n") == std::string::npos) return text;
    std::string quoted = "\"";
    for (const char c : text) quoted += c == '"' ? std::string("\"\"") : std::string(1, c);
    return quoted + '"';
}

std::string number(double value) {
    return std::isnan(value) ? "nan" : fmt::format("{}", value);
}

std::string header(const io::Case& study) {
    std::string line = "design";
    for (const std::string& column : varied_columns(study)) line += ',' + csv_cell(column);
    line += ",status,reason,pattern_frequency_hz";
    for (const solver::Method method : study.methods) {
        for (const auto& entry : solver::band_figure_table()) {
            line += fmt::format(",{}.{}", solver::name(method), entry.name);
        }
        for (const auto& entry : solver::figure_table())
            line += fmt::format(",{}.{}", solver::name(method), entry.name);
        line += fmt::format(",{}.power_balance", solver::name(method));
    }
    return line + ",remarks\n";
}

std::string figure_cells(const DesignRow& row, solver::Method method) {
    const auto found = std::find_if(row.methods.begin(), row.methods.end(),
                                    [&](const MethodFigures& figures) { return figures.method == method; });
    if (found == row.methods.end()) {
        return std::string(solver::band_figure_table().size() + solver::figure_table().size() + 1, ',');
    }
    std::string cells;
    for (const auto& entry : solver::band_figure_table()) cells += ',' + number(found->band.*entry.value);
    for (const auto& entry : solver::figure_table()) cells += ',' + number(found->figures.*entry.value);
    return cells + ',' + number(found->power_balance);
}

/// The power balance at the first pattern frequency; NaN where the method tells none.
double power_balance(const solver::Solution& solution) {
    const auto found = std::find_if(solution.health.begin(), solution.health.end(),
                                    [](const auto& entry) { return entry.name == "power_balance"; });
    return found == solution.health.end() || found->values.empty() ? std::numeric_limits<double>::quiet_NaN()
                                                                   : found->values.front();
}

std::string joined(const std::vector<std::string>& remarks) {
    std::string text;
    for (const std::string& remark : remarks) text += (text.empty() ? "" : "; ") + remark;
    return text;
}

}  // namespace

std::string_view name(DesignStatus status) {
    switch (status) {
        case DesignStatus::not_reached:
            return "not reached";
        case DesignStatus::done:
            return "done";
        case DesignStatus::failed:
            break;
    }
    return "failed";
}

void set_result(DesignRow& row, const solver::Result& result) {
    row.status = DesignStatus::done;
    row.reason.clear();
    row.methods.clear();
    row.remarks.clear();
    for (const solver::MethodResult& method : result.methods) {
        MethodFigures figures{method.solution.method, method.band, {}, power_balance(method.solution)};
        if (method.figures.empty()) {
            for (const auto& entry : solver::figure_table()) {
                figures.figures.*entry.value = std::numeric_limits<double>::quiet_NaN();
            }
        } else {
            figures.figures = method.figures.front();
            row.pattern_frequency = method.solution.patterns.front().frequency;
        }
        row.methods.push_back(figures);
        for (const std::string& remark : method.solution.remarks) {
            if (std::find(row.remarks.begin(), row.remarks.end(), remark) == row.remarks.end())
                row.remarks.push_back(remark);
        }
    }
}

std::vector<std::string> varied_columns(const io::Case& study) {
    std::vector<std::string> columns;
    for (const io::Variation& variation : study.variations) {
        for (const std::string& key : variation.keys) {
            const std::optional<io::Dimension> dimension = dimension_of(key);
            columns.push_back(dimension ? key + '_' + unit_suffix(io::usual_unit(*dimension)) : key);
        }
    }
    return columns;
}

std::vector<DesignRow> design_rows(const io::Case& study) {
    std::vector<DesignRow> rows(io::design_count(study));
    for (std::size_t n = 0; n < rows.size(); ++n) {
        rows[n].number = n + 1;
        for (const auto& [key, value] : io::design_values(study, n))
            rows[n].values.push_back(column_value(key, value));
    }
    return rows;
}

std::string designs_csv(const io::Case& study, const std::vector<DesignRow>& rows) {
    std::string text = header(study);
    for (const DesignRow& row : rows) {
        text += fmt::format("{}", row.number);
        for (const std::string& value : row.values) text += ',' + csv_cell(value);
        text += fmt::format(",{},{},{}", name(row.status), csv_cell(row.reason),
                            row.methods.empty() ? std::string() : number(row.pattern_frequency));
        for (const solver::Method method : study.methods) text += figure_cells(row, method);
        text += ',' + csv_cell(joined(row.remarks)) + '\n';
    }
    return text;
}

}  // namespace panelwright::app
