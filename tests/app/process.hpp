/// Running the program under test as a process of its own.
#pragma once

#include <sys/types.h>

#include <csignal>
#include <filesystem>
#include <string>
#include <vector>

namespace panelwright::test {

/// How a process ended.
struct Ended {
    int status = -1;  ///< exit status; 128 + number for a signal, as a shell says it
    std::string out;  ///< standard output
    std::string err;  ///< standard error
};

/// A folder of its own for a test, removed with everything in it at the end.
class TemporaryFolder {
  public:
    TemporaryFolder();
    ~TemporaryFolder();
    TemporaryFolder(const TemporaryFolder&) = delete;
    TemporaryFolder& operator=(const TemporaryFolder&) = delete;

    const std::filesystem::path& path() const { return path_; }
    std::filesystem::path operator/(std::string_view name) const { return path_ / name; }

    /// Writes `text` to the file `name` in the folder and gives its path.
    std::filesystem::path write(std::string_view name, std::string_view text) const;

  private:
    std::filesystem::path path_;
};

/// A running process; killed when the object dies before it has ended.
class Process {
  public:
    /// Starts `command` (program, then arguments) in `folder`. Output goes to files beside the folder.
    Process(const std::vector<std::string>& command, const std::filesystem::path& folder);
    ~Process();
    Process(const Process&) = delete;
    Process& operator=(const Process&) = delete;

    void signal(int number) const;
    Ended wait();

  private:
    TemporaryFolder output_;
    pid_t id_ = -1;
};

/// Runs the program with `arguments` in `folder` until it ends.
Ended panelwright(const std::vector<std::string>& arguments, const std::filesystem::path& folder);

/// Path of the program under test.
std::string program();

/// The content of a file; empty when there is none.
std::string content(const std::filesystem::path& path);

/// Names of everything in `folder` and below, relative to it, in order.
std::vector<std::string> listing(const std::filesystem::path& folder);

}  // namespace panelwright::test
