// docs/case-format.md, made from the key table.
#include <fmt/format.h>

#include <cmath>

#include "io/case.hpp"
#include "io/case_keys.hpp"
#include "io/case_rules.hpp"
#include "solver/materials.hpp"

namespace panelwright::io {

namespace {

constexpr std::string_view opening =
    R"(<!-- Made from io/case_key_table.cpp and io/case_docs.cpp by the build target docs_pages; change it there. -->
# The case file

A case file describes one antenna, or a study of many, and what is to be computed. It is a text in TOML 1.0, UTF-8, of at
most 1 MiB. `panelwright check CASE.toml` reads it and says what would run; `panelwright keys` prints the tables below.

```toml
title = "River gauge, smallest case"

[band]
from = "850 MHz"
to = "890 MHz"

[patch]
length = "152 mm"
width = "180 mm"

[spacer]
height = "12 mm"

[feed]
kind = "probe"
x = "-40 mm"
diameter = "3 mm"

[reflector]
length = "260 mm"
width = "280 mm"
```

Everything that this file leaves out has a default, and the results hold the file twice: as it is, and with all defaults
filled in.

## Frame

The frame is right-handed. z points from the reflector to the patch, the main beam's way. The origin lies on the reflector's
upper face under the patch centre; x runs along the patch's resonant length, y along its width. A tab sits at the edge
x = -length/2.

## Values

A value with a dimension is a text with its unit, `"53 mm"` or `"53mm"`; a bare number in its place is an error. Numbers
without a dimension stand bare: `permittivity = 2.2`. Letters count: `MHz` is a unit, `mhz` is none.

)";

constexpr std::string_view varying = R"(## Variations

Each `[[vary]]` block names keys that move together, and their values either one by one or as a range. Several blocks make a
full grid, in which the last block moves fastest. The file without its variations must be a sound case, and each design is
then checked as if its values had been typed into the file: a design that breaks a rule fails, the others run.

```toml
[[vary]]
keys = ["reflector.length", "reflector.width"]
from = "160 mm"
to = "400 mm"
step = "20 mm"

[[vary]]
keys = ["spacer.permittivity"]
values = [1.0, 1.07]
```

A range ends at `to`, or with the last step before it. Its values are written in the unit of `from`. Posts are named by their
number, counted from 1: `post[1].x`.

## Problems

All problems of a file are reported together, one a line, as `FILE:LINE:COLUMN: what was found, what is allowed`. Lines and
columns count from 1, columns in characters. What is missing is reported at its table's header.
)";

std::string units_table() {
    std::string text = "| quantity | units |\n| --- | --- |\n";
    for (const Dimension kind :
         {Dimension::length, Dimension::frequency, Dimension::resistance, Dimension::conductivity}) {
        text += fmt::format("| {} | {} |\n", name(kind), unit_list(kind));
    }
    return text + "\nAn inch is 25.4 mm, a mil is a thousandth of an inch.\n\n";
}

std::string keys_of(const TableEntry* table) {
    std::string text = "| key | type | default | allowed | meaning |\n| --- | --- | --- | --- | --- |\n";
    const auto entries = key_table();
    for (std::size_t i = 0; i < entries.size(); ++i) {
        if (case_keys()[i].table != (table == nullptr ? std::string_view() : table->name)) continue;
        const KeyEntry& entry = entries[i];
        text += fmt::format("| `{}` | {} | {} | {} | {} |\n", case_keys()[i].name, entry.type,
                            entry.default_value, entry.bounds, entry.description);
    }
    return text + "\n";
}

std::string all_keys() {
    std::string text = "## Keys\n\nOutside all tables:\n\n" + keys_of(nullptr);
    for (const TableEntry& table : case_tables()) {
        text += fmt::format("### {}{}\n\n{}\n\n{}", table.header, table.required ? "" : " (may be absent)",
                            table.description, keys_of(&table));
    }
    return text;
}

std::string rules() {
    return fmt::format(
        R"(## Rules between keys

- `band.from` is not above `band.to`; neighbouring frequencies lie at least {} Hz apart; every `band.pattern_at` is inside the band.
- `spacer.height` is {} to {} wavelengths in the spacer at the band's centre. On a thinner one the loss in the metal outweighs
  radiation; over a thicker one the patch no longer lives on its fundamental mode, and no method here has been checked.
- The resonance to be expected of `patch.length` (half a wavelength over this spacer, with Hammerstad's open-end extension)
  lies within a factor of {} of the band. With posts, which can make a quarter-wave patch, the band may lie a factor of {} below.
- `reflector.length` and `reflector.width` are at most {} wavelengths at `band.to`: a larger plate changes the beam no more, and a
  full solution of this one already takes 220,000 unknowns.
- `metal` and `conductivity` of one part exclude each other.
- The sheet is thinner than the spacer is high. Pin and posts lie on the patch and on the reflector, clear of each other and of
  the tab with its slits; the tab's foot stands on the reflector; the patch reaches past the reflector by at most a quarter of
  its side.

)",
        smallest_step, thinnest_spacer, thickest_spacer, resonance_margin, margin_with_posts,
        largest_reflector);
}

// 5.813e7
std::string power_of_ten(double number) {
    const double exponent = std::floor(std::log10(number));
    return fmt::format("{:.4g}e{:.0f}", number / std::pow(10.0, exponent), exponent);
}

std::string metal_table() {
    std::string text =
        "## Metals\n\nConductivities at 20 degrees Celsius. Brackets tell how a number was taken: read as "
        "quoted, in a text that "
        "quotes the book; memory, recalled and not read again.\n\n"
        "| metal | S/m | remark | source |\n| --- | --- | --- | --- |\n";
    for (const solver::Metal& metal : solver::metals()) {
        const std::string value =
            std::isinf(metal.conductivity) ? "infinite" : power_of_ten(metal.conductivity);
        text += fmt::format("| `{}` | {} | {} | {} |\n", metal.name, value, metal.remark, metal.source);
    }
    return text + "\n";
}

}  // namespace

std::string case_format_markdown() {
    return std::string(opening) + units_table() + all_keys() + metal_table() + rules() + std::string(varying);
}

}  // namespace panelwright::io
