#pragma once

#include <optional>
#include <string>
#include <vector>

#include "zeotrope/apply/identification.hpp"
#include "zeotrope/data/catalogue.hpp"
#include "zeotrope/refrigerant.hpp"
#include "zeotrope/units.hpp"

namespace zeotrope::apply {

/// What a chart is to show. Steps are round numbers in the unit shown.
struct ChartOptions {
  enum class By { temperature, pressure } by = By::temperature;
  std::optional<double> from = std::nullopt, to = std::nullopt, step = std::nullopt;  ///< in the first unit of `by`; absent: chosen for the refrigerant and the unit
  units::Temperature temperature_unit = units::Temperature::celsius;
  std::vector<units::Pressure> pressure_units = {units::Pressure::bar_gauge};  ///< the first is that of the rows by pressure
  double ambient = units::standard_atmosphere;  ///< Pa, at the gauge
  std::string ambient_note = "sea level, 101.325 kPa";
  bool extrapolate = false;
};

/// One row; SI. A value is absent where there is none, and `blank` says why.
struct ChartRow {
  double argument = 0;  ///< the round number, in the unit shown
  std::optional<double> bubble_temperature, dew_temperature;  ///< K; equal to the row's temperature in charts by temperature
  std::optional<double> bubble_pressure, dew_pressure;        ///< Pa
  std::optional<double> glide;  ///< dew minus bubble temperature at the row's pressure (at the bubble pressure in charts by temperature), K
  double fugacity_mismatch = 0;
  bool extrapolated = false;
  std::string blank;
};

struct PtChart {
  Identification identity;
  ChartOptions options;  ///< with from, to and step filled in
  std::vector<ChartRow> rows;
  bool one_column = false;    ///< pure, or the glide is below 0.1 K in every row
  double largest_glide = 0;   ///< K
  double hottest_row = 0;     ///< K: rows end at 0.98 of the critical temperature
  std::vector<data::Caution> cautions;
};

/// The pressure-temperature chart. Rows above 0.98 of the critical temperature and, unless extrapolating, below the
/// published range are blank with the reason. BadInput for a step that is not positive, ends in the wrong order, or
/// more than 20,000 rows.
PtChart pt_chart(const Refrigerant& refrigerant, const ChartOptions& options = {}, const data::Catalogue& catalogue = data::Catalogue());

/// Aligned text for a terminal or a plain printer.
std::string render_text(const PtChart& chart);
/// Comma-separated values: one header line with units, full identification in '#' comments above it.
std::string render_csv(const PtChart& chart);
/// One JSON object: identity, options, rows in SI and in the units shown, cautions.
std::string render_json(const PtChart& chart);
/// Self-contained HTML page that prints on one sheet (A4 or letter): large black-on-white figures, nothing in colour only.
std::string render_card(const PtChart& chart);

}  // namespace zeotrope::apply
