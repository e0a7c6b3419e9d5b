#pragma once

#include <algorithm>
#include <cctype>
#include <cmath>
#include <string>
#include <string_view>

#include "zeotrope/data/names.hpp"
#include "zeotrope/data/records.hpp"

namespace zeotrope::equation {

/// Class of a compound as the rows of pairs.toml's estimation table name it, read off its formula and number:
/// "hydrocarbon", "hydrofluorocarbon", "hydrochlorofluorocarbon", "chlorofluorocarbon", "perfluorocarbon",
/// "hydrofluoroolefin" (fluorinated, with a double bond: four-digit number 1xxx), or "" where none fits.
inline std::string compound_class(const data::Compound& compound) {
  bool c = false, h = false, f = false, cl = false, other = false;
  const std::string& s = compound.formula;
  for (std::size_t i = 0; i < s.size(); ++i) {
    if (std::isupper(static_cast<unsigned char>(s[i])) == 0) continue;
    const bool two = i + 1 < s.size() && std::islower(static_cast<unsigned char>(s[i + 1])) != 0;
    const auto element = s.substr(i, two ? 2 : 1);
    if (element == "C") c = true;
    else if (element == "H") h = true;
    else if (element == "F") f = true;
    else if (element == "Cl") cl = true;
    else other = true;
  }
  if (!c || other) return "";
  const auto key = data::name_key(compound.designation);
  const bool olefin = key.size() >= 4 && key[0] == '1' && std::all_of(key.begin(), key.begin() + 4, [](char d) { return d >= '0' && d <= '9'; });
  if (!f && !cl) return h ? "hydrocarbon" : "";
  if (olefin) return f && !cl ? "hydrofluoroolefin" : "";
  if (h) return cl ? (f ? "hydrochlorofluorocarbon" : "") : "hydrofluorocarbon";
  return cl ? (f ? "chlorofluorocarbon" : "") : "perfluorocarbon";
}

/// Parameters for a pair without a row: gamma_T by class, gamma_v by the half-way rule, everything else as the
/// table says. `kind` is PairKind::rule, `provenance` names the class.
inline data::Pair estimated_pair(const data::Estimation& table, const data::Compound& a, const data::Compound& b, double reducing_density_a,
                                 double reducing_density_b) {
  const auto member = [](const data::Compound& compound, const std::string& kind, const std::vector<std::string>& set) {
    return std::any_of(set.begin(), set.end(), [&](const std::string& entry) { return entry == kind || data::name_key(entry) == data::name_key(compound.designation); });
  };
  const auto class_a = compound_class(a), class_b = compound_class(b);
  data::Pair p;
  p.first = a.designation;
  p.second = b.designation;
  p.beta_T = table.beta_T;
  p.beta_v = table.beta_v;
  p.F = table.F;
  p.gamma_T = table.gamma_T;
  p.gamma_T_uncertainty = std::nullopt;
  const double cube_roots = std::cbrt(1 / reducing_density_a) + std::cbrt(1 / reducing_density_b);
  p.gamma_v = 0.5 + 2 * (1 / reducing_density_a + 1 / reducing_density_b) / (cube_roots * cube_roots * cube_roots);
  p.kind = data::PairKind::rule;
  p.provenance = "no row and no class for this pair: geometric mean of the reducing temperatures";
  for (const auto& row : table.classes)
    if ((member(a, class_a, row.first) && member(b, class_b, row.second)) || (member(b, class_b, row.first) && member(a, class_a, row.second))) {
      p.gamma_T = row.gamma_T;
      p.gamma_T_uncertainty = row.spread;
      p.provenance = "no row for this pair; class value: " + row.what;
      break;
    }
  return p;
}

}  // namespace zeotrope::equation
