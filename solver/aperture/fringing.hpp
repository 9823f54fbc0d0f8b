/// Fringing of the patch's edges: the resonant frequency and the size of the equivalent cavity.
///
/// The field that bulges out of the gap under the patch's edges is that of a magnetic line current along the
/// rim, of the edge voltage's strength, over the reflector. Its complex power loads the patch, taken as a
/// wide transmission line, and gives the resonance:
///
///  - the line current has the radius h/(pi e). With it the susceptance of an infinitely long edge,
///    (k/eta)(1/pi) ln(2/(gamma k a)) a metre, is exactly that of the open parallel-plate guide of height 2h:
///    N. Marcuvitz, Waveguide Handbook, 1951, sec. 4.6a; and a wide microstrip's capacitance is the exact
///    asymptote (2/pi)(1 + ln(pi W/h));
///  - it runs half a height outside the patch's edges, the one constant fitted (to the author's own full
///  solution of
///    air patches over an unbounded plane: 0.01 <= h/lambda <= 0.06, 0.6 <= W/L <= 1.6; see
///    docs/verification.md);
///  - its power is evaluated with the full dynamic kernel exp(-jkR)/R round the whole rim, so that the
///  coupling between
///    the two radiating edges, their finite width and the retarded field of a thick patch are included;
///  - a dielectric adds the capacitance (1.41/pi)(permittivity - 1) a metre of edge in units of the vacuum
///  permittivity:
///    W. C. Chew & J. A. Kong, IEEE Trans. Microwave Theory Tech. 28(2), 98-104, 1980 (constant of the disk
///    formula).
#pragma once

#include "mesh/panel.hpp"

namespace panelwright::solver {

/// What the fringing field makes of a patch.
struct Fringing {
    double resonance = 0.0;  ///< of the fundamental mode, patch alone over an unbounded reflector [Hz]
    double extension = 0.0;  ///< by which the cavity outreaches the patch at each end [m]
    double effective_permittivity = 1.0;  ///< of the wave along x under the patch
};

/// Fringing of `patch` above `spacer`. Valid for 0.005 <= h/lambda <= 0.15 in the dielectric and W/h >= 2; a
/// thick sheet counts as a wider thin one. Throws std::invalid_argument when a dimension is not positive.
Fringing fringing(const mesh::Patch& patch, const mesh::Spacer& spacer);

}  // namespace panelwright::solver
