#include <gtest/gtest.h>

#include <cmath>
#include <stdexcept>
#include <vector>

#include "solver/aperture/radiation.hpp"
#include "solver/constants.hpp"
#include "tests/near.hpp"
#include "tests/reference/rim_radiation.hpp"
#include "tests/reference/sample_fields.hpp"

namespace panelwright::solver {
namespace {

using test::near;

constexpr double degree = pi / 180.0;
const Wave wave(2.44e9);
const Rim rim = rectangle_rim(0.064, 0.074, 0.01, 0.0075);
const Plate off_centre{-0.05, 0.09, -0.06, 0.08};
const Plate centred{-0.06, 0.06, -0.07, 0.07};

/// Rim voltages: the fundamental mode, and something without any symmetry.
Eigen::MatrixXcd voltages(const Rim& of) {
    Eigen::MatrixXcd out(static_cast<Eigen::Index>(of.points.size()), 2);
    for (std::size_t i = 0; i < of.points.size(); ++i) {
        const Eigen::Vector2d& p = of.points[i];
        const auto row = static_cast<Eigen::Index>(i);
        out(row, 0) = std::sin(pi / 0.064 * p.x());
        out(row, 1) =
            Complex(0.2 + 0.1 * std::cos(40.0 * p.y() + 1.0), 0.1 * std::sin(20.0 * p.x()) + 3.0 * p.y());
    }
    return out;
}

/// Electric field of one direction as a vector.
Eigen::Vector3cd vector_field(const FarField& field, Eigen::Index t, Eigen::Index q) {
    const double theta = field.theta[static_cast<std::size_t>(t)];
    const double phi = field.phi[static_cast<std::size_t>(q)];
    const Eigen::Vector3d along_theta(std::cos(theta) * std::cos(phi), std::cos(theta) * std::sin(phi),
                                      -std::sin(theta));
    const Eigen::Vector3d along_phi(-std::sin(phi), std::cos(phi), 0.0);
    return along_theta.cast<Complex>() * field.e_theta(t, q) + along_phi.cast<Complex>() * field.e_phi(t, q);
}

double greatest(const FarField& field) {
    return std::sqrt((field.e_theta.abs2() + field.e_phi.abs2()).maxCoeff());
}

/// A dipole at `place` (in wavelengths over 2 pi), whose far field has harmonics to about |place|.
test::VectorPattern displaced(const Eigen::Vector3d& axis, const Eigen::Vector3d& place) {
    return [=, source = test::dipole(axis, 0.0)](const Eigen::Vector3d& r) -> Eigen::Vector3cd {
        return source(r) * std::polar(1.0, r.dot(place));
    };
}

TEST(InterpolateSphere, IsExactForFieldsWithoutHighHarmonics) {
    const auto pattern = displaced(Eigen::Vector3d(0.6, 0.0, 0.8), {1.5, -2.0, 1.0});
    for (const double coarse : {7.5, 5.0})
        for (const double fine : {3.0, 2.0, 1.0}) {
            const FarField interpolated = interpolate_sphere(test::sampled(pattern, coarse), fine * degree);
            const FarField exact = test::sampled(pattern, fine);
            // Harmonics above 24 of a source 2.7 from the origin: (1.35)^24 / 24! = 2e-21; what is left is
            // rounding.
            EXPECT_LT((interpolated.e_theta - exact.e_theta).abs().maxCoeff(), 1e-12)
                << coarse << ' ' << fine;
            EXPECT_LT((interpolated.e_phi - exact.e_phi).abs().maxCoeff(), 1e-12) << coarse << ' ' << fine;
        }
}

TEST(InterpolateSphere, KeepsTheValuesThatItWasGiven) {
    const FarField field =
        test::sampled(test::beam(test::direction(30.0, 40.0), test::direction(120.0, 40.0), 40.0), 6.0);
    const FarField finer = interpolate_sphere(field, 2.0 * degree);
    for (Eigen::Index t = 0; t < field.e_theta.rows(); ++t)
        for (Eigen::Index q = 0; q < field.e_theta.cols(); ++q)
            EXPECT_TRUE(near(field.e_theta(t, q), finer.e_theta(3 * t, 3 * q), 0.0, 1e-12));
}

TEST(InterpolateSphere, NeedsAWholeSphere) {
    FarField cut = test::sampled(test::dipole(Eigen::Vector3d::UnitZ(), 0.5));
    cut.phi[3] += 0.01;
    EXPECT_THROW(interpolate_sphere(cut, degree), std::invalid_argument);
}

/// Greatest distance between the fast far field and plain sums, over the greatest field.
struct Distance {
    double in_plane = 0.0;  ///< in the plate's plane
    double elsewhere = 0.0;
};
Distance distance_from_plain_sums(const Plate& plate, Eigen::Index source, double step_deg) {
    const Eigen::MatrixXcd all = voltages(rim);
    const FarField fast = panel_far_fields(wave, rim, plate, all, DiffractionOrder::second,
                                           step_deg * degree)[static_cast<std::size_t>(source)];
    const test::PlainPanel plain(rim, plate, all.col(source), wave.wavenumber, DiffractionOrder::second);
    const Eigen::Index last = fast.e_theta.rows() - 1;
    Distance distance;
    for (const double share : {0.0, 0.11, 0.27, 0.46, 0.5, 0.54, 0.7, 0.9, 1.0})
        for (const double round : {0.0, 0.1, 0.31, 0.5, 0.77}) {
            const auto t = static_cast<Eigen::Index>(std::lround(share * static_cast<double>(last)));
            const auto q =
                static_cast<Eigen::Index>(std::lround(round * static_cast<double>(fast.e_theta.cols())));
            const Eigen::Vector2cd e =
                plain.field(fast.theta[static_cast<std::size_t>(t)], fast.phi[static_cast<std::size_t>(q)]);
            const double apart =
                std::hypot(std::abs(e(0) - fast.e_theta(t, q)), std::abs(e(1) - fast.e_phi(t, q)));
            double& largest = 2 * t == last ? distance.in_plane : distance.elsewhere;
            largest = std::max(largest, apart / greatest(fast));
        }
    return distance;
}

TEST(PanelFarFields, AgreeWithPlainSums) {
    // Evaluated at every direction (15 deg is coarser than the field needs): the quadrature over the plate
    // differs.
    const Distance direct = distance_from_plain_sums(off_centre, 1, 15.0);
    EXPECT_LT(direct.elsewhere, 1e-3);
    EXPECT_LT(direct.in_plane, 1e-3);
    // Interpolated from steps of 10 deg: the harmonics left out come on top. Most are in the plate's plane,
    // where the fringe of each edge has its one direction that the edge's length alone keeps finite.
    for (const auto& [plate, source] :
         {std::pair(off_centre, Eigen::Index{1}), std::pair(centred, Eigen::Index{0})}) {
        const Distance interpolated = distance_from_plain_sums(plate, source, 2.0);
        EXPECT_LT(interpolated.elsewhere, 5e-3);
        EXPECT_LT(interpolated.in_plane, 2e-2);
    }
}

TEST(PanelFarFields, FollowTheMirrorPlane) {
    // A field that is computed for half the sphere must be what the whole computation gives: a push that
    // breaks the symmetry by far less than it adds to the field.
    Eigen::MatrixXcd voltage = voltages(rim).leftCols(1);
    const FarField half =
        panel_far_fields(wave, rim, centred, voltage, DiffractionOrder::second, 3.0 * degree)[0];
    voltage(0, 0) += 1e-8;
    const FarField whole =
        panel_far_fields(wave, rim, centred, voltage, DiffractionOrder::second, 3.0 * degree)[0];
    EXPECT_LT((half.e_theta - whole.e_theta).abs().maxCoeff(), 1e-8 * greatest(half));
    EXPECT_LT((half.e_phi - whole.e_phi).abs().maxCoeff(), 1e-8 * greatest(half));
}

TEST(PanelFarFields, DoNotJumpAnywhere) {
    // Plain sums on either side of the plate's plane and of the planes where rays of the rim graze the edges:
    // nothing may jump, for a ten-thousandth of a degree moves the field by 1e-5 of the peak at most.
    const test::PlainPanel panel(rim, off_centre, voltages(rim).col(1), wave.wavenumber,
                                 DiffractionOrder::second);
    const double peak = panel.field(0.0, 0.0).norm();
    for (const double phi : {0.0, 20.0, 90.0, 133.0, 180.0, 270.0, 311.0})
        for (const double theta : {90.0, 100.0, 170.0}) {
            const Eigen::Vector2cd before = panel.field((theta - 5e-5) * degree, phi * degree);
            const Eigen::Vector2cd after = panel.field((theta + 5e-5) * degree, phi * degree);
            EXPECT_LT((before - after).norm(), 2e-5 * peak) << theta << ' ' << phi;
        }
}

TEST(PanelFarFields, AreOneVectorAtEachPole) {
    const std::vector<FarField> fields =
        panel_far_fields(wave, rim, off_centre, voltages(rim), DiffractionOrder::second, 2.0 * degree);
    for (const FarField& field : fields)
        for (const Eigen::Index pole : {Eigen::Index{0}, field.e_theta.rows() - 1}) {
            const Eigen::Vector3cd first = vector_field(field, pole, 0);
            for (Eigen::Index q = 1; q < field.e_theta.cols(); ++q)
                EXPECT_LT((vector_field(field, pole, q) - first).norm(), 1e-10 * greatest(field))
                    << pole << ' ' << q;
        }
}

TEST(PanelFarFields, HaveNoCrossPolarPartInThePrincipalPlanesOfASymmetricPanel) {
    const FarField field = panel_far_fields(wave, rim, centred, voltages(rim).leftCols(1),
                                            DiffractionOrder::second, 3.0 * degree)[0];
    const LudwigThird parts = ludwig_third(field);
    const Eigen::Index quarter = field.e_theta.cols() / 4;
    for (Eigen::Index t = 0; t < field.e_theta.rows(); ++t)
        for (Eigen::Index q = 0; q < 4; ++q)
            EXPECT_LT(std::abs(parts.cross(t, q * quarter)), 1e-10 * greatest(field)) << t << ' ' << q;
}

TEST(PanelFarFields, OfALargePlateAreThoseOfAnImage) {
    // Over ten wavelengths of plate the field towards the zenith is twice that of the rim alone but for the
    // image's phase, cos(k h) instead of 1. Diffraction leaves a few percent.
    const double k = wave.wavenumber;
    const Plate large{-0.6, 0.63, -0.61, 0.62};
    const Eigen::MatrixXcd voltage = voltages(rim).leftCols(1);
    const FarField field =
        panel_far_fields(wave, rim, large, voltage, DiffractionOrder::second, 15.0 * degree)[0];
    Eigen::Vector2cd magnetic = Eigen::Vector2cd::Zero();
    for (std::size_t i = 0; i < rim.points.size(); ++i)
        magnetic -= voltage(static_cast<Eigen::Index>(i), 0) * rim.elements[i].cast<Complex>();
    const double expected = 2.0 * std::cos(k * rim.height) * k / (4.0 * pi) * magnetic.norm();
    EXPECT_TRUE(near(std::abs(field.e_theta(0, 0)), expected, 0.08));
}

TEST(MutualPowers, AreThoseOfAnyMixture) {
    const std::vector<FarField> fields =
        panel_far_fields(wave, rim, off_centre, voltages(rim), DiffractionOrder::second, 2.0 * degree);
    const Eigen::MatrixXcd powers = mutual_powers(fields);
    EXPECT_EQ(powers(0, 1), std::conj(powers(1, 0)));
    for (const Complex a : {Complex(1.0, 0.0), Complex(0.0, -1.0), Complex(0.3, 0.8)}) {
        FarField both = fields[0];
        both.e_theta = a * fields[0].e_theta + fields[1].e_theta;
        both.e_phi = a * fields[0].e_phi + fields[1].e_phi;
        const double mixed =
            std::norm(a) * powers(0, 0).real() + powers(1, 1).real() + 2.0 * (a * powers(0, 1)).real();
        EXPECT_TRUE(near(mixed, radiated_power(both), 1e-12)) << a;
    }
    // Their own, coarser sphere gives the same to three digits, as it says.
    const Eigen::MatrixXcd quick =
        mutual_powers(power_fields(wave, rim, off_centre, voltages(rim), DiffractionOrder::second));
    const double size = std::sqrt(powers(0, 0).real() * powers(1, 1).real());
    EXPECT_TRUE(near(quick(0, 0).real(), powers(0, 0).real(), 1e-3));
    EXPECT_TRUE(near(quick(1, 1).real(), powers(1, 1).real(), 1e-3));
    EXPECT_LT(std::abs(quick(0, 1) - powers(0, 1)), 1e-3 * size);
}

TEST(PanelFarFields, DoNotSeeTheSpacingOfTheRimsPoints) {
    const Rim fine = rectangle_rim(0.064, 0.074, 0.01, 0.002);
    const FarField usual =
        panel_far_fields(wave, rim, off_centre, voltages(rim), DiffractionOrder::second, 15.0 * degree)[1];
    const FarField finer =
        panel_far_fields(wave, fine, off_centre, voltages(fine), DiffractionOrder::second, 15.0 * degree)[1];
    EXPECT_LT((usual.e_theta - finer.e_theta).abs().maxCoeff(), 5e-3 * greatest(finer));
    EXPECT_LT((usual.e_phi - finer.e_phi).abs().maxCoeff(), 5e-3 * greatest(finer));
}

}  // namespace
}  // namespace panelwright::solver
