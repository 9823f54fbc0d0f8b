/// Textbook formulas for the rectangular patch over an infinite ground plane, as published: checks and first
/// guesses.
///
/// "Balanis" is C. A. Balanis, Antenna Theory: Analysis and Design, 4th ed., Wiley 2016, ch. 14. Thin
/// substrates throughout (height below a few hundredths of a wavelength). Lengths in metres, `wavenumber` k =
/// 2 pi / lambda of free space [rad/m]. Every function throws std::invalid_argument on a length, frequency,
/// resistance or conductance that is not positive, or a permittivity below 1.
#pragma once

#include <optional>

namespace panelwright::solver {

/// Width for good radiation efficiency [m]. Balanis (14-6).
double practical_width(double frequency, double permittivity);

/// Effective permittivity of a microstrip line of width `width` at height `height`, `width` > `height`.
/// Balanis (14-1), after E. O. Hammerstad, Proc. 5th European Microwave Conf., 268-272, 1975.
double effective_permittivity(double permittivity, double height, double width);

/// The same for all widths from a hundredth to a hundred heights, to 0.2 % (permittivity up to 128).
/// E. Hammerstad and O. Jensen, IEEE MTT-S Int. Microwave Symp. Digest, 407-409, 1980.
double hammerstad_jensen_permittivity(double permittivity, double height, double width);

/// How much longer the patch is than its sheet at either end, for fringing [m]. Balanis (14-2), after
/// Hammerstad 1975. For dense substrates; over air, a patch ten heights wide, a quarter too short. See
/// `open_end_extension`.
double length_extension(double effective_permittivity, double height, double width);

/// The same to 0.2 % for lines of a hundredth to a hundred heights (permittivity up to 128).
/// M. Kirschning, R. H. Jansen and N. H. L. Koster, Electron. Lett. 17(3), 123-125, 1981.
double open_end_extension(double permittivity, double effective_permittivity, double height, double width);

/// Resonant length of the sheet at `frequency` [m]: half a wavelength less two extensions. Balanis (14-7).
double patch_length(double frequency, double effective_permittivity, double extension);

/// Resonant frequency of a patch by Balanis (14-1), (14-2), (14-7) [Hz]. A thin-substrate formula: over air
/// at h = 0.05 lambda it lies several percent high.
double line_model_resonance(double length, double width, double height, double permittivity);

/// Admittance of one radiating edge.
struct SlotAdmittance {
    double conductance;  ///< [S]
    double susceptance;  ///< [S]
};

/// Admittance of one edge by expansion for a wide edge and low height (h < lambda / 10). Balanis (14-8a),
/// (14-8b); A. G. Derneryd, IEEE Trans. Antennas Propag. 24(6), 846-851, 1976. The literature's 120 is here
/// eta0 / pi.
SlotAdmittance slot_admittance(double wavenumber, double height, double width);

/// Conductance G1 of one radiating edge from its radiated power [S]. Balanis (14-12), the book's 120 pi^2
/// being pi eta0.
double slot_conductance(double wavenumber, double width);

/// Mutual conductance G12 of the two radiating edges `length` apart [S]. Balanis (14-18a).
double mutual_conductance(double wavenumber, double width, double length);

/// Resistance at the edge of the patch at resonance in its dominant mode [ohm]: 1 / (2 (G1 + G12)). Balanis
/// (14-17).
double edge_resistance(double conductance, double mutual);

/// Distance of the feed from the radiating edge for `resistance`, by R = R_edge cos^2(pi y0 / L) [m]. Balanis
/// (14-20a). None where `resistance` exceeds that of the edge.
std::optional<double> inset_for_resistance(double resistance, double edge_resistance, double length);

/// Directivity of one radiating edge. Balanis (14-53).
double one_slot_directivity(double wavenumber, double width);

/// Directivity of the two radiating edges `length` apart. Balanis (14-56); the same quantity as (14-55),
/// whose printed worked value (5.3873 in Example 14.3) does not follow from the formula.
double two_slot_directivity(double wavenumber, double width, double length);

/// Half-power beamwidth in the E-plane [rad], for effective length `length`; none below about 0.244
/// wavelengths, where the formula has no solution. Balanis (14-58).
std::optional<double> beamwidth_e(double wavenumber, double length, double height);

/// Half-power beamwidth in the H-plane [rad]. Balanis (14-59). As published; for half a wavelength of width
/// it is some 19 deg narrower than the two-slot pattern it stands for.
double beamwidth_h(double wavenumber, double width);

/// Patch for the formulas of D. R. Jackson and N. G. Alexopoulos, IEEE Trans. Antennas Propag. 39(3),
/// 407-410, 1991 (as in D. R. Jackson in J. L. Volakis, ed., Antenna Engineering Handbook, 4th ed.,
/// McGraw-Hill 2007, ch. 7): rectangular, mode TM10, thin substrate, no magnetic material.
struct ThinPatch {
    double wavenumber;    ///< of free space [rad/m]
    double length;        ///< effective, along the current [m]
    double width;         ///< effective [m]
    double height;        ///< [m]
    double permittivity;  ///< relative, of the substrate
};

/// p: power radiated by the patch over that of a dipole of the same moment. Derived for dense substrates: the
/// directivity that follows is right to 0.1 % at permittivity 10 and to 3 % at 2.2, but half a dB high for a
/// half-wave patch over air.
double radiated_power_ratio(const ThinPatch& patch);

/// c1 = 1 - 1/er + 2/(5 er^2): what the substrate does to the power radiated by a horizontal dipole; 2/5 for
/// air.
double substrate_factor(double permittivity);

/// Powers of a horizontal electric dipole of unit moment [1 A m, peak] at the top of the substrate [W].
struct DipolePowers {
    double space;         ///< radiated
    double surface_wave;  ///< carried off along the substrate
};
DipolePowers dipole_powers(const ThinPatch& patch);

/// Radiated power over radiated power plus surface wave, 0..1; 1 for air.
double surface_wave_efficiency(const ThinPatch& patch);

/// Quality factor of the patch due to radiation into space alone.
double space_wave_quality(const ThinPatch& patch);

/// Directivity at broadside.
double thin_patch_directivity(const ThinPatch& patch);

/// Relative bandwidth of VSWR <= 2 of a resonator of quality factor `quality`, matched at resonance: 1 /
/// (sqrt(2) Q).
double vswr2_bandwidth(double quality);

}  // namespace panelwright::solver
