#include "zeotrope/apply/cautions.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <limits>
#include <map>

#include "zeotrope/apply/identification.hpp"
#include "zeotrope/data/names.hpp"

namespace zeotrope::apply {

std::vector<data::Caution> applicable_cautions(const Refrigerant& r, const data::Catalogue& catalogue, bool below_atmosphere, bool near_critical) {
  const auto id = identify(r);
  const auto has = [&](std::string_view designation) {
    return std::any_of(r.components().begin(), r.components().end(), [&](const Component& c) { return data::name_key(c.compound->designation) == data::name_key(designation); });
  };
  // a new blend has no group; a flammable or toxic component is reason enough to show the caution
  const auto component_group = [&](auto&& test) {
    return std::any_of(r.components().begin(), r.components().end(), [&](const Component& c) { return c.compound->safety && test(c.compound->safety->group); });
  };
  const auto burns = [](const std::string& g) { return g.ends_with('3') || g.ends_with('2') || g.ends_with("2L"); };
  const auto toxic = [](const std::string& g) { return g.starts_with('B'); };
  const bool classified = id.designated && !id.safety_group.empty();
  const bool flammable = classified ? burns(id.safety_group) : component_group(burns);
  const bool halogenated = std::any_of(r.components().begin(), r.components().end(), [](const Component& c) { return c.compound->formula.find_first_of("FI") != std::string::npos || c.compound->formula.find("Cl") != std::string::npos || c.compound->formula.find("Br") != std::string::npos; });
  // bubble pressure at 65 C, or the highest there is where that is hotter than the two-phase region
  const double standing_temperature = 338.15;
  double standing_pressure = id.top.pressure;
  try {
    if (standing_temperature < 0.999 * id.top.temperature) standing_pressure = r.bubble({.temperature = standing_temperature, .extrapolate = true}).pressure;
  } catch (const Error&) {
    // not known: the caution is shown rather than left out
    standing_pressure = std::numeric_limits<double>::infinity();
  }

  const std::map<std::string, bool, std::less<>> holds{
      {"always", true},
      {"zeotrope", r.is_blend()},
      {"near-critical", near_critical},
      {"below-atmosphere", below_atmosphere},
      {"flammable", flammable},
      {"non-flammable-halogenated", !flammable && halogenated},
      {"toxic", classified ? toxic(id.safety_group) : component_group(toxic)},
      {"carbon-dioxide", has("R-744")},
      {"ammonia", has("R-717")},
      {"high-pressure", standing_pressure > 30e5},
      {"disproportionation", has("R-1123") || has("R-1132(E)")},
      {"phased-out", id.odp.value_or(0.0) > 0},
      {"unclassified", !classified},
      {"uncertain-composition", std::any_of(id.uncertain.begin(), id.uncertain.end(), [](const std::string& s) { return s.starts_with("composition") || s.starts_with("mass_percent") || s.starts_with("components"); })},
  };
  std::vector<data::Caution> shown;
  for (const auto& c : catalogue.cautions()) {
    const auto it = holds.find(c.when);
    if (it == holds.end()) throw BadInput(fmt::format("cautions.toml: the caution \"{}\" has the condition \"{}\", which is not known", c.name, c.when));
    if (it->second) shown.push_back(c);
  }
  return shown;
}

}  // namespace zeotrope::apply
