/// A case with all defaults filled in.
#pragma once

#include <string>
#include <vector>

#include "io/case_reading.hpp"
#include "io/case_vary.hpp"

namespace panelwright::io {

/// TOML with every key that applies, in the order of the key table, units as the file has them.
std::string resolved(const Reading& reading, const std::vector<VaryBlock>& blocks);

/// `text` as a TOML string, quotation marks included.
std::string toml_string(std::string_view text);

}  // namespace panelwright::io
