/// What a study came to, for a person and for a script.
#pragma once

#include <nlohmann/json_fwd.hpp>
#include <string>

#include "app/study.hpp"

namespace panelwright::app {

/// Numbers of designs, why some failed, and for each method the least and the greatest value of every figure
/// with the design it belongs to.
std::string study_table(const io::Case& study, const StudyOutcome& outcome);

/// The same content: {"title", "designs", "done", "failed", "not_reached", "failures": [{"design",
/// "reason"}], "methods": {METHOD: {FIGURE: {"least", "least_design", "greatest", "greatest_design"}}}}.
nlohmann::ordered_json study_json(const io::Case& study, const StudyOutcome& outcome);

}  // namespace panelwright::app
