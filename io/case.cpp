#include "io/case.hpp"

namespace panelwright::io {

CaseError::CaseError(std::string file, std::vector<CaseProblem> problems)
    : std::runtime_error(file), file_(std::move(file)), problems_(std::move(problems)) {}

}  // namespace panelwright::io
