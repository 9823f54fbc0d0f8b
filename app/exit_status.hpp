/// How a command ends, and the errors that are the user's to mend.
#pragma once

#include <stdexcept>

namespace panelwright::app {

/// Exit status of the program.
enum class ExitStatus {
    done = 0,
    other = 1,           ///< anything that is none of the others: disk full, folder not writable, no memory
    bad_input = 2,       ///< case file or command line; nothing has been written
    failed_designs = 3,  ///< a study came to its end and some designs failed
    stopped = 4,         ///< stopped early; of a study, the same command goes on from there
};

/// The command was asked for something that it refuses, such as a folder with another case's results.
class UsageError : public std::runtime_error {
    using std::runtime_error::runtime_error;
};

/// A case that could not be solved; the message names the case and the method.
class SolveError : public std::runtime_error {
    using std::runtime_error::runtime_error;
};

}  // namespace panelwright::app
