// Every rule of the case file, broken once: the message, and the line and column that it points at.
#include <gtest/gtest.h>

#include <algorithm>
#include <ostream>
#include <string>
#include <vector>

#include "io/case.hpp"
#include "io/case_document.hpp"
#include "tests/io/case_text.hpp"

namespace panelwright::io {
namespace {

using test::edited;
using test::error_of;
using test::sound_case;

// `after` replaces `before`; the sign § in it marks the place of the problem and is taken out again. Without
// a § the place is 1:1.
struct Slip {
    std::string name;
    std::string before;
    std::string after;
    std::vector<std::string> message;  // parts that the message holds
};

void PrintTo(const Slip& slip, std::ostream* stream) {
    *stream << slip.name;
}

constexpr std::string_view mark = "§";

struct Marked {
    std::string text;
    Position at;
};

Marked marked(std::string text) {
    const std::size_t place = text.find(mark);
    if (place == std::string::npos) return {text, {1, 1}};
    const std::string before = text.substr(0, place);
    const auto lines = static_cast<std::size_t>(std::ranges::count(before, '\n'));
    const std::size_t line_start = before.rfind('\n') == std::string::npos ? 0 : before.rfind('\n') + 1;
    return {before + text.substr(place + mark.size()), {lines + 1, before.size() - line_start + 1}};
}

class CaseSlip : public testing::TestWithParam<Slip> {};

TEST_P(CaseSlip, IsReportedAtItsPlace) {
    const Slip& slip = GetParam();
    const std::string text = edited(sound_case, slip.before, slip.after);
    ASSERT_FALSE(text.empty()) << "the slip does not fit the sound case";
    const auto [spoilt, at] = marked(text);
    const auto error = error_of(spoilt);
    ASSERT_TRUE(error.has_value()) << spoilt;
    ASSERT_EQ(error->problems().size(), 1U) << error->what();
    const CaseProblem& problem = error->problems().front();
    EXPECT_EQ(problem.line, at.line) << error->what();
    EXPECT_EQ(problem.column, at.column) << error->what();
    for (const std::string& part : slip.message)
        EXPECT_NE(problem.message.find(part), std::string::npos) << error->what();
    EXPECT_EQ(problem.message.find('\n'), std::string::npos);
}

const std::vector<Slip> slips = {
    // Names
    {"unknown_key",
     "width = \"172 mm\"",
     "§widht = \"172 mm\"\nwidth = \"172 mm\"",
     {"unknown key \"widht\" in [patch]", "nearest known key is \"width\""}},
    {"unknown_table", "[reflector]", "[§reflecter]\n[reflector]", {"\"reflecter\"", "\"reflector\""}},
    {"key_of_another_table",
     "[spacer]",
     "[spacer]\n§thickness = \"1 mm\"",
     {"\"thickness\" in [spacer]", "belongs in [patch]"}},
    {"key_outside_all_tables",
     "title = \"Gauge\"",
     "§height = \"14 mm\"",
     {"\"height\"", "belongs in [spacer]"}},
    {"key_with_control_character", "points = 5", "points = 5\n§\"a\\u001Bb\\nc\" = 1", {"\"a\\u001Bb\\nc\""}},
    {"duplicate_key", "points = 5", "points = 5\n§points = 7", {"not TOML", "points"}},
    // What is missing
    {"missing_key",
     "[patch]\nlength = \"146 mm\"\n",
     "§[patch]\n",
     {"patch.length is missing", "0.1 mm to 10 m"}},
    {"missing_kind",
     "[feed]\nkind = \"probe\"\nx = \"-36 mm\"\ndiameter = \"2.5 mm\"\n",
     "§[feed]\n",
     {"feed.kind is missing", "probe or tab"}},
    {"missing_table",
     "[reflector]\nlength = \"230 mm\"\nwidth = \"250 mm\"\n",
     "",
     {"[reflector] is missing", "length, width"}},
    {"missing_post_key",
     "[reflector]",
     "§[[post]]\nx = \"0 mm\"\ny = \"0 mm\"\n[reflector]",
     {"post[1].diameter is missing"}},
    // Types and units
    {"bare_length", "\"146 mm\"", "§146", {"patch.length", "write \"146 mm\"", "mm, cm, m, in, mil"}},
    {"bare_real_length", "\"146 mm\"", "§146.5", {"write \"146.5 mm\""}},
    {"bare_frequency", "\"850 MHz\"", "§850", {"write \"850 MHz\""}},
    {"bare_hertz", "\"850 MHz\"", "§850000000", {"write \"850000000 Hz\""}},
    {"length_without_unit", "\"146 mm\"", "§\"146\"", {"has no unit", "write \"146 mm\""}},
    {"unit_of_another_quantity",
     "\"146 mm\"",
     "§\"146 MHz\"",
     {"\"MHz\" is a unit of frequency", "mm, cm, m, in, mil"}},
    {"unit_in_wrong_letters", "\"890 MHz\"", "§\"890 mhz\"", {"\"mhz\"", "nearest is \"MHz\""}},
    {"decimal_comma", "\"146 mm\"", "§\"146,5 mm\"", {"comma"}},
    {"no_number", "\"146 mm\"", "§\"mm\"", {"no number"}},
    {"empty_text", "\"146 mm\"", "§\"  \"", {"empty"}},
    {"two_signs", "\"146 mm\"", "§\"+-146 mm\"", {"no number"}},
    {"infinite_length", "\"146 mm\"", "§\"inf mm\"", {"not finite"}},
    {"not_a_number", "\"146 mm\"", "§\"nan mm\"", {"not finite"}},
    {"overflow", "\"146 mm\"", "§\"1e400 mm\"", {"too large or too small"}},
    {"overflow_of_the_unit", "\"890 MHz\"", "§\"1e300 GHz\"", {"too large"}},
    {"list_for_length", "\"146 mm\"", "§[\"146 mm\"]", {"found a list"}},
    {"truth_for_length", "\"146 mm\"", "§true", {"found the word true"}},
    {"date_for_length", "\"146 mm\"", "§2024-02-29", {"found a date"}},
    {"nan_for_length", "\"146 mm\"", "§nan", {"found the number nan"}},
    {"forgotten_quotes", "\"146 mm\"", "146 §mm", {"quotation marks", "write \"146 mm\""}},
    {"quoted_number",
     "height = \"14 mm\"",
     "height = \"14 mm\"\npermittivity = §\"1.0\"",
     {"without unit and quotation marks"}},
    {"infinite_number", "height = \"14 mm\"", "height = \"14 mm\"\npermittivity = §inf", {"not finite"}},
    {"broken_count",
     "points = 5",
     "points = §5.0",
     {"found the number 5.0", "whole number without a decimal point"}},
    {"fraction_for_count", "points = 5", "points = §5.5", {"found the number 5.5", "whole number"}},
    {"far_from_every_key",
     "points = 5",
     "points = 5\n§bogus = 1",
     {"unknown key \"bogus\"", "known: from, to"}},
    {"block_in_a_table", "[reflector]", "[reflector]\n§post = 1", {"unknown key \"post\"", "[[post]]"}},
    {"number_for_title", "\"Gauge\"", "§12", {"title", "a text"}},
    {"title_of_two_lines", "\"Gauge\"", "§\"Gauge\\nHill\"", {"control character"}},
    {"number_for_word",
     "kind = \"probe\"\nx = \"-36 mm\"\ndiameter = \"2.5 mm\"",
     "kind = §1",
     {"probe or tab"}},
    {"value_for_table", "[spacer]\nheight = \"14 mm\"", "§[spacer.height]\nspacer = 1", {"a table"}},
    {"value_for_blocks", "title = \"Gauge\"", "§post = 3", {"[[post]]"}},
    {"single_table_for_blocks", "[reflector]", "[§post]\n[reflector]", {"[[post]]"}},
    {"blocks_for_single_table", "[spacer]", "[[§spacer]]", {"[spacer]"}},
    {"scalars_for_blocks", "title = \"Gauge\"", "post = [§1]", {"post", "[[post]]"}},
    // Bounds
    {"zero_length", "\"146 mm\"", "§\"0 mm\"", {"too small", "0.1 mm to 10 m"}},
    {"negative_length", "\"172 mm\"", "§\"-172 mm\"", {"too small"}},
    {"huge_length", "\"172 mm\"", "§\"11 m\"", {"too large"}},
    {"permittivity_below_one",
     "height = \"14 mm\"",
     "height = \"14 mm\"\npermittivity = §0.9",
     {"too small", "1 to 100"}},
    {"too_many_points", "points = 5", "points = §10002", {"too large", "1 to 10001"}},
    {"no_points", "points = 5", "points = §0", {"too small"}},
    {"impedance_zero", "kind = \"probe\"", "kind = \"probe\"\nimpedance = §\"0 ohm\"", {"too small"}},
    // Words
    {"unknown_kind",
     "kind = \"probe\"\nx = \"-36 mm\"\ndiameter = \"2.5 mm\"",
     "kind = §\"tap\"",
     {"nearest is \"tab\""}},
    {"unknown_metal",
     "width = \"172 mm\"",
     "width = \"172 mm\"\nmetal = §\"aluminum\"",
     {"nearest is \"aluminium\""}},
    {"unknown_method",
     "[reflector]",
     "[solve]\nmethods = [§\"apperture\"]\n[reflector]",
     {"nearest is \"aperture\""}},
    {"method_not_in_list", "[reflector]", "[solve]\nmethods = §\"aperture\"\n[reflector]", {"a list"}},
    {"no_methods", "[reflector]", "[solve]\nmethods = §[]\n[reflector]", {"empty list"}},
    {"method_twice",
     "[reflector]",
     "[solve]\nmethods = [\"aperture\", §\"aperture\"]\n[reflector]",
     {"stands twice", "21:12"}},
    {"unknown_accuracy",
     "[reflector]",
     "[solve]\naccuracy = §\"finer\"\n[reflector]",
     {"nearest is \"fine\""}},
    {"metal_and_conductivity",
     "width = \"172 mm\"",
     "width = \"172 mm\"\nmetal = \"brass\"\nconductivity = §\"2e7 S/m\"",
     {"exclude each other", "\"brass\" at 11:9"}},
    // Feeds
    {"tab_key_of_a_probe",
     "kind = \"probe\"",
     "kind = \"probe\"\n§notch_depth = \"8 mm\"",
     {"feed.notch_depth belongs to a feed of kind \"tab\"", "\"probe\" at 16:8"}},
    {"probe_key_of_a_tab",
     "kind = \"probe\"\nx = \"-36 mm\"\ndiameter = \"2.5 mm\"",
     "kind = \"tab\"\nwidth = \"12 mm\"\n§diameter = \"2 mm\"",
     {"belongs to a feed of kind \"probe\"", "\"tab\" at 16:8"}},
    {"slits_without_gap",
     "kind = \"probe\"\nx = \"-36 mm\"\ndiameter = \"2.5 mm\"",
     "kind = \"tab\"\nwidth = \"12 mm\"\nnotch_depth = \"20 mm\"\nnotch_gap = §\"0 mm\"",
     {"notch_gap", "positive"}},
    // Between keys
    {"band_upside_down",
     "to = \"890 MHz\"",
     "to = §\"840 MHz\"",
     {"band.to = \"840 MHz\"", "band.from = \"850 MHz\" at 4:8"}},
    {"one_point_of_a_band", "points = 5", "points = §1", {"allowed: 2 and more", "at 4:8", "at 5:6"}},
    {"many_points_of_one_frequency",
     "to = \"890 MHz\"\npoints = 5",
     "to = \"0.85 GHz\"\npoints = §5",
     {"one frequency", "at 5:6"}},
    {"points_too_close",
     "to = \"890 MHz\"\npoints = 5",
     "to = \"850000003 Hz\"\npoints = §5",
     {"less than 1 Hz apart", "at 5:6"}},
    {"pattern_outside_band",
     "points = 5",
     "points = 5\npattern_at = [\"860 MHz\", §\"895 MHz\"]",
     {"\"895 MHz\" lies outside the band", "band.to = \"890 MHz\" at 5:6"}},
    {"pattern_twice",
     "points = 5",
     "points = 5\npattern_at = [\"860 MHz\", §\"0.86 GHz\"]",
     {"stands twice", "7:15"}},
    {"spacer_too_high", "\"14 mm\"", "§\"60 mm\"", {"spacer.height", "0.002 to 0.15 wavelengths", "at 4:8"}},
    {"spacer_too_low", "\"14 mm\"", "§\"0.5 mm\"", {"spacer.height", "0.002 to 0.15 wavelengths"}},
    {"patch_far_from_resonance",
     "from = \"850 MHz\"\nto = \"890 MHz\"\npoints = 5\n\n[patch]\nlength = \"146 mm\"",
     "from = \"2.4 GHz\"\nto = \"2.5 GHz\"\npoints = 5\n\n[patch]\nlength = §\"146 mm\"",
     {"resonates near", "far from the band", "at 4:8", "at 5:6"}},
    {"reflector_too_large",
     "\"250 mm\"",
     "§\"10 m\"",
     {"29.69 wavelengths", "at most 25", "band.to = \"890 MHz\" at 5:6"}},
    {"pin_outside_patch",
     "x = \"-36 mm\"",
     "x = §\"-90 mm\"",
     {"feed.x", "patch.length = \"146 mm\" at 9:10"}},
    {"pin_in_a_post",
     "[reflector]",
     "[[post]]\nx = §\"-36 mm\"\ny = \"0 mm\"\ndiameter = \"3 mm\"\n[reflector]",
     {"post[1].x", "feed.x = \"-36 mm\" at 17:5"}},
    {"patch_past_reflector",
     "\"250 mm\"",
     "§\"50 mm\"",
     {"reflector.width", "patch.width = \"172 mm\" at 10:9"}},
    {"sheet_thicker_than_spacer",
     "width = \"172 mm\"",
     "width = \"172 mm\"\nthickness = §\"15 mm\"",
     {"patch.thickness", "spacer.height = \"14 mm\" at 14:10"}},
    // TOML
    {"open_text", "\"Gauge\"\n", "\"Gauge§\n", {"not TOML"}},
    {"no_value", "points = 5", "points = §", {"not TOML"}},
    {"whole_number_too_large", "points = 5", "points = 99999999999999999999§", {"not TOML"}},
    {"long_dotted_key", "points = 5", "a.b.c.d.e.f.g.h.i§.j = 5", {"very many parts"}},
};

INSTANTIATE_TEST_SUITE_P(All, CaseSlip, testing::ValuesIn(slips),
                         [](const testing::TestParamInfo<Slip>& slip) { return slip.param.name; });

TEST(CaseError, HoldsAllProblemsInTheOrderOfTheFile) {
    std::string text = edited(sound_case, "\"890 MHz\"", "890");
    text = edited(text, "\"172 mm\"", "\"172 mn\"");
    text = edited(text, "height", "hieght");
    text = edited(text, "x = \"-36 mm\"", "x = \"-90 mm\"");
    const auto error = error_of(text);
    ASSERT_TRUE(error.has_value());
    std::vector<Position> places;
    for (const CaseProblem& problem : error->problems()) places.push_back({problem.line, problem.column});
    const std::vector<Position> expected = {{5, 6}, {10, 9}, {12, 1}, {13, 1}, {17, 5}};
    EXPECT_EQ(places, expected) << error->what();
    EXPECT_EQ(error->file(), "spoilt.toml");
    EXPECT_TRUE(std::string(error->what()).starts_with("spoilt.toml:5:6: band.to: found the number 890"));
    EXPECT_EQ(std::ranges::count(std::string(error->what()), '\n'), 4);
}

// A bad value must not bring complaints about what other keys make of it.
TEST(CaseError, SaysNothingTwice) {
    const auto error = error_of(edited(sound_case, "length = \"146 mm\"", "length = \"0 mm\""));
    ASSERT_TRUE(error.has_value());
    EXPECT_EQ(error->problems().size(), 1U) << error->what();
}

TEST(CaseError, StopsAfterAHundredProblems) {
    std::string text(sound_case);
    for (int i = 0; i < 500; ++i) text += "rubbish" + std::to_string(i) + " = 1\n";
    const auto error = error_of(text);
    ASSERT_TRUE(error.has_value());
    ASSERT_EQ(error->problems().size(), 101U);
    EXPECT_NE(error->problems().back().message.find("first 100 problems"), std::string::npos);
}

TEST(CaseError, ShortensAndEscapesWhatItEchoes) {
    const auto error = error_of(edited(sound_case, "\"146 mm\"", "\"" + std::string(5000, 'x') + "\\t\""));
    ASSERT_TRUE(error.has_value());
    EXPECT_LT(error->problems().front().message.size(), 300U);
    EXPECT_NE(error->problems().front().message.find("xxx…"), std::string::npos);
    const CaseError odd_name("a\nb.toml", {{1, 1, "message"}});
    EXPECT_STREQ(odd_name.what(), "a\\nb.toml:1:1: message");
}

TEST(CaseMethods, NamesTheAvailableOnesForOneThatIsNotBuiltIn) {
    for (const std::string method : {"strip", "surface"}) {
        const auto error = error_of(
            edited(sound_case, "[reflector]", "[solve]\nmethods = [\"" + method + "\"]\n[reflector]"));
        const bool available = std::ranges::any_of(key_table(), [&](const KeyEntry& entry) {
            return entry.name == "solve.methods" &&
                   entry.bounds.find(method, entry.bounds.find("this version")) != std::string::npos;
        });
        ASSERT_EQ(error.has_value(), !available);
        if (!available) {
            const CaseProblem& problem = error->problems().front();
            EXPECT_EQ(problem.line, 21U);
            EXPECT_EQ(problem.column, 12U);
            EXPECT_NE(problem.message.find("method '" + method +
                                           "' is not part of this version; available: aperture"),
                      std::string::npos);
        }
    }
}

}  // namespace
}  // namespace panelwright::io
