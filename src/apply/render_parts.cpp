#include "render_parts.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <map>
#include <utility>

#include "zeotrope/apply/figures.hpp"

namespace zeotrope::apply::parts {

namespace {

using By = ChartOptions::By;

const std::string dash = "-";

std::optional<double> finite(const std::optional<double>& v) { return v && std::isfinite(*v) ? v : std::nullopt; }

Cell pressure_cell(const std::optional<double>& pascal, units::Pressure unit, double ambient) {
  if (!finite(pascal)) return {dash};
  const auto figure = pressure_figure(*pascal, unit, ambient);
  return {figure, is_vacuum_figure(*pascal, unit, ambient) || (units::unit(unit).gauge && figure.starts_with('-') && figure.size() > 1)};
}

Cell temperature_cell(const std::optional<double>& kelvin, units::Temperature unit) { return {finite(kelvin) ? temperature_figure(*kelvin, unit) : dash}; }

/// Decimals that every argument needs, so that the column lines up on the decimal point.
int argument_decimals(const Rows& rows) {
  std::size_t most = 0;
  for (const auto* row : rows) {
    const auto text = argument_figure(row->argument);
    const auto point = text.find('.');
    if (point != std::string::npos && text.find('e') == std::string::npos) most = std::max(most, text.size() - point - 1);
  }
  return static_cast<int>(std::min<std::size_t>(most, 6));
}

Column argument_column(const PtChart& chart, const Rows& rows) {
  const auto& o = chart.options;
  const int decimals = argument_decimals(rows);
  const auto figure = [decimals](double v) { return fmt::format("{:.{}f}", v == 0 ? 0.0 : v, decimals); };
  if (o.by == By::temperature)
    return {Column::Kind::argument, "temperature", "", std::string(units::label(o.temperature_unit)),
            [figure](const ChartRow& r) { return Cell{figure(r.argument)}; }};
  const auto unit = o.pressure_units.front();
  const auto cell = [figure, unit, ambient = o.ambient](const ChartRow& r) {
    // a psig figure below zero is inches of mercury on every gauge face, also where it is the round number of the row
    if (r.bubble_pressure && is_vacuum_figure(*r.bubble_pressure, unit, ambient)) return pressure_cell(r.bubble_pressure, unit, ambient);
    return Cell{figure(r.argument), units::unit(unit).gauge && r.argument < 0};
  };
  return {Column::Kind::argument, "pressure", "", std::string(units::unit(unit).label), cell};
}

Column pressure_column(std::string title, std::string phase, units::Pressure unit, double ambient, std::optional<double> ChartRow::*field) {
  return {Column::Kind::pressure, std::move(title), std::move(phase), std::string(units::unit(unit).label),
          [unit, ambient, field](const ChartRow& r) { return pressure_cell(r.*field, unit, ambient); }};
}

Column temperature_column(std::string title, std::string phase, units::Temperature unit, std::optional<double> ChartRow::*field) {
  return {Column::Kind::temperature, std::move(title), std::move(phase), std::string(units::label(unit)),
          [unit, field](const ChartRow& r) { return temperature_cell(r.*field, unit); }};
}

/// Trailing zeros off: 68.90 -> 68.9, 100.00 -> 100.
std::string short_number(double value, int decimals) {
  auto text = fmt::format("{:.{}f}", value, decimals);
  if (text.find('.') == std::string::npos) return text;
  text.erase(text.find_last_not_of('0') + 1);
  if (text.back() == '.') text.pop_back();
  return text;
}

std::string tolerance_words(const Identification::Part& p) {
  if (!p.tolerance_plus && !p.tolerance_minus) return "";
  return fmt::format(" (+{}/-{})", short_number(p.tolerance_plus.value_or(0), 2), short_number(p.tolerance_minus.value_or(0), 2));
}

/// Keys of the coefficient files in words, with whether a card prints the figure that they concern.
std::pair<std::string, bool> key_in_words(std::string key) {
  static const std::map<std::string, std::string, std::less<>> printed{{"mass_percent", "composition"},
                                                                       {"components", "composition"},
                                                                       {"composition", "composition"},
                                                                       {"tolerance_plus", "tolerances"},
                                                                       {"tolerance_minus", "tolerances"},
                                                                       {"safety_group", "safety group"},
                                                                       {"safety.group", "safety group"},
                                                                       {"environment.gwp100_ar4", "GWP (AR4)"},
                                                                       {"environment.gwp100_ar5", "GWP (AR5)"},
                                                                       {"environment.gwp100_ar6", "GWP (AR6)"},
                                                                       {"environment.gwp100_eu_2024_573", "GWP (EU)"}};
  if (const auto it = printed.find(key); it != printed.end()) return {it->second, true};
  if (const auto point = key.find('.'); point != std::string::npos) key.erase(0, point + 1);
  for (const auto& [start, words] : {std::pair{"burning_velocity", "burning velocity"}, std::pair{"atel_", "ATEL"}, std::pair{"rcl_", "RCL"},
                                     std::pair{"lfl_", "LFL"}, std::pair{"oel_", "OEL"}, std::pair{"odp_", "ODP"}, std::pair{"gwp", "GWP"}})
    if (key.starts_with(start)) return {words, false};
  if (key.ends_with("_celsius")) key.erase(key.size() - std::string_view("_celsius").size());
  std::replace(key.begin(), key.end(), '_', ' ');
  return {key, false};
}

std::string argument_range(const PtChart& chart, double first, double last) {
  const auto& o = chart.options;
  const auto unit = o.by == By::temperature ? std::string(units::label(o.temperature_unit)) : std::string(units::unit(o.pressure_units.front()).label);
  if (first == last) return fmt::format("{} {}", argument_figure(first), unit);
  return fmt::format("{} to {} {}", argument_figure(first), argument_figure(last), unit);
}

/// One legend line per reason; solver messages differ from row to row, so only the first few are told.
void blank_legends(const PtChart& chart, const Rows& rows, std::vector<std::string>& out) {
  constexpr std::size_t most = 4;
  struct Run {
    std::string reason;
    double first, last;
  };
  std::vector<Run> runs;
  for (const auto* row : rows) {
    if (row->blank.empty()) continue;
    if (!runs.empty() && runs.back().reason == row->blank)
      runs.back().last = row->argument;
    else
      runs.push_back({row->blank, row->argument, row->argument});
  }
  for (std::size_t i = 0; i < std::min(most, runs.size()); ++i)
    out.push_back(fmt::format("\"{}\" no figure at {}: {}.", dash, argument_range(chart, runs[i].first, runs[i].last), one_line(runs[i].reason)));
  if (runs.size() > most)
    out.push_back(fmt::format("\"{}\" and {} more places without a figure; the CSV and JSON forms give each reason.", dash, runs.size() - most));
}

std::string temperature_words(double kelvin, units::Temperature unit) { return fmt::format("{} {}", temperature_figure(kelvin, unit), units::label(unit)); }

}  // namespace

bool has_figures(const ChartRow& row) {
  return (finite(row.bubble_temperature) && finite(row.bubble_pressure)) || (finite(row.dew_temperature) && finite(row.dew_pressure));
}

bool is_blend(const Identification& id) { return id.parts.size() > 1; }

std::string difference_label(units::Temperature unit) { return unit == units::Temperature::fahrenheit ? std::string(units::label(unit)) : "K"; }

Rows all_rows(const PtChart& chart) {
  Rows rows;
  for (const auto& row : chart.rows) rows.push_back(&row);
  return rows;
}

std::vector<Column> columns(const PtChart& chart, const Rows& rows, std::size_t units) {
  const auto& o = chart.options;
  units = std::min(units, o.pressure_units.size());
  std::vector<Column> c{argument_column(chart, rows)};
  if (o.by == By::temperature) {
    for (std::size_t i = 0; i < units; ++i)
      c.push_back(pressure_column(chart.one_column ? "saturation" : "bubble", chart.one_column ? "" : "(liquid)", o.pressure_units[i], o.ambient,
                                  &ChartRow::bubble_pressure));
    for (std::size_t i = 0; i < units && !chart.one_column; ++i)
      c.push_back(pressure_column("dew", "(vapour)", o.pressure_units[i], o.ambient, &ChartRow::dew_pressure));
  } else {
    for (std::size_t i = 1; i < units; ++i) c.push_back(pressure_column("pressure", "", o.pressure_units[i], o.ambient, &ChartRow::bubble_pressure));
    c.push_back(
        temperature_column(chart.one_column ? "saturation" : "bubble", chart.one_column ? "" : "(liquid)", o.temperature_unit, &ChartRow::bubble_temperature));
    if (!chart.one_column) c.push_back(temperature_column("dew", "(vapour)", o.temperature_unit, &ChartRow::dew_temperature));
  }
  if (!chart.one_column)
    c.push_back({Column::Kind::glide, "glide", "", difference_label(o.temperature_unit),
                 [unit = o.temperature_unit](const ChartRow& r) { return Cell{finite(r.glide) ? difference_figure(*r.glide, unit) : dash}; }});
  return c;
}

const ChartRow* boiling_row(const PtChart& chart, const Rows& rows) {
  constexpr double near = 0.1;  // a chart may start or end just beside the boiling point
  const double ambient = chart.options.ambient;
  const ChartRow* nearest = nullptr;
  bool at_or_below = false, at_or_above = false;
  const auto distance = [ambient](const ChartRow& r) { return std::abs(std::log(*r.bubble_pressure / ambient)); };
  for (const auto* row : rows) {
    if (!has_figures(*row) || !(*row->bubble_pressure > 0)) continue;
    at_or_below = at_or_below || *row->bubble_pressure <= ambient * (1 + 1e-9);
    at_or_above = at_or_above || *row->bubble_pressure >= ambient * (1 - 1e-9);
    if (!nearest || distance(*row) < distance(*nearest)) nearest = row;
  }
  return nearest && ((at_or_below && at_or_above) || distance(*nearest) < near) ? nearest : nullptr;
}

std::string composition_words(const Identification& id) {
  if (!is_blend(id)) return id.parts.empty() ? "" : fmt::format("pure {}", id.parts.front().chemical_name);
  std::string text;
  bool tolerances = false;
  for (const auto& p : id.parts) {
    text += fmt::format("{}{} {}{}", text.empty() ? "" : " + ", p.designation, short_number(p.mass_percent, 2), tolerance_words(p));
    tolerances = tolerances || p.tolerance_plus || p.tolerance_minus;
  }
  return text + (tolerances ? " % by mass (tolerance)" : id.designated ? " % by mass, tolerances not given" : " % by mass, a new blend without tolerances");
}

std::string safety_words(const Identification& id) {
  if (!id.designated) return "not classified: flammability and toxicity of this blend have not been assessed";
  if (id.safety_group.empty()) return "none assigned, or not known: treat as not classified";
  return id.safety_group + " (ISO 817 / ASHRAE 34)";
}

std::string group_meaning(const std::string& group) {
  static const std::map<std::string, std::string, std::less<>> flammability{
      {"1", "no flame propagation"}, {"2L", "lower flammability"}, {"2", "flammable"}, {"3", "higher flammability"}};
  if (group.empty() || (group.front() != 'A' && group.front() != 'B')) return "";
  const auto it = flammability.find(group.substr(1));
  if (it == flammability.end()) return "";
  return fmt::format("{} toxicity, {}", group.front() == 'A' ? "lower" : "higher", it->second);
}

std::vector<GwpWords> gwp_words(const Identification& id) {
  std::vector<GwpWords> out;
  for (const auto& g : id.gwp) {
    GwpWords w{g.report, "not given", ""};
    if (g.value && std::isfinite(*g.value)) w.figure = *g.value < 10 ? short_number(*g.value, 2) : fmt::format("{:.0f}", std::round(*g.value));
    if (g.value && g.below && !is_blend(id)) w.figure = "<1";
    if (g.value && g.below && is_blend(id)) w.note = "the sum counts a component printed \"<1\" there as 1";
    if (!g.value && is_blend(id)) w.note = "the report gives none for a component";
    out.push_back(std::move(w));
  }
  return out;
}

std::string odp_words(const Identification& id) { return id.odp && std::isfinite(*id.odp) ? short_number(*id.odp, 3) : "not given"; }

std::string what_is_shown(const PtChart& chart) {
  return chart.options.by == By::temperature ? "Saturation pressure at a temperature" : "Saturation temperature at a pressure";
}

std::string one_column_words(const PtChart& chart) {
  if (!chart.one_column) return "";
  if (!is_blend(chart.identity)) return "One column: a single compound boils and condenses at the same temperature.";
  if (std::none_of(chart.rows.begin(), chart.rows.end(), [](const ChartRow& r) { return r.glide.has_value(); })) return "";
  const auto unit = chart.options.temperature_unit;
  return fmt::format("One column, that of the bubble point: the largest glide in this chart is {} {}.", difference_figure(chart.largest_glide, unit, 2),
                     difference_label(unit));
}

std::vector<std::string> use_words(const PtChart& chart) {
  if (chart.one_column)
    return {"Superheat = suction-line temperature less the saturation temperature at the suction pressure.",
            "Subcooling = saturation temperature at the liquid-line pressure less the liquid-line temperature."};
  return {"Superheat: DEW column. Superheat = suction-line temperature less the dew temperature at the suction pressure.",
          "Subcooling: BUBBLE column. Subcooling = bubble temperature at the liquid-line pressure less the liquid-line temperature.",
          chart.options.by == By::temperature ? "Glide = dew less bubble temperature at the bubble pressure of the row."
                                              : "Glide = dew less bubble temperature at the pressure of the row."};
}

std::string ambient_words(const ChartOptions& o) {
  const auto kilopascal = fmt::format("{:.3f} kPa", o.ambient / 1e3);
  const auto note = one_line(o.ambient_note);
  if (note.find(kilopascal) != std::string::npos) return fmt::format("Air pressure assumed at the gauge: {}.", note);
  return fmt::format("Air pressure assumed at the gauge: {} absolute{}.", kilopascal, note.empty() ? "" : " (" + note + ")");
}

std::string range_words(const PtChart& chart) {
  const auto& r = chart.identity.range;
  const auto unit = chart.options.temperature_unit;
  const auto set_by = [&](const std::string& who) { return is_blend(chart.identity) && !who.empty() ? " (" + who + ")" : ""; };
  return fmt::format(
      "{} {}{} to {}{}, up to {:.4g} MPa absolute",
      is_blend(chart.identity) ? "Published range common to the equations:" : "Published range of the equation:", temperature_words(r.lowest_temperature, unit),
      set_by(r.lowest_set_by), temperature_words(r.highest_temperature, unit), set_by(r.highest_set_by), r.highest_pressure / 1e6);
}

std::string top_words(const PtChart& chart) {
  const auto& top = chart.identity.top;
  const auto& o = chart.options;
  const auto unit = o.pressure_units.front();
  const auto point =
      fmt::format("{}, {} {}", temperature_words(top.temperature, o.temperature_unit), pressure_figure(top.pressure, unit, o.ambient), units::unit(unit).label);
  const auto end = fmt::format("rows end at 0.98 of {} absolute temperature, {}", top.is_critical_point ? "its" : "that",
                               temperature_words(chart.hottest_row, o.temperature_unit));
  if (top.is_critical_point) return fmt::format("Critical point{}: {}; {}", is_blend(chart.identity) ? " of the mixture model" : "", point, end);
  return fmt::format("Critical point not reached; hottest two-phase point computed: {} ({}); {}", point, one_line(top.reason), end);
}

std::vector<std::string> legends(const PtChart& chart, const Rows& rows, std::size_t units) {
  std::vector<std::string> out;
  bool brackets = false, minus = false, extrapolated = false;
  for (const auto& column : columns(chart, rows, units))
    for (const auto* row : rows) {
      const auto cell = column.cell(*row);
      brackets = brackets || (cell.vacuum && cell.figure.starts_with('('));
      minus = minus || (cell.vacuum && cell.figure.starts_with('-'));
    }
  for (const auto* row : rows) extrapolated = extrapolated || row->extrapolated;
  if (brackets) out.emplace_back("(10.0) in brackets: inches of mercury vacuum (inHg), counted down from the air pressure.");
  if (minus) out.emplace_back("A pressure with a minus sign is a vacuum: below the air pressure.");
  if (extrapolated) out.emplace_back("\"!\" extrapolated: outside the published range of an equation, for orientation only.");
  blank_legends(chart, rows, out);
  return out;
}

std::string estimated_words(const Identification& id, bool with_reasons) {
  std::string text;
  for (const auto& p : id.pairs) {
    if (!is_estimated(p.kind)) continue;
    const auto reason = with_reasons && !p.provenance.empty() ? "; " + one_line(p.provenance) : "";
    text += fmt::format("{}{} / {} ({}{})", text.empty() ? "" : ", ", p.first, p.second, in_words(p.kind), reason);
  }
  return text;
}

std::string uncertain_words(const Identification& id, bool printed_only) {
  static const std::string tail = " not certain: check the standard";
  std::vector<std::string> said;
  for (auto note : id.uncertain) {
    if (note.ends_with(tail)) note.erase(note.size() - tail.size());
    const auto of = note.find(" of ");
    const auto [words, printed] = key_in_words(note.substr(0, of));
    if (printed_only && !printed) continue;
    auto text = of == std::string::npos ? words : words + note.substr(of);
    if (std::find(said.begin(), said.end(), text) == said.end()) said.push_back(std::move(text));
  }
  return fmt::format("{}", fmt::join(said, "; "));
}

std::string with_degree_sign(std::string text) {
  // first with a no-break space, so that no line begins with the unit
  for (const std::string ascii : {" degC", "degC", " degF", "degF"}) {
    const auto sign = (ascii.front() == ' ' ? "\u00a0\u00b0" : "\u00b0") + ascii.substr(ascii.size() - 1);
    for (auto at = text.find(ascii); at != std::string::npos; at = text.find(ascii, at)) text.replace(at, ascii.size(), sign);
  }
  return text;
}

std::string topic_words(const std::string& topic) {
  static const std::map<std::string, std::string, std::less<>> words{{"reading", "Reading the figures"},   {"identity", "Identity and mixing"},
                                                                     {"charging", "Charging and service"}, {"pressure", "Pressure"},
                                                                     {"health", "Fire and health"},        {"law", "Law and practice"}};
  const auto it = words.find(topic);
  return it == words.end() ? topic : it->second;
}

std::size_t length(std::string_view utf8) {
  return static_cast<std::size_t>(std::count_if(utf8.begin(), utf8.end(), [](char c) { return (static_cast<unsigned char>(c) & 0xC0U) != 0x80U; }));
}

std::string one_line(std::string text) {
  std::replace_if(
      text.begin(), text.end(), [](char c) { return c == '\n' || c == '\r' || c == '\t'; }, ' ');
  return text;
}

}  // namespace zeotrope::apply::parts
