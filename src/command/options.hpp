#pragma once

#include <CLI/CLI.hpp>
#include <string>
#include <string_view>
#include <vector>

#include "zeotrope/refrigerant.hpp"
#include "zeotrope/units.hpp"

namespace zeotrope::command {

/// REFRIGERANT in one or several words, and how the figures of a recipe are meant.
struct RefrigerantChoice {
  std::vector<std::string> words;
  bool mole = false, normalise = false;

  void add_to(CLI::App& app);
  Refrigerant make(const data::Catalogue& catalogue) const;
};

/// Pressure of the air around the gauge.
struct Ambient {
  double pascal = units::standard_atmosphere;
  std::string note = "sea level, 101.325 kPa";
};

struct AmbientChoice {
  std::string altitude, barometer;

  void add_to(CLI::App& app);
  Ambient resolve() const;
};

struct UnitChoice {
  std::string temperature;
  std::vector<std::string> pressure;

  /// `note`: what holds where an option is left out, for the help.
  void add_to(CLI::App& app, const std::string& temperature_note, const std::string& pressure_note);
  units::Temperature temperature_or(units::Temperature otherwise) const;
  std::vector<units::Pressure> pressure_or(std::vector<units::Pressure> otherwise) const;
};

/// End of a help text: the pressure units there are.
std::string pressure_units_line();

/// A figure as it was typed; its unit is also the one in which answers are given.
struct EnteredPressure {
  double pascal;  ///< absolute
  units::Pressure unit;
};
struct EnteredTemperature {
  double kelvin;
  units::Temperature unit;
};

/// `option` is named in the message of a BadInput.
EnteredPressure entered_pressure(const std::string& option, std::string_view text, double ambient);
EnteredTemperature entered_temperature(const std::string& option, std::string_view text);
/// A number without unit; `wanted` says of what.
double entered_number(const std::string& option, std::string_view text, const std::string& wanted);

}  // namespace zeotrope::command
