/// Solver data as VTK data sets. Private to viz: nothing outside includes it.
#pragma once

#include <vtkPolyData.h>
#include <vtkSmartPointer.h>

#include <cstddef>
#include <string_view>

#include "viz/vtk_files.hpp"

namespace panelwright::viz {

/// The data set that `write_currents` writes.
vtkSmartPointer<vtkPolyData> currents_data(const solver::Solution& solution, std::size_t p,
                                           std::string_view title);

/// The data set that `write_pattern` writes.
vtkSmartPointer<vtkPolyData> pattern_data(const solver::Solution& solution, std::size_t p,
                                          const PatternSurface& surface, std::string_view title);

}  // namespace panelwright::viz
