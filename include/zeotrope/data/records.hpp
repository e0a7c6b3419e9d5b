#pragma once

#include <array>
#include <optional>
#include <string>
#include <vector>

/// Plain records of what the coefficient files say; units and key names as in fluids/README.md.
namespace zeotrope::data {

template <std::size_t N>
using Rows = std::vector<std::array<double, N>>;

/// cp0/R = constant + sum c T^t + sum v (u/T)^2 exp(u/T) / (exp(u/T) - 1)^2
struct IdealGas {
  std::string source;
  double constant = 0;
  Rows<2> power;     ///< [c, t]
  Rows<2> einstein;  ///< [v, u in K]
};

/// Terms of a residual or departure function; the columns of each kind are in equation/terms.hpp.
struct Terms {
  Rows<3> power;
  Rows<4> exponential;
  Rows<5> scaled_exponential;
  Rows<5> tau_exponential;
  Rows<7> gaussian;
  Rows<8> reciprocal_gaussian;
  Rows<7> delta_gaussian;
  Rows<8> critical_region;

  bool empty() const {
    return power.empty() && exponential.empty() && scaled_exponential.empty() && tau_exponential.empty() &&
           gaussian.empty() && reciprocal_gaussian.empty() && delta_gaussian.empty() && critical_region.empty();
  }
};

/// Raw constants of a 32-term modified Benedict-Webb-Rubin equation, kept for reading beside the paper.
struct Mbwr {
  std::string units;
  double gas_constant = 0;
  double critical_density = 0;
  std::optional<double> gamma;
  std::vector<double> b;
};

struct CriticalPoint {
  double temperature = 0;  ///< K
  double pressure = 0;     ///< Pa
  double density = 0;      ///< mol/m3
};

/// Published single-phase state; molar units, absent figures were not published or not recalled.
struct CheckState {
  std::string source, note;
  double temperature = 0, density = 0;
  std::optional<double> pressure, isochoric_heat_capacity, isobaric_heat_capacity, speed_of_sound;
  double within = 0;  ///< relative agreement to expect
};

/// Published saturation state; densities in kg/m3.
struct CheckSaturation {
  std::string source, note;
  double temperature = 0;
  std::optional<double> pressure, liquid_density, vapour_density;
  double within = 0;
};

/// A fundamental equation explicit in the Helmholtz energy.
struct Equation {
  std::string name, source, provenance;
  double molar_mass = 0;    ///< kg/mol
  double gas_constant = 0;  ///< J/(mol K)
  double reducing_temperature = 0, reducing_density = 0;
  CriticalPoint critical_point;  ///< as the paper states it
  std::optional<double> triple_point_temperature;
  std::array<double, 2> temperature_range{};
  double maximum_pressure = 0;
  IdealGas ideal_gas;
  Terms residual;
  std::optional<Mbwr> mbwr;
  std::vector<CheckState> check_states;
  std::vector<CheckSaturation> check_saturations;
};

struct Safety {
  std::string source, group;
  std::optional<double> lfl_volume_percent, lfl_kg_m3, burning_velocity_cm_s, oel_ppm, atel_ppm, rcl_ppm, rcl_g_m3;
  bool oel_is_ceiling = false;
};

/// One figure of an assessment report; `below`: printed there as "<1".
struct Gwp {
  double value = 0;
  bool below = false;
  std::string source;
};

struct Environment {
  std::optional<double> odp_montreal, odp_wmo;
  std::optional<Gwp> ar4, ar5, ar6, eu_2024_573;
};

/// Constants of the compound for start values and cubic equations; absent where not known.
struct Constants {
  std::string source;
  std::optional<double> critical_temperature, critical_pressure, critical_density, triple_point_temperature,
      acentric_factor, normal_boiling_point, normal_boiling_point_celsius;
};

struct Compound {
  std::string designation, chemical_name, formula, cas, series, note, file;
  double molar_mass = 0;
  bool in_ashrae_34 = false;
  std::vector<std::string> aliases;
  std::vector<std::string> uncertain;
  std::optional<Safety> safety;
  Environment environment;
  Constants constants;
  std::optional<IdealGas> ideal_gas;  ///< only where no equation carries its own
  std::vector<Equation> equations;    ///< the first is the default
};

enum class PairKind { published, fitted, fitted_weak, estimated, rule };

/// Binary parameters of the reducing functions, Kunz and Wagner 2012. `first` is i, `second` is j.
struct Pair {
  std::string first, second;
  double beta_T = 1, gamma_T = 1, beta_v = 1, gamma_v = 1, F = 0;
  std::string departure;  ///< empty: none
  PairKind kind = PairKind::estimated;
  std::optional<double> gamma_T_uncertainty;
  std::optional<double> zeta, xi;  ///< Lemmon and Jacobsen's form, K and dm3/mol, where the paper gives it
  std::string source, provenance;
};

struct Departure {
  std::string name, source;
  Terms terms;
};

/// What stands in for a pair without a row.
struct Estimation {
  double beta_T = 1, beta_v = 1, gamma_T = 1, F = 0;
  std::string gamma_v_rule, published_rules;
  /// gamma_T for a pair of one member of `first` and one of `second`: classes of compound (equation/pair_rule.hpp)
  /// or designations. The first row that fits is taken.
  struct Class {
    std::string what;
    std::vector<std::string> first, second;
    double gamma_T, spread;
  };
  std::vector<Class> classes;
};

struct Blend {
  std::string designation, series, safety_group, note, source;
  std::vector<std::string> components;
  std::vector<double> mass_percent, tolerance_plus, tolerance_minus;
  std::optional<double> normal_bubble_point_celsius, normal_dew_point_celsius, molar_mass,
      azeotropic_temperature_celsius;
  std::vector<std::string> uncertain;
};

struct Caution {
  std::string name, topic, when, short_text, text;
};

}  // namespace zeotrope::data
