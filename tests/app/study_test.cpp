/// `panelwright run` on a study: failed designs, interruption and resumption.
#include <gtest/gtest.h>

#include <algorithm>
#include <chrono>
#include <map>
#include <nlohmann/json.hpp>
#include <sstream>
#include <thread>

#include "io/result_file.hpp"
#include "tests/app/cases.hpp"
#include "tests/app/process.hpp"

namespace panelwright::test {
namespace {

using Json = nlohmann::json;

/// Cells by column name, one map a row. Good for tables without quoted cells.
std::vector<std::map<std::string, std::string>> rows(const std::string& csv) {
    const auto cells = [](const std::string& line) {
        std::vector<std::string> found;
        std::istringstream stream(line + ",");
        for (std::string cell; std::getline(stream, cell, ',');) found.push_back(cell);
        return found;
    };
    std::istringstream stream(csv);
    std::string line;
    std::getline(stream, line);
    const std::vector<std::string> names = cells(line);
    std::vector<std::map<std::string, std::string>> all;
    while (std::getline(stream, line)) {
        const std::vector<std::string> values = cells(line);
        all.emplace_back();
        for (std::size_t n = 0; n < std::min(names.size(), values.size()); ++n)
            all.back()[names[n]] = values[n];
    }
    return all;
}

bool has_temporaries(const std::filesystem::path& folder) {
    const auto names = listing(folder);
    return std::any_of(names.begin(), names.end(), [](const std::string& name) {
        return name.find("panelwright-part") != std::string::npos;
    });
}

TEST(Study, RecordsADesignThatFailsAndGoesOn) {
    const TemporaryFolder folder;
    folder.write("study.toml", study_with_a_bad_design());
    const Ended ended = panelwright({"run", "study.toml", "--json"}, folder.path());
    EXPECT_EQ(ended.status, 3) << ended.err;
    const auto results = folder / "study-results";
    EXPECT_EQ(listing(results),
              (std::vector<std::string>{"case.toml", "designs", "designs.csv", "designs/0001.h5",
                                        "designs/0002.h5", "designs/0004.h5"}));
    const Json shown = Json::parse(ended.out);
    EXPECT_EQ(shown["done"], 3);
    EXPECT_EQ(shown["failed"], 1);
    EXPECT_EQ(shown["failures"][0]["design"], 3);

    const std::string csv = content(results / "designs.csv");
    EXPECT_EQ(std::count(csv.begin(), csv.end(), '\n'), 5);
    const auto table = rows(csv);
    EXPECT_EQ(table[0].at("status"), "done");
    EXPECT_EQ(table[2].at("design"), "3");
    EXPECT_EQ(table[2].at("status"), "failed");
    EXPECT_NE(csv.find("feed.x"), std::string::npos);
    EXPECT_EQ(table[3].at("feed.x_mm"), "-32");  // written as -3.2 cm in the case
    EXPECT_EQ(table[0].at("pattern_frequency_hz"), "870000000");
    const io::StoredResult stored = io::read_result(results / "designs/0004.h5");
    EXPECT_EQ(std::stod(table[3].at("aperture.peak_gain_dbi")),
              stored.result.methods[0].figures[0].peak_gain_dbi);
    EXPECT_EQ(std::stod(table[3].at("aperture.best_match_hz")), stored.result.methods[0].band.best_match_hz);

    const auto& health = stored.result.methods[0].solution.health;
    const auto balance = std::find_if(health.begin(), health.end(),
                                      [](const auto& entry) { return entry.name == "power_balance"; });
    ASSERT_NE(balance, health.end());
    EXPECT_EQ(std::stod(table[3].at("aperture.power_balance")), balance->values.front());
    const Json& range = shown["methods"]["aperture"]["power_balance"];
    EXPECT_LE(range["least"].get<double>(), balance->values.front());
    EXPECT_GE(range["greatest"].get<double>(), balance->values.front());
}

TEST(Study, KeepsDesignsThatAreDoneAndRepairsDamagedOnes) {
    const TemporaryFolder folder;
    folder.write("study.toml", small_study(4));
    ASSERT_EQ(panelwright({"run", "study.toml", "--out", "r"}, folder.path()).status, 0);
    const std::string table = content(folder / "r/designs.csv");
    const std::string first = content(folder / "r/designs/0001.h5");
    const auto written = std::filesystem::last_write_time(folder / "r/designs/0001.h5");
    folder.write("r/designs/0002.h5", first.substr(0, first.size() / 2));  // cut off
    folder.write("r/designs/0003.h5", first);                              // another design's
    std::filesystem::remove(folder / "r/designs/0004.h5");

    const Ended again = panelwright({"run", "study.toml", "--out", "r"}, folder.path());
    EXPECT_EQ(again.status, 0) << again.err;
    EXPECT_EQ(content(folder / "r/designs.csv"), table);
    EXPECT_EQ(std::filesystem::last_write_time(folder / "r/designs/0001.h5"), written);
    EXPECT_EQ(io::read_result(folder / "r/designs/0003.h5").result.panel.reflector.length, 0.204);
    EXPECT_NO_THROW(io::read_result(folder / "r/designs/0002.h5"));
    EXPECT_NO_THROW(io::read_result(folder / "r/designs/0004.h5"));
}

TEST(Study, RefusesAnotherGridAndNamesTheKeys) {
    const TemporaryFolder folder;
    folder.write("study.toml", small_study(2));
    ASSERT_EQ(panelwright({"run", "study.toml", "--out", "r"}, folder.path()).status, 0);
    folder.write("study.toml", small_study(3));
    const Ended refused = panelwright({"run", "study.toml", "--out", "r"}, folder.path());
    EXPECT_EQ(refused.status, 2);
    EXPECT_NE(refused.err.find("vary[1]."), std::string::npos) << refused.err;
    ASSERT_EQ(panelwright({"run", "study.toml", "--out", "r", "--fresh"}, folder.path()).status, 0);
    EXPECT_TRUE(std::filesystem::exists(folder / "r/designs/0003.h5"));
}

TEST(Study, DoesNotDependOnTheNumberOfThreads) {
    const TemporaryFolder folder;
    folder.write("study.toml", small_study(3));
    ASSERT_EQ(panelwright({"run", "study.toml", "--out", "one", "--threads", "1"}, folder.path()).status, 0);
    ASSERT_EQ(panelwright({"run", "study.toml", "--out", "three", "--threads", "3"}, folder.path()).status,
              0);
    EXPECT_EQ(content(folder / "one/designs.csv"), content(folder / "three/designs.csv"));
}

TEST(Study, StopsBetweenDesignsAndGoesOnLater) {
    using namespace std::chrono_literals;
    constexpr int designs = 20;
    const TemporaryFolder folder;
    folder.write("study.toml", small_study(designs));
    const std::vector<std::string> command = {program(), "run", "study.toml", "--out", "r", "--threads", "1"};
    Process process(command, folder.path());
    for (int look = 0; look < 2000 && !std::filesystem::exists(folder / "r/designs/0002.h5"); ++look) {
        std::this_thread::sleep_for(1ms);
    }
    process.signal(SIGINT);
    const Ended stopped = process.wait();
    ASSERT_EQ(stopped.status, 4) << stopped.err;
    EXPECT_FALSE(has_temporaries(folder / "r"));
    EXPECT_NE(content(folder / "r/designs.csv").find("not reached"), std::string::npos);
    const auto written = std::filesystem::last_write_time(folder / "r/designs/0001.h5");

    const Ended resumed = panelwright({"run", "study.toml", "--out", "r"}, folder.path());
    EXPECT_EQ(resumed.status, 0) << resumed.err;
    EXPECT_EQ(std::filesystem::last_write_time(folder / "r/designs/0001.h5"), written);
    EXPECT_EQ(content(folder / "r/designs.csv").find("not reached"), std::string::npos);

    // A resumed study gives the same table, to the last digit, as one that was never stopped.
    ASSERT_EQ(panelwright({"run", "study.toml", "--out", "whole"}, folder.path()).status, 0);
    EXPECT_EQ(content(folder / "r/designs.csv"), content(folder / "whole/designs.csv"));
}

TEST(Study, EndsAtOnceAtASecondSignal) {
    using namespace std::chrono_literals;
    const TemporaryFolder folder;
    // Every design takes many seconds: 40 thin posts, and a fine band.
    folder.write("study.toml", with(small_study(4), "points = 7", "points = 2001") + many_posts(40));
    Process process({program(), "run", "study.toml", "--out", "r", "--threads", "1"}, folder.path());
    for (int look = 0; look < 5000 && !std::filesystem::exists(folder / "r/designs.csv"); ++look)
        std::this_thread::sleep_for(1ms);
    const auto start = std::chrono::steady_clock::now();
    process.signal(SIGINT);
    std::this_thread::sleep_for(200ms);  // two signals in one moment count as one
    process.signal(SIGINT);
    const Ended stopped = process.wait();
    EXPECT_EQ(stopped.status, 4) << stopped.err;
    EXPECT_NE(stopped.err.find("goes on from here"), std::string::npos) << stopped.err;
    // A design takes at least ten times as long.
    EXPECT_LT(std::chrono::steady_clock::now() - start, 4s);
    EXPECT_FALSE(has_temporaries(folder / "r"));
}

TEST(Study, StopsAtAFaultOfTheWholeRun) {
    const TemporaryFolder folder;
    folder.write("study.toml", small_study(40));
    const std::string command = "trap '' XFSZ; ulimit -f 64; exec " + program() + " run study.toml --out r";
    const Ended ended = Process({"/bin/sh", "-c", command}, folder.path()).wait();
    EXPECT_EQ(ended.status, 1);
    EXPECT_NE(ended.err.find("panelwright run: r/designs/000"), std::string::npos) << ended.err;
    EXPECT_NE(ended.err.find(".h5: cannot write: File too large"), std::string::npos) << ended.err;
    EXPECT_FALSE(has_temporaries(folder / "r"));
}

}  // namespace
}  // namespace panelwright::test
