#include "io/dataset_table.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <initializer_list>
#include <stdexcept>

#include "solver/figures.hpp"
#include "solver/result.hpp"

namespace panelwright::io {
namespace {

using enum Element;

constexpr std::array axes{
    AxisEntry{Axis::frequency, "frequency", "F", "/frequency_hz"},
    AxisEntry{Axis::pattern_frequency, "frequency", "P", "/METHOD/pattern/frequency_hz"},
    AxisEntry{Axis::theta, "theta", "T", "/METHOD/pattern/theta_deg"},
    AxisEntry{Axis::phi, "phi", "Q", "/METHOD/pattern/phi_deg"},
    AxisEntry{Axis::point, "point", "n", "/METHOD/mesh/point"},
    AxisEntry{Axis::triangle, "triangle", "m", "/METHOD/mesh/triangle"},
    AxisEntry{Axis::port_edge, "port_edge", "p", "/METHOD/mesh/port_edge"},
    AxisEntry{Axis::corner, "corner", "3", "/axes/corner"},
    AxisEntry{Axis::end, "end", "2", "/axes/end"},
    AxisEntry{Axis::xyz, "xyz", "3", "/axes/xyz"},
    AxisEntry{Axis::post, "post", "N", "/panel/post/number"},
    AxisEntry{Axis::remark, "remark", "R", "/METHOD/remarks"},
};

constexpr std::array attributes{
    AttributeEntry{"/", "program", "text", "`panelwright`"},
    AttributeEntry{"/", "version", "text", "version of the program that made the file"},
    AttributeEntry{"/", "commit", "text",
                   "commit of its source; ends in `-dirty` where the source had uncommitted changes"},
    AttributeEntry{"/", "format_version", "integer", "version of this layout"},
    AttributeEntry{"/", "created_utc", "text", "when the file was made, ISO 8601, UTC"},
    AttributeEntry{"/", "host", "text", "the machine that made it"},
    AttributeEntry{"/", "threads", "integer", "threads that the solver used"},
    AttributeEntry{"/", "case_sha256", "text", "SHA-256 of `/case`, lower-case hexadecimal"},
    AttributeEntry{"/", "title", "text", "title of the case"},
    AttributeEntry{"/", "time_factor", "text",
                   "sign convention of every complex number, and what a phasor's magnitude is"},
    AttributeEntry{"/", "frame", "text", "the coordinate frame, in words"},
    AttributeEntry{"/", "methods", "texts", "the methods in this file: the names that stand for METHOD"},
    AttributeEntry{"/case", "resolved", "text", "the case with all defaults filled in, TOML"},
    AttributeEntry{"/METHOD/pattern/theta_deg", "radians", "reals",
                   "the same angles in radians, to the last digit (the degrees are rounded to 1e-10)"},
    AttributeEntry{"/METHOD/pattern/phi_deg", "radians", "reals", "likewise"},
    AttributeEntry{"/METHOD/health", "names", "texts",
                   "the datasets of this group, in the order of the solver"},
};

using Table = std::vector<DatasetEntry>;

// When a dataset is there.
constexpr std::string_view always = "always";
constexpr std::string_view port = "with a port response";
constexpr std::string_view patterns = "with patterns";
constexpr std::string_view mesh = "with a mesh";
constexpr std::string_view posts = "with posts";

/// Rows that share element type, shape and presence.
struct Row {
    std::string_view path;
    std::string_view units;
    std::string_view description;
};

void add(Table& table, Element element, const std::vector<Axis>& shape, std::string_view present,
         std::initializer_list<Row> rows) {
    for (const Row& row : rows) {
        table.push_back({std::string(row.path), element, shape, std::string(row.units),
                         std::string(row.description), std::string(present)});
    }
}

void add_case(Table& table) {
    add(table, text, {}, always, {{"/case", "text", "The case file, verbatim."}});
    add(table, real, {Axis::frequency}, port,
        {{"/frequency_hz", "Hz", "Frequencies of the band, ascending."}});
    add(table, integer, {Axis::corner}, mesh, {{"/axes/corner", "1", "Corners of a triangle."}});
    add(table, integer, {Axis::end}, mesh, {{"/axes/end", "1", "Ends of an edge."}});
    add(table, text, {Axis::xyz}, mesh, {{"/axes/xyz", "text", "Cartesian components."}});
}

void add_panel(Table& table) {
    const std::string_view metal = "Metal; infinite = without loss.";
    const std::string_view centre = "Its centre relative to that of the patch.";
    add(table, real, {}, always,
        {{"/panel/patch/length_m", "m", "Along x, the resonant side."},
         {"/panel/patch/width_m", "m", "Along y."},
         {"/panel/patch/thickness_m", "m", "Thickness of the sheet; 0 = infinitely thin."},
         {"/panel/patch/conductivity_s_per_m", "S/m", metal},
         {"/panel/spacer/height_m", "m", "Patch above reflector."},
         {"/panel/spacer/permittivity", "1", "Relative permittivity between reflector and patch."},
         {"/panel/spacer/loss_tangent", "1", "Dielectric loss tangent there."},
         {"/panel/reflector/length_m", "m", "Along x."},
         {"/panel/reflector/width_m", "m", "Along y."},
         {"/panel/reflector/offset_x_m", "m", centre},
         {"/panel/reflector/offset_y_m", "m", centre},
         {"/panel/reflector/conductivity_s_per_m", "S/m", metal},
         {"/panel/feed/impedance_ohm", "ohm", "Reference impedance of s11 and of all figures of match."}});
    add(table, text, {}, always, {{"/panel/feed/kind", "text", "Kind of feed: probe or tab."}});
    add(table, real, {}, "with a probe feed",
        {{"/panel/feed/x_m", "m", "Axis of the pin."},
         {"/panel/feed/y_m", "m", "Axis of the pin."},
         {"/panel/feed/diameter_m", "m", "Diameter of the pin."}});
    add(table, real, {}, "with a tab feed",
        {{"/panel/feed/width_m", "m", "Width of the tab."},
         {"/panel/feed/notch_depth_m", "m", "How far the slits beside the tab run into the patch."},
         {"/panel/feed/notch_gap_m", "m", "Width of each slit."},
         {"/panel/feed/reach_m", "m", "How far the tab runs past the edge before it is bent down."}});
    add(table, integer, {Axis::post}, posts, {{"/panel/post/number", "1", "Posts in file order, from 0."}});
    add(table, real, {Axis::post}, posts,
        {{"/panel/post/x_m", "m", "Axis of each post."},
         {"/panel/post/y_m", "m", "Axis of each post."},
         {"/panel/post/diameter_m", "m", "Diameter of each post."}});
}

void add_port(Table& table) {
    add(table, complex, {Axis::frequency}, port,
        {{"/METHOD/impedance_ohm", "ohm",
          "Input impedance at the reflector's upper face, where the feed meets it."},
         {"/METHOD/s11", "1", "Reflection coefficient against /panel/feed/impedance_ohm."}});
    for (const solver::BandFigureEntry& figure : solver::band_figure_table()) {
        const std::string path = fmt::format("/METHOD/band/{}", figure.name);
        add(table, real, {}, port, {{path, figure.unit, figure.definition}});
    }
}

void add_patterns(Table& table) {
    const std::vector<Axis> p{Axis::pattern_frequency};
    const std::vector<Axis> grid{Axis::pattern_frequency, Axis::theta, Axis::phi};
    add(table, real, p, patterns,
        {{"/METHOD/pattern/frequency_hz", "Hz", "Frequencies of patterns, figures and currents."}});
    add(table, real, {Axis::theta}, patterns, {{"/METHOD/pattern/theta_deg", "deg", "From +z (boresight)."}});
    add(table, real, {Axis::phi}, patterns,
        {{"/METHOD/pattern/phi_deg", "deg",
          "From +x towards +y; the E-plane cut is 0 and 180, the H-plane cut 90 and 270."}});
    add(table, complex, grid, patterns,
        {{"/METHOD/pattern/e_theta", "V",
          "Far field r exp(+jkr) E, theta component, for 1 W accepted at the port."},
         {"/METHOD/pattern/e_phi", "V",
          "Far field r exp(+jkr) E, phi component, for 1 W accepted at the port."}});
    add(table, real, grid, patterns,
        {{"/METHOD/pattern/gain_dbi", "dBi",
          "Gain: intensity over the mean that the accepted power would give; not below -200."}});
    add(table, real, p, patterns,
        {{"/METHOD/power/accepted_w", "W", "Power that the antenna takes at its port."},
         {"/METHOD/power/radiated_w", "W", "Power through the whole sphere."},
         {"/METHOD/power/conductor_w", "W", "Power lost in metal."},
         {"/METHOD/power/dielectric_w", "W", "Power lost in the spacer."},
         {"/METHOD/power/surface_wave_w", "W", "Power carried off in the spacer."}});
    for (const solver::FigureEntry& figure : solver::figure_table()) {
        const std::string path = fmt::format("/METHOD/figures/{}", figure.name);
        add(table, real, p, "with figures", {{path, figure.unit, figure.definition}});
    }
}

void add_mesh(Table& table) {
    const std::string_view mesh_port = "with a port in the mesh";
    add(table, integer, {Axis::point}, mesh, {{"/METHOD/mesh/point", "1", "Numbers of the points, from 0."}});
    add(table, integer, {Axis::triangle}, mesh,
        {{"/METHOD/mesh/triangle", "1", "Numbers of the triangles, from 0."},
         {"/METHOD/mesh/part", "1", "Owner of each triangle: 0 reflector, 1 patch, 2 feed, 3 post."}});
    add(table, real, {Axis::point, Axis::xyz}, mesh, {{"/METHOD/mesh/points_m", "m", "Vertices."}});
    add(table, integer, {Axis::triangle, Axis::corner}, mesh,
        {{"/METHOD/mesh/triangles", "1",
          "Numbers of the points at the corners, counter-clockwise about the normal."}});
    add(table, integer, {Axis::port_edge}, mesh_port,
        {{"/METHOD/mesh/port_edge", "1", "Numbers of the edges at the port, from 0."}});
    add(table, integer, {Axis::port_edge, Axis::end}, mesh_port,
        {{"/METHOD/mesh/port_edges", "1",
          "Numbers of the points of each edge where the feed meets the reflector."}});
    add(table, complex, {Axis::pattern_frequency, Axis::triangle, Axis::xyz}, "with currents",
        {{"/METHOD/currents/surface_current", "A/m",
          "Surface current at each triangle's centroid, both faces summed, for 1 W accepted."}});
}

void add_trust(Table& table) {
    add(table, real, {}, "as the method gives them",
        {{"/METHOD/health/NAME", "as it says",
          "How far to trust the result: power_balance (radiated and lost over accepted power), unknowns, "
          "seconds and whatever else the method tells; a scalar, or one value a pattern frequency (P)."}});
    add(table, text, {Axis::remark}, "with remarks",
        {{"/METHOD/remarks", "text", "Limits of the method that this case touches, one sentence each."}});
}

Table make_table() {
    Table table;
    add_case(table);
    add_panel(table);
    add_port(table);
    add_patterns(table);
    add_mesh(table);
    add_trust(table);
    return table;
}

}  // namespace

std::span<const AxisEntry> axis_table() {
    return axes;
}

const AxisEntry& axis_entry(Axis axis) {
    return *std::find_if(axes.begin(), axes.end(),
                         [axis](const AxisEntry& entry) { return entry.axis == axis; });
}

std::span<const DatasetEntry> dataset_table() {
    static const Table table = make_table();
    return table;
}

const DatasetEntry& dataset_entry(std::string_view path) {
    const std::span<const DatasetEntry> table = dataset_table();
    const auto found = std::find_if(table.begin(), table.end(),
                                    [path](const DatasetEntry& entry) { return entry.path == path; });
    if (found == table.end()) throw std::invalid_argument(fmt::format("no dataset {}", path));
    return *found;
}

std::span<const AttributeEntry> attribute_table() {
    return attributes;
}

std::string with_method(std::string_view path, std::string_view method) {
    constexpr std::string_view variable = "/METHOD";
    if (!path.starts_with(variable)) return std::string(path);
    return fmt::format("/{}{}", method, path.substr(variable.size()));
}

}  // namespace panelwright::io
