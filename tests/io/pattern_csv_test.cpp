#include "io/pattern_csv.hpp"

#include <gtest/gtest.h>

#include <algorithm>

#include "io/degrees.hpp"
#include "tests/io/sample_results.hpp"
#include "tests/io/temporary_folder.hpp"
#include "tests/near.hpp"

namespace panelwright {
namespace {

using test::message_of;
using test::near;
using test::TemporaryFolder;

class PatternCsv : public testing::Test {
  protected:
    /// What the reader says about `text`, without the path in front.
    std::string complaint(const std::string& text) const {
        const std::string name = folder.file("in.csv", text).string();
        const std::string message = message_of<io::FileError>([&] { io::read_pattern_csv(name); });
        EXPECT_TRUE(message.starts_with(name + ":")) << message;
        return message.substr(name.size());
    }

    TemporaryFolder folder;
    std::filesystem::path path = folder / "pattern.csv";
    const std::string header =
        "frequency_hz,theta_deg,phi_deg,e_theta_re_v,e_theta_im_v,e_phi_re_v,e_phi_im_v,gain_dbi\n";
};

TEST_F(PatternCsv, BringsBackPatternsOfSeveralFrequencies) {
    const solver::Solution solution = test::sample_result().methods.front().solution;
    io::write_pattern_csv(path, solution.patterns, solution.powers, "two frequencies");
    const std::vector<solver::FarField> back = io::read_pattern_csv(path);
    ASSERT_EQ(back.size(), 2U);
    for (std::size_t p = 0; p < 2; ++p) {
        const solver::FarField& expected = solution.patterns[p];
        EXPECT_EQ(back[p].frequency, expected.frequency);
        ASSERT_EQ(back[p].theta.size(), expected.theta.size());
        ASSERT_EQ(back[p].phi.size(), expected.phi.size());
        // Whole degrees pass unchanged; what is left is the rounding of degrees to radians.
        for (std::size_t t = 0; t < expected.theta.size(); ++t) {
            EXPECT_TRUE(near(back[p].theta[t], expected.theta[t], 4e-16)) << t;
        }
        for (std::size_t q = 0; q < expected.phi.size(); ++q) {
            EXPECT_TRUE(near(back[p].phi[q], expected.phi[q], 4e-16)) << q;
        }
        for (Eigen::Index i = 0; i < expected.e_theta.size(); ++i) {
            // 13 significant digits of each part: half a unit of the last one, relative to that part.
            EXPECT_TRUE(near(back[p].e_theta.data()[i], expected.e_theta.data()[i], 5e-13)) << i;
            EXPECT_TRUE(near(back[p].e_phi.data()[i], expected.e_phi.data()[i], 5e-13)) << i;
        }
        // A grid that went through the file must still count as one over the whole sphere.
        EXPECT_TRUE(near(solver::radiated_power(back[p]), solver::radiated_power(expected), 1e-11));
    }
}

TEST_F(PatternCsv, SaysWhatTheColumnsMean) {
    const solver::Solution solution = test::sample_result().methods.front().solution;
    io::write_pattern_csv(path, solution.patterns, solution.powers, "hill-top panel\nsecond line");
    const std::string text = io::read_file(path);
    EXPECT_TRUE(text.starts_with("# hill-top panel second line\n#"));
    for (const std::string words :
         {"right-handed", "theta from +z", "phi from +x towards +y", "exp(+j omega t)",
          "r exp(+jkr) E in volts", "1 W accepted", "without mismatch", "below -200"}) {
        EXPECT_NE(text.find(words), std::string::npos) << words;
    }
    const std::size_t rows = text.find("\n" + header);
    ASSERT_NE(rows, std::string::npos);
    EXPECT_TRUE(text.substr(0, rows).find("\n\n") == std::string::npos);
    // e_theta = 1 / 3 - 0.25 j and e_phi = 0: gain 10 log10(4 pi (1/9 + 1/16) / (2 eta)) = -25.374855... dBi.
    EXPECT_TRUE(text.substr(rows + 1 + header.size())
                    .starts_with("869500000,0,0,3.333333333333e-01,-2.500000000000e-01,0.000000000000e+00,"))
        << text.substr(rows, 200);
    EXPECT_EQ(std::count(text.begin() + static_cast<std::ptrdiff_t>(rows), text.end(), '\n'), 2 + 2 * 7 * 12);
}

TEST_F(PatternCsv, GivesTheGainOfTheAcceptedPower) {
    solver::FarField field = solver::whole_sphere(1e9, 0.5);
    field.e_theta.setConstant(1.0);
    io::write_pattern_csv(path, {field}, {{.accepted = 2.0}}, "isotropic");
    const std::string text = io::read_file(path);
    const double gain = std::stod(text.substr(text.rfind(',') + 1));
    // 4 pi |E|^2 / (2 eta) over 2 W; the column has 12 digits.
    const double expected = 10.0 * std::log10(4.0 * solver::pi / (2.0 * solver::vacuum_impedance) / 2.0);
    EXPECT_TRUE(near(gain, expected, 1e-11)) << gain;
}

TEST_F(PatternCsv, KeepsTheAnglesOfCuts) {
    solver::FarField cuts;
    cuts.frequency = 3.4e9;
    cuts.theta = {0.0, 0.3, solver::pi};
    cuts.phi = {0.0, solver::pi / 2.0};
    cuts.e_theta.setConstant(3, 2, {1.0, 2.0});
    cuts.e_phi.setZero(3, 2);
    io::write_pattern_csv(path, {cuts}, {{}}, "cuts");
    const solver::FarField back = io::read_pattern_csv(path).front();
    ASSERT_EQ(back.theta.size(), 3U);
    // 1e-10 degree is 1.7e-12 rad.
    EXPECT_TRUE(near(back.theta[1], 0.3, 0.0, 1.8e-12));
    EXPECT_EQ(back.phi.size(), 2U);
}

TEST_F(PatternCsv, NamesTheLineThatIsWrong) {
    const std::string row = "1e9,0,0,1,0,0,0,3\n";
    EXPECT_EQ(complaint(""), ": the header row is missing");
    EXPECT_EQ(complaint("# a\n"), ": the header row is missing");
    EXPECT_EQ(complaint("# a\n" + header), ": there are no rows");
    EXPECT_EQ(complaint("# a\ntheta,phi\n"),
              ":2: the header row must be " + header.substr(0, header.size() - 1));
    EXPECT_EQ(complaint(header + "1e9,0,0,1,0,0,0\n"), ":2: 7 columns found; every row has 8");
    EXPECT_EQ(complaint(header + "1e9,0,0,1,0,0,0,3,\n"), ":2: 9 columns found; every row has 8");
    EXPECT_EQ(complaint(header + "1e9,0,0,1,0,0,,3\n"), ":2: '' is not a number");
    EXPECT_EQ(complaint(header + row + "1e9,0,90,1,0,0,0,loud\n"), ":3: 'loud' is not a number");
    EXPECT_EQ(complaint(header + row + "\n" + row), ":3: '' is not a number");
}

TEST_F(PatternCsv, WantsAFullGrid) {
    const auto grid_complaint = [&](const std::string& angles) {
        std::string text = header;
        for (std::size_t start = 0; start < angles.size(); start = angles.find(' ', start) + 1) {
            text += "1000," + angles.substr(start, angles.find(' ', start) - start) + ",1,0,0,0,3\n";
        }
        return complaint(text);
    };
    const std::string message = "the rows of 1000 Hz that end here do not fill a grid of theta and phi";
    EXPECT_EQ(grid_complaint("0,0 0,90 90,0 "), ":4: " + message) << "a row is missing";
    EXPECT_EQ(grid_complaint("0,0 0,90 90,0 90,80 "), ":5: " + message) << "another phi";
    EXPECT_EQ(grid_complaint("0,90 0,0 90,90 90,0 "), ":5: " + message) << "phi falls";
    EXPECT_EQ(grid_complaint("90,0 90,90 0,0 0,90 "), ":5: " + message) << "theta falls";
    EXPECT_EQ(grid_complaint("0,0 0,90 90,0 80,90 "), ":5: " + message)
        << "theta changes within a row of phi";
}

TEST_F(PatternCsv, NeedsThePowersOfEveryPattern) {
    EXPECT_THROW(io::write_pattern_csv(path, {solver::whole_sphere(1e9, 0.5)}, {}, ""),
                 std::invalid_argument);
}

TEST_F(PatternCsv, SaysThatTheDiskIsFull) {
    EXPECT_EQ(message_of<io::FileError>(
                  [] { io::write_pattern_csv("/dev/full", {solver::whole_sphere(1e9, 0.1)}, {{}}, ""); }),
              "/dev/full: cannot write: No space left on device");
}

TEST(Degrees, AreWholeWhereTheyShouldBe) {
    const solver::FarField field = solver::whole_sphere(1e9, solver::pi / 90.0);
    for (std::size_t t = 0; t < field.theta.size(); ++t) EXPECT_EQ(io::degrees(field.theta[t]), 2.0 * t);
    for (std::size_t q = 0; q < field.phi.size(); ++q) EXPECT_EQ(io::degrees(field.phi[q]), 2.0 * q);
    EXPECT_EQ(io::degrees(-solver::pi), -180.0);
    // Between the multiples of 1e-10 degree it rounds to the nearest.
    EXPECT_TRUE(near(io::degrees(1.0), 180.0 / solver::pi, 0.0, 0.5e-10));
}

}  // namespace
}  // namespace panelwright
