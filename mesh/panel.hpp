/// The antenna as plain data, in metres: patch, spacer, feed, reflector and posts.
///
/// Frame: right-handed; z is the outward normal, from the reflector to the patch; the origin lies on the
/// reflector's upper face under the patch centre; x runs along the patch's resonant length, y along its
/// width.
#pragma once

#include <limits>
#include <string>
#include <variant>
#include <vector>

namespace panelwright::mesh {

/// Conductivity of a metal without loss [S/m].
inline constexpr double perfect_conductivity = std::numeric_limits<double>::infinity();

/// The flat radiating sheet, centred over the origin at z = spacer height.
struct Patch {
    double length = 0.0;                         ///< along x, the resonant side [m]
    double width = 0.0;                          ///< along y [m]
    double thickness = 0.0;                      ///< sheet thickness [m]; 0 = infinitely thin
    double conductivity = perfect_conductivity;  ///< [S/m]; infinite = perfect metal

    bool operator==(const Patch&) const = default;
};

/// What fills the room between reflector and patch.
struct Spacer {
    double height = 0.0;        ///< patch above reflector [m]
    double permittivity = 1.0;  ///< relative permittivity
    double loss_tangent = 0.0;  ///< dielectric loss tangent

    bool operator==(const Spacer&) const = default;
};

/// A round pin from the reflector to the patch.
struct Probe {
    double x = 0.0;         ///< pin axis [m]
    double y = 0.0;         ///< pin axis [m]
    double diameter = 0.0;  ///< [m]

    bool operator==(const Probe&) const = default;
};

/// A strip of the patch sheet, centred on y = 0 at the edge x = -length/2, freed by two slits beside it,
/// running `reach` past the edge and then bent straight down to the reflector.
struct Tab {
    double width = 0.0;        ///< along y [m]
    double notch_depth = 0.0;  ///< how far the two slits run into the patch [m]; 0 = none
    double notch_gap = 0.0;    ///< width of each slit [m]
    double reach = 0.0;        ///< how far the tab runs past the edge before it is bent down [m]

    bool operator==(const Tab&) const = default;
};

/// The closed set of feeds.
using Feed = std::variant<Probe, Tab>;

/// The flat metal plate behind the patch, at z = 0.
struct Reflector {
    double length = 0.0;                         ///< along x [m]
    double width = 0.0;                          ///< along y [m]
    double offset_x = 0.0;                       ///< reflector centre relative to the patch centre [m]
    double offset_y = 0.0;                       ///< reflector centre relative to the patch centre [m]
    double conductivity = perfect_conductivity;  ///< [S/m]

    bool operator==(const Reflector&) const = default;
};

/// A round metal post between reflector and patch.
struct Post {
    double x = 0.0;         ///< axis [m]
    double y = 0.0;         ///< axis [m]
    double diameter = 0.0;  ///< [m]

    bool operator==(const Post&) const = default;
};

/// The whole antenna.
struct Panel {
    Patch patch;
    Spacer spacer;
    Feed feed = Probe{};
    Reflector reflector;
    std::vector<Post> posts;

    bool operator==(const Panel&) const = default;
};

/// One thing that is wrong with a panel's shape.
struct PanelProblem {
    std::string key;        ///< the field at fault, named as in a case file: "feed.x", "post[1].diameter"
    std::string other_key;  ///< the field it clashes with, or empty
    std::string message;    ///< what was found and what is allowed, lengths in mm
};

/// Smallest length that counts as one [m]; a side, width or diameter below it is refused as "not positive".
inline constexpr double smallest_length = 1e-6;

/// Half the side of the square of metal that a round pin or post needs round its axis, in both sheets, over
/// its radius. The squares of two tubes must not overlap either, which is a little more than the circles ask
/// for.
inline constexpr double tube_rim = 1.25;

/// Largest part of its own side by which the patch may reach past the reflector at one end.
inline constexpr double largest_overhang = 0.25;

/// Largest notch depth over patch length, and largest width of tab and slits together over patch width.
inline constexpr double deepest_notch = 0.75;
inline constexpr double widest_notch = 0.9;

/// Everything that is wrong with the shape of `panel`, field by field; empty when it can be built and meshed.
///
/// Each field alone: finite; sides, height, widths and diameters at least `smallest_length`; thickness,
/// reach, notch depth and gap not negative; permittivity 1..100; loss tangent 0..1; conductivity positive
/// (infinite is allowed). Fields together: pin and posts with their rim (`tube_rim`) on the patch and on the
/// reflector, clear of each other and of the tab with its slits; notch within `deepest_notch` and
/// `widest_notch`, with a gap where it has a depth; tab foot on the reflector; patch within the reflector up
/// to `largest_overhang`; sheet thinner than the spacer. A field that is wrong by itself takes part in no
/// further comparison. Limits forgive the rounding of unit conversion (1e-10 of the side concerned).
std::vector<PanelProblem> problems(const Panel& panel);

/// Is `panel` its own mirror image under y -> -y, feed and posts included? Compared exactly.
bool mirror_symmetric(const Panel& panel);

}  // namespace panelwright::mesh
