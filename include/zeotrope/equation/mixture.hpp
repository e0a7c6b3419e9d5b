#pragma once

#include <Eigen/Core>
#include <cmath>
#include <cstddef>
#include <utility>
#include <vector>

#include "zeotrope/data/records.hpp"
#include "zeotrope/equation/derivatives.hpp"
#include "zeotrope/equation/residual.hpp"

namespace zeotrope::equation {

template <class S>
using Vector = Eigen::Matrix<S, Eigen::Dynamic, 1>;
template <class S>
using Matrix = Eigen::Matrix<S, Eigen::Dynamic, Eigen::Dynamic>;

/// CODATA 2018 (exact since the revision of the SI), used for every blend.
inline constexpr double molar_gas_constant = 8.31446261815324;

/// Residual Helmholtz energy density over R T, Psi = rho alpha_r (mol/m3), as a function of temperature and the
/// partial densities rho_i, with its derivatives. All of phase equilibrium follows from it:
///   ln(f_i/(R T)) = ln rho_i + gradient_i          (f_i/(R T) in mol/m3)
///   p/(R T)       = rho + sum rho_i gradient_i - Psi
/// U. K. Deiters, Fluid Phase Equilib. 447 (2017) 72; I. H. Bell and U. K. Deiters, AIChE J. 64 (2018) 2745.
template <class S>
struct HelmholtzDensity {
  S value;
  Vector<S> gradient;               ///< dPsi/drho_i
  Matrix<S> hessian;                ///< d2Psi/drho_i drho_j, m3/mol
  S temperature_derivative;         ///< dPsi/dT at fixed rho_i
  Vector<S> gradient_temperature;   ///< d2Psi/drho_i dT
};

/// Parameters of one pair, Kunz and Wagner 2012 eqs. 16 and 17; `departure` may be null.
struct PairTerms {
  double beta_T = 1, gamma_T = 1, beta_v = 1, gamma_v = 1, F = 0;
  const data::Terms* departure = nullptr;
};

/// The multi-fluid Helmholtz model (O. Kunz and W. Wagner, J. Chem. Eng. Data 57 (2012) 3032; E. W. Lemmon and
/// R. T Jacobsen, J. Phys. Chem. Ref. Data 33 (2004) 593, is the special case beta = 1):
///   alpha_r = sum x_i alpha_i(tau, delta) + sum_{i<j} x_i x_j F_ij alpha_ij(tau, delta),
///   tau = Tr(x)/T, delta = rho/rho_r(x).
/// With one component it is that pure equation exactly. Refers to term records that must outlive it.
class MultiFluid {
 public:
  struct Component {
    const data::Terms* residual;
    double reducing_temperature;  ///< K
    double reducing_density;      ///< mol/m3
  };

  /// `pairs` holds (i, j), i < j, row by row: (0,1), (0,2), ..., (1,2), ...
  MultiFluid(double gas_constant, std::vector<Component> components, std::vector<PairTerms> pairs)
      : gas_constant_(gas_constant), components_(std::move(components)), pairs_(std::move(pairs)) {
    const auto n = components_.size();
    for (std::size_t i = 0, k = 0; i < n; ++i)
      for (std::size_t j = i + 1; j < n; ++j, ++k) {
        const auto& a = components_[i];
        const auto& b = components_[j];
        const double cube_roots = std::cbrt(1 / a.reducing_density) + std::cbrt(1 / b.reducing_density);
        temperature_.push_back({2 * pairs_[k].beta_T * pairs_[k].gamma_T * std::sqrt(a.reducing_temperature * b.reducing_temperature), pairs_[k].beta_T});
        volume_.push_back({2 * pairs_[k].beta_v * pairs_[k].gamma_v * cube_roots * cube_roots * cube_roots / 8, pairs_[k].beta_v});
      }
  }

  std::size_t size() const { return components_.size(); }
  double gas_constant() const { return gas_constant_; }

  /// Tr(x), K. x sums to one.
  template <class S>
  S reducing_temperature(const Vector<S>& x) const {
    return quadratic<S>(x, [this](std::size_t i) { return components_[i].reducing_temperature; }, temperature_).value;
  }
  /// rho_r(x), mol/m3
  template <class S>
  S reducing_density(const Vector<S>& x) const {
    return S(1) / quadratic<S>(x, [this](std::size_t i) { return 1 / components_[i].reducing_density; }, volume_).value;
  }

