#pragma once

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <limits>
#include <optional>
#include <utility>

#include "zeotrope/error.hpp"
#include "zeotrope/numeric/root.hpp"
#include "zeotrope/phase/branch.hpp"
#include "zeotrope/phase/isotherm.hpp"

namespace zeotrope::phase {

/// Where dp/drho and d2p/drho2 vanish together on the equation itself; tabulated critical points can differ a little.
struct PureCritical {
  double temperature, pressure, density;  ///< K, Pa, mol/m3
};

/// Two phases of a pure fluid in equilibrium.
struct PureSaturation {
  double temperature, pressure;            ///< K, Pa
  double liquid_density, vapour_density;   ///< mol/m3
  double fugacity_mismatch;                ///< |ln f' - ln f''| that remains
};

namespace detail {

/// Density of least slope near the critical one: d2p/drho2 = 0, falling slope below, rising above.
inline std::optional<IsothermPoint> least_slope(const Isotherm& isotherm, double near) {
  for (const double width : {0.15, 0.3, 0.45}) {
    const auto f = [&](double rho) { return isotherm(rho).curvature; };
    const double a = near * (1 - width), b = near * (1 + width);
    const double fa = f(a), fb = f(b);
    if (!(fa < 0 && fb > 0)) continue;
    const auto root = numeric::bracketed_root(f, a, b, fa, fb);
    if (root.converged) return isotherm(root.x);
  }
  return std::nullopt;
}

/// Vapour and liquid branch seen from outside the dome, so that loops which an equation has deeper inside are never
/// met. Steps are scaled by the dome's width, which closes about as (1 - T/Tc)^(1/3); so near the critical point that
/// even they step over it, the branches are taken from the middle of the loop outward instead.
inline std::optional<std::pair<Branch, Branch>> outer_branches(const Isotherm& isotherm, const PureCritical& critical) {
  const double tr = isotherm.temperature() / critical.temperature;
  const double width = std::min(1.0, 2.6 * std::cbrt(1 - tr));
  const double zc = critical.pressure * isotherm.temperature() / (critical.density * isotherm.rt() * critical.temperature);
  const double highest = 1.05 * critical.pressure / isotherm.rt();
  auto vapour = vapour_branch(isotherm, critical.density * (1 - width), critical.density, highest);
  if (vapour && vapour->high.pressure > highest) vapour->high = density_at(isotherm, *vapour, highest).value_or(vapour->high);
  if (vapour) {
    const auto start = compressed_liquid_density(isotherm, critical.temperature, critical.density, zc, vapour->high.pressure);
    const auto liquid = start ? liquid_branch(isotherm, *start, critical.density) : std::nullopt;
    if (liquid) return std::make_pair(*vapour, *liquid);
  }
  if (tr < 0.999) return std::nullopt;
  const auto middle = least_slope(isotherm, critical.density);
  if (!middle || !(middle->slope < 0)) return std::nullopt;
  // steps grow from the width that a classical critical point has
  const auto edge = [&](double sign) -> std::optional<IsothermPoint> {
    double inside = middle->density;
    for (double step = 0.1 * std::sqrt(1 - tr) * critical.density; step < 0.5 * critical.density; step *= 1.3) {
      const double rho = inside + sign * step;
      if (isotherm(rho).slope > 0) return spinodal_between(isotherm, rho, inside);
      inside = rho;
    }
    return std::nullopt;
  };
  const auto low = edge(-1), high = edge(+1);
  if (!low || !high) return std::nullopt;
  IsothermPoint end = *high;
  for (double step = high->density - middle->density; end.pressure <= low->pressure; step *= 1.5) {
    end = isotherm(end.density + step);
    if (end.density > 4 * critical.density || end.slope <= 0) return std::nullopt;
  }
  return std::make_pair(Branch{isotherm(1e-20 * critical.density), *low}, Branch{*high, end});
}

}  // namespace detail

/// Critical point of the equation, starting from the stated one: T such that the least slope on the isotherm is zero.
/// Equations with critical-region terms meet their stated point by construction and have no third derivative
/// there; callers pass those through unchanged.
inline PureCritical pure_critical_point(const equation::MultiFluid& model, double stated_temperature, double stated_density) {
  const equation::Vector<double> x = equation::Vector<double>::Ones(1);
  double rho = stated_density;
  const auto slope = [&](double T) {
    const auto at = detail::least_slope(Isotherm(model, T, x), stated_density);
    if (!at) return std::numeric_limits<double>::quiet_NaN();
    rho = at->density;
    return at->slope;
  };
  for (const double width : {1e-3, 4e-3, 1.6e-2}) {
    const double a = stated_temperature * (1 - width), b = stated_temperature * (1 + width);
    const double fa = slope(a), fb = slope(b);
    if (!(fa < 0 && fb > 0)) continue;
    const auto root = numeric::bracketed_root(slope, a, b, fa, fb);
    if (!root.converged) continue;
    slope(root.x);
    const Isotherm isotherm(model, root.x, x);
    return {root.x, isotherm(rho).pressure * isotherm.rt(), rho};
  }
  throw NotConverged(fmt::format("critical point: the equation has none within 1.6 % of the stated {:.2f} K", stated_temperature));
}

/// Saturation of a pure fluid at T below its critical temperature.
///
/// Method: spinodals bound a vapour and a liquid branch (detail::outer_branches); between their pressures ln f' - ln f'' falls with
/// pressure, so the saturation pressure is bracketed (the Maxwell construction), solved there, and polished by
/// Newton in both densities. Tolerance: fugacities equal to 1e-12 or as far as rounding allows.
/// Throws NoSolution above the critical temperature, NotConverged naming the temperature otherwise.
inline PureSaturation pure_saturation(const equation::MultiFluid& model, const PureCritical& critical, double temperature) {
  if (temperature > critical.temperature)
    throw NoSolution(fmt::format("no saturation at {:.6g} K: the critical point is at {:.6g} K and {:.6g} MPa", temperature, critical.temperature, critical.pressure / 1e6));
  if (temperature == critical.temperature) return {temperature, critical.pressure, critical.density, critical.density, 0.0};
  const Isotherm isotherm(model, temperature, equation::Vector<double>::Ones(1));
  const auto failed = [&](const char* what) { return NotConverged(fmt::format("saturation at {:.9g} K (critical {:.9g} K): {}", temperature, critical.temperature, what)); };

  const auto branches = detail::outer_branches(isotherm, critical);
  if (!branches) throw failed("the vapour or the liquid branch was not found");
  const Branch& vapour = branches->first;
  const Branch& liquid = branches->second;

  // ln f' - ln f'' at a pressure on both branches; it falls as the pressure rises
  IsothermPoint l{}, v{};
  const auto mismatch = [&](double log_p) {
    const double p = std::exp(log_p);
    const auto a = density_at(isotherm, liquid, p);
    const auto b = density_at(isotherm, vapour, p);
    if (!a || !b) return std::numeric_limits<double>::quiet_NaN();
    l = *a;
    v = *b;
    return l.log_fugacity - v.log_fugacity;
  };
  const double top = std::log(vapour.high.pressure) - 1e-13;
  double low = std::log(std::max(liquid.low.pressure, 0.0));  // -infinity where the liquid branch reaches p = 0
  double high = top;
  if (!std::isfinite(low)) {
    // vapour ideal and liquid at zero pressure: ln p = ln f'
    const double guess = std::min(density_at(isotherm, liquid, 0.0).value_or(liquid.low).log_fugacity, top - 0.01);
    low = guess - 0.05;
    while (!(mismatch(low) > 0)) {
      low -= 0.5;
      if (low < guess - 20) throw failed("no pressure at which the liquid is the less stable phase");
    }
    for (double step = 0.1; low + step < top; step *= 2)
      if (mismatch(low + step) < 0) {
        high = low + step;
        break;
      }
  } else {
    low += 1e-13 * std::abs(low);
  }
  const auto root = numeric::bracketed_root(mismatch, low, high, mismatch(low), mismatch(high), 1e-14);
  if (root.converged)
    mismatch(root.x);
  else if (temperature / critical.temperature > 1 - 1e-7) {
    // pressures on the loop differ by rounding only: the classical expansion, saturation at sqrt(3) times the spinodals' distance
    const double middle = 0.5 * (liquid.low.density + vapour.high.density), half = 0.5 * std::sqrt(3.0) * (liquid.low.density - vapour.high.density);
    l = isotherm(middle + half);
    v = isotherm(middle - half);
  } else {
    throw failed("the pressure of equal fugacities is not bracketed by the spinodals");
  }

  // polish: Newton on p' = p'', ln f' = ln f'' in the two densities; d ln f/d rho = slope / rho
  for (int step = 0; step < 3; ++step) {
    const double f1 = l.pressure - v.pressure, f2 = l.log_fugacity - v.log_fugacity;
    const double det = l.slope * v.slope * (1 / l.density - 1 / v.density);
    if (!(std::abs(det) > 0)) break;
    const double dl = (-f1 * -v.slope / v.density + -v.slope * f2) / det;
    const double dv = (l.slope * -f2 + l.slope / l.density * f1) / det;
    if (!(std::abs(dl) < 1e-3 * std::abs(l.density - v.density) && std::abs(dv) < 1e-3 * std::abs(l.density - v.density))) break;
    const IsothermPoint nl = isotherm(l.density + dl), nv = isotherm(v.density + dv);
    if (std::abs(nl.log_fugacity - nv.log_fugacity) > std::abs(f2) + 1e-13) break;
    l = nl;
    v = nv;
  }
  const double left = std::abs(l.log_fugacity - v.log_fugacity);
  if (!(left < 1e-9) || !(l.density > v.density)) throw failed("fugacities of the two phases differ");
  return {temperature, v.pressure * isotherm.rt(), l.density, v.density, left};
}

/// Saturation at a pressure: bracketed in 1/T, where ln p is nearly straight. `lowest` is the lower end of the search, K.
inline PureSaturation pure_saturation_at_pressure(const equation::MultiFluid& model, const PureCritical& critical, double lowest, double pressure) {
  if (pressure > critical.pressure)
    throw NoSolution(fmt::format("no saturation at {:.6g} MPa: the critical point is at {:.6g} K and {:.6g} MPa", pressure / 1e6, critical.temperature, critical.pressure / 1e6));
  if (pressure == critical.pressure) return {critical.temperature, critical.pressure, critical.density, critical.density, 0.0};
  const double target = std::log(pressure);
  const auto f = [&](double inverse) { return std::log(pure_saturation(model, critical, 1 / inverse).pressure) - target; };
  const double cold = f(1 / lowest);
  if (cold > 0)
    throw OutOfRange(fmt::format("no saturation at {:.6g} Pa within range: at the lower limit {:.6g} K it is {:.6g} Pa", pressure, lowest, std::exp(cold + target)));
  const auto root = numeric::bracketed_root(f, 1 / lowest, 1 / critical.temperature, cold, std::log(critical.pressure) - target);
  if (!root.converged) throw NotConverged(fmt::format("saturation temperature at {:.9g} Pa: search did not settle", pressure));
  return pure_saturation(model, critical, 1 / root.x);
}

}  // namespace zeotrope::phase
