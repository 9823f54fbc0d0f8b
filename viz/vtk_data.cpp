#include "viz/vtk_data.hpp"

#include <fmt/format.h>
#include <vtkCellArray.h>
#include <vtkCellData.h>
#include <vtkDoubleArray.h>
#include <vtkFieldData.h>
#include <vtkNew.h>
#include <vtkPointData.h>
#include <vtkPoints.h>
#include <vtkStringArray.h>
#include <vtkUnsignedCharArray.h>

#include <algorithm>
#include <cmath>
#include <functional>
#include <stdexcept>
#include <string>

namespace panelwright::viz {
namespace {

constexpr std::string_view frame =
    "right-handed, metres; z = outward normal from the reflector to the patch, origin on the reflector's "
    "upper face "
    "under the patch centre, x = the patch's resonant length, y = its width; theta from +z, phi from +x "
    "towards +y";

void add_text(vtkPolyData& data, const char* name, std::string_view text) {
    vtkNew<vtkStringArray> array;
    array->SetName(name);
    array->InsertNextValue(std::string(text));
    data.GetFieldData()->AddArray(array);
}

void add_number(vtkPolyData& data, const char* name, double value) {
    vtkNew<vtkDoubleArray> array;
    array->SetName(name);
    array->InsertNextValue(value);
    data.GetFieldData()->AddArray(array);
}

void describe(vtkPolyData& data, const solver::Solution& solution, double frequency, std::string_view title) {
    add_text(data, "title", title);
    add_text(data, "method", solver::name(solution.method));
    add_text(data, "frame", frame);
    add_text(data, "phasors", "peak values, time factor exp(+j omega t), for 1 W accepted at the port");
    add_number(data, "frequency_hz", frequency);
}

vtkIdType id(std::size_t number) {
    return static_cast<vtkIdType>(number);
}

/// A named array of `size` tuples of `components` numbers, to be filled through `GetPointer`.
vtkSmartPointer<vtkDoubleArray> numbers(const std::string& name, int components, std::size_t size) {
    auto array = vtkSmartPointer<vtkDoubleArray>::New();
    array->SetName(name.c_str());
    array->SetNumberOfComponents(components);
    array->SetNumberOfTuples(id(size));
    return array;
}

void add_geometry(vtkPolyData& data, const mesh::SheetMesh& mesh) {
    vtkNew<vtkPoints> points;
    points->SetDataTypeToDouble();
    points->SetNumberOfPoints(id(mesh.points.size()));
    for (std::size_t n = 0; n < mesh.points.size(); ++n) points->SetPoint(id(n), mesh.points[n].data());
    vtkNew<vtkCellArray> triangles;
    triangles->AllocateExact(id(mesh.triangles.size()), id(3 * mesh.triangles.size()));
    for (const auto& [a, b, c] : mesh.triangles) triangles->InsertNextCell({a, b, c});
    data.SetPoints(points);
    data.SetPolys(triangles);
}

/// The directions of a whole-sphere field as the points of a closed surface: the pole theta = 0, the rings
/// between the poles in order of theta, the pole theta = pi.
class SphereGrid {
  public:
    explicit SphereGrid(const solver::FarField& field)
        : rings_(field.theta.size() - 2), around_(field.phi.size()), field_(field) {}

    std::size_t points() const { return rings_ * around_ + 2; }

    /// Calls `action(point, t, q)` for every point, with the indices of its direction in the field.
    template <typename Action>
    void for_each_point(Action&& action) const {
        action(std::size_t{0}, Eigen::Index{0}, Eigen::Index{0});
        for (std::size_t ring = 0; ring < rings_; ++ring) {
            for (std::size_t q = 0; q < around_; ++q) {
                action(on_ring(ring, q), static_cast<Eigen::Index>(ring + 1), static_cast<Eigen::Index>(q));
            }
        }
        action(points() - 1, static_cast<Eigen::Index>(rings_ + 1), Eigen::Index{0});
    }

    /// Triangles at the poles, quadrilaterals between; all counter-clockwise seen from outside.
    vtkSmartPointer<vtkCellArray> cells() const {
        auto cells = vtkSmartPointer<vtkCellArray>::New();
        cells->AllocateExact(id((rings_ + 1) * around_), id(4 * (rings_ + 1) * around_));
        const vtkIdType south = id(points() - 1);
        for (std::size_t q = 0; q < around_; ++q) {
            cells->InsertNextCell({0, id(on_ring(0, q)), id(on_ring(0, q + 1))});
        }
        for (std::size_t ring = 0; ring + 1 < rings_; ++ring) {
            for (std::size_t q = 0; q < around_; ++q) {
                cells->InsertNextCell({id(on_ring(ring, q)), id(on_ring(ring + 1, q)),
                                       id(on_ring(ring + 1, q + 1)), id(on_ring(ring, q + 1))});
            }
        }
        for (std::size_t q = 0; q < around_; ++q) {
            cells->InsertNextCell({id(on_ring(rings_ - 1, q)), south, id(on_ring(rings_ - 1, q + 1))});
        }
        cells->ConvertTo32BitStorage();  // half the bytes to write
        return cells;
    }

    Eigen::Vector3d direction(Eigen::Index t, Eigen::Index q) const {
        const double theta = field_.get().theta[static_cast<std::size_t>(t)];
        const double phi = field_.get().phi[static_cast<std::size_t>(q)];
        return {std::sin(theta) * std::cos(phi), std::sin(theta) * std::sin(phi), std::cos(theta)};
    }

