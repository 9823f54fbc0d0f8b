/// A sound case as text, and ways to spoil it.
#pragma once

#include <optional>
#include <string>
#include <string_view>

#include "io/case.hpp"

namespace panelwright::test {

/// One line a key, so that a test can find its place.
inline constexpr std::string_view sound_case = R"(title = "Gauge"

[band]
from = "850 MHz"
to = "890 MHz"
points = 5

[patch]
length = "146 mm"
width = "172 mm"

[spacer]
height = "14 mm"

[feed]
kind = "probe"
x = "-36 mm"
diameter = "2.5 mm"

[reflector]
length = "230 mm"
width = "250 mm"
)";

/// `text` with the one place that reads `before` changed to `after`; an empty string where there is not
/// exactly one.
inline std::string edited(std::string_view text, std::string_view before, std::string_view after) {
    const std::size_t place = text.find(before);
    if (place == std::string_view::npos || text.find(before, place + 1) != std::string_view::npos) return {};
    return std::string(text.substr(0, place)) + std::string(after) +
           std::string(text.substr(place + before.size()));
}

/// The error that reading `text` ends with, or nothing where it is read.
inline std::optional<io::CaseError> error_of(std::string_view text) {
    try {
        io::parse_case(text, "spoilt.toml");
    } catch (const io::CaseError& error) {
        return error;
    }
    return std::nullopt;
}

}  // namespace panelwright::test
