#include <fmt/format.h>

#include <fstream>

#include "viz/vtk_files.hpp"

namespace panelwright::viz {
namespace {

std::string xml_attribute(std::string_view text) {
    std::string escaped;
    for (const char c : text) {
        switch (c) {
            case '&':
                escaped += "&amp;";
                break;
            case '<':
                escaped += "&lt;";
                break;
            case '>':
                escaped += "&gt;";
                break;
            case '"':
                escaped += "&quot;";
                break;
            default:
                escaped += c;
        }
    }
    return escaped;
}

}  // namespace

void write_collection(const std::filesystem::path& path, const std::vector<SeriesEntry>& entries) {
    std::ofstream file(path, std::ios::binary);
    file << "<?xml version=\"1.0\"?>\n"
            "<VTKFile type=\"Collection\" version=\"1.0\" byte_order=\"LittleEndian\">\n"
            "  <!-- The time step is the frequency in hertz. -->\n"
            "  <Collection>\n";
    for (const SeriesEntry& entry : entries) {
        file << fmt::format("    <DataSet timestep=\"{}\" group=\"\" part=\"0\" file=\"{}\"/>\n",
                            entry.frequency, xml_attribute(entry.file));
    }
    file << "  </Collection>\n</VTKFile>\n";
    file.close();
    if (!file) throw VtkError(fmt::format("{}: cannot be written", path.string()));
}

}  // namespace panelwright::viz