  private:
    std::size_t on_ring(std::size_t ring, std::size_t q) const { return 1 + ring * around_ + q % around_; }

    std::size_t rings_;
    std::size_t around_;
    std::reference_wrapper<const solver::FarField> field_;
};

void add_component(vtkPolyData& data, const SphereGrid& grid, const std::string& name,
                   const solver::ComplexGrid& values) {
    const auto re = numbers(name + "_re_V", 1, grid.points());
    const auto im = numbers(name + "_im_V", 1, grid.points());
    const auto magnitude = numbers(name + "_magnitude_V", 1, grid.points());
    double* const to_re = re->GetPointer(0);
    double* const to_im = im->GetPointer(0);
    double* const to_magnitude = magnitude->GetPointer(0);
    grid.for_each_point([&](std::size_t point, Eigen::Index t, Eigen::Index q) {
        to_re[point] = values(t, q).real();
        to_im[point] = values(t, q).imag();
        to_magnitude[point] = std::abs(values(t, q));
    });
    for (const auto& array : {re, im, magnitude}) data.GetPointData()->AddArray(array);
}

}  // namespace

vtkSmartPointer<vtkPolyData> currents_data(const solver::Solution& solution, std::size_t p,
                                           std::string_view title) {
    if (p >= solution.currents.size() || p >= solution.patterns.size()) {
        throw std::invalid_argument("no such pattern frequency");
    }
    const solver::SurfaceCurrent& current = solution.currents[p];
    const std::size_t size = solution.mesh.triangles.size();
    if (current.size() != size || solution.mesh.part.size() != size) {
        throw std::invalid_argument("a triangle needs one current and one part");
    }
    auto data = vtkSmartPointer<vtkPolyData>::New();
    add_geometry(*data, solution.mesh);
    const auto re = numbers("surface_current_re_A_per_m", 3, size);
    const auto im = numbers("surface_current_im_A_per_m", 3, size);
    const auto magnitude = numbers("surface_current_magnitude_A_per_m", 1, size);
    vtkNew<vtkUnsignedCharArray> part;
    part->SetName("part");
    part->SetNumberOfTuples(id(size));
    for (std::size_t t = 0; t < size; ++t) {
        const Eigen::Vector3d real = current[t].real();
        const Eigen::Vector3d imaginary = current[t].imag();
        re->SetTuple(id(t), real.data());
        im->SetTuple(id(t), imaginary.data());
        magnitude->SetValue(id(t), current[t].norm());
        part->SetValue(id(t), static_cast<unsigned char>(solution.mesh.part[t]));
    }
    for (const auto& array : {re, im, magnitude}) data->GetCellData()->AddArray(array);
    data->GetCellData()->AddArray(part);
    data->GetCellData()->SetActiveScalars(magnitude->GetName());
    describe(*data, solution, solution.patterns[p].frequency, title);
    return data;
}

vtkSmartPointer<vtkPolyData> pattern_data(const solver::Solution& solution, std::size_t p,
                                          const PatternSurface& surface, std::string_view title) {
    if (p >= solution.patterns.size()) throw std::invalid_argument("no such pattern frequency");
    if (!(surface.floor_db < 0.0 && std::isfinite(surface.floor_db))) {
        throw std::invalid_argument("the floor of a pattern surface must be below 0 dB");
    }
    if (!(surface.radius > 0.0 && std::isfinite(surface.radius))) {
        throw std::invalid_argument("the radius of a pattern surface must be positive");
    }
    const solver::FarField& field = solution.patterns[p];
    if (!solver::covers_whole_sphere(field)) {
        throw std::invalid_argument("a closed surface needs a pattern of the whole sphere");
    }

    const solver::RealGrid gain =
        solver::gain_dbi(field, p < solution.powers.size() ? solution.powers[p].accepted : 1.0);
    const double peak = gain.maxCoeff();
    const SphereGrid grid(field);
    auto data = vtkSmartPointer<vtkPolyData>::New();
    vtkNew<vtkPoints> points;
    points->SetDataTypeToFloat();  // a drawing; the values themselves keep every digit
    points->SetNumberOfPoints(id(grid.points()));
    const auto gains = numbers("gain_dbi", 1, grid.points());
    grid.for_each_point([&](std::size_t point, Eigen::Index t, Eigen::Index q) {
        const double share = std::max(0.0, 1.0 - (peak - gain(t, q)) / -surface.floor_db);
        const Eigen::Vector3d place = surface.radius * share * grid.direction(t, q);
        points->SetPoint(id(point), place.data());
        gains->SetValue(id(point), gain(t, q));
    });
    data->SetPoints(points);
    data->SetPolys(grid.cells());
    data->GetPointData()->AddArray(gains);
    data->GetPointData()->SetActiveScalars(gains->GetName());
    add_component(*data, grid, "e_theta", field.e_theta);
    add_component(*data, grid, "e_phi", field.e_phi);
    describe(*data, solution, field.frequency, title);
    add_number(*data, "floor_db", surface.floor_db);
    add_number(*data, "radius_m", surface.radius);
    add_number(*data, "peak_gain_dbi", peak);
    add_text(
        *data, "scale",
        fmt::format(
            "radius = {} m at the peak of {:.2f} dBi, falling in proportion to the gain in dB to 0 at {} dB "
            "below the peak",
            surface.radius, peak, -surface.floor_db));
    return data;
}

}  // namespace panelwright::viz
