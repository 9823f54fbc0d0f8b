#include "viz/vtk_files.hpp"

#include <fmt/format.h>
#include <vtkNew.h>
#include <vtkXMLPolyDataWriter.h>

#include <fstream>

#include "viz/vtk_data.hpp"

namespace panelwright::viz {
namespace {

/// VTK only forms the text: it prints its own errors when it cannot write a file, and names no cause.
std::string xml(vtkPolyData* data) {
    vtkNew<vtkXMLPolyDataWriter> writer;
    writer->WriteToOutputStringOn();
    writer->SetInputData(data);
    // Base64 stays valid XML, which appended raw data does not. Packing would take longer than all the rest.
    writer->SetDataModeToBinary();
    writer->SetCompressorTypeToNone();
    writer->SetHeaderTypeToUInt64();
    writer->Write();
    return writer->GetOutputString();
}

void write(const std::filesystem::path& path, vtkPolyData* data) {
    const std::string text = xml(data);
    std::ofstream file(path, std::ios::binary);
    file << text;
    file.close();
    if (!file) throw VtkError(fmt::format("{}: cannot be written", path.string()));
}

}  // namespace

bool vtk_available() {
    return true;
}

void write_currents(const std::filesystem::path& path, const solver::Solution& solution, std::size_t p,
                    std::string_view title) {
    write(path, currents_data(solution, p, title));
}

void write_pattern(const std::filesystem::path& path, const solver::Solution& solution, std::size_t p,
                   const PatternSurface& surface, std::string_view title) {
    write(path, pattern_data(solution, p, surface, title));
}

}  // namespace panelwright::viz
