// The kept inputs of the fuzz target, and the shipped cases, in every build.
#include <gtest/gtest.h>

#include <cstddef>
#include <filesystem>
#include <string>

#include "io/file.hpp"
#include "tests/fuzz/case_invariants.hpp"

namespace panelwright::io {
namespace {

TEST(CaseCorpus, BreaksNoInvariant) {
    const std::filesystem::path root = PANELWRIGHT_SOURCE_DIR;
    std::size_t count = 0;
    for (const auto& folder : {root / "tests/fuzz/corpus", root / "cases"}) {
        for (const auto& entry : std::filesystem::directory_iterator(folder)) {
            ++count;
            EXPECT_EQ(test::broken_invariant(read_file(entry.path())), "") << entry.path();
        }
    }
    EXPECT_GE(count, 38U);
}

}  // namespace
}  // namespace panelwright::io
