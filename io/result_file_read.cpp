#include <fmt/format.h>

#include <array>
#include <limits>
#include <variant>

#include "io/case.hpp"
#include "io/dataset_io.hpp"
#include "io/result_fields.hpp"
#include "io/result_file.hpp"

namespace panelwright::io {
namespace {

using solver::Complex;

/// Checks that the file is a result this program can read, and reads the provenance.
Provenance read_provenance(hid_t root) {
    std::string program;
    try {
        program = hdf5::text_attribute(root, "program");
    } catch (const hdf5::Error&) {
        throw hdf5::Error("this HDF5 file is not a result of panelwright");
    }
    if (program != "panelwright") {
        throw hdf5::Error(fmt::format("this HDF5 file was made by '{}', not by panelwright", program));
    }
    const int version = hdf5::integer_attribute(root, "format_version");
    if (version < 1 || version > result_format_version) {
        throw hdf5::Error(fmt::format("the layout has version {}; this program reads versions 1 to {}",
                                      version, result_format_version));
    }
    return {.version = hdf5::text_attribute(root, "version"),
            .commit = hdf5::text_attribute(root, "commit"),
            .created_utc = hdf5::text_attribute(root, "created_utc"),
            .host = hdf5::text_attribute(root, "host"),
            .threads = hdf5::integer_attribute(root, "threads")};
}

void read_case(DatasetReader& reader, hid_t root, solver::Result& result) {
    result.title = hdf5::text_attribute(root, "title");
    result.case_text = reader.read_single<std::string>("/case");
    result.case_resolved = hdf5::text_attribute(reader.open("/case").id(), "resolved");
    if (sha256(result.case_text) != hdf5::text_attribute(root, "case_sha256")) {
        throw hdf5::Error("/case does not agree with its checksum in the attribute case_sha256");
    }
}

template <typename Feed>
Feed read_feed(DatasetReader& reader) {
    Feed feed;
    for (const auto& number : numbers(feed)) feed.*number.value = reader.read_single<double>(number.path);
    return feed;
}

mesh::Panel read_panel(DatasetReader& reader) {
    mesh::Panel panel;
    visit_sheets(panel,
                 [&](std::string_view path, double& number) { number = reader.read_single<double>(path); });
    const std::string kind = reader.read_single<std::string>("/panel/feed/kind");
    if (kind == feed_kind(mesh::Probe{})) {
        panel.feed = read_feed<mesh::Probe>(reader);
    } else if (kind == feed_kind(mesh::Tab{})) {
        panel.feed = read_feed<mesh::Tab>(reader);
    } else {
        throw hdf5::Error(fmt::format("/panel/feed/kind is '{}', neither probe nor tab", kind));
    }
    if (!reader.has("/panel/post")) return panel;
    panel.posts.resize(reader.read<std::int32_t>("/panel/post/number").size());
    for (const auto& column : post_columns) {
        const std::vector<double> values = reader.read<double>(column.path);
        for (std::size_t i = 0; i < values.size(); ++i) panel.posts[i].*column.value = values[i];
    }
    return panel;
}

solver::BandFigures no_band_figures() {
    solver::BandFigures figures{};
    for (const solver::BandFigureEntry& figure : solver::band_figure_table()) {
        figures.*figure.value = std::numeric_limits<double>::quiet_NaN();
    }
    return figures;
}

void read_port(DatasetReader& reader, const std::vector<double>& band, solver::MethodResult& method) {
    method.band = no_band_figures();
    if (!reader.has("/METHOD/band")) return;
    method.solution.port.frequency = band;
    method.solution.port.impedance = reader.read<Complex>("/METHOD/impedance_ohm");
    // Follows from the impedance; read for its shape alone.
    reader.read<Complex>("/METHOD/s11");
    for (const solver::BandFigureEntry& figure : solver::band_figure_table()) {
        method.band.*figure.value = reader.read_single<double>(fmt::format("/METHOD/band/{}", figure.name));
    }
}

std::vector<double> read_angles(DatasetReader& reader, std::string_view path) {
    const std::size_t count = reader.read<double>(path).size();
    std::vector<double> angles = hdf5::real_attribute(reader.open(path).id(), "radians");
    if (angles.size() != count) {
        throw hdf5::Error(fmt::format("the attribute radians of {} is misshapen", path));
    }
    return angles;
}

/// Pattern `p` of (P, T, Q) values.
solver::ComplexGrid slice(const std::vector<Complex>& values, std::size_t p, const solver::FarField& field) {
    const std::size_t size = field.theta.size() * field.phi.size();
    return Eigen::Map<const solver::ComplexGrid>(values.data() + p * size,
                                                 static_cast<Eigen::Index>(field.theta.size()),
                                                 static_cast<Eigen::Index>(field.phi.size()));
}

void read_patterns(DatasetReader& reader, solver::Solution& solution) {
    if (!reader.has("/METHOD/pattern")) return;
    const std::vector<double> frequencies = reader.read<double>("/METHOD/pattern/frequency_hz");
    solver::FarField field;
    field.theta = read_angles(reader, "/METHOD/pattern/theta_deg");
    field.phi = read_angles(reader, "/METHOD/pattern/phi_deg");
    const std::vector<Complex> e_theta = reader.read<Complex>("/METHOD/pattern/e_theta");
    const std::vector<Complex> e_phi = reader.read<Complex>("/METHOD/pattern/e_phi");
    // Follows from the field; read for its shape alone.
    reader.read<double>("/METHOD/pattern/gain_dbi");
    for (std::size_t p = 0; p < frequencies.size(); ++p) {
        field.frequency = frequencies[p];
        field.e_theta = slice(e_theta, p, field);
        field.e_phi = slice(e_phi, p, field);
        solution.patterns.push_back(field);
    }
    solution.powers.resize(frequencies.size());
    for (const auto& column : power_columns) {
        const std::vector<double> values = reader.read<double>(column.path);
        for (std::size_t p = 0; p < values.size(); ++p) solution.powers[p].*column.value = values[p];
    }
}

std::vector<solver::Figures> read_figures(DatasetReader& reader) {
    std::vector<solver::Figures> figures;
    if (!reader.has("/METHOD/figures")) return figures;
    for (const solver::FigureEntry& figure : solver::figure_table()) {
        const std::vector<double> values =
            reader.read<double>(fmt::format("/METHOD/figures/{}", figure.name));
        figures.resize(values.size());
        for (std::size_t p = 0; p < values.size(); ++p) figures[p].*figure.value = values[p];
    }
    return figures;
}

/// n arrays of N from (n, N) integers, each a point number below `points`.
template <std::size_t N>
std::vector<std::array<int, N>> rows(const std::vector<std::int32_t>& values, std::size_t points) {
    std::vector<std::array<int, N>> result(values.size() / N);
    for (std::size_t i = 0; i < values.size(); ++i) {
        if (values[i] < 0 || static_cast<std::size_t>(values[i]) >= points) {
            throw hdf5::Error(
                fmt::format("the mesh names the point {}, but has {} points", values[i], points));
        }
        result[i / N][i % N] = values[i];
    }
    return result;
}

mesh::SheetMesh read_mesh(DatasetReader& reader) {
    mesh::SheetMesh mesh;
    if (!reader.has("/METHOD/mesh")) return mesh;
    reader.read<std::int32_t>("/METHOD/mesh/point");
    reader.read<std::int32_t>("/METHOD/mesh/triangle");
    const std::vector<double> coordinates = reader.read<double>("/METHOD/mesh/points_m");
    for (std::size_t i = 0; i < coordinates.size(); i += 3) {
        mesh.points.emplace_back(coordinates[i], coordinates[i + 1], coordinates[i + 2]);
    }
    mesh.triangles = rows<3>(reader.read<std::int32_t>("/METHOD/mesh/triangles"), mesh.points.size());
    for (const std::int32_t part : reader.read<std::int32_t>("/METHOD/mesh/part")) {
        if (part < 0 || part > static_cast<std::int32_t>(mesh::Part::post)) {
            throw hdf5::Error(fmt::format("the mesh has a part {}; 0 to 3 exist", part));
        }
        mesh.part.push_back(static_cast<mesh::Part>(part));
    }
    if (!reader.has("/METHOD/mesh/port_edge") && !reader.has("/METHOD/mesh/port_edges")) return mesh;
    reader.read<std::int32_t>("/METHOD/mesh/port_edge");
    mesh.port_edges = rows<2>(reader.read<std::int32_t>("/METHOD/mesh/port_edges"), mesh.points.size());
    return mesh;
}

void read_currents(DatasetReader& reader, solver::Solution& solution) {
    if (!reader.has("/METHOD/currents")) return;
    const std::vector<Complex> values = reader.read<Complex>("/METHOD/currents/surface_current");
    const std::size_t triangles = solution.mesh.triangles.size();
    solution.currents.assign(solution.patterns.size(), solver::SurfaceCurrent(triangles));
    for (std::size_t i = 0; i < values.size(); i += 3) {
        solution.currents[i / 3 / triangles][i / 3 % triangles] = {values[i], values[i + 1], values[i + 2]};
    }
}

void read_health(DatasetReader& reader, solver::Solution& solution) {
    if (reader.has("/METHOD/remarks")) solution.remarks = reader.read<std::string>("/METHOD/remarks");
    if (!reader.has("/METHOD/health")) return;
    for (const std::string& name : hdf5::texts_attribute(reader.open("/METHOD/health").id(), "names")) {
        DatasetEntry entry = dataset_entry("/METHOD/health/NAME");
        entry.path = "/METHOD/health/" + name;
        const hdf5::Handle dataset = reader.open(entry.path);
        solver::HealthEntry health{.name = name,
                                   .unit = hdf5::text_attribute(dataset.id(), "units"),
                                   .description = hdf5::text_attribute(dataset.id(), "description"),
                                   .values = {},
                                   .per_pattern = !hdf5::extents(dataset.id()).empty()};
        if (health.per_pattern) entry.shape = {Axis::pattern_frequency};
        health.values = reader.read<double>(entry);
        solution.health.push_back(std::move(health));
    }
}

solver::Method method_named(const std::string& text) {
    for (const solver::Method method :
         {solver::Method::aperture, solver::Method::strip, solver::Method::surface}) {
        if (text == solver::name(method)) return method;
    }
    throw hdf5::Error(fmt::format("there is no method '{}'", text));
}

StoredResult read(const hdf5::Image& image) {
    StoredResult stored;
    stored.provenance = read_provenance(image.id());
    DatasetReader reader(image);
    read_case(reader, image.id(), stored.result);
    stored.result.panel = read_panel(reader);
    stored.result.reference_impedance = reader.read_single<double>("/panel/feed/impedance_ohm");
    std::vector<double> band;
    if (reader.has("/frequency_hz")) band = reader.read<double>("/frequency_hz");
    if (reader.has("/axes")) {
        reader.read<std::int32_t>("/axes/corner");
        reader.read<std::int32_t>("/axes/end");
        reader.read<std::string>("/axes/xyz");
    }
    for (const std::string& name : hdf5::texts_attribute(image.id(), "methods")) {
        solver::MethodResult method;
        method.solution.method = method_named(name);
        reader.enter(name);
        read_port(reader, band, method);
        read_patterns(reader, method.solution);
        method.figures = read_figures(reader);
        method.solution.mesh = read_mesh(reader);
        read_currents(reader, method.solution);
        read_health(reader, method.solution);
        stored.result.methods.push_back(std::move(method));
    }
    return stored;
}

}  // namespace

StoredResult read_result(const std::filesystem::path& path) {
    const std::string bytes = read_file(path);
    const hdf5::Quiet quiet;
    try {
        return read(hdf5::Image(bytes));
    } catch (const hdf5::Error& error) {
        throw FileError(fmt::format("{}: {}", path.string(), error.what()));
    }
}

}  // namespace panelwright::io
