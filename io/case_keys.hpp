/// The one table of all keys of a case file.
#pragma once

#include <cstddef>
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "io/quantity.hpp"

namespace panelwright::io {

/// What a key takes.
enum class KeyType {
    text,          ///< any text of one line
    length,        ///< a quantity
    frequency,     ///< a quantity
    resistance,    ///< a quantity
    conductivity,  ///< a quantity
    number,        ///< a bare number
    count,         ///< a bare whole number
    feed_kind,     ///< a word
    accuracy,      ///< a word
    metal,         ///< a metal's name
    frequencies,   ///< a list of quantities
    methods,       ///< a list of words
    key_names,     ///< a list of names of other keys
    varied,        ///< as the varied key
    varied_list,   ///< a list of such values
};

/// A table of a case file.
struct TableEntry {
    std::string_view name;
    std::string_view header;  ///< "[patch]" or "[[post]]"
    bool required = false;
    bool repeated = false;         ///< may stand several times
    std::string_view description;  ///< one sentence
};

/// All tables in the order of the documentation.
std::span<const TableEntry> case_tables();

/// The table called `name`, or null.
const TableEntry* find_table(std::string_view name);

/// Fallback of a key that must stand in the file.
inline constexpr std::string_view required = "required";
/// Fallback of a key that may be absent and then means nothing.
inline constexpr std::string_view none = "none";
/// Fallback of a key whose default follows from other keys.
inline constexpr std::string_view derived = "derived";

/// One key.
struct Key {
    std::string_view table = {};  ///< empty for a key outside all tables
    std::string_view name;
    KeyType type = KeyType::text;
    std::string_view fallback = required;  ///< value where the key is absent, without quotation marks
    std::string_view smallest =
        {};  ///< least allowed value, as written in a file; quantities and numbers only
    std::string_view largest = {};         ///< greatest allowed value
    std::string_view feed = {};            ///< the kind of feed that the key belongs to; empty = any
    std::string_view fallback_words = {};  ///< says what a derived default is
    std::string_view description = {};     ///< one sentence
};

/// All keys in the order of the documentation.
std::span<const Key> case_keys();

/// The key `name` of `table`, or null.
const Key* find_key(std::string_view table, std::string_view name);

/// "patch.length"; "title".
std::string path(const Key& key);

/// What the key's quantity is, or nothing where it takes no quantity.
std::optional<Dimension> dimension(KeyType type);

/// True for keys that hold one number, with or without a unit: those that can be varied.
bool is_numeric(KeyType type);

/// The words that a key takes, or none where it does not take words.
std::vector<std::string_view> words(KeyType type);

/// What is allowed, in words: "0.1 mm to 10 m", "quick, normal or fine".
std::string allowed(const Key& key);

/// "a, b or c"
std::string one_of(std::span<const std::string_view> words);

inline constexpr std::size_t most_pattern_frequencies = 101;
inline constexpr std::size_t most_posts = 64;
inline constexpr std::size_t most_vary_blocks = 16;
inline constexpr std::size_t most_varied_keys = 64;
inline constexpr std::size_t most_designs = 1'000'000;
inline constexpr std::size_t longest_title = 200;

}  // namespace panelwright::io
