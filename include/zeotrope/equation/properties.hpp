#pragma once

#include <cmath>
#include <vector>

#include "zeotrope/equation/ideal_gas.hpp"
#include "zeotrope/equation/mixture.hpp"

namespace zeotrope::equation {

/// Single-phase properties at (T, rho, x), molar; R. Span, Multiparameter Equations of State (2000), Table 3.8.
struct MolarProperties {
  double pressure;                 ///< Pa
  double enthalpy;                 ///< J/mol
  double entropy;                  ///< J/(mol K)
  double isochoric_heat_capacity;  ///< J/(mol K)
  double isobaric_heat_capacity;   ///< J/(mol K)
  double speed_of_sound;           ///< m/s
  double pressure_slope;           ///< (dp/drho)_T, Pa m3/mol
};

/// Enthalpy and entropy without the constants of a reference state: those of the ideal gas are integrals from
/// an arbitrary origin, entropy relative to 1 mol/m3 of every component, mixing included.
/// `gases` holds one ideal-gas part per component; molar mass in kg/mol. Heat capacities and speed of sound are
/// those of the formula; mechanically unstable states give a speed of sound of zero.
inline MolarProperties properties(const MultiFluid& model, const std::vector<const data::IdealGas*>& gases, double temperature, double density,
                                  const Vector<double>& x, double molar_mass) {
  const double R = model.gas_constant();
  const auto a = model.residual<double>(temperature, density, x);
  double cp0 = 0, h0 = 0, s0 = 0;  // over R
  for (std::size_t i = 0; i < gases.size(); ++i) {
    const double xi = x[static_cast<Eigen::Index>(i)];
    if (xi == 0) continue;
    const auto gas = evaluate<double>(*gases[i], temperature);
    cp0 += xi * gas.heat_capacity;
    h0 += xi * gas.enthalpy;
    s0 += xi * (gas.entropy - std::log(temperature) - std::log(xi * density));
  }
  MolarProperties m{};
  const double slope = 1 + 2 * a(1, 0) + a(2, 0);
  m.pressure = density * R * temperature * (1 + a(1, 0));
  m.pressure_slope = R * temperature * slope;
  m.enthalpy = R * (h0 + temperature * (a(0, 1) + a(1, 0)));
  m.entropy = R * (s0 + a(0, 1) - a(0, 0));
  const double cv = cp0 - 1 - a(0, 2);
  const double coupling = 1 + a(1, 0) - a(1, 1);
  m.isochoric_heat_capacity = R * cv;
  m.isobaric_heat_capacity = R * (cv + coupling * coupling / slope);
  const double w2 = R * temperature / molar_mass * (slope + coupling * coupling / cv);
  m.speed_of_sound = w2 > 0 ? std::sqrt(w2) : 0.0;
  return m;
}

}  // namespace zeotrope::equation
