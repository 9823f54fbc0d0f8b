// What writing and reading a result say when something is wrong.
#include <gtest/gtest.h>
#include <signal.h>
#include <sys/resource.h>

#include <cstdio>
#include <cstdlib>

#include "io/dataset_table.hpp"
#include "io/hdf5_file.hpp"
#include "tests/io/result_file_fixture.hpp"

namespace panelwright {
namespace {

using test::edit;
using test::message_of;
using test::ResultFile;

TEST_F(ResultFile, RefusesPartsThatDoNotFit) {
    const auto complaint_about = [&](const std::function<void(solver::Result&)>& spoil) {
        solver::Result result = test::sample_result();
        spoil(result);
        return message_of<std::invalid_argument>([&] { write(result); });
    };
    using solver::Result;
    EXPECT_EQ(complaint_about([](Result& r) { r.methods[1].solution.method = solver::Method::surface; }),
              "the method surface stands twice in the result");
    EXPECT_EQ(complaint_about([](Result& r) { r.methods[1].solution.port.frequency[0] = 1.0; }),
              "the methods of a result must share one band");
    EXPECT_EQ(complaint_about([](Result& r) { r.methods[0].solution.patterns[1].phi[1] += 0.1; }),
              "surface: all patterns must share one grid");
    EXPECT_EQ(complaint_about([](Result& r) { r.methods[0].solution.currents[1].pop_back(); }),
              "surface: one current a triangle is needed");
    EXPECT_EQ(complaint_about([](Result& r) { r.methods[0].solution.powers.pop_back(); }),
              "the powers of every pattern are needed");
    EXPECT_EQ(complaint_about([](Result& r) { r.methods[0].solution.port.impedance.pop_back(); }),
              "/surface/impedance_ohm: 4 values do not fill the shape (5)");
    EXPECT_EQ(complaint_about([](Result& r) { r.methods[0].figures.pop_back(); }),
              "/surface/figures/peak_gain_dbi: 1 values do not fill the shape (2)");
    EXPECT_EQ(complaint_about([](Result& r) { r.methods[0].solution.health[0].name = "a/b"; }),
              "'a/b' is no name for a health entry");
    EXPECT_EQ(complaint_about([](Result& r) { r.case_text += '\0'; }),
              "a text with a NUL character cannot be stored");
    EXPECT_EQ(complaint_about([](Result& r) {
                  r.methods[0].solution.patterns.clear();
                  r.methods[0].solution.powers.clear();
              }),
              "/surface/figures/peak_gain_dbi has values, but its axis frequency has none");
    EXPECT_FALSE(std::filesystem::exists(path)) << "nothing may be written before the parts are known to fit";
}

TEST_F(ResultFile, SaysThatTheFolderIsMissing) {
    EXPECT_EQ(message_of<io::FileError>(
                  [&] { io::write_result("/no such folder/r.h5", test::sample_result(), {}); }),
              "/no such folder/r.h5: cannot create: No such file or directory");
    EXPECT_EQ(complaint(), path.string() + ": cannot open: No such file or directory");
}

TEST_F(ResultFile, SaysThatTheDiskIsFull) {
    // Linux' device that is always full.
    EXPECT_EQ(message_of<io::FileError>([] { io::write_result("/dev/full", test::sample_result(), {}); }),
              "/dev/full: cannot write: No space left on device");
}

TEST_F(ResultFile, SaysThatTheQuotaIsReached) {
    // In a process of its own, for the limit cannot be lifted again.
    const auto write_beyond_limit = [&] {
        ::signal(SIGXFSZ, SIG_IGN);
        const rlimit limit{10000, 10000};
        ::setrlimit(RLIMIT_FSIZE, &limit);
        const std::string message = message_of<io::FileError>([&] { write(test::sample_result()); });
        std::fprintf(stderr, "%s\n", message.c_str());
        std::exit(message.ends_with("cannot write: File too large") ? 0 : 1);
    };
    EXPECT_EXIT(write_beyond_limit(), testing::ExitedWithCode(0), "result.h5: cannot write: File too large");
    EXPECT_NE(complaint().find("truncated or damaged"), std::string::npos);
}

TEST_F(ResultFile, SaysThatTheFileIsOfAnotherKind) {
    for (const std::string content : {"", "frequency,gain\n1,2\n", "\x89PNG\r\n"}) {
        folder.file("result.h5", content);
        EXPECT_EQ(complaint(), path.string() + ": this is not an HDF5 file");
    }
    {
        const io::hdf5::Image other;
        folder.file("result.h5", other.bytes());
    }
    EXPECT_EQ(complaint(), path.string() + ": this HDF5 file is not a result of panelwright");
    {
        const io::hdf5::Image other;
        io::hdf5::write_attribute(other.id(), "program", std::string("gauge logger"));
        folder.file("result.h5", other.bytes());
    }
    EXPECT_EQ(complaint(), path.string() + ": this HDF5 file was made by 'gauge logger', not by panelwright");
}

TEST_F(ResultFile, SaysThatTheFileIsTruncated) {
    const std::string whole = io::read_file(write(test::sample_result()));
    testing::internal::CaptureStderr();
    for (const std::size_t length : {std::size_t{8}, std::size_t{100}, whole.size() / 2, whole.size() - 1}) {
        folder.file("result.h5", whole.substr(0, length));
        EXPECT_EQ(complaint(), path.string() + ": the file is truncated or damaged");
    }
    EXPECT_EQ(testing::internal::GetCapturedStderr(), "") << "HDF5 must not print by itself";
}

TEST_F(ResultFile, SaysThatTheLayoutIsNewer) {
    edit(write(test::sample_result()), [](hid_t file) {
        H5Adelete(file, "format_version");
        io::hdf5::write_attribute(file, "format_version", io::result_format_version + 1);
    });
    EXPECT_EQ(complaint(), path.string() + ": the layout has version 2; this program reads versions 1 to 1");
}

TEST_F(ResultFile, SaysThatTheCaseWasChanged) {
    edit(write(test::sample_result()), [](hid_t file) {
        H5Adelete(file, "case_sha256");
        io::hdf5::write_attribute(file, "case_sha256", std::string(64, '0'));
    });
    EXPECT_NE(complaint().find("/case does not agree with its checksum"), std::string::npos);
}

TEST_F(ResultFile, NamesEveryAttributeThatIsMissing) {
    for (const char* name : {"version", "commit", "format_version", "created_utc", "host", "threads", "title",
                             "case_sha256", "methods"}) {
        edit(write(test::sample_result()), [&](hid_t file) { H5Adelete(file, name); });
        EXPECT_EQ(complaint(), path.string() + ": the attribute " + name + " of / is missing");
    }
    edit(write(test::sample_result()),
         [](hid_t file) { H5Adelete_by_name(file, "/surface/pattern/theta_deg", "radians", H5P_DEFAULT); });
    EXPECT_EQ(complaint(),
              path.string() + ": the attribute radians of /surface/pattern/theta_deg is missing");
}

/// Paths of the sample's second method and of what all methods share; remarks alone may be absent.
std::vector<std::string> needed_datasets() {
    std::vector<std::string> paths{"/surface/health/unknowns"};
    for (const io::DatasetEntry& entry : io::dataset_table()) {
        if (entry.present == "with a tab feed" || entry.present == "with remarks") continue;
        if (!entry.path.ends_with("/NAME")) paths.push_back(io::with_method(entry.path, "surface"));
    }
    return paths;
}

TEST_F(ResultFile, NamesEveryDatasetThatIsMissing) {
    write(test::sample_result());
    const std::string whole = io::read_file(path);
    for (const std::string& dataset : needed_datasets()) {
        folder.file("result.h5", whole);
        edit(path, [&](hid_t file) { H5Ldelete(file, dataset.c_str(), H5P_DEFAULT); });
        EXPECT_EQ(complaint(), path.string() + ": " + dataset + " is missing");
    }
}

TEST_F(ResultFile, NamesEveryDatasetThatIsMisshapen) {
    write(test::sample_result());
    const std::string whole = io::read_file(path);
    const std::vector<std::int32_t> other(77, 1);
    for (const std::string& dataset : needed_datasets()) {
        folder.file("result.h5", whole);
        edit(path, [&](hid_t file) {
            H5Ldelete(file, dataset.c_str(), H5P_DEFAULT);
            const io::hdf5::Handle made =
                io::hdf5::write_dataset<std::int32_t>(file, dataset, {7, 11}, other);
            io::hdf5::write_attribute(made.id(), "units", std::string("1"));
            io::hdf5::write_attribute(made.id(), "description", std::string("misshapen"));
        });
        EXPECT_NE(complaint().find(dataset + " has the shape (7, 11) instead of "), std::string::npos)
            << complaint();
    }
}

TEST_F(ResultFile, NamesTheDatasetThatDoesNotFitItsAxis) {
    edit(write(test::sample_result()), [&](hid_t file) {
        H5Ldelete(file, "/surface/mesh/point", H5P_DEFAULT);
        io::hdf5::write_dataset<std::int32_t>(file, "/surface/mesh/point", {3},
                                              std::vector<std::int32_t>{0, 1, 2});
    });
    EXPECT_EQ(complaint(),
              path.string() + ": /surface/mesh/points_m has the shape (10, 3) instead of (3, 3)");
}

TEST_F(ResultFile, NamesTheDatasetOfAnotherType) {
    edit(write(test::sample_result()), [&](hid_t file) {
        H5Ldelete(file, "/surface/s11", H5P_DEFAULT);
        io::hdf5::write_dataset<double>(file, "/surface/s11", {5}, std::vector<double>(5, 0.5));
    });
    EXPECT_EQ(complaint(), path.string() + ": /surface/s11 holds elements of another type");
}

TEST_F(ResultFile, RefusesAMeshThatNamesPointsItLacks) {
    edit(write(test::sample_result()), [&](hid_t file) {
        H5Ldelete(file, "/surface/mesh/triangles", H5P_DEFAULT);
        io::hdf5::write_dataset<std::int32_t>(file, "/surface/mesh/triangles", {8, 3},
                                              std::vector<std::int32_t>(24, 10));
    });
    EXPECT_EQ(complaint(), path.string() + ": the mesh names the point 10, but has 10 points");
}

}  // namespace
}  // namespace panelwright
