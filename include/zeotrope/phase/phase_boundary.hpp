#pragma once

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <limits>
#include <optional>
#include <string>
#include <vector>

#include "zeotrope/error.hpp"
#include "zeotrope/phase/branch.hpp"
#include "zeotrope/phase/critical_point.hpp"
#include "zeotrope/phase/equilibrium_system.hpp"
#include "zeotrope/phase/line.hpp"

namespace zeotrope::phase {

/// One point of a bubble or dew line. `feed_density` belongs to the phase of the given composition (liquid on the
/// bubble line), `other` are the partial densities of the incipient phase, mol/m3.
struct BoundaryPoint {
  double temperature, pressure;
  double feed_density;
  Eigen::VectorXd other;
  double fugacity_mismatch;
};

/// The bubble or the dew line of one composition, traced once from a cold start to the critical point, from which
/// any point at given T or p is found.
///
/// Tracing: pseudo-arclength continuation (E. L. Allgower and K. Georg, Introduction to Numerical Continuation
/// Methods, SIAM 2003, chapter 6) of the EquilibriumSystem, steps limited by the distance between the phases, so that
/// neither the maximum of temperature or pressure nor the critical point is a special case; the idea of tracing
/// rather than guessing is M. L. Michelsen's, Fluid Phase Equilib. 4 (1980) 1. The end is refined with the criticality
/// conditions of Heidemann and Khalil.
/// Queries: Hermite interpolation between nodes gives the start of a Newton solve at the exact T or p; what is
/// returned has passed the checks of EquilibriumSystem::solve. Of several points at one T or p the first seen from
/// the cold end is returned (the ordinary, not the retrograde one).
class PhaseBoundary {
 public:
  using Vec = Eigen::VectorXd;

  /// `floor`: temperature, K, down to which the line is traced. x > 0 in every component, summing to one.
  PhaseBoundary(const equation::MultiFluid& model, const Vec& z, Line line, double floor) : system_(model, z), line_(line) {
    trace(floor);
  }

  /// Coldest and hottest temperature and highest pressure of the line.
  double coldest() const { return std::exp(nodes_.front().X[last()]); }
  double hottest() const { return highest([this](const Node& n) { return std::exp(n.X[last()]); }, critical_ ? critical_->temperature : 0.0); }
  double highest_pressure() const { return highest([](const Node& n) { return std::exp(n.log_p); }, critical_ ? critical_->pressure : 0.0); }
  const std::optional<CriticalState>& critical() const { return critical_; }
  /// Why the trace ended where it did, in words; empty where it ended in the critical point.
  const std::string& hot_end() const { return hot_end_; }
  const std::string& cold_end() const { return cold_end_; }

  BoundaryPoint at_temperature(double T) const {
    const double target = std::log(T);
    return find(target, [this](const Node& n) { return n.X[last()]; }, [this](const Node& n) { return n.tangent[last()]; },
                system_.at_temperature(T), fmt::format("{:.6g} K", T), fold_ ? std::optional(fold_->log_temperature) : std::nullopt);
  }
  BoundaryPoint at_pressure(double p) const {
    return find(std::log(p), [](const Node& n) { return n.log_p; }, [](const Node& n) { return n.log_p_slope; }, system_.at_pressure(p), fmt::format("{:.6g} Pa", p),
                fold_ ? std::optional(fold_->log_pressure) : std::nullopt);
  }

 private:
  /// Highest T and p met before the line rises for good.
  struct Fold {
    double log_temperature, log_pressure;
  };
  struct Node {
    double s;  ///< arclength
    Vec X, tangent;
    double log_p, log_p_slope;
  };

  Eigen::Index last() const { return system_.components() + 1; }
  const char* name() const { return line_ == Line::bubble ? "bubble" : "dew"; }

  template <class F>
  double highest(F&& f, double other) const {
    double m = other;
    for (const auto& n : nodes_) m = std::max(m, f(n));
    return m;
  }

