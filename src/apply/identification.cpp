#include "zeotrope/apply/identification.hpp"

#include <fmt/format.h>

#include <algorithm>

namespace zeotrope::apply {

std::string_view in_words(data::PairKind kind) {
  switch (kind) {
    case data::PairKind::published: return "published";
    case data::PairKind::fitted: return "fitted";
    case data::PairKind::fitted_weak: return "fitted, weakly determined";
    case data::PairKind::estimated: return "estimated";
    case data::PairKind::rule: return "estimated by rule";
  }
  return "unknown";
}

bool is_estimated(data::PairKind kind) { return kind == data::PairKind::estimated || kind == data::PairKind::rule; }

namespace {

template <class Field>
WarmingPotential mass_weighted(const Refrigerant& r, std::string report, Field&& field) {
  WarmingPotential w{std::move(report), 0.0, false};
  for (const auto& c : r.components()) {
    const std::optional<data::Gwp>& g = field(c.compound->environment);
    if (!g) return {w.report, std::nullopt, false};
    *w.value += c.mass_fraction * g->value;
    w.below = w.below || g->below;
  }
  return w;
}

}  // namespace

Identification identify(const Refrigerant& r) {
  Identification id;
  id.name = r.name();
  const auto& blend = r.designated();
  id.designated = blend != nullptr || !r.is_blend();
  id.molar_mass = r.molar_mass();
  id.range = r.range();
  id.top = r.top();
  for (std::size_t i = 0; i < r.components().size(); ++i) {
    const auto& c = r.components()[i];
    Identification::Part p;
    p.designation = c.compound->designation;
    p.chemical_name = c.compound->chemical_name;
    p.mass_percent = 100 * c.mass_fraction;
    p.mole_percent = 100 * c.mole_fraction;
    if (blend && !blend->tolerance_plus.empty()) p.tolerance_plus = blend->tolerance_plus[i];
    if (blend && !blend->tolerance_minus.empty()) p.tolerance_minus = blend->tolerance_minus[i];
    p.equation = c.equation->name;
    p.source = c.equation->source;
    p.provenance = c.equation->provenance;
    id.parts.push_back(std::move(p));
  }
  if (blend)
    id.safety_group = blend->safety_group;
  else if (!r.is_blend() && r.components().front().compound->safety)
    id.safety_group = r.components().front().compound->safety->group;
  using E = data::Environment;
  id.gwp.push_back(mass_weighted(r, "IPCC AR4", [](const E& e) -> const auto& { return e.ar4; }));
  id.gwp.push_back(mass_weighted(r, "IPCC AR5", [](const E& e) -> const auto& { return e.ar5; }));
  id.gwp.push_back(mass_weighted(r, "IPCC AR6", [](const E& e) -> const auto& { return e.ar6; }));
  id.gwp.push_back(mass_weighted(r, "Regulation (EU) 2024/573", [](const E& e) -> const auto& { return e.eu_2024_573; }));
  id.odp = 0.0;
  for (const auto& c : r.components()) {
    const auto& odp = c.compound->environment.odp_montreal;
    if (!odp) {
      id.odp.reset();
      break;
    }
    *id.odp += c.mass_fraction * *odp;
  }
  for (const auto& p : r.pairs()) id.pairs.push_back({p.first, p.second, p.kind, p.gamma_T, p.gamma_T_uncertainty, p.source, p.provenance});
  if (blend)
    for (const auto& what : blend->uncertain) id.uncertain.push_back(fmt::format("{} of {} not certain: check the standard", what, blend->designation));
  for (const auto& c : r.components())
    for (const auto& what : c.compound->uncertain) id.uncertain.push_back(fmt::format("{} of {} not certain: check the standard", what, c.compound->designation));
  return id;
}

}  // namespace zeotrope::apply
