#pragma once

#include <array>
#include <cmath>
#include <complex>
#include <cstddef>

#include "zeotrope/equation/derivatives.hpp"
#include "zeotrope/equation/terms.hpp"

namespace zeotrope::equation {

/// Truncated Taylor polynomial in (delta, tau) about a point, total degree <= 3; coefficient (i, j)
/// multiplies (delta - delta0)^i (tau - tau0)^j. Its arithmetic is exact differentiation of the one
/// kind of term that does not separate.
template <class S>
class Jet {
 public:
  static Jet constant(const S& v) {
    Jet r;
    r(0, 0) = v;
    return r;
  }
  static Jet variable(const S& v, int which) {
    Jet r = constant(v);
    which == 0 ? r(1, 0) = S(1) : r(0, 1) = S(1);
    return r;
  }
  S& operator()(int i, int j) { return c_[index(i, j)]; }
  const S& operator()(int i, int j) const { return c_[index(i, j)]; }

  friend Jet operator+(Jet a, const Jet& b) {
    for (std::size_t k = 0; k < a.c_.size(); ++k) a.c_[k] += b.c_[k];
    return a;
  }
  friend Jet operator+(Jet a, double b) {
    a(0, 0) += b;
    return a;
  }
  friend Jet operator*(double s, Jet a) {
    for (auto& c : a.c_) c *= s;
    return a;
  }
  friend Jet operator*(const Jet& a, const Jet& b) {
    Jet r;
    for (int i = 0; i <= max_order; ++i)
      for (int j = 0; i + j <= max_order; ++j)
        for (int k = 0; k <= i; ++k)
          for (int m = 0; m <= j; ++m) r(i, j) += a(k, m) * b(i - k, j - m);
    return r;
  }
  /// f(a), given f and its derivatives f', f''/2, f'''/6 at a(0, 0)
  Jet compose(const std::array<S, 4>& f) const {
    Jet h = *this;
    h(0, 0) = S(0);
    Jet r = constant(f[3]);
    for (int k = 2; k >= 0; --k) {
      r = r * h;
      r(0, 0) += f[static_cast<std::size_t>(k)];
    }
    return r;
  }

 private:
  static constexpr std::size_t index(int i, int j) { return static_cast<std::size_t>(i) * 4 + static_cast<std::size_t>(j); }

  std::array<S, 16> c_{};
};

template <class S>
Jet<S> exp(const Jet<S>& a) {
  using std::exp;
  const S e = exp(a(0, 0));
  return a.compose({e, e, e / 2., e / 6.});
}

/// For the sign of an exponent, also where S is complex.
template <class S>
S real_part(const S& x) {
  return x;
}
inline double real_part(const std::complex<double>& x) { return x.real(); }

/// a^p. At a = 0 the powers that are singular there are left at 0: they meet a factor that vanishes faster.
template <class S>
Jet<S> pow(const Jet<S>& a, const S& p) {
  using std::pow;
  const S& x = a(0, 0);
  const auto power = [&](int less) { return x == S(0) && real_part(S(p - double(less))) < 0 ? S(0) : S(pow(x, S(p - double(less)))); };
  const S c2 = p * (p - 1.) / 2., c3 = c2 * (p - 2.) / 3.;
  return a.compose({power(0), S(p * power(1)), S(c2 * power(2)), S(c3 * power(3))});
}

/// Critical-region term of Wagner's equations for water and carbon dioxide,
///   n Delta^b delta psi,  Delta = theta^2 + B ((delta - 1)^2)^a,
///   theta = (1 - tau) + A ((delta - 1)^2)^(1/(2 beta)),  psi = exp(-C (delta - 1)^2 - D (tau - 1)^2);
/// IAPWS R6-95(2018), Table 6; Span and Wagner, J. Phys. Chem. Ref. Data 25 (1996) 1509, section 5.
/// Not defined in the critical point itself (delta = tau = 1), where its second derivatives diverge.
template <class S>
void add_critical_region(const std::array<double, 8>& row, Point<S>& at, Derivatives<S>& sum) {
  const auto [n, a, b, beta, A, B, C, D] = row;
  const auto delta = Jet<S>::variable(at.delta, 0);
  const auto tau = Jet<S>::variable(at.tau, 1);
  const auto square = [](const Jet<S>& j) { return j * j; };
  const auto q = square(delta + -1.);
  const auto theta = (-1. * tau + 1.) + A * pow(q, S(1. / (2. * S(beta))));
  const auto Delta = square(theta) + B * pow(q, S(a));
  const auto psi = exp(-C * q + -D * square(tau + -1.));
  const auto value = n * (pow(Delta, S(b)) * delta * psi);
  constexpr std::array<double, 4> factorial{1, 1, 2, 6};
  std::array<S, 4> delta_i{S(1)}, tau_j{S(1)};
  for (std::size_t k = 1; k < 4; ++k) {
    delta_i[k] = delta_i[k - 1] * at.delta;
    tau_j[k] = tau_j[k - 1] * at.tau;
  }
  for (int i = 0; i <= max_order; ++i)
    for (int j = 0; i + j <= max_order; ++j) {
      const auto ui = static_cast<std::size_t>(i), uj = static_cast<std::size_t>(j);
      sum(i, j) += factorial[ui] * factorial[uj] * delta_i[ui] * tau_j[uj] * value(i, j);
    }
}

}  // namespace zeotrope::equation