  Node node(double s, const Vec& X, const EquilibriumSystem::Values& v, const Vec& ahead) const {
    Node n{s, X, system_.tangent(v, ahead), v.log_pressure, 0};
    n.log_p_slope = v.log_pressure_gradient.dot(n.tangent);
    return n;
  }

  // ---- start

  /// Liquid density at the pressure p/(R T) for the composition x; at zero pressure the density where it vanishes.
  std::optional<double> liquid_density(double T, const Vec& x, double p) const {
    const auto& model = system_.model();
    const Isotherm isotherm(model, T, x);
    const double Tr = model.reducing_temperature<double>(x), rr = model.reducing_density<double>(x);
    const auto high = compressed_liquid_density(isotherm, Tr, rr, 0.27, p);
    if (!high) return std::nullopt;
    const auto branch = liquid_branch(isotherm, *high, rr);
    if (!branch) return std::nullopt;
    const auto at = density_at(isotherm, *branch, std::max(p, branch->low.pressure));
    return at ? std::optional(at->density) : std::nullopt;
  }

  Vec pack(double T, double feed_density, const Vec& other) const {
    const auto n = system_.components();
    Vec X(n + 2);
    X[0] = std::log(feed_density);
    X.segment(1, n) = other.array().log();
    X[n + 1] = std::log(T);
    return X;
  }

  /// Successive substitution from an ideal vapour over the liquid of composition z, then Newton.
  std::optional<Vec> bubble_start(double T) const {
    const auto& model = system_.model();
    const Vec& z = system_.feed();
    double p = 0;
    Vec vapour;
    double rho = 0;
    for (int k = 0; k < 12; ++k) {
      const auto liquid = liquid_density(T, z, p);
      if (!liquid) return std::nullopt;
      rho = *liquid;
      const Vec f = (z * rho).array() * model.helmholtz_density<double>(T, Vec(z * rho)).gradient.array().exp();  // f_i/(R T)
      Vec next = f;
      if (vapour.size() > 0) next = f.array() * (-model.helmholtz_density<double>(T, vapour).gradient.array()).exp();
      if (vapour.size() > 0 && !((next.array() / vapour.array()).log().abs().maxCoeff() < 2)) break;  // diverging: leave it to Newton
      vapour = next;
      p = vapour.sum();
    }
    return settle(pack(T, rho, vapour), T, Line::bubble);
  }

  /// Liquid from the bubble point's K-values, then successive substitution at low pressure, then Newton.
  std::optional<Vec> dew_start(double T) const {
    const auto bubble = bubble_start(T);
    if (!bubble) return std::nullopt;
    const auto& model = system_.model();
    const auto n = system_.components();
    const Vec& z = system_.feed();
    const Vec v = bubble->segment(1, n).array().exp();
    const Vec K = (v / v.sum()).array() / z.array();
    Vec x = z.array() / K.array();
    x /= x.sum();
    double p = 0, rho = 0;  // p/(R T)
    for (int k = 0; k < 30; ++k) {
      const auto liquid = liquid_density(T, x, p);
      if (!liquid) return std::nullopt;
      rho = *liquid;
      // liquid fugacity per mole fraction, over R T; z_i p = x_i F_i
      const Vec F = rho * model.helmholtz_density<double>(T, Vec(x * rho)).gradient.array().exp();
      Vec next = z.array() / F.array();
      const double p_next = 1 / next.sum();
      next *= p_next;
      const double move = (next.array() / x.array()).log().abs().maxCoeff();
      p = p_next;
      if (move < 1e-3) break;
      x = (x.array() * (next.array() / x.array()).sqrt()).matrix();  // damped: liquids can be far from ideal
      x /= x.sum();
    }
    return settle(pack(T, p, x * rho), T, Line::dew);
  }

