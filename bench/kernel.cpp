#include <benchmark/benchmark.h>

#include <cmath>

#include "zeotrope/equation/residual.hpp"
#include "zeotrope/refrigerant.hpp"

using namespace zeotrope;

namespace {

const data::Terms& r134a() {
  static const auto r = refrigerant("R-134a");
  return r.components().front().equation->residual;
}

/// Baseline: each term with its own pow and exp, value and the two first derivatives that a pressure and an
/// energy need, as a textbook prints them.
void textbook(benchmark::State& state) {
  const auto& terms = r134a();
  double tau = 1.2, delta = 1.7;
  for (auto _ : state) {
    benchmark::DoNotOptimize(tau);
    benchmark::DoNotOptimize(delta);
    double a = 0, a_d = 0, a_t = 0;
    for (const auto& [n, t, d] : terms.power) {
      a += n * std::pow(tau, t) * std::pow(delta, d);
      a_d += n * d * std::pow(tau, t) * std::pow(delta, d - 1);
      a_t += n * t * std::pow(tau, t - 1) * std::pow(delta, d);
    }
    for (const auto& [n, t, d, l] : terms.exponential) {
      const double e = std::exp(-std::pow(delta, l));
      a += n * std::pow(tau, t) * std::pow(delta, d) * e;
      a_d += n * std::pow(tau, t) * std::pow(delta, d - 1) * (d - l * std::pow(delta, l)) * e;
      a_t += n * t * std::pow(tau, t - 1) * std::pow(delta, d) * e;
    }
    benchmark::DoNotOptimize(a + a_d + a_t);
  }
}

/// The kernel: ten derivatives.
void kernel(benchmark::State& state) {
  const auto& terms = r134a();
  double tau = 1.2, delta = 1.7;
  for (auto _ : state) {
    benchmark::DoNotOptimize(tau);
    benchmark::DoNotOptimize(delta);
    benchmark::DoNotOptimize(equation::evaluate<double>(terms, tau, delta));
  }
}

BENCHMARK(textbook);
BENCHMARK(kernel);

}  // namespace
