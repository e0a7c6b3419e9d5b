#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <filesystem>
#include <fstream>
#include <memory>
#include <utility>

#include "command.hpp"
#include "layout.hpp"
#include "options.hpp"
#include "zeotrope/apply/pt_chart.hpp"

namespace zeotrope::command {

namespace {

struct Options {
  RefrigerantChoice refrigerant;
  UnitChoice units;
  AmbientChoice ambient;
  std::string from, to, step, by = "temperature", format, output;
  bool extrapolate = false;
};

using Render = std::string (*)(const apply::PtChart&);
struct Format {
  std::string_view name, extension;
  Render render;
};
constexpr std::array<Format, 4> formats{{
    {"text", ".txt", apply::render_text},
    {"csv", ".csv", apply::render_csv},
    {"json", ".json", apply::render_json},
    {"card", ".html", apply::render_card},
}};

/// The format asked for; without one, that of the output's extension; else text.
Render renderer(const Options& o) {
  if (o.format.empty()) {
    const auto extension = std::filesystem::path(o.output).extension().string();
    for (const auto& f : formats)
      if (extension == f.extension) return f.render;
    return apply::render_text;
  }
  for (const auto& f : formats)
    if (o.format == f.name) return f.render;
  throw BadInput(fmt::format("--format: found \"{}\"; text, csv, json or card is wanted", o.format.substr(0, 40)));
}

apply::ChartOptions chart_options(const Options& o) {
  apply::ChartOptions c;
  using By = apply::ChartOptions::By;
  if (o.by != "temperature" && o.by != "pressure") throw BadInput(fmt::format("--by: found \"{}\"; temperature or pressure is wanted", o.by.substr(0, 40)));
  c.by = o.by == "pressure" ? By::pressure : By::temperature;
  c.temperature_unit = o.units.temperature_or(c.temperature_unit);
  c.pressure_units = o.units.pressure_or(c.pressure_units);
  const auto ambient = o.ambient.resolve();
  c.ambient = ambient.pascal;
  c.ambient_note = ambient.note;
  c.extrapolate = o.extrapolate;
  const std::string unit(c.by == By::pressure ? units::unit(c.pressure_units.front()).label : units::label(c.temperature_unit));
  const auto wanted = fmt::format("a plain number, meant in {},", unit);
  for (const auto& [option, text, end] : {std::tuple{"--from", &o.from, &c.from}, std::tuple{"--to", &o.to, &c.to}, std::tuple{"--step", &o.step, &c.step}})
    if (!text->empty()) *end = entered_number(option, *text, wanted);
  return c;
}

/// A chart without a single figure is no chart: says why instead.
void require_figures(const apply::PtChart& chart) {
  if (std::any_of(chart.rows.begin(), chart.rows.end(), [](const apply::ChartRow& r) { return r.blank.empty(); })) return;
  const auto unit = chart.options.temperature_unit;
  throw OutOfRange(fmt::format("{}: no row of this chart has a figure: {}; figures run from {} (published range) to {} (0.98 of the critical temperature)",
                               chart.identity.name, chart.rows.empty() ? "no rows" : chart.rows.front().blank,
                               temperature_text(chart.identity.range.lowest_temperature, unit), temperature_text(chart.hottest_row, unit)));
}

void write(const std::string& file, const std::string& text) {
  std::ofstream out(file, std::ios::binary);
  if (!out) throw BadInput(fmt::format("--output: the file {} cannot be written", file));
  out << text;
  out.close();
  if (!out) throw std::runtime_error(fmt::format("--output: the file {} was not written in full", file));
}

Result run(const Options& o, const data::Catalogue& catalogue) {
  const auto render = renderer(o);
  const auto options = chart_options(o);
  const auto chart = apply::pt_chart(o.refrigerant.make(catalogue), options, catalogue);
  require_figures(chart);
  auto text = render(chart);
  if (o.output.empty()) return {std::move(text)};
  write(o.output, text);
  return {};
}

constexpr auto examples = R"~(Examples:
  zeotrope chart R-454B
  zeotrope chart R-410A --temperature-unit F --pressure-unit psig --from -40 --to 140 --step 5
  zeotrope chart R-407C --by pressure --pressure-unit "bar(g),kPa(a)" --altitude 1600
  zeotrope chart "R-32 68.9 + R-1234yf 31.1" --format csv --output mine.csv
  zeotrope chart R-290 --format card --output r290.html

Ends and steps are numbers in the unit shown: --temperature-unit, or with --by pressure the first --pressure-unit.)~";

}  // namespace

Subcommand add_chart(CLI::App& app) {
  auto* sub = app.add_subcommand("chart", "pressure-temperature chart, by round temperatures or round pressures");
  const auto o = std::make_shared<Options>();
  o->refrigerant.add_to(*sub);
  sub->add_option("--from", o->from, "first row; chosen for the refrigerant where left out")->type_name("NUMBER");
  sub->add_option("--to", o->to, "last row")->type_name("NUMBER");
  sub->add_option("--step", o->step, "from row to row")->type_name("NUMBER");
  sub->add_option("--by", o->by, "what the rows are: temperature (as it stands) or pressure")->type_name("COLUMN");
  o->units.add_to(*sub, "C where left out", "bar(g) where left out");
  o->ambient.add_to(*sub);
  sub->add_option("--format", o->format, "text, csv, json, or card (a page to print); left out: by the extension of FILE, else text")->type_name("FORMAT");
  sub->add_option("--output", o->output, "write to this file instead of standard output")->type_name("FILE");
  sub->add_flag("--extrapolate", o->extrapolate, "also outside the published range of the equations; such rows are marked");
  sub->footer(examples + pressure_units_line());
  return {sub, [o](const data::Catalogue& c) { return run(*o, c); }};
}

}  // namespace zeotrope::command
