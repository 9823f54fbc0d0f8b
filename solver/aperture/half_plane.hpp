/// The perfectly conducting half-plane: exact field, uniform diffraction coefficients and current near the
/// edge.
///
/// exp(+j omega t). The half-plane is seen along its edge; phi runs round the edge from one face (phi = 0) to
/// the other (phi = 2 pi). The scalar u is the field component parallel to the edge: E for the soft
/// half-plane (u = 0 on both faces), H for the hard one (no normal derivative there).
#pragma once

#include "solver/far_field.hpp"

namespace panelwright::solver {

/// What holds on the faces.
enum class EdgeCondition {
    soft,  ///< u = 0: electric field parallel to the edge
    hard,  ///< du/dn = 0: magnetic field parallel to the edge
};

/// Total field at (rho, phi) for the unit plane wave exp(j k rho cos(phi - phi_incident)) that comes from
/// `phi_incident`. Exact. `k_rho` = k rho >= 0; angles in 0..2 pi [rad]. For incidence at an angle beta to
/// the edge put k sin(beta) for k. A. Sommerfeld, Math. Ann. 47, 317-374, 1896; C. A. Balanis, Advanced
/// Engineering Electromagnetics, ch. 13. Throws std::invalid_argument outside those ranges.
Complex half_plane_field(EdgeCondition condition, double k_rho, double phi, double phi_incident);

/// The same without diffraction: incident and reflected wave where geometrical optics has them, nothing in
/// the shadow.
Complex half_plane_optics(EdgeCondition condition, double k_rho, double phi, double phi_incident);

/// Loss behind a knife edge [dB] over free space, for v of either sign (v > 0: path obstructed, 0: edge on
/// the line of sight). Exact for the absorbing half-screen of Rec. ITU-R P.526, sec. 4.1, which approximates
/// it by J(v).
double knife_edge_loss_db(double v);

/// A ray that is diffracted by the edge.
struct EdgeRay {
    double wavenumber;          ///< k > 0 [rad/m]
    double distance_parameter;  ///< L > 0 [m]: s sin^2(beta) for plane, s s'/(s + s') sin^2(beta) for
                                ///< spherical waves
    double phi;                 ///< of the diffracted ray, 0..2 pi [rad]
    double phi_incident;        ///< of the incident ray, 0..2 pi [rad]
    double sin_beta = 1.0;      ///< sine of the angle between ray and edge, in (0, 1]
};

/// Diffraction coefficients of the two conditions.
struct EdgeCoefficients {
    Complex soft;
    Complex hard;
};

/// Uniform diffraction coefficients D [sqrt(m)] of the half-plane (wedge with n = 2): the diffracted field is
/// D u_incident(edge) exp(-j k s) times 1/sqrt(s) (plane or cylindrical wave) or sqrt(s' / (s (s + s')))
/// (spherical).
///
/// Together with `half_plane_optics` exact for plane waves. On a shadow or reflection boundary either side's
/// value is returned, the one `half_plane_optics` takes too. At grazing incidence (phi_incident = 0) incident
/// and reflected wave are one: multiply the hard coefficient by 1/2 when u_incident is the total field along
/// the plate; the soft one vanishes, see `edge_slope_coefficients`. R. G. Kouyoumjian and P. H. Pathak, Proc.
/// IEEE 62(11), 1448-1461, 1974, eq. (25) with n = 2, where the four terms become two. Throws
/// std::invalid_argument outside the ranges of `EdgeRay`.
EdgeCoefficients edge_coefficients(const EdgeRay& ray);

/// Derivatives dD/d(phi_incident) [sqrt(m)] for slope diffraction: the field it adds is
/// dD/d(phi_incident) / (j k sin(beta)) times du_incident/dn at the edge times the factors of
/// `edge_coefficients`, with n towards growing phi_incident. At grazing incidence (phi_incident = 0) multiply
/// the soft one by 1/2 when du/dn is the slope of the total field over the plate. C. A. Balanis, Advanced
/// Engineering Electromagnetics, ch. 13 (slope diffraction). Throws as `edge_coefficients`.
EdgeCoefficients edge_slope_coefficients(const EdgeRay& ray);

/// Current across the edge of a plate on which a wave of unit tangential magnetic field runs towards the
/// edge, straight at it and on one face only: exact current of both faces summed at distance d from the edge
/// of a half-plane, over the current of the unbroken plate there. erf(exp(j pi/4) sqrt(2 k d)): 0 at the
/// edge, rising as sqrt(d); 1 far away. `kd` = k d >= 0. Throws std::invalid_argument otherwise.
Complex hard_edge_current(double kd);

/// Current along the edge of a plate over which a wave runs straight towards the edge whose electric field,
/// parallel to the edge, grows as the height above the plate: exact current of both faces summed at distance
/// d from the edge of a half-plane, over the current of the unbroken plate there. Infinite as 1/sqrt(d) at
/// the edge; 1 far away. `kd` = k d > 0. Throws std::invalid_argument otherwise.
Complex soft_edge_current(double kd);

}  // namespace panelwright::solver
