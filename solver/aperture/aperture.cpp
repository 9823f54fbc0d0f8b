#include "solver/aperture/aperture.hpp"

#include <algorithm>
#include <chrono>
#include <cmath>
#include <limits>
#include <optional>
#include <stdexcept>

#include "mesh/triangulate.hpp"
#include "solver/aperture/currents.hpp"
#include "solver/aperture/drive.hpp"

namespace panelwright::solver {
namespace {

/// Largest mesh for drawing currents; beyond it the cells grow.
constexpr std::size_t most_triangles = 20000;

/// Chebyshev points of [from, to]; one point where they coincide.
std::vector<double> chebyshev_points(double from, double to, int count) {
    if (!(to > from)) return {from};
    std::vector<double> points;
    for (int i = 0; i < count; ++i)
        points.push_back(0.5 * (from + to) - 0.5 * (to - from) * std::cos(pi * (i + 0.5) / count));
    return points;
}

/// Value at `x` of the polynomial through (points, values), by barycentric interpolation.
double interpolate(const std::vector<double>& points, const std::vector<double>& values, double x) {
    double above = 0.0;
    double below = 0.0;
    for (std::size_t i = 0; i < points.size(); ++i) {
        if (x == points[i]) return values[i];
        double weight = 1.0;
        for (std::size_t j = 0; j < points.size(); ++j)
            if (j != i) weight *= points.front() / (points[i] - points[j]);
        above += weight / (x - points[i]) * values[i];
        below += weight / (x - points[i]);
    }
    return above / below;
}

/// Frequencies at which the radiation loss is settled by a far field of its own; between them it is smooth,
/// but for the ripple of the waves between rim and reflector edges, which needs a point about each quarter
/// period.
std::vector<double> loss_frequencies(const ApertureModel& model, const std::vector<double>& band) {
    const Plate& plate = model.plate;
    const double radius =
        std::hypot(std::max(-plate.x_from, plate.x_to), std::max(-plate.y_from, plate.y_to));
    const double phase = 2.0 * pi * (band.back() - band.front()) / speed_of_light * radius;
    const double octaves = std::log2(band.back() / band.front());
    const int count =
        std::clamp(3 + static_cast<int>(std::ceil(2.0 * phase / pi) + std::floor(8.0 * octaves)), 3, 24);
    return chebyshev_points(band.front(), band.back(), count);
}

PortResponse port_response(const mesh::Panel& panel, const ApertureModel& model,
                           const std::vector<double>& band) {
    const std::vector<double> at = loss_frequencies(model, band);
    std::vector<double> logarithms;  // the loss is positive and varies by powers of the frequency
    for (const double frequency : at) {
        const Wave wave(frequency);
        logarithms.push_back(std::log(settled_cavity(panel, model, wave, std::nullopt).state.radiation_loss));
    }
    PortResponse port{band, {}};
    for (const double frequency : band) {
        const Wave wave(frequency);
        const double loss = std::exp(interpolate(at, logarithms, frequency));
        port.impedance.push_back(
            at_foot(model.line, wave, driven(panel, model, wave, loss).cavity_impedance));
    }
    return port;
}

/// Everything at one pattern frequency.
struct PatternSolution {
    FarField field;
    Powers powers;
    SurfaceCurrent current;
    DrivenCavity state;
};

PatternSolution pattern_solution(const mesh::Panel& panel, const ApertureModel& model, double frequency,
                                 double step, const mesh::SheetMesh& mesh) {
    const Wave wave(frequency);
    const auto [state, voltages, fields] = settled_cavity(panel, model, wave, step);
    PatternSolution out;
    out.state = state;
    // 1 W accepted: half the resistance times the current squared. The feed line is lossless.
    const double feed_current = std::sqrt(2.0 / out.state.cavity_impedance.real());
    const Eigen::VectorXcd factors = feed_current * column_factors(state, voltages);
    out.field = fields[0];
    out.field.e_theta *= factors(0);
    out.field.e_phi *= factors(0);
    for (std::size_t column = 1; column < fields.size(); ++column) {
        const Complex factor = factors(static_cast<Eigen::Index>(column));
        out.field.e_theta += factor * fields[column].e_theta;
        out.field.e_phi += factor * fields[column].e_phi;
    }
    const Eigen::VectorXcd rim_voltage = voltages.columns * factors;
    const double loss = out.state.loss;
    out.powers.accepted = 1.0;
    out.powers.radiated = radiated_power(out.field);
    out.powers.conductor = out.state.parts.conductor / loss;
    out.powers.dielectric = out.state.parts.dielectric / loss;
    out.powers.surface_wave = out.state.radiation_loss * out.state.parts.surface_wave_share / loss;
    out.current = aperture_currents(panel, model, wave, out.state, feed_current, rim_voltage, mesh);
    return out;
}

void require(const mesh::Panel& panel, const Task& task) {
    if (const auto wrong = mesh::problems(panel); !wrong.empty())
        throw std::invalid_argument("the panel cannot be solved: " + wrong.front().key + ": " +
                                    wrong.front().message);
    if (task.band.empty() || !std::is_sorted(task.band.begin(), task.band.end()) ||
        !(task.band.front() > 0.0))
        throw std::invalid_argument("the band must hold at least one frequency, ascending and positive");
}

}  // namespace

mesh::MeshOptions aperture_mesh_options(const mesh::Panel& panel, const Task& task) {
    const double shortest =
        speed_of_light / std::max(task.band.back(), task.pattern_at.empty() ? 0.0 : task.pattern_at.back());
    const double share = task.accuracy == Accuracy::quick    ? 10.0
                         : task.accuracy == Accuracy::normal ? 16.0
                                                             : 24.0;
    mesh::MeshOptions options;
    options.cell_size = shortest / share / std::sqrt(panel.spacer.permittivity);
    options.edge_cell = 0.5 * options.cell_size;
    for (int tries = 0; tries < 12 && mesh::predicted_size(panel, options).triangles > most_triangles;
         ++tries) {
        options.cell_size *= 1.4;
        options.edge_cell *= 1.4;
    }
    return options;
}

std::vector<std::string> aperture_remarks(const mesh::Panel& panel, const Task& task) {
    const double wavelength = 2.0 * speed_of_light / (task.band.front() + task.band.back());
    std::vector<std::string> out;
    if (panel.spacer.height > 0.06 * wavelength)
        out.emplace_back(
            "The patch stands higher than 0.06 wavelength: the resonance was verified up to there.");
    if (std::min(panel.reflector.length, panel.reflector.width) < 0.65 * wavelength)
        out.emplace_back(
            "A reflector side is shorter than 0.65 wavelength: edge diffraction of second order is not "
            "enough there, expect 1 dB in gain and 4 dB or more in front-to-back ratio.");
    if (panel.spacer.permittivity > 1.0)
        out.emplace_back(
            "The dielectric is taken into account in the cavity and as a surface-wave loss; the far field is "
            "that of the rim over bare metal.");
    if (const auto* tab = std::get_if<mesh::Tab>(&panel.feed); tab != nullptr && tab->notch_depth > 0.0)
        out.emplace_back(
            "The tab between its slits is modelled as a line coupled to the patch: the match is "
            "approximate.");
    const mesh::Reflector& r = panel.reflector;
    if (std::fabs(r.offset_x) + 0.5 * panel.patch.length > 0.5 * r.length ||
        std::fabs(r.offset_y) + 0.5 * panel.patch.width > 0.5 * r.width)
        out.emplace_back(
            "The patch overhangs the reflector: the cavity model assumes metal under the whole patch.");
    return out;
}

Solution solve_aperture(const mesh::Panel& panel, const Task& task) {
    require(panel, task);
    const auto begin = std::chrono::steady_clock::now();
    const ApertureModel model = aperture_model(panel);
    Solution solution;
    solution.method = Method::aperture;
    solution.mesh = mesh::triangulate(panel, aperture_mesh_options(panel, task));
    solution.port = port_response(panel, model, task.band);
    HealthEntry balance{"power_balance", "1", "radiated plus lost power over accepted power", {}, true};
    HealthEntry quality{
        "cavity_quality_factor", "1", "quality factor of the loaded cavity, all losses included", {}, true};
    for (const double frequency : task.pattern_at) {
        PatternSolution pattern = pattern_solution(panel, model, frequency, task.pattern_step, solution.mesh);
        const Powers& p = pattern.powers;
        balance.values.push_back((p.radiated + p.conductor + p.dielectric + p.surface_wave) / p.accepted);
        quality.values.push_back(1.0 / pattern.state.loss);
        solution.patterns.push_back(std::move(pattern.field));
        solution.powers.push_back(pattern.powers);
        solution.currents.push_back(std::move(pattern.current));
    }
    solution.remarks = aperture_remarks(panel, task);
    for (std::size_t p = 0; p < balance.values.size(); ++p)
        if (const double off = std::fabs(balance.values[p] - 1.0); !(off < 0.01))
            solution.remarks.push_back("The power balance is off by " +
                                       std::to_string(std::lround(100.0 * off)) + " % at pattern frequency " +
                                       std::to_string(p + 1) + ": do not trust gain and match there.");
    const double seconds = std::chrono::duration<double>(std::chrono::steady_clock::now() - begin).count();
    solution.health = {balance,
                       quality,
                       {"cavity_resonance_hz",
                        "Hz",
                        "resonance of the patch alone, without posts, over an unbounded reflector",
                        {model.fringe.resonance},
                        false},
                       {"unknowns",
                        "1",
                        "currents solved for: those through the feed and the posts",
                        {static_cast<double>(model.pillars.size())},
                        false},
                       {"seconds", "s", "wall time of the method", {seconds}, false}};
    return solution;
}

}  // namespace panelwright::solver
