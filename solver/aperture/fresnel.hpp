/// Fresnel integrals as edge diffraction needs them, for real argument; exp(+j omega t).
#pragma once

#include "solver/far_field.hpp"

namespace panelwright::solver {

/// exp(j a^2) times the integral of exp(-j t^2) over t from `a` to infinity: sqrt(pi)/2 exp(-j pi/4) w(j
/// exp(j pi/4) a) with the Faddeeva function w. Any finite real `a`; smooth and without oscillation for a >=
/// 0. Relative error below 1e-11 for a >= 0, and below 1e-11 of the greater of its two terms for a < 0.
Complex scaled_fresnel_tail(double a);

/// The integral of exp(-j t^2) over t from `a` to infinity. Any finite real `a`; error as
/// `scaled_fresnel_tail`.
Complex fresnel_tail(double a);

/// Transition function F(x) = 2 j sqrt(x) exp(j x) times the integral of exp(-j t^2) over t from sqrt(x) to
/// infinity; F -> 1 for large x. For x < 0, the conjugate of F(|x|). R. G. Kouyoumjian and P. H. Pathak,
/// Proc. IEEE 62(11), 1448-1461, 1974, eq. (26).
Complex transition(double x);

/// 1 - F(x) for x >= 0, without loss of digits for large x, where it falls as -j / (2 x).
/// Relative error below 1e-8.
Complex transition_deficit(double x);

}  // namespace panelwright::solver
