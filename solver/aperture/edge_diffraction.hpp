/// Diffraction at the reflector's edges as equivalent edge currents: first order, slope, and between edges.
///
/// The wave of the rim grazes the plate, so that at each edge point it is a surface current J on the unbroken
/// plate that runs towards the edge. The exact half-plane solution turns it into J times 1 - 2 K(sqrt(2 k u)
/// sin b) at the distance u along the diffracted ray on the plate (K the normalised Fresnel integral), plus
/// terms singular at the edge for the part along it. What this differs from the unbroken current is the
/// fringe current; its radiation, integrated along the ray, is the fringe edge current in the manner of A.
/// Michaeli, IEEE Trans. Antennas Propag. 34(7), 912-918, 1986, here for grazing incidence on a half-plane,
/// where it stays finite but for one direction in the plate's plane:
///
///     across the edge       I_n = -sin b / (j k) / (r (r + sqrt2 sin b)),            r = sqrt(1 - s.u)
///     along it, hard        I_t = (sqrt2 - sin b / (r + sqrt2 sin b)) / (j k r)
///     along it, slope       I_s = 1 / (j k sqrt2 (r + sqrt2 sin b))
///
/// with s the direction of observation, u that of the diffracted ray on the plate and b its angle to the
/// edge. "Hard" is the part whose magnetic field is transverse to the ray; "slope" the rest, whose field
/// vanishes at the plate (slope diffraction of the soft case; R. G. Kouyoumjian & P. H. Pathak, Proc. IEEE
/// 62(11), 1448-1461, 1974). In two dimensions they are (1 - sin(phi/2))/cos(phi/2) and (1 -
/// sin(phi/2))/cos^2(phi/2), the difference between the exact grazing coefficients and those of the
/// physical-optics current.
///
/// Between edges: the fringe current of one edge runs over the plate to another as 2 K(...) J times the
/// spherical spreading sqrt(s1/(s1 + d)). There the current that would run on is taken away, its decay giving
/// the transition function F of Kouyoumjian & Pathak, and it is diffracted like the first. Bounces between
/// opposite edges are summed as a geometric series.
#pragma once

#include <Eigen/Core>
#include <vector>

#include "solver/aperture/rim.hpp"

namespace panelwright::solver {

/// A short piece of an edge with the wave that meets it.
struct EdgePiece {
    Eigen::Vector2d place;    ///< [m]
    Eigen::Vector2d outward;  ///< unit normal of the edge in the plate's plane
    Eigen::Vector2d along;    ///< unit tangent
    double sine = 1.0;        ///< of the angle between incident ray and edge
    double cosine = 0.0;      ///< of that angle
    double weight = 0.0;      ///< length [m]
    double span = 0.0;        ///< length of the diffracted ray on the plate [m]
    double run = 0.0;  ///< length of the ray from the edge it comes from [m]; 0 = straight from the rim
};

/// All pieces, and the currents that meet them.
struct EdgeWaves {
    std::vector<EdgePiece> pieces;  ///< (e)
    Eigen::MatrixXcd hard;          ///< (e, s) current along the ray on the unbroken plate, per source [A/m]
    Eigen::MatrixXcd slope;         ///< (e, s) rest of the current along the edge [A/m]
};

/// How many times a wave may meet an edge.
enum class DiffractionOrder { first, second };

/// Pieces of the four edges of `plate` lit by the field of a rim; rays start under the patch centre (the
/// origin), which must lie inside the plate (else std::invalid_argument).
EdgeWaves edge_waves(const Plate& plate, const PlateField& field, double wavenumber, DiffractionOrder order);

/// Radiation of one piece in a direction: factors of the currents along outward normal and tangent [m^2].
struct EdgeFactors {
    Complex hard_outward;
    Complex hard_along;
    Complex slope_along;
};

/// Factors of `piece` for the direction whose in-plane components (sin theta cos phi, sin theta sin phi) are
/// `direction`, phase of the place included.
EdgeFactors edge_factors(const EdgePiece& piece, double wavenumber, const Eigen::Vector2d& direction);

}  // namespace panelwright::solver
