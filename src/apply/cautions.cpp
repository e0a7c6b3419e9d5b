#include "zeotrope/apply/cautions.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cctype>
#include <limits>
#include <map>
#include <set>

#include "zeotrope/apply/identification.hpp"
#include "zeotrope/data/names.hpp"

namespace zeotrope::apply {

namespace {

/// Whether a compound burns as far as its file tells: by its group; without one by a flammability limit, or by being a
/// hydrogen-bearing carbon compound or one of the inorganic fuel gases. No group is inferred, only a caution shown.
bool may_burn(const data::Compound& c) {
  const std::string group = c.safety ? c.safety->group : "";
  if (!group.empty()) return !group.ends_with('1');
  if (c.safety && (c.safety->lfl_volume_percent || c.safety->lfl_kg_m3)) return true;
  static const std::set<std::string> fuels{"H2", "H2S", "CO", "COS"};
  if (fuels.contains(c.formula)) return true;
  bool carbon = false, hydrogen = false;
  for (std::size_t i = 0; i < c.formula.size(); ++i) {
    const bool single = i + 1 == c.formula.size() || std::islower(static_cast<unsigned char>(c.formula[i + 1])) == 0;
    carbon = carbon || (single && c.formula[i] == 'C');
    hydrogen = hydrogen || (single && c.formula[i] == 'H');
  }
  return carbon && hydrogen;
}

}  // namespace

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
  const bool flammable = classified ? burns(id.safety_group) : std::any_of(r.components().begin(), r.components().end(), [&](const Component& c) { return may_burn(*c.compound); });
  const auto no_flame = [](const std::string& g) { return g.ends_with('1'); };
  const bool known_not_to_burn = classified ? no_flame(id.safety_group)
                                            : std::all_of(r.components().begin(), r.components().end(), [&](const Component& c) { return c.compound->safety && no_flame(c.compound->safety->group); });
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
      {"zeotrope", r.is_blend() && !(r.designated() && r.designated()->series == "azeotropic")},
      {"near-critical", near_critical},
      {"below-atmosphere", below_atmosphere},
      {"flammable", flammable},
      {"non-flammable-halogenated", known_not_to_burn && halogenated},
      {"toxic", classified ? toxic(id.safety_group) : component_group(toxic)},
      {"carbon-dioxide", has("R-744")},
      {"ammonia", has("R-717")},
      // above what sets for R-22 meet (R-22 itself: 27 bar, R-407C and R-404A about 32 bar at 65 C); a gas past its critical
      // temperature has no limit of its own
      {"high-pressure", standing_pressure > 36e5 || id.top.temperature < standing_temperature},
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
