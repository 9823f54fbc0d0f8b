#include "mesh/panel.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <functional>
#include <limits>
#include <set>
#include <utility>

#include "tests/mesh/panels.hpp"

namespace panelwright::mesh {
namespace {

using test::gauge_panel;
using test::hill_top_panel;

constexpr double infinite = std::numeric_limits<double>::infinity();
const double not_a_number = std::nan("");

Probe& pin(Panel& panel) {
    return std::get<Probe>(panel.feed);
}
Tab& tab(Panel& panel) {
    return std::get<Tab>(panel.feed);
}

/// A change of a good panel that breaks one rule, and the problem it must give.
struct Broken {
    std::string name;
    Panel good;
    std::function<void(Panel&)> spoil;
    std::string key;
    std::string other_key;
    std::vector<std::string> words;  ///< that the message must contain
};

std::ostream& operator<<(std::ostream& out, const Broken& broken) {
    return out << broken.name;
}

Panel with_two_posts() {
    return test::with_tubes(
        {.x = -0.038, .y = 0.0, .diameter = 0.002},
        {{.x = 0.0, .y = 0.0, .diameter = 0.003}, {.x = 0.03, .y = 0.02, .diameter = 0.003}});
}

std::vector<Broken> broken_fields() {
    const Panel probe = gauge_panel();
    const Panel strip = hill_top_panel();
    const Panel posts = with_two_posts();
    return {
        {"length_zero",
         probe,
         [](Panel& p) { p.patch.length = 0.0; },
         "patch.length",
         "",
         {"0 mm", "positive"}},
        {"length_nan",
         probe,
         [](Panel& p) { p.patch.length = not_a_number; },
         "patch.length",
         "",
         {"finite"}},
        {"width_negative", probe, [](Panel& p) { p.patch.width = -0.165; }, "patch.width", "", {"-165 mm"}},
        {"thickness_negative",
         probe,
         [](Panel& p) { p.patch.thickness = -1e-3; },
         "patch.thickness",
         "",
         {"-1 mm"}},
        {"thickness_infinite",
         probe,
         [](Panel& p) { p.patch.thickness = infinite; },
         "patch.thickness",
         "",
         {"finite"}},
        {"patch_conductivity",
         probe,
         [](Panel& p) { p.patch.conductivity = 0.0; },
         "patch.conductivity",
         "",
         {"S/m"}},
        {"height_zero", probe, [](Panel& p) { p.spacer.height = 0.0; }, "spacer.height", "", {"0 mm"}},
        {"permittivity_low",
         probe,
         [](Panel& p) { p.spacer.permittivity = 0.9; },
         "spacer.permittivity",
         "",
         {"0.9"}},
        {"permittivity_high",
         probe,
         [](Panel& p) { p.spacer.permittivity = 101.0; },
         "spacer.permittivity",
         "",
         {"100"}},
        {"permittivity_nan",
         probe,
         [](Panel& p) { p.spacer.permittivity = not_a_number; },
         "spacer.permittivity",
         "",
         {"finite"}},
        {"loss_negative",
         probe,
         [](Panel& p) { p.spacer.loss_tangent = -0.01; },
         "spacer.loss_tangent",
         "",
         {"-0.01"}},
        {"loss_high",
         probe,
         [](Panel& p) { p.spacer.loss_tangent = 1.5; },
         "spacer.loss_tangent",
         "",
         {"1.5"}},
        {"pin_x_nan", probe, [](Panel& p) { pin(p).x = not_a_number; }, "feed.x", "", {"finite"}},
        {"pin_y_infinite", probe, [](Panel& p) { pin(p).y = infinite; }, "feed.y", "", {"finite"}},
        {"pin_diameter", probe, [](Panel& p) { pin(p).diameter = 0.0; }, "feed.diameter", "", {"positive"}},
        {"tab_width", strip, [](Panel& p) { tab(p).width = 0.0; }, "feed.width", "", {"positive"}},
        {"notch_depth_negative",
         strip,
         [](Panel& p) { tab(p).notch_depth = -1e-3; },
         "feed.notch_depth",
         "",
         {"-1 mm"}},
        {"notch_depth_tiny",
         strip,
         [](Panel& p) { tab(p).notch_depth = 1e-9; },
         "feed.notch_depth",
         "",
         {"0.001 mm"}},
        {"notch_gap_negative",
         strip,
         [](Panel& p) { tab(p).notch_gap = -1e-3; },
         "feed.notch_gap",
         "",
         {"-1 mm"}},
        {"notch_gap_missing",
         strip,
         [](Panel& p) { tab(p).notch_gap = 0.0; },
         "feed.notch_gap",
         "",
         {"feed.notch_depth 8 mm", "positive"}},
        {"reach_negative", strip, [](Panel& p) { tab(p).reach = -1e-3; }, "feed.reach", "", {"-1 mm"}},
        {"reflector_length",
         probe,
         [](Panel& p) { p.reflector.length = 0.0; },
         "reflector.length",
         "",
         {"positive"}},
        {"reflector_width",
         probe,
         [](Panel& p) { p.reflector.width = infinite; },
         "reflector.width",
         "",
         {"finite"}},
        {"offset_x_nan",
         probe,
         [](Panel& p) { p.reflector.offset_x = not_a_number; },
         "reflector.offset_x",
         "",
         {"finite"}},
        {"offset_y_nan",
         probe,
         [](Panel& p) { p.reflector.offset_y = not_a_number; },
         "reflector.offset_y",
         "",
         {"finite"}},
        {"reflector_conductivity",
         probe,
         [](Panel& p) { p.reflector.conductivity = not_a_number; },
         "reflector.conductivity",
         "",
         {"positive"}},
        {"post_x_nan", posts, [](Panel& p) { p.posts[0].x = not_a_number; }, "post[1].x", "", {"finite"}},
        {"post_y_nan", posts, [](Panel& p) { p.posts[1].y = not_a_number; }, "post[2].y", "", {"finite"}},
        {"post_diameter",
         posts,
         [](Panel& p) { p.posts[1].diameter = -1.0; },
         "post[2].diameter",
         "",
         {"positive"}},
    };
}

std::vector<Broken> clashing_fields() {
    const Panel probe = gauge_panel();
    const Panel strip = hill_top_panel();
    const Panel posts = with_two_posts();
    const Panel pin_in_middle = test::with_tubes({.x = 0.01, .y = 0.0, .diameter = 0.002}, {});
    return {
        {"thick_sheet",
         probe,
         [](Panel& p) { p.patch.thickness = 0.015; },
         "patch.thickness",
         "spacer.height",
         {"15 mm"}},
        // The rim of a 2 mm pin is 1.25 mm: 73.5 - 1.25 = 72.25 mm and 82.5 - 1.25 = 81.25 mm.
        {"pin_beyond_x",
         probe,
         [](Panel& p) { pin(p).x = -0.0723; },
         "feed.x",
         "patch.length",
         {"-72.3 mm", "72.25 mm", "the pin"}},
        {"pin_beyond_y", probe, [](Panel& p) { pin(p).y = 0.0813; }, "feed.y", "patch.width", {"81.25 mm"}},
        {"pin_off_reflector",
         probe,
         [](Panel& p) {
             pin(p).x = 0.06;
             p.reflector = {.length = 0.15, .width = 0.26, .offset_x = -0.02};
         },
         "feed.x",
         "reflector.length",
         {"60 mm", "53.75 mm"}},
        {"pin_too_fat",
         probe,
         [](Panel& p) { pin(p) = {.x = 0.0, .y = 0.0, .diameter = 0.15}; },
         "feed.diameter",
         "patch.length",
         {"150 mm"}},
        {"post_beyond_x",
         posts,
         [](Panel& p) { p.posts[1].x = 0.08; },
         "post[2].x",
         "patch.length",
         {"post 2"}},
        {"post_beyond_y",
         posts,
         [](Panel& p) { p.posts[0].y = -0.09; },
         "post[1].y",
         "patch.width",
         {"post 1"}},
        {"post_off_reflector",
         posts,
         [](Panel& p) {
             p.posts[1].y = 0.075;
             p.reflector.width = 0.15;
         },
         "post[2].y",
         "reflector.width",
         {"post 2", "73.125 mm"}},
        {"post_in_pin",
         posts,
         [](Panel& p) { p.posts[0].x = -0.036; },
         "post[1].x",
         "feed.x",
         {"post 1", "the pin"}},
        // Rims 1.875 mm each; exactly 3.75 mm apart would do.
        {"post_in_post",
         posts,
         [](Panel& p) {
             p.posts[1] = {0.001, 0.0037, 0.003};
         },
         "post[2].y",
         "post[1].y",
         {"3.7 mm", "3.75 mm"}},
        {"post_in_strip",
         strip,
         [](Panel& p) { p.posts[0].x = -0.068; },
         "post[1].x",
         "feed.notch_depth",
         {"post 1"}},
        {"post_in_slit",
         strip,
         [](Panel& p) { p.posts[0] = {.x = -0.0695, .y = -0.005, .diameter = 0.003}; },
         "post[1].x",
         "feed.notch_depth",
         {"-3.5 mm"}},
        {"notch_too_deep",
         strip,
         [](Panel& p) { tab(p).notch_depth = 0.12; },
         "feed.notch_depth",
         "patch.length",
         {"120 mm", "110.25 mm"}},
        {"notch_too_wide",
         strip,
         [](Panel& p) { tab(p).notch_gap = 0.072; },
         "feed.width",
         "patch.width",
         {"149 mm", "148.5 mm"}},
        {"tab_too_wide",
         test::with_tab({.width = 0.012}),
         [](Panel& p) { tab(p).width = 0.15; },
         "feed.width",
         "patch.width",
         {"150 mm"}},
        {"tab_foot_off_in_x",
         strip,
         [](Panel& p) { tab(p).reach = 0.0366; },
         "feed.reach",
         "reflector.length",
         {"-110.1 mm", "-110 mm"}},
        {"tab_foot_off_in_y",
         strip,
         [](Panel& p) {
             tab(p) = {.width = 0.1, .notch_depth = 0.0, .notch_gap = 0.0, .reach = 0.0};
             p.reflector = {.length = 0.22, .width = 0.125, .offset_x = 0.0, .offset_y = 0.018};
         },
         "feed.width",
         "reflector.width",
         {"-44.5 mm"}},
        {"reflector_short",
         pin_in_middle,
         [](Panel& p) { p.reflector.length = 0.073; },
         "reflector.length",
         "patch.length",
         {"37 mm", "36.75 mm"}},
        {"reflector_narrow",
         probe,
         [](Panel& p) { p.reflector.width = 0.08; },
         "reflector.width",
         "patch.width",
         {"80 mm"}},
        {"reflector_moved",
         pin_in_middle,
         [](Panel& p) { p.reflector.offset_x = 0.0735; },
         "reflector.offset_x",
         "reflector.length",
         {"73.5 mm"}},
        {"reflector_moved_in_y",
         probe,
         [](Panel& p) { p.reflector.offset_y = -0.089; },
         "reflector.offset_y",
         "reflector.width",
         {"-89 mm"}},
    };
}

class OneProblem : public testing::TestWithParam<Broken> {};

TEST_P(OneProblem, IsFoundOnceUnderItsFields) {
    const Broken& broken = GetParam();
    Panel panel = broken.good;
    ASSERT_TRUE(problems(panel).empty());
    broken.spoil(panel);
    const std::vector<PanelProblem> found = problems(panel);
    ASSERT_EQ(found.size(), 1U) << (found.size() > 1 ? found[1].message : std::string());
    EXPECT_EQ(found[0].key, broken.key);
    EXPECT_EQ(found[0].other_key, broken.other_key);
    EXPECT_NE(found[0].message.find(broken.key), std::string::npos) << found[0].message;
    EXPECT_NE(found[0].message.find(broken.other_key), std::string::npos) << found[0].message;
    for (const std::string& word : broken.words) {
        EXPECT_NE(found[0].message.find(word), std::string::npos) << word << " in: " << found[0].message;
    }
}

std::string broken_name(const testing::TestParamInfo<Broken>& info) {
    return info.param.name;
}

INSTANTIATE_TEST_SUITE_P(Fields, OneProblem, testing::ValuesIn(broken_fields()), broken_name);
INSTANTIATE_TEST_SUITE_P(Clashes, OneProblem, testing::ValuesIn(clashing_fields()), broken_name);

TEST(PanelProblems, GoodPanelsHaveNone) {
    for (const auto& [name, panel] : test::assorted_panels()) {
        const auto found = problems(panel);
        EXPECT_TRUE(found.empty()) << name << ": " << found.front().message;
    }
}

TEST(PanelProblems, LimitsThemselvesAreAllowed) {
    Panel panel = gauge_panel();
    panel.spacer.permittivity = 100.0;
    panel.spacer.loss_tangent = 1.0;
    panel.patch.thickness = 0.0;
    pin(panel) = {.x = -0.0735 + 0.00125, .y = 0.0825 - 0.00125, .diameter = 0.002};
    panel.reflector.length =
        0.147 - 0.03675;  // flush with the patch at one end, a quarter short at the other
    panel.reflector.offset_x = -0.5 * 0.03675;
    EXPECT_TRUE(problems(panel).empty()) << problems(panel).front().message;
}

TEST(PanelProblems, AreAllReportedTogetherAndNoneTwice) {
    Panel panel = with_two_posts();
    panel.patch.thickness = 0.02;
    panel.spacer.permittivity = 0.5;
    pin(panel).x = -0.2;
    panel.posts[0].diameter = -0.003;
    panel.posts[1].y = 0.2;
    const std::vector<PanelProblem> found = problems(panel);
    std::set<std::pair<std::string, std::string>> keys;
    for (const PanelProblem& problem : found) keys.insert({problem.key, problem.other_key});
    const std::set<std::pair<std::string, std::string>> expected = {{"patch.thickness", "spacer.height"},
                                                                    {"spacer.permittivity", ""},
                                                                    {"feed.x", "patch.length"},
                                                                    {"post[1].diameter", ""},
                                                                    {"post[2].y", "patch.width"}};
    EXPECT_EQ(keys, expected);
    EXPECT_EQ(found.size(), expected.size());
}

TEST(PanelProblems, UnusableFieldsHaveNoConsequences) {
    const Panel nothing;  // all dimensions zero
    std::set<std::string> keys;
    for (const PanelProblem& problem : problems(nothing)) {
        EXPECT_TRUE(problem.other_key.empty()) << problem.message;
        keys.insert(problem.key);
    }
    EXPECT_EQ(keys, (std::set<std::string>{"patch.length", "patch.width", "spacer.height", "feed.diameter",
                                           "reflector.length", "reflector.width"}));
}

TEST(MirrorSymmetric, LooksAtFeedReflectorAndPosts) {
    EXPECT_TRUE(mirror_symmetric(gauge_panel()));
    EXPECT_TRUE(mirror_symmetric(hill_top_panel()));
    EXPECT_FALSE(mirror_symmetric(test::dike_panel()));
    Panel panel = gauge_panel();
    panel.reflector.offset_y = 1e-6;
    EXPECT_FALSE(mirror_symmetric(panel));
    panel = gauge_panel();
    panel.posts = {{0.01, 0.02, 0.003}, {0.01, -0.02, 0.003}};
    EXPECT_TRUE(mirror_symmetric(panel));
    panel.posts[1].diameter = 0.002;
    EXPECT_FALSE(mirror_symmetric(panel));
}

}  // namespace
}  // namespace panelwright::mesh
