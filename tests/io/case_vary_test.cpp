// Variations: the grid, the values, each design, and what is no variation.
#include <gtest/gtest.h>

#include <ostream>
#include <stdexcept>
#include <string>
#include <utility>
#include <vector>

#include "io/case.hpp"
#include "tests/io/case_text.hpp"

namespace panelwright::io {
namespace {

using test::edited;
using test::error_of;
using test::sound_case;

std::string study(const std::string& blocks) {
    return std::string(sound_case) + blocks;
}

const std::string sides =
    "[[vary]]\nkeys = [\"reflector.length\", \"reflector.width\"]\nfrom = \"20 cm\"\nto = \"265 mm\"\nstep = "
    "\"0.02 m\"\n";
const std::string boards = "[[vary]]\nkeys = [\"spacer.permittivity\"]\nvalues = [1, 1.05]\n";

TEST(Vary, MakesAFullGridWithTheLastBlockFastest) {
    const Case base = parse_case(study(sides + boards), "study.toml");
    ASSERT_EQ(base.variations.size(), 2U);
    // In the unit of `from`; the last step ends below `to`.
    EXPECT_EQ(base.variations[0].values, (std::vector<std::string>{"20 cm", "22 cm", "24 cm", "26 cm"}));
    EXPECT_EQ(base.variations[1].values, (std::vector<std::string>{"1.0", "1.05"}));
    ASSERT_EQ(design_count(base), 8U);
    using Values = std::vector<std::pair<std::string, std::string>>;
    EXPECT_EQ(design_values(base, 0), (Values{{"reflector.length", "20 cm"},
                                              {"reflector.width", "20 cm"},
                                              {"spacer.permittivity", "1.0"}}));
    EXPECT_EQ(design_values(base, 3), (Values{{"reflector.length", "22 cm"},
                                              {"reflector.width", "22 cm"},
                                              {"spacer.permittivity", "1.05"}}));
    EXPECT_THROW(design_values(base, 8), std::invalid_argument);
    EXPECT_THROW(design(base, 8), std::invalid_argument);
}

TEST(Vary, ADesignIsTheCaseWithItsValuesTypedIn) {
    const Case base = parse_case(study(sides + boards), "study.toml");
    const Case third = design(base, 3);
    std::string typed = edited(sound_case, "length = \"230 mm\"\nwidth = \"250 mm\"",
                               "length = \"22 cm\"\nwidth = \"22 cm\"");
    typed = edited(typed, "height = \"14 mm\"", "height = \"14 mm\"\npermittivity = 1.05");
    const Case expected = parse_case(typed, "typed.toml");
    EXPECT_EQ(third.panel, expected.panel);
    EXPECT_EQ(third.resolved, expected.resolved);
    EXPECT_EQ(third.text, base.text);
    EXPECT_EQ(third.file, base.file);
    EXPECT_TRUE(third.variations.empty());
    EXPECT_EQ(design_count(third), 1U);
    EXPECT_EQ(design(third, 0).panel, third.panel);
    // The base keeps its own values.
    EXPECT_EQ(base.panel.reflector.length, 0.230);
}

TEST(Vary, WithoutBlocksTheOnlyDesignIsTheCase) {
    const Case base = parse_case(sound_case, "single.toml");
    EXPECT_EQ(design_count(base), 1U);
    EXPECT_EQ(design(base, 0).resolved, base.resolved);
    EXPECT_TRUE(design_values(base, 0).empty());
    EXPECT_THROW(design(base, 1), std::invalid_argument);
}

TEST(Vary, ResolvedReadsBackToTheSameGrid) {
    const Case base = parse_case(study(sides + boards), "study.toml");
    EXPECT_NE(base.resolved.find("from = \"20 cm\"\nto = \"265 mm\"\nstep = \"0.02 m\"\n"),
              std::string::npos);
    const Case again = parse_case(base.resolved, "again.toml");
    EXPECT_EQ(again.resolved, base.resolved);
    EXPECT_EQ(again.variations[0].values, base.variations[0].values);
    EXPECT_EQ(again.variations[1].values, base.variations[1].values);
}

TEST(Vary, StepsDownAndInDecimals) {
    const Case down = parse_case(
        study(
            "[[vary]]\nkeys = [\"spacer.height\"]\nfrom = \"14.3 mm\"\nto = \"14 mm\"\nstep = \"-0.1 mm\"\n"),
        "a");
    EXPECT_EQ(down.variations[0].values,
              (std::vector<std::string>{"14.3 mm", "14.2 mm", "14.1 mm", "14 mm"}));
    const Case bare = parse_case(
        study("[[vary]]\nkeys = [\"spacer.permittivity\"]\nfrom = 1.0\nto = 1.3\nstep = 0.1\n"), "a");
    EXPECT_EQ(bare.variations[0].values, (std::vector<std::string>{"1.0", "1.1", "1.2", "1.3"}));
    EXPECT_EQ(design(bare, 3).panel.spacer.permittivity, 1.3);
    const Case single = parse_case(
        study("[[vary]]\nkeys = [\"spacer.height\"]\nfrom = \"14 mm\"\nto = \"14 mm\"\nstep = \"1 mm\"\n"),
        "a");
    EXPECT_EQ(design_count(single), 1U);
}

TEST(Vary, ReachesPostsByTheirNumberAndKeysLeftToTheirDefault) {
    const std::string posts =
        "[[post]]\nx = \"0 mm\"\ny = \"0 mm\"\ndiameter = \"3 mm\"\n[[post]]\nx = \"20 mm\"\ny = \"0 mm\"\n"
        "diameter = \"3 mm\"\n";
    const Case base = parse_case(
        study(posts + "[[vary]]\nkeys = [\"post[2].x\", \"feed.y\"]\nvalues = [\"30 mm\", \"3.5 cm\"]\n"),
        "a");
    const Case second = design(base, 1);
    EXPECT_EQ(second.panel.posts[0].x, 0.0);
    EXPECT_EQ(second.panel.posts[1].x, 0.035);
    EXPECT_EQ(std::get<mesh::Probe>(second.panel.feed).y, 0.035);
}

TEST(Vary, VariesTheBandWithWhatFollowsFromIt) {
    const Case base = parse_case(study("[[vary]]\nkeys = [\"band.to\"]\nvalues = [\"870 MHz\"]\n"), "a");
    EXPECT_EQ(design(base, 0).task.pattern_at, (std::vector<double>{860e6}));
}

TEST(Vary, ABadDesignFailsAloneAndPointsAtItsValue) {
    const Case base = parse_case(
        study("[[vary]]\nkeys = [\"feed.x\"]\nvalues = [\"-40 mm\", \"-120 mm\", \"6 m\"]\n"), "study.toml");
    EXPECT_NO_THROW(design(base, 0));
    const auto problem = [&](std::size_t index) {
        try {
            design(base, index);
        } catch (const CaseError& error) {
            EXPECT_EQ(error.problems().size(), 1U);
            return std::string(error.what());
        }
        return std::string("was made");
    };
    const std::string outside = problem(1);
    EXPECT_TRUE(outside.starts_with("study.toml:25:21: feed.x is -120 mm")) << outside;
    EXPECT_NE(outside.find("patch.length = \"146 mm\" at 9:10"), std::string::npos) << outside;
    EXPECT_TRUE(problem(2).starts_with("study.toml:25:32: feed.x: \"6 m\" is too large")) << problem(2);
}

struct BadBlock {
    std::string name;
    std::string block;  // its first line is line 23
    std::size_t line, column;
    std::string message;
};

void PrintTo(const BadBlock& block, std::ostream* stream) {
    *stream << block.name;
}

class VaryBlockSlip : public testing::TestWithParam<BadBlock> {};

TEST_P(VaryBlockSlip, IsReportedAtItsPlace) {
    const auto error = error_of(study(GetParam().block));
    ASSERT_TRUE(error.has_value());
    ASSERT_EQ(error->problems().size(), 1U) << error->what();
    const CaseProblem& problem = error->problems().front();
    EXPECT_EQ(problem.line, GetParam().line) << error->what();
    EXPECT_EQ(problem.column, GetParam().column) << error->what();
    EXPECT_NE(problem.message.find(GetParam().message), std::string::npos) << error->what();
}

const std::string heights = "[[vary]]\nkeys = [\"spacer.height\"]\n";

const std::vector<BadBlock> bad_blocks = {
    {"no_keys", "[[vary]]\nvalues = [\"1 mm\"]\n", 23, 1, "vary[1].keys is missing"},
    {"empty_keys", "[[vary]]\nkeys = []\nvalues = [\"1 mm\"]\n", 24, 8, "an empty list"},
    {"keys_no_list", "[[vary]]\nkeys = \"spacer.height\"\nvalues = [\"1 mm\"]\n", 24, 8, "write keys = ["},
    {"key_no_text", "[[vary]]\nkeys = [1]\nvalues = [\"1 mm\"]\n", 24, 9, "the number 1"},
    {"unknown_key", "[[vary]]\nkeys = [\"spacer.hight\"]\nvalues = [\"1 mm\"]\n", 24, 9, "\"spacer.height\""},
    {"key_without_table", "[[vary]]\nkeys = [\"height\"]\nvalues = [\"1 mm\"]\n", 24, 9, "is no key"},
    {"not_numeric", "[[vary]]\nkeys = [\"solve.accuracy\"]\nvalues = [\"fine\"]\n", 24, 9, "holds no number"},
    {"itself", "[[vary]]\nkeys = [\"vary.step\"]\nvalues = [\"1 mm\"]\n", 24, 9, "holds no number"},
    {"no_such_post", "[[vary]]\nkeys = [\"post[1].x\"]\nvalues = [\"1 mm\"]\n", 24, 9, "none of the 0 posts"},
    {"post_without_number", "[[vary]]\nkeys = [\"post.x\"]\nvalues = [\"1 mm\"]\n", 24, 9, "post[1].x"},
    {"number_on_a_single_table", "[[vary]]\nkeys = [\"patch[1].length\"]\nvalues = [\"1 mm\"]\n", 24, 9,
     "[patch] stands once"},
    {"number_no_number", "[[vary]]\nkeys = [\"post[x].x\"]\nvalues = [\"1 mm\"]\n", 24, 9, "is no key"},
    {"key_of_another_feed", "[[vary]]\nkeys = [\"feed.reach\"]\nvalues = [\"1 mm\"]\n", 24, 9,
     "feed.kind = \"probe\" at 16:8"},
    {"different_types",
     "[[vary]]\nkeys = [\"spacer.height\", \"spacer.permittivity\"]\nvalues = [\"1 mm\"]\n", 24, 26,
     "\"spacer.height\" at 24:9"},
    {"twice_in_a_block", "[[vary]]\nkeys = [\"spacer.height\", \"spacer.height\"]\nvalues = [\"1 mm\"]\n", 24,
     26, "varied twice, first at 24:9"},
    {"twice_in_two_blocks", heights + "values = [\"14 mm\"]\n" + heights + "values = [\"15 mm\"]\n", 27, 9,
     "varied twice, first at 24:9"},
    {"no_values", heights, 23, 1, "vary[1] has no values"},
    {"unknown_name", heights + "values = [\"14 mm\"]\nvalue = 1\n", 26, 1, "nearest known key is \"values\""},
    {"values_and_range", heights + "from = \"1 mm\"\nvalues = [\"14 mm\"]\n", 26, 1,
     "either the list or the range"},
    {"empty_values", heights + "values = []\n", 25, 10, "an empty list"},
    {"bare_value", heights + "values = [\"14 mm\", 15]\n", 25, 20, "write \"15 mm\""},
    {"wrong_unit", heights + "from = \"1 MHz\"\nto = \"2 mm\"\nstep = \"1 mm\"\n", 25, 8,
     "is a unit of frequency"},
    {"no_step", heights + "from = \"1 mm\"\nto = \"2 mm\"\n", 23, 1, "vary[1].step is missing"},
    {"zero_step", heights + "from = \"1 mm\"\nto = \"2 mm\"\nstep = \"0 mm\"\n", 27, 8, "not zero, positive"},
    {"step_leads_away", heights + "from = \"1 mm\"\nto = \"2 mm\"\nstep = \"-1 mm\"\n", 27, 8,
     "\"2 mm\" at 26:6"},
    {"too_many_steps", heights + "from = \"1 mm\"\nto = \"20 mm\"\nstep = \"1e-9 mm\"\n", 27, 8,
     "at most 1000000"},
    {"too_many_designs",
     heights + "from = \"1 mm\"\nto = \"20 mm\"\nstep = \"0.01 mm\"\n[[vary]]\nkeys = "
               "[\"patch.length\"]\nfrom = \"1 mm\"\nto = "
               "\"20 mm\"\nstep = \"0.01 mm\"\n",
     28, 1, "3613801 designs"},
    {"single_table", "[vary]\nkeys = [\"spacer.height\"]\nvalues = [\"14 mm\"]\n", 23, 2, "[[vary]]"},
};

INSTANTIATE_TEST_SUITE_P(All, VaryBlockSlip, testing::ValuesIn(bad_blocks),
                         [](const testing::TestParamInfo<BadBlock>& block) { return block.param.name; });

TEST(Vary, BoundsTheKeysOfABlock) {
    std::string names = "\"spacer.height\"";
    for (int i = 0; i < 64; ++i) names += ", \"spacer.height\"";
    const auto error = error_of(study("[[vary]]\nkeys = [" + names + "]\nvalues = [\"14 mm\"]\n"));
    ASSERT_TRUE(error.has_value());
    EXPECT_STREQ(error->what(), "spoilt.toml:24:8: vary[1].keys: found 65 keys; allowed: at most 64");
}

TEST(Vary, ConductivityNeedsACaseWithoutAMetalsName) {
    const std::string block = "[[vary]]\nkeys = [\"patch.conductivity\"]\nvalues = [\"1e7 S/m\"]\n";
    EXPECT_EQ(design(parse_case(study(block), "a"), 0).panel.patch.conductivity, 1e7);
    const std::string named =
        edited(study(block), "width = \"172 mm\"", "width = \"172 mm\"\nmetal = \"brass\"");
    const auto error = error_of(named);
    ASSERT_TRUE(error.has_value());
    EXPECT_NE(std::string(error->what()).find("patch.metal = \"brass\" at 11:9 exclude each other"),
              std::string::npos);
}

}  // namespace
}  // namespace panelwright::io
