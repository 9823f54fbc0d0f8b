#include "io/result_file.hpp"

#include <gtest/gtest.h>
#include <hdf5.h>

#include <bit>
#include <cstdint>
#include <set>

#include "io/dataset_table.hpp"
#include "tests/io/result_file_fixture.hpp"

namespace panelwright {
namespace {

using test::edit;
using test::ResultFile;

/// All bytes equal: the same to the last digit, NaN the same as NaN, 0 not the same as -0.
bool same(double a, double b) {
    return std::bit_cast<std::uint64_t>(a) == std::bit_cast<std::uint64_t>(b);
}
bool same(solver::Complex a, solver::Complex b) {
    return same(a.real(), b.real()) && same(a.imag(), b.imag());
}

template <typename T>
bool same(const std::vector<T>& a, const std::vector<T>& b) {
    return std::equal(a.begin(), a.end(), b.begin(), b.end(),
                      [](const T& x, const T& y) { return same(x, y); });
}

bool same(const solver::ComplexGrid& a, const solver::ComplexGrid& b) {
    return a.rows() == b.rows() && a.cols() == b.cols() &&
           std::equal(a.data(), a.data() + a.size(), b.data(),
                      [](solver::Complex x, solver::Complex y) { return same(x, y); });
}

void expect_same(const solver::Solution& a, const solver::Solution& b) {
    EXPECT_EQ(a.method, b.method);
    EXPECT_TRUE(same(a.port.frequency, b.port.frequency));
    EXPECT_TRUE(same(a.port.impedance, b.port.impedance));
    ASSERT_EQ(a.patterns.size(), b.patterns.size());
    ASSERT_EQ(a.powers.size(), b.powers.size());
    for (std::size_t p = 0; p < a.patterns.size(); ++p) {
        EXPECT_TRUE(same(a.patterns[p].frequency, b.patterns[p].frequency));
        EXPECT_TRUE(same(a.patterns[p].theta, b.patterns[p].theta));
        EXPECT_TRUE(same(a.patterns[p].phi, b.patterns[p].phi));
        EXPECT_TRUE(same(a.patterns[p].e_theta, b.patterns[p].e_theta));
        EXPECT_TRUE(same(a.patterns[p].e_phi, b.patterns[p].e_phi));
        for (double solver::Powers::*power :
             {&solver::Powers::accepted, &solver::Powers::radiated, &solver::Powers::conductor,
              &solver::Powers::dielectric, &solver::Powers::surface_wave}) {
            EXPECT_TRUE(same(a.powers[p].*power, b.powers[p].*power));
        }
    }
    EXPECT_EQ(a.mesh.points, b.mesh.points);
    EXPECT_EQ(a.mesh.triangles, b.mesh.triangles);
    EXPECT_EQ(a.mesh.part, b.mesh.part);
    EXPECT_EQ(a.mesh.port_edges, b.mesh.port_edges);
    EXPECT_EQ(a.currents, b.currents);
    EXPECT_EQ(a.remarks, b.remarks);
    ASSERT_EQ(a.health.size(), b.health.size());
    for (std::size_t i = 0; i < a.health.size(); ++i) {
        EXPECT_EQ(a.health[i].name, b.health[i].name);
        EXPECT_EQ(a.health[i].unit, b.health[i].unit);
        EXPECT_EQ(a.health[i].description, b.health[i].description);
        EXPECT_EQ(a.health[i].per_pattern, b.health[i].per_pattern);
        EXPECT_TRUE(same(a.health[i].values, b.health[i].values));
    }
}

void expect_same(const solver::Result& a, const solver::Result& b) {
    EXPECT_EQ(a.title, b.title);
    EXPECT_EQ(a.case_text, b.case_text);
    EXPECT_EQ(a.case_resolved, b.case_resolved);
    EXPECT_EQ(a.panel, b.panel);
    EXPECT_TRUE(same(a.reference_impedance, b.reference_impedance));
    ASSERT_EQ(a.methods.size(), b.methods.size());
    for (std::size_t m = 0; m < a.methods.size(); ++m) {
        expect_same(a.methods[m].solution, b.methods[m].solution);
        for (const solver::BandFigureEntry& figure : solver::band_figure_table()) {
            EXPECT_TRUE(same(a.methods[m].band.*figure.value, b.methods[m].band.*figure.value))
                << figure.name;
        }
        ASSERT_EQ(a.methods[m].figures.size(), b.methods[m].figures.size());
        for (std::size_t p = 0; p < a.methods[m].figures.size(); ++p) {
            for (const solver::FigureEntry& figure : solver::figure_table()) {
                EXPECT_TRUE(
                    same(a.methods[m].figures[p].*figure.value, b.methods[m].figures[p].*figure.value))
                    << figure.name;
            }
        }
    }
}

/// Files, groups, datasets, types and attributes that HDF5 holds open.
ssize_t open_in_hdf5() {
    return H5Fget_obj_count(static_cast<hid_t>(H5F_OBJ_ALL), H5F_OBJ_ALL);
}

TEST_F(ResultFile, BringsBackEverythingToTheLastDigit) {
    const solver::Result result = test::sample_result();
    const io::StoredResult stored = io::read_result(write(result));
    expect_same(result, stored.result);
    const io::Provenance provenance = test::sample_provenance();
    EXPECT_EQ(stored.provenance.version, provenance.version);
    EXPECT_EQ(stored.provenance.commit, provenance.commit);
    EXPECT_EQ(stored.provenance.created_utc, provenance.created_utc);
    EXPECT_EQ(stored.provenance.host, provenance.host);
    EXPECT_EQ(stored.provenance.threads, provenance.threads);
}

TEST_F(ResultFile, BringsBackAResultOfThePortAlone) {
    const solver::Result result = test::port_only_result();
    expect_same(result, io::read_result(write(result)).result);
}

TEST_F(ResultFile, BringsBackAResultWithoutMethods) {
    solver::Result result = test::port_only_result();
    result.methods.clear();
    expect_same(result, io::read_result(write(result)).result);
}

TEST_F(ResultFile, HoldsACaseFileAsLargeAsTheyCome) {
    solver::Result result = test::port_only_result();
    result.case_text.assign(std::size_t{1} << 20U, '#');
    result.case_resolved = result.case_text;
    expect_same(result, io::read_result(write(result)).result);
}

TEST_F(ResultFile, SameResultGivesSameBytes) {
    const std::string first = io::read_file(write(test::sample_result()));
    EXPECT_EQ(first, io::read_file(write(test::sample_result())));
}

TEST_F(ResultFile, ReplacesALongerFile) {
    folder.file("result.h5", std::string(std::size_t{1} << 22U, 'x'));
    expect_same(test::sample_result(), io::read_result(write(test::sample_result())).result);
}

TEST_F(ResultFile, HasTheSuperblockThatOldReadersKnow) {
    // HDF5 File Format Specification, section II.A: the byte behind the eight of the signature is the
    // version.
    EXPECT_EQ(io::read_file(write(test::sample_result())).at(8), '\0');
}

TEST_F(ResultFile, LeavesNothingOpen) {
    io::read_result(write(test::sample_result()));
    EXPECT_EQ(open_in_hdf5(), 0);

    solver::Result bad = test::sample_result();
    bad.methods.front().solution.health.back().values.clear();
    EXPECT_THROW(write(bad), std::invalid_argument);
    EXPECT_THROW(io::write_result(folder / "nowhere/result.h5", test::sample_result(), {}), io::FileError);
    EXPECT_EQ(open_in_hdf5(), 0);

    const std::string whole = io::read_file(path);
    folder.file("result.h5", whole.substr(0, whole.size() / 2));
    EXPECT_THROW(io::read_result(path), io::FileError);
    EXPECT_EQ(open_in_hdf5(), 0);
    folder.file("result.h5", whole);
    edit(path, [](hid_t file) { H5Ldelete(file, "/surface/power/radiated_w", H5P_DEFAULT); });
    EXPECT_THROW(io::read_result(path), io::FileError);
    EXPECT_EQ(open_in_hdf5(), 0);
}

TEST_F(ResultFile, FilesOfTheTableAndNoOthersAreWritten) {
    write(test::sample_result());
    std::set<std::string> expected;
    for (const io::DatasetEntry& entry : io::dataset_table()) {
        if (entry.path.ends_with("/NAME") || entry.present == "with a tab feed") continue;
        expected.insert(io::with_method(entry.path, "surface"));
        const bool both = entry.present == "with a port response" || entry.present == "with patterns" ||
                          entry.present == "with figures";
        if (both) expected.insert(io::with_method(entry.path, "aperture"));
    }
    for (const std::string name : {"power_balance", "unknowns", "condition"}) {
        expected.insert("/surface/health/" + name);
    }
    std::set<std::string> found;
    edit(path, [&](hid_t file) {
        const auto visit = [](hid_t, const char* name, const H5O_info_t* info, void* names) -> herr_t {
            if (info->type == H5O_TYPE_DATASET) {
                static_cast<std::set<std::string>*>(names)->insert("/" + std::string(name));
            }
            return 0;
        };
        H5Ovisit(file, H5_INDEX_NAME, H5_ITER_NATIVE, visit, &found);
    });
    EXPECT_EQ(found, expected);
}

TEST(DatasetsPage, IsTheOneInTheSources) {
    const std::string committed = io::read_file(PANELWRIGHT_SOURCE_DIR "/docs/datasets.md");
    EXPECT_TRUE(committed == io::datasets_markdown()) << "docs/datasets.md is out of date: run write_docs";
}

TEST(DatasetTable, PutsEveryScaleBeforeItsUse) {
    std::set<io::Axis> seen;
    for (const io::DatasetEntry& entry : io::dataset_table()) {
        EXPECT_FALSE(entry.units.empty()) << entry.path;
        EXPECT_TRUE(entry.description.ends_with('.')) << entry.path;
        for (const io::Axis axis : entry.shape) {
            if (entry.path == io::axis_entry(axis).scale) seen.insert(axis);
            EXPECT_TRUE(seen.contains(axis)) << entry.path;
        }
    }
    EXPECT_EQ(seen.size(), io::axis_table().size());
}

}  // namespace
}  // namespace panelwright
