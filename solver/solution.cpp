#include "solver/solution.hpp"

#include <stdexcept>

namespace panelwright::solver {

std::string_view name(Method method) {
    switch (method) {
        case Method::aperture:
            return "aperture";
        case Method::strip:
            return "strip";
        case Method::surface:
            return "surface";
    }
    throw std::invalid_argument("no such method");
}

Complex reflection(Complex impedance, double reference) {
    if (!(reference > 0.0)) throw std::invalid_argument("the reference impedance must be positive");
    return (impedance - reference) / (impedance + reference);
}

}  // namespace panelwright::solver
