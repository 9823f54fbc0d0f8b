#include "app/console.hpp"

#include <fcntl.h>
#include <unistd.h>

#include <cerrno>
#include <cstdio>
#include <stdexcept>
#include <system_error>

namespace panelwright::app {

void reserve_standard_streams() {
    for (const int stream : {STDIN_FILENO, STDOUT_FILENO, STDERR_FILENO}) {
        // Opened for reading alone, so that a write fails as it does on a closed stream.
        if (fcntl(stream, F_GETFD) < 0 && open("/dev/null", O_RDONLY) < 0) return;
    }
}

void show(std::string_view text) {
    if (std::fwrite(text.data(), 1, text.size(), stdout) == text.size() && std::fflush(stdout) == 0) return;
    throw std::runtime_error("standard output cannot be written: " + std::generic_category().message(errno));
}

void tell(std::string_view text) {
    std::fwrite(text.data(), 1, text.size(), stderr);
    std::fflush(stderr);
}

}  // namespace panelwright::app
