/// Help with mistyped names, and text from a file made fit for one line of a message.
#pragma once

#include <cstddef>
#include <span>
#include <string>
#include <string_view>

namespace panelwright::io {

/// Smallest number of insertions, deletions, replacements and swaps of neighbouring letters that turn `a`
/// into `b`, upper and lower case being the same letter (optimal string alignment: F. J. Damerau, Commun. ACM
/// 7(3), 1964; no letter is touched twice). Names of more than 64 bytes are cut there: this is for names, not
/// for texts.
std::size_t edit_distance(std::string_view a, std::string_view b);

/// The one of `candidates` with the smallest edit distance to `word`, the first of equals; empty when none is
/// near: a distance of about a third of the longer word is the most.
std::string_view nearest(std::string_view word, std::span<const std::string_view> candidates);

/// "the nearest is "width"; ", or nothing when none of `candidates` is near.
std::string nearest_is(std::string_view word, std::span<const std::string_view> candidates);

/// `text` on one line: control characters as \n, \t or \u001B, backslashes and quotation marks as they are,
/// at most `longest` characters with "…" for the rest. `text` is UTF-8; bytes that are not are written as
/// \xFF.
std::string shortened(std::string_view text, std::size_t longest = 60);

/// `shortened(text)` in quotation marks.
std::string shown(std::string_view text);

}  // namespace panelwright::io
