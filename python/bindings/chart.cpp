#include <fmt/format.h>
#include <pybind11/numpy.h>
#include <pybind11/stl.h>

#include <limits>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "bindings.hpp"
#include "zeotrope/apply/pt_chart.hpp"

namespace zeotrope::python {

namespace {

using namespace py::literals;
using apply::ChartOptions;
using apply::ChartRow;
using apply::PtChart;

ChartOptions::By by_of(const std::string& word) {
  if (word == "temperature") return ChartOptions::By::temperature;
  if (word == "pressure") return ChartOptions::By::pressure;
  throw BadInput(fmt::format("by: found \"{}\"; \"temperature\" or \"pressure\" is wanted", word));
}

/// Pressure of the air around the gauge, and where it comes from.
void set_ambient(ChartOptions& o, std::optional<double> altitude, std::optional<double> barometer) {
  if (altitude && barometer) throw BadInput("chart: altitude and barometer are both given; at most one is wanted");
  if (altitude) {
    o.ambient = units::atmosphere_at_altitude(*altitude);
    o.ambient_note = fmt::format("altitude {:g} m, {:.3f} kPa", *altitude, o.ambient / 1000);
  }
  if (barometer) {
    o.ambient = *barometer;
    o.ambient_note = fmt::format("barometer {:.3f} kPa", o.ambient / 1000);
  }
}

PtChart make(const Refrigerant& r, const data::Catalogue& catalogue, std::optional<double> from, std::optional<double> to, std::optional<double> step,
             const std::string& by, const std::string& temperature_unit, const std::vector<std::string>& pressure_units, std::optional<double> altitude,
             std::optional<double> barometer, bool extrapolate) {
  ChartOptions o;
  o.by = by_of(by);
  o.from = from;
  o.to = to;
  o.step = step;
  o.temperature_unit = units::parse_temperature_unit(temperature_unit);
  o.pressure_units.clear();
  for (const auto& u : pressure_units) o.pressure_units.push_back(units::parse_pressure_unit(u));
  o.extrapolate = extrapolate;
  set_ambient(o, altitude, barometer);
  return apply::pt_chart(r, o, catalogue);
}

template <class Value>
py::array_t<double> column(const PtChart& c, Value&& value) {
  py::array_t<double> a(static_cast<py::ssize_t>(c.rows.size()));
  auto out = a.mutable_unchecked<1>();
  for (std::size_t i = 0; i < c.rows.size(); ++i) {
    const std::optional<double> v = value(c.rows[i]);
    out(static_cast<py::ssize_t>(i)) = v ? *v : std::numeric_limits<double>::quiet_NaN();
  }
  return a;
}

/// Column names are typed by hand, so they are plain ASCII, as in the CSV form of a chart.
std::string_view ascii_label(units::Temperature unit) {
  switch (unit) {
    case units::Temperature::kelvin:
      return "K";
    case units::Temperature::celsius:
      return "degC";
    case units::Temperature::fahrenheit:
      return "degF";
  }
  throw BadInput("temperature unit: unknown enumerator");
}

/// Column name with unit -> values, in the order of the CSV form.
py::dict columns(const PtChart& c) {
  const auto& o = c.options;
  py::dict table;
  const auto name = [](std::string_view what, std::string_view unit) { return py::str(fmt::format("{} [{}]", what, unit)); };
  const auto pressure = [&](std::string_view what, units::Pressure u, std::optional<double> ChartRow::*p) {
    table[name(what, units::unit(u).label)] = column(c, [&](const ChartRow& row) -> std::optional<double> {
      if (!(row.*p)) return std::nullopt;
      return units::from_pascal(*(row.*p), u, o.ambient);
    });
  };
  const auto temperature = [&](std::string_view what, std::optional<double> ChartRow::*t) {
    table[name(what, ascii_label(o.temperature_unit))] = column(c, [&](const ChartRow& row) -> std::optional<double> {
      if (!(row.*t)) return std::nullopt;
      return units::from_kelvin(*(row.*t), o.temperature_unit);
    });
  };
  const auto argument = [](const ChartRow& row) { return std::optional<double>(row.argument); };
  if (o.by == ChartOptions::By::temperature) {
    table[name("temperature", ascii_label(o.temperature_unit))] = column(c, argument);
    for (const auto u : o.pressure_units) pressure("bubble pressure", u, &ChartRow::bubble_pressure);
    for (const auto u : o.pressure_units) pressure("dew pressure", u, &ChartRow::dew_pressure);
  } else {
    table[name("pressure", units::unit(o.pressure_units.front()).label)] = column(c, argument);
    for (std::size_t i = 1; i < o.pressure_units.size(); ++i) pressure("pressure", o.pressure_units[i], &ChartRow::bubble_pressure);
    temperature("bubble temperature", &ChartRow::bubble_temperature);
    temperature("dew temperature", &ChartRow::dew_temperature);
  }
  const bool fahrenheit = o.temperature_unit == units::Temperature::fahrenheit;
  table[name("glide", ascii_label(fahrenheit ? units::Temperature::fahrenheit : units::Temperature::kelvin))] =
      column(c, [&](const ChartRow& row) -> std::optional<double> {
        if (!row.glide) return std::nullopt;
        return units::difference_from_kelvin(*row.glide, o.temperature_unit);
      });
  py::array_t<bool> extrapolated(static_cast<py::ssize_t>(c.rows.size()));
  py::list note;
  for (std::size_t i = 0; i < c.rows.size(); ++i) {
    extrapolated.mutable_at(static_cast<py::ssize_t>(i)) = c.rows[i].extrapolated;
    note.append(!c.rows[i].blank.empty() ? c.rows[i].blank : c.rows[i].extrapolated ? "extrapolated" : "");
  }
  table["extrapolated"] = extrapolated;
  table["note"] = note;
  return table;
}

py::list notes(const PtChart& c) {
  py::list n;
  n.append("gauge pressures are for " + c.options.ambient_note);
  if (c.options.extrapolate) n.append(std::string("rows outside the published range are extrapolated and marked"));
  if (c.one_column) n.append(std::string("bubble and dew line are the same, or the glide is below 0.1 K in every row"));
  if (!c.identity.top.is_critical_point) n.append("no critical point was reached: " + c.identity.top.reason);
  if (!c.identity.designated) n.append(std::string("a new blend, not a designated one"));
  for (const auto& u : c.identity.uncertain) n.append(u);
  return n;
}

/// What a chart says beside its rows, in plain Python types.
py::dict facts(const PtChart& c) {
  const auto& id = c.identity;
  py::list composition, sources, pairs, estimated, cautions, below;
  for (const auto& p : id.parts) {
    composition.append(py::dict("designation"_a = p.designation, "chemical_name"_a = p.chemical_name, "mass_percent"_a = p.mass_percent,
                                "mole_percent"_a = p.mole_percent, "tolerance_plus"_a = p.tolerance_plus, "tolerance_minus"_a = p.tolerance_minus));
    sources.append(py::dict("designation"_a = p.designation, "equation"_a = p.equation, "source"_a = p.source, "provenance"_a = p.provenance));
  }
  for (const auto& p : id.pairs) {
    const py::dict row("first"_a = p.first, "second"_a = p.second, "kind"_a = std::string(apply::in_words(p.kind)), "gamma_T"_a = p.gamma_T,
                       "gamma_T_uncertainty"_a = p.gamma_T_uncertainty, "source"_a = p.source, "provenance"_a = p.provenance);
    pairs.append(row);
    if (apply::is_estimated(p.kind)) estimated.append(fmt::format("{} / {}", p.first, p.second));
  }
  py::dict gwp;
  for (const auto& w : id.gwp) {
    gwp[py::str(w.report)] = w.value;
    if (w.below) below.append(w.report);
  }
  for (const auto& k : c.cautions) cautions.append(py::dict("name"_a = k.name, "topic"_a = k.topic, "short"_a = k.short_text, "text"_a = k.text));
  return py::dict("name"_a = id.name, "designated"_a = id.designated, "composition"_a = composition, "molar_mass"_a = id.molar_mass,
                  "safety_group"_a = id.safety_group, "gwp"_a = gwp, "gwp_below"_a = below, "odp"_a = id.odp, "sources"_a = sources, "pairs"_a = pairs,
                  "estimated_pairs"_a = estimated, "largest_glide"_a = c.largest_glide, "ambient"_a = c.options.ambient, "cautions"_a = cautions,
                  "notes"_a = notes(c));
}

}  // namespace

void bind_chart(py::module_& m) {
  py::class_<PtChart>(m, "PtChart", "A pressure-temperature chart; zeotrope.pt_chart makes a table of it.")
      .def("columns", &columns, "Column name with unit -> values.")
      .def("facts", &facts, "Name, composition, sources, cautions and the like.")
      .def("text", &apply::render_text, Unlocked())
      .def("card", &apply::render_card, Unlocked())
      .def("__repr__", [](const PtChart& c) { return fmt::format("<zeotrope.PtChart of {}: {} rows>", c.identity.name, c.rows.size()); });

  m.def("pt_chart", &make, "refrigerant"_a, "catalogue"_a, py::kw_only(), "from_"_a, "to"_a, "step"_a, "by"_a, "temperature_unit"_a, "pressure_units"_a,
        "altitude"_a, "barometer"_a, "extrapolate"_a, Unlocked(), "See zeotrope.pt_chart.");
}

}  // namespace zeotrope::python
