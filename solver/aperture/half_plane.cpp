#include "solver/aperture/half_plane.hpp"

#include <cmath>
#include <stdexcept>

#include "solver/aperture/fresnel.hpp"
#include "solver/constants.hpp"

namespace panelwright::solver {

namespace {

constexpr double full_turn = 2.0 * pi * (1.0 + 1e-12);  // rounding of angles that were added up

Complex unit_phasor(double phase) {
    return {std::cos(phase), std::sin(phase)};
}

double sign(EdgeCondition condition) {
    return condition == EdgeCondition::soft ? -1.0 : 1.0;
}

bool round_the_edge(double angle) {
    return angle >= 0.0 && angle <= full_turn;
}

void require_point(double k_rho, double phi, double phi_incident) {
    if (!(k_rho >= 0.0) || !round_the_edge(phi) || !round_the_edge(phi_incident)) {
        throw std::invalid_argument("a point round the edge needs k rho >= 0 and angles within 0..2 pi");
    }
}

void require_ray(const EdgeRay& ray) {
    if (!(ray.wavenumber > 0.0) || !(ray.distance_parameter > 0.0) || !round_the_edge(ray.phi) ||
        !round_the_edge(ray.phi_incident) || !(ray.sin_beta > 0.0 && ray.sin_beta <= 1.0 + 1e-12)) {
        throw std::invalid_argument(
            "a diffracted ray needs k > 0, L > 0, angles within 0..2 pi and sin(beta) in (0, 1]");
    }
}

/// exp(j pi/4) / sqrt(pi): one over the whole Fresnel integral.
Complex one_over_whole() {
    return unit_phasor(pi / 4.0) / std::sqrt(pi);
}

/// Sommerfeld's solution on the two-sheeted plane: exp(j k rho cos(psi)) where cos(psi/2) is large and
/// positive.
Complex sommerfeld(double k_rho, double psi) {
    const double a = std::sqrt(2.0 * k_rho) * std::cos(0.5 * psi);
    return one_over_whole() * unit_phasor(-k_rho) * scaled_fresnel_tail(-a);
}

Complex optics(double k_rho, double psi) {
    return std::cos(0.5 * psi) > 0.0 ? unit_phasor(k_rho * std::cos(psi)) : Complex{};
}

/// F(k L a(beta)) / cos(beta/2) with a(beta) = 2 cos^2(beta/2), written without the division so that a
/// boundary, where both vanish, needs no care.
Complex boundary_term(double k_l, double beta) {
    const double root = std::sqrt(2.0 * k_l);
    const double cosine = std::cos(0.5 * beta);
    const Complex tail = scaled_fresnel_tail(root * std::abs(cosine));
    return Complex(0.0, cosine > 0.0 ? 2.0 * root : -2.0 * root) * tail;
}

/// Derivative of `boundary_term` by beta: from d/da of the scaled tail = 2 j a (scaled tail) - 1 follows
/// 2 j k L sin(beta/2) (1 - F(k L a)), on both sides of a boundary alike.
Complex boundary_term_slope(double k_l, double beta) {
    const double cosine = std::cos(0.5 * beta);
    return Complex(0.0, 2.0 * k_l * std::sin(0.5 * beta)) * transition_deficit(2.0 * k_l * cosine * cosine);
}

/// -exp(-j pi/4) / (2 sqrt(2 pi k) sin(beta)).
Complex edge_factor(const EdgeRay& ray) {
    return -unit_phasor(-pi / 4.0) / (2.0 * std::sqrt(2.0 * pi * ray.wavenumber) * ray.sin_beta);
}

}  // namespace

Complex half_plane_field(EdgeCondition condition, double k_rho, double phi, double phi_incident) {
    require_point(k_rho, phi, phi_incident);
    return sommerfeld(k_rho, phi - phi_incident) + sign(condition) * sommerfeld(k_rho, phi + phi_incident);
}

Complex half_plane_optics(EdgeCondition condition, double k_rho, double phi, double phi_incident) {
    require_point(k_rho, phi, phi_incident);
    return optics(k_rho, phi - phi_incident) + sign(condition) * optics(k_rho, phi + phi_incident);
}

double knife_edge_loss_db(double v) {
    // Field over free-space field: (1 + j)/2 times the integral of exp(-j pi t^2 / 2) from v to infinity.
    const Complex field = one_over_whole() * scaled_fresnel_tail(v * std::sqrt(pi / 2.0));
    return -20.0 * std::log10(std::abs(field));
}

EdgeCoefficients edge_coefficients(const EdgeRay& ray) {
    require_ray(ray);
    const double k_l = ray.wavenumber * ray.distance_parameter;
    const Complex incident = boundary_term(k_l, ray.phi - ray.phi_incident);
    const Complex reflected = boundary_term(k_l, ray.phi + ray.phi_incident);
    const Complex factor = edge_factor(ray);
    return {factor * (incident - reflected), factor * (incident + reflected)};
}

EdgeCoefficients edge_slope_coefficients(const EdgeRay& ray) {
    require_ray(ray);
    const double k_l = ray.wavenumber * ray.distance_parameter;
    const Complex incident = -boundary_term_slope(k_l, ray.phi - ray.phi_incident);
    const Complex reflected = boundary_term_slope(k_l, ray.phi + ray.phi_incident);
    const Complex factor = edge_factor(ray);
    return {factor * (incident - reflected), factor * (incident + reflected)};
}

// Both currents follow from Sommerfeld's solution as the incidence grows grazing, phi_incident -> 0. With
// b = sqrt(2 k d), c = exp(j pi/4) / sqrt(pi) and I = the integral of exp(-j t^2) from 0 to b:
//
// Hard. Incident and reflected wave together make 2 exp(j k x) on the unbroken plate, so u = sommerfeld(phi)
// has total amplitude one. The currents of the faces phi = 0 and 2 pi are u(0) and -u(2 pi), whose Fresnel
// integrals begin at -b and +b: the sum over exp(j k d) is 2 c I.
//
// Soft. The derivative of the solution by phi_incident is -2 sommerfeld'(phi), that of the optics over the
// unbroken plate 2 j k y exp(j k x). The currents are the normal derivatives (1/d) d/dphi on the two faces,
// hence second derivatives of sommerfeld: with a = b cos(phi/2) only d^2a/dphi^2 = -+ b/4 is not zero there.
// Their sum over exp(j k d) is 2 c I + c exp(-j b^2) / (j b).

Complex hard_edge_current(double kd) {
    if (!(kd >= 0.0)) throw std::invalid_argument("the distance from the edge must not be negative");
    return 1.0 - 2.0 * one_over_whole() * fresnel_tail(std::sqrt(2.0 * kd));
}

Complex soft_edge_current(double kd) {
    if (!(kd > 0.0)) throw std::invalid_argument("the distance from the edge must be positive");
    // 2 c I = 1 - 2 c (tail from b), and that tail is F(b^2) exp(-j b^2) / (2 j b).
    const double b_squared = 2.0 * kd;
    const Complex wave = one_over_whole() * unit_phasor(-b_squared) / Complex(0.0, std::sqrt(b_squared));
    return 1.0 + wave * transition_deficit(b_squared);
}

}  // namespace panelwright::solver
