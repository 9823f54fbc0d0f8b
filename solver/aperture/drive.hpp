/// The cavity driven at one frequency, its radiation loss settled by its own far field.
#pragma once

#include <optional>
#include <vector>

#include "mesh/panel.hpp"
#include "solver/aperture/model.hpp"
#include "solver/aperture/radiation.hpp"

namespace panelwright::solver {

/// State of the driven cavity at one frequency, for 1 A at the feed.
struct DrivenCavity {
    double radiation_loss = 0.0;  ///< part of the effective loss tangent that is radiation into space
    double loss = 0.0;            ///< the whole effective loss tangent
    CavityLoss parts;
    Complex cavity_impedance;   ///< where the feed's current enters the cavity [ohm]
    Eigen::VectorXcd currents;  ///< through the pillars [A]
    Complex amplitude;          ///< of mode TM10: its voltage at the cavity's end x = +length/2 [V]
    Complex cross_amplitude;  ///< of mode TM01: its voltage at the side y = +width/2 [V]; 0 when not excited
};

/// Rim voltages [V] for 1 A at the feed, split by what follows the loss: column 0 mode TM10 for unit
/// amplitude, column 1 mode TM01 likewise where it is excited, the last column all other modes, which hardly
/// depend on the loss.
struct RimVoltages {
    Eigen::MatrixXcd columns;  ///< (n, 2 or 3)
};
RimVoltages rim_voltages(const ApertureModel& model, const Wave& wave, const DrivenCavity& state);

/// The factors of the columns of `rim_voltages` in the driven cavity: amplitudes, and 1 for the last.
Eigen::VectorXcd column_factors(const DrivenCavity& state, const RimVoltages& voltages);

/// Finds the radiation loss that makes the power lost in the cavity on behalf of radiation equal to the power
/// that the rim radiates over the finite plate. `powers`: the (2, 2) matrix of radiated powers for the
/// columns of `rim_voltages`; the second is kept as it was made, only the fundamental mode follows the loss.
DrivenCavity settle(const mesh::Panel& panel, const ApertureModel& model, const Wave& wave,
                    const Eigen::MatrixXcd& powers);

/// A settled cavity with the voltages and far fields it was settled by.
struct SettledCavity {
    DrivenCavity state;
    RimVoltages voltages;
    std::vector<FarField> fields;  ///< one a column of the voltages
};

/// Settles the cavity with far fields at steps of `step`, or as fine as their powers need where there is
/// none.
SettledCavity settled_cavity(const mesh::Panel& panel, const ApertureModel& model, const Wave& wave,
                             std::optional<double> step);

/// The driven cavity with a radiation loss that is already known.
DrivenCavity driven(const mesh::Panel& panel, const ApertureModel& model, const Wave& wave,
                    double radiation_loss);

/// A loss tangent to start from: that of two slots over an unbounded plane.
double starting_loss(const ApertureModel& model, const Wave& wave);

}  // namespace panelwright::solver
