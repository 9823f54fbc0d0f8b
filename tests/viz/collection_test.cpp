#include <gtest/gtest.h>

#include <filesystem>
#include <fstream>
#include <sstream>

#include "viz/vtk_files.hpp"

namespace panelwright::viz {
namespace {

TEST(Collection, ListsEveryFileWithItsFrequency) {
    const auto path = std::filesystem::path(testing::TempDir()) / "collection_test.pvd";
    write_collection(path, {{869.5e6, "pattern_aperture.vtp"}, {0.1 + 0.2, "a<b>&\"c\".vtp"}});
    std::ifstream file(path);
    std::ostringstream content;
    content << file.rdbuf();
    const std::string text = content.str();
    std::filesystem::remove(path);
    EXPECT_NE(text.find("<VTKFile type=\"Collection\""), std::string::npos);
    EXPECT_NE(text.find("timestep=\"869500000\" group=\"\" part=\"0\" file=\"pattern_aperture.vtp\""),
              std::string::npos);
    // Every digit of the frequency is kept, and what XML gives a meaning to is escaped.
    EXPECT_NE(text.find("timestep=\"0.30000000000000004\""), std::string::npos);
    EXPECT_NE(text.find("file=\"a&lt;b&gt;&amp;&quot;c&quot;.vtp\""), std::string::npos);
}

TEST(Collection, NamesTheFileThatCannotBeWritten) {
    try {
        write_collection("/nonexistent-folder/x.pvd", {});
        FAIL() << "no exception";
    } catch (const VtkError& error) {
        EXPECT_NE(std::string(error.what()).find("/nonexistent-folder/x.pvd"), std::string::npos);
    }
}

TEST(Collection, ADiskThatIsFullIsAnError) {
    EXPECT_THROW(write_collection("/dev/full", {}), VtkError);
}

}  // namespace
}  // namespace panelwright::viz
