#include <fmt/format.h>

#include <iterator>

#include "io/dataset_table.hpp"
#include "io/result_file.hpp"

namespace panelwright::io {
namespace {

constexpr std::string_view introduction = R"(# Layout of a result file

One HDF5 file holds one design. This page is generated from the table that the program writes and reads by.

- Format: superblock 0 and objects of the oldest kind, so readers built on HDF5 1.8 open it. Nothing is compressed.
- Numbers are 64-bit floats or 32-bit integers, little-endian; a complex number is a compound of two floats `r` and `i`,
  which h5py reads as complex128. Text is UTF-8 of variable length. NaN = does not exist.
- Order of the dimensions: as in C, the last one fastest. Languages that count the first one fastest show them reversed:
  go by the names of the dimensions.
- Every dataset has the attributes `units` (SI, or as the name says; `1` = pure number, `text` = no number) and
  `description`. Every dimension has a label and an attached dimension scale of that name.
- A frequency in `/METHOD/pattern/frequency_hz` belongs to one pattern, one set of figures and one set of currents; the
  frequencies in `/frequency_hz` are those of the port response. Both scales bear the name `frequency`.
- Angles are rounded to 1e-10 degree, so a whole degree is found by comparing for equality.
- A file is written in memory and then to disk in one go, and read likewise: no file stays open or locked.
- `format_version` rises with every change that an older program could not read; a program refuses files of a newer
  version than its own.

METHOD stands for `aperture`, `strip` or `surface`; the root attribute `methods` lists those in the file.
)";

constexpr std::string_view example = R"(
## Reading it with Python

```python
import h5py

with h5py.File("result.h5", "r") as file:
    for method in file.attrs["methods"]:
        pattern = file[method]["pattern"]
        theta, phi = pattern["theta_deg"][:], pattern["phi_deg"][:]
        gain = pattern["gain_dbi"][0]  # first pattern frequency
        e_plane = gain[:, phi == 0]
        print(method, gain.max(), file[method]["figures/front_to_back_db"][0])
```

On a network disk that cannot lock files, a reader of its own may refuse to open a file; the HDF5 library then takes the
environment variable `HDF5_USE_FILE_LOCKING=FALSE`.
)";

std::string_view word(Element element) {
    switch (element) {
        case Element::real:
            return "real";
        case Element::complex:
            return "complex";
        case Element::integer:
            return "integer";
        case Element::text:
            return "text";
    }
    return "";
}

std::string shape(const DatasetEntry& entry) {
    if (entry.path == "/METHOD/health/NAME") return "scalar or (P)";
    if (entry.shape.empty()) return "scalar";
    std::string symbols;
    for (const Axis axis : entry.shape) {
        symbols += fmt::format("{}{}", symbols.empty() ? "" : ", ", axis_entry(axis).symbol);
    }
    return fmt::format("({})", symbols);
}

/// `text` fit for a cell of a table.
std::string cell(std::string_view text) {
    std::string result;
    for (const char c : text) {
        if (c == '|') result += '\\';
        result += c;
    }
    return result;
}

}  // namespace

std::string datasets_markdown() {
    fmt::memory_buffer page;
    const auto out = std::back_inserter(page);
    fmt::format_to(out, "{}\nThis is version {} of the layout.\n\n", introduction, result_format_version);
    fmt::format_to(out, "## Attributes\n\n| object | name | type | content |\n| --- | --- | --- | --- |\n");
    for (const AttributeEntry& entry : attribute_table()) {
        fmt::format_to(out, "| `{}` | `{}` | {} | {} |\n", entry.object, entry.name, entry.type,
                       cell(entry.description));
    }
    fmt::format_to(out, "\n## Dimensions\n\n| length | name | dimension scale |\n| --- | --- | --- |\n");
    for (const AxisEntry& entry : axis_table()) {
        fmt::format_to(out, "| {} | `{}` | `{}` |\n", entry.symbol, entry.name, entry.scale);
    }
    fmt::format_to(out,
                   "\n## Datasets\n\n| path | shape | elements | units | content | present |\n"
                   "| --- | --- | --- | --- | --- | --- |\n");
    for (const DatasetEntry& entry : dataset_table()) {
        fmt::format_to(out, "| `{}` | {} | {} | {} | {} | {} |\n", entry.path, shape(entry),
                       word(entry.element), entry.units, cell(entry.description), entry.present);
    }
    fmt::format_to(out, "{}", example);
    return fmt::to_string(page);
}

}  // namespace panelwright::io
