#include <fmt/format.h>
#include <omp.h>

#include <CLI/CLI.hpp>
#include <algorithm>
#include <filesystem>
#include <memory>
#include <nlohmann/json.hpp>
#include <string>
#include <vector>

#include "app/commands.hpp"
#include "app/console.hpp"
#include "app/provenance.hpp"
#include "app/report.hpp"
#include "app/results_folder.hpp"
#include "app/single.hpp"
#include "app/stop_signals.hpp"
#include "app/study.hpp"
#include "app/study_report.hpp"
#include "io/case.hpp"
#include "viz/vtk_files.hpp"

namespace panelwright::app {
namespace {

struct RunOptions {
    std::string case_file;
    std::string folder;
    Existing existing = Existing::keep;
    Output output = Output::table;
    int threads = omp_get_max_threads();
};

void print(const RunOptions& options, const ResultsFolder& folder, const std::vector<std::string>& files,
           const std::string& table, nlohmann::ordered_json document) {
    if (options.output == Output::json) {
        document["folder"] = folder.folder.string();
        document["files"] = files;
        return show(json_text(document));
    }
    std::string text = fmt::format("{}\nFiles in {}:\n", table, folder.folder.string());
    for (const std::string& file : files) text += fmt::format("  {}\n", file);
    show(text);
}

/// The whole message of a run that ends early.
std::string message(const RunOptions& options, std::string_view what) {
    return fmt::format("{}: {}\n", options.case_file, what);
}

constexpr std::string_view nothing_written = "stopped; nothing was written";
constexpr std::string_view some_written =
    "stopped before all files were written; the same command starts over";
constexpr std::string_view designs_kept = "stopped early; the same command goes on from here";

ExitStatus stopped(const RunOptions& options, std::string_view what) {
    tell(message(options, what));
    return ExitStatus::stopped;
}

ExitStatus run_single(const RunOptions& options, const io::Case& problem, const ResultsFolder& folder,
                      StopSignals& signals) {
    omp_set_num_threads(options.threads);
    for (const solver::Method method : problem.methods) {
        tell(fmt::format("{}: solving with {}\n", options.case_file, solver::name(method)));
    }
    const std::optional<solver::Result> result = solve_all(problem, signals);
    if (!result) return stopped(options, nothing_written);
    signals.end_at(2, message(options, some_written));
    {
        const auto whole = signals.hold_off();
        claim_folder(folder, problem.resolved, options.existing);
    }
    const auto written = write_files(folder, *result, provenance(options.threads), signals);
    if (written.empty() || written.back() != folder.result()) return stopped(options, some_written);
    if (!viz::vtk_available()) tell("no .vtp files: this program was built without VTK\n");
    std::vector<std::string> files;
    for (const auto& path : written) files.push_back(path.filename().string());
    print(options, folder, files, result_table(*result), result_json(*result));
    return ExitStatus::done;
}

ExitStatus run_designs(const RunOptions& options, const io::Case& study, const ResultsFolder& folder,
                       StopSignals& signals) {
    signals.end_at(2, message(options, designs_kept));
    {
        const auto whole = signals.hold_off();
        claim_folder(folder, study.resolved, options.existing);
    }
    const std::size_t designs = io::design_count(study);
    tell(fmt::format("{}: {} designs, {} at a time\n", options.case_file, designs,
                     std::min(designs, static_cast<std::size_t>(options.threads))));
    const StudyOutcome outcome = run_study(study, folder, options.threads, signals);
    print(options, folder, {"designs.csv", "designs"}, study_table(study, outcome),
          study_json(study, outcome));
    if (outcome.stopped) return stopped(options, designs_kept);
    for (const DesignRow& row : outcome.rows) {
        if (row.status == DesignStatus::failed) return ExitStatus::failed_designs;
    }
    return ExitStatus::done;
}

ExitStatus run(const RunOptions& options) {
    StopSignals signals;
    signals.end_at(1, message(options, nothing_written));
    const io::Case problem = io::read_case(options.case_file);
    const ResultsFolder folder{options.folder.empty() ? default_folder(options.case_file)
                                                      : std::filesystem::path(options.folder)};
    {
        const auto whole = signals.hold_off();
        check_folder(folder, problem.resolved, options.existing);
    }
    return problem.variations.empty() ? run_single(options, problem, folder, signals)
                                      : run_designs(options, problem, folder, signals);
}

}  // namespace

Command run_command(CLI::App& program) {
    CLI::App* const parser =
        program.add_subcommand("run", "Solve a case, write its results, show the figures");
    const auto options = std::make_shared<RunOptions>();
    parser->add_option("CASE", options->case_file, "The case file, for example cases/gauge-869.toml")
        ->required();
    parser
        ->add_option("--out", options->folder,
                     "Folder for the results; default: CASE-results in the working directory")
        ->type_name("DIR");
    parser
        ->add_option("--threads", options->threads, "Threads to compute with; default: one a processor core")
        ->check(CLI::Range(1, 1024))
        ->type_name("N");
    parser->add_flag_callback(
        "--fresh", [options] { options->existing = Existing::replace; },
        "Remove results that this program left in the folder, of whatever case, and start over");
    parser->add_flag_callback(
        "--json", [options] { options->output = Output::json; },
        "Print the figures as JSON instead of a table");
    parser->footer(
        "One design: result.h5 (everything), and for each method s11_METHOD.s1p, pattern_METHOD.csv,\n"
        "currents_METHOD.vtp and pattern_METHOD.vtp. A case with [[vary]] blocks: designs.csv (one row a\n"
        "design) and designs/0001.h5, 0002.h5 and so on. case.toml keeps the case with all defaults.\n\n"
        "Running the same case again replaces its results; a study goes on where it was stopped. A folder\n"
        "that holds another case's results is left alone unless --fresh is given.\n\n"
        "Figures go to standard output, progress and messages to standard error.\n"
        "Exit status: 0 done; 2 bad case file or command line; 3 some designs of a study failed;\n"
        "4 stopped by Ctrl-C; 1 anything else.\n\n"
        "Ctrl-C ends a single design at once. A study first ends the designs under way and goes on from "
        "there\n"
        "when the command is given again; a second Ctrl-C drops them.\n\n"
        "Examples:\n"
        "  panelwright run cases/gauge-869.toml\n"
        "  panelwright run cases/gauge-869.toml --out /tmp/gauge --fresh\n"
        "  panelwright run cases/gauge-869.toml --json > gauge.json");
    return {parser, [options] { return run(*options); }};
}

}  // namespace panelwright::app
