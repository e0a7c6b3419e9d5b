#pragma once

#include <string>

#include "zeotrope/units.hpp"

namespace zeotrope::apply {

/// A pressure as a chart prints it, rounded once, half away from zero, from the full figure:
/// psig and psia one decimal below 100, whole above; bar and kgf/cm2 two decimals; kPa whole, one decimal below 100 kPa
/// absolute; MPa three decimals; inHg vacuum one decimal, a dash above ambient. In psig below ambient: inches of mercury vacuum, one decimal, in brackets.
std::string pressure_figure(double pascal, units::Pressure unit, double ambient);
/// Whether pressure_figure gives a bracketed vacuum figure.
bool is_vacuum_figure(double pascal, units::Pressure unit, double ambient);

/// A temperature or a difference with `decimals`, rounded half away from zero; never "-0".
std::string temperature_figure(double kelvin, units::Temperature unit, int decimals = 1);
std::string difference_figure(double kelvin, units::Temperature unit, int decimals = 1);
/// A round argument of a row without needless decimals: -40, 0.5, 12.25.
std::string argument_figure(double value);

}  // namespace zeotrope::apply
