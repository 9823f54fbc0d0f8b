/// What one value of the transition function costs, against the quadrature it is tested with.
#include <benchmark/benchmark.h>

#include <complex>
#include <vector>

#include "solver/aperture/fresnel.hpp"
#include "tests/reference/fresnel_reference.hpp"

namespace {

/// Arguments over six decades, as the directions round an edge ask for them.
std::vector<double> arguments() {
    std::vector<double> x;
    for (double value = 1e-3; value < 1e3; value *= 1.0136) x.push_back(value);
    return x;
}

template <typename Function>
void over_arguments(benchmark::State& state, Function function) {
    const std::vector<double> x = arguments();
    for (auto step : state) {
        std::complex<double> sum{};
        for (const double value : x) sum += function(value);
        benchmark::DoNotOptimize(sum);
    }
    state.SetItemsProcessed(static_cast<int64_t>(state.iterations() * x.size()));
}

void transition(benchmark::State& state) {
    over_arguments(state, panelwright::solver::transition);
}
void tail_of_negative_argument(benchmark::State& state) {
    over_arguments(state, [](double x) { return panelwright::solver::scaled_fresnel_tail(-x); });
}
void transition_by_quadrature(benchmark::State& state) {
    over_arguments(state, panelwright::test::transition_reference);
}

BENCHMARK(transition);
BENCHMARK(tail_of_negative_argument);
BENCHMARK(transition_by_quadrature);

}  // namespace
