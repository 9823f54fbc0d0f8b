/// Which methods this version can run.
#pragma once

#include <array>
#include <span>

#include "solver/solution.hpp"

namespace panelwright::solver {

/// All methods that have a name, fastest first.
inline constexpr std::array<Method, 3> known_methods = {Method::aperture, Method::strip, Method::surface};

/// The methods that this version contains, fastest first. A method joins this list in the commit that adds
/// it.
inline constexpr std::array<Method, 1> contained_methods = {Method::aperture};

/// The methods that this version contains, fastest first.
constexpr std::span<const Method> available_methods() {
    return contained_methods;
}

/// True for a method that a case runs when it names none: `aperture` and `surface`, of those that are
/// available.
constexpr bool is_default(Method method) {
    return method != Method::strip;
}

}  // namespace panelwright::solver
