// One value against its key: type, unit, bounds.
#include <fmt/format.h>

#include <algorithm>
#include <charconv>
#include <cmath>

#include "io/case_reading.hpp"
#include "io/suggest.hpp"
#include "io/utf8.hpp"
#include "solver/materials.hpp"
#include "solver/methods.hpp"

namespace panelwright::io {

namespace {

std::vector<CaseProblem> problem(Position at, std::string_view path, std::string_view message) {
    return {{at.line, at.column, fmt::format("{}: {}", path, message)}};
}

double bare_number(std::string_view text) {
    double number = 0.0;
    std::from_chars(text.data(), text.data() + text.size(), number);
    return number;
}

double bound(const Key& key, std::string_view text) {
    const auto kind = dimension(key.type);
    return kind ? std::get<Quantity>(parse_quantity(text, *kind)).si : bare_number(text);
}

// 869.5 is meant in MHz, 869500000 in Hz.
std::string quantity_example(Dimension kind, double number) {
    const bool hertz = kind == Dimension::frequency && std::fabs(number) >= 1e6;
    return fmt::format("write \"{} {}\" (allowed units: {})", shortest(number),
                       hertz ? "Hz" : usual_unit(kind).name, unit_list(kind));
}

Outcome check_quantity(Dimension kind, std::string_view path, const Value& value) {
    if (const auto* text = std::get_if<std::string>(&value.data)) {
        auto reading = parse_quantity(*text, kind);
        if (const auto* message = std::get_if<std::string>(&reading))
            return problem(value.at, path, *message);
        auto& quantity = std::get<Quantity>(reading);
        return Checked{value.at, true, quantity.si, std::move(quantity.text), {}};
    }
    const auto* whole = std::get_if<std::int64_t>(&value.data);
    const auto* real = std::get_if<double>(&value.data);
    if (whole != nullptr || (real != nullptr && std::isfinite(*real))) {
        const double number = whole != nullptr ? static_cast<double>(*whole) : *real;
        return problem(
            value.at, path,
            fmt::format("found {} without a unit; {}", found(value), quantity_example(kind, number)));
    }
    return problem(value.at, path,
                   fmt::format("found {}; a {} is written like \"53 {}\" (allowed units: {})", found(value),
                               name(kind), usual_unit(kind).name, unit_list(kind)));
}

Outcome check_bare(const Key& key, std::string_view path, const Value& value) {
    if (const auto* whole = std::get_if<std::int64_t>(&value.data)) {
        const auto number = static_cast<double>(*whole);
        return Checked{value.at,
                       true,
                       number,
                       key.type == KeyType::number ? with_point(shortest(number)) : fmt::format("{}", *whole),
                       {}};
    }
    const std::string wanted =
        fmt::format("a bare {}number from {}", key.type == KeyType::count ? "whole " : "", allowed(key));
    if (const auto* real = std::get_if<double>(&value.data)) {
        if (!std::isfinite(*real)) {
            return problem(value.at, path,
                           fmt::format("found {}, which is not finite; allowed: {}", found(value), wanted));
        }
        if (key.type == KeyType::number)
            return Checked{value.at, true, *real, with_point(shortest(*real)), {}};
    }
    if (const auto* real = std::get_if<double>(&value.data); real != nullptr && std::rint(*real) == *real) {
        return problem(value.at, path,
                       fmt::format("found the number {}; wanted: a whole number without a decimal point, {}",
                                   with_point(shortest(*real)), allowed(key)));
    }
    const bool is_text = std::holds_alternative<std::string>(value.data);
    return problem(value.at, path,
                   fmt::format("found {}; allowed: {}{}", found(value), wanted,
                               is_text ? ", without unit and quotation marks" : ""));
}

Outcome check_text(const Key& key, std::string_view path, const Value& value) {
    const auto* text = std::get_if<std::string>(&value.data);
    if (text == nullptr)
        return problem(value.at, path, fmt::format("found {}; allowed: a text", found(value)));
    std::size_t characters = 0;
    for (std::string_view rest = *text; !rest.empty(); ++characters) {
        const Utf8Character next = first_character(rest);
        if (next.code < 0x20 || next.code == 0x7F) {
            return problem(
                value.at, path,
                fmt::format("found {} with a control character; allowed: {}", shown(*text), allowed(key)));
        }
        rest.remove_prefix(next.bytes);
    }
    if (characters > longest_title) {
        return problem(
            value.at, path,
            fmt::format("found {} of {} characters; allowed: {}", shown(*text), characters, allowed(key)));
    }
    return Checked{value.at, true, 0.0, *text, {}};
}

Outcome check_word(const Key& key, std::string_view path, const Value& value) {
    const auto known = words(key.type);
    const auto* word = std::get_if<std::string>(&value.data);
    if (word == nullptr) {
        return problem(value.at, path,
                       fmt::format("found {}; allowed: {}, in quotation marks", found(value), one_of(known)));
    }
    if (std::ranges::find(known, *word) == known.end()) {
        return problem(value.at, path,
                       fmt::format("{} is not known; {}allowed: {}", shown(*word), nearest_is(*word, known),
                                   one_of(known)));
    }
    Checked checked{value.at, true, 0.0, *word, {}};
    if (key.type == KeyType::metal) checked.number = solver::find_metal(*word)->conductivity;
    if (key.type == KeyType::methods) {
        const auto available = solver::available_methods();
        if (std::ranges::find(available, *word, solver::name) == available.end()) {
            std::vector<std::string_view> names;
            for (const solver::Method method : available) names.push_back(solver::name(method));
            return problem(
                value.at, path,
                fmt::format("method '{}' is not part of this version; available: {}", *word, one_of(names)));
        }
    }
    return checked;
}

Outcome check_item(const Key& key, std::string_view path, const Value& value) {
    return key.type == KeyType::frequencies ? check_quantity(Dimension::frequency, path, value)
                                            : check_word(key, path, value);
}

bool same(const Key& key, const Checked& a, const Checked& b) {
    return key.type == KeyType::frequencies ? a.number == b.number : a.text == b.text;
}

Outcome check_list(const Key& key, std::string_view path, const Value& value) {
    const std::string example = key.type == KeyType::frequencies ? "[\"869.5 MHz\"]" : "[\"aperture\"]";
    const auto* list = std::get_if<List>(&value.data);
    if (list == nullptr) {
        return problem(value.at, path,
                       fmt::format("found {}; allowed: a list, written like {}", found(value), example));
    }
    if (list->empty())
        return problem(value.at, path, fmt::format("found an empty list; write one like {}", example));
    if (list->size() > most_pattern_frequencies) {
        return problem(
            value.at, path,
            fmt::format("found {} entries; allowed: at most {}", list->size(), most_pattern_frequencies));
    }
    Checked checked{value.at, true, 0.0, {}, {}};
    ProblemList problems;
    for (const Value& entry : *list) {
        const Outcome item = check_item(key, path, entry);
        if (const auto* bad = std::get_if<std::vector<CaseProblem>>(&item)) {
            problems.add(*bad);
            continue;
        }
        const auto& good = std::get<Checked>(item);
        const auto earlier =
            std::ranges::find_if(checked.items, [&](const Checked& c) { return same(key, c, good); });
        if (earlier != checked.items.end()) {
            problems.add(problem(entry.at, path,
                                 fmt::format("\"{}\" stands twice, first as \"{}\" at {}; name each once",
                                             good.text, earlier->text, text(earlier->at))));
        }
        checked.items.push_back(good);
    }
    if (!problems.empty()) return problems.sorted();
    return checked;
}

}  // namespace

std::string text(Position at) {
    return fmt::format("{}:{}", at.line, at.column);
}

Outcome check_number(const Key& key, std::string_view path, const Value& value) {
    const auto kind = dimension(key.type);
    return kind ? check_quantity(*kind, path, value) : check_bare(key, path, value);
}

Outcome check_value(const Key& key, std::string_view path, const Value& value) {
    if (key.type == KeyType::text) return check_text(key, path, value);
    if (key.type == KeyType::frequencies || key.type == KeyType::methods) return check_list(key, path, value);
    if (!is_numeric(key.type)) return check_word(key, path, value);

    Outcome outcome = check_number(key, path, value);
    if (const auto* checked = std::get_if<Checked>(&outcome)) {
        const bool small = checked->number < bound(key, key.smallest);
        if (small || checked->number > bound(key, key.largest)) {
            return problem(value.at, path,
                           fmt::format("{} is too {}; allowed: {}", found(value), small ? "small" : "large",
                                       allowed(key)));
        }
    }
    return outcome;
}

}  // namespace panelwright::io
