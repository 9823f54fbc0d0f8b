/// The cavity driven at one frequency, its radiation loss settled by its own far field.
#pragma once

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
    Complex amplitude;  ///< of the fundamental mode, its voltage at the cavity's end x = +length/2 [V]
};

/// Rim voltages [V] for 1 A at the feed: column 0 the fundamental mode for unit amplitude,
/// column 1 everything else.
struct RimVoltages {
    Eigen::MatrixXcd columns;  ///< (n, 2)
};
RimVoltages rim_voltages(const ApertureModel& model, const Wave& wave, const DrivenCavity& state);

/// Finds the radiation loss that makes the power lost in the cavity on behalf of radiation equal to the power
/// that the rim radiates over the finite plate. `powers`: the (2, 2) matrix of radiated powers for the
/// columns of `rim_voltages`, whose second column hardly depends on the loss it was made with.
DrivenCavity settle(const mesh::Panel& panel, const ApertureModel& model, const Wave& wave,
                    const Eigen::MatrixXcd& powers);

/// The driven cavity with a radiation loss that is already known.
DrivenCavity driven(const mesh::Panel& panel, const ApertureModel& model, const Wave& wave,
                    double radiation_loss);

/// A loss tangent to start from: that of two slots over an unbounded plane.
double starting_loss(const ApertureModel& model, const Wave& wave);

}  // namespace panelwright::solver
