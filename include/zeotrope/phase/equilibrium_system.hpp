#pragma once

#include <Eigen/Dense>
#include <cmath>
#include <optional>
#include <utility>

#include "zeotrope/equation/mixture.hpp"

namespace zeotrope::phase {

/// Equilibrium of a phase of fixed composition z (the feed) with an incipient phase, in the variables
///   X = (ln rho_feed, ln rho_1, ..., ln rho_N of the incipient phase, ln T),
/// N + 1 equations: ln f_i equal for every component, and p equal. One more condition (temperature, pressure, or
/// a plane across the curve) makes a point of the bubble or dew line of it.
/// U. K. Deiters, Fluid Phase Equilib. 447 (2017) 72 (isochoric form); derivatives are analytic.
class EquilibriumSystem {
 public:
  using Vec = Eigen::VectorXd;
  using Mat = Eigen::MatrixXd;

  EquilibriumSystem(const equation::MultiFluid& model, Vec z) : model_(&model), z_(std::move(z)) {}

  const equation::MultiFluid& model() const { return *model_; }
  const Vec& feed() const { return z_; }
  Eigen::Index components() const { return z_.size(); }

  struct Values {
    Vec residual;        ///< N fugacity equations, then the pressure equation over the lower density
    Mat jacobian;        ///< (N + 1) x (N + 2)
    double log_pressure; ///< of the less dense phase, Pa
    Vec log_pressure_gradient;
    double fugacity_mismatch;  ///< largest |ln f_i' - ln f_i''|
    double pressure_mismatch;  ///< |p' - p''| over what is allowed: 1e-10 p, plus the rounding of the denser phase's pressure
  };

  Values operator()(const Vec& X) const {
    const auto n = components();
    const double T = std::exp(X[n + 1]);
    const Vec r1 = z_ * std::exp(X[0]);
    const Vec r2 = X.segment(1, n).array().exp();
    const auto a = model_->helmholtz_density<double>(T, r1);
    const auto b = model_->helmholtz_density<double>(T, r2);
    const double p1 = r1.sum() + r1.dot(a.gradient) - a.value;  // p/(R T)
    const double p2 = r2.sum() + r2.dot(b.gradient) - b.value;
    const double scale = std::min(r1.sum(), r2.sum());
    // dp/(R T) by rho_k and by T
    const Vec p1_k = Vec::Ones(n) + a.hessian * r1, p2_k = Vec::Ones(n) + b.hessian * r2;
    const double p1_T = r1.dot(a.gradient_temperature) - a.temperature_derivative;
    const double p2_T = r2.dot(b.gradient_temperature) - b.temperature_derivative;

    Values v;
    v.residual.resize(n + 1);
    v.residual.head(n) = (r1.array().log() + a.gradient.array() - X.segment(1, n).array() - b.gradient.array()).matrix();
    v.residual[n] = (p1 - p2) / scale;
    v.jacobian = Mat::Zero(n + 1, n + 2);
    v.jacobian.col(0).head(n) = p1_k;  // 1 + sum_k H_ik rho_k, H symmetric
    v.jacobian.block(0, 1, n, n) = -(Mat::Identity(n, n) + b.hessian * r2.asDiagonal());
    v.jacobian.col(n + 1).head(n) = T * (a.gradient_temperature - b.gradient_temperature);
    v.jacobian(n, 0) = r1.dot(p1_k) / scale;
    v.jacobian.row(n).segment(1, n) = -(r2.array() * p2_k.array()).matrix().transpose() / scale;
    v.jacobian(n, n + 1) = T * (p1_T - p2_T) / scale;

    const bool feed_is_lighter = r1.sum() < r2.sum();
    const double p = feed_is_lighter ? p1 : p2;
    v.log_pressure = std::log(p * model_->gas_constant() * T);
    v.log_pressure_gradient = Vec::Zero(n + 2);
    if (feed_is_lighter) {
      v.log_pressure_gradient[0] = r1.dot(p1_k) / p;
      v.log_pressure_gradient[n + 1] = 1 + T * p1_T / p;
    } else {
      v.log_pressure_gradient.segment(1, n) = (r2.array() * p2_k.array()).matrix() / p;
      v.log_pressure_gradient[n + 1] = 1 + T * p2_T / p;
    }
    v.fugacity_mismatch = v.residual.head(n).cwiseAbs().maxCoeff();
    // a liquid's pressure is a small difference of large terms
    const double terms = std::max(r1.dot(Vec(a.gradient.cwiseAbs().array() + 1)), r2.dot(Vec(b.gradient.cwiseAbs().array() + 1)));
    v.pressure_mismatch = std::abs(p1 - p2) / (1e-10 * p + 1e-12 * terms);
    return v;
  }

