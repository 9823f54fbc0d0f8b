/// What the tests of result files share.
#pragma once

#include <gtest/gtest.h>
#include <hdf5.h>

#include <filesystem>
#include <functional>
#include <string>

#include "io/result_file.hpp"
#include "tests/io/sample_results.hpp"
#include "tests/io/temporary_folder.hpp"

namespace panelwright::test {

/// Opens the file at `path` for changes, beside the project's own code.
inline void edit(const std::filesystem::path& path, const std::function<void(hid_t)>& change) {
    const hid_t file = H5Fopen(path.c_str(), H5F_ACC_RDWR, H5P_DEFAULT);
    ASSERT_GE(file, 0);
    change(file);
    H5Fclose(file);
}

class ResultFile : public testing::Test {
  protected:
    std::filesystem::path write(const solver::Result& result) const {
        io::write_result(path, result, sample_provenance());
        return path;
    }
    /// The message of the FileError that reading throws, which has to name the file.
    std::string complaint() const {
        const std::string message = message_of<io::FileError>([&] { io::read_result(path); });
        EXPECT_TRUE(message.starts_with(path.string() + ": ")) << message;
        return message;
    }

    TemporaryFolder folder;
    std::filesystem::path path = folder / "result.h5";
};

}  // namespace panelwright::test
