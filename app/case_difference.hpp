/// Where two cases differ.
#pragma once

#include <string>
#include <string_view>
#include <vector>

namespace panelwright::app {

/// A key with its value in two cases; empty where the case does not have the key.
struct KeyDifference {
    std::string key;     ///< "reflector.length", "post[2].x"
    std::string stored;  ///< as text
    std::string asked;   ///< as text
};

/// The keys in which two resolved cases (`io::Case::resolved`) differ, in order of their names. Throws
/// io::CaseError when a text is not TOML.
std::vector<KeyDifference> case_differences(std::string_view stored, std::string_view asked);

}  // namespace panelwright::app
