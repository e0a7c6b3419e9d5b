#include <fmt/format.h>

#include <memory>

#include "command.hpp"
#include "layout.hpp"
#include "options.hpp"
#include "zeotrope/apply/gauge_reading.hpp"

namespace zeotrope::command {

namespace {

struct Options {
  RefrigerantChoice refrigerant;
  UnitChoice units;
  AmbientChoice ambient;
  std::string gauge, line;
  bool suction = false, liquid = false, extrapolate = false;
};

std::string superheat_lines(const apply::GaugeReading& g, units::Temperature unit, bool blend, bool asked) {
  auto text = fmt::format("suction line: superheat {}\n", difference_text(g.superheat, unit));
  text += fmt::format("  line {} minus {} {}\n", temperature_text(g.line_temperature, unit), blend ? "dew" : "saturation",
                      temperature_text(g.dew.temperature, unit));
  text += blend ? "  column used: dew (vapour)\n" : "";
  if (!g.suction_warning.empty()) text += wrapped(asked ? "  WARNING: " : "  WARNING, if this is a suction line: ", g.suction_warning);
  return text;
}

std::string subcooling_lines(const apply::GaugeReading& g, units::Temperature unit, bool blend, bool asked) {
  auto text = fmt::format("liquid line: subcooling {}\n", difference_text(g.subcooling, unit));
  text += fmt::format("  {} {} minus line {}\n", blend ? "bubble" : "saturation", temperature_text(g.bubble.temperature, unit),
                      temperature_text(g.line_temperature, unit));
  text += blend ? "  column used: bubble (liquid)\n" : "";
  if (!g.liquid_warning.empty()) text += wrapped(asked ? "  WARNING: " : "  WARNING, if this is a liquid line: ", g.liquid_warning);
  return text;
}

Result run(const Options& o, const data::Catalogue& catalogue) {
  if (o.suction && o.liquid) throw BadInput("--suction and --liquid: only one of them is wanted; leave both out to see both");
  const auto ambient = o.ambient.resolve();
  const auto gauge = entered_pressure("--gauge", o.gauge, ambient.pascal);
  const auto line = entered_temperature("--line", o.line);
  const auto unit = o.units.temperature_or(line.unit);
  const auto pressure_units = o.units.pressure_or({gauge.unit});
  const auto r = o.refrigerant.make(catalogue);
  const auto g = apply::gauge_reading(r, gauge.pascal, line.kelvin, o.extrapolate);

  Table t("lll");
  std::string pressures;
  for (const auto u : pressure_units) pressures += (pressures.empty() ? "" : ", ") + pressure_text(gauge.pascal, u, ambient.pascal);
  t.row({"gauge", pressures, fmt::format("{:.1f} kPa absolute", gauge.pascal / 1e3)});
  t.row({"line", temperature_text(line.kelvin, unit)});
  if (r.is_blend()) {
    t.row({"bubble (liquid)", temperature_text(g.bubble.temperature, unit)});
    t.row({"dew (vapour)", temperature_text(g.dew.temperature, unit)});
    t.row({"glide", difference_text(g.glide, unit), "at this pressure"});
  } else {
    t.row({"saturation", temperature_text(g.dew.temperature, unit), "no glide, a pure fluid"});
  }
  std::string text = r.name() + "\n\n" + t.text() + "\n";
  const bool both = !o.suction && !o.liquid;
  if (both && g.superheat < 0 && g.subcooling < 0)
    text += "The line is between bubble and dew: liquid and vapour together, neither superheated nor subcooled.\n\n";
  if (!o.liquid) text += superheat_lines(g, unit, r.is_blend(), o.suction);
  if (both) text += "\n";
  if (!o.suction) text += subcooling_lines(g, unit, r.is_blend(), o.liquid);
  text += fmt::format("\ngauge zero: {}\n", ambient.note);
  text += "Take pressure and temperature at the same place; add the line drop where the tap is far away.\n";
  if (g.bubble.extrapolated || g.dew.extrapolated) text += "extrapolated: outside the published range of the equations\n";
  return {std::move(text)};
}

constexpr auto examples = R"~(Examples:
  zeotrope reading R-454B --gauge "118 psig" --line 55F --suction
  zeotrope reading R-407C --gauge "16.2 bar(g)" --line 35C --liquid
  zeotrope reading R-134a --gauge "-0.3 bar(g)" --line -20C
  zeotrope reading R-404A --gauge "5 inHg" --line -40F --suction --altitude 1600

Superheat is the line minus the dew temperature, subcooling the bubble temperature minus the line, both at the gauge's pressure.)~";

}  // namespace

Subcommand add_reading(CLI::App& app) {
  auto* sub = app.add_subcommand("reading", "superheat and subcooling from a gauge and a line thermometer");
  const auto o = std::make_shared<Options>();
  o->refrigerant.add_to(*sub);
  sub->add_option("--gauge", o->gauge, "pressure with its unit: \"118 psig\", \"-0.3 bar(g)\", \"5 inHg\" (vacuum)")->required()->type_name("PRESSURE");
  sub->add_option("--line", o->line, "temperature of the line with its unit: 12C, 55F")->required()->type_name("TEMPERATURE");
  sub->add_flag("--suction", o->suction, "a suction or gas line: superheat only");
  sub->add_flag("--liquid", o->liquid, "a liquid line: subcooling only");
  o->units.add_to(*sub, "left out: that of --line", "left out: that of --gauge");
  o->ambient.add_to(*sub);
  sub->add_flag("--extrapolate", o->extrapolate, "also outside the published range of the equations");
  sub->footer(examples + pressure_units_line());
  return {sub, [o](const data::Catalogue& c) { return run(*o, c); }};
}

}  // namespace zeotrope::command
