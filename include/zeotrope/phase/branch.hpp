#pragma once

#include <algorithm>
#include <cmath>
#include <optional>

#include "zeotrope/numeric/root.hpp"
#include "zeotrope/phase/isotherm.hpp"

namespace zeotrope::phase {

/// Part of an isotherm on which pressure rises with density: vapour from zero to its spinodal, liquid from its
/// spinodal (or from where the pressure vanishes) upward. A pressure between the ends has exactly one density.
struct Branch {
  IsothermPoint low, high;
};

/// Density on the branch at p/(R T) = `target`, by Newton inside a bracket that shrinks at every step.
/// Nothing where the branch does not reach that pressure.
inline std::optional<IsothermPoint> density_at(const Isotherm& isotherm, const Branch& branch, double target) {
  if (!(branch.low.pressure <= target && target <= branch.high.pressure)) return std::nullopt;
  double lo = branch.low.density, hi = branch.high.density;
  // a straight line between the ends is exact for an ideal gas
  const double span = branch.high.pressure - branch.low.pressure;
  IsothermPoint at = isotherm(span > 0 ? lo + (hi - lo) * (target - branch.low.pressure) / span : 0.5 * (lo + hi));
  for (int step = 0; step < 200; ++step) {
    const double f = at.pressure - target;
    (f > 0 ? hi : lo) = at.density;
    double next = at.slope > 0 ? at.density - f / at.slope : 0.5 * (lo + hi);
    if (!(next > lo && next < hi)) next = 0.5 * (lo + hi);
    const bool settled = std::abs(next - at.density) <= 1e-15 * next || f == 0.0;
    if (settled || hi - lo <= 4e-16 * hi) return at;
    const double previous = std::abs(next - at.density);
    at = isotherm(next);
    if (previous <= 1e-13 * next) return at;
  }
  return at;
}

namespace detail {

/// Between a stable point and an unstable one (slope <= 0): the point of zero slope, on the stable side.
inline IsothermPoint spinodal_between(const Isotherm& isotherm, double stable, double unstable) {
  for (int step = 0; step < 100 && std::abs(stable - unstable) > 1e-12 * std::abs(stable); ++step) {
    const double mid = 0.5 * (stable + unstable);
    (isotherm(mid).slope > 0 ? stable : unstable) = mid;
  }
  return isotherm(stable);
}

}  // namespace detail

/// Vapour branch: marched upward from `start` (0, or a density surely on the branch) to the first point of negative
/// slope or of a pressure above `highest` (over R T), below `limit`, a density inside the dome. Some equations have a
/// pressure peak inside the dome that swallows the spinodal; `highest` keeps it out.
/// Nothing where neither is met on the way.
inline std::optional<Branch> vapour_branch(const Isotherm& isotherm, double start, double limit, double highest) {
  constexpr int steps = 128;
  const IsothermPoint low = isotherm(1e-20 * limit);
  IsothermPoint last = start > 0 ? isotherm(start) : low;
  if (!(last.slope > 0)) return std::nullopt;
  for (int k = 1; k <= steps; ++k) {
    const double s = static_cast<double>(k) / steps;
    const IsothermPoint next = isotherm(start + (limit - start) * (start > 0 ? s : s * s));
    if (next.slope <= 0) return Branch{low, detail::spinodal_between(isotherm, last.density, next.density)};
    if (next.pressure > highest) return Branch{low, next};
    last = next;
  }
  return std::nullopt;
}

/// Liquid branch: marched downward from `start`, a density above the saturated liquid's, until the pressure
/// vanishes or the slope does, above `limit`, a density inside the dome. Nothing where `start` is not on a rising
/// branch of positive pressure or neither happens.
inline std::optional<Branch> liquid_branch(const Isotherm& isotherm, double start, double limit) {
  const IsothermPoint high = isotherm(start);
  if (!(high.slope > 0 && high.pressure > 0)) return std::nullopt;
  IsothermPoint last = high;
  constexpr int steps = 128;
  for (int k = 1; k <= steps; ++k) {
    const IsothermPoint next = isotherm(start + (limit - start) * k / steps);
    if (next.slope <= 0) return Branch{detail::spinodal_between(isotherm, last.density, next.density), high};
    if (next.pressure <= 0) return Branch{next, high};
    last = next;
  }
  return std::nullopt;
}

/// A density surely above the saturated liquid's: H. G. Rackett, J. Chem. Eng. Data 15 (1970) 514, with the
/// critical compressibility of the fluid, and a margin that is widened until the pressure there is at least
/// `pressure` (over R T). Nothing if no such density was found.
inline std::optional<double> compressed_liquid_density(const Isotherm& isotherm, double critical_temperature, double critical_density,
                                                       double critical_compressibility, double pressure) {
  const double tr = std::min(isotherm.temperature() / critical_temperature, 1.0);
  double rho = critical_density * std::pow(critical_compressibility, -std::pow(1 - tr, 2.0 / 7.0));
  // near the critical point the equation's own dome may be wider than Rackett's
  rho = std::max(rho, critical_density * (1 + 2.2 * std::cbrt(1 - tr)));
  for (int k = 0; k < 40; ++k) {
    rho *= 1.03;
    const IsothermPoint at = isotherm(rho);
    if (at.slope > 0 && at.pressure > std::max(pressure, 0.0)) return rho;
  }
  return std::nullopt;
}

}  // namespace zeotrope::phase
