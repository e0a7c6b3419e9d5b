#pragma once

#include <Eigen/Dense>
#include <cmath>
#include <complex>
#include <optional>

#include "zeotrope/equation/mixture.hpp"

namespace zeotrope::phase {

struct CriticalState {
  double temperature, pressure, density;  ///< K, Pa, mol/m3
};

/// Criticality of a mixture at (T, rho, x): least eigenvalue of the scaled Hessian of the Helmholtz energy density,
/// and the third derivative along its eigenvector. Both vanish in a critical point.
/// R. A. Heidemann and A. M. Khalil, AIChE J. 26 (1980) 769, in partial densities as in I. H. Bell and A. Jaeger,
/// Fluid Phase Equilib. 433 (2017) 159. The third derivative is taken by a complex step (exact to rounding).
inline Eigen::Vector2d criticality(const equation::MultiFluid& model, double temperature, double density, const Eigen::VectorXd& x) {
  using Complex = std::complex<double>;
  const Eigen::VectorXd rho = density * x;
  const Eigen::VectorXd root = rho.array().sqrt();
  const auto psi = model.helmholtz_density<double>(temperature, rho);
  Eigen::MatrixXd scaled = root.asDiagonal() * psi.hessian * root.asDiagonal();
  scaled.diagonal().array() += 1;
  const Eigen::SelfAdjointEigenSolver<Eigen::MatrixXd> eigen(scaled);
  Eigen::VectorXd v = eigen.eigenvectors().col(0);
  if (v.sum() < 0) v = -v;
  const Eigen::VectorXd u = root.cwiseProduct(v);
  constexpr double h = 1e-30;
  const equation::Vector<Complex> moved = rho.cast<Complex>() + Complex(0, h) * u.cast<Complex>();
  const auto at = model.helmholtz_density<Complex>(Complex(temperature), moved);
  const Complex along = u.cast<Complex>().dot(at.hessian * u.cast<Complex>());
  const double ideal = -(u.array().cube() / rho.array().square()).sum();
  return {eigen.eigenvalues()[0], along.imag() / h + ideal};
}

/// Critical point of a mixture by Newton in (ln T, ln rho) from a near guess. Nothing where it does not settle.
inline std::optional<CriticalState> critical_point(const equation::MultiFluid& model, const Eigen::VectorXd& x, double temperature, double density) {
  Eigen::Vector2d X(std::log(temperature), std::log(density));
  const auto f = [&](const Eigen::Vector2d& y) { return criticality(model, std::exp(y[0]), std::exp(y[1]), x); };
  for (int step = 0; step < 40; ++step) {
    const Eigen::Vector2d F = f(X);
    Eigen::Matrix2d J;
    for (int k = 0; k < 2; ++k) {
      constexpr double h = 1e-6;
      Eigen::Vector2d a = X, b = X;
      a[k] += h;
      b[k] -= h;
      J.col(k) = (f(a) - f(b)) / (2 * h);
    }
    const Eigen::Vector2d d = J.partialPivLu().solve(-F);
    if (!d.allFinite()) return std::nullopt;
    const double size = d.cwiseAbs().maxCoeff();
    X += d * std::min(1.0, 0.05 / size);
    if (size < 1e-10) {
      const double T = std::exp(X[0]), rho = std::exp(X[1]);
      const auto a = model.residual<double>(T, rho, x);
      return CriticalState{T, rho * model.gas_constant() * T * (1 + a(1, 0)), rho};
    }
  }
  return std::nullopt;
}

}  // namespace zeotrope::phase
