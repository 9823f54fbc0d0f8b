#include "io/suggest.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cstdint>
#include <limits>

#include "io/utf8.hpp"

namespace panelwright::io {

namespace {

constexpr std::size_t longest_name = 64;

char lower(char c) {
    return c >= 'A' && c <= 'Z' ? static_cast<char>(c - 'A' + 'a') : c;
}

// C1 controls and the Unicode line separators move the cursor on some terminals just as C0 controls do.
bool is_control(std::uint32_t c) {
    return c < 0x20 || (c >= 0x7F && c < 0xA0) || c == 0x2028 || c == 0x2029;
}

std::string escaped(std::uint32_t c) {
    switch (c) {
        case '\n':
            return "\\n";
        case '\r':
            return "\\r";
        case '\t':
            return "\\t";
        default:
            return fmt::format("\\u{:04X}", c);
    }
}

}  // namespace

std::size_t edit_distance(std::string_view a, std::string_view b) {
    a = a.substr(0, longest_name);
    b = b.substr(0, longest_name);
    using Row = std::array<std::size_t, longest_name + 1>;
    Row before_last{};
    Row last{};
    Row row{};
    for (std::size_t j = 0; j <= b.size(); ++j) last[j] = j;
    for (std::size_t i = 1; i <= a.size(); ++i) {
        row[0] = i;
        for (std::size_t j = 1; j <= b.size(); ++j) {
            const bool same = lower(a[i - 1]) == lower(b[j - 1]);
            row[j] = std::min({last[j] + 1, row[j - 1] + 1, last[j - 1] + (same ? 0 : 1)});
            if (i > 1 && j > 1 && lower(a[i - 1]) == lower(b[j - 2]) && lower(a[i - 2]) == lower(b[j - 1])) {
                row[j] = std::min(row[j], before_last[j - 2] + 1);
            }
        }
        before_last = last;
        last = row;
    }
    return last[b.size()];
}

std::string_view nearest(std::string_view word, std::span<const std::string_view> candidates) {
    std::string_view best;
    std::size_t smallest = std::numeric_limits<std::size_t>::max();
    for (const std::string_view candidate : candidates) {
        const std::size_t distance = edit_distance(word, candidate);
        if (distance < smallest) {
            smallest = distance;
            best = candidate;
        }
    }
    // One letter in three; a word of two letters may differ in one.
    const bool near = !best.empty() && 3 * smallest <= std::max(word.size(), best.size()) + 1;
    return near ? best : std::string_view();
}

std::string nearest_is(std::string_view word, std::span<const std::string_view> candidates) {
    const std::string_view near = nearest(word, candidates);
    return near.empty() ? std::string() : fmt::format("the nearest is \"{}\"; ", near);
}

std::string shortened(std::string_view text, std::size_t longest) {
    std::string line;
    std::size_t characters = 0;
    while (!text.empty()) {
        if (characters++ == longest) return line + "…";
        const Utf8Character next = first_character(text);
        if (!next.valid) {
            line += fmt::format("\\x{:02X}", static_cast<unsigned char>(text.front()));
        } else if (is_control(next.code)) {
            line += escaped(next.code);
        } else {
            line += text.substr(0, next.bytes);
        }
        text.remove_prefix(next.bytes);
    }
    return line;
}

std::string shown(std::string_view text) {
    return '"' + shortened(text) + '"';
}

}  // namespace panelwright::io
