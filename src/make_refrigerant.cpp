#include "zeotrope/refrigerant.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <charconv>
#include <set>

#include "zeotrope/data/names.hpp"
#include "zeotrope/equation/pair_rule.hpp"

namespace zeotrope {

namespace {

Refrigerant assemble(std::string name, const std::vector<Part>& parts, Basis basis, ReferenceState reference, const data::Catalogue& catalogue,
                     std::shared_ptr<const data::Blend> designated) {
  std::vector<std::shared_ptr<const data::Compound>> compounds;
  std::vector<double> fractions;
  std::set<std::string> seen;
  for (const auto& part : parts) {
    auto c = catalogue.compound(part.compound);
    if (!seen.insert(data::name_key(c->designation)).second)
      throw BadInput(fmt::format("{}: {} stands twice; each component once is wanted", name, c->designation));
    if (part.fraction == 0) continue;
    if (c->equations.empty())
      throw BadInput(fmt::format("{}{} has no Helmholtz equation in the coefficient files, so nothing can be computed with it", name == c->designation ? "" : name + ": ", c->designation));
    compounds.push_back(std::move(c));
    fractions.push_back(part.fraction);
  }
  std::vector<data::Pair> pairs;
  std::vector<std::shared_ptr<const data::Departure>> departures;
  for (std::size_t i = 0; i < compounds.size(); ++i)
    for (std::size_t j = i + 1; j < compounds.size(); ++j) {
      const auto& a = *compounds[i];
      const auto& b = *compounds[j];
      auto pair = catalogue.find_pair(a.designation, b.designation);
      if (!pair) pair = equation::estimated_pair(catalogue.estimation(), a, b, a.equations.front().reducing_density, b.equations.front().reducing_density);
      if (!pair->departure.empty()) {
        auto d = catalogue.find_departure(pair->departure);
        if (!d) throw BadInput(fmt::format("{}: the pair {} / {} names the departure function \"{}\", which no departures.toml has", name, a.designation, b.designation, pair->departure));
        departures.push_back(std::move(d));
      }
      pairs.push_back(std::move(*pair));
    }
  return Refrigerant(std::move(name), std::move(compounds), fractions, basis, std::move(pairs), std::move(departures), std::move(designated), reference);
}

/// Checks and, on request, scales fractions; returns them adding to 1.
std::vector<Part> checked(std::vector<Part> parts, double whole, bool normalise) {
  if (parts.empty()) throw BadInput("blend: no components; at least one is wanted");
  double sum = 0;
  for (const auto& p : parts) {
    if (!std::isfinite(p.fraction) || p.fraction < 0) throw BadInput(fmt::format("blend: {} has the fraction {}; a number not below 0 is wanted", p.compound, p.fraction));
    sum += p.fraction;
  }
  if (!(sum > 0)) throw BadInput("blend: all fractions are 0; at least one above 0 is wanted");
  if (!normalise && std::abs(sum / whole - 1) > 1e-6)
    throw BadInput(fmt::format("blend: the fractions add to {:.8g}; {} is wanted, or ask for them to be normalised", sum, whole));
  for (auto& p : parts) p.fraction /= sum;
  return parts;
}

std::string_view trim(std::string_view s) {
  const auto a = s.find_first_not_of(" \t");
  if (a == std::string_view::npos) return {};
  return s.substr(a, s.find_last_not_of(" \t") - a + 1);
}

std::string recipe_name(const std::vector<Part>& parts, Basis basis, const data::Catalogue& catalogue) {
  std::string name;
  for (const auto& p : parts) {
    if (p.fraction == 0) continue;
    name += fmt::format("{}{} {:.6g}", name.empty() ? "" : " + ", catalogue.compound(p.compound)->designation, 100 * p.fraction);
  }
  return name + (basis == Basis::mass ? " % by mass" : " % by mole");
}

}  // namespace

Refrigerant refrigerant(std::string_view name, const data::Catalogue& catalogue, ReferenceState reference) {
  if (const auto b = catalogue.find_blend(name)) {
    std::vector<Part> parts;
    for (std::size_t i = 0; i < b->components.size(); ++i) parts.push_back({b->components[i], b->mass_percent[i] / 100});
    return assemble(b->designation, parts, Basis::mass, reference, catalogue, b);
  }
  if (const auto c = catalogue.find_compound(name)) return assemble(c->designation, {{c->designation, 1.0}}, Basis::mole, reference, catalogue, nullptr);
  std::string near;
  for (const auto& s : catalogue.suggestions(name)) {
    near += near.empty() ? "; near to it are: " : ", ";
    near += s;
  }
  throw BadInput(fmt::format("no refrigerant \"{}\" in the coefficient files{}", name.substr(0, 64), near));
}

Refrigerant blend(const std::vector<Part>& parts, const BlendOptions& options, const data::Catalogue& catalogue) {
  const auto sound = checked(parts, 1.0, options.normalise);
  return assemble(recipe_name(sound, options.basis, catalogue), sound, options.basis, options.reference, catalogue, nullptr);
}

std::vector<Part> parse_recipe(std::string_view text, bool normalise) {
  std::vector<Part> parts;
  double sum = 0;
  for (std::size_t at = 0; at <= text.size();) {
    const auto end = std::min(text.find('+', at), text.size());
    const auto item = trim(text.substr(at, end - at));
    at = end + 1;
    const auto gap = item.find_last_of(" \t");
    if (item.empty() || gap == std::string_view::npos)
      throw BadInput(fmt::format("recipe: found \"{}\"; \"NAME FIGURE + NAME FIGURE ...\" is wanted, e.g. \"R-32 68.9 + R-1234yf 31.1\"", item.substr(0, 64)));
    auto figure = trim(item.substr(gap));
    if (figure.ends_with('%')) figure.remove_suffix(1);
    double value = 0;
    const auto [stop, fault] = std::from_chars(figure.data(), figure.data() + figure.size(), value);
    if (fault != std::errc() || stop != figure.data() + figure.size() || !std::isfinite(value) || value < 0)
      throw BadInput(fmt::format("recipe: found the figure \"{}\" for {}; a number not below 0 is wanted", figure.substr(0, 40), trim(item.substr(0, gap)).substr(0, 64)));
    parts.push_back({std::string(trim(item.substr(0, gap))), value});
    sum += value;
  }
  // percent or fractions, whichever the sum says; neither: refuse in terms of the nearer one
  return checked(std::move(parts), sum > 10 ? 100.0 : 1.0, normalise);
}

Refrigerant parse_refrigerant(std::string_view text, const BlendOptions& options, const data::Catalogue& catalogue) {
  if (text.find('+') == std::string_view::npos) return refrigerant(text, catalogue, options.reference);
  return blend(parse_recipe(text, options.normalise), options, catalogue);
}

}  // namespace zeotrope
