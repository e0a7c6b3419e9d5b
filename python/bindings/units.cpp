#include "zeotrope/units.hpp"

#include <string>

#include "bindings.hpp"

namespace zeotrope::python {

void bind_units(py::module_& m) {
  using namespace py::literals;
  constexpr double sea_level = units::standard_atmosphere;
  m.attr("standard_atmosphere") = sea_level;
  m.def(
      "to_pascal", [](double value, const std::string& unit, double ambient) { return units::to_pascal(value, units::parse_pressure_unit(unit), ambient); },
      "value"_a, "unit"_a, "ambient"_a = sea_level,
      "Value in a pressure unit (\"psig\", \"bar(a)\", \"inHg vac\" ...) -> absolute Pa.\n\n"
      "`ambient` is the pressure of the surrounding air, Pa; gauge and vacuum units are measured from it.\n"
      "BadInput for an unknown unit, or where the result is below 0 Pa.");
  m.def(
      "from_pascal",
      [](double pascal, const std::string& unit, double ambient) { return units::from_pascal(pascal, units::parse_pressure_unit(unit), ambient); }, "pascal"_a,
      "unit"_a, "ambient"_a = sea_level, "Absolute Pa -> value in a pressure unit; see to_pascal.");
  m.def(
      "to_kelvin", [](double value, const std::string& unit) { return units::to_kelvin(value, units::parse_temperature_unit(unit)); }, "value"_a, "unit"_a,
      "Value in \"K\", \"C\" or \"F\" -> K. BadInput where the result is not above 0 K.");
  m.def(
      "from_kelvin", [](double kelvin, const std::string& unit) { return units::from_kelvin(kelvin, units::parse_temperature_unit(unit)); }, "kelvin"_a,
      "unit"_a, "K -> value in \"K\", \"C\" or \"F\".");
  m.def("atmosphere_at_altitude", &units::atmosphere_at_altitude, "metres"_a,
        "Pressure of the standard atmosphere at an altitude of -1000 m to 11000 m, Pa (ISO 2533). BadInput outside.");
  m.def(
      "parse_pressure", [](const std::string& text, double ambient) { return units::parse_pressure(text, ambient); }, "text"_a, "ambient"_a = sea_level,
      "\"118 psig\", \"-0.35 bar(g)\" -> absolute Pa. BadInput where the unit does not say gauge or absolute.");
  m.def(
      "parse_temperature", [](const std::string& text) { return units::parse_temperature(text); }, "text"_a, "\"21.5 C\", \"-40 F\", \"293.15 K\" -> K.");
}

}  // namespace zeotrope::python
