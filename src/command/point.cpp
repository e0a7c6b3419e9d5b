#include <fmt/format.h>

#include <algorithm>
#include <memory>
#include <utility>

#include "command.hpp"
#include "layout.hpp"
#include "options.hpp"
#include "zeotrope/apply/figures.hpp"

namespace zeotrope::command {

namespace {

struct Options {
  RefrigerantChoice refrigerant;
  UnitChoice units;
  AmbientChoice ambient;
  std::string temperature, pressure;
  bool extrapolate = false;
};

/// How the answer is shown.
struct Shown {
  units::Temperature temperature = units::Temperature::celsius;
  std::vector<units::Pressure> pressure = {units::Pressure::bar_gauge};
  Ambient ambient;
};

std::string six_digits(double value) { return fmt::format("{:#.6g}", value); }

std::string state_table(const std::vector<const SaturationPoint*>& points, const Shown& shown) {
  Table t("l" + std::string(points.size(), 'r'));
  const auto row = [&](std::string what, auto&& figure) {
    std::vector<std::string> cells{std::move(what)};
    for (const auto* p : points) cells.push_back(figure(*p));
    t.row(std::move(cells));
  };
  t.row(points.size() == 1 ? std::vector<std::string>{"", "saturation"} : std::vector<std::string>{"", "bubble (liquid)", "dew (vapour)"});
  row(fmt::format("temperature, {}", units::label(shown.temperature)),
      [&](const SaturationPoint& p) { return apply::temperature_figure(p.temperature, shown.temperature, 3); });
  for (const auto u : shown.pressure)
    if (u != units::Pressure::kpa_absolute) row("pressure", [&](const SaturationPoint& p) { return pressure_text(p.pressure, u, shown.ambient.pascal); });
  row("pressure", [](const SaturationPoint& p) { return six_digits(p.pressure / 1e3) + " kPa(a)"; });
  return t.text();
}

/// Both phases of each point side by side.
std::string phase_table(const Refrigerant& r, const std::vector<const SaturationPoint*>& points) {
  std::vector<const Phase*> phases;
  std::vector<std::string> head{""};
  for (const auto* p : points) {
    const std::string where = points.size() == 1 ? "" : p == points.front() ? "bubble: " : "dew: ";
    for (const auto& [phase, name] : {std::pair{&p->liquid, "liquid"}, std::pair{&p->vapour, "vapour"}}) {
      phases.push_back(phase);
      head.push_back(where + name);
    }
  }
  Table t("l" + std::string(phases.size(), 'r'));
  t.row(std::move(head));
  const auto row = [&](std::string what, auto&& figure) {
    std::vector<std::string> cells{std::move(what)};
    for (const auto* p : phases) cells.push_back(figure(*p));
    t.row(std::move(cells));
  };
  row("density, kg/m3", [](const Phase& p) { return six_digits(p.density); });
  row("density, mol/m3", [](const Phase& p) { return six_digits(p.molar_density); });
  if (r.is_blend())
    for (const auto& [basis, fractions] : {std::pair{"mass", &Phase::mass_fractions}, std::pair{"mole", &Phase::mole_fractions}})
      for (std::size_t i = 0; i < r.components().size(); ++i)
        row(fmt::format("{}, % by {}", r.components()[i].compound->designation, basis),
            [&, f = fractions](const Phase& p) { return fmt::format("{:.3f}", 100 * (p.*f)[static_cast<Eigen::Index>(i)]); });
  return t.text();
}

std::string glide_line(const Refrigerant& r, const Saturation& s, bool by_pressure, const Shown& shown) {
  if (!r.is_blend()) return "glide: none, a pure fluid\n";
  try {
    const double glide = by_pressure ? s.dew.temperature - s.bubble.temperature : r.glide(s.bubble.pressure, true);
    return fmt::format("glide: {} at {}\n", difference_text(glide, shown.temperature, 2), by_pressure ? "this pressure" : "the bubble pressure");
  } catch (const NoSolution& e) {
    return wrapped("glide: ", fmt::format("not given at the bubble pressure, which has no dew point ({})", e.what()));
  }
}

Result run(const Options& o, const data::Catalogue& catalogue) {
  if (o.temperature.empty() == o.pressure.empty()) throw BadInput("point: exactly one of --temperature and --pressure is wanted");
  Shown shown;
  shown.ambient = o.ambient.resolve();
  SaturationAt at;
  at.extrapolate = o.extrapolate;
  std::string given;
  if (o.temperature.empty()) {
    const auto p = entered_pressure("--pressure", o.pressure, shown.ambient.pascal);
    at.pressure = p.pascal;
    shown.pressure = {p.unit};
    given = pressure_text(p.pascal, p.unit, shown.ambient.pascal);
  } else {
    const auto t = entered_temperature("--temperature", o.temperature);
    at.temperature = t.kelvin;
    shown.temperature = t.unit;
    given = temperature_text(t.kelvin, t.unit, 2);
  }
  shown.temperature = o.units.temperature_or(shown.temperature);
  shown.pressure = o.units.pressure_or(shown.pressure);

  const auto r = o.refrigerant.make(catalogue);
  const auto s = r.saturation(at);
  std::vector<const SaturationPoint*> points{&s.bubble};
  if (r.is_blend()) points.push_back(&s.dew);

  std::string text = fmt::format("{} at {}\n\n", r.name(), given);
  text += state_table(points, shown) + "\n" + phase_table(r, points) + "\n";
  text += glide_line(r, s, at.pressure.has_value(), shown);
  text += fmt::format("gauge zero: {}\n", shown.ambient.note);
  text += fmt::format("fugacity check: largest |ln f(liquid) - ln f(vapour)| is {:.1e}; below 1e-9 is required\n",
                      std::max(s.bubble.fugacity_mismatch, s.dew.fugacity_mismatch));
  if (s.bubble.extrapolated || s.dew.extrapolated) text += "extrapolated: outside the published range of the equations\n";
  return {std::move(text)};
}

constexpr auto examples = R"~(Examples:
  zeotrope point R-454B --temperature 5C
  zeotrope point R-410A --pressure "118 psig"
  zeotrope point R-134a --temperature -40F --pressure-unit "psig,bar(a)"
  zeotrope point R-407C --pressure "0.2 bar(g)" --altitude 1600
  zeotrope point "R-290 50 + R-600a 50" --mole --temperature -5C)~";

}  // namespace

Subcommand add_point(CLI::App& app) {
  auto* sub = app.add_subcommand("point", "bubble and dew point at one temperature or one pressure, with both phases");
  const auto o = std::make_shared<Options>();
  o->refrigerant.add_to(*sub);
  sub->add_option("--temperature", o->temperature, "with its unit: 5C, 41F, 278.15K")->type_name("TEMPERATURE");
  sub->add_option("--pressure", o->pressure, "with its unit: \"118 psig\", \"8.1 bar(g)\", \"915 kPa(a)\"")->type_name("PRESSURE");
  o->units.add_to(*sub, "left out: that of --temperature, else C", "left out: that of --pressure, else bar(g)");
  o->ambient.add_to(*sub);
  sub->add_flag("--extrapolate", o->extrapolate, "also outside the published range of the equations");
  sub->footer(examples + pressure_units_line());
  return {sub, [o](const data::Catalogue& c) { return run(*o, c); }};
}

}  // namespace zeotrope::command
