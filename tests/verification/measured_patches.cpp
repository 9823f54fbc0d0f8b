#include "tests/verification/measured_patches.hpp"

#include <array>
#include <cmath>

#include "solver/aperture/aperture.hpp"
#include "solver/aperture/closed_formulas.hpp"
#include "solver/aperture/fringing.hpp"
#include "solver/constants.hpp"

namespace panelwright::test {
namespace {

constexpr double mm = 1e-3;

constexpr std::array<MeasuredPatch, 42> table{{
    {1, 57.00, 38.00, 3.175, 2.33, 2310, std::nullopt}, {2, 45.50, 30.50, 3.175, 2.33, 2890, std::nullopt},
    {3, 29.50, 19.50, 3.175, 2.33, 4240, std::nullopt}, {4, 19.50, 13.00, 3.175, 2.33, 5840, std::nullopt},
    {5, 17.00, 11.00, 3.175, 2.33, 6800, std::nullopt}, {6, 14.00, 9.00, 3.175, 2.33, 7700, std::nullopt},
    {7, 12.00, 8.00, 3.175, 2.33, 8270, std::nullopt},  {8, 10.50, 7.00, 3.175, 2.33, 9140, std::nullopt},
    {9, 17.00, 11.00, 9.525, 2.33, 4730, std::nullopt}, {10, 8.50, 12.90, 0.170, 2.22, 7740, 1.07},
    {11, 7.90, 11.85, 0.170, 2.22, 8450, std::nullopt}, {12, 20.00, 25.00, 0.790, 2.22, 3970, 2.20},
    {13, 10.63, 11.83, 0.790, 2.55, 7730, 3.85},        {14, 9.10, 10.00, 1.270, 10.20, 4600, 2.05},
    {15, 17.20, 18.60, 1.570, 2.33, 5060, 5.10},        {16, 18.10, 19.60, 1.570, 2.33, 4805, 4.90},
    {17, 12.70, 13.50, 1.630, 2.55, 6560, 6.80},        {18, 15.00, 16.21, 1.630, 2.55, 5600, 5.70},
    {19, 13.37, 14.12, 2.000, 2.55, 6200, 7.70},        {20, 11.20, 12.00, 2.420, 2.55, 7050, 10.90},
    {21, 14.03, 14.85, 2.520, 2.55, 5800, 9.30},        {22, 15.30, 16.30, 3.000, 2.50, 5270, 10.00},
    {23, 9.05, 10.18, 3.000, 2.50, 7990, 16.00},        {24, 11.70, 12.80, 3.000, 2.50, 6570, 13.60},
    {25, 13.75, 15.80, 4.760, 2.55, 5100, 15.90},       {26, 7.76, 10.80, 3.300, 2.55, 8000, 17.50},
    {27, 7.90, 12.55, 4.000, 2.55, 7134, 18.20},        {28, 9.87, 14.50, 4.500, 2.55, 6070, 17.90},
    {29, 10.00, 15.20, 4.760, 2.55, 5820, 18.00},       {30, 8.14, 14.40, 4.760, 2.55, 6380, 19.00},
    {31, 7.90, 16.20, 5.500, 2.55, 5990, 20.00},        {32, 12.00, 19.70, 6.260, 2.55, 4660, 18.70},
    {33, 7.83, 23.00, 8.540, 2.55, 4600, 20.90},        {34, 12.56, 27.56, 9.520, 2.55, 3580, 20.00},
    {35, 9.74, 26.20, 9.520, 2.55, 3980, 20.60},        {36, 10.20, 26.40, 9.520, 2.55, 3900, 20.30},
    {37, 8.83, 26.76, 10.000, 2.55, 3980, 20.90},       {38, 7.77, 28.35, 11.000, 2.55, 3900, 21.96},
    {39, 9.20, 31.30, 12.000, 2.55, 3470, 21.50},       {40, 10.30, 33.80, 12.810, 2.55, 3200, 21.60},
    {41, 12.65, 35.00, 12.810, 2.55, 2980, 20.40},      {42, 10.80, 34.00, 12.810, 2.55, 3150, 21.20},
}};

double health(const solver::Solution& solution, std::string_view name) {
    for (const solver::HealthEntry& entry : solution.health)
        if (entry.name == name) return entry.values.at(0);
    return std::nan("");
}

}  // namespace

std::span<const MeasuredPatch> measured_patches() {
    return table;
}

PatchResonances resonances(const MeasuredPatch& patch) {
    const mesh::Patch sheet{patch.length_mm * mm, patch.width_mm * mm, 0.0, mesh::perfect_conductivity};
    const mesh::Spacer spacer{patch.height_mm * mm, patch.permittivity, 0.0};
    return {
        solver::fringing(sheet, spacer).resonance * 1e-6,
        solver::line_model_resonance(sheet.length, sheet.width, spacer.height, spacer.permittivity) * 1e-6};
}

std::optional<double> full_solution_mhz(const MeasuredPatch& patch) {
    switch (patch.row) {
        case 1:
            return 2360.0;
        case 2:
            return 2890.0;
        case 10:
            return 7710.0;
        case 15:
            return 4900.0;
        case 19:
            return 5870.0;
        default:
            return std::nullopt;
    }
}

double electrical_height(const MeasuredPatch& patch) {
    return patch.height_mm * mm * patch.resonance_mhz * 1e6 * std::sqrt(patch.permittivity) /
           solver::speed_of_light;
}

std::optional<double> allowed_error_percent(const MeasuredPatch& patch) {
    if (patch.row <= 2) return 3.0;
    if (patch.row >= 10 && patch.row <= 12) return 2.0;
    if (patch.row >= 13 && patch.row <= 25) return 7.0;
    return std::nullopt;
}

double bandwidth_percent(const MeasuredPatch& patch) {
    const double resonance = resonances(patch).fringing_mhz * 1e6;
    const double side = 1.5 * solver::speed_of_light / resonance;
    constexpr double copper = 5.8e7;
    mesh::Panel panel;
    panel.patch = {patch.length_mm * mm, patch.width_mm * mm, 0.0, copper};
    panel.spacer = {patch.height_mm * mm, patch.permittivity, 0.001};
    panel.feed = mesh::Probe{-0.25 * panel.patch.length, 0.0, 0.02 * panel.patch.length};
    panel.reflector = {side, side, 0.0, 0.0, copper};
    solver::Task task;
    task.band = {resonance};
    task.pattern_at = {resonance};
    task.pattern_step = solver::pi / 18.0;
    task.accuracy = solver::Accuracy::quick;
    const double quality = health(solver::solve_aperture(panel, task), "cavity_quality_factor");
    return 100.0 * solver::vswr2_bandwidth(quality);
}

}  // namespace panelwright::test
