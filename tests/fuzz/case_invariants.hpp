/// What must hold for the case reader whatever bytes it is given.
#pragma once

#include <string>
#include <string_view>

namespace panelwright::test {

/// Reads `text` as a case and checks what must hold: either a CaseError whose problems lie inside the text
/// and are one harmless line each, or a case whose resolved form reads back to the same case, and whose
/// designs are made or refused in the same way. Says what does not hold; empty where all does. Other
/// exceptions pass through.
std::string broken_invariant(std::string_view text);

}  // namespace panelwright::test
