/// A TOML text as a plain tree in which every key and value knows its place.
#pragma once

#include <cstddef>
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <variant>
#include <vector>

namespace panelwright::io {

/// A place in a text, both counted from 1, columns in characters.
struct Position {
    std::size_t line = 1;
    std::size_t column = 1;

    auto operator<=>(const Position&) const = default;
};

struct Value;
struct Member;

/// A date or time, which no key of a case takes.
struct Date {};

using List = std::vector<Value>;
using Members = std::vector<Member>;

/// A value of a TOML text. For a table, `at` is its header.
struct Value {
    Position at;
    std::variant<std::string, std::int64_t, double, bool, Date, List, Members> data;
};

/// A key with its value.
struct Member {
    std::string key;
    Position at;
    Value value;
};

/// What a value is, for a message: "\"53 mm\"", "the number 53", "a table".
std::string found(const Value& value);

/// Reads `text`. A byte order mark and both kinds of line ends are taken; anything nested deeper than a case
/// can use is kept as an empty table. Throws CaseError naming `file` for the first thing that is not TOML,
/// and for NUL bytes, invalid UTF-8, dotted keys of more than eight parts and texts longer than
/// `largest_case_file`.
Members read_document(std::string_view text, std::string_view file);

/// The member called `key`, or null.
const Member* find(const Members& members, std::string_view key);

/// A key's place in a case: "patch.length", "post[2].x", "title".
struct KeyPath {
    std::string table;      ///< "patch"; empty for a key outside all tables
    std::size_t index = 0;  ///< of a block that may stand several times, from 1; 0 = not such a block
    std::string name;       ///< "length"
};

/// Reads "patch.length" or "post[2].x"; nothing where the text has another form.
std::optional<KeyPath> parse_path(std::string_view text);

/// `members` with the value at `path` put in or replaced. Tables that are missing are made; a block that is
/// missing is not, and the members come back unchanged.
Members with_value(Members members, const KeyPath& path, Value value);

}  // namespace panelwright::io
