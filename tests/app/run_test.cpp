/// `panelwright run` on one design: its files, and how it treats a folder that is not empty.
#include <gtest/gtest.h>

#include <algorithm>
#include <chrono>
#include <nlohmann/json.hpp>
#include <thread>

#include "io/case.hpp"
#include "io/pattern_csv.hpp"
#include "io/result_file.hpp"
#include "io/touchstone.hpp"
#include "solver/far_field.hpp"
#include "tests/app/cases.hpp"
#include "tests/app/process.hpp"
#include "tests/near.hpp"
#include "viz/vtk_files.hpp"

namespace panelwright::test {
namespace {

using Json = nlohmann::json;

std::vector<std::string> expected_files() {
    std::vector<std::string> files = {"case.toml", "pattern_aperture.csv", "result.h5", "s11_aperture.s1p"};
    if (viz::vtk_available()) files.insert(files.end(), {"currents_aperture.vtp", "pattern_aperture.vtp"});
    std::sort(files.begin(), files.end());
    return files;
}

TEST(Run, WritesEveryFileOfAShippedCase) {
    const TemporaryFolder folder;
    const std::string file = PANELWRIGHT_SOURCE_DIR "/cases/gauge-869.toml";
    const Ended ended = panelwright({"run", file, "--json"}, folder.path());
    ASSERT_EQ(ended.status, 0) << ended.err;
    const auto results = folder / "gauge-869-results";
    EXPECT_EQ(listing(results), expected_files());

    const io::StoredResult stored = io::read_result(results / "result.h5");
    const io::Case problem = io::read_case(file);
    EXPECT_EQ(stored.result.case_text, content(file));
    EXPECT_EQ(stored.result.case_resolved, problem.resolved);
    EXPECT_EQ(stored.result.case_resolved, content(results / "case.toml"));
    EXPECT_EQ(stored.provenance.created_utc.size(), std::string("2026-01-31T12:00:00Z").size());
    ASSERT_EQ(stored.result.methods.size(), 1U);

    // The screen, the HDF5 file and the other files tell the same.
    const Json shown = Json::parse(ended.out);
    const solver::MethodResult& method = stored.result.methods.front();
    EXPECT_EQ(shown["title"], problem.title);
    EXPECT_EQ(shown["methods"]["aperture"]["patterns"][0]["peak_gain_dbi"], method.figures[0].peak_gain_dbi);
    EXPECT_EQ(shown["methods"]["aperture"]["band"]["resonance_hz"], method.band.resonance_hz);
    const io::OnePort port = io::read_touchstone(results / "s11_aperture.s1p");
    ASSERT_EQ(port.frequency, method.solution.port.frequency);
    EXPECT_TRUE(near(port.s11[3], solver::reflection(method.solution.port.impedance[3], 50.0), 1e-9));
    const auto patterns = io::read_pattern_csv(results / "pattern_aperture.csv");
    ASSERT_EQ(patterns.size(), method.solution.patterns.size());
    EXPECT_EQ(patterns[0].e_theta.rows(), method.solution.patterns[0].e_theta.rows());
}

TEST(Run, ShowsTheFiguresInWordsWithUnits) {
    const TemporaryFolder folder;
    folder.write("gauge.toml", small_case());
    const Ended ended = panelwright({"run", "gauge.toml"}, folder.path());
    ASSERT_EQ(ended.status, 0) << ended.err;
    for (const auto& entry : solver::figure_table()) {
        EXPECT_NE(ended.out.find("\n  " + std::string(entry.label) + " "), std::string::npos) << entry.label;
    }
    for (const auto& entry : solver::band_figure_table()) {
        EXPECT_NE(ended.out.find("\n  " + std::string(entry.label) + " "), std::string::npos) << entry.label;
    }
    EXPECT_NE(ended.out.find(" dBi\n"), std::string::npos);
    EXPECT_NE(ended.out.find("gauge-results"), std::string::npos);
}

TEST(Run, ListsSeveralPatternFrequenciesInACollection) {
    const TemporaryFolder folder;
    folder.write("gauge.toml",
                 with(small_case(), "points = 7", "points = 7\npattern_at = [\"860 MHz\", \"869.5 MHz\"]"));
    const Ended ended = panelwright({"run", "gauge.toml", "--out", "r"}, folder.path());
    ASSERT_EQ(ended.status, 0) << ended.err;
    for (const std::string stem : {"currents_aperture", "pattern_aperture"}) {
        if (!viz::vtk_available()) {
            EXPECT_FALSE(std::filesystem::exists(folder / ("r/" + stem + ".pvd")));
            EXPECT_NE(ended.err.find("without VTK"), std::string::npos);
            continue;
        }
        EXPECT_FALSE(content(folder / ("r/" + stem + ".vtp")).empty());
        EXPECT_FALSE(content(folder / ("r/" + stem + "_869.5MHz.vtp")).empty());
        const std::string collection = content(folder / ("r/" + stem + ".pvd"));
        EXPECT_NE(collection.find("timestep=\"860000000\" group=\"\" part=\"0\" file=\"" + stem + ".vtp\""),
                  std::string::npos);
        EXPECT_NE(collection.find("file=\"" + stem + "_869.5MHz.vtp\""), std::string::npos);
    }
}

TEST(Run, ReplacesTheResultsOfTheSameCaseAndKeepsOtherFiles) {
    const TemporaryFolder folder;
    folder.write("gauge.toml", small_case());
    ASSERT_EQ(panelwright({"run", "gauge.toml", "--out", "r"}, folder.path()).status, 0);
    folder.write("r/notes.txt", "mine");
    folder.write("r/result.h5", "damaged");
    // A remark in the file does not make another case.
    folder.write("gauge.toml", "# measured in spring\n" + small_case());
    ASSERT_EQ(panelwright({"run", "gauge.toml", "--out", "r"}, folder.path()).status, 0);
    EXPECT_EQ(content(folder / "r/notes.txt"), "mine");
    EXPECT_NO_THROW(io::read_result(folder / "r/result.h5"));
    // The recorded case is a case file itself, and the same one.
    EXPECT_EQ(panelwright({"run", "r/case.toml", "--out", "r"}, folder.path()).status, 0);
}

TEST(Run, RefusesAFolderWithAnotherCaseUntilToldToStartOver) {
    const TemporaryFolder folder;
    folder.write("gauge.toml", small_case());
    folder.write("other.toml", with(with(small_case(), "147 mm", "146 mm"), "y = \"0 mm\"", "y = \"1 mm\""));
    ASSERT_EQ(panelwright({"run", "gauge.toml", "--out", "r"}, folder.path()).status, 0);
    folder.write("r/notes.txt", "mine");
    folder.write("r/.result.h5.999999.panelwright-part", "left behind by a crash");
    const std::string before = content(folder / "r/result.h5");

    const Ended refused = panelwright({"run", "other.toml", "--out", "r"}, folder.path());
    EXPECT_EQ(refused.status, 2);
    EXPECT_NE(refused.err.find("patch.length: \"147 mm\" there, \"146 mm\" now"), std::string::npos)
        << refused.err;
    EXPECT_NE(refused.err.find("feed.y"), std::string::npos) << refused.err;
    EXPECT_EQ(refused.err.find("patch.width"), std::string::npos) << refused.err;
    EXPECT_NE(refused.err.find("--fresh"), std::string::npos) << refused.err;
    EXPECT_EQ(content(folder / "r/result.h5"), before);

    ASSERT_EQ(panelwright({"run", "other.toml", "--out", "r", "--fresh"}, folder.path()).status, 0);
    EXPECT_NE(content(folder / "r/result.h5"), before);
    std::vector<std::string> files = expected_files();
    files.push_back("notes.txt");
    std::sort(files.begin(), files.end());
    EXPECT_EQ(listing(folder / "r"), files);
}

TEST(Run, RefusesResultsOfAnUnknownCase) {
    const TemporaryFolder folder;
    folder.write("gauge.toml", small_case());
    ASSERT_EQ(panelwright({"run", "gauge.toml", "--out", "r"}, folder.path()).status, 0);
    folder.write("r/case.toml", "title = \"cut o");
    EXPECT_EQ(panelwright({"run", "gauge.toml", "--out", "r"}, folder.path()).status, 2);
    std::filesystem::remove(folder / "r/case.toml");
    const Ended ended = panelwright({"run", "gauge.toml", "--out", "r"}, folder.path());
    EXPECT_EQ(ended.status, 2);
    EXPECT_NE(ended.err.find("case.toml"), std::string::npos) << ended.err;
}

TEST(Run, EndsAtOnceWhenStoppedWhileSolving) {
    using namespace std::chrono_literals;
    const TemporaryFolder folder;
    // Takes many seconds: 40 thin posts, and a fine band.
    folder.write("gauge.toml", with(small_case(), "points = 7", "points = 2001") + many_posts(40));
    Process process({program(), "run", "gauge.toml", "--out", "r"}, folder.path());
    std::this_thread::sleep_for(500ms);
    const auto start = std::chrono::steady_clock::now();
    process.signal(SIGTERM);
    const Ended stopped = process.wait();
    EXPECT_EQ(stopped.status, 4) << stopped.err;
    EXPECT_NE(stopped.err.find("gauge.toml: stopped; nothing was written\n"), std::string::npos)
        << stopped.err;
    EXPECT_LT(std::chrono::steady_clock::now() - start, 4s);  // solving takes at least ten times as long
    EXPECT_EQ(listing(folder.path()), std::vector<std::string>{"gauge.toml"});
}

TEST(Run, SaysWhyAFolderCannotBeWritten) {
    const TemporaryFolder folder;
    folder.write("gauge.toml", small_case());
    folder.write("file", "");
    for (const std::string out : {"file", "file/below", "/proc/no-such-folder"}) {
        const Ended ended = panelwright({"run", "gauge.toml", "--out", out}, folder.path());
        EXPECT_EQ(ended.status, 1) << out;
        EXPECT_NE(ended.err.find(out), std::string::npos) << ended.err;
        EXPECT_EQ(ended.err.find("solving"), std::string::npos) << "noticed too late: " << ended.err;
    }
}

TEST(Run, LeavesNoPartOfAFileWhenTheDiskIsFull) {
    const TemporaryFolder folder;
    folder.write("gauge.toml", small_case());
    // Files of at most 16 blocks of 512 bytes stand for a full disk; the signal that goes with them is
    // switched off.
    const std::string command = "trap '' XFSZ; ulimit -f 16; exec " + program() + " run gauge.toml --out r";
    const Ended ended = Process({"/bin/sh", "-c", command}, folder.path()).wait();
    EXPECT_EQ(ended.status, 1);
    EXPECT_NE(ended.err.find("r/"), std::string::npos) << ended.err;
    EXPECT_FALSE(std::filesystem::exists(folder / "r/result.h5"));
    for (const std::string& name : listing(folder / "r")) {
        EXPECT_EQ(name.find("panelwright-part"), std::string::npos) << name;
        EXPECT_NE(name.find("pattern_aperture.csv"), 0U) << name;
    }
}

}  // namespace
}  // namespace panelwright::test
