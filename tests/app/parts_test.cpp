/// Parts of the application that need no process of their own.
#include <gtest/gtest.h>

#include <cmath>
#include <csignal>
#include <fstream>
#include <stdexcept>

#include "app/atomic_file.hpp"
#include "app/case_difference.hpp"
#include "app/designs_table.hpp"
#include "app/progress.hpp"
#include "app/report.hpp"
#include "app/single.hpp"
#include "app/stop_signals.hpp"
#include "io/file.hpp"
#include "tests/app/cases.hpp"
#include "tests/app/process.hpp"

namespace panelwright::app {
namespace {

using test::content;
using test::listing;
using test::TemporaryFolder;

TEST(CommitFile, ReplacesTheFileAsAWhole) {
    const TemporaryFolder folder;
    const auto path = folder.write("table.csv", "old");
    commit_file(path, [&](const std::filesystem::path& temporary) {
        EXPECT_EQ(temporary.parent_path(), path.parent_path());
        EXPECT_TRUE(is_temporary(temporary));
        io::write_file(temporary, "new");
        EXPECT_EQ(content(path), "old");
    });
    EXPECT_EQ(content(path), "new");
    EXPECT_EQ(listing(folder.path()), std::vector<std::string>{"table.csv"});
}

TEST(CommitFile, LeavesNothingBehindWhenTheWriterFails) {
    const TemporaryFolder folder;
    const auto path = folder.write("table.csv", "old");
    const auto writer = [](const std::filesystem::path& temporary) {
        io::write_file(temporary, "half of the n");
        throw std::runtime_error("no more");
    };
    EXPECT_THROW(commit_file(path, writer), std::runtime_error);
    EXPECT_EQ(content(path), "old");
    EXPECT_EQ(listing(folder.path()), std::vector<std::string>{"table.csv"});
}

TEST(CommitFile, NamesATargetThatCannotBeReplaced) {
    const TemporaryFolder folder;
    std::filesystem::create_directories(folder / "taken/inside");
    try {
        commit_file(folder / "taken", [](const std::filesystem::path& path) { io::write_file(path, "x"); });
        FAIL() << "no exception";
    } catch (const io::FileError& error) {
        EXPECT_NE(std::string(error.what()).find((folder / "taken").string()), std::string::npos);
    }
    EXPECT_EQ(listing(folder.path()), (std::vector<std::string>{"taken", "taken/inside"}));
}

TEST(CaseDifferences, NameEveryKeyThatDiffers) {
    const std::string stored =
        "title = \"a\"\n[patch]\nlength = \"1 mm\"\n[[post]]\nx = \"1 mm\"\n[[post]]\nx = \"2 mm\"\n";
    const std::string asked =
        "title = \"a\"\n[patch]\nlength = \"2 mm\"\nmetal = \"brass\"\n[[post]]\nx = \"1 mm\"\n";
    const auto found = case_differences(stored, asked);
    ASSERT_EQ(found.size(), 3U);
    EXPECT_EQ(found[0].key, "patch.length");
    EXPECT_EQ(found[0].stored, "1 mm");
    EXPECT_EQ(found[0].asked, "2 mm");
    EXPECT_EQ(found[1].key, "patch.metal");
    EXPECT_EQ(found[1].stored, "");
    EXPECT_EQ(found[2].key, "post[2].x");
    EXPECT_EQ(found[2].asked, "");
}

TEST(CaseDifferences, SeeListsAndLongTextsWhole) {
    EXPECT_TRUE(case_differences("v = [\"1 mm\", \"2 mm\"]", "v   = [ \"1 mm\",\"2 mm\" ]").empty());
    EXPECT_EQ(case_differences("v = [\"1 mm\", \"2 mm\"]", "v = [\"1 mm\", \"3 mm\"]").size(), 1U);
    const std::string start(500, 'x');
    EXPECT_EQ(case_differences("title = \"" + start + "a\"", "title = \"" + start + "b\"").size(), 1U);
}

TEST(DesignsTable, QuotesCellsAndTellsMissingFromNotExisting) {
    const io::Case study = io::parse_case(test::small_study(3), "study.toml");
    std::vector<DesignRow> rows = design_rows(study);
    ASSERT_EQ(rows.size(), 3U);
    rows[0].status = DesignStatus::done;
    rows[0].pattern_frequency = 870e6;
    rows[0].methods = {MethodFigures{}};
    rows[0].methods[0].band.best_match_db = -12.5;
    rows[0].methods[0].band.vswr2_from_hz = std::nan("");
    rows[0].methods[0].power_balance = 0.98;
    rows[0].remarks = {"thin, very", "wide"};
    rows[1].status = DesignStatus::failed;
    rows[1].reason = "a \"bad\" one, really";
    const std::string csv = designs_csv(study, rows);
    EXPECT_EQ(csv.find("design,reflector.length_mm,reflector.width_mm,status,reason,pattern_frequency_hz,"
                       "aperture.resonance_hz,"),
              0U);
    EXPECT_NE(csv.find("\n1,200,200,done,,870000000,0,0,-12.5,nan,"), std::string::npos) << csv;
    EXPECT_NE(csv.find(",aperture.power_balance,remarks\n"), std::string::npos) << csv;
    EXPECT_NE(csv.find(",0.98,\"thin, very; wide\"\n2,202,202,failed,\"a \"\"bad\"\" one, really\",,,"),
              std::string::npos)
        << csv;
    EXPECT_NE(csv.find("\n3,204,204,not reached,,,,"), std::string::npos) << csv;
}

TEST(ProgressTime, IsJudgedByTheDesignsThatThisRunTried) {
    EXPECT_FALSE(time_left({.total = 10, .reused = 4}, 3.0).has_value());
    // Six designs left, two tried in 3 s, four more reused at no cost: 4 * 1.5 s.
    EXPECT_DOUBLE_EQ(time_left({.total = 10, .reused = 4, .solved = 1, .failed = 1}, 3.0).value(), 6.0);
}

TEST(ProgressTime, ReadsAsAPersonSaysIt) {
    EXPECT_EQ(shown_duration(0.2), "less than 1 s");
    EXPECT_EQ(shown_duration(59.4), "59 s");
    EXPECT_EQ(shown_duration(59.6), "1 min 00 s");
    EXPECT_EQ(shown_duration(3720.0), "1 h 02 min");
}

TEST(ShownValue, FollowsTheUnit) {
    EXPECT_EQ(shown_value(869.5e6, "Hz"), "869.500 MHz");
    EXPECT_EQ(shown_value(0.9712, "1"), "0.971");
    EXPECT_EQ(shown_value(61.25, "deg"), "61.2 deg");
    EXPECT_EQ(shown_value(9.119, "dBi"), "9.12 dBi");
    EXPECT_EQ(shown_value(std::nan(""), "dB"), "none");
}

TEST(StopSignals, AreSeenWhenAskedForAndNotBefore) {
    StopSignals signals;
    EXPECT_FALSE(signals.requested());
    ASSERT_EQ(raise(SIGTERM), 0);
    EXPECT_TRUE(signals.requested());
    EXPECT_TRUE(signals.requested());
}

TEST(StopSignals, KeepASingleDesignFromWritingFiles) {
    const TemporaryFolder folder;
    StopSignals signals;
    ASSERT_EQ(raise(SIGINT), 0);
    EXPECT_FALSE(solve_all(io::parse_case(test::small_case(), "gauge.toml"), signals).has_value());
    EXPECT_TRUE(write_files({folder.path()}, solver::Result{}, io::Provenance{}, signals).empty());
    EXPECT_TRUE(listing(folder.path()).empty());
}

}  // namespace
}  // namespace panelwright::app
