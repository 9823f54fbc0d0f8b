#include "solver/aperture/model.hpp"

#include <algorithm>
#include <cmath>

#include "solver/aperture/closed_formulas.hpp"

namespace panelwright::solver {
namespace {

/// Level of the radiating rim, in heights of the patch: its field bulges above the patch's edge. Fitted, the only free
/// constant of the aperture, to the full solution of docs/verification.md over eight reflector sizes.
constexpr double rim_level = 2.0;
/// Spacing of the rim's points, in heights; see `rectangle_rim`.
constexpr double rim_spacing = 0.75;
/// A rim much lower than its sides is raised to this share of the longer one: so near the plate its height no longer
/// matters, but each point would need its own.
constexpr double lowest_rim = 0.015;

/// Characteristic impedance [ohm] of a microstrip in air, width over height `u`: E. Hammerstad & O. Jensen, IEEE MTT-S
/// Symposium Digest, 407-409, 1980.
double microstrip_impedance_in_air(double u) {
    const double f = 6.0 + (2.0 * pi - 6.0) * std::exp(-std::pow(30.666 / u, 0.7528));
    return vacuum_impedance / (2.0 * pi) * std::log(f / u + std::sqrt(1.0 + 4.0 / (u * u)));
}

/// Inductance [H] of an upright flat strip of `width` and `height` on the reflector: half that of a bar twice as long, its
/// image included; F. W. Grover, Inductance Calculations, 1946, ch. 5.
double upright_strip_inductance(double width, double height) {
    const double bar = 2.0 * height;
    const double log_part = std::log(2.0 * bar / width) + 0.5 + 0.2235 * width / bar;
    return 0.5 * vacuum_permeability * bar / (2.0 * pi) * log_part;
}

/// The strip's line and where its current enters the cavity.
FeedLine tab_line(const mesh::Tab& tab, const mesh::Spacer& spacer) {
    const double permittivity = hammerstad_jensen_permittivity(spacer.permittivity, spacer.height, tab.width);
    const double slowness = std::sqrt(permittivity);
    return {microstrip_impedance_in_air(tab.width / spacer.height) / slowness, tab.notch_depth + tab.reach, slowness,
            upright_strip_inductance(tab.width, spacer.height)};
}

}  // namespace

ApertureModel aperture_model(const mesh::Panel& panel) {
    const double h = panel.spacer.height;
    ApertureModel model;
    model.fringe = fringing(panel.patch, panel.spacer);
    const double extension = model.fringe.extension;
    model.cavity = {panel.patch.length + 2.0 * extension, panel.patch.width + 2.0 * extension, h,
                    model.fringe.effective_permittivity};
    if (const auto* probe = std::get_if<mesh::Probe>(&panel.feed)) {
        model.pillars.push_back({probe->x, probe->y, equivalent_strip(probe->diameter)});
    } else {
        const auto& tab = std::get<mesh::Tab>(panel.feed);
        model.pillars.push_back({-0.5 * panel.patch.length + tab.notch_depth, 0.0, tab.width});
        model.line = tab_line(tab, panel.spacer);
    }
    for (const mesh::Post& post : panel.posts)
        model.pillars.push_back({post.x, post.y, equivalent_strip(post.diameter)});
    const double rim_height = std::max(rim_level * h, lowest_rim * std::max(model.cavity.length, model.cavity.width));
    model.rim = rectangle_rim(model.cavity.length, model.cavity.width, rim_height, rim_spacing * rim_height);
    const mesh::Reflector& reflector = panel.reflector;
    model.plate = {reflector.offset_x - 0.5 * reflector.length, reflector.offset_x + 0.5 * reflector.length,
                   reflector.offset_y - 0.5 * reflector.width, reflector.offset_y + 0.5 * reflector.width};
    return model;
}

Complex at_foot(const FeedLine& line, const Wave& wave, Complex load) {
    if (!(line.impedance > 0.0)) return load;
    const Complex turn(0.0, std::tan(wave.wavenumber * line.slowness * line.length));
    const Complex start = line.impedance * (load + line.impedance * turn) / (line.impedance + load * turn);
    return start + Complex(0.0, wave.omega * line.inductance);
}

CavityLoss cavity_loss(const mesh::Panel& panel, const ApertureModel& model, const Wave& wave) {
    CavityLoss loss;
    for (const double conductivity : {panel.patch.conductivity, panel.reflector.conductivity})
        if (std::isfinite(conductivity))
            loss.conductor += std::sqrt(2.0 / (wave.omega * vacuum_permeability * conductivity)) /
                              (2.0 * panel.spacer.height);
    const double er = panel.spacer.permittivity;
    const double ee = model.fringe.effective_permittivity;
    const double filling = er > 1.0 ? er * (ee - 1.0) / (ee * (er - 1.0)) : 1.0;
    loss.dielectric = panel.spacer.loss_tangent * filling;
    if (er > 1.0) {
        const double efficiency = surface_wave_efficiency(
            {wave.wavenumber, model.cavity.length, model.cavity.width, panel.spacer.height, er});
        loss.surface_wave_share = (1.0 - efficiency) / efficiency;
    }
    return loss;
}

}  // namespace panelwright::solver
