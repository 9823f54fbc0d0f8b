// Time to write and read the files of one everyday design: a pattern every two degrees (91 x 180 directions),
// currents on 2,000 triangles, one method. A study of 1,000 designs pays this 1,000 times.
#include <benchmark/benchmark.h>

#include <filesystem>

#include "io/pattern_csv.hpp"
#include "io/result_file.hpp"
#include "tests/io/sample_results.hpp"
#include "tests/io/temporary_folder.hpp"

namespace {

using namespace panelwright;

void write_result(benchmark::State& state) {
    const test::TemporaryFolder folder;
    const solver::Result result = test::everyday_result(static_cast<int>(state.range(0)));
    const io::Provenance provenance = test::sample_provenance();
    for (auto _ : state) io::write_result(folder / "result.h5", result, provenance);
    state.counters["bytes"] = static_cast<double>(std::filesystem::file_size(folder / "result.h5"));
}
BENCHMARK(write_result)->Arg(2000)->Arg(20000)->Unit(benchmark::kMillisecond);

void read_result(benchmark::State& state) {
    const test::TemporaryFolder folder;
    io::write_result(folder / "result.h5", test::everyday_result(2000), test::sample_provenance());
    for (auto _ : state) benchmark::DoNotOptimize(io::read_result(folder / "result.h5"));
}
BENCHMARK(read_result)->Unit(benchmark::kMillisecond);

void write_pattern_csv(benchmark::State& state) {
    const test::TemporaryFolder folder;
    const solver::Result result = test::everyday_result(2);
    const solver::Solution& solution = result.methods.front().solution;
    for (auto _ : state) {
        io::write_pattern_csv(folder / "pattern.csv", solution.patterns, solution.powers, result.title);
    }
    state.counters["bytes"] = static_cast<double>(std::filesystem::file_size(folder / "pattern.csv"));
}
BENCHMARK(write_pattern_csv)->Unit(benchmark::kMillisecond);

void read_pattern_csv(benchmark::State& state) {
    const test::TemporaryFolder folder;
    const solver::Result result = test::everyday_result(2);
    const solver::Solution& solution = result.methods.front().solution;
    io::write_pattern_csv(folder / "pattern.csv", solution.patterns, solution.powers, result.title);
    for (auto _ : state) benchmark::DoNotOptimize(io::read_pattern_csv(folder / "pattern.csv"));
}
BENCHMARK(read_pattern_csv)->Unit(benchmark::kMillisecond);

}  // namespace
