#pragma once

#include <string>

#include "zeotrope/refrigerant.hpp"

namespace zeotrope::apply {

/// A gauge pressure and a line temperature turned into superheat and subcooling.
struct GaugeReading {
  double pressure;          ///< Pa, absolute
  double line_temperature;  ///< K
  SaturationPoint bubble, dew;
  double superheat;   ///< line temperature minus dew temperature, K; below zero: liquid can be present
  double subcooling;  ///< bubble temperature minus line temperature, K; below zero: vapour can be present
  double glide;       ///< K
  /// For a suction or gas line, which `superheat` describes; empty where the reading is sound.
  std::string suction_warning;
  /// For a liquid line, which `subcooling` describes.
  std::string liquid_warning;
};

/// Superheat from the dew point, subcooling from the bubble point, both at the gauge's pressure (common practice in the
/// trade for zeotropes; see ISO 817 on bubble and dew point). Throws like Refrigerant::saturation.
GaugeReading gauge_reading(const Refrigerant& refrigerant, double pressure, double line_temperature, bool extrapolate = false);

}  // namespace zeotrope::apply