  std::optional<Vec> settle(const Vec& X, double T, Line line) const {
    const auto r = system_.solve(X, system_.at_temperature(T));
    if (!r || system_.gap(r->first) < 0.2) return std::nullopt;
    // the feed is the denser phase on the bubble line, the lighter on the dew line, and the lighter one is a vapour: two
    // liquids in equilibrium pass every other check
    const double feed = std::exp(r->first[0]), other = r->first.segment(1, system_.components()).array().exp().sum();
    const bool ordered = line == Line::bubble ? feed > other : feed < other;
    const bool vapour = std::min(feed, other) < 0.6 * system_.model().reducing_density<double>(system_.feed());
    return ordered && vapour ? std::optional(r->first) : std::nullopt;
  }

  // ---- trace

  void trace(double floor) {
    const double Tr = system_.model().reducing_temperature<double>(system_.feed());
    std::optional<Vec> start;
    for (const double t : {0.70, 0.65, 0.75, 0.60, 0.80, 0.55, 0.85, 0.50, 0.90}) {
      start = line_ == Line::bubble ? bubble_start(t * Tr) : dew_start(t * Tr);
      if (start) break;
    }
    if (!start) throw NotConverged(fmt::format("{} line: no start between 0.5 and 0.9 of the reducing temperature {:.2f} K", name(), Tr));
    const auto n = system_.components();
    const auto values = system_(*start);
    const Vec up = Vec::Unit(n + 2, n + 1);
    std::vector<Node> cold{node(0, *start, values, Vec(-up))};
    cold_end_ = march(cold, [&](const Node& a) { return a.X[last()] <= std::log(floor); });
    for (auto& c : cold) {
      c.s = -c.s;
      c.tangent = -c.tangent;
      c.log_p_slope = -c.log_p_slope;
    }
    std::vector<Node> hot{node(0, *start, values, up)};
    hot_end_ = march(hot, [&](const Node& a) { return system_.gap(a.X) < 1.2e-2; });
    nodes_.assign(cold.rbegin(), cold.rend());
    nodes_.insert(nodes_.end(), hot.begin() + 1, hot.end());
    if (hot_end_.empty()) refine_end();
    find_fold();
  }

  /// A line that turns down in T or p and rises again folds back on itself: the liquid splits in two on that side, and
  /// the points there are not those of a vapour over one stable liquid. What lies below the fold is refused.
  void find_fold() {
    for (std::size_t k = 0; k + 1 < nodes_.size(); ++k) {
      const bool rises_again = (nodes_[k].tangent[last()] < 0 && nodes_[k + 1].tangent[last()] > 0) || (nodes_[k].log_p_slope < 0 && nodes_[k + 1].log_p_slope > 0);
      if (!rises_again || system_.gap(nodes_[k].X) < 0.1) continue;  // next to the critical point a slope of zero may flicker
      Fold f{-std::numeric_limits<double>::infinity(), -std::numeric_limits<double>::infinity()};
      for (std::size_t m = 0; m <= k + 1; ++m) {
        f.log_temperature = std::max(f.log_temperature, nodes_[m].X[last()]);
        f.log_pressure = std::max(f.log_pressure, nodes_[m].log_p);
      }
      fold_ = f;
    }
  }

  /// Continuation from nodes.back() until `done`; returns why it stopped early, or nothing.
  template <class Done>
  std::string march(std::vector<Node>& nodes, Done&& done) const {
    double step = 0.1;
    for (int count = 0; count < 600; ++count) {
      const Node& a = nodes.back();
      if (done(a)) return {};
      // limits: no density changes by more than a quarter e-fold, T by 2 %, and never more than a sixth of what
      // separates the phases
      const double largest = a.tangent.cwiseAbs().maxCoeff();
      const double limit = std::min({0.25 / largest, 0.02 / std::max(std::abs(a.tangent[last()]), 1e-12), system_.gap(a.X) / (6 * largest)});
      step = std::min(step, limit);
      std::optional<Node> next;
      for (; step > 1e-9; step *= 0.4) {
        next = advance(a, step);
        if (next) break;
      }
      if (!next) return fmt::format("the {} line could not be followed beyond {:.3f} K, {:.4g} Pa", name(), std::exp(a.X[last()]), std::exp(a.log_p));
      insert_extrema(nodes, *next);
      nodes.push_back(*next);
      step *= 1.8;
    }
    return fmt::format("the {} line has not ended after 600 steps", name());
  }

