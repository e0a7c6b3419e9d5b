#pragma once

#include <array>
#include <cmath>

#include "zeotrope/equation/derivatives.hpp"

/// The kinds of separable term that published Helmholtz equations are sums of,
///   n f(delta) g(tau).
/// Each kind is one function that fills the logarithmic derivatives of f and g; columns as in the files.
/// R. Span, Multiparameter Equations of State, Springer 2000, chapter 3, gives the kinds and their history.
namespace zeotrope::equation {

/// tau, delta and their logarithms; delta^l of the last l asked for is kept, since rows come ordered by l.
template <class S>
class Point {
 public:
  Point(const S& tau_, const S& delta_) : tau(tau_), delta(delta_) {
    using std::log;
    log_tau = log(tau);
    log_delta = log(delta);
  }
  S tau, delta, log_tau, log_delta;

  const S& delta_power(double l) {
    using std::exp;
    if (l != l_) {
      l_ = l;
      power_ = exp(l * log_delta);
    }
    return power_;
  }

 private:
  double l_ = 0;
  S power_{1};
};

/// n f g with all derivatives, added to `sum`.
template <class S>
void accumulate(double n, const LogFactor<S>& f, const LogFactor<S>& g, Derivatives<S>& sum) {
  using std::exp;
  const S value = n * exp(f.log + g.log);
  const auto fd = f.ratios();
  const auto gt = g.ratios();
  for (int i = 0; i <= max_order; ++i)
    for (int j = 0; i + j <= max_order; ++j) sum(i, j) += value * fd[static_cast<std::size_t>(i)] * gt[static_cast<std::size_t>(j)];
}

/// n tau^t delta^d
template <class S>
void add_power(const std::array<double, 3>& row, Point<S>& at, Derivatives<S>& sum) {
  const auto [n, t, d] = row;
  LogFactor<S> f, g;
  f.power(d, at.log_delta);
  g.power(t, at.log_tau);
  accumulate(n, f, g, sum);
}

/// n tau^t delta^d exp(-delta^l)
template <class S>
void add_exponential(const std::array<double, 4>& row, Point<S>& at, Derivatives<S>& sum) {
  const auto [n, t, d, l] = row;
  LogFactor<S> f, g;
  f.power(d, at.log_delta);
  f.exponential(1.0, l, at.delta_power(l));
  g.power(t, at.log_tau);
  accumulate(n, f, g, sum);
}

/// n tau^t delta^d exp(-c delta^l), the Bender form
template <class S>
void add_scaled_exponential(const std::array<double, 5>& row, Point<S>& at, Derivatives<S>& sum) {
  const auto [n, t, d, c, l] = row;
  LogFactor<S> f, g;
  f.power(d, at.log_delta);
  f.exponential(c, l, at.delta_power(l));
  g.power(t, at.log_tau);
  accumulate(n, f, g, sum);
}

/// n tau^t delta^d exp(-delta^l - tau^m); Lemmon and Jacobsen, J. Phys. Chem. Ref. Data 34 (2005) 69
template <class S>
void add_tau_exponential(const std::array<double, 5>& row, Point<S>& at, Derivatives<S>& sum) {
  using std::exp;
  const auto [n, t, d, l, m] = row;
  LogFactor<S> f, g;
  f.power(d, at.log_delta);
  f.exponential(1.0, l, at.delta_power(l));
  g.power(t, at.log_tau);
  g.exponential(1.0, m, exp(m * at.log_tau));
  accumulate(n, f, g, sum);
}

/// n tau^t delta^d exp(-eta (delta - epsilon)^2 - beta (tau - gamma)^2)
template <class S>
void add_gaussian(const std::array<double, 7>& row, Point<S>& at, Derivatives<S>& sum) {
  const auto [n, t, d, eta, epsilon, beta, gamma] = row;
  LogFactor<S> f, g;
  f.power(d, at.log_delta);
  f.gaussian(eta, epsilon, at.delta);
  g.power(t, at.log_tau);
  g.gaussian(beta, gamma, at.tau);
  accumulate(n, f, g, sum);
}

/// n tau^t delta^d exp(-eta (delta - epsilon)^2 + 1/(beta (tau - gamma)^2 + b));
/// Gao et al., J. Phys. Chem. Ref. Data 52 (2023) 013102
template <class S>
void add_reciprocal_gaussian(const std::array<double, 8>& row, Point<S>& at, Derivatives<S>& sum) {
  const auto [n, t, d, eta, epsilon, beta, gamma, b] = row;
  LogFactor<S> f, g;
  f.power(d, at.log_delta);
  f.gaussian(eta, epsilon, at.delta);
  g.power(t, at.log_tau);
  g.reciprocal(beta, gamma, b, at.tau);
  accumulate(n, f, g, sum);
}

/// n tau^t delta^d exp(-eta (delta - epsilon)^2 - beta (delta - gamma)), only delta in the exponential;
/// departure functions of Kunz and Wagner, J. Chem. Eng. Data 57 (2012) 3032
template <class S>
void add_delta_gaussian(const std::array<double, 7>& row, Point<S>& at, Derivatives<S>& sum) {
  const auto [n, t, d, eta, epsilon, beta, gamma] = row;
  LogFactor<S> f, g;
  f.power(d, at.log_delta);
  f.gaussian(eta, epsilon, at.delta);
  f.linear(beta, gamma, at.delta);
  g.power(t, at.log_tau);
  accumulate(n, f, g, sum);
}

}  // namespace zeotrope::equation
