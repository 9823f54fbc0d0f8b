// The parts of the case reader: quantities, suggestions, echoes, the key table and its page.
#include <gtest/gtest.h>

#include <algorithm>
#include <array>
#include <fstream>
#include <iterator>
#include <set>
#include <string>
#include <variant>
#include <vector>

#include "io/case.hpp"
#include "io/case_document.hpp"
#include "io/case_keys.hpp"
#include "io/quantity.hpp"
#include "io/suggest.hpp"
#include "io/utf8.hpp"

namespace panelwright::io {
namespace {

Quantity quantity(std::string_view text, Dimension dimension) {
    const auto reading = parse_quantity(text, dimension);
    if (const auto* problem = std::get_if<std::string>(&reading)) throw std::invalid_argument(*problem);
    return std::get<Quantity>(reading);
}

TEST(Quantity, IsTheDoubleThatALiteralInSiWouldBe) {
    EXPECT_EQ(quantity("53 mm", Dimension::length).si, 0.053);
    EXPECT_EQ(quantity("5.3cm", Dimension::length).si, 0.053);
    EXPECT_EQ(quantity("2.1 in", Dimension::length).si, 0.05334);
    EXPECT_EQ(quantity("62 mil", Dimension::length).si, 0.0015748);
    EXPECT_EQ(quantity("-.5 m", Dimension::length).si, -0.5);
    EXPECT_EQ(quantity("869.5 MHz", Dimension::frequency).si, 869.5e6);
    EXPECT_EQ(quantity("2.45 GHz", Dimension::frequency).si, 2.45e9);
    EXPECT_EQ(quantity("12 kHz", Dimension::frequency).si, 12e3);
    EXPECT_EQ(quantity("5.8e7 S/m", Dimension::conductivity).si, 5.8e7);
    EXPECT_EQ(quantity("50 ohm", Dimension::resistance).si, 50.0);
}

TEST(Quantity, KeepsTheNumberAsWritten) {
    EXPECT_EQ(quantity("\t+053.10mm ", Dimension::length).text, "053.10 mm");
    EXPECT_EQ(quantity("1e1 mm", Dimension::length).text, "1e1 mm");
}

TEST(Quantity, RefusesEverythingElse) {
    for (const std::string text :
         {"", " ", "mm", "1", "1 1 mm", "0x10 mm", "1_0 mm", "1 Mm", "1 mm mm", "--1 mm", "+ 1 mm", "1e mm",
          "infinity mm", "nan(1) mm", "1e999 mm", "1e-999 mm", "1\u00A0mm"}) {
        EXPECT_TRUE(std::holds_alternative<std::string>(parse_quantity(text, Dimension::length))) << text;
    }
}

TEST(EditDistance, CountsInsertionsDeletionsReplacementsAndSwaps) {
    EXPECT_EQ(edit_distance("width", "width"), 0U);
    EXPECT_EQ(edit_distance("widht", "width"), 1U);
    EXPECT_EQ(edit_distance("wdth", "width"), 1U);
    EXPECT_EQ(edit_distance("widtth", "width"), 1U);
    EXPECT_EQ(edit_distance("WIDTH", "width"), 0U);
    EXPECT_EQ(edit_distance("", "width"), 5U);
    EXPECT_EQ(edit_distance("kitten", "sitting"), 3U);
    EXPECT_EQ(edit_distance(std::string(1000, 'a'), "a"), 63U);  // names are cut at 64 bytes
}

TEST(Nearest, TakesTheFirstOfEqualsThatAreNear) {
    const std::vector<std::string_view> names = {"height", "length", "width"};
    EXPECT_EQ(nearest("lenght", names), "length");
    EXPECT_EQ(nearest("ax", std::vector<std::string_view>{"ab", "ac"}), "ab");
    EXPECT_EQ(nearest("", std::vector<std::string_view>{"ab", "cd"}), "");
    EXPECT_EQ(nearest("bogus", std::vector<std::string_view>{"from", "to"}), "");
    EXPECT_EQ(nearest("a", std::vector<std::string_view>{"title", "band"}), "");
    EXPECT_EQ(nearest("x", std::vector<std::string_view>{}), "");
}

TEST(Shown, MakesOneHarmlessLine) {
    EXPECT_EQ(shown("53 mm"), "\"53 mm\"");
    EXPECT_EQ(shown("a\nb\rc\td\x1B[31m"), "\"a\\nb\\rc\\td\\u001B[31m\"");
    EXPECT_EQ(shown("\xC2\x85\xE2\x80\xA8"), "\"\\u0085\\u2028\"");
    EXPECT_EQ(shown("Rödelbach"), "\"Rödelbach\"");
    EXPECT_EQ(shown("\xFF"), "\"\\xFF\"");
    EXPECT_EQ(shortened("äöü", 2), "äö…");
    EXPECT_EQ(shortened("äö", 2), "äö");
}

TEST(Utf8, RefusesWhatTheStandardForbids) {
    // RFC 3629, section 3: overlong forms, surrogates, code points above U+10FFFF, stray and missing bytes.
    for (const std::string text :
         {"\xC0\x80", "\xC1\xBF", "\xE0\x80\x80", "\xED\xA0\x80", "\xF0\x80\x80\x80", "\xF4\x90\x80\x80",
          "\xF5\x80\x80\x80", "\x80", "\xC3", "\xE2\x82", "\xC3(", "\xFF"}) {
        EXPECT_FALSE(first_character(text).valid);
        EXPECT_EQ(first_character(text).bytes, 1U);
    }
    const auto euro = first_character("\xE2\x82\xAC!");
    EXPECT_TRUE(euro.valid);
    EXPECT_EQ(euro.code, 0x20ACU);
    EXPECT_EQ(euro.bytes, 3U);
    EXPECT_EQ(first_character("\xF4\x8F\xBF\xBF").code, 0x10FFFFU);
}

TEST(KeyPath, ReadsTablesAndNumbers) {
    const auto post = parse_path("post[12].x");
    ASSERT_TRUE(post.has_value());
    EXPECT_EQ(post->table, "post");
    EXPECT_EQ(post->index, 12U);
    EXPECT_EQ(post->name, "x");
    for (const std::string text :
         {"post[].x", "post[0].x", "post[-1].x", "post[1.x", "post[1]a.x", "post[99999999999999999999].x"}) {
        EXPECT_FALSE(parse_path(text).has_value()) << text;
    }
}

TEST(KeyTable, IsWhole) {
    std::set<std::string> names;
    for (const KeyEntry& entry : key_table()) {
        EXPECT_TRUE(names.insert(entry.name).second) << entry.name << " stands twice";
        EXPECT_FALSE(entry.type.empty()) << entry.name;
        EXPECT_FALSE(entry.default_value.empty()) << entry.name;
        EXPECT_FALSE(entry.bounds.empty()) << entry.name;
        EXPECT_TRUE(entry.description.ends_with(".")) << entry.name;
        EXPECT_EQ(entry.description.find('|'), std::string::npos) << entry.name;
    }
    // The names that users and scripts rely on.
    for (const std::string name : {"title",
                                   "band.from",
                                   "band.to",
                                   "band.points",
                                   "band.pattern_at",
                                   "patch.length",
                                   "patch.width",
                                   "patch.thickness",
                                   "patch.metal",
                                   "patch.conductivity",
                                   "spacer.height",
                                   "spacer.permittivity",
                                   "spacer.loss_tangent",
                                   "feed.kind",
                                   "feed.x",
                                   "feed.y",
                                   "feed.diameter",
                                   "feed.width",
                                   "feed.notch_depth",
                                   "feed.notch_gap",
                                   "feed.reach",
                                   "feed.impedance",
                                   "reflector.length",
                                   "reflector.width",
                                   "reflector.offset_x",
                                   "reflector.offset_y",
                                   "reflector.metal",
                                   "reflector.conductivity",
                                   "post.x",
                                   "post.y",
                                   "post.diameter",
                                   "solve.methods",
                                   "solve.accuracy",
                                   "vary.keys",
                                   "vary.from",
                                   "vary.to",
                                   "vary.step",
                                   "vary.values"}) {
        EXPECT_TRUE(names.contains(name)) << name;
    }
}

TEST(KeyTable, BoundsAndDefaultsCanBeRead) {
    for (const Key& key : case_keys()) {
        if (!is_numeric(key.type)) continue;
        SCOPED_TRACE(path(key));
        const auto number = [&](std::string_view text) {
            const auto kind = dimension(key.type);
            return kind ? quantity(text, *kind).si : std::stod(std::string(text));
        };
        const double smallest = number(key.smallest);
        const double largest = number(key.largest);
        EXPECT_LT(smallest, largest);
        if (key.fallback == required || key.fallback == none || key.fallback == derived) continue;
        EXPECT_GE(number(key.fallback), smallest);
        EXPECT_LE(number(key.fallback), largest);
    }
}

TEST(CaseFormatPage, IsUpToDate) {
    std::ifstream stream(PANELWRIGHT_SOURCE_DIR "/docs/case-format.md", std::ios::binary);
    const std::string page{std::istreambuf_iterator<char>(stream), std::istreambuf_iterator<char>()};
    EXPECT_TRUE(page == case_format_markdown())
        << "docs/case-format.md is out of date: build the target docs_pages";
}

TEST(CaseFormatPage, ItsExamplesAreSound) {
    const std::string page = case_format_markdown();
    std::vector<std::string> examples;
    for (std::size_t at = page.find("```toml\n"); at != std::string::npos;
         at = page.find("```toml\n", at + 1)) {
        const std::size_t start = at + 8;
        examples.push_back(page.substr(start, page.find("```", start) - start));
    }
    ASSERT_EQ(examples.size(), 2U);
    EXPECT_NO_THROW(parse_case(examples[0], "page"));
    const Case study = parse_case(examples[0] + examples[1], "page");
    EXPECT_EQ(design_count(study), 26U);  // 13 sides, 2 permittivities
}

}  // namespace
}  // namespace panelwright::io