  /// alpha_r at fixed composition with scaled derivatives in delta and tau.
  template <class S>
  Derivatives<S> residual(const S& temperature, const S& density, const Vector<S>& x) const {
    if (size() == 1) {
      const auto& c = components_[0];
      return evaluate<S>(*c.residual, S(c.reducing_temperature / temperature), S(density / c.reducing_density));
    }
    const S tau = reducing_temperature<S>(x) / temperature;
    const S delta = density / reducing_density<S>(x);
    Derivatives<S> sum;
    for (std::size_t i = 0; i < size(); ++i) sum.add(x[at(i)], evaluate<S>(*components_[i].residual, tau, delta));
    for_departures([&](std::size_t i, std::size_t j, const PairTerms& pair) {
      sum.add(x[at(i)] * x[at(j)] * pair.F, evaluate<S>(*pair.departure, tau, delta));
    });
    return sum;
  }

  /// Psi and its derivatives at partial densities rho_i > 0, mol/m3.
  ///
  /// The reducing functions are homogeneous of degree 2 in their formula, so Tr(x) = Y(rho)/rho^2 and
  /// 1/rho_r(x) = V(rho)/rho^2 with Y, V the same formula in the partial densities; the chain rule is
  /// then taken in ln tau and ln delta.
  template <class S>
  HelmholtzDensity<S> helmholtz_density(const S& temperature, const Vector<S>& rho) const {
    const auto n = size();
    const S total = rho.sum();
    const auto Y = quadratic<S>(rho, [this](std::size_t i) { return components_[i].reducing_temperature; }, temperature_);
    const auto V = quadratic<S>(rho, [this](std::size_t i) { return 1 / components_[i].reducing_density; }, volume_);
    const S tau = Y.value / (total * total * temperature);
    const S delta = V.value / total;
    // first and second derivatives of ln tau and ln delta by rho_i
    const Vector<S> t = (Y.gradient / Y.value).array() - 2. / total;
    const Vector<S> d = (V.gradient / V.value).array() - 1. / total;
    const Matrix<S> tt = (Y.hessian / Y.value - Y.gradient * Y.gradient.transpose() / (Y.value * Y.value)).array() + 2. / (total * total);
    const Matrix<S> dd = (V.hessian / V.value - V.gradient * V.gradient.transpose() / (V.value * V.value)).array() + 1. / (total * total);

    HelmholtzDensity<S> psi;
    psi.value = S(0);
    psi.gradient = Vector<S>::Zero(at(n));
    psi.hessian = Matrix<S>::Zero(at(n), at(n));
    // sums over functions f_k(tau, delta) with weights w_k(rho); indices mark derivatives by ln delta, ln tau
    S sum_d{0}, sum_t{0}, sum_dd{0}, sum_dt{0}, sum_tt{0};
    Vector<S> weighted_t = Vector<S>::Zero(at(n));  // sum_k dw_k/drho_i f_k,t
    const auto add = [&](const S& w, const Vector<S>& w_i, const Derivatives<S>& f) {
      const S f_d = f(1, 0), f_t = f(0, 1);
      psi.value += w * f(0, 0);
      sum_d += w * f_d;
      sum_t += w * f_t;
      sum_dd += w * (f(2, 0) + f_d);
      sum_dt += w * f(1, 1);
      sum_tt += w * (f(0, 2) + f_t);
      psi.gradient += w_i * f(0, 0);
      weighted_t += w_i * f_t;
      const Vector<S> along = f_d * d + f_t * t;
      psi.hessian += w_i * along.transpose() + along * w_i.transpose();
    };
    for (std::size_t k = 0; k < n; ++k) add(rho[at(k)], Vector<S>::Unit(at(n), at(k)), evaluate<S>(*components_[k].residual, tau, delta));
    for_departures([&](std::size_t i, std::size_t j, const PairTerms& pair) {
      // w = F rho_i rho_j / rho
      const S a = rho[at(i)], b = rho[at(j)];
      const S w = pair.F * a * b / total;
      Vector<S> w_i = Vector<S>::Constant(at(n), -w / total);
      w_i[at(i)] += pair.F * b / total;
      w_i[at(j)] += pair.F * a / total;
      const auto f = evaluate<S>(*pair.departure, tau, delta);
      add(w, w_i, f);
      Matrix<S> w_ij = Matrix<S>::Constant(at(n), at(n), 2. * w / (total * total));
      const S ra = pair.F * a / (total * total), rb = pair.F * b / (total * total);
      w_ij.row(at(i)).array() -= rb;
      w_ij.col(at(i)).array() -= rb;
      w_ij.row(at(j)).array() -= ra;
      w_ij.col(at(j)).array() -= ra;
      w_ij(at(i), at(j)) += pair.F / total;
      w_ij(at(j), at(i)) += pair.F / total;
      psi.hessian += f(0, 0) * w_ij;
    });
    psi.gradient += sum_d * d + sum_t * t;
    psi.hessian += sum_d * dd + sum_t * tt + sum_dd * (d * d.transpose()) + sum_dt * (d * t.transpose() + t * d.transpose()) + sum_tt * (t * t.transpose());
    // d ln tau / dT = -1/T at fixed rho_i
    psi.temperature_derivative = -sum_t / temperature;
    psi.gradient_temperature = (weighted_t + sum_dt * d + sum_tt * t) / -temperature;
    return psi;
  }

