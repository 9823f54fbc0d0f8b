/// The command line of Panelwright.
#include <fmt/format.h>

#include <CLI/CLI.hpp>
#include <array>
#include <exception>
#include <new>
#include <string>
#include <vector>

#include "app/commands.hpp"
#include "app/console.hpp"
#include "app/provenance.hpp"
#include "io/case.hpp"
#include "io/suggest.hpp"

namespace panelwright::app {
namespace {

/// Runs the command; every error ends here, as lines on standard error and an exit status.
ExitStatus outcome(const Command& command) {
    const auto complain = [](ExitStatus status, std::string_view message) {
        tell(fmt::format("{}\n", message));
        return status;
    };
    try {
        return command.action();
    } catch (const io::CaseError& error) {
        return complain(ExitStatus::bad_input, error.what());
    } catch (const UsageError& error) {
        return complain(ExitStatus::bad_input, error.what());
    } catch (const std::bad_alloc&) {
        return complain(ExitStatus::other,
                        "not enough memory for this case; `panelwright check` says what it needs");
    } catch (const std::exception& error) {
        return complain(ExitStatus::other,
                        fmt::format("panelwright {}: {}", command.parser->get_name(), error.what()));
    }
}

/// What the parser says of a wrong command line. A word in the place of a command is named: the parser only
/// says that a command is missing.
int refuse(const CLI::App& program, const CLI::ParseError& error) {
    const std::vector<std::string> unknown = program.remaining();
    if (error.get_exit_code() != 0 && program.get_subcommands().empty() && !unknown.empty()) {
        tell(
            fmt::format("panelwright: unknown {} {}; commands: run, check, keys\n"
                        "`panelwright --help` explains them.\n",
                        unknown.front().starts_with('-') ? "option" : "command", io::shown(unknown.front())));
        return static_cast<int>(ExitStatus::bad_input);
    }
    return program.exit(error) == 0 ? 0 : static_cast<int>(ExitStatus::bad_input);
}

int run_program(int argc, char** argv) {
    reserve_standard_streams();
    CLI::App program{
        "Designs and analyses flat patch antennas over finite reflectors, from a case file to figures.",
        "panelwright"};
    program.set_version_flag("--version", version_line());
    program.require_subcommand(1);
    program.footer(
        "A first run:\n"
        "  panelwright check cases/gauge-869.toml     what would run, and how long it would take\n"
        "  panelwright run cases/gauge-869.toml       solve; figures on screen, files in gauge-869-results\n"
        "`panelwright COMMAND --help` explains a command, `panelwright keys` every key of a case file.");
    const std::array commands{run_command(program), check_command(program), keys_command(program)};
    try {
        program.parse(argc, argv);
    } catch (const CLI::ParseError& error) {
        return refuse(program, error);
    }
    for (const Command& command : commands) {
        if (command.parser->parsed()) return static_cast<int>(outcome(command));
    }
    return static_cast<int>(ExitStatus::bad_input);
}

}  // namespace
}  // namespace panelwright::app

int main(int argc, char** argv) {
    return panelwright::app::run_program(argc, argv);
}
