#include "app/console.hpp"

#include <cerrno>
#include <cstdio>
#include <stdexcept>
#include <system_error>

namespace panelwright::app {

void show(std::string_view text) {
    if (std::fwrite(text.data(), 1, text.size(), stdout) == text.size() && std::fflush(stdout) == 0) return;
    throw std::runtime_error("standard output cannot be written: " + std::generic_category().message(errno));
}

void tell(std::string_view text) {
    std::fwrite(text.data(), 1, text.size(), stderr);
    std::fflush(stderr);
}

}  // namespace panelwright::app
