/// What the writers do in a program that was built without VTK.
#include <fmt/format.h>

#include "viz/vtk_files.hpp"

namespace panelwright::viz {
namespace {

[[noreturn]] void refuse(const std::filesystem::path& path) {
    throw VtkError(fmt::format("{}: not written, this program was built without VTK", path.string()));
}

}  // namespace

bool vtk_available() {
    return false;
}

void write_currents(const std::filesystem::path& path, const solver::Solution& /*solution*/,
                    std::size_t /*p*/, std::string_view /*title*/) {
    refuse(path);
}

void write_pattern(const std::filesystem::path& path, const solver::Solution& /*solution*/, std::size_t /*p*/,
                   const PatternSurface& /*surface*/, std::string_view /*title*/) {
    refuse(path);
}

}  // namespace panelwright::viz
