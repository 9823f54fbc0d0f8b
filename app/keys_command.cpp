#include <fmt/format.h>

#include <CLI/CLI.hpp>
#include <memory>
#include <nlohmann/json.hpp>

#include "app/commands.hpp"
#include "app/console.hpp"
#include "app/report.hpp"
#include "io/case.hpp"

namespace panelwright::app {
namespace {

std::string keys_table() {
    std::string text;
    for (const io::KeyEntry& key : io::key_table()) {
        text += fmt::format("{:<24}{}", key.name, key.type);
        if (!key.unit.empty()) text += fmt::format(" [{}]", key.unit);
        text += key.default_value == "required" ? std::string("; required")
                                                : fmt::format("; default: {}", key.default_value);
        if (!key.bounds.empty()) text += fmt::format("; {}", key.bounds);
        text += fmt::format("\n    {}\n", key.description);
    }
    return text;
}

nlohmann::ordered_json keys_json() {
    nlohmann::ordered_json keys = nlohmann::ordered_json::array();
    for (const io::KeyEntry& key : io::key_table()) {
        keys.push_back({{"name", key.name},
                        {"type", key.type},
                        {"unit", key.unit},
                        {"default", key.default_value},
                        {"bounds", key.bounds},
                        {"description", key.description}});
    }
    return keys;
}

}  // namespace

Command keys_command(CLI::App& program) {
    CLI::App* const parser = program.add_subcommand("keys", "Explain every key of a case file");
    const auto output = std::make_shared<Output>(Output::table);
    parser->add_flag_callback(
        "--json", [output] { *output = Output::json; }, "Print the keys as JSON instead of a table");
    parser->footer(
        "For each key: its name, what it takes and in which units, its default, its bounds, and what it "
        "means.\n\n"
        "Examples:\n"
        "  panelwright keys\n"
        "  panelwright keys | grep -A1 '^feed'\n"
        "  panelwright keys --json");
    return {parser, [output] {
                show(*output == Output::json ? json_text(keys_json()) : keys_table());
                return ExitStatus::done;
            }};
}

}  // namespace panelwright::app
