/// The command line as a whole: the program is run as a person would run it.
#include <gtest/gtest.h>
#include <sys/stat.h>

#include <nlohmann/json.hpp>

#include "io/case.hpp"
#include "io/result_file.hpp"
#include "tests/app/cases.hpp"
#include "tests/app/process.hpp"

namespace panelwright::test {
namespace {

using Json = nlohmann::json;

TEST(CommandLine, SaysItsVersion) {
    const TemporaryFolder folder;
    const Ended ended = panelwright({"--version"}, folder.path());
    EXPECT_EQ(ended.status, 0);
    EXPECT_EQ(ended.out.find("panelwright " PANELWRIGHT_VERSION " (commit "), 0U) << ended.out;
    EXPECT_TRUE(ended.out.ends_with(")\n")) << ended.out;
}

TEST(CommandLine, ExplainsItselfAndEveryCommand) {
    const TemporaryFolder folder;
    const Ended whole = panelwright({"--help"}, folder.path());
    EXPECT_EQ(whole.status, 0);
    for (const std::string command : {"run", "check", "keys"}) {
        EXPECT_NE(whole.out.find("\n  " + command), std::string::npos) << command;
        const Ended ended = panelwright({command, "--help"}, folder.path());
        EXPECT_EQ(ended.status, 0) << command;
        EXPECT_NE(ended.out.find("Examples:\n  panelwright " + command), std::string::npos) << ended.out;
        EXPECT_EQ(ended.err, "");
    }
}

TEST(CommandLine, RefusesWrongUseWithStatusTwoAndWritesNothing) {
    const TemporaryFolder folder;
    const std::string file = folder.write("gauge.toml", small_case());
    const std::vector<std::vector<std::string>> wrong = {{},
                                                         {"solve"},
                                                         {"run"},
                                                         {"run", file, "--speed"},
                                                         {"run", file, "--threads", "0"},
                                                         {"run", file, "--threads", "two"},
                                                         {"run", file, "again"},
                                                         {"run", "missing.toml"},
                                                         {"check", "missing.toml"},
                                                         {"run", "."}};
    for (const auto& arguments : wrong) {
        const Ended ended = panelwright(arguments, folder.path());
        EXPECT_EQ(ended.status, 2) << Json(arguments).dump();
        EXPECT_NE(ended.err, "") << Json(arguments).dump();
        EXPECT_EQ(ended.out, "") << Json(arguments).dump();
    }
    EXPECT_EQ(listing(folder.path()), std::vector<std::string>{"gauge.toml"});
}

TEST(CommandLine, NamesAWordThatIsNoCommand) {
    const TemporaryFolder folder;
    const Ended ended = panelwright({"foo"}, folder.path());
    EXPECT_EQ(ended.status, 2);
    EXPECT_NE(ended.err.find("unknown command \"foo\"; commands: run, check, keys"), std::string::npos)
        << ended.err;
}

TEST(CommandLine, RefusesAPipeInsteadOfWaitingForIt) {
    const TemporaryFolder folder;
    ASSERT_EQ(mkfifo((folder / "pipe.toml").c_str(), 0600), 0);
    const Ended ended = panelwright({"check", "pipe.toml"}, folder.path());
    EXPECT_EQ(ended.status, 2);
    EXPECT_NE(ended.err.find("pipe.toml:1:1: this is no regular file"), std::string::npos) << ended.err;
}

TEST(CommandLine, ListsAllProblemsOfACaseAndWritesNothing) {
    const TemporaryFolder folder;
    folder.write("gauge.toml",
                 with(with(small_case(), "width = \"165 mm\"", "width = 165"), "height", "hieght"));
    for (const char* command : {"run", "check"}) {
        const Ended ended = panelwright({command, "gauge.toml"}, folder.path());
        EXPECT_EQ(ended.status, 2);
        EXPECT_NE(ended.err.find("gauge.toml:10:"), std::string::npos) << ended.err;
        EXPECT_NE(ended.err.find("gauge.toml:13:"), std::string::npos) << ended.err;
    }
    EXPECT_EQ(listing(folder.path()), std::vector<std::string>{"gauge.toml"});
}

TEST(CommandLine, ListsEveryKeyOfTheTable) {
    const TemporaryFolder folder;
    const Ended table = panelwright({"keys"}, folder.path());
    const Ended json = panelwright({"keys", "--json"}, folder.path());
    ASSERT_EQ(table.status, 0);
    ASSERT_EQ(json.status, 0);
    const Json keys = Json::parse(json.out);
    ASSERT_EQ(keys.size(), io::key_table().size());
    ASSERT_GT(keys.size(), 20U);
    for (std::size_t n = 0; n < keys.size(); ++n) {
        const io::KeyEntry& key = io::key_table()[n];
        EXPECT_EQ(keys[n]["name"], key.name);
        EXPECT_EQ(keys[n]["default"], key.default_value);
        EXPECT_NE(("\n" + table.out).find("\n" + key.name + " "), std::string::npos) << key.name;
        EXPECT_NE(table.out.find(key.description), std::string::npos) << key.name;
    }
}

TEST(CommandLine, SaysWhenStandardOutputIsFull) {
    const TemporaryFolder folder;
    const Ended ended = Process({"/bin/sh", "-c", program() + " keys > /dev/full"}, folder.path()).wait();
    EXPECT_EQ(ended.status, 1);
    EXPECT_NE(ended.err.find("standard output"), std::string::npos) << ended.err;
}

TEST(CommandLine, KeepsMessagesOutOfFilesWhenStandardErrorIsClosed) {
    const TemporaryFolder folder;
    folder.write("gauge.toml", small_case());
    const Ended ended =
        Process({"/bin/sh", "-c", program() + " run gauge.toml --out r 2>&-"}, folder.path()).wait();
    EXPECT_EQ(ended.status, 0);
    EXPECT_EQ(content(folder / "r/case.toml"), io::read_case(folder / "gauge.toml").resolved);
    EXPECT_NO_THROW(io::read_result(folder / "r/result.h5"));
}

TEST(Check, SaysWhatWouldRunAndSolvesNothing) {
    const TemporaryFolder folder;
    folder.write("gauge.toml", small_case());
    const Ended table = panelwright({"check", "gauge.toml"}, folder.path());
    const Ended json = panelwright({"check", "gauge.toml", "--json"}, folder.path());
    ASSERT_EQ(table.status, 0) << table.err;
    ASSERT_EQ(json.status, 0) << json.err;
    const Json checked = Json::parse(json.out);
    EXPECT_EQ(checked["title"], "Gauge under test");
    EXPECT_EQ(checked["designs"], 1);
    EXPECT_EQ(checked["methods"][0]["name"], "aperture");
    EXPECT_GT(checked["methods"][0]["triangles"].get<int>(), 10);
    EXPECT_GT(checked["memory_bytes"].get<double>(), 1e6);
    EXPECT_GT(checked["seconds"].get<double>(), 0.0);
    // 15 mm at 870 MHz, the centre of the band: 0.015 * 870e6 / 299792458 wavelengths.
    EXPECT_NEAR(checked["electrical"]["height_wavelengths"].get<double>(), 0.043530, 1e-6);
    EXPECT_NE(table.out.find("Gauge under test"), std::string::npos);
    EXPECT_NE(table.out.find("147 mm x 165 mm"), std::string::npos) << table.out;
    EXPECT_EQ(listing(folder.path()), std::vector<std::string>{"gauge.toml"});
}

TEST(Check, CountsThePostsAmongTheUnknownsAndInTheTime) {
    const TemporaryFolder folder;
    folder.write("gauge.toml", small_case());
    folder.write("posts.toml", small_case() + many_posts(20));
    const Ended bare = panelwright({"check", "gauge.toml", "--json"}, folder.path());
    const Ended full = panelwright({"check", "posts.toml", "--json"}, folder.path());
    const Ended table = panelwright({"check", "posts.toml"}, folder.path());
    ASSERT_EQ(bare.status, 0) << bare.err;
    ASSERT_EQ(full.status, 0) << full.err;
    EXPECT_EQ(Json::parse(bare.out)["methods"][0]["unknowns"], 1);
    EXPECT_EQ(Json::parse(full.out)["methods"][0]["unknowns"], 21);
    EXPECT_NE(table.out.find(", 21 unknowns\n"), std::string::npos) << table.out;
    // 441 pairs of some 590 terms at 67 frequencies take seconds, the rest a tenth of one.
    EXPECT_GT(Json::parse(full.out)["seconds"].get<double>(),
              Json::parse(bare.out)["seconds"].get<double>() + 1.0);
}

TEST(Check, CountsTheDesignsAndNamesThoseThatBreakARule) {
    const TemporaryFolder folder;
    folder.write("study.toml", study_with_a_bad_design());
    const Ended json = panelwright({"check", "study.toml", "--json"}, folder.path());
    ASSERT_EQ(json.status, 0) << json.err;
    const Json checked = Json::parse(json.out);
    EXPECT_EQ(checked["designs"], 4);
    ASSERT_EQ(checked["bad_designs"].size(), 1U);
    EXPECT_EQ(checked["bad_designs"][0]["design"], 3);
    EXPECT_NE(checked["bad_designs"][0]["reason"].get<std::string>().find("feed.x"), std::string::npos);
}

}  // namespace
}  // namespace panelwright::test
