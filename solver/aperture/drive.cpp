#include "solver/aperture/drive.hpp"

#include <algorithm>
#include <cmath>

#include "solver/aperture/closed_formulas.hpp"

namespace panelwright::solver {
namespace {

/// Amplitude of a mode, its voltage where its shape is 1 [V]: `overlap` is the sum over the pillars of
/// current times shape, `mode` the mode's wavenumber in the cavity.
Complex amplitude_of(const Cavity& cavity, const Wave& wave, double loss, Complex overlap, double mode) {
    const Complex detuning =
        mode * mode - wave.wavenumber * wave.wavenumber * cavity.permittivity * Complex(1.0, -loss);
    return Complex(0.0, wave.omega * vacuum_permeability * cavity.height) * 2.0 /
           (cavity.length * cavity.width) * overlap / detuning;
}

/// Overlap of the pillars' currents with sin(pi x / length).
Complex overlap_x(const ApertureModel& model, const Eigen::VectorXcd& currents) {
    const double mode = pi / model.cavity.length;
    Complex sum = 0.0;
    for (std::size_t p = 0; p < model.pillars.size(); ++p) {
        const Pillar& pillar = model.pillars[p];
        sum += currents(static_cast<Eigen::Index>(p)) *
               ((1.0 - pillar.second_share) * std::sin(mode * pillar.x) +
                pillar.second_share * std::sin(mode * pillar.second_x));
    }
    return sum;
}

/// Overlap of the pillars' currents with sin(pi y / width), their widths along y averaged over.
Complex overlap_y(const ApertureModel& model, const Eigen::VectorXcd& currents) {
    const double mode = pi / model.cavity.width;
    Complex sum = 0.0;
    for (std::size_t p = 0; p < model.pillars.size(); ++p) {
        const double half = 0.5 * mode * model.pillars[p].width;
        sum += currents(static_cast<Eigen::Index>(p)) * std::sin(mode * model.pillars[p].y) * std::sin(half) /
               half;
    }
    return sum;
}

/// Strength of the rim's line currents per cavity voltage: raised by what their level over the plate costs
/// them in radiated power, cos^2(k z cos theta) at the mean cos^2 theta of a broad beam (3/5, that of an
/// intensity cos^2 theta), so that the cavity is damped as by a rim at the plate.
double rim_strength(const Rim& rim, const Wave& wave) {
    return 1.0 / std::cos(std::min(std::sqrt(0.6) * wave.wavenumber * rim.height, 1.0));
}

/// Effective loss tangent for a given radiation part.
double whole_loss(double radiation, const CavityLoss& parts) {
    return radiation * (1.0 + parts.surface_wave_share) + parts.conductor + parts.dielectric;
}

}  // namespace

RimVoltages rim_voltages(const ApertureModel& model, const Wave& wave, const DrivenCavity& state) {
    const Cavity& cavity = model.cavity;
    const std::vector<Eigen::Vector2d>& places = model.rim.points;
    const auto field = cavity_field(cavity, wave, state.loss, model.pillars, state.currents, places);
    const bool crossed = state.cross_amplitude != 0.0;
    const Eigen::Index last = crossed ? 2 : 1;
    RimVoltages voltages{Eigen::MatrixXcd(static_cast<Eigen::Index>(places.size()), last + 1)};
    const double strength = rim_strength(model.rim, wave);
    for (std::size_t i = 0; i < places.size(); ++i) {
        const auto row = static_cast<Eigen::Index>(i);
        const double along = std::sin(pi / cavity.length * places[i].x());
        const double across = std::sin(pi / cavity.width * places[i].y());
        voltages.columns(row, 0) = strength * along;
        if (crossed) voltages.columns(row, 1) = strength * across;
        voltages.columns(row, last) =
            strength * (field[i].voltage - state.amplitude * along - state.cross_amplitude * across);
    }
    return voltages;
}

Eigen::VectorXcd column_factors(const DrivenCavity& state, const RimVoltages& voltages) {
    Eigen::VectorXcd factors = Eigen::VectorXcd::Ones(voltages.columns.cols());
    factors(0) = state.amplitude;
    if (factors.size() == 3) factors(1) = state.cross_amplitude;
    return factors;
}

double starting_loss(const ApertureModel& model, const Wave& wave) {
    const Cavity& cavity = model.cavity;
    const double conductance = slot_conductance(wave.wavenumber, cavity.width) +
                               mutual_conductance(wave.wavenumber, cavity.width, cavity.length);
    const double capacitance =
        vacuum_permittivity * cavity.permittivity * cavity.length * cavity.width / (2.0 * cavity.height);
    return 2.0 * conductance / (wave.omega * capacitance);
}

DrivenCavity driven(const mesh::Panel& panel, const ApertureModel& model, const Wave& wave,
                    double radiation_loss) {
    DrivenCavity out;
    out.radiation_loss = radiation_loss;
    out.parts = cavity_loss(panel, model, wave);
    out.loss = whole_loss(radiation_loss, out.parts);
    out.currents = pillar_currents(model.cavity, wave, out.loss, model.pillars);
    out.cavity_impedance = driving_impedance(model.cavity, wave, out.loss, model.pillars, out.currents);
    out.amplitude =
        amplitude_of(model.cavity, wave, out.loss, overlap_x(model, out.currents), pi / model.cavity.length);
    out.cross_amplitude =
        amplitude_of(model.cavity, wave, out.loss, overlap_y(model, out.currents), pi / model.cavity.width);
    return out;
}

DrivenCavity settle(const mesh::Panel& panel, const ApertureModel& model, const Wave& wave,
                    const RimVoltages& voltages, const Eigen::MatrixXcd& powers) {
    DrivenCavity state = driven(panel, model, wave, starting_loss(model, wave));
    for (int step = 0; step < 40; ++step) {
        const Eigen::VectorXcd factors = column_factors(state, voltages);
        const double wanted = (factors.transpose() * powers * factors.conjugate()).value().real();
        const double lost = 0.5 * state.cavity_impedance.real();
        // Power lost as radiation is its share of the whole; the loss tangent that makes it `wanted` follows
        // at once where one mode rules, and step by step between two.
        const double next = std::clamp(state.loss * wanted / lost, 1e-6, 10.0);
        const double change = std::fabs(next - state.radiation_loss);
        state = driven(panel, model, wave, step < 8 ? next : 0.5 * (next + state.radiation_loss));
        if (change < 1e-6 * next) break;
    }
    return state;
}

SettledCavity settled_cavity(const mesh::Panel& panel, const ApertureModel& model, const Wave& wave,
                             std::optional<double> step) {
    SettledCavity out;
    out.voltages = rim_voltages(model, wave, driven(panel, model, wave, starting_loss(model, wave)));
    const Eigen::MatrixXcd& columns = out.voltages.columns;
    out.fields =
        step ? panel_far_fields(wave, model.rim, model.plate, columns, DiffractionOrder::second, *step)
             : power_fields(wave, model.rim, model.plate, columns, DiffractionOrder::second);
    out.state = settle(panel, model, wave, out.voltages, mutual_powers(out.fields));
    return out;
}

}  // namespace panelwright::solver
