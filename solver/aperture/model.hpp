/// The aperture method's picture of a panel: cavity, pillars, feed line, rim and plate.
#pragma once

#include <vector>

#include "mesh/panel.hpp"
#include "solver/aperture/cavity.hpp"
#include "solver/aperture/fringing.hpp"
#include "solver/aperture/rim.hpp"

namespace panelwright::solver {

/// A lossless line from the feed's foot to the place where its current enters the cavity.
struct FeedLine {
    double impedance = 0.0;   ///< characteristic [ohm]; 0 = no line
    double length = 0.0;      ///< [m]
    double slowness = 1.0;    ///< square root of the effective permittivity
    double inductance = 0.0;  ///< of the upright part at the foot [H]
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

/// Builds the picture. The cavity outreaches the patch by the open-end extension on all four sides; the rim carries the
/// radiating edges at the cavity's ends, half a height beyond the patch's sides, at the patch's height. A tab is a
/// microstrip line as long as notch and reach together, ending in a strip inductance where it is bent down; the slits
/// beside it are taken as closed.
ApertureModel aperture_model(const mesh::Panel& panel);

/// Impedance at the foot of `line` when it ends in `load` [ohm].
Complex at_foot(const FeedLine& line, const Wave& wave, Complex load);

/// Loss tangents that make up the cavity's effective one, apart from radiation.
struct CavityLoss {
    double conductor = 0.0;
    double dielectric = 0.0;
    double surface_wave_share = 0.0;  ///< surface-wave power over space-wave power
};

/// Losses at one frequency: conductor = (skin depth of patch + skin depth of reflector) / (2 h) for sheets thicker than
/// the skin depth (C. A. Balanis, Antenna Theory, 4th ed., sec. 14.2.6); dielectric = loss tangent times the share of
/// electric energy in the spacer, er (ee - 1) / (ee (er - 1)) (K. C. Gupta et al., Microstrip Lines and Slotlines, 1979, ch. 2);
/// surface wave: D. R. Jackson & N. G. Alexopoulos, IEEE Trans. Antennas Propag. 39(3), 407-410, 1991.
CavityLoss cavity_loss(const mesh::Panel& panel, const ApertureModel& model, const Wave& wave);

}  // namespace panelwright::solver
