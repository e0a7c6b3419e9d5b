#include "zeotrope/apply/pt_chart.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <charconv>
#include <cmath>

#include "zeotrope/apply/cautions.hpp"

namespace zeotrope::apply {

namespace {

/// Rows end here: near the critical point gauge and sensor errors make a saturation figure useless.
constexpr double end_of_rows = 0.98;  // of the critical temperature
constexpr double small_glide = 0.1;   // K

/// No drift: each argument is a multiple of the step, to 10 digits. (from_chars: a host's locale must not matter.)
double ten_digits(double value) {
  const auto text = fmt::format("{:.10g}", value);
  double r = value;
  std::from_chars(text.data(), text.data() + text.size(), r);
  return r;
}

void fill_by_temperature(const Refrigerant& r, const ChartOptions& o, double top, double argument, ChartRow& row) {
  const double T = units::to_kelvin(argument, o.temperature_unit);
  row.bubble_temperature = row.dew_temperature = T;
  if (T > top) {
    row.blank = fmt::format("above {:.2f} of the critical temperature", end_of_rows);
    return;
  }
  const auto s = r.saturation({.temperature = T, .extrapolate = o.extrapolate});
  row.bubble_pressure = s.bubble.pressure;
  row.dew_pressure = s.dew.pressure;
  row.fugacity_mismatch = std::max(s.bubble.fugacity_mismatch, s.dew.fugacity_mismatch);
  row.extrapolated = s.bubble.extrapolated || s.dew.extrapolated;
  try {
    row.glide = r.glide(s.bubble.pressure, true);
  } catch (const NoSolution&) {
    // a bubble pressure above the dew line's highest has no dew point; both pressures stand all the same
  }
}

void fill_by_pressure(const Refrigerant& r, const ChartOptions& o, double top, double argument, ChartRow& row) {
  const double p = units::to_pascal(argument, o.pressure_units.front(), o.ambient);
  row.bubble_pressure = row.dew_pressure = p;
  if (!(p > 0)) {
    row.blank = "no pressure at all";
    return;
  }
  const auto s = r.saturation({.pressure = p, .extrapolate = o.extrapolate});
  // of a wide glide the dew point may lie past the end of the rows by temperature; the bubble point decides
  if (s.bubble.temperature > top) {
    row.blank = fmt::format("above {:.2f} of the critical temperature", end_of_rows);
    return;
  }
  row.bubble_temperature = s.bubble.temperature;
  row.dew_temperature = s.dew.temperature;
  row.fugacity_mismatch = std::max(s.bubble.fugacity_mismatch, s.dew.fugacity_mismatch);
  row.extrapolated = s.bubble.extrapolated || s.dew.extrapolated;
  row.glide = s.dew.temperature - s.bubble.temperature;
}

/// Ends and step where the caller gave none: -50 to 70 C (-60 to 160 F) in fives and tens, or the pressures that belong
/// to them in steps that give about thirty rows, kept within what has figures.
void fill_range(const Refrigerant& r, ChartOptions& o, double top) {
  const double coldest = o.extrapolate ? 0.0 : r.range().lowest_temperature;
  if (o.by == ChartOptions::By::temperature) {
    const bool f = o.temperature_unit == units::Temperature::fahrenheit;
    const bool k = o.temperature_unit == units::Temperature::kelvin;
    if (!o.step) o.step = f ? 10 : 5;
    const double s = *o.step;
    const double usual_from = f ? -60 : k ? 220 : -50, usual_to = f ? 160 : k ? 345 : 70;
    const double lowest = std::ceil(units::from_kelvin(std::max(coldest, 1.0), o.temperature_unit) / s - 1e-9) * s;
    // a fluid of the cold starts at its own lower limit
    if (!o.from) o.from = units::to_kelvin(usual_from, o.temperature_unit) > top ? lowest : std::max(usual_from, lowest);
    if (!o.to) o.to = std::max(*o.from, std::min(usual_to, std::floor(units::from_kelvin(top, o.temperature_unit) / s + 1e-9) * s));
    return;
  }
  const auto unit = o.pressure_units.front();
  if (unit == units::Pressure::inhg_vacuum) {  // exists below ambient pressure only
    if (!o.step) o.step = 1;
    if (!o.from) o.from = 0;
    if (!o.to) o.to = std::max(*o.from, 29.0);
    return;
  }
  const auto shown = [&](double T) { return units::from_pascal(r.dew({.temperature = std::clamp(T, std::max(coldest, 1.0), top), .extrapolate = true}).pressure, unit, o.ambient); };
  const bool cold = top < 223.15;
  const double low = shown(cold ? coldest : 223.15), high = shown(cold ? top : 343.15);
  const double size = std::max(low, high) - std::min(low, high);
  if (!o.step) {
    const double raw = std::max(size, 1e-6) / 30;
    const double decade = std::pow(10.0, std::floor(std::log10(raw)));
    o.step = raw / decade < 1.5 ? decade : raw / decade < 3.5 ? 2 * decade : raw / decade < 7.5 ? 5 * decade : 10 * decade;
  }
  if (!o.from) o.from = std::ceil(std::min(low, high) / *o.step) * *o.step;
  if (!o.to) o.to = std::max(*o.from, std::floor(std::max(low, high) / *o.step) * *o.step);
}

}  // namespace

PtChart pt_chart(const Refrigerant& r, const ChartOptions& options, const data::Catalogue& catalogue) {
  PtChart chart;
  chart.options = options;
  auto& o = chart.options;
  if (o.pressure_units.empty()) throw BadInput("chart: no pressure unit; at least one is wanted");
  if (!(std::isfinite(o.ambient) && o.ambient > 0)) throw BadInput(fmt::format("chart: ambient pressure {} Pa; a number above 0 is wanted", o.ambient));
  chart.identity = identify(r);
  chart.hottest_row = end_of_rows * chart.identity.top.temperature;
  if (o.step && !(std::isfinite(*o.step) && *o.step > 0)) throw BadInput(fmt::format("chart: step {}; a number above 0 is wanted", *o.step));
  for (const auto& end : {o.from, o.to})
    if (end && !std::isfinite(*end)) throw BadInput(fmt::format("chart: end {}; a finite number is wanted", *end));
  fill_range(r, o, chart.hottest_row);
  if (*o.from > *o.to) throw BadInput(fmt::format("chart: from {} to {}; the first must not be above the second", *o.from, *o.to));
  const double span = (*o.to - *o.from) / *o.step;
  if (span > 20000) throw BadInput(fmt::format("chart: {:.0f} rows; at most 20000 are made", span));

  const auto count = static_cast<int>(std::floor(span + 1e-9));
  bool below = false, above = false;
  for (int i = 0; i <= count; ++i) {
    ChartRow row;
    row.argument = ten_digits(*o.from + i * *o.step);
    try {
      if (o.by == ChartOptions::By::temperature)
        fill_by_temperature(r, o, chart.hottest_row, row.argument, row);
      else
        fill_by_pressure(r, o, chart.hottest_row, row.argument, row);
    } catch (const OutOfRange&) {
      row.blank = "outside the published range";
    } catch (const NoSolution&) {
      row.blank = "above the two-phase region";
    } catch (const NotConverged& e) {
      // one reason for many rows rather than a message for each
      const std::string_view what = e.what();
      row.blank = what.find("two liquids") != std::string_view::npos ? "by the model the liquid would split into two liquids, which is not solved" : what;
    } catch (const BadInput& e) {
      row.blank = e.what();  // a figure below perfect vacuum or absolute zero
    }
    above = above || row.blank.starts_with("above");
    if (row.glide) chart.largest_glide = std::max(chart.largest_glide, *row.glide);
    for (const auto& p : {row.bubble_pressure, row.dew_pressure}) below = below || (row.blank.empty() && p && *p < o.ambient);
    chart.rows.push_back(std::move(row));
  }
  chart.one_column = chart.largest_glide < small_glide;
  // rows that come near the critical point, whether the caller or the chart ended them there
  const double end = o.by == ChartOptions::By::temperature ? units::to_kelvin(*o.to, o.temperature_unit) / chart.identity.top.temperature
                                                           : units::to_pascal(*o.to, o.pressure_units.front(), o.ambient) / chart.identity.top.pressure + 0.2;
  chart.cautions = applicable_cautions(r, catalogue, below, above || end > 0.95);
  return chart;
}

}  // namespace zeotrope::apply