  /// The last equation: row . X' = right-hand side, refreshed at every iterate.
  struct Condition {
    double residual;
    Vec row;
  };

  /// Newton from X with a closing condition (a function of X and Values). Steps are cut at 0.4 in any variable.
  /// Settled: the step is at rounding level, or no longer shrinks while small against the distance of the phases
  /// (near the critical point rounding is amplified by the inverse square of that distance).
  /// Nothing where it does not settle in 40 steps or the checks fail: fugacities equal to 1e-10, pressures as above.
  template <class Close>
  std::optional<std::pair<Vec, Values>> solve(Vec X, Close&& close) const {
    const auto n = components();
    Mat full(n + 2, n + 2);
    Vec right(n + 2);
    double last = 1;
    for (int step = 0; step < 40; ++step) {
      const Values v = (*this)(X);
      const Condition c = close(X, v);
      full.topRows(n + 1) = v.jacobian;
      full.row(n + 1) = c.row.transpose();
      right.head(n + 1) = -v.residual;
      right[n + 1] = -c.residual;
      if (!right.allFinite() || !full.allFinite()) return std::nullopt;
      const Vec dx = full.partialPivLu().solve(right);
      if (!dx.allFinite()) return std::nullopt;
      const double size = dx.cwiseAbs().maxCoeff();
      if (size < 1e-12 || (size > 0.3 * last && size < 1e-4 * gap(X))) {
        X += dx;
        Values settled = (*this)(X);
        if (std::isfinite(settled.log_pressure) && settled.fugacity_mismatch < 1e-10 && settled.pressure_mismatch < 1) return std::make_pair(X, std::move(settled));
        return std::nullopt;
      }
      last = size;
      X += dx * std::min(1.0, 0.4 / size);
    }
    return std::nullopt;
  }

  auto at_temperature(double T) const {
    return [n = components(), log_T = std::log(T)](const Vec& X, const Values&) {
      Condition c{X[n + 1] - log_T, Vec::Zero(n + 2)};
      c.row[n + 1] = 1;
      return c;
    };
  }
  auto at_pressure(double p) const {
    return [log_p = std::log(p)](const Vec&, const Values& v) { return Condition{v.log_pressure - log_p, v.log_pressure_gradient}; };
  }
  /// On the plane through `anchor` normal to `normal`.
  auto on_plane(const Vec& anchor, const Vec& normal) const {
    return [anchor, normal](const Vec& X, const Values&) { return Condition{normal.dot(X - anchor), normal}; };
  }

  /// Unit tangent of the solution curve, oriented along `ahead`.
  Vec tangent(const Values& v, const Vec& ahead) const {
    const auto n = components();
    Mat full(n + 2, n + 2);
    full.topRows(n + 1) = v.jacobian;
    full.row(n + 1) = ahead.transpose();
    const Vec t = full.partialPivLu().solve(Vec::Unit(n + 2, n + 1));
    return t / t.norm();
  }

  /// Whether both phases are stable against small changes of density and composition: the Hessian of the Helmholtz
  /// energy density is positive definite in each (scaled by the partial densities; rounding allowed for).
  bool locally_stable(const Vec& X) const {
    const auto n = components();
    const double T = std::exp(X[n + 1]);
    for (const Vec& rho : {Vec(z_ * std::exp(X[0])), Vec(X.segment(1, n).array().exp())}) {
      const Vec root = rho.array().sqrt();
      Mat scaled = root.asDiagonal() * model_->helmholtz_density<double>(T, rho).hessian * root.asDiagonal();
      scaled.diagonal().array() += 1;
      if (Eigen::SelfAdjointEigenSolver<Mat>(scaled, Eigen::EigenvaluesOnly).eigenvalues()[0] < -1e-9) return false;
    }
    return true;
  }

  /// Largest |ln(rho_i''/rho_i')|: 0 where the two phases are one.
  double gap(const Vec& X) const {
    return (X.segment(1, components()).array() - z_.array().log() - X[0]).abs().maxCoeff();
  }

 private:
  const equation::MultiFluid* model_;
  Vec z_;
};

}  // namespace zeotrope::phase
