/// Metals and their conductivities.
#pragma once

#include <optional>
#include <span>
#include <string_view>

namespace panelwright::solver {

/// A metal as a sheet or pin is made of it.
struct Metal {
    std::string_view name;    ///< as in a case file: "brass"
    double conductivity;      ///< at 20 degrees Celsius [S/m]; infinite for a perfect metal
    std::string_view remark;  ///< what the number stands for and how far to trust it; may be empty
    std::string_view source;  ///< where the number comes from
};

/// All named metals, best conductor first. Conductivities are those of non-magnetic metals: for magnetic ones
/// and for thin coats the number is that of a non-magnetic metal with the same surface resistance near 1 GHz,
/// and says so.
std::span<const Metal> metals();

/// The metal called `name`, or nothing.
std::optional<Metal> find_metal(std::string_view name);

}  // namespace panelwright::solver
