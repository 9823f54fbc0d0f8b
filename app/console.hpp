/// What a person sees: results on standard output, messages on standard error.
#pragma once

#include <string_view>

namespace panelwright::app {

/// Keeps the numbers of standard streams that are closed from being given to files, into which messages would
/// then go. Call it before any file is opened.
void reserve_standard_streams();

/// Writes `text` to standard output, to the last byte. Throws std::runtime_error when that is not possible.
void show(std::string_view text);

/// Writes `text` to standard error. A message that cannot be delivered is no reason to lose a run: errors are
/// ignored.
void tell(std::string_view text);

}  // namespace panelwright::app
