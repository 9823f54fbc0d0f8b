/// The commands of the program, one source file each.
#pragma once

#include <functional>

#include "app/exit_status.hpp"

namespace CLI {
class App;
}

namespace panelwright::app {

/// A command's place on the command line and what it does once the line has been read.
struct Command {
    CLI::App* parser = nullptr;
    std::function<ExitStatus()> action;
};

/// How a command prints its table.
enum class Output { table, json };

/// `run CASE.toml`: solve and write results.
Command run_command(CLI::App& program);

/// `check CASE.toml`: read and check the case, say what would run.
Command check_command(CLI::App& program);

/// `keys`: every key of a case file.
Command keys_command(CLI::App& program);

}  // namespace panelwright::app
