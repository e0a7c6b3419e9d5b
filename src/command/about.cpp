#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <memory>
#include <optional>

#include "command.hpp"
#include "layout.hpp"
#include "options.hpp"
#include "zeotrope/apply/cautions.hpp"
#include "zeotrope/apply/figures.hpp"
#include "zeotrope/apply/identification.hpp"

namespace zeotrope::command {

namespace {

struct Options {
  RefrigerantChoice refrigerant;
  UnitChoice units;
  bool cautions = false;
};

using apply::Identification;

std::string group_text(const std::string& g) { return g.empty() ? "none known" : g; }

std::string identity(const Refrigerant& r, const Identification& id) {
  std::string text = r.name() + "\n";
  if (!r.is_blend()) {
    const auto& c = *r.components().front().compound;
    text += wrapped("  ", fmt::format("{}, {}{}", c.chemical_name, c.formula, c.cas.empty() ? "" : ", CAS " + c.cas));
    std::string aliases;
    for (const auto& a : c.aliases) aliases += (aliases.empty() ? "" : ", ") + a;
    if (!aliases.empty()) text += wrapped("  also: ", aliases);
    if (!c.note.empty()) text += wrapped("  note: ", c.note);
  } else if (const auto& b = r.designated()) {
    text += fmt::format("  designated blend, {}\n", b->series);
    if (!b->note.empty()) text += wrapped("  note: ", b->note);
  } else {
    text += "  new blend, without a designation\n";
  }
  text += fmt::format("  safety group: {}\n", group_text(id.safety_group));
  text += fmt::format("  molar mass: {:.3f} g/mol\n", id.molar_mass * 1e3);
  return text;
}

std::string composition(const Refrigerant& r, const Identification& id) {
  if (!r.is_blend()) return "";
  const bool tolerances =
      std::any_of(id.parts.begin(), id.parts.end(), [](const auto& p) { return p.tolerance_plus.has_value() || p.tolerance_minus.has_value(); });
  Table t("lrrrll");
  t.row({"", "% by mass", tolerances ? "tolerance" : "", "% by mole", "group", "name"});
  for (std::size_t i = 0; i < id.parts.size(); ++i) {
    const auto& p = id.parts[i];
    const auto& safety = r.components()[i].compound->safety;
    std::string tolerance;
    if (p.tolerance_plus && p.tolerance_minus) tolerance = fmt::format("+{:g}/-{:g}", *p.tolerance_plus, *p.tolerance_minus);
    t.row({p.designation, fmt::format("{:.2f}", p.mass_percent), tolerance, fmt::format("{:.2f}", p.mole_percent),
           safety && !safety->group.empty() ? safety->group : "-", p.chemical_name});
  }
  std::string text = "Composition\n" + t.text("  ");
  if (r.designated() && !r.designated()->source.empty()) text += wrapped("  source: ", r.designated()->source);
  return text + "\n";
}

/// Flammability and exposure limits of a pure fluid; a blend has only its group.
std::string safety(const Refrigerant& r) {
  const auto& s = r.components().front().compound->safety;
  if (r.is_blend() || !s) return "";
  Table t("lrl");
  const auto row = [&](const char* what, const std::optional<double>& v, const char* unit) {
    if (v) t.row({what, fmt::format("{:g}", *v), unit});
  };
  row("lower flammability limit", s->lfl_volume_percent, "% by volume");
  row("lower flammability limit", s->lfl_kg_m3, "kg/m3");
  row("burning velocity", s->burning_velocity_cm_s, "cm/s");
  row(s->oel_is_ceiling ? "occupational exposure limit (ceiling)" : "occupational exposure limit (8 h)", s->oel_ppm, "ppm");
  row("acute toxicity exposure limit", s->atel_ppm, "ppm");
  row("refrigerant concentration limit", s->rcl_ppm, "ppm");
  row("refrigerant concentration limit", s->rcl_g_m3, "g/m3");
  return "Safety\n" + t.text("  ") + wrapped("  source: ", s->source) + "\n";
}

std::string gwp_figure(const apply::WarmingPotential& w, bool blend) {
  if (!w.value) return "not given";
  auto v = *w.value < 10 ? fmt::format("{:.2g}", *w.value) : fmt::format("{:.0f}", *w.value);
  if (!w.below) return v;
  return blend ? v + " (a component is published as <1 and counted as 1)" : "<1";
}

std::string environment(const Refrigerant& r, const Identification& id) {
  Table t("ll");
  for (const auto& w : id.gwp) t.row({"GWP (100 years), " + w.report, gwp_figure(w, r.is_blend())});
  t.row({"ODP, Montreal Protocol", id.odp ? fmt::format("{:.3g}", *id.odp) : "not given"});
  return "Environment" + std::string(r.is_blend() ? " (by mass over the components)\n" : "\n") + t.text("  ") + "\n";
}

std::string limits(const Identification& id, units::Temperature unit, const std::vector<units::Pressure>& pressure_units) {
  const auto pressure = [&](double p) {
    std::string s;
    for (const auto u : pressure_units) s += (s.empty() ? "" : ", ") + pressure_text(p, u, units::standard_atmosphere);
    return s;
  };
  std::string text = "Range\n";
  const auto& r = id.range;
  const bool blend = id.parts.size() > 1;
  const auto by = [&](const std::string& who) { return blend ? " (" + who + ")" : ""; };
  text += wrapped("  equations valid: ", fmt::format("{}{} to {}{}, up to {}", temperature_text(r.lowest_temperature, unit), by(r.lowest_set_by),
                                                     temperature_text(r.highest_temperature, unit), by(r.highest_set_by), pressure(r.highest_pressure)));
  const auto& top = id.top;
  if (top.is_critical_point)
    text += wrapped("  critical point: ", fmt::format("{}, {}, {:.1f} kg/m3 (computed from the {})", temperature_text(top.temperature, unit, 2),
                                                      pressure(top.pressure), top.molar_density * id.molar_mass, blend ? "mixture model" : "equation"));
  else
    text += wrapped("  critical point: ", fmt::format("not reached; hottest state traced {}, {} ({})", temperature_text(top.temperature, unit, 2),
                                                      pressure(top.pressure), top.reason));
  return text + "\n";
}

/// Computed against published, at one atmosphere.
void normal_point_row(Table& t, const std::string& what, const std::optional<double>& published_kelvin, units::Temperature unit,
                      const std::function<double()>& compute) {
  const auto published = published_kelvin ? temperature_text(*published_kelvin, unit) : "not given";
  try {
    const double computed = compute();
    const auto difference = published_kelvin ? (computed < *published_kelvin ? "" : "+") + difference_text(computed - *published_kelvin, unit, 2) : "";
    t.row({what, temperature_text(computed, unit, 2), published, difference});
  } catch (const OutOfRange&) {
    t.row({what, "no figure", published, "outside the published range of the equations"});
  } catch (const NoSolution&) {
    t.row({what, "no figure", published, "the equations have no such state"});
  } catch (const NotConverged&) {
    t.row({what, "no figure", published, "not reached by the solver"});
  }
}

std::string normal_points(const Refrigerant& r, units::Temperature unit) {
  Table t("lrrl");
  t.row({"", "computed", "published", "difference"});
  const SaturationAt atmosphere{.pressure = units::standard_atmosphere};
  const auto kelvin = [](const std::optional<double>& celsius) { return celsius ? std::optional(*celsius + 273.15) : std::nullopt; };
  const auto bubble = [&] { return r.bubble(atmosphere).temperature; };
  const auto dew = [&] { return r.dew(atmosphere).temperature; };
  if (!r.is_blend()) {
    const auto& k = r.components().front().compound->constants;
    normal_point_row(t, "boiling point", k.normal_boiling_point_celsius ? kelvin(k.normal_boiling_point_celsius) : k.normal_boiling_point, unit, bubble);
  } else {
    const auto& b = r.designated();
    normal_point_row(t, "bubble point", b ? kelvin(b->normal_bubble_point_celsius) : std::nullopt, unit, bubble);
    normal_point_row(t, "dew point", b ? kelvin(b->normal_dew_point_celsius) : std::nullopt, unit, dew);
  }
  std::string text = "At one atmosphere (101.325 kPa)\n" + t.text("  ");
  const bool fitted = std::any_of(r.pairs().begin(), r.pairs().end(),
                                  [](const data::Pair& p) { return p.kind == data::PairKind::fitted || p.kind == data::PairKind::fitted_weak; });
  if (fitted && r.designated()) text += wrapped("  ", "fitted pairs were fitted to such published temperatures: their agreement is no independent check");
  return text + "\n";
}

std::string equations(const Identification& id) {
  std::string text = "Equations\n";
  for (const auto& p : id.parts) {
    text += fmt::format("  {}: {}\n", p.designation, p.equation);
    text += wrapped("    source: ", p.source);
    text += wrapped("    provenance: ", p.provenance);
  }
  return text + "\n";
}

std::string pairs(const Identification& id) {
  if (id.pairs.empty()) return "";
  std::string text = "Pairs of the mixture model\n";
  for (const auto& p : id.pairs) {
    text += fmt::format("  {} / {}: {}{}, gamma_T {:.6g}", p.first, p.second, apply::in_words(p.kind),
                        apply::is_estimated(p.kind) ? " (NO DATA behind it)" : "", p.gamma_T);
    text += p.gamma_T_uncertainty ? fmt::format(" +- {:g}\n", *p.gamma_T_uncertainty) : "\n";
    if (!p.source.empty()) text += wrapped("    source: ", p.source);
    if (!p.provenance.empty()) text += wrapped("    provenance: ", p.provenance);
  }
  return text + "\n";
}

std::string uncertain(const Identification& id) {
  if (id.uncertain.empty()) return "";
  std::string text = "Uncertain figures\n";
  for (const auto& u : id.uncertain) text += wrapped("  - ", u);
  return text + "\n";
}

std::string cautions(const Refrigerant& r, const data::Catalogue& catalogue, bool in_full) {
  std::string text = in_full ? "Cautions\n" : "Cautions (long form: --cautions)\n";
  for (const auto& c : apply::applicable_cautions(r, catalogue, true, false)) text += wrapped("  - ", in_full ? c.text : c.short_text);
  return text;
}

Result run(const Options& o, const data::Catalogue& catalogue) {
  const auto unit = o.units.temperature_or(units::Temperature::celsius);
  const auto pressure_units = o.units.pressure_or({units::Pressure::bar_absolute});
  const auto r = o.refrigerant.make(catalogue);
  const auto id = apply::identify(r);
  return {identity(r, id) + "\n" + composition(r, id) + safety(r) + environment(r, id) + limits(id, unit, pressure_units) + normal_points(r, unit) +
          equations(id) + pairs(id) + uncertain(id) + cautions(r, catalogue, o.cautions)};
}

constexpr auto examples = R"~(Examples:
  zeotrope about R-454B
  zeotrope about propane --cautions
  zeotrope about R-410A --temperature-unit F --pressure-unit psia
  zeotrope about "R-744 5 + R-290 95")~";

}  // namespace

Subcommand add_about(CLI::App& app) {
  auto* sub = app.add_subcommand("about", "composition, safety, GWP, range, and where every figure comes from");
  const auto o = std::make_shared<Options>();
  o->refrigerant.add_to(*sub);
  sub->add_flag("--cautions", o->cautions, "the cautions in full");
  o->units.add_to(*sub, "C where left out", "bar(a) where left out");
  sub->footer(examples + pressure_units_line());
  return {sub, [o](const data::Catalogue& c) { return run(*o, c); }};
}

}  // namespace zeotrope::command
