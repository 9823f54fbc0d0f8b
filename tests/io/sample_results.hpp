/// Results made up from plain formulas: quick to make, easy to repeat in another language.
#pragma once

#include "io/result_file.hpp"
#include "solver/result.hpp"

namespace panelwright::test {

/// Two methods, the second with everything a result can have: probe feed, two posts, a mesh with port edges,
/// two pattern frequencies, currents, health and remarks. The numbers include thirds, NaN, an infinity and
/// -0. read_result.py knows the formulas.
solver::Result sample_result();

/// One method with only a port response; tab feed, no posts, no patterns, no mesh.
solver::Result port_only_result();

/// One method with a pattern every two degrees and currents on at least `triangles` triangles, the size of an
/// everyday design.
solver::Result everyday_result(int triangles);

/// A provenance with a character outside ASCII.
io::Provenance sample_provenance();

}  // namespace panelwright::test
