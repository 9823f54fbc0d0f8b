#include "io/case.hpp"

#include <fmt/format.h>

#include <fstream>
#include <stdexcept>
#include <system_error>

#include "io/case_document.hpp"
#include "io/case_reading.hpp"
#include "io/case_resolved.hpp"
#include "io/case_rules.hpp"
#include "io/case_vary.hpp"
#include "io/suggest.hpp"

namespace panelwright::io {

namespace {

constexpr std::size_t longest_file_name = 4096;

std::string listing(const std::string& file, const std::vector<CaseProblem>& problems) {
    std::string text;
    for (const CaseProblem& problem : problems) {
        if (!text.empty()) text += '\n';
        text += fmt::format("{}:{}:{}: {}", shortened(file, longest_file_name), problem.line, problem.column,
                            problem.message);
    }
    return text;
}

[[noreturn]] void refuse(const std::string& file, const std::string& message) {
    throw CaseError(file, {{1, 1, message}});
}

std::string file_text(const std::filesystem::path& path, const std::string& file) {
    std::error_code status;
    if (std::filesystem::is_directory(path, status)) {
        refuse(file, "this is a directory; allowed: a case file, a text in TOML");
    }
    // Reading a pipe or a device would wait for whoever writes to it, perhaps for ever.
    if (std::filesystem::exists(path, status) && !std::filesystem::is_regular_file(path, status)) {
        refuse(
            file,
            "this is no regular file but a pipe, a socket or a device; allowed: a case file, a text in TOML");
    }
    std::ifstream stream(path, std::ios::binary);
    if (!stream) refuse(file, "the file cannot be opened for reading; does it exist, and may it be read?");
    // One byte more than is allowed tells a file that is too large without reading all of it.
    std::string text(largest_case_file + 1, '\0');
    stream.read(text.data(), static_cast<std::streamsize>(text.size()));
    if (stream.bad()) refuse(file, "the file cannot be read to its end");
    text.resize(static_cast<std::size_t>(stream.gcount()));
    return text;
}

void throw_if_any(const ProblemList& problems, std::string_view file) {
    if (!problems.empty()) throw CaseError(std::string(file), problems.sorted());
}

Case made(const Reading& reading, const std::vector<VaryBlock>& blocks, std::string_view text,
          std::string_view file) {
    Case result;
    result.title = reading.find("title")->text;
    result.panel = panel(reading);
    result.task = task(reading);
    result.methods = methods(reading);
    for (const VaryBlock& block : blocks) result.variations.push_back(block.variation);
    result.file = file;
    result.text = text;
    result.resolved = resolved(reading, blocks);
    return result;
}

}  // namespace

CaseError::CaseError(std::string file, std::vector<CaseProblem> problems)
    : std::runtime_error(listing(file, problems)), file_(std::move(file)), problems_(std::move(problems)) {}

Case read_case(const std::filesystem::path& path) {
    const std::string file = path.string();
    return parse_case(file_text(path, file), file);
}

Case parse_case(std::string_view text, std::string_view file) {
    if (text.empty())
        refuse(std::string(file),
               "the file is empty; a case holds [band], [patch], [spacer], [feed] and [reflector]");
    const Members document = read_document(text, file);
    const Reading reading = with_derived_defaults(read_keys(document));
    const VaryReading vary = read_variations(document, reading);
    ProblemList problems;
    problems.add(reading.problems);
    problems.add(vary.problems);
    problems.add(broken_rules(reading));
    throw_if_any(problems, file);
    return made(reading, vary.blocks, text, file);
}

std::size_t design_count(const Case& base) {
    return grid_size(base.variations);
}

Case design(const Case& base, std::size_t index) {
    if (index >= design_count(base)) {
        throw std::invalid_argument(fmt::format("design {} of {}", index, design_count(base)));
    }
    if (base.variations.empty()) return base;
    const Members original = read_document(base.text, base.file);
    const std::vector<std::size_t> position = grid_position(base.variations, index);
    Members document = original;
    std::erase_if(document, [](const Member& member) { return member.key == "vary"; });
    for (std::size_t i = 0; i < position.size(); ++i) {
        document = with_variation(std::move(document), original, base.variations[i], i, position[i]);
    }
    const Reading reading = with_derived_defaults(read_keys(document));
    ProblemList problems;
    problems.add(reading.problems);
    problems.add(broken_rules(reading));
    throw_if_any(problems, base.file);
    return made(reading, {}, base.text, base.file);
}

std::vector<std::pair<std::string, std::string>> design_values(const Case& base, std::size_t index) {
    if (index >= design_count(base)) {
        throw std::invalid_argument(fmt::format("design {} of {}", index, design_count(base)));
    }
    const std::vector<std::size_t> position = grid_position(base.variations, index);
    std::vector<std::pair<std::string, std::string>> values;
    for (std::size_t i = 0; i < position.size(); ++i) {
        for (const std::string& key : base.variations[i].keys) {
            values.emplace_back(key, base.variations[i].values[position[i]]);
        }
    }
    return values;
}

}  // namespace panelwright::io
