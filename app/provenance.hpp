/// Which program made a result, when and where.
#pragma once

#include <string>

#include "io/result_file.hpp"

namespace panelwright::app {

/// "panelwright 0.1.0 (commit 1a2b3c4)"
std::string version_line();

/// This program, this machine, now.
io::Provenance provenance(int threads);

/// True when `stored` comes from the same version and commit as this program.
bool same_program(const io::Provenance& stored);

}  // namespace panelwright::app
