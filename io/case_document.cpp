#include "io/case_document.hpp"

#include <fmt/format.h>
#include <toml++/toml.h>

#include <algorithm>
#include <charconv>

#include "io/case.hpp"
#include "io/quantity.hpp"
#include "io/suggest.hpp"
#include "io/utf8.hpp"

namespace panelwright::io {

namespace {

// table > block > list > list is the deepest a case can use; below it only the fact that something is there
// matters.
constexpr int deepest = 5;

// toml++ bounds the nesting of values but not of dotted keys, and destroys its tables recursively.
constexpr std::size_t most_dots = 8;

constexpr std::string_view byte_order_mark = "\xEF\xBB\xBF";

Position position(const toml::source_region& region) {
    return {std::max<std::size_t>(region.begin.line, 1), std::max<std::size_t>(region.begin.column, 1)};
}

Value converted(const toml::node& node, int depth);

Members converted_table(const toml::table& table, int depth) {
    Members members;
    for (const auto& [key, node] : table) {
        members.push_back({std::string(key.str()), position(key.source()), converted(node, depth + 1)});
    }
    return members;
}

Value converted(const toml::node& node, int depth) {
    Value value{position(node.source()), Members{}};
    if (const auto* text = node.as_string()) {
        value.data = text->get();
    } else if (const auto* whole = node.as_integer()) {
        value.data = whole->get();
    } else if (const auto* real = node.as_floating_point()) {
        value.data = real->get();
    } else if (const auto* truth = node.as_boolean()) {
        value.data = truth->get();
    } else if (const auto* array = node.as_array()) {
        List list;
        if (depth < deepest) {
            for (const toml::node& item : *array) list.push_back(converted(item, depth + 1));
        }
        value.data = std::move(list);
    } else if (const auto* table = node.as_table()) {
        if (depth < deepest) value.data = converted_table(*table, depth);
    } else {
        value.data = Date{};
    }
    return value;
}

// Walks over a text character by character and keeps count of the place.
class Cursor {
  public:
    explicit Cursor(std::string_view text) : rest_(text) {}

    bool at_end() const { return rest_.empty(); }
    Position place() const { return place_; }
    char byte() const { return rest_.front(); }
    bool starts_with(std::string_view prefix) const { return rest_.starts_with(prefix); }

    void next() {
        const std::size_t bytes = first_character(rest_).bytes;
        if (rest_.front() == '\n') {
            ++place_.line;
            place_.column = 1;
        } else {
            ++place_.column;
        }
        rest_.remove_prefix(bytes);
    }

    void next(std::size_t count) {
        for (std::size_t i = 0; i < count && !at_end(); ++i) next();
    }

    bool valid() const { return first_character(rest_).valid; }

