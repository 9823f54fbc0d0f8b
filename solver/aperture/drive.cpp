#include "solver/aperture/drive.hpp"

#include <algorithm>
#include <cmath>

#include "solver/aperture/closed_formulas.hpp"

namespace panelwright::solver {
namespace {

/// Resonant amplitude of mode TM10 at the cavity's end x = +length/2, for the pillars' currents [V].
Complex fundamental_amplitude(const ApertureModel& model, const Wave& wave, double loss,
                              const Eigen::VectorXcd& currents) {
    const Cavity& cavity = model.cavity;
    const double mode = pi / cavity.length;
    Complex overlap = 0.0;
    for (std::size_t p = 0; p < model.pillars.size(); ++p) {
        const Pillar& pillar = model.pillars[p];
        overlap += currents(static_cast<Eigen::Index>(p)) *
                   ((1.0 - pillar.second_share) * std::sin(mode * pillar.x) +
                    pillar.second_share * std::sin(mode * pillar.second_x));
    }
    const Complex detuning =
        mode * mode - wave.wavenumber * wave.wavenumber * cavity.permittivity * Complex(1.0, -loss);
    return Complex(0.0, wave.omega * vacuum_permeability * cavity.height) * 2.0 /
           (cavity.length * cavity.width) * overlap / detuning;
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

/// Radiated power of the voltages' columns with amplitudes (a, 1) [W].
double power(const Eigen::MatrixXcd& powers, Complex a) {
    return std::norm(a) * powers(0, 0).real() + powers(1, 1).real() + 2.0 * (a * powers(0, 1)).real();
}

}  // namespace

RimVoltages rim_voltages(const ApertureModel& model, const Wave& wave, const DrivenCavity& state) {
    const Cavity& cavity = model.cavity;
    const std::vector<Eigen::Vector2d>& places = model.rim.points;
    const auto field = cavity_field(cavity, wave, state.loss, model.pillars, state.currents, places);
    RimVoltages voltages{Eigen::MatrixXcd(static_cast<Eigen::Index>(places.size()), 2)};
    const double strength = rim_strength(model.rim, wave);
    for (std::size_t i = 0; i < places.size(); ++i) {
        const auto row = static_cast<Eigen::Index>(i);
        const double mode = std::sin(pi / cavity.length * places[i].x());
        voltages.columns(row, 0) = strength * mode;
        voltages.columns(row, 1) = strength * (field[i].voltage - state.amplitude * mode);
    }
    return voltages;
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
    out.cavity_impedance = driving_impedance(model.cavity, wave, out.loss, model.pillars);
    out.amplitude = fundamental_amplitude(model, wave, out.loss, out.currents);
    return out;
}

DrivenCavity settle(const mesh::Panel& panel, const ApertureModel& model, const Wave& wave,
                    const Eigen::MatrixXcd& powers) {
    DrivenCavity state = driven(panel, model, wave, starting_loss(model, wave));
    for (int step = 0; step < 12; ++step) {
        const double wanted = power(powers, state.amplitude);
        const double lost = 0.5 * state.cavity_impedance.real();
        // Power lost as radiation is its share of the whole; the loss tangent that makes it `wanted` follows
        // at once.
        const double next = std::clamp(state.loss * wanted / lost, 1e-6, 0.5);
        const double change = std::fabs(next - state.radiation_loss);
        state = driven(panel, model, wave, next);
        if (change < 1e-6 * next) break;
    }
    return state;
}

}  // namespace panelwright::solver
