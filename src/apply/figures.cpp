#include "zeotrope/apply/figures.hpp"

#include <fmt/format.h>

#include <cmath>

namespace zeotrope::apply {

namespace {

std::string rounded(double value, int decimals) {
  const double scale = std::pow(10.0, decimals);
  double r = std::round(value * scale) / scale;  // std::round: half away from zero
  if (r == 0) r = 0;                             // no "-0"
  return fmt::format("{:.{}f}", r, decimals);
}

}  // namespace

bool is_vacuum_figure(double pascal, units::Pressure unit, double ambient) { return unit == units::Pressure::psig && std::round((pascal - ambient) / units::psi * 10) < 0; }

std::string pressure_figure(double pascal, units::Pressure unit, double ambient) {
  using units::Pressure;
  if (is_vacuum_figure(pascal, unit, ambient)) return fmt::format("({})", rounded(units::from_pascal(pascal, Pressure::inhg_vacuum, ambient), 1));
  const double v = units::from_pascal(pascal, unit, ambient);
  switch (unit) {
    case Pressure::psig:
    case Pressure::psia: return rounded(v, std::abs(v) < 99.95 ? 1 : 0);
    case Pressure::bar_gauge:
    case Pressure::bar_absolute:
    case Pressure::kgf_cm2_gauge: return rounded(v, 2);
    case Pressure::kpa_gauge:
    case Pressure::kpa_absolute: return rounded(v, pascal < 99.95e3 ? 1 : 0);
    case Pressure::mpa_absolute: return rounded(v, 3);
    case Pressure::inhg_vacuum: return v < -0.05 ? "-" : rounded(v, 1);  // there is no vacuum above ambient pressure
    case Pressure::pascal: return rounded(v, 0);
  }
  throw BadInput("pressure unit: unknown enumerator");
}

std::string temperature_figure(double kelvin, units::Temperature unit, int decimals) { return rounded(units::from_kelvin(kelvin, unit), decimals); }
std::string difference_figure(double kelvin, units::Temperature unit, int decimals) { return rounded(units::difference_from_kelvin(kelvin, unit), decimals); }

std::string argument_figure(double value) { return fmt::format("{:.10g}", value == 0 ? 0.0 : value); }

}  // namespace zeotrope::apply
