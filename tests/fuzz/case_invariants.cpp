#include "tests/fuzz/case_invariants.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <cstddef>
#include <optional>

#include "io/case.hpp"

namespace panelwright::test {

namespace {

// Only a few of a study's designs, so that a grid of a million does not stall the search.
constexpr std::size_t most_designs = 4;
constexpr std::size_t longest_message = 2000;

std::string broken_problem(const io::CaseError& error, std::string_view text) {
    if (error.problems().empty()) return "an error without a problem";
    const auto lines = static_cast<std::size_t>(std::ranges::count(text, '\n')) + 1;
    for (const io::CaseProblem& problem : error.problems()) {
        if (problem.line < 1 || problem.column < 1) return "a problem at no place: " + problem.message;
        // A parser may point behind the last character, hence one more of each.
        if (problem.line > lines + 1 || problem.column > text.size() + 2) {
            return "a problem outside the text: " + problem.message;
        }
        if (problem.message.empty() || problem.message.size() > longest_message) {
            return fmt::format("a message of {} bytes", problem.message.size());
        }
        const bool harmless = std::ranges::none_of(
            problem.message, [](char c) { return static_cast<unsigned char>(c) < 0x20 || c == 0x7F; });
        if (!harmless) return "a message with control characters: " + problem.message;
    }
    return {};
}

std::string broken_value(const io::Case& read) {
    const auto sound = [](double value) { return std::isfinite(value); };
    if (!std::ranges::all_of(read.task.band, sound) || !std::ranges::is_sorted(read.task.band))
        return "a band out of order";
    if (std::ranges::adjacent_find(read.task.band) != read.task.band.end())
        return "a band with a frequency twice";
    for (const double at : read.task.pattern_at) {
        if (at < read.task.band.front() || at > read.task.band.back()) return "a pattern outside the band";
    }
    if (!mesh::problems(read.panel).empty()) return "a panel that cannot be built";
    if (read.methods.empty() || read.task.pattern_at.empty()) return "a case that computes nothing";
    return {};
}

bool same(const io::Case& a, const io::Case& b) {
    return a.title == b.title && a.panel == b.panel && a.task.band == b.task.band &&
           a.task.pattern_at == b.task.pattern_at &&
           a.task.reference_impedance == b.task.reference_impedance && a.task.accuracy == b.task.accuracy &&
           a.methods == b.methods && a.resolved == b.resolved && io::design_count(a) == io::design_count(b);
}

std::string broken_round_trip(const io::Case& read) {
    try {
        return same(io::parse_case(read.resolved, "resolved"), read) ? ""
                                                                     : "the resolved case is another case";
    } catch (const io::CaseError& error) {
        return fmt::format("the resolved case is not read: {}", error.what());
    }
}

std::string broken_design(const io::Case& read, std::size_t index, std::string_view text) {
    std::optional<io::Case> made;
    try {
        made = io::design(read, index);
    } catch (const io::CaseError& error) {
        return broken_problem(error, text);
    }
    std::string broken = broken_value(*made);
    return broken.empty() ? broken_round_trip(*made) : broken;
}

}  // namespace

std::string broken_invariant(std::string_view text) {
    std::optional<io::Case> read;
    try {
        read = io::parse_case(text, "fuzzed");
    } catch (const io::CaseError& error) {
        return broken_problem(error, text);
    }
    if (read->text != text) return "the text is not kept";
    if (std::string broken = broken_value(*read); !broken.empty()) return broken;
    if (std::string broken = broken_round_trip(*read); !broken.empty()) return broken;
    const std::size_t count = io::design_count(*read);
    for (std::size_t i = 0; i < std::min(count, most_designs); ++i) {
        const std::size_t index = i % 2 == 0 ? i / 2 : count - 1 - i / 2;
        if (std::string broken = broken_design(*read, index, text); !broken.empty()) return broken;
    }
    return {};
}

}  // namespace panelwright::test
