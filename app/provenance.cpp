#include "app/provenance.hpp"

#include <fmt/chrono.h>
#include <fmt/format.h>
#include <unistd.h>

#include <array>
#include <ctime>

#include "app/build_info.hpp"

namespace panelwright::app {
namespace {

std::string host_name() {
    std::array<char, 256> name{};
    if (gethostname(name.data(), name.size() - 1) != 0) return "unknown";
    return name.data();
}

}  // namespace

std::string version_line() {
    return fmt::format("panelwright {} (commit {})", build_version, build_commit);
}

io::Provenance provenance(int threads) {
    io::Provenance made;
    made.version = build_version;
    made.commit = build_commit;
    made.created_utc = fmt::format("{:%Y-%m-%dT%H:%M:%SZ}", fmt::gmtime(std::time(nullptr)));
    made.host = host_name();
    made.threads = threads;
    return made;
}

bool same_program(const io::Provenance& stored) {
    return stored.version == build_version && stored.commit == build_commit;
}

}  // namespace panelwright::app
