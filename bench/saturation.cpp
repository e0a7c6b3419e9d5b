#include <benchmark/benchmark.h>

#include "zeotrope/apply/pt_chart.hpp"
#include "zeotrope/refrigerant.hpp"

using namespace zeotrope;

namespace {

void pure_saturation(benchmark::State& state) {
  const auto r = refrigerant("R-134a");
  benchmark::DoNotOptimize(r.top());
  double T = 280;
  for (auto _ : state) {
    benchmark::DoNotOptimize(T);
    benchmark::DoNotOptimize(r.bubble({.temperature = T}));
  }
}

/// Bubble and dew of R-454B on lines already traced.
void blend_saturation(benchmark::State& state) {
  const auto r = refrigerant("R-454B");
  benchmark::DoNotOptimize(r.saturation({.temperature = 300.0}));
  double T = 280;
  for (auto _ : state) {
    benchmark::DoNotOptimize(T);
    benchmark::DoNotOptimize(r.saturation({.temperature = T}));
  }
}

/// Files read, both lines traced, 121 rows: what the command does but for printing.
void cold_chart(benchmark::State& state) {
  for (auto _ : state) {
    const data::Catalogue catalogue;
    const auto chart = apply::pt_chart(refrigerant("R-454B", catalogue), {.from = -50.0, .to = 70.0, .step = 1.0}, catalogue);
    benchmark::DoNotOptimize(apply::render_text(chart));
  }
}

BENCHMARK(pure_saturation);
BENCHMARK(blend_saturation);
BENCHMARK(cold_chart)->Unit(benchmark::kMillisecond);

}  // namespace