  private:
    std::string_view rest_;
    Position place_;
};

std::optional<CaseProblem> text_problem(std::string_view text) {
    for (Cursor cursor(text); !cursor.at_end(); cursor.next()) {
        const auto [line, column] = cursor.place();
        if (cursor.byte() == '\0') {
            return CaseProblem{line, column, "found a NUL byte; a case file is a text in UTF-8"};
        }
        if (!cursor.valid()) {
            return CaseProblem{
                line, column,
                fmt::format(
                    "found the byte 0x{:02X}, which is not UTF-8 here; a case file is a text in UTF-8",
                    static_cast<unsigned char>(cursor.byte()))};
        }
    }
    return std::nullopt;
}

bool is_key_byte(char c) {
    return (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z') || (c >= '0' && c <= '9') || c == '_' ||
           c == '-' || c == ' ' || c == '\t';
}

// Leaves `cursor` behind the string that starts at it: '…', "…", '''…''' or """…""".
void skip_string(Cursor& cursor) {
    const char quote = cursor.byte();
    const std::string triple(3, quote);
    const bool multiline = cursor.starts_with(triple);
    cursor.next(multiline ? 3 : 1);
    while (!cursor.at_end()) {
        if (multiline ? cursor.starts_with(triple) : cursor.byte() == quote || cursor.byte() == '\n') {
            cursor.next(multiline ? 3 : 1);
            return;
        }
        cursor.next(quote == '"' && cursor.byte() == '\\' ? 2 : 1);
    }
}

std::optional<CaseProblem> nesting_problem(std::string_view text) {
    Cursor cursor(text);
    std::size_t dots = 0;
    while (!cursor.at_end()) {
        const char c = cursor.byte();
        if (c == '"' || c == '\'') {
            skip_string(cursor);
            continue;
        }
        if (c == '#') {
            while (!cursor.at_end() && cursor.byte() != '\n') cursor.next();
            dots = 0;
            continue;
        }
        if (c == '.') {
            if (++dots > most_dots) {
                const auto [line, column] = cursor.place();
                return CaseProblem{line, column,
                                   "found a key of very many parts; a case needs two: \"patch.length\""};
            }
        } else if (!is_key_byte(c)) {
            dots = 0;
        }
        cursor.next();
    }
    return std::nullopt;
}

std::string_view line_of(std::string_view text, std::size_t line) {
    for (std::size_t i = 1; i < line; ++i) {
        const std::size_t end = text.find('\n');
        if (end == std::string_view::npos) return {};
        text.remove_prefix(end + 1);
    }
    return text.substr(0, text.find_first_of("\r\n"));
}

// The commonest slip: length = 53 mm.
std::string quotes_hint(std::string_view line) {
    const std::size_t equals = line.find('=');
    if (equals == std::string_view::npos) return {};
    const std::string_view value = line.substr(equals + 1, line.find('#', equals) - equals - 1);
    for (const Dimension dimension :
         {Dimension::length, Dimension::frequency, Dimension::resistance, Dimension::conductivity}) {
        const auto reading = parse_quantity(value, dimension);
        if (const auto* quantity = std::get_if<Quantity>(&reading)) {
            return fmt::format("; a value with a unit stands in quotation marks: write \"{}\"",
                               quantity->text);
        }
    }
    return {};
}

struct SyntaxProblem {
    Position at;
    std::string message;
};

// The parser's own words, without its "Error while parsing …: ". For a key that stands twice it points behind
// the value of the second one; the key itself is more help.
SyntaxProblem syntax_problem(const toml::parse_error& error, std::string_view text) {
    std::string_view words = error.description();
    if (words.starts_with("Error while") && words.find(": ") != std::string_view::npos) {
        words.remove_prefix(words.find(": ") + 2);
    }
    Position at = position(error.source());
    const std::string_view line = line_of(text, at.line);
    if (words.starts_with("cannot redefine"))
        at.column = std::min(line.find_first_not_of(" \t"), line.size()) + 1;
    return {at, fmt::format("this is not TOML: {}{}", shortened(words, 200), quotes_hint(line))};
}

}  // namespace

std::string found(const Value& value) {
    struct Words {
        std::string operator()(const std::string& text) const { return shown(text); }
        std::string operator()(std::int64_t number) const { return fmt::format("the number {}", number); }
        std::string operator()(double number) const { return fmt::format("the number {}", number); }
        std::string operator()(bool truth) const { return truth ? "the word true" : "the word false"; }
        std::string operator()(const Date&) const { return "a date or time"; }
        std::string operator()(const List&) const { return "a list"; }
        std::string operator()(const Members&) const { return "a table"; }
    };
    return std::visit(Words{}, value.data);
}

Members read_document(std::string_view text, std::string_view file) {
    const auto refuse = [&](const CaseProblem& problem) { throw CaseError(std::string(file), {problem}); };
    if (text.size() > largest_case_file) {
        refuse(
            {1, 1, fmt::format("the file has more than {} bytes, the most that is read", largest_case_file)});
    }
    if (text.starts_with(byte_order_mark)) text.remove_prefix(byte_order_mark.size());
    if (const auto problem = text_problem(text)) refuse(*problem);
    if (const auto problem = nesting_problem(text)) refuse(*problem);
    try {
        return converted_table(toml::parse(text, file), 0);
    } catch (const toml::parse_error& error) {
        const auto [at, message] = syntax_problem(error, text);
        refuse({at.line, at.column, message});
    }
    return {};
}

const Member* find(const Members& members, std::string_view key) {
    const auto member = std::ranges::find(members, key, &Member::key);
    return member == members.end() ? nullptr : &*member;
}

std::optional<KeyPath> parse_path(std::string_view text) {
    const std::size_t dot = text.find('.');
    if (dot == std::string_view::npos) return KeyPath{"", 0, std::string(text)};
    KeyPath path{std::string(text.substr(0, dot)), 0, std::string(text.substr(dot + 1))};
    const std::size_t bracket = path.table.find('[');
    if (bracket == std::string::npos) return path;
    const char* first = path.table.data() + bracket + 1;
    const char* last = path.table.data() + path.table.size();
    const auto [end, status] = std::from_chars(first, last, path.index);
    if (status != std::errc() || end == first || end + 1 != last || *end != ']' || path.index == 0)
        return std::nullopt;
    path.table.resize(bracket);
    return path;
}

Members with_value(Members members, const KeyPath& path, Value value) {
    Members* target = &members;
    if (!path.table.empty()) {
        auto table = std::ranges::find(members, path.table, &Member::key);
        if (table == members.end()) {
            if (path.index > 0) return members;
            members.push_back({path.table, {}, {{}, Members{}}});
            table = members.end() - 1;
        }
        Value* holder = &table->value;
        if (path.index > 0) {
            auto* list = std::get_if<List>(&holder->data);
            if (list == nullptr || path.index > list->size()) return members;
            holder = &(*list)[path.index - 1];
        }
        target = std::get_if<Members>(&holder->data);
        if (target == nullptr) return members;
    }
    const auto old = std::ranges::find(*target, path.name, &Member::key);
    if (old == target->end()) {
        const Position at = value.at;
        target->push_back({path.name, at, std::move(value)});
    } else {
        old->value = std::move(value);
    }
    return members;
}

}  // namespace panelwright::io
