/// The aperture method's picture of a panel: cavity, pillars, feed line, rim and plate.
#pragma once

#include <vector>

#include "mesh/panel.hpp"
#include "solver/aperture/cavity.hpp"
#include "solver/aperture/fringing.hpp"
#include "solver/aperture/rim.hpp"

namespace panelwright::solver {

/// What lies between the feed's foot and the cavity, without loss: from the cavity outwards an inductance and
/// a line. All zero for a pin. The upright part has no inductance of its own here: the cavity's field of its
/// current holds it.
struct FeedLine {
    double slit_inductance = 0.0;  ///< of the strip between its slits [H]
    double impedance = 0.0;        ///< characteristic, of the strip past the patch's edge [ohm]
    double length = 0.0;           ///< of that strip [m]
    double slowness = 1.0;         ///< square root of its effective permittivity
};

/// A panel as the aperture method sees it.
struct ApertureModel {
    Fringing fringe;
    Cavity cavity;
    std::vector<Pillar> pillars;  ///< the feed first, then the posts
    FeedLine line;
    Rim rim;
    Plate plate;
};

/// Builds the picture. The cavity outreaches the patch by the open-end extension on all four sides; the rim
/// runs along its walls, at twice the patch's height.
///
/// A tab's strip between the slits is a line coupled to the patch beside it: with the capacitances a metre
/// C_s to the reflector (a parallel plate) and C_m to the patch across the slits (coplanar strip in free
/// space, 4 e0 K(m)/K(1 - m), m = (w/(w + 2 g))^2; C. P. Wen, IEEE Trans. Microwave Theory Tech. 17(12),
/// 1969), the strip's voltage follows that of the patch by the share C_m/(C_s + C_m) and stays at that of the
/// slits' end by the rest. By reciprocity its current enters the patch's field in the same shares, at the
/// patch's edge and at the slits' end; the strip's own inductance is mu0 e0/(C_s + C_m) a metre, both taken
/// in air. Over a thin laminate C_s rules and the usual inset feed comes out; under a thick air patch the
/// slits hardly lower the resistance and act as a series inductance. The slits' effect on the mode is left
/// out.
ApertureModel aperture_model(const mesh::Panel& panel);

/// Impedance at the foot of `line` when it ends in `load` [ohm].
Complex at_foot(const FeedLine& line, const Wave& wave, Complex load);

/// Loss tangents that make up the cavity's effective one, apart from radiation.
struct CavityLoss {
    double conductor = 0.0;
    double dielectric = 0.0;
    double surface_wave_share = 0.0;  ///< surface-wave power over space-wave power
};

/// Losses at one frequency: conductor = (skin depth of patch + skin depth of reflector) / (2 h) for sheets
/// thicker than the skin depth (C. A. Balanis, Antenna Theory, 4th ed., sec. 14.2.6); dielectric = loss
/// tangent times the share of electric energy in the spacer, er (ee - 1) / (ee (er - 1)) (K. C. Gupta et al.,
/// Microstrip Lines and Slotlines, 1979, ch. 2); surface wave: D. R. Jackson & N. G. Alexopoulos, IEEE Trans.
/// Antennas Propag. 39(3), 407-410, 1991.
CavityLoss cavity_loss(const mesh::Panel& panel, const ApertureModel& model, const Wave& wave);

}  // namespace panelwright::solver
