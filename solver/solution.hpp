/// What every method returns.
#pragma once

#include <Eigen/Core>
#include <string>
#include <string_view>
#include <vector>

#include "mesh/sheet_mesh.hpp"
#include "solver/far_field.hpp"
#include "solver/figures.hpp"

namespace panelwright::solver {

/// The closed set of methods, fastest first.
enum class Method { aperture, strip, surface };

/// "aperture", "strip" or "surface".
std::string_view name(Method method);

/// How much work to spend.
enum class Accuracy { quick, normal, fine };

/// What to compute.
struct Task {
    std::vector<double> band;                   ///< (F) ascending [Hz]
    std::vector<double> pattern_at;             ///< (P) pattern frequencies, ascending [Hz]
    double reference_impedance = 50.0;          ///< [ohm]
    double pattern_step = 0.03490658503988659;  ///< step of the pattern grid [rad]; 2 degrees
    Accuracy accuracy = Accuracy::normal;
};

/// Behaviour at the port over the band.
struct PortResponse {
    std::vector<double> frequency;   ///< (F) [Hz]
    std::vector<Complex> impedance;  ///< (F) input impedance at the reference plane [ohm]
};

/// Reflection coefficient of `impedance` against the real `reference` [ohm].
Complex reflection(Complex impedance, double reference);

/// Surface current at every triangle's centroid, both faces summed [A/m], for 1 W accepted. (m)
using SurfaceCurrent = std::vector<Eigen::Vector3cd>;

/// One number, or one a pattern frequency, that tells how far to trust the result.
struct HealthEntry {
    std::string name;            ///< "power_balance"
    std::string unit;            ///< "1", "s", …
    std::string description;     ///< one sentence
    std::vector<double> values;  ///< (1) or (P)
    bool per_pattern = false;    ///< true: one value a pattern frequency
};

/// The common output of all methods.
struct Solution {
    Method method = Method::aperture;
    PortResponse port;
    std::vector<FarField> patterns;  ///< (P)
    std::vector<Powers> powers;      ///< (P)
    mesh::SheetMesh mesh;
    std::vector<SurfaceCurrent> currents;  ///< (P)
    std::vector<HealthEntry> health;
    std::vector<std::string> remarks;  ///< limits of validity that this case touches, one sentence each
};

}  // namespace panelwright::solver
