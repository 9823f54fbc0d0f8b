#include "solver/aperture/closed_formulas.hpp"

#include <algorithm>
#include <boost/math/quadrature/gauss_kronrod.hpp>
#include <boost/math/special_functions/bessel.hpp>
#include <cmath>
#include <initializer_list>
#include <stdexcept>

#include "solver/constants.hpp"

namespace panelwright::solver {

namespace {

double square(double x) {
    return x * x;
}
double cube(double x) {
    return x * x * x;
}

void require_positive(std::initializer_list<double> values) {
    const auto wrong = [](double value) { return !(value > 0.0); };
    if (std::any_of(values.begin(), values.end(), wrong)) {
        throw std::invalid_argument("lengths, frequencies, resistances and conductances must be positive");
    }
}

void require_permittivity(double permittivity) {
    if (!(permittivity >= 1.0)) throw std::invalid_argument("a relative permittivity must not be below 1");
}

void require_patch(const ThinPatch& patch) {
    require_positive({patch.wavenumber, patch.length, patch.width, patch.height});
    require_permittivity(patch.permittivity);
}

/// The integral over theta = 0..pi of [sin(k W/2 cos) / cos]^2 J0(k L sin) sin^3. Balanis (14-12a) for
/// `length` = 0, the integral of (14-18a) else.
double edge_integral(double wavenumber, double width, double length) {
    const double half = 0.5 * wavenumber * width;
    const auto integrand = [=](double theta) {
        const double cosine = std::cos(theta);
        const double sine = std::sin(theta);
        const double lobe = std::abs(cosine) < 1e-8 ? half : std::sin(half * cosine) / cosine;
        const double coupling = length > 0.0 ? boost::math::cyl_bessel_j(0, wavenumber * length * sine) : 1.0;
        return square(lobe) * coupling * cube(sine);
    };
    // Even about theta = pi/2.
    return 2.0 *
           boost::math::quadrature::gauss_kronrod<double, 31>::integrate(integrand, 0.0, pi / 2.0, 12, 1e-12);
}

}  // namespace

double practical_width(double frequency, double permittivity) {
    require_positive({frequency});
    require_permittivity(permittivity);
    return speed_of_light / (2.0 * frequency) * std::sqrt(2.0 / (permittivity + 1.0));
}

double effective_permittivity(double permittivity, double height, double width) {
    require_positive({height, width});
    require_permittivity(permittivity);
    return 0.5 * (permittivity + 1.0) + 0.5 * (permittivity - 1.0) / std::sqrt(1.0 + 12.0 * height / width);
}

double hammerstad_jensen_permittivity(double permittivity, double height, double width) {
    require_positive({height, width});
    require_permittivity(permittivity);
    const double u = width / height;
    const double u4 = square(square(u));
    const double a =
        1.0 + std::log((u4 + square(u / 52.0)) / (u4 + 0.432)) / 49.0 + std::log(1.0 + cube(u / 18.1)) / 18.7;
    const double b = 0.564 * std::pow((permittivity - 0.9) / (permittivity + 3.0), 0.053);
    return 0.5 * (permittivity + 1.0) + 0.5 * (permittivity - 1.0) * std::pow(1.0 + 10.0 / u, -a * b);
}

double length_extension(double effective_permittivity, double height, double width) {
    require_positive({height, width});
    require_permittivity(effective_permittivity);
    const double u = width / height;
    return 0.412 * height * (effective_permittivity + 0.3) * (u + 0.264) /
           ((effective_permittivity - 0.258) * (u + 0.8));
}

double open_end_extension(double permittivity, double effective_permittivity, double height, double width) {
    require_positive({height, width});
    require_permittivity(permittivity);
    require_permittivity(effective_permittivity);
    const double u = width / height;
    const double e = std::pow(effective_permittivity, 0.81);
    const double w = std::pow(u, 0.8544);
    const double xi1 = 0.434907 * (e + 0.26) / (e - 0.189) * (w + 0.236) / (w + 0.87);
    const double xi2 = 1.0 + std::pow(u, 0.371) / (2.358 * permittivity + 1.0);
    const double xi3 = 1.0 + 0.5274 * std::atan(0.084 * std::pow(u, 1.9413 / xi2)) /
                                 std::pow(effective_permittivity, 0.9236);
    const double xi4 = 1.0 + 0.0377 * std::atan(0.067 * std::pow(u, 1.456)) *
                                 (6.0 - 5.0 * std::exp(0.036 * (1.0 - permittivity)));
    const double xi5 = 1.0 - 0.218 * std::exp(-7.5 * u);
    return height * xi1 * xi3 * xi5 / xi4;
}

double patch_length(double frequency, double effective_permittivity, double extension) {
    require_positive({frequency});
    require_permittivity(effective_permittivity);
    return speed_of_light / (2.0 * frequency * std::sqrt(effective_permittivity)) - 2.0 * extension;
}

double line_model_resonance(double length, double width, double height, double permittivity) {
    require_positive({length});
    const double effective = effective_permittivity(permittivity, height, width);
    const double resonant = length + 2.0 * length_extension(effective, height, width);
    return speed_of_light / (2.0 * resonant * std::sqrt(effective));
}

SlotAdmittance slot_admittance(double wavenumber, double height, double width) {
    require_positive({wavenumber, height, width});
    const double kh = wavenumber * height;
    const double scale = wavenumber * width / (2.0 * vacuum_impedance);  // W / (120 lambda)
    return {scale * (1.0 - square(kh) / 24.0), scale * (1.0 - 0.636 * std::log(kh))};
}

double slot_conductance(double wavenumber, double width) {
    require_positive({wavenumber, width});
    return edge_integral(wavenumber, width, 0.0) / (pi * vacuum_impedance);
}

double mutual_conductance(double wavenumber, double width, double length) {
    require_positive({wavenumber, width, length});
    return edge_integral(wavenumber, width, length) / (pi * vacuum_impedance);
}

double edge_resistance(double conductance, double mutual) {
    require_positive({conductance, conductance + mutual});
    return 0.5 / (conductance + mutual);
}

std::optional<double> inset_for_resistance(double resistance, double edge_resistance, double length) {
    require_positive({resistance, edge_resistance, length});
    if (resistance > edge_resistance) return std::nullopt;
    return length / pi * std::acos(std::sqrt(resistance / edge_resistance));
}

double one_slot_directivity(double wavenumber, double width) {
    require_positive({wavenumber, width});
    return square(wavenumber * width) / edge_integral(wavenumber, width, 0.0);
}

double two_slot_directivity(double wavenumber, double width, double length) {
    require_positive({wavenumber, width, length});
    const double own = edge_integral(wavenumber, width, 0.0);
    const double mutual = edge_integral(wavenumber, width, length);
    return one_slot_directivity(wavenumber, width) * 2.0 / (1.0 + mutual / own);
}

std::optional<double> beamwidth_e(double wavenumber, double length, double height) {
    require_positive({wavenumber, length, height});
    // 7.03 lambda^2 / (4 pi^2) = 7.03 / k^2.
    const double sine_squared = 7.03 / (square(wavenumber) * (3.0 * square(length) + square(height)));
    if (sine_squared > 1.0) return std::nullopt;
    return 2.0 * std::asin(std::sqrt(sine_squared));
}

double beamwidth_h(double wavenumber, double width) {
    require_positive({wavenumber, width});
    return 2.0 * std::asin(std::sqrt(1.0 / (2.0 + wavenumber * width)));
}

double radiated_power_ratio(const ThinPatch& patch) {
    require_patch(patch);
    constexpr double a2 = -0.16605;
    constexpr double a4 = 0.00761;
    constexpr double c2 = -0.0914153;
    const double kw2 = square(patch.wavenumber * patch.width);
    const double kl2 = square(patch.wavenumber * patch.length);
    return 1.0 + a2 / 10.0 * kw2 + (a2 * a2 + 2.0 * a4) * 3.0 / 560.0 * square(kw2) + c2 / 5.0 * kl2 +
           a2 * c2 / 70.0 * kw2 * kl2;
}

double substrate_factor(double permittivity) {
    require_permittivity(permittivity);
    return 1.0 - 1.0 / permittivity + 0.4 / square(permittivity);
}

DipolePowers dipole_powers(const ThinPatch& patch) {
    require_patch(patch);
    const double kh = patch.wavenumber * patch.height;
    // The paper's 80 pi^2 and 60 pi^3 over lambda^2, with eta0 = 120 pi taken back out.
    const double scale = vacuum_impedance * square(patch.wavenumber) / (12.0 * pi);
    const double trapped = 1.0 - 1.0 / patch.permittivity;
    return {scale * square(kh) * 2.0 * substrate_factor(patch.permittivity),
            scale * cube(kh) * 1.5 * pi * cube(trapped)};
}

double surface_wave_efficiency(const ThinPatch& patch) {
    const DipolePowers powers = dipole_powers(patch);
    return powers.space / (powers.space + powers.surface_wave);
}

double space_wave_quality(const ThinPatch& patch) {
    const double factor = radiated_power_ratio(patch) * substrate_factor(patch.permittivity);
    const double wavelength = 2.0 * pi / patch.wavenumber;
    return 3.0 / 16.0 * patch.permittivity / factor * (patch.length / patch.width) *
           (wavelength / patch.height);
}

double thin_patch_directivity(const ThinPatch& patch) {
    const double factor = radiated_power_ratio(patch) * substrate_factor(patch.permittivity);
    const double k1h = patch.wavenumber * std::sqrt(patch.permittivity) * patch.height;
    const double tangent = std::tan(k1h);
    return 3.0 / factor * patch.permittivity / (patch.permittivity + square(tangent)) * square(tangent / k1h);
}

double vswr2_bandwidth(double quality) {
    require_positive({quality});
    return 1.0 / (std::sqrt(2.0) * quality);
}

}  // namespace panelwright::solver
