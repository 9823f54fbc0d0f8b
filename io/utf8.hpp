/// UTF-8, one character at a time.
#pragma once

#include <cstddef>
#include <cstdint>
#include <string_view>

namespace panelwright::io {

/// The character at the start of a text.
struct Utf8Character {
    std::uint32_t code = 0;  ///< Unicode code point; 0 where not valid
    std::size_t bytes = 1;   ///< how many bytes it takes; 1 where not valid
    bool valid = false;
};

/// First character of `text`, which must not be empty. Valid as RFC 3629, section 4, has it: no overlong
/// forms, no surrogates, nothing above U+10FFFF.
Utf8Character first_character(std::string_view text);

}  // namespace panelwright::io
