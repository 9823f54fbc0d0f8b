/// The layout of the source tree as a test: each folder knows only the folders below it, computing code
/// touches no files, files stay short, headers are guarded.
#include <gtest/gtest.h>

#include <algorithm>
#include <array>
#include <filesystem>
#include <fstream>
#include <map>
#include <optional>
#include <set>
#include <sstream>
#include <string>
#include <string_view>
#include <vector>

namespace panelwright {
namespace {

/// A source file: its path from the top of the tree, and its text.
struct SourceFile {
    std::string path;
    std::string text;
};

/// What each folder may include besides itself.
const std::map<std::string, std::set<std::string>, std::less<>>& folders_below() {
    static const std::map<std::string, std::set<std::string>, std::less<>> below = {
        {"mesh", {}},
        {"solver", {"mesh"}},
        {"io", {"mesh", "solver"}},
        {"viz", {"mesh", "solver"}},
        {"app", {"mesh", "solver", "io", "viz"}}};
    return below;
}

constexpr int longest_file = 600;

bool starts_with_any(std::string_view text, const std::vector<std::string_view>& beginnings) {
    return std::any_of(beginnings.begin(), beginnings.end(),
                       [text](std::string_view beginning) { return text.starts_with(beginning); });
}

/// Headers of files, streams, TOML, HDF5, VTK and logging.
bool touches_files(std::string_view header) {
    static const std::set<std::string_view> exact = {
        "cstdio",   "filesystem",    "fstream",  "iomanip",   "ios",        "iosfwd",     "iostream",
        "istream",  "ostream",       "sstream",  "streambuf", "strstream",  "syncstream", "spanstream",
        "print",    "stdio.h",       "fcntl.h",  "unistd.h",  "dirent.h",   "hdf5.h",     "hdf5_hl.h",
        "toml.hpp", "fmt/ostream.h", "fmt/os.h", "fmt/std.h", "fmt/color.h"};
    return exact.contains(header) ||
           starts_with_any(header, {"toml++/", "H5", "highfive/", "vtk", "spdlog/", "sys/",
                                    "experimental/filesystem", "boost/filesystem", "boost/iostreams"});
}

/// Calls that print, log to the terminal or end the program.
std::optional<std::string> forbidden_call(std::string_view line) {
    for (const std::string_view call :
         {"fmt::print(", "fmt::println(", "std::exit(", "std::quick_exit(", "std::abort(", "std::terminate(",
          "printf(", "std::cout", "std::cerr", "std::clog"}) {
        if (line.find(call) != std::string_view::npos) return std::string(call);
    }
    return std::nullopt;
}

/// The header that a line includes, without its brackets.
std::optional<std::string> included(std::string_view line) {
    const auto skip_blanks = [&line] {
        line.remove_prefix(std::min(line.find_first_not_of(" \t"), line.size()));
    };
    skip_blanks();
    if (!line.starts_with('#')) return std::nullopt;
    line.remove_prefix(1);
    skip_blanks();
    if (!line.starts_with("include")) return std::nullopt;
    const auto from = line.find_first_of("<\"");
    if (from == std::string_view::npos) return std::nullopt;
    const auto to = line.find_first_of(">\"", from + 1);
    if (to == std::string_view::npos) return std::nullopt;
    return std::string(line.substr(from + 1, to - from - 1));
}

std::string first_folder(std::string_view path) {
    return std::string(path.substr(0, path.find('/')));
}

/// What is wrong with one include of a file in `folder`.
std::optional<std::string> wrong_include(const std::string& folder, const std::string& header) {
    if (header.find("..") != std::string::npos) return "a path with ..";
    const bool computes = folder == "mesh" || folder == "solver";
    if (computes && touches_files(header)) return "a header of files, streams or formats";
    const std::string other = first_folder(header);
    if (other == "tests") return "a header of the tests";
    const bool of_the_project = header.find('/') != std::string::npos && folders_below().contains(other);
    if (of_the_project && other != folder && !folders_below().find(folder)->second.contains(other)) {
        return "a folder that does not lie below";
    }
    return std::nullopt;
}

/// Everything in `file` that breaks the layout.
std::vector<std::string> violations(const SourceFile& file) {
    std::vector<std::string> found;
    const std::string folder = first_folder(file.path);
    const bool computes = folder == "mesh" || folder == "solver";
    std::istringstream lines(file.text);
    std::string line;
    int number = 0;
    bool guarded = false;
    while (std::getline(lines, line)) {
        ++number;
        const std::string place = file.path + ":" + std::to_string(number) + ": ";
        guarded = guarded || line == "#pragma once";
        if (const auto header = included(line)) {
            if (const auto wrong = wrong_include(folder, *header))
                found.push_back(place + *header + " is " + *wrong);
        }
        if (!computes) continue;
        if (const auto call = forbidden_call(line))
            found.push_back(place + *call + " where nothing may print or exit");
    }
    if (number > longest_file) found.push_back(file.path + ": " + std::to_string(number) + " lines");
    if (file.path.ends_with(".hpp") && !guarded) found.push_back(file.path + ": no #pragma once");
    return found;
}

std::vector<SourceFile> source_tree() {
    std::vector<SourceFile> files;
    const std::filesystem::path top = PANELWRIGHT_SOURCE_DIR;
    for (const auto& [folder, below] : folders_below()) {
        for (const auto& entry : std::filesystem::recursive_directory_iterator(top / folder)) {
            const std::string extension = entry.path().extension();
            if (extension != ".hpp" && extension != ".cpp") continue;
            std::ifstream stream(entry.path());
            std::ostringstream text;
            text << stream.rdbuf();
            files.push_back({std::filesystem::relative(entry.path(), top).generic_string(), text.str()});
        }
    }
    return files;
}

TEST(Layers, SourceTreeKeepsThem) {
    const std::vector<SourceFile> files = source_tree();
    std::map<std::string, int> count;
    for (const SourceFile& file : files) {
        ++count[first_folder(file.path)];
        for (const std::string& violation : violations(file)) ADD_FAILURE() << violation;
    }
    // The scan has seen every folder.
    for (const auto& [folder, below] : folders_below()) EXPECT_GT(count[folder], 0) << folder;
    EXPECT_GT(count["mesh"], 10);
}

/// One line of a file that must be refused.
struct Breach {
    std::string path;
    std::string line;
};

class Breaches : public testing::TestWithParam<Breach> {};

TEST_P(Breaches, AreCaught) {
    const auto& [path, line] = GetParam();
    const std::string guard = path.ends_with(".hpp") ? "#pragma once\n" : "";
    EXPECT_TRUE(violations({path, guard + "#include <vector>\n"}).empty());
    const auto found = violations({path, guard + "#include <vector>\n" + line + "\n"});
    ASSERT_EQ(found.size(), 1U) << line;
    EXPECT_TRUE(found[0].starts_with(path)) << found[0];
}

INSTANTIATE_TEST_SUITE_P(
    Synthetic, Breaches,
    testing::Values(
        Breach{"mesh/a.cpp", "#include \"solver/wave.hpp\""},
        Breach{"mesh/a.hpp", "#include \"io/case.hpp\""}, Breach{"solver/a.cpp", "#include \"io/case.hpp\""},
        Breach{"solver/strip/a.cpp", "  #  include <viz/a.hpp>"},
        Breach{"io/a.cpp", "#include \"viz/vtk_files.hpp\""}, Breach{"viz/a.cpp", "#include \"io/case.hpp\""},
        Breach{"io/a.cpp", "#include \"app/commands.hpp\""},
        Breach{"viz/a.cpp", "#include \"app/commands.hpp\""},
        Breach{"app/a.cpp", "#include \"tests/near.hpp\""},
        Breach{"io/a.cpp", "#include \"../mesh/panel.hpp\""}, Breach{"mesh/a.cpp", "#include <fstream>"},
        Breach{"mesh/a.cpp", "#include <iostream>"}, Breach{"mesh/a.cpp", "#include <cstdio>"},
        Breach{"mesh/a.cpp", "#include <filesystem>"}, Breach{"mesh/a.cpp", "#include <ostream>"},
        Breach{"solver/a.cpp", "#include <sstream>"}, Breach{"solver/a.cpp", "#include <toml++/toml.h>"},
        Breach{"solver/a.cpp", "#include <hdf5.h>"}, Breach{"solver/a.cpp", "#include <H5Fpublic.h>"},
        Breach{"solver/aperture/a.cpp", "#include <vtkPolyData.h>"},
        Breach{"solver/a.cpp", "#include <spdlog/spdlog.h>"},
        Breach{"solver/a.cpp", "    fmt::print(\"{}\", x);"}, Breach{"mesh/a.cpp", "    std::exit(1);"}));

TEST(Layers, AllowedIncludesAreNoBreach) {
    for (const auto& [path, line] :
         std::vector<Breach>{{"solver/a.cpp", "#include \"mesh/panel.hpp\""},
                             {"solver/strip/a.cpp", "#include \"solver/wave.hpp\""},
                             {"io/a.cpp", "#include <fstream>"},
                             {"viz/a.cpp", "#include <vtkPolyData.h>"},
                             {"app/a.cpp", "#include \"viz/vtk_files.hpp\""},
                             {"mesh/a.cpp", "#include <fmt/format.h>"},
                             {"mesh/a.cpp", "// see #include \"io/case.hpp\""}}) {
        EXPECT_TRUE(violations({path, line + "\n"}).empty()) << path << ": " << line;
    }
}

TEST(Layers, LongFilesAreCaught) {
    std::string text;
    for (int n = 0; n < longest_file; ++n) text += "//\n";
    EXPECT_TRUE(violations({"app/a.cpp", text}).empty());
    EXPECT_EQ(violations({"app/a.cpp", text + "//\n"}).size(), 1U);
}

TEST(Layers, UnguardedHeadersAreCaught) {
    EXPECT_EQ(violations({"viz/a.hpp", "#include <vector>\n"}).size(), 1U);
    EXPECT_EQ(violations({"viz/a.hpp", "// #pragma once\n"}).size(), 1U);
    EXPECT_TRUE(violations({"viz/a.hpp", "/// A header.\n#pragma once\n"}).empty());
}

}  // namespace
}  // namespace panelwright
