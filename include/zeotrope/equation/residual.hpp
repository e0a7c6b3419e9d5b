#pragma once

#include "zeotrope/data/records.hpp"
#include "zeotrope/equation/critical_region.hpp"
#include "zeotrope/equation/derivatives.hpp"
#include "zeotrope/equation/terms.hpp"

namespace zeotrope::equation {

/// Sum of all terms of a residual or departure function at (tau, delta), with its scaled derivatives.
/// S: double, long double, a multiprecision type or std::complex<double>. delta > 0.
template <class S>
Derivatives<S> evaluate(const data::Terms& terms, const S& tau, const S& delta) {
  Point<S> at(tau, delta);
  Derivatives<S> sum;
  for (const auto& row : terms.power) add_power(row, at, sum);
  for (const auto& row : terms.exponential) add_exponential(row, at, sum);
  for (const auto& row : terms.scaled_exponential) add_scaled_exponential(row, at, sum);
  for (const auto& row : terms.tau_exponential) add_tau_exponential(row, at, sum);
  for (const auto& row : terms.gaussian) add_gaussian(row, at, sum);
  for (const auto& row : terms.reciprocal_gaussian) add_reciprocal_gaussian(row, at, sum);
  for (const auto& row : terms.delta_gaussian) add_delta_gaussian(row, at, sum);
  for (const auto& row : terms.critical_region) add_critical_region(row, at, sum);
  return sum;
}

}  // namespace zeotrope::equation