 private:
  struct Mix {
    double factor;  ///< 2 beta gamma times the combined pure values
    double beta;
  };
  template <class S>
  struct Quadratic {
    S value;
    Vector<S> gradient;
    Matrix<S> hessian;
  };

  static constexpr Eigen::Index at(std::size_t i) { return static_cast<Eigen::Index>(i); }

  /// sum x_i^2 y_i + sum_{i<j} factor x_i x_j (x_i + x_j)/(beta^2 x_i + x_j), x free (not normalised)
  template <class S, class PureValue>
  Quadratic<S> quadratic(const Vector<S>& x, PureValue&& pure, const std::vector<Mix>& mix) const {
    const auto n = size();
    Quadratic<S> q{S(0), Vector<S>::Zero(at(n)), Matrix<S>::Zero(at(n), at(n))};
    for (std::size_t i = 0, k = 0; i < n; ++i) {
      const S xi = x[at(i)];
      const double y = pure(i);
      q.value += xi * xi * y;
      q.gradient[at(i)] += 2. * xi * y;
      q.hessian(at(i), at(i)) += 2. * y;
      for (std::size_t j = i + 1; j < n; ++j, ++k) {
        const S xj = x[at(j)];
        const auto [c, beta] = mix[k];
        const double b2 = beta * beta;
        if (b2 == 1.0) {  // c x_i x_j
          q.value += c * xi * xj;
          q.gradient[at(i)] += c * xj;
          q.gradient[at(j)] += c * xi;
          q.hessian(at(i), at(j)) += c;
          q.hessian(at(j), at(i)) += c;
          continue;
        }
        // c u/v, u = xi^2 xj + xi xj^2, v = b2 xi + xj
        const S u = xi * xj * (xi + xj), v = b2 * xi + xj;
        const S u_i = xj * (2. * xi + xj), u_j = xi * (xi + 2. * xj);
        const S g = u / v;
        const S g_i = (u_i - b2 * g) / v, g_j = (u_j - g) / v;
        q.value += c * g;
        q.gradient[at(i)] += c * g_i;
        q.gradient[at(j)] += c * g_j;
        q.hessian(at(i), at(i)) += c * (2. * xj - 2. * b2 * g_i) / v;
        q.hessian(at(j), at(j)) += c * (2. * xi - 2. * g_j) / v;
        const S mixed = c * (2. * (xi + xj) - b2 * g_j - g_i) / v;
        q.hessian(at(i), at(j)) += mixed;
        q.hessian(at(j), at(i)) += mixed;
      }
    }
    return q;
  }

  template <class F>
  void for_departures(F&& f) const {
    for (std::size_t i = 0, k = 0; i < size(); ++i)
      for (std::size_t j = i + 1; j < size(); ++j, ++k)
        if (pairs_[k].departure != nullptr && pairs_[k].F != 0) f(i, j, pairs_[k]);
  }

  double gas_constant_;
  std::vector<Component> components_;
  std::vector<PairTerms> pairs_;
  std::vector<Mix> temperature_, volume_;
};

}  // namespace zeotrope::equation