  std::optional<Node> advance(const Node& a, double step) const {
    const Vec ahead = a.X + step * a.tangent;
    const auto r = system_.solve(ahead, system_.on_plane(ahead, a.tangent));
    if (!r) return std::nullopt;
    const auto& [X, v] = *r;
    // accept only a point near the prediction that has not fallen onto the trivial solution
    if ((X - ahead).norm() > 0.3 * step || system_.gap(X) < 0.5 * system_.gap(a.X)) return std::nullopt;
    Node b = node(a.s + (X - a.X).norm(), X, v, a.tangent);
    if (b.tangent.dot(a.tangent) < 0.8) return std::nullopt;
    return b;
  }

  /// Where T or p passes a maximum between two nodes, a node is put there, so that queries see monotonic segments.
  void insert_extrema(std::vector<Node>& nodes, const Node& b) const {
    const Node a = nodes.back();
    std::vector<Node> found;
    const auto locate = [&](auto&& slope) {
      if (std::signbit(slope(a)) == std::signbit(slope(b))) return;
      double lo = 0, hi = (b.X - a.X).dot(a.tangent);
      std::optional<Node> best;
      for (int k = 0; k < 40 && hi - lo > 1e-9; ++k) {
        const double mid = 0.5 * (lo + hi);
        const auto m = advance(a, mid);
        if (!m) return;
        best = m;
        (std::signbit(slope(*m)) == std::signbit(slope(a)) ? lo : hi) = mid;
      }
      if (best) found.push_back(*best);
    };
    locate([this](const Node& n) { return n.tangent[last()]; });
    locate([](const Node& n) { return n.log_p_slope; });
    std::sort(found.begin(), found.end(), [](const Node& x, const Node& y) { return x.s < y.s; });
    for (auto& f : found)
      if (f.s > nodes.back().s && f.s < b.s) nodes.push_back(f);
  }

  void refine_end() {
    const Node& a = nodes_[nodes_.size() - 2];
    const Node& b = nodes_.back();
    const double ga = system_.gap(a.X), gb = system_.gap(b.X);
    const Vec end = b.X + (b.X - a.X) * gb / (ga - gb);  // where the gap would be zero
    const double T = std::exp(end[last()]), rho = std::exp(end[0]);
    const auto c = critical_point(system_.model(), system_.feed(), T, rho);
    if (c && std::abs(c->temperature / T - 1) < 1e-3 && std::abs(c->density / rho - 1) < 0.05)
      critical_ = c;
    else
      hot_end_ = fmt::format("the phases merge near {:.3f} K but the criticality conditions are not met there", T);
  }

  // ---- query

  Vec interpolate(const Node& a, const Node& b, double u) const {
    const double h = b.s - a.s;
    const double u2 = u * u, u3 = u2 * u;
    return (2 * u3 - 3 * u2 + 1) * a.X + (u3 - 2 * u2 + u) * h * a.tangent + (3 * u2 - 2 * u3) * b.X + (u3 - u2) * h * b.tangent;
  }

