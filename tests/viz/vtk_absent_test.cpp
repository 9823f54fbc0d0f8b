#include <gtest/gtest.h>

#include "viz/vtk_files.hpp"

namespace panelwright::viz {
namespace {

TEST(WithoutVtk, TheWritersRefuseAndNameTheFile) {
    EXPECT_FALSE(vtk_available());
    const solver::Solution solution;
    EXPECT_THROW(write_currents("currents.vtp", solution, 0), VtkError);
    try {
        write_pattern("pattern.vtp", solution, 0);
        FAIL() << "no exception";
    } catch (const VtkError& error) {
        EXPECT_NE(std::string(error.what()).find("pattern.vtp"), std::string::npos);
    }
}

}  // namespace
}  // namespace panelwright::viz
