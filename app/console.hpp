/// What a person sees: results on standard output, messages on standard error.
#pragma once

#include <string_view>

namespace panelwright::app {

/// Writes `text` to standard output, to the last byte. Throws std::runtime_error when that is not possible.
void show(std::string_view text);

/// Writes `text` to standard error. A message that cannot be delivered is no reason to lose a run: errors are
/// ignored.
void tell(std::string_view text);

}  // namespace panelwright::app
