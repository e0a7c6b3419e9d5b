#pragma once

#include <array>
#include <cmath>
#include <string>
#include <string_view>

#include "zeotrope/error.hpp"

/// Units at the edge. Inside, everything is SI (K, Pa); gauge, vacuum, altitude and customary units
/// are met here and nowhere else.
namespace zeotrope::units {

/// Standard atmosphere, Pa (exact, 10th CGPM 1954).
inline constexpr double standard_atmosphere = 101325.0;
/// Pound-force per square inch, Pa: lb 0.45359237 kg, g 9.80665 m/s2, inch 0.0254 m (all exact).
inline constexpr double psi = 0.45359237 * 9.80665 / (0.0254 * 0.0254);
/// Conventional inch of mercury at 0 C, Pa (NIST SP 811, appendix B).
inline constexpr double inch_of_mercury = 3386.389;
/// Kilogram-force per square centimetre, Pa (exact).
inline constexpr double kgf_per_cm2 = 98066.5;

enum class Pressure { pascal, psig, psia, bar_gauge, bar_absolute, kpa_gauge, kpa_absolute, mpa_absolute, kgf_cm2_gauge, inhg_vacuum };
enum class Temperature { kelvin, celsius, fahrenheit };

/// How a pressure unit is read and shown. `spellings` are what the parser takes, folded to lower case without blanks.
struct PressureUnit {
  Pressure id;
  std::string_view label;  ///< printed with every figure; says gauge or absolute
  double pascals;          ///< size of the unit, Pa
  bool gauge;              ///< zero at the ambient pressure
  std::array<std::string_view, 4> spellings;
};

inline constexpr std::array<PressureUnit, 10> pressure_units{{
    {Pressure::psig, "psig", psi, true, {"psig", "psi(g)", "", ""}},
    {Pressure::psia, "psia", psi, false, {"psia", "psi(a)", "psiabs", ""}},
    {Pressure::bar_gauge, "bar(g)", 1e5, true, {"bar(g)", "barg", "bargauge", ""}},
    {Pressure::bar_absolute, "bar(a)", 1e5, false, {"bar(a)", "bara", "barabs", ""}},
    {Pressure::kpa_gauge, "kPa(g)", 1e3, true, {"kpa(g)", "kpag", "kpagauge", ""}},
    {Pressure::kpa_absolute, "kPa(a)", 1e3, false, {"kpa(a)", "kpaa", "kpaabs", "kpa"}},
    {Pressure::mpa_absolute, "MPa(a)", 1e6, false, {"mpa(a)", "mpaa", "mpaabs", "mpa"}},
    {Pressure::kgf_cm2_gauge, "kgf/cm2(g)", kgf_per_cm2, true, {"kgf/cm2(g)", "kgf/cm2g", "kgf/cm2", ""}},
    {Pressure::inhg_vacuum, "inHg vac", inch_of_mercury, true, {"inhgvac", "inhgvacuum", "inhg", ""}},
    {Pressure::pascal, "Pa(a)", 1.0, false, {"pa", "pa(a)", "paa", "paabs"}},
}};

inline const PressureUnit& unit(Pressure id) {
  for (const auto& u : pressure_units)
    if (u.id == id) return u;
  throw BadInput("pressure unit: unknown enumerator");
}

inline std::string_view label(Temperature u) {
  switch (u) {
    case Temperature::kelvin: return "K";
    case Temperature::celsius: return "\u00b0C";
    case Temperature::fahrenheit: return "\u00b0F";
  }
  throw BadInput("temperature unit: unknown enumerator");
}

/// Ambient pressure at an altitude in m: ICAO standard atmosphere (ISO 2533:1975), troposphere,
/// p = 101325 Pa (1 - 2.25577e-5 h)^5.25588. Valid from -1000 m to 11000 m, else BadInput.
double atmosphere_at_altitude(double metres);

/// Value in `u` -> absolute Pa; `ambient` is the pressure of the surrounding air, Pa.
/// inHg vacuum counts downward from ambient. BadInput where the result is below zero or not finite.
double to_pascal(double value, Pressure u, double ambient = standard_atmosphere);
/// Absolute Pa -> value in `u`.
double from_pascal(double pascal, Pressure u, double ambient = standard_atmosphere);

/// Value in `u` -> K. BadInput where the result is not above 0 K or not finite.
double to_kelvin(double value, Temperature u);
double from_kelvin(double kelvin, Temperature u);
/// A difference of temperatures (superheat, subcooling, glide) has no zero offset: K -> size in `u`.
double difference_from_kelvin(double kelvin, Temperature u);
double difference_to_kelvin(double value, Temperature u);

/// "psig", "bar(a)", "kPa" ... -> unit; BadInput lists what is known. Plain "psi" and "bar" are refused:
/// they do not say gauge or absolute.
Pressure parse_pressure_unit(std::string_view text);
/// "K", "C", "F", "degC", "degF" and with a degree sign.
Temperature parse_temperature_unit(std::string_view text);

/// "118 psig", "-0.35bar(g)", "12.5 inHg" -> absolute Pa.
double parse_pressure(std::string_view text, double ambient = standard_atmosphere);
/// "21.5C", "-40 F", "293.15 K" -> K.
double parse_temperature(std::string_view text);
/// "6 K", "10 F" as a difference -> K.
double parse_temperature_difference(std::string_view text);

}  // namespace zeotrope::units
