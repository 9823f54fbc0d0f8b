#include "solver/aperture/model.hpp"

#include <algorithm>
#include <boost/math/special_functions/ellint_1.hpp>
#include <cmath>

#include "solver/aperture/closed_formulas.hpp"

namespace panelwright::solver {
namespace {

/// Level of the radiating rim, in heights of the patch: its field bulges above the patch's edge. Fitted, the
/// only free constant of the aperture, to the full solution of docs/verification.md over eight reflector
/// sizes.
constexpr double rim_level = 2.0;
/// Spacing of the rim's points, in heights; see `rectangle_rim`.
constexpr double rim_spacing = 0.75;
/// A rim much lower than its sides is raised to this share of the longer one: so near the plate its height no
/// longer matters, but each point would need its own.
constexpr double lowest_rim = 0.015;

/// Characteristic impedance [ohm] of a microstrip in air, width over height `u`: E. Hammerstad & O. Jensen,
/// IEEE MTT-S Symposium Digest, 407-409, 1980.
double microstrip_impedance_in_air(double u) {
    const double f = 6.0 + (2.0 * pi - 6.0) * std::exp(-std::pow(30.666 / u, 0.7528));
    return vacuum_impedance / (2.0 * pi) * std::log(f / u + std::sqrt(1.0 + 4.0 / (u * u)));
}

/// Capacitance a metre between the strip and the patch across both slits [F/m].
double slit_capacitance(const mesh::Tab& tab, double permittivity) {
    const double k = tab.width / (tab.width + 2.0 * tab.notch_gap);
    const double ratio = boost::math::ellint_1(k) / boost::math::ellint_1(std::sqrt(1.0 - k * k));
    return 4.0 * vacuum_permittivity * 0.5 * (1.0 + permittivity) * ratio;
}

/// The tab's strip: where its current enters the cavity, and the line from there to the foot.
struct TabFeed {
    Pillar pillar;
    FeedLine line;
};

TabFeed tab_feed(const mesh::Tab& tab, const mesh::Patch& patch, const mesh::Spacer& spacer) {
    const double edge = -0.5 * patch.length;
    const double slowness =
        std::sqrt(hammerstad_jensen_permittivity(spacer.permittivity, spacer.height, tab.width));
    TabFeed feed;
    feed.pillar = {edge + tab.notch_depth, 0.0, tab.width, edge, 0.0};
    feed.line = {0.0, microstrip_impedance_in_air(tab.width / spacer.height) / slowness, tab.reach, slowness};
    if (tab.notch_depth > 0.0) {
        const double to_reflector = vacuum_permittivity * spacer.permittivity * tab.width / spacer.height;
        const double to_patch = slit_capacitance(tab, spacer.permittivity);
        feed.pillar.second_share = to_patch / (to_reflector + to_patch);
        // In air the inductance and capacitance of a line multiply to mu0 e0; the dielectric leaves the
        // inductance alone.
        const double in_air = vacuum_permittivity * tab.width / spacer.height + slit_capacitance(tab, 1.0);
        feed.line.slit_inductance = vacuum_permeability * vacuum_permittivity / in_air * tab.notch_depth;
    }
    return feed;
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
        model.pillars.push_back({probe->x, probe->y, equivalent_strip(probe->diameter), 0.0, 0.0});
    } else {
        const auto& tab = std::get<mesh::Tab>(panel.feed);
        const TabFeed feed = tab_feed(tab, panel.patch, panel.spacer);
        model.pillars.push_back(feed.pillar);
        model.line = feed.line;
    }
    for (const mesh::Post& post : panel.posts)
        model.pillars.push_back({post.x, post.y, equivalent_strip(post.diameter), 0.0, 0.0});
    const double rim_height =
        std::max(rim_level * h, lowest_rim * std::max(model.cavity.length, model.cavity.width));
    model.rim = rectangle_rim(model.cavity.length, model.cavity.width, rim_height, rim_spacing * rim_height);
    const mesh::Reflector& reflector = panel.reflector;
    model.plate = {reflector.offset_x - 0.5 * reflector.length, reflector.offset_x + 0.5 * reflector.length,
                   reflector.offset_y - 0.5 * reflector.width, reflector.offset_y + 0.5 * reflector.width};
    return model;
}

Complex at_foot(const FeedLine& line, const Wave& wave, Complex load) {
    if (!(line.impedance > 0.0)) return load;
    const Complex end = load + Complex(0.0, wave.omega * line.slit_inductance);
    const Complex turn(0.0, std::tan(wave.wavenumber * line.slowness * line.length));
    return line.impedance * (end + line.impedance * turn) / (line.impedance + end * turn);
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
