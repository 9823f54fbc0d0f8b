#include "app/single.hpp"

#include <fmt/format.h>

#include <functional>

#include "app/atomic_file.hpp"
#include "app/solve.hpp"
#include "io/pattern_csv.hpp"
#include "io/touchstone.hpp"
#include "viz/vtk_files.hpp"

namespace panelwright::app {
namespace {

namespace fs = std::filesystem;

/// A file that is still to be written.
struct FileJob {
    fs::path path;
    std::function<void(const fs::path&)> write;
};

/// "currents_aperture.vtp" for the first pattern frequency, "currents_aperture_3400MHz.vtp" for others.
std::string scene_name(const std::string& stem, std::size_t p, double frequency) {
    if (p == 0) return stem + ".vtp";
    std::string megahertz = fmt::format("{:.6f}", frequency / 1e6);  // to the hertz
    megahertz.erase(megahertz.find_last_not_of('0') + 1);
    if (megahertz.ends_with('.')) megahertz.pop_back();
    return fmt::format("{}_{}MHz.vtp", stem, megahertz);
}

/// The scenes of one kind, one a pattern frequency, and their collection where there are several.
void add_scenes(std::vector<FileJob>& jobs, const ResultsFolder& folder, std::string_view kind,
                const solver::Solution& solution,
                const std::function<void(const fs::path&, std::size_t)>& write) {
    const std::string stem = ResultsFolder::scene_stem(kind, solution.method);
    std::vector<viz::SeriesEntry> series;
    for (std::size_t p = 0; p < solution.patterns.size(); ++p) {
        const double frequency = solution.patterns[p].frequency;
        series.push_back({frequency, scene_name(stem, p, frequency)});
        jobs.push_back(
            {folder.folder / series.back().file, [write, p](const fs::path& path) { write(path, p); }});
    }
    if (series.size() > 1) {
        jobs.push_back({folder.folder / (stem + ".pvd"),
                        [series](const fs::path& path) { viz::write_collection(path, series); }});
    }
}

void add_method(std::vector<FileJob>& jobs, const ResultsFolder& folder, const solver::Result& result,
                const solver::Solution& solution) {
    const double reference = result.reference_impedance;
    if (!solution.port.frequency.empty()) {
        jobs.push_back({folder.s11(solution.method), [&, reference](const fs::path& path) {
                            io::OnePort data{solution.port.frequency, {}, reference};
                            for (const solver::Complex& impedance : solution.port.impedance) {
                                data.s11.push_back(solver::reflection(impedance, reference));
                            }
                            io::write_touchstone(path, data, result.title);
                        }});
    }
    jobs.push_back({folder.pattern_table(solution.method), [&](const fs::path& path) {
                        io::write_pattern_csv(path, solution.patterns, solution.powers, result.title);
                    }});
    if (!viz::vtk_available()) return;
    add_scenes(jobs, folder, "currents", solution, [&](const fs::path& path, std::size_t p) {
        viz::write_currents(path, solution, p, result.title);
    });
    add_scenes(jobs, folder, "pattern", solution, [&](const fs::path& path, std::size_t p) {
        viz::write_pattern(path, solution, p, {}, result.title);
    });
}

}  // namespace

std::optional<solver::Result> solve_all(const io::Case& problem, StopSignals& signals) {
    solver::Result result = empty_result(problem);
    for (const solver::Method method : problem.methods) {
        if (signals.requested()) return std::nullopt;
        result.methods.push_back(solve(problem, method));
    }
    if (signals.requested()) return std::nullopt;
    return result;
}

std::vector<fs::path> write_files(const ResultsFolder& folder, const solver::Result& result,
                                  const io::Provenance& made, StopSignals& signals) {
    std::vector<FileJob> jobs;
    for (const solver::MethodResult& method : result.methods)
        add_method(jobs, folder, result, method.solution);
    jobs.push_back({folder.result(), [&](const fs::path& path) { io::write_result(path, result, made); }});
    std::vector<fs::path> written;
    for (const FileJob& job : jobs) {
        if (signals.requested()) break;
        const auto whole = signals.hold_off();
        commit_file(job.path, job.write);
        written.push_back(job.path);
    }
    return written;
}

}  // namespace panelwright::app
