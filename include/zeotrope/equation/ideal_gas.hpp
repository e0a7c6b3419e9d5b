#pragma once

#include <cmath>

#include "zeotrope/data/records.hpp"

namespace zeotrope::equation {

/// Ideal-gas heat capacity and its integrals over temperature, divided by R; the integration constants
/// are set by a reference state, not here.
template <class S>
struct IdealGasValues {
  S heat_capacity;  ///< cp0/R
  S enthalpy;       ///< integral of cp0/R dT, K
  S entropy;        ///< integral of cp0/(R T) dT, at fixed pressure
};

/// Power terms integrate by the power rule (with a logarithm where an exponent meets it); Einstein terms
/// as the harmonic oscillator of statistical mechanics.
template <class S>
IdealGasValues<S> evaluate(const data::IdealGas& gas, const S& temperature) {
  using std::exp;
  using std::expm1;
  using std::log;
  using std::log1p;
  using std::pow;
  const S log_T = log(temperature);
  IdealGasValues<S> r{S(gas.constant), gas.constant * temperature, gas.constant * log_T};
  for (const auto& [c, t] : gas.power) {
    const S cp = c * exp(t * log_T);
    r.heat_capacity += cp;
    r.enthalpy += t == -1 ? S(c * log_T) : S(cp * temperature / (t + 1));
    r.entropy += t == 0 ? S(c * log_T) : S(cp / t);
  }
  for (const auto& [v, u] : gas.einstein) {
    const S x = u / temperature;
    // in e^-x, which does not overflow at low temperature
    const S e = exp(-x), rest = -expm1(-x);
    r.heat_capacity += v * x * x * e / (rest * rest);
    r.enthalpy += v * u * e / rest;
    r.entropy += v * (x * e / rest - log1p(-e));
  }
  return r;
}

}  // namespace zeotrope::equation
