#include "io/touchstone.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <limits>
#include <numbers>

#include "tests/io/temporary_folder.hpp"
#include "tests/near.hpp"

namespace panelwright {
namespace {

using solver::Complex;
using test::message_of;
using test::near;
using test::TemporaryFolder;

class Touchstone : public testing::Test {
  protected:
    io::OnePort read(const std::string& text) const {
        return io::read_touchstone(folder.file("in.s1p", text));
    }
    /// What the reader says about `text`, without the path in front.
    std::string complaint(const std::string& text) const {
        const std::string path = folder.file("in.s1p", text).string();
        const std::string message = message_of<io::FileError>([&] { io::read_touchstone(path); });
        EXPECT_TRUE(message.starts_with(path + ":")) << message;
        return message.substr(path.size());
    }
    std::string written(const io::OnePort& data, const std::string& comment) const {
        io::write_touchstone(folder / "out.s1p", data, comment);
        return io::read_file(folder / "out.s1p");
    }

    TemporaryFolder folder;
};

TEST_F(Touchstone, WritesThePlainForm) {
    const io::OnePort data{{840e6, 869.5e6}, {{0.25, -0.5}, {-1e-5, 0.0}}, 50.0};
    EXPECT_EQ(written(data, "river gauge – 869.5 MHz\nsecond line"),
              "! river gauge ? 869.5 MHz\n! second line\n# Hz S RI R 50\n840000000 0.25 -0.5\n869500000 "
              "-1e-05 0\n");
}

TEST_F(Touchstone, BringsBackEveryDigit) {
    const io::OnePort data{{std::nextafter(1e9, 2e9), 1e9 * std::numbers::pi},
                           {{1.0 / 3.0, -2.0 / 3.0}, {std::numeric_limits<double>::denorm_min(), -0.1}},
                           50.0 + 1.0 / 3.0};
    io::write_touchstone(folder / "out.s1p", data, "");
    const io::OnePort back = io::read_touchstone(folder / "out.s1p");
    EXPECT_EQ(back.frequency, data.frequency);
    EXPECT_EQ(back.s11, data.s11);
    EXPECT_EQ(back.reference, data.reference);
}

TEST_F(Touchstone, TakesTheDefaultsOfTheSpecification) {
    // Touchstone File Format Specification 1.1 (IBIS Open Forum, 2002), "Option line": GHz, S, MA, R 50.
    // [memory, high]
    const io::OnePort data = read("#\n0.8695 0.5 180\n");
    EXPECT_EQ(data.reference, 50.0);
    EXPECT_EQ(data.frequency, std::vector<double>{0.8695 * 1e9});
    // The sine of the double nearest to pi is 1.2e-16.
    EXPECT_TRUE(near(data.s11[0], Complex(-0.5, 0.0), 0.0, 1e-16)) << data.s11[0];
}

TEST_F(Touchstone, ReadsEveryUnit) {
    for (const auto& [unit, hertz] : {std::pair{"Hz", 1.0}, {"kHz", 1e3}, {"MHZ", 1e6}, {"ghz", 1e9}}) {
        EXPECT_EQ(read(std::string("# ") + unit + " S RI R 50\n2 0 0\n").frequency[0], 2.0 * hertz) << unit;
    }
}

TEST_F(Touchstone, ReadsEveryFormat) {
    const Complex expected(0.3, -0.4);
    const double angle = std::arg(expected) * 180.0 / std::numbers::pi;
    const std::string polar = " 0.5 " + std::to_string(angle);
    const std::string decibels = " -6.020599913279624 " + std::to_string(angle);
    EXPECT_EQ(read("# MHz S RI\n1 0.3 -0.4\n").s11[0], expected);
    // std::to_string gives six decimals: half a millionth of a degree at a magnitude of 0.5 is 4.4e-9.
    EXPECT_TRUE(near(read("# MHz S MA\n1" + polar + "\n").s11[0], expected, 0.0, 5e-9));
    EXPECT_TRUE(near(read("# MHz S DB\n1" + decibels + "\n").s11[0], expected, 0.0, 5e-9));
}

TEST_F(Touchstone, ReadsLiberally) {
    const io::OnePort data = read(
        "\xEF\xBB\xBF! first\r\n\r\n   # r 75.5 ma Mhz s ! any order, any case\r\n"
        "\t1 +0.5 0 ! behind a row\r\n!between\r\n# GHz S RI R 50\r\n 2\t5E-1   0");
    EXPECT_EQ(data.frequency, (std::vector<double>{1e6, 2e6}));
    EXPECT_EQ(data.s11, (std::vector<Complex>{0.5, 0.5}));
    EXPECT_EQ(data.reference, 75.5);
}

TEST_F(Touchstone, NamesTheLineThatIsWrong) {
    const std::string options = "# MHz S RI R 50\n";
    EXPECT_EQ(complaint(options + "1 0 0\n1 0 0\n"), ":3: the frequency does not rise from the line before");
    EXPECT_EQ(complaint(options + "2 0 0\n1 0 0\n"), ":3: the frequency does not rise from the line before");
    EXPECT_EQ(complaint(options + "-1 0 0\n"), ":2: the frequency is negative");
    EXPECT_EQ(complaint(options + "1 0 zero\n"), ":2: 'zero' is not a number");
    EXPECT_EQ(complaint(options + "1 0 nan\n"), ":2: 'nan' is not a number");
    EXPECT_EQ(complaint(options + "1 0 1e999\n"), ":2: '1e999' is not a number");
    EXPECT_EQ(complaint(options + "1 0 0.5x\n"), ":2: '0.5x' is not a number");
    EXPECT_EQ(complaint(options + "1 0 +-1\n"), ":2: '+-1' is not a number");
    EXPECT_EQ(complaint(options + "! two-port\n1 0 0 0 0 0 0 0 0\n"),
              ":3: 9 numbers found; a one-port has three in every line: the frequency and two for S11");
    EXPECT_EQ(complaint(options + "1 0\n"),
              ":2: 2 numbers found; a one-port has three in every line: the frequency and two for S11");
    EXPECT_EQ(complaint("1 0 0\n"), ":1: the option line, beginning with #, is missing above the data");
    EXPECT_EQ(complaint("# MHz Z RI\n1 0 0\n"), ":1: Z parameters are not read, only S");
    EXPECT_EQ(complaint("# MHz S RI R\n1 0 0\n"), ":1: R needs a positive number of ohms behind it");
    EXPECT_EQ(complaint("# MHz S RI R -50\n1 0 0\n"), ":1: R needs a positive number of ohms behind it");
    EXPECT_EQ(complaint("# THz S RI\n1 0 0\n"),
              ":1: 'THz' is no part of an option line: allowed are Hz, kHz, MHz, GHz, S, RI, MA, DB and R "
              "with a number");
    EXPECT_EQ(complaint("[Version] 2.0\n"), ":1: this is a keyword of version 2; version 1.x is read");
}

TEST_F(Touchstone, SaysThatThereIsNothingInTheFile) {
    EXPECT_EQ(complaint(""), ": the option line, beginning with #, is missing");
    EXPECT_EQ(complaint("! only words\n# Hz S RI\n"), ": there are no data");
    EXPECT_EQ(message_of<io::FileError>([&] { io::read_touchstone(folder / "none.s1p"); }),
              (folder / "none.s1p").string() + ": cannot open: No such file or directory");
}

TEST_F(Touchstone, SaysThatTheDiskIsFull) {
    EXPECT_EQ(message_of<io::FileError>([] {
                  io::write_touchstone("/dev/full", {{1.0}, {0.5}, 50.0}, "");
              }),
              "/dev/full: cannot write: No space left on device");
}

TEST_F(Touchstone, WritesNoDataThatItCouldNotRead) {
    const double nan = std::numeric_limits<double>::quiet_NaN();
    for (const io::OnePort& bad :
         {io::OnePort{{1.0, 2.0}, {0.5}, 50.0}, io::OnePort{{2.0, 1.0}, {0.5, 0.5}, 50.0},
          io::OnePort{{1.0, 1.0}, {0.5, 0.5}, 50.0}, io::OnePort{{1.0}, {nan}, 50.0},
          io::OnePort{{nan}, {0.5}, 50.0}, io::OnePort{{1.0}, {0.5}, 0.0}, io::OnePort{{1.0}, {0.5}, nan}}) {
        EXPECT_THROW(io::write_touchstone(folder / "bad.s1p", bad, ""), std::invalid_argument);
    }
    EXPECT_FALSE(std::filesystem::exists(folder / "bad.s1p"));
}

}  // namespace
}  // namespace panelwright
