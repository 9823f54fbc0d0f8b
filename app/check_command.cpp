#include <fmt/format.h>
#include <omp.h>

#include <CLI/CLI.hpp>
#include <algorithm>
#include <memory>
#include <nlohmann/json.hpp>
#include <string>
#include <vector>

#include "app/commands.hpp"
#include "app/console.hpp"
#include "app/estimate.hpp"
#include "app/panel_text.hpp"
#include "app/progress.hpp"
#include "app/report.hpp"
#include "app/solve.hpp"
#include "io/case.hpp"
#include "solver/wave.hpp"

namespace panelwright::app {
namespace {

constexpr std::size_t most_bad_designs_shown = 10;

/// What one method would cost over all designs.
struct MethodPlan {
    solver::Method method;
    std::size_t least_triangles = 0;
    std::size_t most_triangles = 0;
    std::size_t least_unknowns = 0;
    std::size_t most_unknowns = 0;
    double memory = 0.0;   ///< of the costliest design [bytes]
    double seconds = 0.0;  ///< of all designs, one after the other [s]
};

struct BadDesign {
    std::size_t number;
    std::string reason;
};

/// What would run.
struct Plan {
    std::size_t designs = 0;
    std::vector<BadDesign> bad;
    std::vector<MethodPlan> methods;
    std::vector<std::string> remarks;  ///< limits of validity that the case as it stands touches
    double memory = 0.0;               ///< of everything that is held at once [bytes]
    double seconds = 0.0;              ///< from start to end [s]
};

void add(MethodPlan& plan, const Estimate& cost) {
    const bool first = plan.seconds == 0.0;
    plan.least_triangles = first ? cost.triangles : std::min(plan.least_triangles, cost.triangles);
    plan.most_triangles = std::max(plan.most_triangles, cost.triangles);
    plan.least_unknowns = first ? cost.unknowns : std::min(plan.least_unknowns, cost.unknowns);
    plan.most_unknowns = std::max(plan.most_unknowns, cost.unknowns);
    plan.memory = std::max(plan.memory, cost.memory);
    plan.seconds += cost.seconds;
}

Plan make_plan(const io::Case& problem) {
    constexpr double program_memory = 25e6;  // code and libraries, measured without a case
    Plan plan;
    plan.designs = io::design_count(problem);
    for (const solver::Method method : problem.methods) {
        plan.methods.push_back({method});
        for (std::string& remark : remarks(problem, method)) plan.remarks.push_back(std::move(remark));
    }
    for (std::size_t n = 0; n < plan.designs; ++n) {
        try {
            const io::Case design = problem.variations.empty() ? problem : io::design(problem, n);
            for (MethodPlan& method : plan.methods) add(method, estimate(design, method.method));
        } catch (const io::CaseError& error) {
            std::string reason;
            for (const io::CaseProblem& fault : error.problems())
                reason += (reason.empty() ? "" : "; ") + fault.message;
            plan.bad.push_back({n + 1, reason});
        }
    }
    const auto at_once = std::min(plan.designs, static_cast<std::size_t>(omp_get_max_threads()));
    for (const MethodPlan& method : plan.methods) {
        plan.memory += method.memory * static_cast<double>(at_once);
        plan.seconds += method.seconds / static_cast<double>(at_once);
    }
    plan.memory += program_memory;
    return plan;
}

/// Sizes in wavelengths at the centre of the band.
struct ElectricalSize {
    double frequency;   ///< [Hz]
    double wavelength;  ///< [m]
    double height;
    double patch_length;
    double reflector_length;
    double reflector_width;
};

ElectricalSize electrical_size(const io::Case& problem) {
    const solver::Wave wave(0.5 * (problem.task.band.front() + problem.task.band.back()));
    const mesh::Panel& panel = problem.panel;
    return {wave.frequency,
            wave.wavelength,
            panel.spacer.height / wave.wavelength,
            panel.patch.length / wave.wavelength,
            panel.reflector.length / wave.wavelength,
            panel.reflector.width / wave.wavelength};
}

/// "1 unknown", "40 to 60 triangles"
std::string counted(std::size_t least, std::size_t most, std::string_view thing) {
    const std::string range = least == most ? fmt::format("{}", most) : fmt::format("{} to {}", least, most);
    return fmt::format("{} {}{}", range, thing, most == 1 ? "" : "s");
}

std::string plan_table(const io::Case& problem, const Plan& plan) {
    const ElectricalSize size = electrical_size(problem);
    std::string text = problem.title.empty() ? std::string() : problem.title + "\n\n";
    text += panel_text(problem.panel);
    text += fmt::format("  {:<12}{} to {}, {} points; far field at", "band",
                        shown_value(problem.task.band.front(), "Hz"),
                        shown_value(problem.task.band.back(), "Hz"), problem.task.band.size());
    for (const double frequency : problem.task.pattern_at) text += ' ' + shown_value(frequency, "Hz");
    text += fmt::format("\n\nIn wavelengths at {} ({:.1f} mm)\n", shown_value(size.frequency, "Hz"),
                        1e3 * size.wavelength);
    text += fmt::format("  spacer height {:.3f}, patch length {:.3f}, reflector {:.2f} x {:.2f}\n",
                        size.height, size.patch_length, size.reflector_length, size.reflector_width);
    for (const std::string& remark : plan.remarks) text += fmt::format("  note: {}\n", remark);
    text += fmt::format("\nWould run: {} design{}\n", plan.designs, plan.designs == 1 ? "" : "s");
    for (const MethodPlan& method : plan.methods) {
        text += fmt::format("  {:<12}{}, {}\n", solver::name(method.method),
                            counted(method.least_triangles, method.most_triangles, "triangle"),
                            counted(method.least_unknowns, method.most_unknowns, "unknown"));
    }
    text += fmt::format("  about {:.0f} MB of memory, {}\n", plan.memory / 1e6, shown_duration(plan.seconds));
    for (std::size_t n = 0; n < std::min(plan.bad.size(), most_bad_designs_shown); ++n) {
        text += fmt::format("  design {} would fail: {}\n", plan.bad[n].number, plan.bad[n].reason);
    }
    if (plan.bad.size() > most_bad_designs_shown) {
        text += fmt::format("  and {} more would fail\n", plan.bad.size() - most_bad_designs_shown);
    }
    return text;
}

nlohmann::ordered_json plan_json(const io::Case& problem, const Plan& plan) {
    using Json = nlohmann::ordered_json;
    const ElectricalSize size = electrical_size(problem);
    Json methods = Json::array();
    for (const MethodPlan& method : plan.methods) {
        methods.push_back({{"name", solver::name(method.method)},
                           {"triangles", method.most_triangles},
                           {"least_triangles", method.least_triangles},
                           {"unknowns", method.most_unknowns},
                           {"least_unknowns", method.least_unknowns}});
    }
    Json bad = Json::array();
    for (const BadDesign& design : plan.bad)
        bad.push_back({{"design", design.number}, {"reason", design.reason}});
    return {{"title", problem.title},
            {"panel", panel_json(problem.panel)},
            {"band_hz", {{"from", problem.task.band.front()}, {"to", problem.task.band.back()}}},
            {"band_points", problem.task.band.size()},
            {"pattern_at_hz", problem.task.pattern_at},
            {"electrical",
             {{"frequency_hz", size.frequency},
              {"wavelength_m", size.wavelength},
              {"height_wavelengths", size.height},
              {"patch_length_wavelengths", size.patch_length},
              {"reflector_length_wavelengths", size.reflector_length},
              {"reflector_width_wavelengths", size.reflector_width}}},
            {"remarks", plan.remarks},
            {"designs", plan.designs},
            {"bad_designs", std::move(bad)},
            {"methods", std::move(methods)},
            {"memory_bytes", plan.memory},
            {"seconds", plan.seconds}};
}

ExitStatus check(const std::string& file, Output output) {
    const io::Case problem = io::read_case(file);
    const Plan plan = make_plan(problem);
    show(output == Output::json ? json_text(plan_json(problem, plan)) : plan_table(problem, plan));
    return ExitStatus::done;
}

}  // namespace

Command check_command(CLI::App& program) {
    CLI::App* const parser =
        program.add_subcommand("check", "Read and check a case and say what would run; solve nothing");
    const auto file = std::make_shared<std::string>();
    const auto output = std::make_shared<Output>(Output::table);
    parser->add_option("CASE", *file, "The case file, for example cases/gauge-869.toml")->required();
    parser->add_flag_callback(
        "--json", [output] { *output = Output::json; }, "Print the answer as JSON instead of a table");
    parser->footer(
        "Shows the panel with all defaults filled in, its size in wavelengths, the number of designs, the "
        "size\n"
        "of the meshes, the number of unknowns, and about how much memory and time a run takes. Designs of a "
        "study that break a "
        "rule\n"
        "are named. All problems of a case file are reported together, as FILE:LINE:COLUMN: message, with\n"
        "exit status 2.\n\n"
        "Examples:\n"
        "  panelwright check cases/gauge-869.toml\n"
        "  panelwright check cases/gauge-869.toml --json");
    return {parser, [file, output] { return check(*file, *output); }};
}

}  // namespace panelwright::app
