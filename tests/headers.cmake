# Every header compiles by itself: one source a header that includes nothing else, built with the tests. The headers are
# found by a search, so that a new one cannot be forgotten.
set(headers_alone_sources "")
foreach(folder IN ITEMS mesh solver io viz app)
    file(GLOB_RECURSE headers CONFIGURE_DEPENDS RELATIVE ${PROJECT_SOURCE_DIR} ${PROJECT_SOURCE_DIR}/${folder}/*.hpp)
    foreach(header IN LISTS headers)
        file(STRINGS ${PROJECT_SOURCE_DIR}/${header} vtk_includes REGEX "^#include <vtk")
        if(vtk_includes AND NOT PANELWRIGHT_HAS_VTK)
            continue()
        endif()
        string(REPLACE "/" "_" name ${header})
        set(source ${CMAKE_CURRENT_BINARY_DIR}/headers/${name}.cpp)
        file(CONFIGURE OUTPUT ${source} CONTENT "#include \"${header}\"\n")
        list(APPEND headers_alone_sources ${source})
    endforeach()
endforeach()
add_library(headers_alone OBJECT ${headers_alone_sources})

# Imported targets are known only in the folder that asked for them, so the libraries that headers include are asked for
# here again.
find_package(HDF5 REQUIRED COMPONENTS C)
find_package(nlohmann_json REQUIRED)
find_package(tomlplusplus REQUIRED)
target_link_libraries(headers_alone PRIVATE panelwright::options Eigen3::Eigen fmt::fmt OpenMP::OpenMP_CXX HDF5::HDF5
    nlohmann_json::nlohmann_json tomlplusplus::tomlplusplus)
if(PANELWRIGHT_HAS_VTK)
    find_package(VTK 9.1 REQUIRED COMPONENTS CommonCore CommonDataModel)
    target_link_libraries(headers_alone PRIVATE VTK::CommonCore VTK::CommonDataModel)
endif()
