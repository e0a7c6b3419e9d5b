#include "zeotrope/apply/gauge_reading.hpp"

#include <fmt/format.h>

#include <cmath>

namespace zeotrope::apply {

GaugeReading gauge_reading(const Refrigerant& refrigerant, double pressure, double line_temperature, bool extrapolate) {
  if (!(std::isfinite(line_temperature) && line_temperature > 0))
    throw BadInput(fmt::format("line temperature: found {} K; a number above 0 is wanted", line_temperature));
  const auto s = refrigerant.saturation({.pressure = pressure, .extrapolate = extrapolate});
  GaugeReading r{pressure, line_temperature, s.bubble, s.dew, line_temperature - s.dew.temperature, s.bubble.temperature - line_temperature,
                 s.dew.temperature - s.bubble.temperature, "", ""};
  if (r.superheat < 0) r.suction_warning = "below the dew point: liquid can reach the compressor";
  if (r.subcooling < 0) r.liquid_warning = "above the bubble point: flash gas can be in the liquid line";
  return r;
}

}  // namespace zeotrope::apply
