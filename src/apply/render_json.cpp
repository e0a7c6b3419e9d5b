#include <cmath>
#include <nlohmann/json.hpp>

#include "render_parts.hpp"
#include "zeotrope/apply/figures.hpp"
#include "zeotrope/apply/pt_chart.hpp"

namespace zeotrope::apply {

namespace {

using Json = nlohmann::ordered_json;
using By = ChartOptions::By;

/// JSON knows no NaN and no infinity: they are null, as an absent value is.
Json number(std::optional<double> v) { return v && std::isfinite(*v) ? Json(*v) : Json(nullptr); }

Json text_or_null(const std::string& text) { return text.empty() ? Json(nullptr) : Json(text); }

Json components(const Identification& id) {
  Json out = Json::array();
  for (const auto& p : id.parts)
    out.push_back({{"designation", p.designation},
                   {"chemical_name", p.chemical_name},
                   {"mass_percent", number(p.mass_percent)},
                   {"mole_percent", number(p.mole_percent)},
                   {"tolerance_plus", number(p.tolerance_plus)},
                   {"tolerance_minus", number(p.tolerance_minus)},
                   {"equation", p.equation},
                   {"source", p.source},
                   {"provenance", p.provenance}});
  return out;
}

Json warming(const Identification& id) {
  Json out = Json::array();
  const auto words = parts::gwp_words(id);
  for (std::size_t i = 0; i < id.gwp.size(); ++i)
    out.push_back({{"report", id.gwp[i].report},
                   {"value", number(id.gwp[i].value)},
                   {"below_1_counted_as_1", id.gwp[i].below},
                   {"printed", words[i].figure},
                   {"note", text_or_null(words[i].note)}});
  return out;
}

Json pairs(const Identification& id) {
  Json out = Json::array();
  for (const auto& p : id.pairs)
    out.push_back({{"first", p.first},
                   {"second", p.second},
                   {"kind", std::string(in_words(p.kind))},
                   {"estimated", is_estimated(p.kind)},
                   {"gamma_T", number(p.gamma_T)},
                   {"gamma_T_uncertainty", number(p.gamma_T_uncertainty)},
                   {"source", p.source},
                   {"provenance", p.provenance}});
  return out;
}

Json identity(const Identification& id) {
  return {{"name", id.name},
          {"designated", id.designated},
          {"components", components(id)},
          {"safety_group", id.designated ? text_or_null(id.safety_group) : Json(nullptr)},
          {"safety", parts::safety_words(id)},
          {"molar_mass_kg_per_mol", number(id.molar_mass)},
          {"gwp_100_years", warming(id)},
          {"odp_montreal", number(id.odp)},
          {"pairs", pairs(id)},
          {"not_certain", id.uncertain},
          {"published_range",
           {{"lowest_temperature_K", number(id.range.lowest_temperature)},
            {"lowest_set_by", id.range.lowest_set_by},
            {"highest_temperature_K", number(id.range.highest_temperature)},
            {"highest_set_by", id.range.highest_set_by},
            {"highest_pressure_Pa", number(id.range.highest_pressure)}}},
          {"two_phase_top",
           {{"temperature_K", number(id.top.temperature)},
            {"pressure_Pa", number(id.top.pressure)},
            {"is_critical_point", id.top.is_critical_point},
            {"reason", text_or_null(id.top.reason)}}}};
}

Json options(const ChartOptions& o) {
  Json pressure_units = Json::array();
  for (const auto u : o.pressure_units)
    pressure_units.push_back({{"unit", std::string(units::unit(u).label)}, {"gauge", units::unit(u).gauge}, {"size_Pa", units::unit(u).pascals}});
  return {{"by", o.by == By::temperature ? "temperature" : "pressure"},
          {"from", number(o.from)},
          {"to", number(o.to)},
          {"step", number(o.step)},
          {"temperature_unit", std::string(units::label(o.temperature_unit))},
          {"difference_unit", parts::difference_label(o.temperature_unit)},
          {"pressure_units", pressure_units},
          {"ambient_Pa", number(o.ambient)},
          {"ambient_note", o.ambient_note},
          {"extrapolate", o.extrapolate}};
}

Json shown_temperature(std::optional<double> kelvin, units::Temperature unit) {
  return number(kelvin ? std::optional(units::from_kelvin(*kelvin, unit)) : std::nullopt);
}

/// One figure per pressure unit of the chart, in their order: the value, and the figure as a chart prints it.
Json shown_pressures(std::optional<double> pascal, const ChartOptions& o) {
  Json out = Json::array();
  for (const auto u : o.pressure_units) {
    const bool there = pascal && std::isfinite(*pascal);
    out.push_back({{"unit", std::string(units::unit(u).label)},
                   {"value", there ? number(units::from_pascal(*pascal, u, o.ambient)) : Json(nullptr)},
                   {"printed", there ? Json(pressure_figure(*pascal, u, o.ambient)) : Json(nullptr)},
                   {"inHg_vacuum", there && is_vacuum_figure(*pascal, u, o.ambient)}});
  }
  return out;
}

Json row(const ChartRow& r, const ChartOptions& o) {
  return {{"argument", number(r.argument)},
          {"si",
           {{"bubble_temperature_K", number(r.bubble_temperature)},
            {"dew_temperature_K", number(r.dew_temperature)},
            {"bubble_pressure_Pa", number(r.bubble_pressure)},
            {"dew_pressure_Pa", number(r.dew_pressure)},
            {"glide_K", number(r.glide)}}},
          {"shown",
           {{"bubble_temperature", shown_temperature(r.bubble_temperature, o.temperature_unit)},
            {"dew_temperature", shown_temperature(r.dew_temperature, o.temperature_unit)},
            {"bubble_pressure", shown_pressures(r.bubble_pressure, o)},
            {"dew_pressure", shown_pressures(r.dew_pressure, o)},
            {"glide", number(r.glide ? std::optional(units::difference_from_kelvin(*r.glide, o.temperature_unit)) : std::nullopt)}}},
          {"fugacity_mismatch", number(r.fugacity_mismatch)},
          {"extrapolated", r.extrapolated},
          {"blank", text_or_null(r.blank)}};
}

}  // namespace

std::string render_json(const PtChart& chart) {
  Json out{{"schema", "zeotrope pressure-temperature chart"},
           {"schema_version", 1},
           {"identity", identity(chart.identity)},
           {"options", options(chart.options)},
           {"one_column", chart.one_column},
           {"largest_glide_K", number(chart.largest_glide)},
           {"hottest_row_K", number(chart.hottest_row)},
           {"rows", Json::array()},
           {"cautions", Json::array()}};
  for (const auto& r : chart.rows) out["rows"].push_back(row(r, chart.options));
  for (const auto& c : chart.cautions)
    out["cautions"].push_back({{"name", c.name}, {"topic", c.topic}, {"when", c.when}, {"short", c.short_text}, {"text", c.text}});
  // a name with bytes that are not UTF-8 must not make the whole chart fail
  return out.dump(2, ' ', false, Json::error_handler_t::replace) + "\n";
}

}  // namespace zeotrope::apply
