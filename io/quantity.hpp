/// Numbers with a unit, as a person writes them: "53 mm", "2.1 in", "5.8e7 S/m".
#pragma once

#include <span>
#include <string>
#include <string_view>
#include <variant>

namespace panelwright::io {

/// What kind of quantity a text stands for.
enum class Dimension { length, frequency, resistance, conductivity };

/// "length", "frequency", "resistance" or "conductivity".
std::string_view name(Dimension dimension);

/// A unit: SI value = number * times / over. Two factors, because a division by a power of ten is rounded
/// once where a product with its inverse is rounded twice: "53 mm" must be the same double as 0.053.
struct Unit {
    std::string_view name;
    double times;
    double over;
};

/// All units of `dimension`, in the order they are shown.
std::span<const Unit> units(Dimension dimension);

/// The unit that examples and defaults use: mm, MHz, ohm or S/m.
const Unit& usual_unit(Dimension dimension);

/// "mm, cm, m, in, mil"
std::string unit_list(Dimension dimension);

/// A number with its unit.
struct Quantity {
    double si = 0.0;      ///< value in m, Hz, ohm or S/m; finite
    double number = 0.0;  ///< as it stands before the unit
    Unit unit = {};
    std::string text;  ///< number as written, one blank, unit: "53 mm"
};

/// Reads `text`: a decimal number (no "inf", no "nan", no hexadecimal), blanks or none, a unit with its exact
/// letters. Gives the quantity, or one sentence saying what was found and what is allowed.
std::variant<Quantity, std::string> parse_quantity(std::string_view text, Dimension dimension);

/// `number` with twelve significant digits, trailing zeros dropped: 0.1 + 0.2 gives "0.3".
std::string rounded(double number);

/// The shortest decimal text that reads back as the same double.
std::string shortest(double number);

/// `number` with ".0" where it has neither point nor exponent: how a bare number stands in a file.
std::string with_point(std::string number);

}  // namespace panelwright::io
