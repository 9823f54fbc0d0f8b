/// Results of one design for a person (a table) and for a script (JSON): the same content, the same names.
#pragma once

#include <nlohmann/json_fwd.hpp>
#include <string>
#include <string_view>

#include "solver/result.hpp"

namespace panelwright::app {

/// A value with its unit as it stands in a table: "869.500 MHz" for a value in Hz, "9.12 dBi", "0.97" for
/// unit "1", "none" for NaN.
std::string shown_value(double value, std::string_view unit);

/// Figures of every method side by side, in the trade's words.
std::string result_table(const solver::Result& result);

/// {"title", "methods": {METHOD: {"band": {…}, "patterns": [{"frequency_hz", …}], "health": {…}, "remarks":
/// […]}}}; a figure that does not exist is null.
nlohmann::ordered_json result_json(const solver::Result& result);

/// `document` as indented text with a line end; NaN is null, bytes that are not UTF-8 are replaced.
std::string json_text(const nlohmann::ordered_json& document);

}  // namespace panelwright::app
