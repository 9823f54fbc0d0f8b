#include "io/result_file.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <numeric>
#include <set>
#include <stdexcept>
#include <variant>

#include "io/case.hpp"
#include "io/dataset_io.hpp"
#include "io/degrees.hpp"
#include "io/result_fields.hpp"

namespace panelwright::io {
namespace {

using solver::Complex;

template <typename T>
std::span<const T> all(const std::vector<T>& values) {
    return values;
}

/// 0, 1, … : the values of an axis that only counts.
std::vector<std::int32_t> count(std::size_t length) {
    std::vector<std::int32_t> numbers(length);
    std::iota(numbers.begin(), numbers.end(), 0);
    return numbers;
}

/// Ensures that what the file can hold only once is the same wherever it stands in the result.
void require_one_file(const solver::Result& result) {
    std::set<solver::Method> seen;
    const std::vector<double>* band = nullptr;
    for (const solver::MethodResult& method : result.methods) {
        const solver::Solution& solution = method.solution;
        const std::string_view name = solver::name(solution.method);
        if (!seen.insert(solution.method).second) {
            throw std::invalid_argument(fmt::format("the method {} stands twice in the result", name));
        }
        if (!solution.port.frequency.empty()) {
            if (band != nullptr && *band != solution.port.frequency) {
                throw std::invalid_argument("the methods of a result must share one band");
            }
            band = &solution.port.frequency;
        }
        for (const solver::FarField& field : solution.patterns) {
            const solver::FarField& first = solution.patterns.front();
            if (field.theta != first.theta || field.phi != first.phi) {
                throw std::invalid_argument(fmt::format("{}: all patterns must share one grid", name));
            }
        }
        for (const solver::SurfaceCurrent& current : solution.currents) {
            if (current.size() != solution.mesh.triangles.size()) {
                throw std::invalid_argument(fmt::format("{}: one current a triangle is needed", name));
            }
        }
    }
}

void write_root(hid_t root, const solver::Result& result, const Provenance& provenance) {
    hdf5::write_attribute(root, "program", std::string("panelwright"));
    hdf5::write_attribute(root, "version", provenance.version);
    hdf5::write_attribute(root, "commit", provenance.commit);
    hdf5::write_attribute(root, "format_version", result_format_version);
    hdf5::write_attribute(root, "created_utc", provenance.created_utc);
    hdf5::write_attribute(root, "host", provenance.host);
    hdf5::write_attribute(root, "threads", provenance.threads);
    hdf5::write_attribute(root, "case_sha256", sha256(result.case_text));
    hdf5::write_attribute(root, "title", result.title);
    hdf5::write_attribute(root, "time_factor", std::string("exp(+j omega t); phasors are peak values"));
    hdf5::write_attribute(
        root, "frame",
        std::string("right-handed; z = outward normal, from the reflector to the patch (boresight); "
                    "origin on the reflector's upper face under the patch centre; x = the patch's "
                    "resonant length, y = its width; theta from +z, phi from +x towards +y"));
    std::vector<std::string> methods;
    for (const solver::MethodResult& method : result.methods)
        methods.emplace_back(name(method.solution.method));
    hdf5::write_attribute(root, "methods", all(methods));
}

void write_panel(DatasetWriter& writer, const mesh::Panel& panel, double reference) {
    visit_sheets(panel, [&](std::string_view path, double number) { writer.write(path, number); });
    std::visit(
        [&](const auto& feed) {
            writer.write("/panel/feed/kind", std::string(feed_kind(feed)));
            for (const auto& number : numbers(feed)) writer.write(number.path, feed.*number.value);
        },
        panel.feed);
    writer.write("/panel/feed/impedance_ohm", reference);
    if (panel.posts.empty()) return;
    writer.write("/panel/post/number", all(count(panel.posts.size())));
    for (const auto& column : post_columns) {
        std::vector<double> values;
        for (const mesh::Post& post : panel.posts) values.push_back(post.*column.value);
        writer.write(column.path, all(values));
    }
}

/// The axes that all methods share.
void write_shared_axes(DatasetWriter& writer, const std::vector<solver::MethodResult>& methods) {
    const auto with_port = std::find_if(
        methods.begin(), methods.end(),
        [](const solver::MethodResult& method) { return !method.solution.port.frequency.empty(); });
    if (with_port != methods.end()) writer.write("/frequency_hz", all(with_port->solution.port.frequency));
    const bool mesh = std::any_of(methods.begin(), methods.end(), [](const solver::MethodResult& method) {
        return !method.solution.mesh.triangles.empty();
    });
    if (!mesh) return;
    writer.write("/axes/corner", all(count(3)));
    writer.write("/axes/end", all(count(2)));
    writer.write("/axes/xyz", all(std::vector<std::string>{"x", "y", "z"}));
}

void write_port(DatasetWriter& writer, const solver::MethodResult& method, double reference) {
    const solver::PortResponse& port = method.solution.port;
    if (port.frequency.empty()) return;
    writer.write("/METHOD/impedance_ohm", all(port.impedance));
    std::vector<Complex> s11;
    for (const Complex impedance : port.impedance) s11.push_back(solver::reflection(impedance, reference));
    writer.write("/METHOD/s11", all(s11));
    for (const solver::BandFigureEntry& figure : solver::band_figure_table()) {
        writer.write(fmt::format("/METHOD/band/{}", figure.name), method.band.*figure.value);
    }
}

void write_angles(DatasetWriter& writer, std::string_view path, const std::vector<double>& angles) {
    std::vector<double> in_degrees;
    for (const double angle : angles) in_degrees.push_back(degrees(angle));
    const hdf5::Handle dataset = writer.write(path, all(in_degrees));
    hdf5::write_attribute(dataset.id(), "radians", all(angles));
}

template <typename Grid>
void append(std::vector<typename Grid::Scalar>& values, const Grid& grid) {
    values.insert(values.end(), grid.data(), grid.data() + grid.size());
}

void write_patterns(DatasetWriter& writer, const solver::Solution& solution) {
    if (solution.patterns.size() != solution.powers.size()) {
        throw std::invalid_argument("the powers of every pattern are needed");
    }
    if (solution.patterns.empty()) return;
    std::vector<double> frequencies;
    std::vector<double> gain;
    std::vector<Complex> e_theta;
    std::vector<Complex> e_phi;
    for (std::size_t p = 0; p < solution.patterns.size(); ++p) {
        const solver::FarField& field = solution.patterns[p];
        frequencies.push_back(field.frequency);
        append(e_theta, field.e_theta);
        append(e_phi, field.e_phi);
        append(gain, solver::gain_dbi(field, solution.powers[p].accepted));
    }
    writer.write("/METHOD/pattern/frequency_hz", all(frequencies));
    write_angles(writer, "/METHOD/pattern/theta_deg", solution.patterns.front().theta);
    write_angles(writer, "/METHOD/pattern/phi_deg", solution.patterns.front().phi);
    writer.write("/METHOD/pattern/e_theta", all(e_theta));
    writer.write("/METHOD/pattern/e_phi", all(e_phi));
    writer.write("/METHOD/pattern/gain_dbi", all(gain));
    for (const auto& column : power_columns) {
        std::vector<double> values;
        for (const solver::Powers& powers : solution.powers) values.push_back(powers.*column.value);
        writer.write(column.path, all(values));
    }
}

void write_figures(DatasetWriter& writer, const std::vector<solver::Figures>& figures) {
    if (figures.empty()) return;
    for (const solver::FigureEntry& figure : solver::figure_table()) {
        std::vector<double> values;
        for (const solver::Figures& one : figures) values.push_back(one.*figure.value);
        writer.write(fmt::format("/METHOD/figures/{}", figure.name), all(values));
    }
}

/// (n, N) integers in C order from n arrays of N.
template <std::size_t N>
std::vector<std::int32_t> flat(const std::vector<std::array<int, N>>& rows) {
    std::vector<std::int32_t> values;
    for (const std::array<int, N>& row : rows) values.insert(values.end(), row.begin(), row.end());
    return values;
}

void write_mesh(DatasetWriter& writer, const mesh::SheetMesh& mesh) {
    if (mesh.triangles.empty()) return;
    writer.write("/METHOD/mesh/point", all(count(mesh.points.size())));
    writer.write("/METHOD/mesh/triangle", all(count(mesh.triangles.size())));
    std::vector<double> coordinates;
    for (const Eigen::Vector3d& point : mesh.points) {
        coordinates.insert(coordinates.end(), {point.x(), point.y(), point.z()});
    }
    writer.write("/METHOD/mesh/points_m", all(coordinates));
    writer.write("/METHOD/mesh/triangles", all(flat(mesh.triangles)));
    std::vector<std::int32_t> parts;
    for (const mesh::Part part : mesh.part) parts.push_back(static_cast<std::int32_t>(part));
    writer.write("/METHOD/mesh/part", all(parts));
    if (mesh.port_edges.empty()) return;
    writer.write("/METHOD/mesh/port_edge", all(count(mesh.port_edges.size())));
    writer.write("/METHOD/mesh/port_edges", all(flat(mesh.port_edges)));
}

void write_currents(DatasetWriter& writer, const std::vector<solver::SurfaceCurrent>& currents) {
    if (currents.empty()) return;
    std::vector<Complex> values;
    for (const solver::SurfaceCurrent& current : currents) {
        for (const Eigen::Vector3cd& at : current) values.insert(values.end(), {at.x(), at.y(), at.z()});
    }
    writer.write("/METHOD/currents/surface_current", all(values));
}

void write_health(DatasetWriter& writer, const hdf5::Image& image, const solver::Solution& solution) {
    if (!solution.remarks.empty()) writer.write("/METHOD/remarks", all(solution.remarks));
    if (solution.health.empty()) return;
    std::vector<std::string> names;
    for (const solver::HealthEntry& health : solution.health) {
        if (health.name.empty() || health.name.find('/') != std::string::npos) {
            throw std::invalid_argument(fmt::format("'{}' is no name for a health entry", health.name));
        }
        DatasetEntry entry = dataset_entry("/METHOD/health/NAME");
        entry.path = "/METHOD/health/" + health.name;
        entry.units = health.unit;
        entry.description = health.description;
        if (health.per_pattern) entry.shape = {Axis::pattern_frequency};
        writer.write(entry, all(health.values));
        names.push_back(health.name);
    }
    const std::string group = with_method("/METHOD/health", solver::name(solution.method));
    hdf5::write_attribute(hdf5::open_object(image.id(), group).id(), "names", all(names));
}

std::string result_bytes(const solver::Result& result, const Provenance& provenance) {
    const hdf5::Image image;
    DatasetWriter writer(image);
    write_root(image.id(), result, provenance);
    const hdf5::Handle case_text = writer.write("/case", result.case_text);
    hdf5::write_attribute(case_text.id(), "resolved", result.case_resolved);
    write_panel(writer, result.panel, result.reference_impedance);
    write_shared_axes(writer, result.methods);
    for (const solver::MethodResult& method : result.methods) {
        writer.enter(solver::name(method.solution.method));
        write_port(writer, method, result.reference_impedance);
        write_patterns(writer, method.solution);
        write_figures(writer, method.figures);
        write_mesh(writer, method.solution.mesh);
        write_currents(writer, method.solution.currents);
        write_health(writer, image, method.solution);
    }
    return image.bytes();
}

}  // namespace

void write_result(const std::filesystem::path& path, const solver::Result& result,
                  const Provenance& provenance) {
    require_one_file(result);
    const hdf5::Quiet quiet;
    std::string bytes;
    try {
        bytes = result_bytes(result, provenance);
    } catch (const hdf5::Error& error) {
        throw FileError(fmt::format("{}: {}", path.string(), error.what()));
    }
    write_file(path, bytes);
}

}  // namespace panelwright::io