  template <class Value, class Slope, class Close>
  BoundaryPoint find(double target, Value&& value, Slope&& slope, Close&& close, const std::string& what, std::optional<double> fold) const {
    const auto folded = [&] {
      return NotConverged(fmt::format("{} point at {}: by the model the line folds back on itself up to {:.6g} K and {:.6g} Pa; the liquid would split into two liquids, which is not solved", name(),
                                      what, std::exp(fold_->log_temperature), std::exp(fold_->log_pressure)));
    };
    if (fold && target <= *fold) throw folded();
    if (target < value(nodes_.front()))
      throw NotConverged(fmt::format("{} point at {}: the line was followed from {:.3f} K, {:.4g} Pa upward only{}", name(), what, coldest(),
                                     std::exp(nodes_.front().log_p), cold_end_.empty() ? "" : "; " + cold_end_));
    for (std::size_t k = 0; k + 1 < nodes_.size(); ++k) {
      const Node &a = nodes_[k], &b = nodes_[k + 1];
      const double fa = value(a), fb = value(b);
      if (!(std::min(fa, fb) <= target && target <= std::max(fa, fb))) continue;
      // the queried quantity as a cubic of arclength, solved for its parameter
      const double h = b.s - a.s;
      const auto cubic = [&](double u) {
        const double u2 = u * u, u3 = u2 * u;
        return (2 * u3 - 3 * u2 + 1) * fa + (u3 - 2 * u2 + u) * h * slope(a) + (3 * u2 - 2 * u3) * fb + (u3 - u2) * h * slope(b) - target;
      };
      const auto root = numeric::bracketed_root(cubic, 0.0, 1.0, fa - target, fb - target, 1e-12);
      if (const auto point = solve_near(interpolate(a, b, root.x), (b.X - a.X).norm(), close)) {
        // past the fold in one quantity is not enough: the same point asked for by the other must not be refused
        if (fold_ && (std::log(point->temperature) <= fold_->log_temperature || std::log(point->pressure) <= fold_->log_pressure)) throw folded();
        return *point;
      }
      throw NotConverged(fmt::format("{} point at {}: Newton left the traced line", name(), what));
    }
    // between the last node and the critical point
    const Node& b = nodes_.back();
    if (critical_ && slope(b) > 0) {
      const double beyond = (target - value(b)) / slope(b);
      const double room = system_.gap(b.X) / (b.tangent.cwiseAbs().maxCoeff());
      if (beyond < room) {
        if (const auto point = solve_near(b.X + beyond * b.tangent, beyond, close)) return *point;
        throw NotConverged(fmt::format("{} point at {}: the two phases cannot be told apart this near to the critical point at {:.6g} K, {:.6g} MPa", name(), what,
                                       critical_->temperature, critical_->pressure / 1e6));
      }
    }
    std::string top = fmt::format("the {} line ends at {:.3f} K and has its highest pressure, {:.4f} MPa, on the way", name(), hottest(), highest_pressure() / 1e6);
    if (critical_) top += fmt::format("; critical point {:.3f} K, {:.4f} MPa", critical_->temperature, critical_->pressure / 1e6);
    if (!hot_end_.empty()) throw NotConverged(fmt::format("{} point at {}: {}; {}", name(), what, top, hot_end_));
    throw NoSolution(fmt::format("no {} point at {}: {}", name(), what, top));
  }

  template <class Close>
  std::optional<BoundaryPoint> solve_near(const Vec& guess, double segment, Close&& close) const {
    const auto r = system_.solve(guess, close);
    if (!r) return std::nullopt;
    const auto& [X, v] = *r;
    if ((X - guess).norm() > 0.25 * segment + 1e-6) return std::nullopt;
    const auto n = system_.components();
    if (system_.gap(X) < 1e-5) return std::nullopt;
    if (!system_.locally_stable(X))
      throw NotConverged(fmt::format("{} point at {:.6g} K: by the model one of the phases is not stable; it would split into two liquids, which is not solved", name(), std::exp(X[n + 1])));
    return BoundaryPoint{std::exp(X[n + 1]), std::exp(v.log_pressure), std::exp(X[0]), X.segment(1, n).array().exp(), v.fugacity_mismatch};
  }

  EquilibriumSystem system_;
  Line line_;
  std::vector<Node> nodes_;
  std::optional<CriticalState> critical_;
  std::optional<Fold> fold_;
  std::string hot_end_, cold_end_;
};

}  // namespace zeotrope::phase
