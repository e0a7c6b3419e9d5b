#pragma once

#include <cmath>
#include <utility>

#include "zeotrope/equation/mixture.hpp"

namespace zeotrope::phase {

/// One density on an isotherm at fixed composition, pressure and its derivatives over R T.
struct IsothermPoint {
  double density;   ///< mol/m3
  double pressure;  ///< p/(R T), mol/m3
  double slope;     ///< (dp/drho)/(R T)
  double curvature; ///< rho (d2p/drho2)/(R T)
  double log_fugacity;  ///< alpha_r + delta alpha_r_delta + ln rho = ln(f/(R T)) of a pure fluid
};

/// The isotherm of a model at a composition: density -> IsothermPoint.
class Isotherm {
 public:
  Isotherm(const equation::MultiFluid& model, double temperature, equation::Vector<double> x)
      : model_(&model), temperature_(temperature), x_(std::move(x)) {}

  double temperature() const { return temperature_; }
  double rt() const { return model_->gas_constant() * temperature_; }

  IsothermPoint operator()(double density) const {
    const auto a = model_->residual<double>(temperature_, density, x_);
    return {density, density * (1 + a(1, 0)), 1 + 2 * a(1, 0) + a(2, 0), 2 * a(1, 0) + 4 * a(2, 0) + a(3, 0),
            a(0, 0) + a(1, 0) + std::log(density)};
  }

 private:
  const equation::MultiFluid* model_;
  double temperature_;
  equation::Vector<double> x_;
};

}  // namespace zeotrope::phase
