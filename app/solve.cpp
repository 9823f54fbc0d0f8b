#include "app/solve.hpp"

#include <fmt/format.h>

#include <stdexcept>
#include <utility>

#include "app/exit_status.hpp"
#include "solver/aperture/aperture.hpp"

namespace panelwright::app {
namespace {

solver::Solution solution(const io::Case& problem, solver::Method method) {
    switch (method) {
        case solver::Method::aperture:
            return solver::solve_aperture(problem.panel, problem.task);
        case solver::Method::strip:
        case solver::Method::surface:
            break;
    }
    throw std::invalid_argument("this version does not contain the method");
}

}  // namespace

solver::MethodResult solve(const io::Case& problem, solver::Method method) {
    try {
        return solver::with_figures(solution(problem, method), problem.task.reference_impedance);
    } catch (const std::logic_error& error) {
        throw SolveError(fmt::format("{}: method {}: {}", problem.file, solver::name(method), error.what()));
    } catch (const std::runtime_error& error) {
        throw SolveError(fmt::format("{}: method {}: {}", problem.file, solver::name(method), error.what()));
    }
}

std::vector<std::string> remarks(const io::Case& problem, solver::Method method) {
    if (method != solver::Method::aperture) return {};
    return solver::aperture_remarks(problem.panel, problem.task);
}

solver::Result empty_result(const io::Case& problem) {
    solver::Result result;
    result.title = problem.title;
    result.case_text = problem.text;
    result.case_resolved = problem.resolved;
    result.panel = problem.panel;
    result.reference_impedance = problem.task.reference_impedance;
    return result;
}

}  // namespace panelwright::app
