/// From a case to results.
#pragma once

#include <string>
#include <vector>

#include "io/case.hpp"
#include "solver/result.hpp"

namespace panelwright::app {

/// Solves `problem` with one of its methods. Throws SolveError naming case and method, or std::bad_alloc.
solver::MethodResult solve(const io::Case& problem, solver::Method method);

/// Limits of validity of `method` that `problem` touches, one sentence each; told without solving.
std::vector<std::string> remarks(const io::Case& problem, solver::Method method);

/// The result of `problem` as far as it is known before a method has run.
solver::Result empty_result(const io::Case& problem);

}  // namespace panelwright::app
