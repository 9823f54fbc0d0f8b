/// The variations of a case.
#pragma once

#include <string>
#include <string_view>
#include <vector>

#include "io/case.hpp"
#include "io/case_reading.hpp"

namespace panelwright::io {

/// A well-formed [[vary]] block.
struct VaryBlock {
    Variation variation;
    std::string from, to, step;  ///< as written, units included; empty where the block lists its values
    bool bare = false;           ///< true: values are bare numbers, without quotation marks
};

/// All variations of a file.
struct VaryReading {
    std::vector<VaryBlock> blocks;
    std::vector<CaseProblem> problems;  ///< in the order of the file
};

/// Checks that every [[vary]] block is well-formed: numeric keys that this case has, of one type, each varied
/// once; values with the right unit; a step that leads from `from` to `to`; not more than `most_designs`
/// designs in all. Whether a value suits its key and the others is a matter of each design and not checked
/// here.
VaryReading read_variations(const Members& document, const Reading& reading);

/// `document` without variations and with value `index` of block `block` (both from 0) put at the block's
/// keys. The values take the place of the block's text, so that problems of the design point there.
Members with_variation(Members document, const Members& original, const Variation& variation,
                       std::size_t block, std::size_t index);

/// Number of designs of the full grid.
std::size_t grid_size(const std::vector<Variation>& variations);

/// For each variation, which of its values design `index` of the grid has; the last variation is the fastest.
std::vector<std::size_t> grid_position(const std::vector<Variation>& variations, std::size_t index);

}  // namespace panelwright::io
