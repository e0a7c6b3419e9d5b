#pragma once

#include <algorithm>
#include <cmath>
#include <limits>

namespace zeotrope::numeric {

/// Result of a bracketed root search: the root and the value of the function there.
struct Root {
  double x;
  double f;
  bool converged;
};

/// Root of f in [a, b], f(a) and f(b) of opposite sign (or zero).
///
/// T. R. Chandrupatla, Adv. Eng. Softw. 28 (1997) 145-149: bisection, with inverse quadratic
/// interpolation where that is safe. Never leaves the bracket. Stops at |b - a| <= 2 (eps |x| + x_tolerance).
/// `converged` is false where the ends have the same sign, a value is not finite, or 200 steps did not suffice.
template <class F>
Root bracketed_root(F&& f, double a, double b, double fa, double fb, double x_tolerance = 0.0) {
  if (fa == 0.0) return {a, 0.0, true};
  if (fb == 0.0) return {b, 0.0, true};
  if (!(std::isfinite(fa) && std::isfinite(fb)) || std::signbit(fa) == std::signbit(fb)) return {a, fa, false};
  constexpr double eps = std::numeric_limits<double>::epsilon();
  double c = a;
  double fc = fa;
  double t = 0.5;
  for (int step = 0; step < 200; ++step) {
    const double x = a + t * (b - a);
    const double fx = f(x);
    if (!std::isfinite(fx)) return {x, fx, false};
    if (std::signbit(fx) == std::signbit(fa)) {
      c = a;
      fc = fa;
    } else {
      c = b;
      fc = fb;
      b = a;
      fb = fa;
    }
    a = x;
    fa = fx;
    const double best = std::abs(fa) < std::abs(fb) ? a : b;
    const double f_best = std::abs(fa) < std::abs(fb) ? fa : fb;
    const double tolerance = eps * std::abs(best) + x_tolerance;
    const double half = tolerance / std::abs(b - a);
    if (half > 0.5 || f_best == 0.0) return {best, f_best, true};
    const double xi = (a - b) / (c - b);
    const double phi = (fa - fb) / (fc - fb);
    if (phi * phi < xi && (1 - phi) * (1 - phi) < 1 - xi)
      t = fa / (fb - fa) * fc / (fb - fc) + (c - a) / (b - a) * fa / (fc - fa) * fb / (fc - fb);
    else
      t = 0.5;
    t = std::clamp(t, half, 1 - half);
  }
  return {a, fa, false};
}

/// As above, evaluating the ends itself.
template <class F>
Root bracketed_root(F&& f, double a, double b) {
  const double fa = f(a);
  const double fb = f(b);
  return bracketed_root(f, a, b, fa, fb);
}

}  // namespace zeotrope::numeric
