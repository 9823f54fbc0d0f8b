#include "viz/vtk_files.hpp"

#include <gtest/gtest.h>
#include <vtkCell.h>
#include <vtkCellData.h>
#include <vtkDataArray.h>
#include <vtkFeatureEdges.h>
#include <vtkFieldData.h>
#include <vtkNew.h>
#include <vtkPointData.h>
#include <vtkPolyData.h>
#include <vtkSmartPointer.h>
#include <vtkStringArray.h>
#include <vtkXMLPolyDataReader.h>

#include <cmath>

#include "solver/constants.hpp"
#include "tests/near.hpp"

namespace panelwright::viz {
namespace {

using solver::Complex;

constexpr double single_precision = 3e-7;  // coordinates are stored as floats: a few times 2^-24

/// A smooth far field with a front lobe, a smaller back lobe and both components.
solver::FarField lobes(double frequency, double step) {
    solver::FarField field = solver::whole_sphere(frequency, step);
    for (std::size_t t = 0; t < field.theta.size(); ++t) {
        for (std::size_t q = 0; q < field.phi.size(); ++q) {
            const double amplitude = 10.0 * (1.1 + std::cos(field.theta[t])) + 0.5;
            const auto i = static_cast<Eigen::Index>(t);
            const auto j = static_cast<Eigen::Index>(q);
            field.e_theta(i, j) = amplitude * std::cos(field.phi[q]) * std::polar(1.0, 0.3 * field.theta[t]);
            field.e_phi(i, j) = {-amplitude * std::sin(field.phi[q]) * std::cos(field.theta[t]), 0.4};
        }
    }
    return field;
}

/// Two triangles of a unit square and one standing on its diagonal, with currents that differ everywhere.
solver::Solution sample(double step) {
    solver::Solution solution;
    solution.patterns = {lobes(869.5e6, step)};
    solver::Powers powers;
    powers.accepted = 1.25;
    solution.powers = {powers};
    solution.mesh.points = {
        {0.0, 0.0, 0.0}, {1.0, 0.0, 0.0}, {1.0, 1.0, 0.0}, {0.0, 1.0, 0.0}, {0.5, 0.5, 0.7}};
    solution.mesh.triangles = {{0, 1, 2}, {0, 2, 3}, {0, 2, 4}};
    solution.mesh.part = {mesh::Part::reflector, mesh::Part::patch, mesh::Part::feed};
    const Complex j{0.0, 1.0};
    solution.currents = {{Eigen::Vector3cd(1.0 + 2.0 * j, -3.0, 0.5 * j), Eigen::Vector3cd(0.0, 4.0 * j, 3.0),
                          Eigen::Vector3cd(0.0, 0.0, -0.125)}};
    return solution;
}

vtkSmartPointer<vtkPolyData> read(const std::filesystem::path& path) {
    vtkNew<vtkXMLPolyDataReader> reader;
    reader->SetFileName(path.c_str());
    reader->Update();
    EXPECT_EQ(reader->GetErrorCode(), 0U);
    return reader->GetOutput();
}

std::filesystem::path temporary(const char* name) {
    return std::filesystem::path(testing::TempDir()) / name;
}

std::string text(vtkPolyData* data, const char* name) {
    auto* array = vtkStringArray::SafeDownCast(data->GetFieldData()->GetAbstractArray(name));
    return array == nullptr ? "missing" : std::string(array->GetValue(0));
}

double number(vtkPolyData* data, const char* name) {
    auto* array = data->GetFieldData()->GetArray(name);
    return array == nullptr ? std::nan("") : array->GetComponent(0, 0);
}

vtkSmartPointer<vtkPolyData> pattern_read_back(const solver::Solution& solution,
                                               const PatternSurface& surface) {
    const auto path = temporary("vtk_files_test_pattern.vtp");
    write_pattern(path, solution, 0, surface, "River gauge");
    auto data = read(path);
    std::filesystem::remove(path);
    return data;
}

TEST(Currents, KeepGeometryValuesAndParts) {
    const solver::Solution solution = sample(solver::pi / 6.0);
    const auto path = temporary("vtk_files_test_currents.vtp");
    write_currents(path, solution, 0, "River gauge");
    const auto data = read(path);
    std::filesystem::remove(path);
    ASSERT_EQ(data->GetNumberOfPoints(), 5);
    ASSERT_EQ(data->GetNumberOfCells(), 3);
    EXPECT_EQ(data->GetPoint(4)[2], 0.7);
    EXPECT_EQ(data->GetCell(2)->GetPointId(2), 4);

    auto* re = data->GetCellData()->GetArray("surface_current_re_A_per_m");
    auto* im = data->GetCellData()->GetArray("surface_current_im_A_per_m");
    auto* magnitude = data->GetCellData()->GetArray("surface_current_magnitude_A_per_m");
    auto* part = data->GetCellData()->GetArray("part");
    ASSERT_TRUE(re != nullptr && im != nullptr && magnitude != nullptr && part != nullptr);
    EXPECT_EQ(re->GetNumberOfComponents(), 3);
    EXPECT_EQ(re->GetComponent(0, 1), -3.0);
    EXPECT_EQ(im->GetComponent(0, 0), 2.0);
    EXPECT_EQ(im->GetComponent(1, 1), 4.0);
    EXPECT_EQ(magnitude->GetComponent(1, 0), 5.0);  // sqrt(4^2 + 3^2), exact in binary
    EXPECT_EQ(part->GetComponent(2, 0), 2.0);
    EXPECT_EQ(text(data, "title"), "River gauge");
    EXPECT_EQ(text(data, "method"), "aperture");
    EXPECT_NE(text(data, "frame").find("right-handed"), std::string::npos);
    EXPECT_EQ(number(data, "frequency_hz"), 869.5e6);
}

TEST(Pattern, HasEveryDirectionOnceAndOnePointAPole) {
    const auto data = pattern_read_back(sample(solver::pi / 18.0), {});
    // theta 0..180 in 10 degrees: 17 rings of 36 points and two poles; 2 x 36 triangles and 16 x 36
    // quadrilaterals.
    EXPECT_EQ(data->GetNumberOfPoints(), 17 * 36 + 2);
    EXPECT_EQ(data->GetNumberOfCells(), 2 * 36 + 16 * 36);
}

TEST(Pattern, IsAClosedSurfaceWithoutSeam) {
    const auto data = pattern_read_back(sample(solver::pi / 18.0), {});
    vtkNew<vtkFeatureEdges> edges;
    edges->SetInputData(data);
    edges->BoundaryEdgesOn();
    edges->NonManifoldEdgesOn();
    edges->FeatureEdgesOff();
    edges->ManifoldEdgesOff();
    edges->Update();
    EXPECT_EQ(edges->GetOutput()->GetNumberOfCells(), 0);
}

TEST(Pattern, FacesOutwards) {
    // A floor below every lobe, so that no cell shrinks to nothing. The surface is then star-shaped about the
    // origin and every cell's normal must look away from it.
    const auto data = pattern_read_back(sample(solver::pi / 18.0), {.floor_db = -80.0});
    for (vtkIdType c = 0; c < data->GetNumberOfCells(); ++c) {
        vtkPoints* corners = data->GetCell(c)->GetPoints();
        const vtkIdType last = corners->GetNumberOfPoints() - 1;
        Eigen::Vector3d a;
        Eigen::Vector3d b;
        Eigen::Vector3d d;
        corners->GetPoint(0, a.data());
        corners->GetPoint(1, b.data());
        corners->GetPoint(last, d.data());
        ASSERT_GT((b - a).cross(d - a).dot(a + b + d), 0.0) << "cell " << c;
    }
}

TEST(Pattern, RadiusFollowsTheGainAboveTheFloor) {
    const solver::Solution solution = sample(solver::pi / 18.0);
    PatternSurface surface;
    surface.floor_db = -12.0;
    surface.radius = 0.4;
    const auto data = pattern_read_back(solution, surface);
    const solver::RealGrid gain = solver::gain_dbi(solution.patterns[0], 1.25);
    const double peak = gain.maxCoeff();
    auto* gains = data->GetPointData()->GetArray("gain_dbi");
    ASSERT_NE(gains, nullptr);
    bool some_at_the_floor = false;
    for (vtkIdType n = 0; n < data->GetNumberOfPoints(); ++n) {
        Eigen::Vector3d place;
        data->GetPoint(n, place.data());
        const double expected = 0.4 * std::fmax(0.0, (gains->GetComponent(n, 0) - peak + 12.0) / 12.0);
        ASSERT_TRUE(test::near(place.norm(), expected, single_precision)) << n;
        some_at_the_floor = some_at_the_floor || expected == 0.0;
    }
    EXPECT_TRUE(some_at_the_floor);
    EXPECT_EQ(gains->GetComponent(0, 0), gain(0, 0));
    EXPECT_EQ(gains->GetComponent(1 + 36 * 4 + 7, 0), gain(5, 7));
    EXPECT_EQ(gains->GetComponent(data->GetNumberOfPoints() - 1, 0), gain(18, 0));
    EXPECT_EQ(number(data, "floor_db"), -12.0);
    EXPECT_EQ(number(data, "radius_m"), 0.4);
    EXPECT_EQ(number(data, "peak_gain_dbi"), peak);
    EXPECT_NE(text(data, "scale").find("0.4 m"), std::string::npos);
}

TEST(Pattern, KeepsBothComponentsAndPlacesThemByAngle) {
    const solver::Solution solution = sample(solver::pi / 18.0);
    const auto data = pattern_read_back(solution, {});
    const auto value = [&](const char* name, vtkIdType n) {
        auto* array = data->GetPointData()->GetArray(name);
        return array == nullptr ? std::nan("") : array->GetComponent(n, 0);
    };
    const vtkIdType n = 1 + 36 * 2 + 5;  // theta 30, phi 50 degrees
    const Complex e_theta = solution.patterns[0].e_theta(3, 5);
    const Complex e_phi = solution.patterns[0].e_phi(3, 5);
    EXPECT_EQ(value("e_theta_re_V", n), e_theta.real());
    EXPECT_EQ(value("e_theta_im_V", n), e_theta.imag());
    EXPECT_EQ(value("e_theta_magnitude_V", n), std::abs(e_theta));
    EXPECT_EQ(value("e_phi_re_V", n), e_phi.real());
    EXPECT_EQ(value("e_phi_im_V", n), e_phi.imag());
    EXPECT_EQ(value("e_phi_magnitude_V", n), std::abs(e_phi));
    const double* place = data->GetPoint(n);
    const double degree = solver::pi / 180.0;
    EXPECT_TRUE(test::near(std::atan2(place[1], place[0]), 50.0 * degree, single_precision));
    EXPECT_TRUE(
        test::near(std::atan2(std::hypot(place[0], place[1]), place[2]), 30.0 * degree, single_precision));
}

TEST(Writers, NameTheFileThatCannotBeWritten) {
    const solver::Solution solution = sample(solver::pi / 6.0);
    for (const char* path : {"/nonexistent-folder/x.vtp", "/dev/full"}) {
        try {
            write_pattern(path, solution, 0);
            ADD_FAILURE() << path << ": no exception";
        } catch (const VtkError& error) {
            EXPECT_NE(std::string(error.what()).find(path), std::string::npos);
        }
    }
}

TEST(Writers, RefuseWhatTheyCannotDraw) {
    solver::Solution solution = sample(solver::pi / 6.0);
    EXPECT_THROW(write_pattern("x.vtp", solution, 1), std::invalid_argument);
    EXPECT_THROW(write_currents("x.vtp", solution, 1), std::invalid_argument);
    EXPECT_THROW(write_pattern("x.vtp", solution, 0, {.floor_db = 0.0}), std::invalid_argument);
    EXPECT_THROW(write_pattern("x.vtp", solution, 0, {.radius = 0.0}), std::invalid_argument);
    solution.currents[0].pop_back();
    EXPECT_THROW(write_currents("x.vtp", solution, 0), std::invalid_argument);
    solution.patterns[0].phi.pop_back();
    EXPECT_THROW(write_pattern("x.vtp", solution, 0), std::invalid_argument);
    EXPECT_FALSE(std::filesystem::exists("x.vtp"));
}

}  // namespace
}  // namespace panelwright::viz
