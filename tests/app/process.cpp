#include "tests/app/process.hpp"

#include <fcntl.h>
#include <spawn.h>
#include <sys/wait.h>
#include <unistd.h>

#include <algorithm>
#include <fstream>
#include <sstream>
#include <stdexcept>

namespace panelwright::test {

TemporaryFolder::TemporaryFolder() {
    std::string name = std::filesystem::temp_directory_path() / "panelwright-test-XXXXXX";
    if (mkdtemp(name.data()) == nullptr) throw std::runtime_error("no temporary folder");
    path_ = name;
}

TemporaryFolder::~TemporaryFolder() {
    std::error_code ignored;
    std::filesystem::remove_all(path_, ignored);
}

std::filesystem::path TemporaryFolder::write(std::string_view name, std::string_view text) const {
    std::ofstream file(path_ / name, std::ios::binary);
    file << text;
    return path_ / name;
}

Process::Process(const std::vector<std::string>& command, const std::filesystem::path& folder) {
    const std::string out = output_ / "out";
    const std::string err = output_ / "err";
    posix_spawn_file_actions_t actions;
    posix_spawn_file_actions_init(&actions);
    posix_spawn_file_actions_addopen(&actions, STDOUT_FILENO, out.c_str(), O_CREAT | O_WRONLY, 0600);
    posix_spawn_file_actions_addopen(&actions, STDERR_FILENO, err.c_str(), O_CREAT | O_WRONLY, 0600);
    posix_spawn_file_actions_addchdir_np(&actions, folder.c_str());
    std::vector<std::string> words = command;
    std::vector<char*> pointers;
    for (std::string& word : words) pointers.push_back(word.data());
    pointers.push_back(nullptr);
    const int error = posix_spawn(&id_, pointers.front(), &actions, nullptr, pointers.data(), environ);
    posix_spawn_file_actions_destroy(&actions);
    if (error != 0) throw std::runtime_error("cannot start " + command.front());
}

Process::~Process() {
    if (id_ < 0) return;
    kill(id_, SIGKILL);
    waitpid(id_, nullptr, 0);
}

void Process::signal(int number) const {
    kill(id_, number);
}

Ended Process::wait() {
    int state = 0;
    waitpid(id_, &state, 0);
    id_ = -1;
    Ended ended;
    ended.status = WIFEXITED(state) ? WEXITSTATUS(state) : 128 + WTERMSIG(state);
    ended.out = content(output_ / "out");
    ended.err = content(output_ / "err");
    return ended;
}

std::string program() {
    return PANELWRIGHT_PROGRAM;
}

Ended panelwright(const std::vector<std::string>& arguments, const std::filesystem::path& folder) {
    std::vector<std::string> command = {program()};
    command.insert(command.end(), arguments.begin(), arguments.end());
    return Process(command, folder).wait();
}

std::string content(const std::filesystem::path& path) {
    std::ifstream file(path, std::ios::binary);
    std::ostringstream text;
    text << file.rdbuf();
    return text.str();
}

std::vector<std::string> listing(const std::filesystem::path& folder) {
    std::vector<std::string> names;
    for (const auto& entry : std::filesystem::recursive_directory_iterator(folder)) {
        names.push_back(entry.path().lexically_relative(folder).string());
    }
    std::sort(names.begin(), names.end());
    return names;
}

}  // namespace panelwright::test
