#include <fmt/format.h>

#include <cmath>

#include "render_parts.hpp"
#include "zeotrope/apply/pt_chart.hpp"

namespace zeotrope::apply {

namespace {

using namespace parts;
using By = ChartOptions::By;

std::string comment(const std::string& text) { return "# " + one_line(text) + "\n"; }

/// Quoted only where needed, RFC 4180.
std::string field(std::string text) {
  text = one_line(std::move(text));
  if (text.find_first_of(",\"") == std::string::npos) return text;
  for (auto at = text.find('"'); at != std::string::npos; at = text.find('"', at + 2)) text.insert(at, 1, '"');
  return "\"" + text + "\"";
}

std::string_view ascii_label(units::Temperature unit) {
  switch (unit) {
    case units::Temperature::celsius:
      return "degC";
    case units::Temperature::fahrenheit:
      return "degF";
    case units::Temperature::kelvin:
      return "K";
  }
  throw BadInput("temperature unit: unknown enumerator");
}

std::string_view ascii_difference_label(units::Temperature unit) { return unit == units::Temperature::fahrenheit ? "degF" : "K"; }

/// Twelve digits hide the rounding of the conversion and are far more than the equations are good for.
std::string shown(std::optional<double> v) { return v && std::isfinite(*v) ? fmt::format("{:.12g}", *v == 0 ? 0.0 : *v) : ""; }
std::string exact(std::optional<double> v) { return v && std::isfinite(*v) ? fmt::format("{}", *v) : ""; }

struct Field {
  std::string name;
  std::function<std::string(const ChartRow&)> text;
};

Field pressure_field(const std::string& name, units::Pressure unit, double ambient, std::optional<double> ChartRow::*value) {
  return {fmt::format("{} [{}]", name, units::unit(unit).label),
          [=](const ChartRow& r) { return (r.*value) ? shown(units::from_pascal(*(r.*value), unit, ambient)) : ""; }};
}

Field temperature_field(const std::string& name, units::Temperature unit, std::optional<double> ChartRow::*value) {
  return {fmt::format("{} [{}]", name, ascii_label(unit)), [=](const ChartRow& r) { return (r.*value) ? shown(units::from_kelvin(*(r.*value), unit)) : ""; }};
}

Field exact_field(const std::string& name, std::optional<double> ChartRow::*value) {
  return {name, [=](const ChartRow& r) { return exact(r.*value); }};
}

Field argument_field(const std::string& name, std::string_view unit) {
  return {fmt::format("{} [{}]", name, unit), [](const ChartRow& r) { return shown(r.argument); }};
}

std::string note(const ChartRow& r) {
  const std::string mark = r.extrapolated ? "extrapolated" : "";
  return mark + (!mark.empty() && !r.blank.empty() ? "; " : "") + r.blank;
}

std::vector<Field> fields_by_temperature(const ChartOptions& o) {
  std::vector<Field> f{argument_field("temperature", ascii_label(o.temperature_unit))};
  for (const auto unit : o.pressure_units) f.push_back(pressure_field("bubble pressure", unit, o.ambient, &ChartRow::bubble_pressure));
  for (const auto unit : o.pressure_units) f.push_back(pressure_field("dew pressure", unit, o.ambient, &ChartRow::dew_pressure));
  return f;
}

std::vector<Field> fields_by_pressure(const ChartOptions& o) {
  std::vector<Field> f{argument_field("pressure", units::unit(o.pressure_units.front()).label)};
  for (std::size_t i = 1; i < o.pressure_units.size(); ++i) f.push_back(pressure_field("pressure", o.pressure_units[i], o.ambient, &ChartRow::bubble_pressure));
  f.push_back(temperature_field("bubble temperature", o.temperature_unit, &ChartRow::bubble_temperature));
  f.push_back(temperature_field("dew temperature", o.temperature_unit, &ChartRow::dew_temperature));
  return f;
}

/// Bubble and dew always both, also where a printed chart has one column: a program that reads it need not care.
std::vector<Field> fields(const ChartOptions& o) {
  auto f = o.by == By::temperature ? fields_by_temperature(o) : fields_by_pressure(o);
  const auto unit = o.temperature_unit;
  f.push_back({fmt::format("glide [{}]", ascii_difference_label(unit)),
               [unit](const ChartRow& r) { return r.glide ? shown(units::difference_from_kelvin(*r.glide, unit)) : ""; }});
  if (o.by == By::temperature) {
    f.push_back(exact_field("SI temperature [K]", &ChartRow::bubble_temperature));
    f.push_back(exact_field("SI bubble pressure [Pa]", &ChartRow::bubble_pressure));
    f.push_back(exact_field("SI dew pressure [Pa]", &ChartRow::dew_pressure));
  } else {
    f.push_back(exact_field("SI pressure [Pa]", &ChartRow::bubble_pressure));
    f.push_back(exact_field("SI bubble temperature [K]", &ChartRow::bubble_temperature));
    f.push_back(exact_field("SI dew temperature [K]", &ChartRow::dew_temperature));
  }
  f.push_back(exact_field("SI glide [K]", &ChartRow::glide));
  f.push_back({"note", [](const ChartRow& r) { return field(note(r)); }});
  return f;
}

std::string identification(const PtChart& chart) {
  const auto& id = chart.identity;
  std::string out = comment(fmt::format("{}: {}", id.name, what_is_shown(chart)));
  out += comment("composition: " + composition_words(id));
  out += comment("safety group: " + safety_words(id));
  for (const auto& g : gwp_words(id)) out += comment(fmt::format("GWP 100 years, {}: {}{}", g.report, g.figure, g.note.empty() ? "" : "; " + g.note));
  out += comment("ODP, Montreal Protocol: " + odp_words(id));
  out += comment(fmt::format("molar mass: {:.8g} g/mol", id.molar_mass * 1e3));
  return out;
}

std::string units_and_sources(const PtChart& chart) {
  const auto& id = chart.identity;
  std::string out = comment("units: in brackets after each column name; psig and (g) are gauge, psia and (a) absolute; a gauge figure below zero is a vacuum");
  out += comment(ambient_words(chart.options));
  if (const auto words = one_column_words(chart); !words.empty()) out += comment("a printed chart has one column. " + words);
  for (const auto& words : use_words(chart)) out += comment(words);
  out += comment(std::string(nominal_words));
  out += comment(range_words(chart));
  out += comment(top_words(chart));
  for (const auto& p : id.parts) out += comment(fmt::format("equation of {}: {}; {}; {}", p.designation, p.equation, p.source, p.provenance));
  for (const auto& p : id.pairs) out += comment(fmt::format("pair {} / {}: {}; {}", p.first, p.second, in_words(p.kind), p.provenance));
  if (const auto words = estimated_words(id, false); !words.empty()) out += comment("estimated: " + words);
  if (const auto words = uncertain_words(id, false); !words.empty()) out += comment("not certain, check the standard: " + words);
  return out;
}

}  // namespace

std::string render_csv(const PtChart& chart) {
  std::string out = identification(chart) + units_and_sources(chart);
  for (const auto& c : chart.cautions) out += comment("caution: " + c.short_text);
  const auto all = fields(chart.options);
  for (std::size_t i = 0; i < all.size(); ++i) out.append(i ? "," : "").append(field(all[i].name));
  out += "\n";
  for (const auto& row : chart.rows) {
    for (std::size_t i = 0; i < all.size(); ++i) out.append(i ? "," : "").append(all[i].text(row));
    out += "\n";
  }
  return out;
}

}  // namespace zeotrope::apply
