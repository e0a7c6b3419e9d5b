#pragma once

#include <array>
#include <cstddef>

namespace zeotrope::equation {

/// Highest total order of derivative that the kernels give: pressure needs 1, its density
/// derivatives 2 and 3, heat capacities 2 in tau.
inline constexpr int max_order = 3;

/// Scaled derivatives of a reduced Helmholtz energy,
///   (i, j) -> delta^i tau^j d^(i+j) alpha / d delta^i d tau^j,   i + j <= 3.
/// The scaling keeps every figure finite as delta goes to 0, also for terms with d = 0.
template <class S>
class Derivatives {
 public:
  S& operator()(int i, int j) { return v_[index(i, j)]; }
  const S& operator()(int i, int j) const { return v_[index(i, j)]; }

  Derivatives& add(const S& factor, const Derivatives& other) {
    for (std::size_t k = 0; k < v_.size(); ++k) v_[k] += factor * other.v_[k];
    return *this;
  }

 private:
  static constexpr std::size_t index(int i, int j) {
    // rows of the triangle: i = 0 has 4 entries, i = 1 three, ...
    const auto row = static_cast<std::size_t>(i), column = static_cast<std::size_t>(j);
    return row * (9 - row) / 2 + column;
  }
  std::array<S, 10> v_{};
};

/// Logarithmic derivatives of one factor f(x) of a separable term: k -> x^k d^k ln f / dx^k, k = 1..3,
/// and ln f itself without the part that the caller keeps.
template <class S>
struct LogFactor {
  S log{0};
  std::array<S, 3> d{S{0}, S{0}, S{0}};

  /// f = x^a
  void power(double a, const S& log_x) {
    log += a * log_x;
    d[0] += a;
    d[1] -= a;
    d[2] += 2. * a;
  }
  /// f = exp(-g x^m), given x^m
  void exponential(double g, double m, const S& x_m) {
    const S u = -g * x_m;
    log += u;
    d[0] += u * m;
    d[1] += u * m * (m - 1);
    d[2] += u * m * (m - 1) * (m - 2);
  }
  /// f = exp(-eta (x - eps)^2)
  void gaussian(double eta, double eps, const S& x) {
    const S u = x - eps;
    log -= eta * u * u;
    d[0] -= 2. * eta * u * x;
    d[1] -= 2. * eta * x * x;
  }
  /// f = exp(-beta (x - gamma))
  void linear(double beta, double gamma, const S& x) {
    log -= beta * (x - gamma);
    d[0] -= beta * x;
  }
  /// f = exp(1 / (beta (x - gamma)^2 + b))
  void reciprocal(double beta, double gamma, double b, const S& x) {
    const S u = x - gamma;
    const S q = beta * u * u + b;
    const S q1 = 2. * beta * u;   // dq/dx
    const double q2 = 2 * beta;  // d2q/dx2
    const S r = S(1) / q;
    log += r;
    d[0] -= x * q1 * r * r;
    d[1] += x * x * (2. * q1 * q1 * r - q2) * r * r;
    d[2] += x * x * x * (6. * q1 * q2 - 6. * q1 * q1 * q1 * r) * r * r * r;
  }
  /// x^k f^(k) / f for k = 0..3 (complete Bell polynomials of the logarithmic derivatives)
  std::array<S, 4> ratios() const {
    return {S(1), d[0], d[0] * d[0] + d[1], d[0] * d[0] * d[0] + 3. * d[0] * d[1] + d[2]};
  }
};

}  // namespace zeotrope::equation
