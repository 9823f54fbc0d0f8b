#include "io/quantity.hpp"

#include <fmt/format.h>

#include <array>
#include <charconv>
#include <cmath>
#include <system_error>
#include <vector>

#include "io/suggest.hpp"

namespace panelwright::io {

namespace {

// One inch is 25.4 mm exactly (international yard and pound agreement, 1959); one mil is a thousandth of it.
constexpr std::array<Unit, 5> length_units = {
    {{"mm", 1.0, 1e3}, {"cm", 1.0, 1e2}, {"m", 1.0, 1.0}, {"in", 254.0, 1e4}, {"mil", 254.0, 1e7}}};
constexpr std::array<Unit, 4> frequency_units = {
    {{"Hz", 1.0, 1.0}, {"kHz", 1e3, 1.0}, {"MHz", 1e6, 1.0}, {"GHz", 1e9, 1.0}}};
constexpr std::array<Unit, 1> resistance_units = {{{"ohm", 1.0, 1.0}}};
constexpr std::array<Unit, 1> conductivity_units = {{{"S/m", 1.0, 1.0}}};

constexpr std::array<Dimension, 4> dimensions = {Dimension::length, Dimension::frequency,
                                                 Dimension::resistance, Dimension::conductivity};

constexpr std::string_view blanks = " \t";

std::string_view trimmed(std::string_view text) {
    const std::size_t first = text.find_first_not_of(blanks);
    if (first == std::string_view::npos) return {};
    return text.substr(first, text.find_last_not_of(blanks) - first + 1);
}

const Unit* find_unit(std::string_view text, Dimension dimension) {
    for (const Unit& unit : units(dimension)) {
        if (unit.name == text) return &unit;
    }
    return nullptr;
}

std::string unit_problem(std::string_view found, std::string_view number, Dimension dimension) {
    if (found.empty()) {
        return fmt::format("{} has no unit; write \"{} {}\" (allowed units: {})", shown(number),
                           shortened(number), usual_unit(dimension).name, unit_list(dimension));
    }
    if (found.front() == ',') {
        return fmt::format("{} holds a comma; write the decimal point as \".\"",
                           shown(std::string(number) + std::string(found)));
    }
    for (const Dimension other : dimensions) {
        if (other != dimension && find_unit(found, other) != nullptr) {
            return fmt::format("\"{}\" is a unit of {}; allowed here are those of {}: {}", found, name(other),
                               name(dimension), unit_list(dimension));
        }
    }
    std::vector<std::string_view> known;
    for (const Unit& unit : units(dimension)) known.push_back(unit.name);
    return fmt::format("{} is no unit of {}; {}allowed units: {}", shown(found), name(dimension),
                       nearest_is(found, known), unit_list(dimension));
}

}  // namespace

std::string_view name(Dimension dimension) {
    switch (dimension) {
        case Dimension::length:
            return "length";
        case Dimension::frequency:
            return "frequency";
        case Dimension::resistance:
            return "resistance";
        case Dimension::conductivity:
            break;
    }
    return "conductivity";
}

std::span<const Unit> units(Dimension dimension) {
    switch (dimension) {
        case Dimension::length:
            return length_units;
        case Dimension::frequency:
            return frequency_units;
        case Dimension::resistance:
            return resistance_units;
        case Dimension::conductivity:
            break;
    }
    return conductivity_units;
}

const Unit& usual_unit(Dimension dimension) {
    return dimension == Dimension::frequency ? frequency_units[2] : units(dimension).front();
}

std::string unit_list(Dimension dimension) {
    std::string list;
    for (const Unit& unit : units(dimension)) {
        if (!list.empty()) list += ", ";
        list += unit.name;
    }
    return list;
}

std::variant<Quantity, std::string> parse_quantity(std::string_view text, Dimension dimension) {
    const std::string_view whole = trimmed(text);
    const std::string example =
        fmt::format("a {} is written like \"53 {}\" (allowed units: {})", name(dimension),
                    usual_unit(dimension).name, unit_list(dimension));
    if (whole.empty()) return "found an empty text; " + example;

    // from_chars knows no leading plus sign; a second sign after it stays an error.
    const bool plus = whole.front() == '+' && whole.size() > 1 && whole[1] != '-';
    const std::string_view digits = plus ? whole.substr(1) : whole;
    double number = 0.0;
    const auto [end, status] = std::from_chars(digits.data(), digits.data() + digits.size(), number);
    if (status == std::errc::invalid_argument)
        return fmt::format("{} is no number with a unit; {}", shown(text), example);
    const auto used = static_cast<std::size_t>(end - digits.data());
    const std::string_view written = digits.substr(0, used);
    if (status == std::errc::result_out_of_range) {
        return fmt::format("{} is too large or too small for a number of double precision", shown(text));
    }
    if (!std::isfinite(number)) return fmt::format("{} is not finite; {}", shown(text), example);

    const std::string_view unit_text = trimmed(digits.substr(used));
    const Unit* unit = find_unit(unit_text, dimension);
    if (unit == nullptr) return unit_problem(unit_text, written, dimension);
    const double si = number * unit->times / unit->over;
    if (!std::isfinite(si)) {
        return fmt::format("{} is too large for a number of double precision", shown(text));
    }
    return Quantity{si, number, *unit, fmt::format("{} {}", written, unit->name)};
}

std::string rounded(double number) {
    return fmt::format("{:.12g}", number == 0.0 ? 0.0 : number);
}

std::string shortest(double number) {
    return fmt::format("{}", number);
}

std::string with_point(std::string number) {
    return number.find_first_of(".en") == std::string::npos ? number + ".0" : number;
}

}  // namespace panelwright::io
